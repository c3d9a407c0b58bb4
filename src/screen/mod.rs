//! The terminal at the eyepiece.

pub mod figures;
pub mod happening;
pub mod keys;
pub mod light;
pub mod terminal;
