//! Errors that the stars read so far cannot tell apart, and which star would.
//!
//! Two errors that move both circles alike at every star read come out with a correlation near 1 or -1: their sum is
//! known and each of them is not. Settings near those stars are good all the same; elsewhere they spread. Which star
//! would part them follows from the first-order formulas of the geometry (`src/metal/geometry.rs`).

use crate::angle::Angle;
use crate::estimate::prior::Covariance;
use crate::estimate::sight::Sight;
use crate::metal::Side;
use crate::metal::errors::{ALWAYS, COUNT, NAMES};

/// Correlations beyond this matter: of what is unsure of one error, the other accounts for four fifths.
const MATTERS: f64 = 0.9;

/// So many pairs are worth reading; where there are more, too few stars are the reason.
const MOST_PAIRS: usize = 3;

/// Errors known as well as this need not be told apart: no circle of a portable mount shows it.
const WELL_KNOWN: Angle = Angle::from_arcminutes(1.0);

/// Two errors that cannot be told apart.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Entangled {
    /// The name of one.
    pub one: &'static str,
    /// The name of the other.
    pub other: &'static str,
    /// Their correlation, -1 to 1.
    pub correlation: f64,
    /// What would part them.
    pub remedy: &'static str,
}

impl Entangled {
    /// The pairs that matter, the closest first; `two_sides` where the tube can be on either side of the pier.
    #[must_use]
    pub fn all(covariance: &Covariance, sights: &[Sight], two_sides: bool) -> Vec<Self> {
        let Some(first) = sights.first() else {
            return Vec::new();
        };
        let one_side = sights.iter().all(|sight| sight.side == first.side);
        let wanted_side = (two_sides && one_side).then_some(first.side);
        let sigma = |place: usize| covariance[(place, place)].max(0.0).sqrt();
        let mut pairs: Vec<Self> = (0..COUNT)
            .flat_map(|one| (one + 1..COUNT).map(move |other| (one, other)))
            .filter(|&(one, other)| sigma(one).min(sigma(other)) > WELL_KNOWN.radians())
            .filter_map(|(one, other)| {
                let correlation = covariance[(one, other)] / (sigma(one) * sigma(other));
                (correlation.abs() > MATTERS).then_some(())?;
                Some(Self {
                    one: NAMES.get(one)?,
                    other: NAMES.get(other)?,
                    correlation,
                    remedy: remedy(one, other, wanted_side),
                })
            })
            .collect();
        pairs.sort_by(|a, b| b.correlation.abs().total_cmp(&a.correlation.abs()));
        pairs.truncate(MOST_PAIRS);
        pairs
    }

    /// The pair and its remedy in a sentence.
    #[must_use]
    pub fn in_words(&self) -> String {
        format!(
            "{} and {} cannot be told apart yet (correlation {:+.2}): {}.",
            self.one, self.other, self.correlation, self.remedy
        )
    }
}

/// What parts two errors, by their places in [`NAMES`].
fn remedy(one: usize, other: usize, wanted_side: Option<Side>) -> &'static str {
    const DEC_INDEX: usize = 1;
    const POLAR: [usize; 2] = [2, 3];
    const CONE_AND_SKEW: [usize; 2] = [4, 5];
    const SAG: usize = 6;
    let either = |wanted: &[usize]| wanted.contains(&one) || wanted.contains(&other);
    // cone and skew move the hour circle the other way with the tube on the other side, the polar axis the
    // declination circle; the indexes move neither
    let turned_over = (CONE_AND_SKEW.contains(&one) != CONE_AND_SKEW.contains(&other))
        || (either(&[DEC_INDEX]) && either(&POLAR));
    match wanted_side {
        _ if one >= ALWAYS || other >= ALWAYS => {
            "read stars all round that circle, or both of its opposite verniers"
        }
        Some(from) if turned_over && !either(&[SAG]) => match from {
            Side::TubeEast => "read a star with the tube west",
            Side::TubeWest | Side::Single => "read a star with the tube east",
        },
        _ if either(&[SAG]) => "read a star high up and one low down",
        _ if either(&POLAR) => "read stars near the meridian, far in the east and far in the west",
        _ => "read a star near the celestial equator and one far from it",
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{Declination, HourAngle, Latitude};
    use crate::estimate::{Prior, fit};
    use crate::metal::{ExpectedErrors, MountErrors, OppositeVerniers, to_axes};

    const LATITUDE_DEG: f64 = 52.0;

    fn sight(hour_angle: f64, declination: f64, side: Side) -> Sight {
        let (h, d) = (
            HourAngle::from_degrees(hour_angle),
            Declination::from_degrees(declination),
        );
        let latitude = Latitude::from_degrees(LATITUDE_DEG);
        let axes = to_axes(h, d, latitude, &MountErrors::default(), side).unwrap();
        Sight {
            hour_angle: h,
            declination: d,
            side,
            hour: vec![axes.hour],
            dec: vec![axes.dec],
            sigma_hour: Angle::from_arcminutes(1.0),
            sigma_dec: Angle::from_arcminutes(1.0),
            opposite: OppositeVerniers::default(),
        }
    }

    /// A mount of which nothing but the index errors and one more are in question.
    fn entangled(expected: &ExpectedErrors, sights: &[Sight]) -> Vec<Entangled> {
        let latitude = Latitude::from_degrees(LATITUDE_DEG);
        let fit = fit(latitude, &Prior::from_expected(expected), sights);
        Entangled::all(&fit.covariance, sights, true)
    }

    fn only(change: impl Fn(&mut ExpectedErrors)) -> ExpectedErrors {
        let mut expected = ExpectedErrors {
            polar_high: Angle::ZERO,
            polar_east: Angle::ZERO,
            cone: Angle::ZERO,
            skew: Angle::ZERO,
            sag: Angle::ZERO,
            ..ExpectedErrors::default()
        };
        change(&mut expected);
        expected
    }

    /// Before a remedy the pair is there with those words, after it it is not.
    fn parted(
        expected: &ExpectedErrors,
        pair: [&str; 2],
        before: &[Sight],
        words: &str,
        more: &[Sight],
    ) {
        let is_pair = |found: &Entangled| [found.one, found.other] == pair;
        let found = entangled(expected, before);
        let found = found.into_iter().find(is_pair).unwrap();
        assert!(found.in_words().contains(words), "{}", found.in_words());
        let all = [before, more].concat();
        assert!(!entangled(expected, &all).iter().any(is_pair), "{pair:?}");
    }

    #[test]
    fn index_and_cone_on_one_side_are_parted_by_the_other() {
        for (here, there, words) in [
            (Side::TubeWest, Side::TubeEast, "with the tube east"),
            (Side::TubeEast, Side::TubeWest, "with the tube west"),
        ] {
            let before =
                [(-50.0, 5.0), (-20.0, 20.0), (-35.0, -5.0)].map(|(h, d)| sight(h, d, here));
            parted(
                &only(|expected| expected.cone = Angle::from_arcminutes(30.0)),
                ["hour-circle index", "cone"],
                &before,
                words,
                &[sight(30.0, 10.0, there)],
            );
        }
    }

    #[test]
    fn cone_and_skew_are_parted_by_stars_near_the_equator_and_far_from_it() {
        let both = |h: f64, d: f64| [Side::TubeWest, Side::TubeEast].map(|side| sight(h, d, side));
        parted(
            &only(|expected| {
                expected.cone = Angle::from_degrees(2.0);
                expected.skew = Angle::from_degrees(2.0);
            }),
            ["cone", "skew"],
            &[both(-40.0, 45.0), both(30.0, 47.0)].concat(),
            "near the celestial equator and one far from it",
            &[both(-20.0, 0.0), both(20.0, 68.0)].concat(),
        );
    }

    #[test]
    fn declination_index_and_a_high_axis_are_parted_by_the_other_side() {
        let before = [(-10.0, 5.0), (-20.0, 40.0)].map(|(h, d)| sight(h, d, Side::TubeWest));
        parted(
            &only(|expected| expected.polar_high = Angle::from_degrees(1.0)),
            ["declination-circle index", "polar axis high"],
            &before,
            "with the tube east",
            &[sight(15.0, 20.0, Side::TubeEast)],
        );
    }

    #[test]
    fn a_circle_off_centre_is_parted_from_its_index_by_stars_all_round_it() {
        let west = |h: f64, d: f64| sight(h, d, Side::TubeWest);
        let before = [west(-15.0, 5.0), west(0.0, 20.0), west(-5.0, 30.0)];
        parted(
            &only(|expected| expected.hour_eccentric = Angle::from_arcminutes(30.0)),
            ["hour-circle index", "hour-circle eccentricity, cosine"],
            &before,
            "all round that circle",
            &[
                west(-90.0, 20.0),
                west(85.0, 10.0),
                sight(40.0, 30.0, Side::TubeEast),
                sight(5.0, 0.0, Side::TubeEast),
            ],
        );
    }

    #[test]
    fn without_stars_nothing_is_said() {
        assert_eq!(entangled(&ExpectedErrors::default(), &[]), Vec::new());
    }
}
