//! What is known of the mount as the night stands: the estimate from every star in use.

use crate::angle::{Angle, AxisAngle, Declination, HourAngle};
use crate::estimate::{Estimate, Fit, Sight, fit};
use crate::night::{NightReading, StarReading, State};
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
        sights.extend(state.readings_in_use().map(|read| sight(&read.reading)));
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

/// A recorded reading as the estimate takes it: with everything the circles can mean by it, so that
/// what was ambiguous then is settled by all the stars together.
fn sight(reading: &StarReading) -> Sight {
    let axes = |degrees: &[f64]| {
        degrees
            .iter()
            .copied()
            .map(AxisAngle::from_degrees)
            .collect()
    };
    Sight {
        hour_angle: HourAngle::from_degrees(reading.hour_angle_deg),
        declination: Declination::from_degrees(reading.declination_deg),
        side: reading.side,
        hour: axes(&reading.hour_candidates_deg),
        dec: axes(&reading.dec_candidates_deg),
        sigma_hour: Angle::from_degrees(reading.hour_sigma_deg),
        sigma_dec: Angle::from_degrees(reading.dec_sigma_deg),
    }
}
