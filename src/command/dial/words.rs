//! Settings and clocks in words, for the page and for the lines.

use crate::angle::Angle;
use crate::dial::{Dial, Swing};
use crate::metal::Side;
use crate::sexagesimal::{Notation, Unit};
use crate::sky::compass_point;
use crate::time::SiderealTime;

/// A clock shows the second that has begun, not the nearest.
pub(super) fn sidereal(time: SiderealTime) -> String {
    let begun = Angle::from_time_seconds((time.angle().time_seconds() + 1e-6).floor());
    Notation::new(Unit::Hours, Angle::from_time_seconds(1.0)).write(begun)
}

/// An uncertainty as short as it can be said.
pub(super) fn sigma(angle: Angle) -> String {
    if angle.degrees() >= 3.0 {
        format!("{:.0}°", angle.degrees())
    } else if angle.degrees() >= 1.0 {
        format!("{:.1}°", angle.degrees())
    } else {
        format!("{:.0}'", angle.arcminutes().max(1.0))
    }
}

/// A chance in whole hundredths; never certain and never hopeless.
pub(super) fn percent(probability: f64) -> String {
    format!("{:.0} %", (probability * 100.0).clamp(1.0, 99.0))
}

/// Which way and how far to swing about each axis. With the tube east a growing declination axis
/// angle carries the tube southward, past the pole.
pub(super) fn swing(swing: Swing, side: Side) -> String {
    let hours = Notation::new(Unit::Hours, Angle::from_time_seconds(60.0)).write(swing.hour.abs());
    let degrees = Notation::new(Unit::Degrees, Angle::from_arcminutes(60.0)).write(swing.dec.abs());
    let hour_way = if swing.hour >= Angle::ZERO {
        "west"
    } else {
        "east"
    };
    let northward = (swing.dec >= Angle::ZERO) != (side == Side::TubeEast);
    format!(
        "{hours} {hour_way}, {degrees} {}",
        if northward { "north" } else { "south" }
    )
}

/// Altitude and direction.
pub(super) fn stand(dial: &Dial) -> String {
    let observed = dial.observed;
    format!(
        "altitude {:.0}°, azimuth {:.0}° ({})",
        observed.altitude.degrees(),
        observed.azimuth.degrees().round() % 360.0,
        compass_point(observed.azimuth)
    )
}
