//! The field as an optic shows it, with the target in the middle: which stars are in it, and where in the picture.
//!
//! Every star goes the whole way from the catalogue to its observed place, refraction included; it is laid out from the
//! middle by its distance and its position angle, as a flat field without distortion shows it to within a part in a
//! thousand at 3° from the middle. What is up in the picture: [`crate::metal::view`].

use crate::angle::{Angle, Declination, RightAscension};
use crate::catalog::{Catalogue, Target};
use crate::dial::{CautionCode, Dial, Setup};
use crate::metal::{Optic, Orientation, TubeDirections, View};
use crate::sky::{CataloguePlace, Equinox, Moment, Source};

/// A star in the picture.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SeenStar {
    /// To the right of the middle.
    pub right: Angle,
    /// Above the middle.
    pub up: Angle,
    /// Hp.
    pub magnitude: f64,
}

/// The field of an optic with the target in the middle.
#[derive(Clone, Debug, PartialEq)]
pub struct Field {
    /// The optic's name.
    pub optic: String,
    /// Its diameter on the sky.
    pub diameter: Angle,
    /// How it shows it.
    pub view: View,
    /// The eyepiece stands at a fixed place about the tube.
    pub at_the_side: bool,
    /// How north and east lie.
    pub orientation: Orientation,
    /// The stars in it, the brightest first.
    pub stars: Vec<SeenStar>,
    /// How large the target is across its longer side, if that is known.
    pub target_across: Option<Angle>,
    /// The target is so near the zenith that what is up hangs on where the observer stands.
    pub overhead: bool,
    /// The caution of a target near the Sun that was answered for.
    pub near_sun: Option<String>,
}

/// From the middle to the north, and through east round to there.
const WEST: Angle = Angle::from_degrees(270.0);
const EAST: Angle = Angle::from_degrees(90.0);

/// A star may have moved so far since J2000.0 (10" a year), and refraction near the horizon, aberration and nutation push
/// it farther out than its catalogue place.
const MARGIN: Angle = Angle::from_degrees(1.0);

/// Nearer the zenith than this, nobody can tell what is up.
const OVERHEAD: Angle = Angle::from_degrees(5.0);

impl Field {
    /// Of an optic of the mount, for a target as dialled at a moment; no more than `most` stars, the brightest.
    ///
    /// The dial is what was not withheld: there is no picture of a field near the Sun without one.
    #[must_use]
    pub fn of(
        (setup, moment): (&Setup<'_>, &Moment),
        (catalogue, target): (&Catalogue, &Target),
        (dial, optic): (&Dial, &Optic),
        most: usize,
    ) -> Self {
        let middle = &dial.observed;
        let tube = TubeDirections::new(
            middle.hour_angle,
            middle.declination,
            dial.axes,
            moment.observer().latitude,
            &setup.estimate.errors(),
        );
        let orientation = Orientation::of(optic, &tube);
        let radius = optic.field / 2.0;
        let (ra, dec) = on_catalogue_axes(moment, dial);
        let known = catalogue.stars_within(ra, dec, radius + MARGIN);
        let seen = known.iter().filter_map(|star| {
            let place = moment.observed(&moment.apparent(&Source::Catalogue(star.place)));
            let distance = middle.separation(&place);
            (distance <= radius).then(|| {
                let (right, up) = orientation.place(distance, middle.position_angle_of(&place));
                SeenStar {
                    right,
                    up,
                    magnitude: star.magnitude,
                }
            })
        });
        Self {
            optic: optic.name.clone(),
            diameter: optic.field,
            view: optic.view,
            at_the_side: optic.turned.is_some(),
            orientation,
            stars: seen.take(most).collect(),
            target_across: target
                .size_arcmin
                .map(|(length, _)| Angle::from_arcminutes(length))
                .filter(|across| *across > Angle::ZERO),
            near_sun: dial
                .cautions
                .iter()
                .find(|caution| caution.code == CautionCode::NearSun)
                .map(|caution| caution.text.clone()),
            overhead: middle.altitude.angle() > Angle::from_degrees(90.0) - OVERHEAD,
        }
    }

    /// The magnitude of the faintest star in it.
    #[must_use]
    pub fn faintest(&self) -> Option<f64> {
        self.stars.last().map(|star| star.magnitude)
    }

    /// Which way north lies in the picture, right and up, in units of the distance.
    #[must_use]
    pub fn north(&self) -> (Angle, Angle) {
        self.orientation.place(self.diameter / 2.0, Angle::ZERO)
    }

    /// Which way east lies.
    #[must_use]
    pub fn east(&self) -> (Angle, Angle) {
        self.orientation.place(self.diameter / 2.0, EAST)
    }

    /// Which way west lies: whereto everything drifts while the drive is off.
    #[must_use]
    pub fn west(&self) -> (Angle, Angle) {
        self.orientation.place(self.diameter / 2.0, WEST)
    }
}

/// Where the target stands among the places of a catalogue, to within the margin of the search.
fn on_catalogue_axes(moment: &Moment, dial: &Dial) -> (RightAscension, Declination) {
    let (ra, dec) = (dial.of_date.right_ascension, dial.of_date.declination);
    let of_date = CataloguePlace {
        equinox: Equinox::Julian(moment.utc().julian_year()),
        ..CataloguePlace::icrs(ra, dec)
    };
    of_date.at_icrs_j2000().unwrap_or((ra, dec))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::dial::dial;
    use crate::dial::trial::{Trial, moment, target};

    fn field(utc: &str, name: &str, degrees: f64, view: View) -> Field {
        field_about(utc, &target(name), degrees, view)
    }

    fn field_about(utc: &str, target: &Target, degrees: f64, view: View) -> Field {
        let trial = Trial::new();
        let moment = moment(utc);
        let dialled = dial(&trial.setup(), &moment, target).unwrap();
        let optic = Optic {
            name: "any".to_owned(),
            field: Angle::from_degrees(degrees),
            view,
            turned: None,
        };
        Field::of(
            (&trial.setup(), &moment),
            (&Catalogue::builtin(), target),
            (&dialled, &optic),
            usize::MAX,
        )
    }

    #[test]
    fn a_star_that_is_the_target_stands_in_the_middle() {
        // HIP 57939, in the table of faint stars, goes 7" a year
        let (ra, dec) = (
            RightAscension::from_degrees(178.244_871),
            Declination::from_degrees(37.718_678),
        );
        let near = Angle::from_arcseconds(1.0);
        let [fast] = Catalogue::builtin().stars_within(ra, dec, near)[..] else {
            panic!("not one star");
        };
        assert!(fast.magnitude > 6.5);
        let fast = Target {
            source: Source::Catalogue(fast.place),
            ..target("Vega")
        };
        for target in [target("Vega"), fast] {
            let seen = field_about("2026-12-01T21:30:00Z", &target, 1.0, View::Upright);
            let in_the_middle =
                |star: &SeenStar| star.right.radians().hypot(star.up.radians()) < 1e-6;
            assert!(seen.stars.iter().any(in_the_middle));
        }
    }

    #[test]
    fn orions_belt_slants_the_way_it_does_for_the_naked_eye() {
        // Alnilam near the meridian: Alnitak to the left and lower, Mintaka to the right and higher (common knowledge)
        let upright = field("2026-12-02T00:50:00Z", "Alnilam", 3.5, View::Upright);
        let [first, second, third] = [0, 1, 2].map(|at| upright.stars[at]);
        assert!(first.magnitude < 1.8 && third.magnitude < 2.5);
        let outer = |star: &&SeenStar| star.right.degrees().abs() > 0.5;
        let belt = [first, second, third];
        let [alnitak, mintaka]: [&SeenStar; 2] = belt
            .iter()
            .filter(outer)
            .collect::<Vec<_>>()
            .try_into()
            .unwrap();
        assert!(alnitak.right < Angle::ZERO && alnitak.up < Angle::ZERO);
        assert!(mintaka.right > Angle::ZERO && mintaka.up > Angle::ZERO);
        let mirrored = field("2026-12-02T00:50:00Z", "Alnilam", 3.5, View::Mirrored);
        for (one, other) in upright.stars.iter().zip(&mirrored.stars) {
            assert_eq!((one.right, one.up), (-other.right, other.up));
        }
    }

    #[test]
    fn every_star_is_within_the_field_and_near_the_pole_they_stand_all_round() {
        let seen = field("2026-12-01T21:30:00Z", "Polaris", 6.0, View::Inverted);
        let radius = Angle::from_degrees(3.0).radians();
        let off = |star: &SeenStar| star.right.radians().hypot(star.up.radians());
        assert!(
            seen.stars
                .iter()
                .all(|star| off(star) <= radius * 1.000_001)
        );
        for (rightward, upward) in [(1.0, 1.0), (1.0, -1.0), (-1.0, 1.0), (-1.0, -1.0)] {
            let quarter = seen.stars.iter().filter(|star| {
                star.right.radians() * rightward > 0.0 && star.up.radians() * upward > 0.0
            });
            assert!(quarter.count() >= 3);
        }
    }

    #[test]
    fn no_more_stars_than_asked_for_and_those_the_brightest() {
        let all = field("2026-12-01T21:30:00Z", "M 45", 6.0, View::Inverted);
        assert!(all.stars.is_sorted_by(|a, b| a.magnitude <= b.magnitude));
        assert!(all.stars.len() > 40 && all.faintest() > Some(8.5));
        assert!(all.target_across > Some(Angle::from_degrees(1.0)));
    }
}
