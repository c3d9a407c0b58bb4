//! An index of names: which rows of a catalogue hold which words, made once, so that a search looks at what can fit and at
//! nothing else.
//!
//! [`Builder`] takes the rows one after another; [`Builder::finish`] lays everything out as one run of bytes (`layout.rs`),
//! which [`Index`] reads in place, in memory or in a file: a catalogue of millions of rows is opened without being read.
//! Rows stand in order of brightness, so that among equals the brightest comes first and a search may stop early.

mod builder;
mod bytes;
mod candidates;
mod dictionary;
mod layout;
#[cfg(test)]
mod tests;

pub use builder::{Builder, Facts};
pub use bytes::Bytes;
pub use candidates::Candidates;
pub use layout::{Damaged, Index, Stamp};
