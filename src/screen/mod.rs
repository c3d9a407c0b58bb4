//! The terminal at the eyepiece.
//!
//! What happens comes in one queue ([`happening`]); [`update`] says what follows, without doing it; the
//! [`desk`] makes the record safe and only then shows an act done; [`shown`] works out once what there
//! is to see at an instant, and [`view`] draws it. [`run`] alone holds the clock and the terminal.
//! [`keys`] is the one table of keys, for the dispatch, the hints, the help and the manual.

pub mod ahead;
mod calibrating;
pub mod calibration;
pub mod circle;
pub mod desk;
pub mod dots;
pub mod doubt;
pub mod entry;
pub mod field;
pub mod figures;
pub mod happening;
pub mod header;
pub mod help;
pub mod insight;
pub mod keys;
pub mod layout;
pub mod light;
pub mod lists;
pub mod look;
pub mod looking;
pub mod objects;
pub mod observatory;
pub mod outlook;
pub mod panel;
pub mod picture;
pub mod pretence;
pub mod reading;
pub mod run;
pub mod scene;
pub mod settings;
pub mod shown;
pub mod standing;
pub mod stopped;
pub mod sweep;
pub mod sweeping;
pub mod target_line;
pub mod terminal;
pub mod truth;
mod typing;
pub mod update;
pub mod view;
pub mod words;
