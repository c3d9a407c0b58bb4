//! The events the observer's usual acts come to, as the night stands.

use crate::night::event::Event;
use crate::night::night::Night;
use crate::night::reading::{Setting, StarReading};

impl Night {
    /// Taking the object at this index of the list.
    #[must_use]
    pub fn take(&self, index: usize) -> Option<Event> {
        let entry = self.state().targets.get(index)?;
        Some(Event::TargetTaken {
            place: index + 1,
            target: Box::new(entry.target.clone()),
        })
    }

    /// Taking the next object; nothing at the end of the list.
    #[must_use]
    pub fn next(&self) -> Option<Event> {
        self.take(self.state().current.map_or(0, |index| index + 1))
    }

    /// Taking the object before; nothing at the head of the list.
    #[must_use]
    pub fn back(&self) -> Option<Event> {
        self.take(self.state().current?.checked_sub(1)?)
    }

    /// The object being dialled is found.
    #[must_use]
    pub fn found(&self, setting: Option<Setting>, reading: Option<StarReading>) -> Option<Event> {
        Some(Event::Found {
            target: self.state().current_target()?.target.name.clone(),
            setting,
            reading: reading.map(Box::new),
        })
    }

    /// The object being dialled is given up.
    #[must_use]
    pub fn missed(&self, setting: Option<Setting>) -> Option<Event> {
        Some(Event::Missed {
            target: self.state().current_target()?.target.name.clone(),
            setting,
        })
    }

    /// Words about the object being dialled, or about the night before any is.
    #[must_use]
    pub fn note(&self, text: &str) -> Event {
        let current = self.state().current_target();
        Event::Note {
            target: current.map(|entry| entry.target.name.clone()),
            text: text.to_owned(),
        }
    }

    /// Taking back the last act; nothing if none stands.
    #[must_use]
    pub fn undo(&self) -> Option<Event> {
        Some(Event::Undone {
            line: self.last_act()?.number,
        })
    }
}
