//! Where a night stands: what the events so far add up to.
//!
//! Nothing here is stored: it is brought back from the journal. Angles in degrees as recorded.

use std::collections::BTreeSet;

use crate::metal::Side;
use crate::night::earlier::StartedFrom;
use crate::night::event::Opening;
use crate::night::listed::ListedTarget;
use crate::night::reading::{ShownAxes, StarReading};
use crate::time::Utc;

/// Where a night stands.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct State {
    /// How it began; nothing before the first event, or if that line was lost.
    pub opening: Option<Opening>,
    /// The list, in the order it is worked through.
    pub targets: Vec<NightTarget>,
    /// The object being dialled, by its index in the list.
    pub current: Option<usize>,
    /// The side of the pier to dial for; nothing for the usual side of each object.
    pub side: Option<Side>,
    /// Every reading of the night, in order.
    pub readings: Vec<NightReading>,
    /// The earlier night this one starts from.
    pub started_from: Option<StartedFrom>,
    /// How often each circle has been given a new zero, and the axis another place.
    pub zeros: Zeros,
    /// Where the tube was last known to be.
    pub tube: Option<TubeShown>,
    /// The clock's correction in force, in seconds, positive if the clock is slow.
    pub clock_correction_s: f64,
    /// How often the clock jumped: what was timed before cannot be compared with what came after.
    pub clock_jumps: u32,
    /// By how much it jumped last, in seconds, positive if forward.
    pub clock_leapt_s: Option<f64>,
    /// The objects the observer answers for, near the Sun as they are.
    pub sun_risks: BTreeSet<String>,
    /// Notes about no object.
    pub notes: Vec<String>,
    /// The session was left in good order.
    pub closed: bool,
}

/// An object of the list, with what became of it.
#[derive(Clone, Debug, PartialEq)]
pub struct NightTarget {
    /// The object.
    pub target: ListedTarget,
    /// What became of it last.
    pub outcome: Option<Outcome>,
    /// The observer's words, in order.
    pub notes: Vec<String>,
}

/// What became of an object.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Outcome {
    /// In the eyepiece at this moment.
    Found(Utc),
    /// Given up at this moment.
    Missed(Utc),
}

/// How often each circle has been given a new zero, and the axis another place: readings compare only
/// under the same zeros.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Zeros {
    /// The hour circle.
    pub hour: u32,
    /// The declination circle.
    pub dec: u32,
    /// The polar axis, turned by its adjusters.
    pub axis: u32,
}

/// A reading with where it stands in the night.
#[derive(Clone, Debug, PartialEq)]
pub struct NightReading {
    /// The number of its event.
    pub line: u64,
    /// When it was taken, by the clock as corrected since.
    pub utc: Utc,
    /// The reading, by the clock as corrected since.
    pub reading: StarReading,
    /// The zeros it was read under.
    pub zeros: Zeros,
    /// The clock had jumped so often by then.
    pub clock_jumps: u32,
}

/// Where the tube was last known to be, by what the circles showed.
#[derive(Clone, Debug, PartialEq)]
pub struct TubeShown {
    /// What it looked at.
    pub at: String,
    /// The shown axis angles.
    pub axes: ShownAxes,
    /// The side of the pier.
    pub side: Side,
    /// When, by the clock as corrected since.
    pub utc: Utc,
}

impl State {
    /// The object being dialled.
    #[must_use]
    pub fn current_target(&self) -> Option<&NightTarget> {
        self.targets.get(self.current?)
    }

    /// The readings the estimate is to use: those under the zeros in force, not set aside.
    pub fn readings_in_use(&self) -> impl Iterator<Item = &NightReading> {
        self.readings
            .iter()
            .filter(|read| read.reading.used && read.zeros == self.zeros)
    }

    /// True if the observer answers for this object near the Sun.
    #[must_use]
    pub fn sun_risk_is_acknowledged(&self, target: &str) -> bool {
        self.sun_risks.contains(target)
    }

    /// How many objects were found, and how many missed.
    #[must_use]
    pub fn tally(&self) -> (usize, usize) {
        let count = |wanted: fn(&Outcome) -> bool| {
            let outcomes = self
                .targets
                .iter()
                .filter_map(|entry| entry.outcome.as_ref());
            outcomes.filter(|outcome| wanted(outcome)).count()
        };
        (
            count(|outcome| matches!(outcome, Outcome::Found(_))),
            count(|outcome| matches!(outcome, Outcome::Missed(_))),
        )
    }

    /// The list's entry of this name: the one being dialled if it bears it, else the first.
    pub(super) fn index_of(&self, name: &str) -> Option<usize> {
        let bears = |entry: &NightTarget| entry.target.name == name;
        match self.current {
            Some(index) if self.targets.get(index).is_some_and(bears) => Some(index),
            _ => self.targets.iter().position(bears),
        }
    }
}

impl NightTarget {
    /// An object nothing has become of yet.
    #[must_use]
    pub const fn new(target: ListedTarget) -> Self {
        Self {
            target,
            outcome: None,
            notes: Vec::new(),
        }
    }

    /// An object known by its name alone: the line that gave its place was lost.
    pub(super) fn named(name: &str) -> Self {
        Self::new(ListedTarget::unknown(name, ""))
    }
}
