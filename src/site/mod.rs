//! The files a user writes, read into the types below: strictly, with every fault of a file at
//! once, each with its line and column.
//!
//! | file | what it reads or does |
//! |---|---|
//! | [`fault`] | what is wrong with a file, and where |
//! | [`builtin`] | the sites, mounts and lists compiled into the program |
//! | [`check`] | all that is wrong with any file |
//! | [`file_kind`] | what a file is |
//! | [`folders`] | where files live, and the file of a name |
//! | [`list_edit`] | adding to a list |
//! | [`list_file`] | a target list, plain or as a table |
//! | [`mount_file`] | a mount: circles, limits, expected errors, dome, tube, optics |
//! | [`new`] | a commented starting file for a new site, mount or list |
//! | [`own`] | the observer's own catalogues, of any size |
//! | [`readings_file`] | readings of both circles on known stars |
//! | [`site_file`] | a place: coordinates, air, horizon, its mount |
//! | [`table`] | a CSV table whose cells know their place |

pub mod builtin;
pub mod check;
mod circle_file;
mod document;
pub mod fault;
pub mod file_kind;
pub mod folders;
mod likely;
pub mod list_edit;
pub mod list_file;
mod list_row;
pub mod mount_file;
pub mod new;
pub mod own;
pub mod readings_file;
pub mod site_file;
pub mod table;
mod table_columns;
mod value;
mod written_angle;

pub use check::{Checked, Checker};
pub use fault::{Fault, Faults, FileText, Ink};
pub use file_kind::FileKind;
pub use folders::{Folders, NoHome, Shelf};
pub use list_file::{ListFile, ListLine};
pub use mount_file::MountFile;
pub use new::{Cannot, create};
pub use readings_file::{RawReading, ReadOnMount, ReadingsFile};
pub use site_file::{Site, SiteFile};
pub use table::Cell;
