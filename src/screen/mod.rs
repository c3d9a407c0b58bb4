//! The terminal at the eyepiece.

pub mod figures;
pub mod happening;
pub mod header;
pub mod keys;
pub mod light;
pub mod look;
pub mod picture;
pub mod terminal;
