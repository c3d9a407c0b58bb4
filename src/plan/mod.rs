//! The night ahead: from which side of the pier an object can be had, and until when.

pub mod sides;

pub use sides::{End, Reach, Site, fewest_turns, reaches};
