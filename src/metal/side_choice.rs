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
