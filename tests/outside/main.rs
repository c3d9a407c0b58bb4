//! Checks against sources outside the project, each named beside its numbers.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod bodies;
mod chance;
mod circles;
mod dome;
mod equinoxes;
mod eyepiece;
mod fit;
mod meeus;
mod moon;
mod mount;
mod observing;
mod orbits;
mod published;
mod refraction;
mod rise_set;
mod stages;
mod stars;
mod table;
