//! An improbable reading: what may have happened, the likeliest first, each with the correction it asks for.
//!
//! [`Questioned::suspicion`] holds one new reading against the readings before; [`suspicions`] looks over a whole set of
//! readings, of which any may be the wrong one. Nothing is taken or dropped here: the observer chooses.

mod account;
mod change;
mod circles;
mod earlier;
mod explanation;
mod rows;
mod stars;
mod weights;
mod words;

use crate::angle::Angle;
use crate::catalog::Target;
use crate::dial::Sighting;
use crate::estimate::{Estimate, Held, Sight, Slipped};
use crate::metal::{Mount, Scale};
use crate::sky::Moment;

pub use earlier::Earlier;
pub use explanation::{Circle, Correction, Explanation, Kind, Suspicion};
pub use rows::{Suspected, suspicions};

use account::Account;
use weights::{SOUND, UNEXPLAINED};

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

/// All accounts of a reading, weighed: natural logarithms of prior times density.
#[derive(Clone, Debug)]
struct Weighed {
    held: Held,
    sound_ln: f64,
    unexplained_ln: f64,
    accounts: Vec<(Account, Held, f64)>,
}

impl Questioned<'_> {
    /// What there is to say against a reading after those before it, if it is suspicious. Nothing too for a place nearer
    /// the pole of the mount than the tube can come.
    #[must_use]
    pub fn suspicion(&self, earlier: &Earlier<'_>) -> Option<Suspicion> {
        self.suspicion_against(&self.estimate(earlier))
    }

    /// The same against an estimate, which must not rest on the reading.
    #[must_use]
    pub fn suspicion_against(&self, estimate: &Estimate) -> Option<Suspicion> {
        self.held(estimate)
            .filter(Held::is_suspicious)
            .and_then(|_| self.weighed(estimate))
            .map(|weighed| weighed.suspicion(self))
    }

    /// The estimate of the readings before, by the meaning of theirs that goes best with this one.
    fn estimate(&self, earlier: &Earlier<'_>) -> Estimate {
        let latitude = self.moment.observer().latitude;
        let sights: Vec<Sight> = earlier
            .sights
            .iter()
            .map(|sight| self.with_rounding(sight.clone(), false))
            .collect();
        let earlier = Earlier {
            sights: &sights,
            ..*earlier
        };
        earlier.estimate(latitude, &self.sight(), |estimate| self.held(estimate))
    }

    /// The reading held against an estimate that does not rest on it.
    fn held(&self, estimate: &Estimate) -> Option<Held> {
        self.hold(estimate, &self.sight(), Slipped::default())
    }

    fn hold(&self, estimate: &Estimate, sight: &Sight, slipped: Slipped) -> Option<Held> {
        let latitude = self.moment.observer().latitude;
        estimate.hold(latitude, sight, slipped).ok().flatten()
    }

    /// What the reading says as it was given.
    fn sight(&self) -> Sight {
        self.sight_of(self.sighting, self.moment, self.target)
    }

    /// What a reading would have said of that star at that moment: as uncertain as the look and the rounding to what the
    /// eye can set make it.
    fn sight_of(&self, sighting: &Sighting, moment: &Moment, target: &Target) -> Sight {
        let sight = sighting.sight(self.mount, moment, &target.source);
        self.with_rounding(sight, sighting.timed)
    }

    /// A sight as uncertain as the looks and the rounding make it; a timed hour is not rounded.
    fn with_rounding(&self, mut sight: Sight, timed: bool) -> Sight {
        let (hour, dec) = (&self.mount.hour_circle, &self.mount.declination_circle);
        // an error the mount file states is that of the number as written down
        if !timed && hour.reading_error.is_none() {
            sight.sigma_hour = with_rounding(sight.sigma_hour, &hour.scale());
        }
        if dec.reading_error.is_none() {
            sight.sigma_dec = with_rounding(sight.sigma_dec, &dec.scale());
        }
        sight
    }

    /// Weighs every account of the reading.
    fn weighed(&self, estimate: &Estimate) -> Option<Weighed> {
        let sight = self.sight();
        let held = self.hold(estimate, &sight, Slipped::default())?;
        let blunders = [(true, false), (false, true)].map(|(hour, dec)| {
            let slipped = Slipped { hour, dec };
            let density = self.hold(estimate, &sight, slipped);
            density.map_or(f64::NEG_INFINITY, |held| held.ln_density)
        });
        let accounts = account::all(self, &sight)
            .into_iter()
            .filter_map(|account| {
                let held = self.hold(estimate, &account.sight, account.slipped())?;
                let ln = account.prior.ln() + held.ln_density;
                Some((account, held, ln))
            })
            .collect();
        Some(Weighed {
            held,
            sound_ln: SOUND.ln() + held.ln_density,
            unexplained_ln: UNEXPLAINED.ln() + crate::estimate::ln_sum(&blunders),
            accounts,
        })
    }
}

/// The error of a look at a circle whose reading is rounded to what the eye can set: a number rounded to a step is off
/// by the step over the root of twelve, 1 sigma.
fn with_rounding(sigma: Angle, scale: &Scale) -> Angle {
    let rounding = scale.settable_step().radians() / 12.0_f64.sqrt();
    Angle::from_radians(sigma.radians().hypot(rounding))
}
