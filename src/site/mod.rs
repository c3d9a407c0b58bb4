//! The files a user writes, read into the types below: strictly, with every fault of a file at
//! once, each with its line and column.
//!
//! | file | what it reads or does |
//! |---|---|
//! | [`fault`] | what is wrong with a file, and where |
//! | [`list_file`] | a target list, plain or as a table |
//! | [`mount_file`] | a mount: circles, limits, expected errors, dome, tube, optics |
//! | [`readings_file`] | readings of both circles on known stars |
//! | [`site_file`] | a place: coordinates, air, horizon, its mount |
//! | [`table`] | a CSV table whose cells know their place |

mod circle_file;
mod document;
pub mod fault;
pub mod list_file;
pub mod mount_file;
pub mod readings_file;
pub mod site_file;
pub mod table;
mod written_angle;

pub use fault::{Fault, Faults, FileText, Ink};
pub use list_file::{ListFile, ListLine};
pub use mount_file::MountFile;
pub use readings_file::{RawReading, ReadingsFile};
pub use site_file::{Site, SiteFile};
pub use table::Cell;
