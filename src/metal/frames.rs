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

/// The unit vector across the direction of a place toward the north celestial pole, along the place's hour circle (at a
/// pole, too), in the equatorial frame.
pub fn northward(hour_angle: HourAngle, declination: Declination) -> [f64; 3] {
    let (sin_h, cos_h) = hour_angle.angle().radians().sin_cos();
    let (sin_d, cos_d) = declination.angle().radians().sin_cos();
    [-sin_d * cos_h, -sin_d * sin_h, cos_d]
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

/// The sum of two vectors.
pub fn sum([a, b, c]: [f64; 3], [x, y, z]: [f64; 3]) -> [f64; 3] {
    [a + x, b + y, c + z]
}

/// A vector made longer by a factor.
pub fn scaled([a, b, c]: [f64; 3], factor: f64) -> [f64; 3] {
    [a * factor, b * factor, c * factor]
}

/// The product of two vectors that is a number.
pub fn dot([a, b, c]: [f64; 3], [x, y, z]: [f64; 3]) -> f64 {
    a * x + b * y + c * z
}

/// The product of two vectors that is a vector; right-handed in the horizon frame.
pub fn cross([a, b, c]: [f64; 3], [x, y, z]: [f64; 3]) -> [f64; 3] {
    [b * z - c * y, c * x - a * z, a * y - b * x]
}
