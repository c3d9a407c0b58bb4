//! How the picture in an eyepiece stands: where north and east of the field are, and what is exchanged.
//!
//! The picture is laid out from the middle of the field to the right and upward as the observer sees it, who looks into
//! the eyepiece with the head upright, its top toward the zenith as nearly as may be.
//!
//! 1. An eyepiece looked through along the tube shows what the naked eye sees there, the zenith at the top, changed as
//!    [`View`] says. The roll of the tube with the mount does not matter; the field turns about its middle with the
//!    hours, by the parallactic angle. An eyepiece behind a star diagonal is taken to be turned upward for every
//!    object, and looked into from behind: the same holds.
//! 2. An eyepiece that stands out at the side, at a fixed place about the tube ([`Optic::turned`]), is carried round by
//!    the mount. Its place is counted from the tube end of the declination axis, away from the pier, clockwise as seen
//!    looking along the tube toward the sky. With the top of the head toward the sky end of the tube the observer
//!    would see what the naked eye sees with the side of the eyepiece at the top, changed as [`View`] says; the head is
//!    then turned about the eyepiece until its top is as near the zenith as may be, and the picture turns the other
//!    way. So a Newtonian is `Inverted` and a fixed star diagonal `Mirrored`. This follows from the two or three
//!    reflections of such a telescope, worked out here.
//!
//! Straight up, where the zenith is in the middle of the field, north is drawn as if the tube had come from the south;
//! with the eyepiece itself straight up or down, the head's top is toward the sky end of the tube.

use crate::angle::Angle;
use crate::metal::dome::TubeDirections;
use crate::metal::frames::{cross, dot, scaled, sum};
use crate::metal::mount::Optic;

/// How the picture of an optic stands against what the naked eye sees.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum View {
    /// The same way: an optic with an erecting prism, or none but the eye.
    Upright,
    /// Turned by 180°: a refractor looked through straight, a Newtonian.
    #[default]
    Inverted,
    /// Left and right exchanged: with a star diagonal.
    Mirrored,
    /// Up and down exchanged: with a mirror more than the telescope itself has, beside the tube.
    UpsideDown,
}

impl View {
    /// All of them.
    pub const ALL: [Self; 4] = [
        Self::Upright,
        Self::Inverted,
        Self::Mirrored,
        Self::UpsideDown,
    ];

    /// Its word in a mount file.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Upright => "upright",
            Self::Inverted => "inverted",
            Self::Mirrored => "mirrored",
            Self::UpsideDown => "upside-down",
        }
    }

    /// What it does, in words.
    #[must_use]
    pub const fn in_words(self) -> &'static str {
        match self {
            Self::Upright => "upright, as to the naked eye",
            Self::Inverted => "inverted: turned by half a turn",
            Self::Mirrored => "mirrored: left and right exchanged",
            Self::UpsideDown => "upside down: up and down exchanged",
        }
    }

    /// What becomes of a step to the right and of one upward.
    const fn signs(self) -> (f64, f64) {
        match self {
            Self::Upright => (1.0, 1.0),
            Self::Inverted => (-1.0, -1.0),
            Self::Mirrored => (-1.0, 1.0),
            Self::UpsideDown => (1.0, -1.0),
        }
    }
}

/// A step in the picture: to the right, and upward.
type Step = (f64, f64);

/// How a field stands in the picture.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Orientation {
    /// Where a step to the east goes.
    east: Step,
    /// Where a step to the north goes.
    north: Step,
}

/// Nearer the zenith than this there is no saying what is up: a hundredth of a second of arc.
const AT_THE_ZENITH: f64 = 5e-8;

impl Orientation {
    /// Of an optic of a mount whose tube points there.
    #[must_use]
    pub fn of(optic: &Optic, tube: &TubeDirections) -> Self {
        let up = match optic.turned {
            None => upward(tube),
            Some(turned) => side(tube, turned),
        };
        let right = cross(tube.sky(), up);
        let (rightward, upward) = optic.view.signs();
        let east = cross(tube.north(), tube.sky());
        let seen = |step: [f64; 3]| (rightward * dot(step, right), upward * dot(step, up));
        let seen = Self {
            east: seen(east),
            north: seen(tube.north()),
        };
        match optic.turned {
            None => seen,
            // looking down on the eyepiece: the sky end of the tube was at the top
            Some(_) => seen.with_the_head_turned(zenith(right).atan2(zenith(tube.sky()))),
        }
    }

    /// With the head turned clockwise by so much, in radians.
    fn with_the_head_turned(self, clockwise: f64) -> Self {
        let (sin, cos) = clockwise.sin_cos();
        let turned = |(right, up): Step| (right * cos - up * sin, right * sin + up * cos);
        Self {
            east: turned(self.east),
            north: turned(self.north),
        }
    }

    /// Where in the picture something is that lies so far from the middle of the field at a position angle (from north
    /// through east): how far to the right and how far up.
    #[must_use]
    pub fn place(&self, distance: Angle, position_angle: Angle) -> (Angle, Angle) {
        let (east, north) = (position_angle.sin(), position_angle.cos());
        (
            distance * (east * self.east.0 + north * self.north.0),
            distance * (east * self.east.1 + north * self.north.1),
        )
    }
}

/// How far a direction goes up.
const fn zenith([_, _, up]: [f64; 3]) -> f64 {
    up
}

/// A vector with its part along the line of sight taken off, of length one; nothing if too little is left.
fn across(tube: &TubeDirections, vector: [f64; 3]) -> Option<[f64; 3]> {
    let across = sum(vector, scaled(tube.sky(), -dot(vector, tube.sky())));
    let length = dot(across, across).sqrt();
    (length > AT_THE_ZENITH).then(|| scaled(across, 1.0 / length))
}

/// Across the line of sight, toward the zenith.
fn upward(tube: &TubeDirections) -> [f64; 3] {
    across(tube, [0.0, 0.0, 1.0]).unwrap_or(tube.north())
}

/// From the tube toward an eyepiece at its side.
fn side(tube: &TubeDirections, turned: Angle) -> [f64; 3] {
    let from = across(tube, tube.tube_end()).unwrap_or(tube.north());
    sum(
        scaled(from, turned.cos()),
        scaled(cross(tube.sky(), from), turned.sin()),
    )
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{Declination, HourAngle, Latitude};
    use crate::metal::{MountErrors, Side, to_axes};

    /// Rounding of a few turns of unit vectors.
    const ROUNDING: f64 = 1e-9;

    fn tube(latitude: f64, h: f64, d: f64, side: Side) -> TubeDirections {
        let (h, d) = (HourAngle::from_degrees(h), Declination::from_degrees(d));
        let (latitude, errors) = (Latitude::from_degrees(latitude), MountErrors::default());
        let axes = to_axes(h, d, latitude, &errors, side).unwrap();
        TubeDirections::new(h, d, axes, latitude, &errors)
    }

    fn shown(view: View, turned: Option<f64>, tube: &TubeDirections) -> Orientation {
        let optic = Optic {
            name: "any".to_owned(),
            field: Angle::from_degrees(1.0),
            view,
            turned: turned.map(Angle::from_degrees),
        };
        Orientation::of(&optic, tube)
    }

    fn assert_lies(found: Orientation, north: Step, east: Step) {
        for ((right, up), (right_wanted, up_wanted)) in [(found.north, north), (found.east, east)] {
            assert!(
                (right - right_wanted).hypot(up - up_wanted) < ROUNDING,
                "{found:?}, not {north:?} {east:?}"
            );
        }
    }

    /// At the pole itself the hour axis has no angle.
    const BESIDE_THE_POLE: f64 = 89.999_999;

    const LEFT: Step = (-1.0, 0.0);
    const RIGHT: Step = (1.0, 0.0);
    const UP: Step = (0.0, 1.0);
    const DOWN: Step = (0.0, -1.0);

    #[test]
    fn orions_belt_on_the_meridian_is_seen_as_everyone_sees_it() {
        // from 50° north, facing south: common knowledge of anyone who has looked
        for side in [Side::TubeWest, Side::TubeEast, Side::Single] {
            let belt = tube(50.0, 0.0, -1.0, side);
            assert_lies(shown(View::Upright, None, &belt), UP, LEFT);
            assert_lies(shown(View::Inverted, None, &belt), DOWN, RIGHT);
            assert_lies(shown(View::Mirrored, None, &belt), UP, RIGHT);
            assert_lies(shown(View::UpsideDown, None, &belt), DOWN, LEFT);
        }
    }

    #[test]
    fn from_the_south_orion_stands_on_his_head() {
        let belt = tube(-35.0, 0.0, -1.0, Side::TubeWest);
        assert_lies(shown(View::Upright, None, &belt), DOWN, RIGHT);
        assert_lies(shown(View::Inverted, None, &belt), UP, LEFT);
    }

    #[test]
    fn facing_north_the_pole_is_below_what_has_passed_above_it() {
        let above = tube(50.0, 0.0, 80.0, Side::TubeWest);
        assert_lies(shown(View::Upright, None, &above), DOWN, RIGHT);
        let below = tube(50.0, 180.0, 70.0, Side::TubeWest);
        assert_lies(shown(View::Upright, None, &below), UP, LEFT);
    }

    #[test]
    fn due_west_on_the_equator_north_lies_to_the_right_and_west_goes_down() {
        // seen from the equator of the Earth: the celestial equator stands upright there
        let west = tube(0.0, 80.0, 0.0, Side::TubeWest);
        assert_lies(shown(View::Upright, None, &west), RIGHT, UP);
        let east = tube(0.0, -80.0, 0.0, Side::TubeWest);
        assert_lies(shown(View::Upright, None, &east), LEFT, DOWN);
    }

    #[test]
    fn at_the_zenith_and_at_the_poles_there_is_still_a_picture() {
        let overhead = tube(50.0, 0.0, 50.0, Side::TubeWest);
        assert_lies(shown(View::Upright, None, &overhead), UP, LEFT);
        // at the pole the direction of north is that of the hour circle the tube came along
        let pole = tube(50.0, 0.0, BESIDE_THE_POLE, Side::TubeWest);
        assert_lies(shown(View::Upright, None, &pole), DOWN, RIGHT);
        let optics = View::ALL.map(|view| [None, Some(0.0), Some(137.0)].map(|at| (view, at)));
        for (latitude, h, d) in [
            (50.0, 30.0, BESIDE_THE_POLE),
            (-50.0, 0.0, -BESIDE_THE_POLE),
            (90.0, 10.0, BESIDE_THE_POLE),
            (-90.0, 0.0, -BESIDE_THE_POLE),
            (0.0, 0.0, 0.0),
        ] {
            for side in [Side::TubeWest, Side::TubeEast, Side::Single] {
                for (view, turned) in optics.into_iter().flatten() {
                    let found = shown(view, turned, &tube(latitude, h, d, side));
                    let ((a, b), (c, d)) = (found.north, found.east);
                    assert!((a * a + b * b - 1.0).abs() < ROUNDING, "{found:?}");
                    assert!((a * c + b * d).abs() < ROUNDING, "{found:?}");
                    // north counts on counterclockwise to east, but in a mirror
                    let mirrored = matches!(view, View::Mirrored | View::UpsideDown);
                    let handed = a * d - b * c;
                    assert!((handed - if mirrored { -1.0 } else { 1.0 }).abs() < ROUNDING);
                }
            }
        }
    }

    #[test]
    fn an_eyepiece_turned_upward_by_hand_shows_what_one_fixed_there_shows() {
        // on the meridian with the tube west the tube end of the declination axis points west: to the right looking
        // south, and up is three quarters of a turn clockwise from there
        let south = tube(50.0, 0.0, -10.0, Side::TubeWest);
        let fixed = shown(View::Mirrored, Some(270.0), &south);
        assert_lies(fixed, UP, RIGHT);
        let east = tube(50.0, 0.0, -10.0, Side::TubeEast);
        assert_lies(shown(View::Mirrored, Some(90.0), &east), UP, RIGHT);
    }

    #[test]
    fn beside_a_level_newtonian_all_is_turned_by_half_a_turn() {
        // level toward the south, the eyepiece out at the west: a flat that turns light sideways leaves up and down to
        // the main mirror and the eyepiece, which exchange them
        let level = tube(0.0, 0.0, -89.999_999_999, Side::TubeWest);
        let found = shown(View::Inverted, Some(0.0), &level);
        // up on the sky is north here
        assert!((found.north.1 + 1.0).abs() < 1e-6, "{found:?}");
        assert!((found.east.0 - 1.0).abs() < 1e-6, "{found:?}");
    }
}
