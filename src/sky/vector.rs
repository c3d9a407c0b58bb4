//! Directions as vectors, and the two frames a place on the sphere is written in.
//!
//! Local equatorial frame: x to hour angle 0 on the equator, y to hour angle +6h (west), z to the
//! north celestial pole. Horizon frame: east, north, up. A star's frame (ICRS, or the equator of
//! date) has x to right ascension 0 and y to 6h.

use sofars::vm;

use crate::angle::{Altitude, Angle, Azimuth, Declination, HourAngle, Latitude};

/// A direction or a place in space.
pub type Vector = [f64; 3];
/// A rotation, by rows.
pub type Matrix = [[f64; 3]; 3];

/// The unit vector at a longitude along a circle and a latitude from it.
#[must_use]
pub fn unit(along: Angle, above: Angle) -> Vector {
    vm::s2c(along.radians(), above.radians())
}

/// Longitude along and latitude above of a vector of any length.
#[must_use]
pub fn spherical(vector: &Vector) -> (Angle, Angle) {
    let (along, above) = vm::c2s(vector);
    (Angle::from_radians(along), Angle::from_radians(above))
}

/// A vector turned by a rotation.
#[must_use]
pub fn turned(rotation: &Matrix, vector: &Vector) -> Vector {
    let mut result = [0.0; 3];
    vm::rxp(rotation, vector, &mut result);
    result
}

/// A vector turned by the inverse of a rotation.
#[must_use]
pub fn turned_back(rotation: &Matrix, vector: &Vector) -> Vector {
    let mut result = [0.0; 3];
    vm::trxp(rotation, vector, &mut result);
    result
}

/// The sum of a vector and a multiple of another.
#[must_use]
pub fn plus(vector: &Vector, factor: f64, other: &Vector) -> Vector {
    vm::ppsp(vector, factor, other)
}

/// Length and unit vector.
#[must_use]
pub fn length_and_direction(vector: &Vector) -> (f64, Vector) {
    vm::pn(vector)
}

/// Azimuth and altitude of a place given by hour angle and declination.
#[must_use]
pub fn horizontal(hour: HourAngle, dec: Declination, latitude: Latitude) -> (Azimuth, Altitude) {
    let [x, y, z] = unit(hour.angle(), dec.angle());
    let (sin, cos) = latitude.angle().radians().sin_cos();
    // north, then east: azimuth runs from the first to the second
    let (azimuth, altitude) = spherical(&[z * cos - x * sin, -y, x * cos + z * sin]);
    (Azimuth::new(azimuth), Altitude::new(altitude))
}

/// Hour angle and declination of a place given by azimuth and altitude.
#[must_use]
pub fn equatorial(
    azimuth: Azimuth,
    altitude: Altitude,
    latitude: Latitude,
) -> (HourAngle, Declination) {
    let [north, east, up] = unit(azimuth.angle(), altitude.angle());
    let (sin, cos) = latitude.angle().radians().sin_cos();
    let (hour, dec) = spherical(&[up * cos - north * sin, -east, north * cos + up * sin]);
    (HourAngle::new(hour), Declination::new(dec))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Two turns of a unit vector in double precision, near the pole of either frame, in degrees.
    const ROUNDING_DEG: f64 = 1e-6;

    #[test]
    fn the_frames_stand_as_they_are_described() {
        let latitude = Latitude::from_degrees(50.0);
        let at = |hour: f64, dec: f64| {
            let (azimuth, altitude) = horizontal(
                HourAngle::from_degrees(hour),
                Declination::from_degrees(dec),
                latitude,
            );
            (azimuth.degrees(), altitude.degrees())
        };
        let near = |(az, alt): (f64, f64), (azimuth, altitude): (f64, f64)| {
            (az - azimuth).abs() < ROUNDING_DEG && (alt - altitude).abs() < ROUNDING_DEG
        };
        assert!(near(at(0.0, 0.0), (180.0, 40.0)), "south on the meridian");
        assert!(near(at(90.0, 0.0), (270.0, 0.0)), "west at six hours");
        assert!(near(at(-90.0, 0.0), (90.0, 0.0)), "east at minus six");
        assert!(near(at(0.0, 90.0), (0.0, 50.0)), "the pole is north");
    }

    #[test]
    fn there_and_back_is_the_same_place() {
        for latitude in [-90.0, -33.0, 0.0, 54.5, 90.0].map(Latitude::from_degrees) {
            for dec in [-89.0, -20.0, 0.0, 60.0] {
                for hour in [-179.0, -60.0, 0.5, 90.0, 180.0] {
                    let place = (
                        HourAngle::from_degrees(hour),
                        Declination::from_degrees(dec),
                    );
                    let (azimuth, altitude) = horizontal(place.0, place.1, latitude);
                    let (h, d) = equatorial(azimuth, altitude, latitude);
                    let off = (h.angle() - place.0.angle()).wrapped_signed();
                    assert!(off.abs().degrees() < ROUNDING_DEG);
                    assert!((d.degrees() - dec).abs() < ROUNDING_DEG);
                }
            }
        }
    }
}
