//! Which side of the pier to use for an object.
//!
//! On a mount with two sides the usual choice is the tube west for objects east of the meridian and the
//! reverse, with a preference not to turn over for a few minutes. Hour angles positive west.

use std::fmt;
use std::str::FromStr;

use crate::angle::{Angle, HourAngle};
use crate::metal::mount::{Kind, Mount};
use crate::metal::side::Side;

/// So near the meridian, above or below the pole, a tube is left on the side it is on: ten minutes of hour
/// angle (common practice, no source).
pub const NOT_WORTH_TURNING_OVER: Angle = Angle::from_time_seconds(600.0);

/// The side of the pier asked for.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum SideRequest {
    /// The usual one.
    #[default]
    Auto,
    /// This one and no other.
    Only(Side),
}

/// A word that names no side.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[error("\"{word}\" is no side of the pier: tube-west, tube-east, single or auto")]
pub struct UnknownSide {
    /// The word as given.
    pub word: String,
}

/// A side the mount does not have.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
pub enum NoSuchSide {
    /// The tube of a fork or yoke cannot be east.
    #[error("a fork or a yoke has one side only: ask for single or auto")]
    OneSideOnly,
    /// A German or cross-axis mount has two sides.
    #[error("this mount has two sides: ask for tube-west, tube-east or auto")]
    TwoSides,
}

impl FromStr for SideRequest {
    type Err = UnknownSide;
    fn from_str(word: &str) -> Result<Self, UnknownSide> {
        let named = |side: &Side| side.word() == word;
        match [Side::TubeWest, Side::TubeEast, Side::Single]
            .into_iter()
            .find(named)
        {
            Some(side) => Ok(Self::Only(side)),
            None if word == "auto" => Ok(Self::Auto),
            None => Err(UnknownSide {
                word: word.to_owned(),
            }),
        }
    }
}

impl fmt::Display for SideRequest {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Auto => f.write_str("auto"),
            Self::Only(side) => side.fmt(f),
        }
    }
}

impl Kind {
    /// The usual side for an object, given the side the tube is on now if that is known.
    #[must_use]
    pub fn usual_side(self, hour_angle: HourAngle, present: Option<Side>) -> Side {
        if !self.has_two_sides() {
            return Side::Single;
        }
        let from_meridian = hour_angle.angle().abs();
        let from_lower_meridian = Angle::HALF_TURN - from_meridian;
        let near =
            from_meridian < NOT_WORTH_TURNING_OVER || from_lower_meridian < NOT_WORTH_TURNING_OVER;
        match present {
            Some(side) if near && side != Side::Single => side,
            _ if hour_angle.angle() < Angle::ZERO => Side::TubeWest,
            _ => Side::TubeEast,
        }
    }
}

impl Mount {
    /// The side to use for an object: the one asked for, else the usual one, unless that is beyond its limit
    /// and the other is not. On a fork or yoke `tube-west` is its one side, whose geometry is the same.
    pub fn choose_side(
        &self,
        request: SideRequest,
        hour_angle: HourAngle,
        present: Option<Side>,
    ) -> Result<Side, NoSuchSide> {
        match (request, self.kind.has_two_sides()) {
            (SideRequest::Only(Side::Single), true) => Err(NoSuchSide::TwoSides),
            (SideRequest::Only(side), true) => Ok(side),
            (SideRequest::Only(Side::TubeEast), false) => Err(NoSuchSide::OneSideOnly),
            (_, false) => Ok(Side::Single),
            (SideRequest::Auto, true) => {
                let usual = self.kind.usual_side(hour_angle, present);
                let reaches = |side: &Side| self.limits.reachable(hour_angle, *side);
                let other = usual.other().filter(reaches);
                Ok(match other {
                    Some(other) if !reaches(&usual) => other,
                    _ => usual,
                })
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::metal::circle::samples::{declination_circle, hour_circle};
    use crate::metal::mount::{ExpectedErrors, HourAngleSpan, Limits};
    use crate::metal::{DeclinationNumbering, HourNumbering};

    fn mount(kind: Kind, limits: Limits) -> Mount {
        Mount {
            name: "test".to_owned(),
            kind,
            clock_drive: false,
            hour_circle: hour_circle(HourNumbering::Full),
            declination_circle: declination_circle(DeclinationNumbering::Signed),
            limits,
            expected: ExpectedErrors::default(),
            dome: None,
            tube: None,
            optics: Vec::new(),
        }
    }

    fn hours(hours: f64) -> HourAngle {
        HourAngle::new(Angle::from_hours(hours))
    }

    #[test]
    fn east_of_the_meridian_the_tube_is_west_and_the_reverse() {
        for kind in [Kind::German, Kind::CrossAxis] {
            assert_eq!(kind.usual_side(hours(-3.0), None), Side::TubeWest);
            assert_eq!(kind.usual_side(hours(3.0), None), Side::TubeEast);
            assert_eq!(
                kind.usual_side(hours(-3.0), Some(Side::TubeEast)),
                Side::TubeWest
            );
        }
        for kind in [Kind::Fork, Kind::Yoke] {
            assert_eq!(kind.usual_side(hours(-3.0), None), Side::Single);
        }
    }

    #[test]
    fn a_tube_is_not_turned_over_for_a_few_minutes() {
        let usual = |minutes: f64, present| Kind::German.usual_side(hours(minutes / 60.0), present);
        assert_eq!(usual(9.0, Some(Side::TubeWest)), Side::TubeWest);
        assert_eq!(usual(11.0, Some(Side::TubeWest)), Side::TubeEast);
        assert_eq!(usual(-9.0, Some(Side::TubeEast)), Side::TubeEast);
        assert_eq!(usual(9.0, None), Side::TubeEast);
        // past the meridian below the pole
        assert_eq!(usual(-711.0, Some(Side::TubeEast)), Side::TubeEast);
        assert_eq!(usual(-709.0, Some(Side::TubeEast)), Side::TubeWest);
    }

    #[test]
    fn a_limit_sends_the_tube_to_the_other_side_only_if_that_side_reaches() {
        let span = |from, to| {
            Some(HourAngleSpan {
                from: hours(from),
                to: hours(to),
            })
        };
        let limits = Limits {
            tube_west: span(-7.0, 2.0),
            tube_east: span(-0.5, 0.5),
            ..Limits::default()
        };
        let german = mount(Kind::German, limits);
        let choose = |h| {
            german
                .choose_side(SideRequest::Auto, hours(h), None)
                .unwrap()
        };
        assert_eq!(choose(0.3), Side::TubeEast);
        assert_eq!(choose(1.0), Side::TubeWest);
        // out of reach of both: the usual one, with its caution
        assert_eq!(choose(3.0), Side::TubeEast);
        assert_eq!(choose(-8.0), Side::TubeWest);
    }

    #[test]
    fn a_side_asked_for_is_given_if_the_mount_has_it() {
        let german = mount(Kind::German, Limits::default());
        let fork = mount(Kind::Fork, Limits::default());
        let ask =
            |mount: &Mount, word: &str| mount.choose_side(word.parse().unwrap(), hours(3.0), None);
        assert_eq!(ask(&german, "tube-west"), Ok(Side::TubeWest));
        assert_eq!(ask(&german, "auto"), Ok(Side::TubeEast));
        assert_eq!(ask(&german, "single"), Err(NoSuchSide::TwoSides));
        assert_eq!(ask(&fork, "single"), Ok(Side::Single));
        assert_eq!(ask(&fork, "auto"), Ok(Side::Single));
        assert_eq!(ask(&fork, "tube-west"), Ok(Side::Single));
        assert_eq!(ask(&fork, "tube-east"), Err(NoSuchSide::OneSideOnly));
    }

    #[test]
    fn a_word_that_is_no_side_is_named() {
        let fault = "west".parse::<SideRequest>().unwrap_err();
        assert_eq!(
            fault.to_string(),
            "\"west\" is no side of the pier: tube-west, tube-east, single or auto"
        );
        for word in ["tube-west", "tube-east", "single", "auto"] {
            assert_eq!(word.parse::<SideRequest>().unwrap().to_string(), word);
        }
    }
}
