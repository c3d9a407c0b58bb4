//! What is known of the mount as the night stands: the estimate from every star in use.

use crate::angle::Angle;
use crate::estimate::{Estimate, Fit, Prior, Sight, fit};
use crate::metal::{MountErrors, errors};
use crate::night::{State, Zeros};
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
    /// From every star in use, those read before the night first.
    ///
    /// A ring set anew, or knocked, makes its index free again; what the stars before told of all the
    /// other errors is kept.
    #[must_use]
    pub fn of(observatory: &Observatory, state: &State) -> Self {
        let latitude = observatory.observer.latitude;
        let mut prior = observatory.prior.clone();
        let mut sights = observatory.earlier_sights.clone();
        let mut read_at = observatory.earlier_read_at;
        let mut zeros = Zeros::default();
        let mut turn_over = |to: Zeros, sights: &mut Vec<Sight>, read_at: &mut Option<Utc>| {
            if to != zeros {
                let before = Estimate::from(&fit(latitude, &prior, sights));
                prior = Prior::from_estimate(&before, freed(zeros, to));
                sights.clear();
                *read_at = None;
                zeros = to;
            }
        };
        for read in state.readings.iter().filter(|read| read.reading.used) {
            turn_over(read.zeros, &mut sights, &mut read_at);
            sights.push(read.reading.sight());
            read_at = Some(read.utc);
        }
        turn_over(state.zeros, &mut sights, &mut read_at);
        let fit = fit(latitude, &prior, &sights);
        Self {
            estimate: Estimate::from(&fit),
            fit,
            read_at,
        }
    }
}

/// By how much each error may have changed where the zeros went from one count to another.
fn freed(from: Zeros, to: Zeros) -> [Angle; errors::COUNT] {
    /// As free as an index nothing is known of.
    const FREE: Angle = Angle::from_degrees(60.0);
    let free = |changed: bool| if changed { FREE } else { Angle::ZERO };
    MountErrors {
        hour_index: free(from.hour != to.hour),
        dec_index: free(from.dec != to.dec),
        ..MountErrors::default()
    }
    .to_array()
}
