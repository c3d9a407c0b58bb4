//! The session: events, state, journal, replay.

pub mod event;
pub mod journal;
pub mod listed;
pub mod reading;

pub use event::{Circle, Event, Opening, Stamped};
pub use journal::{Journal, JournalFault, Notice};
pub use listed::{ListedPlace, ListedTarget};
pub use reading::{Setting, StarReading};
