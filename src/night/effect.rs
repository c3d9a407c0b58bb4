//! What an event asks of the world, as data: the loop that owns screen and clock carries it out.

use std::fmt;

use crate::night::event::{Event, Stamped};
use crate::night::state::State;

/// Something to be done because of an event.
#[derive(Clone, Debug, PartialEq)]
pub enum Effect {
    /// The estimate of the mount's errors is out of date: readings or zeros have changed.
    Refit,
    /// The clock's correction to put in force, in seconds, positive if the clock is slow.
    CorrectClock(f64),
    /// Words for the observer.
    Say(Said),
    /// The session is over.
    Quit,
}

/// Words for the observer.
#[derive(Clone, Debug, PartialEq)]
pub enum Said {
    /// An act was taken back.
    TakenBack {
        /// The act's word in the log.
        act: &'static str,
        /// What it was about.
        about: Option<String>,
    },
    /// The session goes on with a clock correction made earlier.
    ClockStillCorrected {
        /// In seconds, positive if the clock is slow.
        seconds: f64,
    },
    /// The clock has jumped.
    ClockJumped {
        /// In seconds, positive if forward.
        seconds: f64,
    },
    /// A ring was set: the readings before no longer count.
    ReadingsLeftBehind {
        /// How many.
        count: usize,
    },
}

impl fmt::Display for Said {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::TakenBack {
                act,
                about: Some(about),
            } => write!(f, "taken back: {act}, {about}"),
            Self::TakenBack { act, about: None } => write!(f, "taken back: {act}"),
            Self::ClockStillCorrected { seconds } => write!(
                f,
                "the clock is still corrected by {seconds:+.1} s: check it, if the machine has set itself since"
            ),
            Self::ClockJumped { seconds } => write!(
                f,
                "the machine's clock has jumped by {seconds:+.1} s, or the machine slept: check the time"
            ),
            Self::ReadingsLeftBehind { count: 1 } => {
                f.write_str("ring set: the reading before it no longer counts")
            }
            Self::ReadingsLeftBehind { count } => {
                write!(
                    f,
                    "ring set: the {count} readings before it no longer count"
                )
            }
        }
    }
}

/// What follows from an event that led from one state to the next; `taken_back` is the event an
/// undoing has undone.
pub(super) fn of(
    before: &State,
    after: &State,
    stamped: &Stamped,
    taken_back: Option<&Stamped>,
) -> Vec<Effect> {
    let mut effects = Vec::new();
    let grounds_changed = before.started_from != after.started_from;
    if before.readings != after.readings || before.zeros != after.zeros || grounds_changed {
        effects.push(Effect::Refit);
    }
    let resumed = stamped.event == Event::SessionResumed;
    let corrected = after.clock_correction_s;
    let still_corrected = resumed && corrected.abs() > 0.0;
    if (before.clock_correction_s - corrected).abs() > 0.0 || still_corrected {
        effects.push(Effect::CorrectClock(corrected));
    }
    if still_corrected {
        effects.push(Effect::Say(Said::ClockStillCorrected {
            seconds: corrected,
        }));
    }
    match &stamped.event {
        Event::ClockJumped { seconds } => {
            effects.push(Effect::Say(Said::ClockJumped { seconds: *seconds }));
        }
        Event::RingSet { .. } => {
            let count = before.readings_in_use().count();
            if count > 0 {
                effects.push(Effect::Say(Said::ReadingsLeftBehind { count }));
            }
        }
        Event::SessionClosed => effects.push(Effect::Quit),
        _ => {}
    }
    if let Some(Stamped { event, .. }) = taken_back {
        effects.push(Effect::Say(Said::TakenBack {
            act: event.word(),
            about: event.about().map(str::to_owned),
        }));
    }
    effects
}
