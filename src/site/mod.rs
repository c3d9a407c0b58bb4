//! The files a user writes, read into the types below: strictly, with every fault of a file at
//! once, each with its line and column.
//!
//! | file | what it reads or does |
//! |---|---|
//! | [`fault`] | what is wrong with a file, and where |
//! | [`mount_file`] | a mount: circles, limits, expected errors, dome, tube, optics |
//! | [`site_file`] | a place: coordinates, air, horizon, its mount |

mod circle_file;
mod document;
pub mod fault;
pub mod mount_file;
pub mod site_file;
mod written_angle;

pub use fault::{Fault, Faults, FileText, Ink};
pub use mount_file::MountFile;
pub use site_file::{Site, SiteFile};
