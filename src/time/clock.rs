//! The clock: the machine's own, or one set by hand that starts at a given instant and runs on,
//! each with the observer's correction.
//!
//! Only the outermost rooms hold a clock; all others are handed instants.

use std::time::Instant;

use crate::time::instant::{InstantFault, Utc};

/// A running clock. True UTC = what it shows + the correction.
#[derive(Clone, Copy, Debug)]
pub struct Clock {
    /// The instant shown at `since`, if the clock was set by hand.
    set: Option<(Utc, Instant)>,
    correction_s: f64,
}

impl Clock {
    /// The machine's clock, uncorrected.
    #[must_use]
    pub const fn of_the_machine() -> Self {
        Self {
            set: None,
            correction_s: 0.0,
        }
    }

    /// A clock that shows `utc` now and runs on from there.
    #[must_use]
    pub fn starting_at(utc: Utc) -> Self {
        Self {
            set: Some((utc, Instant::now())),
            correction_s: 0.0,
        }
    }

    /// The same clock with the observer's correction, in seconds, positive if the clock is slow.
    #[must_use]
    pub const fn corrected_by(self, seconds: f64) -> Self {
        Self {
            correction_s: seconds,
            ..self
        }
    }

    /// The correction in force, in seconds, positive if the clock is slow.
    #[must_use]
    pub const fn correction_s(&self) -> f64 {
        self.correction_s
    }

    /// What the clock shows, before the correction. Fails if the machine's clock is set outside
    /// the years of [`Utc`].
    pub fn uncorrected(&self) -> Result<Utc, InstantFault> {
        match self.set {
            Some((utc, since)) => Ok(utc.plus_seconds(since.elapsed().as_secs_f64())),
            None => Utc::new(chrono::Utc::now()),
        }
    }

    /// The instant now, corrected.
    pub fn now(&self) -> Result<Utc, InstantFault> {
        Ok(self.uncorrected()?.plus_seconds(self.correction_s))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_slow_clock_is_corrected_forward() {
        let start = Utc::parse("2026-12-01T21:30:00Z").unwrap();
        let clock = Clock::starting_at(start).corrected_by(42.0);
        let shown = clock.now().unwrap().seconds_since(start);
        assert!((42.0..52.0).contains(&shown), "{shown}");
    }
}
