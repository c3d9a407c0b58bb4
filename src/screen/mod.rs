//! The terminal at the eyepiece.
