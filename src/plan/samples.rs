//! Mounts and spans of hour angles, for the tests of this room.

use crate::angle::{Angle, HourAngle};
use crate::metal::{
    DeclinationCircle, DeclinationNumbering, ExpectedErrors, HourAngleSpan, HourCircle,
    HourNumbering, Increases, Kind, Limits, Mount, Ring,
};
use crate::sexagesimal::Unit;

/// A mount of a kind, with these limits.
pub fn mount(kind: Kind, limits: Limits) -> Mount {
    Mount {
        name: "trial".to_owned(),
        kind,
        clock_drive: true,
        hour_circle: HourCircle {
            ring: Ring::Fixed,
            unit: Unit::Hours,
            numbering: HourNumbering::Full,
            increases: Increases::West,
            division: Angle::from_time_seconds(240.0),
            vernier: None,
            second_fiducial: false,
            reading_error: None,
        },
        declination_circle: DeclinationCircle {
            numbering: DeclinationNumbering::Signed,
            division: Angle::from_degrees(1.0),
            vernier: None,
            slips: false,
            reading_error: None,
        },
        limits,
        expected: ExpectedErrors::default(),
        dome: None,
        tube: None,
        optics: Vec::new(),
    }
}

/// From one hour angle westward to another.
pub fn span(from_hours: f64, to_hours: f64) -> HourAngleSpan {
    let at = |hours| HourAngle::new(Angle::from_hours(hours));
    HourAngleSpan {
        from: at(from_hours),
        to: at(to_hours),
    }
}
