//! A star centred in the eyepiece and both circles read: what it says of the mount.

use crate::angle::{Angle, AxisAngle};
use crate::dial::tube::TubePlace;
use crate::estimate::{Estimate, Sight, nearest};
use crate::metal::{Axes, Mount, OppositeVerniers, Reading, Side, TooNearPole};
use crate::sky::{Moment, Observed, Source};

/// Both circles as read with a star in the middle of the field.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sighting {
    /// The side of the pier the tube was on.
    pub side: Side,
    /// The number under the hour circle's index.
    pub hour: Reading,
    /// The number under the declination circle's index.
    pub dec: Reading,
    /// The number under the hour circle's opposite vernier, if it was read: the mean of the two is
    /// free of the circle's eccentricity.
    pub hour_opposite: Option<Reading>,
    /// The number under the declination circle's opposite vernier, if it was read.
    pub dec_opposite: Option<Reading>,
    /// The star was timed across the middle with the hour circle standing exactly on a mark.
    pub timed: bool,
}

/// What a sighting means, and how far it is from what was expected.
#[derive(Clone, Debug, PartialEq)]
pub struct Understood {
    /// What it tells the estimate.
    pub sight: Sight,
    /// The shown axis angles it most likely stands for.
    pub shown: Axes,
    /// Hour axis angle shown less expected.
    pub hour_off: Angle,
    /// Declination axis angle shown less expected.
    pub dec_off: Angle,
}

impl Sighting {
    /// What the sighting of a source at a moment tells the estimate. The moment is that at which the
    /// star was centred.
    #[must_use]
    pub fn sight(&self, mount: &Mount, moment: &Moment, source: &Source) -> Sight {
        let Observed {
            hour_angle,
            declination,
            ..
        } = moment.observed(&moment.apparent(source));
        let (hour, dec) = (&mount.hour_circle, &mount.declination_circle);
        let hour_candidates =
            |reading| hour.candidates(reading, moment.apparent_sidereal(), self.side);
        let sigma_hour = if self.timed {
            hour.timed_error()
        } else {
            hour.look_error()
        };
        let (hour, sigma_hour) = with_opposite(
            hour_candidates(self.hour),
            self.hour_opposite.map(hour_candidates),
            sigma_hour,
        );
        let dec_candidates = |reading| dec.candidates(reading);
        let (dec, sigma_dec) = with_opposite(
            dec_candidates(self.dec),
            self.dec_opposite.map(dec_candidates),
            dec.look_error(),
        );
        Sight {
            hour_angle,
            declination,
            side: self.side,
            hour,
            dec,
            sigma_hour,
            sigma_dec,
            opposite: OppositeVerniers {
                hour: self.hour_opposite.is_some(),
                dec: self.dec_opposite.is_some(),
            },
        }
    }

    /// The same, held against what the estimate expected.
    pub fn understand(
        &self,
        mount: &Mount,
        moment: &Moment,
        source: &Source,
        estimate: &Estimate,
    ) -> Result<Understood, TooNearPole> {
        let sight = self.sight(mount, moment, source);
        let latitude = moment.observer().latitude;
        let expected = estimate.predict_sight(latitude, &sight)?.axes;
        // a circle that was read has at least one candidate
        let meant =
            |candidates: &[AxisAngle], expected| nearest(candidates, expected).unwrap_or(expected);
        let hour = meant(&sight.hour, expected.hour);
        let dec = meant(&sight.dec, expected.dec);
        Ok(Understood {
            sight,
            shown: Axes { hour, dec },
            hour_off: (hour.angle() - expected.hour.angle()).wrapped_signed(),
            dec_off: (dec.angle() - expected.dec.angle()).wrapped_signed(),
        })
    }
}

impl Understood {
    /// Where the tube was at the sighting.
    #[must_use]
    pub const fn tube(&self, moment: &Moment) -> TubePlace {
        TubePlace {
            axes: self.shown,
            utc: moment.utc(),
            side: self.sight.side,
        }
    }
}

/// What a circle can mean with its opposite vernier read too: each candidate is the mean of the two
/// verniers, and the error of a look is shared between two.
fn with_opposite(
    candidates: Vec<AxisAngle>,
    opposite: Option<Vec<AxisAngle>>,
    sigma: Angle,
) -> (Vec<AxisAngle>, Angle) {
    let Some(opposite) = opposite else {
        return (candidates, sigma);
    };
    let mean = |shown: AxisAngle| {
        let across: Vec<AxisAngle> = opposite
            .iter()
            .map(|other| AxisAngle::new(other.angle() + Angle::HALF_TURN))
            .collect();
        let other = nearest(&across, shown).unwrap_or(shown);
        let off = (other.angle() - shown.angle()).wrapped_signed();
        AxisAngle::new(shown.angle() + off / 2.0)
    };
    (
        candidates.into_iter().map(mean).collect(),
        sigma * std::f64::consts::FRAC_1_SQRT_2,
    )
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::dial::trial::{Trial, moment, target};
    use crate::dial::{Setup, dial};
    use crate::metal::SideRequest;

    #[test]
    fn two_opposite_verniers_are_free_of_eccentricity() {
        let trial = Trial::new();
        let (now, vega) = (moment("2026-12-01T21:30:00Z"), target("Vega"));
        let setup = Setup {
            side: SideRequest::Only(Side::TubeEast),
            ..trial.setup()
        };
        let circles = dial(&setup, &now, &vega).unwrap();
        // an eccentric circle adds to one vernier what it takes from the other
        let eccentric = Angle::from_arcminutes(20.0);
        let moved = |by: Angle| Reading {
            value: (circles.hour.reading.value + by).wrapped_positive(),
            half: None,
        };
        let sighting = Sighting {
            side: Side::TubeEast,
            hour: moved(eccentric),
            dec: circles.dec.reading,
            hour_opposite: Some(moved(Angle::HALF_TURN - eccentric)),
            dec_opposite: None,
            timed: false,
        };
        let understood = sighting
            .understand(&trial.mount, &now, &vega.source, &trial.estimate)
            .unwrap();
        assert!(
            understood.hour_off.abs().arcseconds() < 1e-6,
            "{understood:?}"
        );
        let one_look = trial.mount.hour_circle.look_error();
        let two_looks = understood.sight.sigma_hour;
        assert!((one_look / two_looks - std::f64::consts::SQRT_2).abs() < 1e-9);
        let alone = Sighting {
            hour_opposite: None,
            ..sighting
        };
        let understood = alone
            .understand(&trial.mount, &now, &vega.source, &trial.estimate)
            .unwrap();
        assert!((understood.hour_off.arcminutes() - 20.0).abs() < 1e-6);
    }
}
