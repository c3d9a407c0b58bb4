//! The commands, one file each.

pub mod find;
pub mod log;
