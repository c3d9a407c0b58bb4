//! Where the tube was last known to be, and which way and how far to swing it from there.

use crate::angle::{Angle, AxisAngle};
use crate::metal::{Axes, Side};
use crate::time::{Utc, sidereal};

/// Where the tube was last known to be.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TubePlace {
    /// The axis angles shown there.
    pub axes: Axes,
    /// When they were shown.
    pub utc: Utc,
    /// The side of the pier.
    pub side: Side,
}

/// How far to swing each axis.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Swing {
    /// About the hour axis, positive west.
    pub hour: Angle,
    /// About the declination axis, positive in its axis angle: north with the tube west, and on
    /// through the pole with the tube east.
    pub dec: Angle,
}

impl TubePlace {
    /// The axis angles at a later instant: a clamped tube follows the sky where there is a clock
    /// drive, and stands still where there is none.
    #[must_use]
    pub fn axes_at(&self, utc: Utc, clock_drive: bool) -> Axes {
        if !clock_drive {
            return self.axes;
        }
        let turned =
            Angle::from_degrees(utc.seconds_since(self.utc) * sidereal::DEGREES_PER_SECOND);
        Axes {
            hour: AxisAngle::new(self.axes.hour.angle() + turned),
            dec: self.axes.dec,
        }
    }
}

impl Swing {
    /// From where the tube is to other axis angles, the short way round.
    #[must_use]
    pub fn between(from: Axes, to: Axes) -> Self {
        Self {
            hour: (to.hour.angle() - from.hour.angle()).wrapped_signed(),
            dec: (to.dec.angle() - from.dec.angle()).wrapped_signed(),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const START: &str = "2026-12-01T21:30:00Z";

    fn place() -> TubePlace {
        let axes = Axes {
            hour: AxisAngle::from_degrees(-45.0),
            dec: AxisAngle::from_degrees(32.5),
        };
        TubePlace {
            axes,
            utc: Utc::parse(START).unwrap(),
            side: Side::TubeWest,
        }
    }

    #[test]
    fn a_driven_tube_follows_the_sky_and_an_undriven_one_waits() {
        let sidereal_hour_later = place().utc.plus_seconds(3600.0 / 1.002_737_909);
        assert!((place().axes_at(sidereal_hour_later, true).hour.degrees() + 30.0).abs() < 1e-6);
        assert!((place().axes_at(sidereal_hour_later, false).hour.degrees() + 45.0).abs() < 1e-12);
    }

    #[test]
    fn the_swing_is_the_short_way_round() {
        let target = Axes {
            hour: AxisAngle::from_degrees(170.0),
            dec: AxisAngle::from_degrees(-10.0),
        };
        let swing = Swing::between(place().axes, target);
        assert!((swing.hour.degrees() + 145.0).abs() < 1e-9);
        assert!((swing.dec.degrees() + 42.5).abs() < 1e-9);
    }
}
