//! The two graduated circles as engraved.

use crate::angle::Angle;
use crate::sexagesimal::Unit;

/// How the ring of an hour circle behaves.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ring {
    /// Fixed to the mount: it stands still and its zero never moves.
    Fixed,
    /// Turned by hand: it stands still, with a zero the observer sets.
    Slips,
    /// Rides with the clock drive once set.
    Driven,
}

/// How an hour circle is numbered, in its [`Unit`].
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum HourNumbering {
    /// 0 to 24 h, 0° to 360°.
    Full,
    /// 0-12-0 h, 0-180-0°: unsigned, with E or W.
    Halves,
    /// ±12 h, ±180°.
    PlusMinus,
}

/// The direction in which an hour circle's numbers grow.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Increases {
    /// With the hour angle.
    West,
    /// Against it, with right ascension.
    East,
}

/// An hour circle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct HourCircle {
    /// How the ring behaves.
    pub ring: Ring,
    /// The unit engraved.
    pub unit: Unit,
    /// How it is numbered.
    pub numbering: HourNumbering,
    /// Which way the numbers grow.
    pub increases: Increases,
    /// The smallest engraved division.
    pub division: Angle,
    /// The vernier's least count, if there is a vernier.
    pub vernier: Option<Angle>,
    /// A second mark 12 h away, read when the tube is east.
    pub second_fiducial: bool,
    /// One look's error (1 sigma), if the mount file states it.
    pub reading_error: Option<Angle>,
}

/// How a declination circle is numbered, in degrees.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum DeclinationNumbering {
    /// -90 to +90; beyond the pole it counts back.
    Signed,
    /// Four unsigned quarters 0-90-0, with N or S.
    Quarters,
    /// 0 at the north pole to 180 at the south pole.
    PolarDistance,
    /// 0 at the south pole to 180 at the north pole.
    SouthPolarDistance,
    /// 0 to 360, counted with the axis angle.
    Full,
}

/// A declination circle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct DeclinationCircle {
    /// How it is numbered.
    pub numbering: DeclinationNumbering,
    /// The smallest engraved division.
    pub division: Angle,
    /// The vernier's least count, if there is a vernier.
    pub vernier: Option<Angle>,
    /// Set by hand on a star, like a slipping ring.
    pub slips: bool,
    /// One look's error (1 sigma), if the mount file states it.
    pub reading_error: Option<Angle>,
}

/// Circles for tests.
#[cfg(test)]
pub(super) mod samples {
    use super::*;

    /// A fixed ring in hours numbered westward, 4-minute divisions, no vernier.
    pub(in crate::metal) fn hour_circle(numbering: HourNumbering) -> HourCircle {
        HourCircle {
            ring: Ring::Fixed,
            unit: Unit::Hours,
            numbering,
            increases: Increases::West,
            division: Angle::from_time_seconds(240.0),
            vernier: None,
            second_fiducial: false,
            reading_error: None,
        }
    }

    /// One-degree divisions, no vernier.
    pub(in crate::metal) fn declination_circle(
        numbering: DeclinationNumbering,
    ) -> DeclinationCircle {
        DeclinationCircle {
            numbering,
            division: Angle::from_degrees(1.0),
            vernier: None,
            slips: false,
            reading_error: None,
        }
    }
}
