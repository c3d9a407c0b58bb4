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

/// Two opposite verniers farther apart than this, beyond the half turn, are not both of the same place: twice the
/// eccentricity of a circle that is seen to wobble (common practice, no source).
const MOST_APART: Angle = Angle::from_degrees(6.0);

/// What a circle can mean with its opposite vernier read too: each candidate is the mean of the two
/// verniers, and the error of a look is shared between two. Where an unsigned scale turns back, an opposite vernier
/// can stand on either side of the turn: both are told.
fn with_opposite(
    candidates: Vec<AxisAngle>,
    opposite: Option<Vec<AxisAngle>>,
    sigma: Angle,
) -> (Vec<AxisAngle>, Angle) {
    let Some(opposite) = opposite else {
        return (candidates, sigma);
    };
    let across: Vec<AxisAngle> = opposite
        .iter()
        .map(|other| AxisAngle::new(other.angle() + Angle::HALF_TURN))
        .collect();
    let means = |shown: AxisAngle| {
        let off = |other: AxisAngle| (other.angle() - shown.angle()).wrapped_signed();
        let mut others: Vec<AxisAngle> = across
            .iter()
            .copied()
            .filter(|&other| off(other).abs() <= MOST_APART)
            .collect();
        if others.is_empty() {
            others.extend(nearest(&across, shown));
        }
        let mean = |other| AxisAngle::new(shown.angle() + off(other) / 2.0);
        others.into_iter().map(mean).collect::<Vec<_>>()
    };
    (
        candidates.into_iter().flat_map(means).collect(),
        sigma * std::f64::consts::FRAC_1_SQRT_2,
    )
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::dial::trial::{Trial, moment, target};
    use crate::dial::{Setup, dial};
    use crate::metal::{
        DeclinationCircle, DeclinationNumbering, HourCircle, HourNumbering, Increases, Ring,
        SideRequest,
    };

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

    /// Every way a circle of the program can be engraved.
    fn every_engraving() -> Vec<(HourCircle, DeclinationCircle)> {
        let trial = Trial::new().mount;
        let mut found = Vec::new();
        for numbering in [
            HourNumbering::Full,
            HourNumbering::Halves,
            HourNumbering::PlusMinus,
        ] {
            for increases in [Increases::West, Increases::East] {
                for ring in [Ring::Fixed, Ring::Slips, Ring::Driven] {
                    for second_fiducial in [false, true] {
                        for dec in [
                            DeclinationNumbering::Signed,
                            DeclinationNumbering::Quarters,
                            DeclinationNumbering::PolarDistance,
                            DeclinationNumbering::SouthPolarDistance,
                            DeclinationNumbering::Full,
                        ] {
                            let hour = HourCircle {
                                ring,
                                numbering,
                                increases,
                                second_fiducial,
                                ..trial.hour_circle
                            };
                            let dec = DeclinationCircle {
                                numbering: dec,
                                ..trial.declination_circle
                            };
                            found.push((hour, dec));
                        }
                    }
                }
            }
        }
        found
    }

    #[test]
    fn opposite_verniers_agree_on_every_engraving_also_where_its_numbers_turn_back() {
        let now = moment("2026-12-01T21:30:00Z");
        let (vega, sidereal) = (target("Vega"), now.apparent_sidereal());
        let off = Angle::from_arcminutes(10.0);
        let trial = Trial::new();
        for (hour_circle, declination_circle) in every_engraving() {
            let mount = Mount {
                hour_circle,
                declination_circle,
                ..trial.mount.clone()
            };
            for side in [Side::TubeWest, Side::TubeEast] {
                for degrees in [-179.95, -90.1, -40.0, 0.05, 33.3, 89.9, 140.0, 179.95] {
                    let centred = AxisAngle::from_degrees(degrees);
                    let under = |by: Angle| AxisAngle::new(centred.angle() + by);
                    let hour = |by| hour_circle.reading(under(by), sidereal, side);
                    let dec = |by| declination_circle.reading(under(by));
                    let sighting = Sighting {
                        side,
                        hour: hour(off),
                        dec: dec(off),
                        hour_opposite: Some(hour(Angle::HALF_TURN - off)),
                        dec_opposite: Some(dec(Angle::HALF_TURN - off)),
                        timed: false,
                    };
                    let sight = sighting.sight(&mount, &now, &vega.source);
                    assert!(sight.opposite.hour && sight.opposite.dec);
                    for candidates in [&sight.hour, &sight.dec] {
                        let found = nearest(candidates, centred).unwrap();
                        let missed = (found.angle() - centred.angle()).wrapped_signed();
                        assert!(
                            missed.abs().arcseconds() < 1e-6,
                            "{mount:?} {side} {degrees}"
                        );
                    }
                }
            }
        }
    }
}
