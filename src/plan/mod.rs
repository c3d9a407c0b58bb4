//! The night ahead: what the Sun and the Moon do in it, when each object can be had and from which side of the pier.

pub mod needs;
pub mod night;
pub mod order;
#[cfg(test)]
mod samples;
pub mod sides;
pub mod stand;
pub mod why_not;
pub mod window;

pub use needs::Needs;
pub use night::{Almanac, MoonTimes, Span, SunTimes};
pub use order::Tally;
pub use sides::{End, Reach, Site, fewest_turns, reaches};
pub use stand::Stand;
pub use why_not::{Floor, WhyNot};
pub use window::{Prospect, Watch, Window};
