//! nonius: the setting-circle dial-in assistant for manual equatorial mounts.
//!
//! The house is read from the ground floor up. A file may know its own folder and the floors below,
//! never one above nor one beside; `tests/house.rs` holds it to that.
//!
//! | floor | rooms | what lives there |
//! |---|---|---|
//! | 1 | [`angle`], [`sexagesimal`], [`bounds`], [`time`] | plain values: angles, their text, named ranges, instants and scales |
//! | 2 | [`sky`], [`metal`] | where things are for an observer at a place; the mount as built |
//! | 3 | [`estimate`], [`catalog`] | what is known of the mount's errors; catalogues and target lists |
//! | 4 | [`site`], [`dial`] | the files a user writes; **the main job**: what to set on each circle |
//! | 5 | [`plan`] | the night ahead: when each object can be had, from which side of the pier, in which order |
//! | 6 | [`night`] | the session: events, state, journal, replay |
//! | 7 | [`screen`] | the terminal |
//! | 8 | [`command`] | one file per command |
//!
//! Data travels one way: catalogue → target → apparent → observed → axes → reading → screen, JSON.

#![cfg_attr(test, allow(clippy::unwrap_used, clippy::expect_used, clippy::panic))]

pub mod angle;
pub mod bounds;
pub mod sexagesimal;
pub mod time;

pub mod metal;
pub mod sky;

pub mod catalog;
pub mod estimate;

pub mod dial;
pub mod site;

pub mod plan;

pub mod night;

pub mod screen;

pub mod command;
