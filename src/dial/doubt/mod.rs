//! An improbable reading: what may have happened, the likeliest first, each with the correction it asks for.
//!
//! [`Questioned::suspicion`] holds one new reading against the readings before; [`suspicions`] looks over a whole set of
//! readings, of which any may be the wrong one. Nothing is taken or dropped here: the observer chooses.

mod account;
mod case;
mod change;
mod circles;
mod earlier;
#[cfg(test)]
mod engravings;
mod explanation;
mod rows;
mod stars;
mod weights;
mod words;

use crate::angle::Angle;
use crate::catalog::Target;
use crate::dial::Sighting;
use crate::estimate::{Estimate, Sight};
use crate::metal::{Mount, Scale};
use crate::sky::Moment;

pub use earlier::Earlier;
pub use explanation::{Circle, Correction, Explanation, Kind, Suspicion};
pub use rows::{Suspected, suspicions};

use case::Case;

/// What is known of the circumstances of a reading beside the reading itself.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Circumstances {
    /// Readings before this one were taken by the same clock and agree with it.
    pub clock_agreed: bool,
    /// The clock was found to have leapt forward by so many seconds (negative: back) since the last reading.
    pub clock_leapt_s: Option<f64>,
}

/// A reading with all that is asked to say how it may be wrong.
#[derive(Clone, Copy, Debug)]
pub struct Questioned<'a> {
    /// The mount.
    pub mount: &'a Mount,
    /// When the star was centred, by the observer's clock.
    pub moment: &'a Moment,
    /// The star the observer says it was.
    pub target: &'a Target,
    /// What was read.
    pub sighting: &'a Sighting,
    /// The stars the observer may have gone to instead: those bright enough to be taken for the one meant, in any order.
    pub stars: &'a [Target],
    /// What else is known.
    pub circumstances: Circumstances,
}

impl Questioned<'_> {
    /// What there is to say against a reading after those before it, if it is suspicious. Nothing too for a place nearer
    /// the pole of the mount than the tube can come.
    #[must_use]
    pub fn suspicion(&self, earlier: &Earlier<'_>) -> Option<Suspicion> {
        let sights: Vec<Sight> = earlier
            .sights
            .iter()
            .map(|sight| self.with_rounding(sight.clone(), false))
            .collect();
        let case = Case::new(*self);
        let estimate = case.estimate(&Earlier {
            sights: &sights,
            ..*earlier
        });
        case.suspicion(&estimate)
    }

    /// The same against an estimate, which must not rest on the reading.
    #[must_use]
    pub fn suspicion_against(&self, estimate: &Estimate) -> Option<Suspicion> {
        Case::new(*self).suspicion(estimate)
    }

    /// What a reading would have said of that star at that moment: as uncertain as the look and the rounding to what the
    /// eye can set make it.
    fn sight_of(&self, sighting: &Sighting, moment: &Moment, target: &Target) -> Sight {
        let sight = sighting.sight(self.mount, moment, &target.source);
        self.with_rounding(sight, sighting.timed)
    }

    /// A sight as uncertain as the looks and the rounding make it; a timed hour is not rounded, and an error the mount
    /// file states is that of the number as written down.
    fn with_rounding(&self, mut sight: Sight, timed: bool) -> Sight {
        let (hour, dec) = (&self.mount.hour_circle, &self.mount.declination_circle);
        if !timed && hour.reading_error.is_none() {
            sight.sigma_hour = with_rounding(sight.sigma_hour, &hour.scale());
        }
        if dec.reading_error.is_none() {
            sight.sigma_dec = with_rounding(sight.sigma_dec, &dec.scale());
        }
        sight
    }
}

/// The error of a look at a circle whose reading is rounded to what the eye can set: a number rounded to a step is off
/// by the step over the root of twelve, 1 sigma.
fn with_rounding(sigma: Angle, scale: &Scale) -> Angle {
    let rounding = scale.settable_step().radians() / 12.0_f64.sqrt();
    Angle::from_radians(sigma.radians().hypot(rounding))
}
