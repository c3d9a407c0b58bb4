//! What is known of the mount as the night stands: the estimate from every star in use.

use crate::estimate::{Estimate, Fit, Sight, fit};
use crate::night::{NightReading, State};
use crate::screen::observatory::Observatory;
use crate::time::Utc;

/// What is known of the mount.
#[derive(Clone, Debug, PartialEq)]
pub struct Known {
    /// Its errors.
    pub estimate: Estimate,
    /// The fit they came of.
    pub fit: Fit,
    /// When the last star was read.
    pub read_at: Option<Utc>,
}

impl Known {
    /// From every star in use: those of the night under the zeros in force, and, as long as no ring
    /// has been set anew, those read before it.
    #[must_use]
    pub fn of(observatory: &Observatory, state: &State) -> Self {
        let zeros_untouched = state.zeros == crate::night::Zeros::default();
        let earlier: &[Sight] = if zeros_untouched {
            &observatory.earlier_sights
        } else {
            &[]
        };
        let mut sights = earlier.to_vec();
        sights.extend(state.readings_in_use().map(|read| read.reading.sight()));
        let last: Option<&NightReading> = state.readings_in_use().last();
        let fit = fit(observatory.observer.latitude, &observatory.prior, &sights);
        Self {
            estimate: Estimate::from(&fit),
            fit,
            read_at: last.map(|read| read.utc).or(if zeros_untouched {
                observatory.earlier_read_at
            } else {
                None
            }),
        }
    }
}
