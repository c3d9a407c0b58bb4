//! The two frames of directions a mount stands in.
//!
//! Equatorial: x to the meridian on the equator, y to hour angle +6h, z to the north celestial pole.
//! Horizon: east, north, up.

use crate::angle::{Angle, Declination, HourAngle, Latitude};
use crate::metal::dual::Scalar;

/// The unit vector of a place in the equatorial frame.
pub fn direction(hour_angle: HourAngle, declination: Declination) -> [f64; 3] {
    let (sin_h, cos_h) = hour_angle.angle().radians().sin_cos();
    let (sin_d, cos_d) = declination.angle().radians().sin_cos();
    [cos_d * cos_h, cos_d * sin_h, sin_d]
}

/// +1 where the north end of the polar axis is the raised one, -1 where the south end is.
pub fn hemisphere(latitude: Latitude) -> f64 {
    if latitude.angle() >= Angle::ZERO {
        1.0
    } else {
        -1.0
    }
}

/// East, north and up of a direction of the equatorial frame.
pub fn to_horizon<S: Scalar>([x, y, z]: [S; 3], latitude: Latitude) -> [S; 3] {
    let (sin, cos) = latitude.angle().radians().sin_cos();
    let (sin, cos) = (S::from(sin), S::from(cos));
    [-y, z * cos - x * sin, x * cos + z * sin]
}

/// The direction of the equatorial frame that lies east, north and up by these.
pub fn from_horizon<S: Scalar>([east, north, up]: [S; 3], latitude: Latitude) -> [S; 3] {
    let (sin, cos) = latitude.angle().radians().sin_cos();
    let (sin, cos) = (S::from(sin), S::from(cos));
    [up * cos - north * sin, -east, north * cos + up * sin]
}
