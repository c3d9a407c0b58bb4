//! What a happening is held against, and the forms in which what follows is handed on.

use crate::night::{Event, StarReading};
use crate::screen::keys::Mode;
use crate::screen::panel::{Centred, Doing, Panel};
use crate::screen::shown::{From, Shown};
use crate::time::Utc;

/// What the observer types to answer for an object near the Sun.
pub const SUN_WORD: &str = "sun";

/// What a happening is held against.
#[derive(Clone, Copy)]
pub struct Scene<'s> {
    /// The record, and what stays the same.
    pub from: From<'s>,
    /// What was on the screen.
    pub shown: &'s Shown,
    /// The moment it happened.
    pub utc: Utc,
}

/// An act to be recorded, what is said once it is, and the mode to go on in.
pub(super) fn record(event: Event, said: impl Into<String>, then: Mode) -> Vec<Doing> {
    vec![Doing::Record {
        event: Box::new(event),
        said: said.into(),
        then,
    }]
}

/// A mode entered, and nothing recorded.
pub(super) fn entered(panel: &mut Panel, mode: Mode) -> Vec<Doing> {
    panel.enter(mode);
    Vec::new()
}

/// The act of reading a star, or of finding the object read.
pub(super) fn reading_event(
    scene: &Scene<'_>,
    star: &Centred,
    reading: StarReading,
) -> Option<Event> {
    if star.found {
        scene.from.night.found(None, Some(reading))
    } else {
        Some(Event::StarRead(Box::new(reading)))
    }
}
