//! What the stars say of the polar axis, in words a person can act on.
//!
//! Sizes are angles the axis itself is turned by: up and down about the east-west line, sideways about the vertical (in
//! azimuth, as the base turns; on the sky it is less by the cosine of the latitude). A size is told from nothing once it
//! is twice its 1 sigma: one axis in twenty that is true would be told to be turned.

use crate::angle::{Angle, Latitude};
use crate::estimate::prediction::Estimate;

/// So many sigma a size is known within.
const WITHIN_SIGMAS: f64 = 2.0;

/// Where this much of what was unsure beforehand is still unsure, the stars have told nothing worth acting on.
const TAUGHT: f64 = 0.5;

/// Less than this no adjuster is turned for: settings allow for the axis as it stands (common practice, no source).
const LEAST_TURN: Angle = Angle::from_arcminutes(1.0);

/// What is to be said before anyone loosens a bolt.
const CAUTION: &str = "A mount is heavy and moves when its bolts are loosened: cap and clamp the tube, keep hands \
    from under and between, have somebody to hold the weight, and keep to the house's rules.";

/// What to do when it has been turned; the check by drift is common practice, no source.
const AFTERWARDS: &str = "The settings allow for the axis as it stands; turn it if the drive is to follow better. Then \
    read two or three stars anew, and check by the drift in declination: of a star low in the east or west for the \
    height, of one near the meridian for the azimuth.";

/// One direction in which the axis may be off.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Lean {
    /// Nothing is to be done, as far as the stars tell: it is true within this.
    True(Angle),
    /// Turn it by the first, known within the second. Positive lowers the raised end, or swings it westward.
    Turn(Angle, Angle),
    /// The stars do not tell: it may be off by so much (2 sigma).
    Untold(Angle),
}

/// What the stars say of the polar axis.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PolarAxis {
    /// Up and down.
    pub vertical: Lean,
    /// Sideways, in azimuth.
    pub sideways: Lean,
    /// The raised end points to the south celestial pole.
    pub southern: bool,
}

impl PolarAxis {
    /// What an estimate says of it, `expected` being what was believed of the two directions before any star (1 sigma).
    /// Nothing before the first star.
    #[must_use]
    pub fn of(estimate: &Estimate, latitude: Latitude, expected: (Angle, Angle)) -> Option<Self> {
        let errors = estimate.errors();
        let variances = estimate.covariance().diagonal();
        let lean = |off: Angle, variance: f64, expected: Angle| {
            let within = Angle::from_radians(variance.max(0.0).sqrt()) * WITHIN_SIGMAS;
            if off.abs() > within && off.abs() >= LEAST_TURN {
                Lean::Turn(off, within)
            } else if within > expected * (WITHIN_SIGMAS * TAUGHT) {
                Lean::Untold(within)
            } else {
                Lean::True(off.abs() + within)
            }
        };
        let (high, east) = (variances[2], variances[3]);
        (estimate.sights_used() > 0).then(|| Self {
            vertical: lean(errors.polar_high, high, expected.0),
            sideways: lean(errors.polar_east, east, expected.1),
            southern: latitude.angle() < Angle::ZERO,
        })
    }

    /// What to do, a sentence each; the first says all that is known.
    #[must_use]
    pub fn in_words(&self) -> Vec<String> {
        let end = if self.southern { "south" } else { "north" };
        let mut turns = Vec::new();
        let mut rest = Vec::new();
        match self.vertical {
            Lean::Turn(high, within) => {
                let how = if high > Angle::ZERO { "lower" } else { "raise" };
                let (by, within) = (minutes(high), minutes_up(within));
                turns.push(format!(
                    "{how} its raised ({end}) end by {by} (known within {within})"
                ));
            }
            Lean::True(within) => {
                rest.push(format!("in height true within {}", minutes_up(within)));
            }
            Lean::Untold(within) => rest.push(untold("height", within)),
        }
        match self.sideways {
            Lean::Turn(east, within) => {
                let way = if east > Angle::ZERO { "west" } else { "east" };
                let (by, within) = (minutes(east), minutes_up(within));
                let what = if turns.is_empty() {
                    format!("its raised ({end}) end")
                } else {
                    "it".to_owned()
                };
                turns.push(format!("swing {what} {by} {way} (known within {within})"));
            }
            Lean::True(within) => {
                rest.push(format!("in azimuth true within {}", minutes_up(within)));
            }
            Lean::Untold(within) => rest.push(untold("azimuth", within)),
        }
        let turned = !turns.is_empty();
        let told = !matches!(self.vertical, Lean::Untold(_));
        let both = told && !matches!(self.sideways, Lean::Untold(_));
        turns.extend(rest);
        let mut said = vec![format!("Polar axis: {}.", turns.join("; "))];
        if !both {
            said.push(
                "Stars near the meridian tell of its height, stars far east and far west of its azimuth; \
                read some on both sides of the pier."
                    .to_owned(),
            );
        }
        if turned {
            said.push(AFTERWARDS.to_owned());
            said.push(CAUTION.to_owned());
        }
        said
    }
}

fn untold(direction: &str, within: Angle) -> String {
    format!(
        "of its {direction} these stars tell little (it may be off by {})",
        minutes_up(within)
    )
}

/// A size in whole minutes of arc, in degrees from 1° on.
fn minutes(size: Angle) -> String {
    written(size.abs().arcminutes().round())
}

/// The same, never less than it is.
fn minutes_up(size: Angle) -> String {
    /// A hundredth of a minute above a whole one is that one.
    const ROUNDING_ARCMIN: f64 = 0.01;
    written((size.abs().arcminutes() - ROUNDING_ARCMIN).ceil().max(1.0))
}

fn written(minutes: f64) -> String {
    let degrees = (minutes / 60.0).floor();
    let rest = minutes - degrees * 60.0;
    match (degrees > 0.0, rest > 0.0) {
        (false, _) => format!("{minutes:.0}'"),
        (true, false) => format!("{degrees:.0}°"),
        (true, true) => format!("{degrees:.0}° {rest:.0}'"),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{Declination, HourAngle};
    use crate::estimate::{Prior, Sight, fit};
    use crate::metal::{ExpectedErrors, MountErrors, OppositeVerniers, Side, to_axes};

    const STARS: [(f64, f64); 8] = [
        (-60.0, 10.0),
        (55.0, 5.0),
        (-5.0, 45.0),
        (10.0, -5.0),
        (-35.0, 30.0),
        (30.0, 40.0),
        (-80.0, 20.0),
        (75.0, 35.0),
    ];

    /// Read without error from the first so many stars, though the observer allows for 2'.
    fn said(high: f64, east: f64, latitude: f64, stars: usize) -> Option<PolarAxis> {
        let latitude = Latitude::from_degrees(latitude);
        let errors = MountErrors {
            polar_high: Angle::from_arcminutes(high),
            polar_east: Angle::from_arcminutes(east),
            ..MountErrors::default()
        };
        let sights: Vec<Sight> = STARS[..stars]
            .iter()
            .map(|&(h, d)| {
                let side = if h < 0.0 {
                    Side::TubeWest
                } else {
                    Side::TubeEast
                };
                let d = if latitude.angle() < Angle::ZERO {
                    -d
                } else {
                    d
                };
                let (h, d) = (HourAngle::from_degrees(h), Declination::from_degrees(d));
                let axes = to_axes(h, d, latitude, &errors, side).unwrap();
                Sight {
                    hour_angle: h,
                    declination: d,
                    side,
                    hour: vec![axes.hour],
                    dec: vec![axes.dec],
                    sigma_hour: Angle::from_arcminutes(2.0),
                    sigma_dec: Angle::from_arcminutes(2.0),
                    opposite: OppositeVerniers::default(),
                }
            })
            .collect();
        let expected = ExpectedErrors::default();
        let prior = Prior::from_expected(&expected);
        let estimate = Estimate::from(&fit(latitude, &prior, &sights));
        PolarAxis::of(
            &estimate,
            latitude,
            (expected.polar_high, expected.polar_east),
        )
    }

    fn first(high: f64, east: f64, latitude: f64) -> String {
        said(high, east, latitude, 8).unwrap().in_words().remove(0)
    }

    #[test]
    fn an_axis_too_high_is_lowered_and_one_too_far_east_is_swung_west() {
        for (high, how) in [(40.0, "lower"), (-40.0, "raise")] {
            for (east, way) in [(50.0, "west"), (-50.0, "east")] {
                for (latitude, end) in [(52.0, "north"), (-35.0, "south")] {
                    let words = first(high, east, latitude);
                    let raised = format!("{how} its raised ({end}) end by 40' ");
                    assert!(words.contains(&raised), "{words}");
                    assert!(words.contains("swing it 50' "), "{words}");
                    assert!(
                        words.contains(&format!("50' {way} (known within ")),
                        "{words}"
                    );
                }
            }
        }
    }

    #[test]
    fn turned_as_it_says_the_axis_is_true() {
        // positive lowers and swings west: what is too high and too far east by so much
        let Some(PolarAxis {
            vertical: Lean::Turn(down, _),
            sideways: Lean::Turn(west, _),
            ..
        }) = said(40.0, -50.0, 52.0, 8)
        else {
            panic!("nothing to turn");
        };
        let after = said(40.0 - down.arcminutes(), -50.0 - west.arcminutes(), 52.0, 8).unwrap();
        assert!(matches!(after.vertical, Lean::True(_)), "{after:?}");
        assert!(matches!(after.sideways, Lean::True(_)), "{after:?}");
    }

    #[test]
    fn a_true_axis_is_left_alone_and_said_to_be_true_as_far_as_the_stars_tell() {
        let axis = said(0.0, 0.0, 52.0, 8).unwrap();
        let words = axis.in_words();
        assert_eq!(words.len(), 1, "{words:?}");
        assert!(words[0].contains("in height true within "), "{words:?}");
        assert!(words[0].contains("in azimuth true within "), "{words:?}");
    }

    #[test]
    fn after_one_star_it_says_what_would_tell() {
        let words = said(10.0, 10.0, 52.0, 1).unwrap().in_words();
        assert!(words[0].contains("tell little"), "{words:?}");
        assert!(words[1].contains("meridian"), "{words:?}");
        assert!(!words.iter().any(|line| line == CAUTION), "{words:?}");
        assert_eq!(said(10.0, 10.0, 52.0, 0), None);
    }

    #[test]
    fn who_is_to_turn_it_is_told_of_the_weight() {
        let words = said(40.0, 0.0, 52.0, 8).unwrap().in_words();
        assert_eq!(words.last().map(String::as_str), Some(CAUTION));
        assert!(words[0].contains("in azimuth true within"), "{words:?}");
    }

    #[test]
    fn sizes_are_in_whole_minutes_and_degrees() {
        for (arcminutes, expected) in [(13.4, "13'"), (59.7, "1°"), (72.0, "1° 12'"), (0.2, "0'")]
        {
            assert_eq!(minutes(Angle::from_arcminutes(arcminutes)), expected);
        }
        for (arcminutes, expected) in [(13.2, "14'"), (0.2, "1'"), (60.0, "1°"), (5.004, "5'")] {
            assert_eq!(minutes_up(Angle::from_arcminutes(arcminutes)), expected);
        }
    }
}
