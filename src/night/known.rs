//! What is known of the mount as a night stands: the estimate from every star in use.
//!
//! A ring set anew, or knocked, makes its index free again; an axis turned by its adjusters makes the
//! axis unsure again. What the stars before told of all the other errors is kept each time.

use crate::angle::{Angle, Latitude};
use crate::estimate::{Estimate, Fit, Prior, Sight, fit};
use crate::metal::{ExpectedErrors, MountErrors, errors};
use crate::night::state::{State, Zeros};
use crate::time::Utc;

/// As free as an index nothing is known of.
const FREE: Angle = Angle::from_degrees(60.0);

/// What was believed before any star of the night.
#[derive(Clone, Copy, Debug)]
pub struct Grounds<'g> {
    /// The site's latitude.
    pub latitude: Latitude,
    /// What the mount file expects.
    pub expected: &'g ExpectedErrors,
    /// What was believed of the mount's errors.
    pub prior: &'g Prior,
    /// Stars read before the night, from a file of readings.
    pub sights: &'g [Sight],
    /// When the last of them was read.
    pub read_at: Option<Utc>,
}

/// What is known of the mount.
#[derive(Clone, Debug, PartialEq)]
pub struct Known {
    /// Its errors.
    pub estimate: Estimate,
    /// The fit they came of: of the sights since a ring was last set or the axis adjusted.
    pub fit: Fit,
    /// What was believed before those sights.
    pub prior: Prior,
    /// Those sights, those read before the night first.
    pub sights: Vec<Sight>,
    /// When the last star was read.
    pub read_at: Option<Utc>,
}

impl Known {
    /// From every star in use.
    ///
    /// Where the observer starts from an earlier night, that stands in place of what the mount file
    /// expects.
    #[must_use]
    pub fn of(grounds: &Grounds<'_>, state: &State) -> Self {
        let latitude = grounds.latitude;
        let earlier = state.started_from.as_ref();
        let earlier = earlier.and_then(|started| started.prior(grounds.expected));
        let mut prior = earlier.unwrap_or_else(|| grounds.prior.clone());
        let mut sights = grounds.sights.to_vec();
        let mut read_at = grounds.read_at;
        let mut zeros = Zeros::default();
        let mut turn_over = |to: Zeros, sights: &mut Vec<Sight>, read_at: &mut Option<Utc>| {
            if to != zeros {
                let before = Estimate::from(&fit(latitude, &prior, sights));
                let unsure = made_unsure(zeros, to, grounds.expected);
                prior = Prior::from_estimate(&before, unsure);
                sights.clear();
                if zeros.hour != to.hour || zeros.dec != to.dec {
                    *read_at = None;
                }
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
            prior,
            sights,
            read_at,
        }
    }
}

/// By how much each error may have changed where the zeros went from one count to another.
fn made_unsure(from: Zeros, to: Zeros, expected: &ExpectedErrors) -> [Angle; errors::COUNT] {
    let where_changed = |changed: bool, by: Angle| if changed { by } else { Angle::ZERO };
    let axis = from.axis != to.axis;
    MountErrors {
        hour_index: where_changed(from.hour != to.hour, FREE),
        dec_index: where_changed(from.dec != to.dec, FREE),
        polar_high: where_changed(axis, expected.polar_high),
        polar_east: where_changed(axis, expected.polar_east),
        ..MountErrors::default()
    }
    .to_array()
}
