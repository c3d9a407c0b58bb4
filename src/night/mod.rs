//! The session: events, state, journal, replay.
//!
//! An act becomes an [`Event`]; the event is made safe in the [`Journal`]; then [`update`] makes the
//! next state of it. Opening a night again is going through its events.

mod acts;
mod apply;
pub mod earlier;
pub mod effect;
pub mod event;
pub mod journal;
pub mod known;
pub mod listed;
pub mod log;
#[allow(clippy::module_inception)] // the night itself
pub mod night;
pub mod nights;
pub mod reading;
pub mod session;
pub mod state;

pub use earlier::{EarlierNight, StartedFrom};
pub use effect::{Effect, Said};
pub use event::{Circle, Event, Opening, Stamped};
pub use journal::{Journal, JournalFault, Notice};
pub use known::{Grounds, Known};
pub use listed::{ListedPlace, ListedTarget};
pub use log::Log;
pub use night::{Night, Refusal, update};
pub use nights::{NightSummary, Nights, last_before};
pub use reading::{Setting, ShownAxes, StarReading};
pub use session::{Begun, Session, SessionFault, whose};
pub use state::{NightReading, NightTarget, Outcome, State, TubeShown, Zeros};
