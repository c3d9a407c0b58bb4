//! The files a user writes, read into the types below: strictly, with every fault of a file at
//! once, each with its line and column.
//!
//! | file | what it reads or does |
//! |---|---|
//! | [`fault`] | what is wrong with a file, and where |

mod document;
pub mod fault;
