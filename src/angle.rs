//! Angles, each kind its own type.
//!
//! Inside the program every angle is held in radians; a unit stands in the name wherever a number
//! leaves a type. Signs, everywhere: hour angle positive **west**, declination positive **north**,
//! longitude positive **east** (ISO 6709), azimuth from north through east.
//!
//! [`Angle`] is a plain difference or size of any magnitude. The other types are directions and are
//! brought into their range when made, so two equal directions compare equal.

use std::f64::consts::{PI, TAU};
use std::ops::{Add, AddAssign, Div, Mul, Neg, Sub};

/// An angle of any magnitude and either sign, in radians.
#[derive(Clone, Copy, Debug, Default, PartialEq, PartialOrd)]
pub struct Angle(f64);

impl Angle {
    /// No angle at all.
    pub const ZERO: Self = Self(0.0);
    /// 180 degrees, twelve hours.
    pub const HALF_TURN: Self = Self(PI);
    /// 360 degrees, twenty-four hours.
    pub const TURN: Self = Self(TAU);

    /// From radians.
    #[must_use]
    pub const fn from_radians(radians: f64) -> Self {
        Self(radians)
    }

    /// From degrees.
    #[must_use]
    pub const fn from_degrees(degrees: f64) -> Self {
        Self(degrees.to_radians())
    }

    /// From hours of 15 degrees.
    #[must_use]
    pub const fn from_hours(hours: f64) -> Self {
        Self::from_degrees(hours * 15.0)
    }

    /// From minutes of arc.
    #[must_use]
    pub const fn from_arcminutes(arcminutes: f64) -> Self {
        Self::from_degrees(arcminutes / 60.0)
    }

    /// From seconds of arc.
    #[must_use]
    pub const fn from_arcseconds(arcseconds: f64) -> Self {
        Self::from_degrees(arcseconds / 3600.0)
    }

    /// From seconds of time, of which 86,400 make a turn.
    #[must_use]
    pub const fn from_time_seconds(seconds: f64) -> Self {
        Self::from_degrees(seconds / 240.0)
    }

    /// In radians.
    #[must_use]
    pub const fn radians(self) -> f64 {
        self.0
    }

    /// In degrees.
    #[must_use]
    pub const fn degrees(self) -> f64 {
        self.0.to_degrees()
    }

    /// In hours of 15 degrees.
    #[must_use]
    pub const fn hours(self) -> f64 {
        self.degrees() / 15.0
    }

    /// In minutes of arc.
    #[must_use]
    pub const fn arcminutes(self) -> f64 {
        self.degrees() * 60.0
    }

    /// In seconds of arc.
    #[must_use]
    pub const fn arcseconds(self) -> f64 {
        self.degrees() * 3600.0
    }

    /// In seconds of time, of which 86,400 make a turn.
    #[must_use]
    pub const fn time_seconds(self) -> f64 {
        self.degrees() * 240.0
    }

    /// The same direction in (-180°, 180°].
    #[must_use]
    pub fn wrapped_signed(self) -> Self {
        let positive = self.0.rem_euclid(TAU);
        Self(if positive > PI {
            positive - TAU
        } else {
            positive
        })
    }

    /// The same direction in [0°, 360°).
    #[must_use]
    pub fn wrapped_positive(self) -> Self {
        let positive = self.0.rem_euclid(TAU);
        // rem_euclid of a tiny negative number rounds up to a full turn
        Self(if positive >= TAU { 0.0 } else { positive })
    }

    /// Without its sign.
    #[must_use]
    pub const fn abs(self) -> Self {
        Self(self.0.abs())
    }

    /// Sine.
    #[must_use]
    pub fn sin(self) -> f64 {
        self.0.sin()
    }

    /// Cosine.
    #[must_use]
    pub fn cos(self) -> f64 {
        self.0.cos()
    }

    /// Tangent.
    #[must_use]
    pub fn tan(self) -> f64 {
        self.0.tan()
    }

    /// False for a value that came of a division by nothing.
    #[must_use]
    pub const fn is_finite(self) -> bool {
        self.0.is_finite()
    }
}

impl Add for Angle {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self(self.0 + other.0)
    }
}

impl AddAssign for Angle {
    fn add_assign(&mut self, other: Self) {
        self.0 += other.0;
    }
}

impl Sub for Angle {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Self(self.0 - other.0)
    }
}

impl Neg for Angle {
    type Output = Self;
    fn neg(self) -> Self {
        Self(-self.0)
    }
}

impl Mul<f64> for Angle {
    type Output = Self;
    fn mul(self, factor: f64) -> Self {
        Self(self.0 * factor)
    }
}

impl Div<f64> for Angle {
    type Output = Self;
    fn div(self, divisor: f64) -> Self {
        Self(self.0 / divisor)
    }
}

impl Div for Angle {
    type Output = f64;
    fn div(self, other: Self) -> f64 {
        self.0 / other.0
    }
}

/// Defines a direction: an [`Angle`] brought into its range by the named function when it is made.
macro_rules! direction {
    ($(#[$doc:meta])* $name:ident, $wrap:ident) => {
        $(#[$doc])*
        #[derive(Clone, Copy, Debug, Default, PartialEq, PartialOrd)]
        pub struct $name(Angle);

        impl $name {
            /// From an angle of any magnitude.
            #[must_use]
            pub fn new(angle: Angle) -> Self {
                Self(angle.$wrap())
            }

            /// From degrees of any magnitude.
            #[must_use]
            pub fn from_degrees(degrees: f64) -> Self {
                Self::new(Angle::from_degrees(degrees))
            }

            /// As a plain angle.
            #[must_use]
            pub const fn angle(self) -> Angle {
                self.0
            }

            /// In degrees.
            #[must_use]
            pub const fn degrees(self) -> f64 {
                self.0.degrees()
            }
        }
    };
}
pub(crate) use direction;

impl Angle {
    /// The same height above a plane, in [-90°, 90°]: what lies beyond is held at the pole.
    #[must_use]
    fn held_to_quarter(self) -> Self {
        Self(self.0.clamp(-PI / 2.0, PI / 2.0))
    }
}

direction!(
    /// Angle west of the meridian about the celestial pole, in (-180°, 180°]; negative east.
    HourAngle,
    wrapped_signed
);
direction!(
    /// Angle north of the celestial equator, in [-90°, 90°].
    Declination,
    held_to_quarter
);
direction!(
    /// Right ascension, in [0°, 360°).
    RightAscension,
    wrapped_positive
);
direction!(
    /// Angle of one axis of a mount from its zero, in (-180°, 180°].
    ///
    /// On the hour axis it is positive west. On the declination axis it is positive north, and runs
    /// on through the pole beyond 90° when the tube reaches over from the other side of the pier.
    AxisAngle,
    wrapped_signed
);
direction!(
    /// Direction along the horizon from north through east, in [0°, 360°).
    Azimuth,
    wrapped_positive
);
direction!(
    /// Height above the level horizon, in [-90°, 90°].
    Altitude,
    held_to_quarter
);
direction!(
    /// Geographic latitude, positive north, in [-90°, 90°].
    Latitude,
    held_to_quarter
);
direction!(
    /// Geographic longitude, positive east, in (-180°, 180°].
    Longitude,
    wrapped_signed
);

#[cfg(test)]
mod tests {
    use super::*;

    /// Rounding of a few additions near one turn, in degrees.
    const ROUNDING_DEG: f64 = 1e-12;

    #[test]
    fn the_signed_range_holds_plus_half_a_turn_and_not_minus() {
        assert!(
            (Angle::from_degrees(-180.0).wrapped_signed().degrees() - 180.0).abs() < ROUNDING_DEG
        );
        assert!(
            (Angle::from_degrees(180.0).wrapped_signed().degrees() - 180.0).abs() < ROUNDING_DEG
        );
        assert!(
            (Angle::from_degrees(540.1).wrapped_signed().degrees() + 179.9).abs() < ROUNDING_DEG
        );
    }

    #[test]
    fn the_positive_range_never_shows_a_full_turn() {
        assert!(Angle::from_radians(-1e-30).wrapped_positive().radians() < TAU);
        assert!(
            (Angle::from_degrees(-90.0).wrapped_positive().degrees() - 270.0).abs() < ROUNDING_DEG
        );
    }

    #[test]
    fn one_hour_is_fifteen_degrees_and_a_second_of_time_fifteen_of_arc() {
        assert!((Angle::from_hours(1.0).degrees() - 15.0).abs() < ROUNDING_DEG);
        assert!((Angle::from_time_seconds(1.0).arcseconds() - 15.0).abs() < ROUNDING_DEG);
    }
}
