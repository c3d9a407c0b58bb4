//! What an earlier night taught of the mount, as the start of another night.
//!
//! A mount of long standing changes little from night to night; one that is carried keeps only what is
//! built into it. Which of the two it was, the observer says. Angles in minutes of arc.

use serde::{Deserialize, Serialize};

use crate::angle::Angle;
use crate::estimate::{Covariance, Estimate, Prior};
use crate::metal::errors::{ALWAYS, COUNT};
use crate::metal::{ExpectedErrors, Mount, MountErrors, Ring};

/// How far each error of a mount that stood still may have moved since, 1 sigma: clamps, bolts and
/// piers give by some minutes of arc, the tube's fittings by less (common practice, no source).
const STOOD_STILL: MountErrors = MountErrors {
    hour_index: Angle::from_arcminutes(5.0),
    dec_index: Angle::from_arcminutes(5.0),
    polar_high: Angle::from_arcminutes(3.0),
    polar_east: Angle::from_arcminutes(3.0),
    cone: Angle::from_arcminutes(2.0),
    skew: Angle::from_arcminutes(1.0),
    sag: Angle::from_arcminutes(0.5),
    // an engraving stays where it is
    hour_eccentric_sine: Angle::ZERO,
    hour_eccentric_cosine: Angle::ZERO,
    dec_eccentric_sine: Angle::ZERO,
    dec_eccentric_cosine: Angle::ZERO,
};

/// What an earlier night taught of the mount.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct EarlierNight {
    /// The civil date of its evening.
    pub night: String,
    /// How many stars it rests on.
    pub stars: usize,
    /// The likeliest errors, in the order of [`crate::metal::errors::NAMES`].
    pub errors_arcmin: Vec<f64>,
    /// Their covariance in the same order, in square minutes of arc.
    pub covariance_arcmin2: Vec<Vec<f64>>,
}

/// An earlier night a night starts from.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct StartedFrom {
    /// What it taught.
    pub earlier: EarlierNight,
    /// The mount has been moved since: where its axis points, and its indexes, are unknown again.
    pub moved: bool,
    /// The hour circle's zero is set by hand or with the clock drive, anew each night.
    #[serde(default)]
    pub hour_index_free: bool,
    /// The declination circle's zero is set by hand, anew each night.
    #[serde(default)]
    pub dec_index_free: bool,
}

impl EarlierNight {
    /// What an estimate knows at the end of the night of that evening.
    #[must_use]
    pub fn of(night: &str, estimate: &Estimate) -> Self {
        let minutes = |radians: f64| Angle::from_radians(radians).arcminutes();
        Self {
            night: night.to_owned(),
            stars: estimate.sights_used(),
            errors_arcmin: estimate.errors().to_array().map(Angle::arcminutes).to_vec(),
            covariance_arcmin2: estimate
                .covariance()
                .row_iter()
                .map(|row| row.iter().map(|&square| minutes(minutes(square))).collect())
                .collect(),
        }
    }
}

impl StartedFrom {
    /// That night taken as the start of another with this mount.
    #[must_use]
    pub fn new(earlier: EarlierNight, moved: bool, mount: &Mount) -> Self {
        Self {
            earlier,
            moved,
            hour_index_free: mount.hour_circle.ring != Ring::Fixed,
            dec_index_free: mount.declination_circle.slips,
        }
    }

    /// The belief it makes: what it taught, widened by what may have changed since, and as the mount
    /// file has it where it says nothing any more. Nothing if the record of it is not whole.
    #[must_use]
    pub fn prior(&self, expected: &ExpectedErrors) -> Option<Prior> {
        let unread = Prior::from_expected(expected);
        let mut errors = unread.mean().to_array();
        // a record by a program that knew fewer errors leaves the others to the mount file
        let mut covariance = *unread.covariance();
        for (place, &minutes) in self.earlier.errors_arcmin.iter().enumerate() {
            *errors.get_mut(place)? = Angle::from_arcminutes(minutes);
        }
        let minute = Angle::from_arcminutes(1.0).radians();
        for (row, squares) in self.earlier.covariance_arcmin2.iter().enumerate() {
            for (column, square) in squares.iter().enumerate() {
                *covariance.get_mut((row, column))? = square * minute * minute;
            }
        }
        // an eccentricity the record did not look for, or the mount file no longer does, is as the mount file has it
        let looked_for = |place: usize, covariance: &Covariance| covariance[(place, place)] > 0.0;
        let eccentric: Vec<usize> = (ALWAYS..COUNT)
            .filter(|&place| {
                !looked_for(place, &covariance) || !looked_for(place, unread.covariance())
            })
            .collect();
        for place in self.forgotten().chain(eccentric) {
            covariance.row_mut(place).fill(0.0);
            covariance.column_mut(place).fill(0.0);
            covariance[(place, place)] = unread.covariance()[(place, place)];
            errors[place] = Angle::ZERO;
        }
        let mut numbers = errors.iter().map(|error| error.radians());
        let whole = numbers.all(f64::is_finite) && covariance.iter().all(|x| x.is_finite());
        let errors = MountErrors::from_array(errors);
        let estimate = whole.then(|| Estimate::new(errors, covariance))?;
        Some(Prior::from_estimate(&estimate, STOOD_STILL.to_array()))
    }

    /// The errors of which it says nothing any more, by their places in [`crate::metal::errors::NAMES`].
    fn forgotten(&self) -> impl Iterator<Item = usize> {
        let hour_index = self.moved || self.hour_index_free;
        let dec_index = self.moved || self.dec_index_free;
        [
            (0, hour_index),
            (1, dec_index),
            (2, self.moved),
            (3, self.moved),
            // a ring turned on its seat
            (ALWAYS, self.hour_index_free),
            (ALWAYS + 1, self.hour_index_free),
            (ALWAYS + 2, self.dec_index_free),
            (ALWAYS + 3, self.dec_index_free),
        ]
        .into_iter()
        .filter_map(|(place, forgotten)| forgotten.then_some(place))
    }

    /// How it was taken, in words: "as it stood", "moved since".
    #[must_use]
    pub const fn words(&self) -> &'static str {
        if self.moved {
            "moved since"
        } else {
            "as it stood"
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Through minutes of arc and back, in radians.
    const ROUNDING: f64 = 1e-12;

    fn taught() -> Estimate {
        let sigmas = [2.0, 2.0, 1.0, 3.0, 2.0, 3.0, 1.5].map(Angle::from_arcminutes);
        let mut covariance = Covariance::zeros();
        for (place, sigma) in sigmas.into_iter().enumerate() {
            covariance[(place, place)] = sigma.radians() * sigma.radians();
        }
        covariance[(1, 4)] = -0.9 * covariance[(1, 1)];
        covariance[(4, 1)] = covariance[(1, 4)];
        let errors = [200.0, -90.0, 14.0, -22.0, 8.0, -5.0, 2.0].map(Angle::from_arcminutes);
        Estimate::new(MountErrors::with_centred_circles(errors), covariance)
    }

    fn started(moved: bool, hour_index_free: bool) -> StartedFrom {
        StartedFrom {
            earlier: EarlierNight::of("2026-11-30", &taught()),
            moved,
            hour_index_free,
            dec_index_free: false,
        }
    }

    #[test]
    fn a_mount_that_stood_still_is_known_but_for_the_allowance() {
        let expected = ExpectedErrors::default();
        let text = serde_json::to_string(&started(false, false)).unwrap();
        let read: StartedFrom = serde_json::from_str(&text).unwrap();
        let prior = read.prior(&expected).unwrap();
        let allowance = STOOD_STILL.to_array();
        for (place, error) in taught().errors().to_array().into_iter().enumerate() {
            let found = prior.mean().to_array()[place];
            assert!((found - error).abs().radians() < ROUNDING, "{place}");
            let was = taught().covariance()[(place, place)];
            let wider = allowance[place].radians();
            let is = prior.covariance()[(place, place)];
            assert!((is - was - wider * wider).abs() < ROUNDING, "{place}");
        }
        let kept = taught().covariance()[(1, 4)];
        assert!((prior.covariance()[(1, 4)] - kept).abs() < ROUNDING);
        assert!(Estimate::from_prior(&prior).is_calibrated());
    }

    #[test]
    fn a_mount_that_was_moved_keeps_what_is_built_into_it() {
        let expected = ExpectedErrors::default();
        let unread = Prior::from_expected(&expected);
        let prior = started(true, false).prior(&expected).unwrap();
        for place in 0..4 {
            assert!(prior.mean().to_array()[place].abs().radians() < ROUNDING);
            let ratio = prior.covariance()[(place, place)] / unread.covariance()[(place, place)];
            // the allowance comes on top
            assert!((1.0..1.01).contains(&ratio), "{place}: {ratio}");
        }
        assert!((prior.mean().cone.arcminutes() - 8.0).abs() < 1e-9);
        assert!(!Estimate::from_prior(&prior).is_calibrated());
    }

    #[test]
    fn a_ring_set_by_hand_each_night_starts_free() {
        let prior = started(false, true).prior(&ExpectedErrors::default());
        let estimate = Estimate::from_prior(&prior.unwrap());
        assert!(!estimate.is_calibrated());
        assert!((estimate.errors().dec_index.arcminutes() + 90.0).abs() < 1e-9);
    }

    #[test]
    fn an_eccentricity_is_kept_where_both_the_record_and_the_mount_file_look_for_it() {
        let asked = ExpectedErrors {
            hour_eccentric: Angle::from_arcminutes(5.0),
            ..ExpectedErrors::default()
        };
        let sigma = |prior: &Prior, place: usize| {
            Angle::from_radians(prior.covariance()[(place, place)].sqrt()).arcminutes()
        };
        // never looked for: as the mount file has it
        let prior = started(false, false).prior(&asked).unwrap();
        assert!((sigma(&prior, ALWAYS) - 5.0).abs() < 1e-9);
        let mut found = started(false, false);
        found.earlier.errors_arcmin[ALWAYS] = 4.0;
        found.earlier.covariance_arcmin2[ALWAYS][ALWAYS] = 0.25;
        let prior = found.prior(&asked).unwrap();
        let kept = prior.mean().hour_eccentric_sine;
        assert!(
            (kept.arcminutes() - 4.0).abs() < 1e-9 && (sigma(&prior, ALWAYS) - 0.5).abs() < 1e-9
        );
        // no longer looked for
        let prior = found.prior(&ExpectedErrors::default()).unwrap();
        assert!(prior.mean().hour_eccentric_sine.abs().radians() < ROUNDING);
        assert!(sigma(&prior, ALWAYS) < 1e-9);
        // a ring turned on its seat since
        found.hour_index_free = true;
        let prior = found.prior(&asked).unwrap();
        assert!((sigma(&prior, ALWAYS) - 5.0).abs() < 1e-9);
    }

    #[test]
    fn a_record_that_is_not_whole_is_no_start() {
        let mut broken = started(false, false);
        broken.earlier.errors_arcmin.extend([0.0; 9]);
        assert_eq!(broken.prior(&ExpectedErrors::default()), None);
        let mut broken = started(false, false);
        broken.earlier.covariance_arcmin2[0][0] = f64::NAN;
        assert_eq!(broken.prior(&ExpectedErrors::default()), None);
    }
}
