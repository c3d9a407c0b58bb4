//! The ranges of what is written in files and options, each declared once with its human name.
//!
//! The parser, the message and the manual all read this table.

use std::fmt;

/// A named closed range of a number in a stated unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bound {
    /// What the number is, as an observer would call it.
    pub name: &'static str,
    /// Its unit in the plural, or nothing for a plain number.
    pub unit: &'static str,
    /// The least value allowed.
    pub least: f64,
    /// The greatest value allowed.
    pub greatest: f64,
}

impl Bound {
    const fn new(name: &'static str, unit: &'static str, least: f64, greatest: f64) -> Self {
        Self {
            name,
            unit,
            least,
            greatest,
        }
    }

    /// The value itself if it lies in the range; a value that is not a number never does.
    pub fn check(&self, value: f64) -> Result<f64, OutOfBounds> {
        if value >= self.least && value <= self.greatest {
            Ok(value)
        } else {
            Err(OutOfBounds {
                bound: *self,
                value,
            })
        }
    }
}

/// A number outside its range.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
pub struct OutOfBounds {
    /// The range it should lie in.
    pub bound: Bound,
    /// The number found.
    pub value: f64,
}

impl fmt::Display for OutOfBounds {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let Bound {
            name,
            unit,
            least,
            greatest,
        } = self.bound;
        write!(f, "{name} {} is outside {least} to {greatest}", self.value)?;
        if unit.is_empty() {
            Ok(())
        } else {
            write!(f, " {unit}")
        }
    }
}

/// Geographic latitude, north positive.
pub const LATITUDE: Bound = Bound::new("latitude", "degrees", -90.0, 90.0);
/// Geographic longitude, east positive.
pub const LONGITUDE: Bound = Bound::new("longitude", "degrees", -180.0, 180.0);
/// Height of the site above sea level: from the Dead Sea's shore to above the highest summit.
pub const ELEVATION: Bound = Bound::new("elevation", "metres", -500.0, 9000.0);
/// Air pressure at the site; zero stands for no refraction.
pub const PRESSURE: Bound = Bound::new("pressure", "hPa", 0.0, 1100.0);
/// Air temperature at the site.
pub const TEMPERATURE: Bound = Bound::new("temperature", "degrees Celsius", -80.0, 60.0);
/// UT1 - UTC, kept within 0.9 s by leap seconds (ITU-R TF.460).
pub const DUT1: Bound = Bound::new("UT1-UTC", "seconds", -0.9, 0.9);
/// Declination, north positive.
pub const DECLINATION: Bound = Bound::new("declination", "degrees", -90.0, 90.0);
/// Right ascension.
pub const RIGHT_ASCENSION: Bound = Bound::new("right ascension", "degrees", 0.0, 360.0);
/// Hour angle at which a side of the pier is left, west positive.
pub const LIMIT_HOUR_ANGLE: Bound = Bound::new("hour angle", "hours", -12.0, 12.0);
/// Azimuth from north through east.
pub const AZIMUTH: Bound = Bound::new("azimuth", "degrees", 0.0, 360.0);
/// Altitude of the horizon mask.
pub const MASK_ALTITUDE: Bound = Bound::new("altitude", "degrees", 0.0, 90.0);
/// Lowest altitude the mount may be used at.
pub const LOWEST_ALTITUDE: Bound = Bound::new("lowest altitude", "degrees", -5.0, 90.0);
/// Year of an equinox or of an epoch: the precession model is good far beyond.
pub const EQUINOX_YEAR: Bound = Bound::new("year of the equinox", "", 1750.0, 2200.0);
/// Year of the epoch of a place.
pub const EPOCH: Bound = Bound::new("epoch", "", 1750.0, 2200.0);
/// Field of an optic.
pub const FIELD: Bound = Bound::new("field", "degrees", 0.001, 60.0);
/// Place of an eyepiece about the tube.
pub const TURNED: Bound = Bound::new("turned", "degrees", 0.0, 360.0);
/// Smallest engraved division of a circle, or the least count of its vernier.
pub const DIVISION: Bound = Bound::new("division", "seconds of arc", 1.0, 324_000.0);
/// Error of one look at a circle, 1 sigma.
pub const READING_ERROR: Bound = Bound::new("reading error", "degrees", 1e-5, 15.0);
/// How large an error of the mount is expected to be, 1 sigma; zero for none.
pub const EXPECTED_ERROR: Bound = Bound::new("expected error", "degrees", 0.0, 30.0);
/// What is expected of a circle's eccentricity: a circle farther off its centre is seen to wobble.
pub const ECCENTRICITY: Bound = Bound::new("eccentricity of a circle", "degrees", 0.0, 3.0);
/// Radius of a dome.
pub const DOME_RADIUS: Bound = Bound::new("radius of the dome", "metres", 0.5, 50.0);
/// Where the axes cross, from the centre of the dome, in each direction.
pub const AXES_IN_DOME: Bound =
    Bound::new("distance from the dome's centre", "metres", -50.0, 50.0);
/// Distance of the tube from the crossing of the axes.
pub const TUBE_OFFSET: Bound = Bound::new("offset of the tube", "metres", 0.0, 20.0);
/// Distance of the eyepiece along the tube, negative toward the sky.
pub const EYEPIECE: Bound = Bound::new("distance of the eyepiece", "metres", -30.0, 30.0);
/// Height of the crossing of the axes above the floor.
pub const AXES_ABOVE_FLOOR: Bound = Bound::new("height of the axes", "metres", 0.0, 30.0);
/// Magnitude of a target, from the Sun's to fainter than any eyepiece shows.
pub const MAGNITUDE: Bound = Bound::new("magnitude", "", -27.0, 40.0);
/// Proper motion in one direction; the fastest star moves 10,400 mas a year.
pub const PROPER_MOTION: Bound = Bound::new("proper motion", "mas a year", -20_000.0, 20_000.0);
/// Parallax; that of the nearest star is 768 mas. A measured one may come out a little below zero.
pub const PARALLAX: Bound = Bound::new("parallax", "mas", -100.0, 1_000.0);
/// Year of an epoch or of a passage of perihelion.
pub const YEAR: Bound = Bound::new("year", "", 1.0, 3000.0);
/// Month of the year.
pub const MONTH: Bound = Bound::new("month", "", 1.0, 12.0);
/// Day of the month, with its fraction.
pub const DAY: Bound = Bound::new("day", "", 1.0, 32.0);
/// Least distance of a comet from the Sun: from within it to beyond the farthest seen.
pub const PERIHELION_DISTANCE: Bound = Bound::new("perihelion distance", "au", 1e-3, 200.0);
/// Half the length of an ellipse.
pub const SEMIMAJOR_AXIS: Bound = Bound::new("semimajor axis", "au", 0.1, 1e6);
/// Eccentricity of any orbit about the Sun; the largest seen is about 6.
pub const ECCENTRICITY_OF_AN_ORBIT: Bound = Bound::new("eccentricity", "", 0.0, 20.0);
/// Eccentricity of an ellipse, which stays below 1.
pub const ECCENTRICITY_OF_AN_ELLIPSE: Bound = Bound::new("eccentricity", "", 0.0, 0.999_999_9);
/// Inclination to the ecliptic, above 90° for a body that runs backward.
pub const INCLINATION: Bound = Bound::new("inclination", "degrees", 0.0, 180.0);
/// Longitude of the ascending node.
pub const NODE: Bound = Bound::new("longitude of the node", "degrees", 0.0, 360.0);
/// Argument of perihelion.
pub const ARGUMENT_OF_PERIHELION: Bound =
    Bound::new("argument of perihelion", "degrees", 0.0, 360.0);
/// Mean anomaly.
pub const MEAN_ANOMALY: Bound = Bound::new("mean anomaly", "degrees", 0.0, 360.0);
/// Magnitude at one au from Sun and observer.
pub const ABSOLUTE_MAGNITUDE: Bound = Bound::new("absolute magnitude", "", -10.0, 45.0);
/// The slope parameter G of a minor planet.
pub const SLOPE_PARAMETER: Bound = Bound::new("slope parameter", "", -1.0, 1.0);
/// The power n of a comet's distance from the Sun.
pub const POWER_OF_DISTANCE: Bound = Bound::new("power of the distance", "", -50.0, 100.0);
/// Length or width of a target.
pub const SIZE: Bound = Bound::new("size", "minutes of arc", 0.0, 5400.0);

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_message_names_the_thing_the_value_and_the_range() {
        let said = LATITUDE.check(95.0).unwrap_err().to_string();
        assert_eq!(said, "latitude 95 is outside -90 to 90 degrees");
    }

    #[test]
    fn what_is_not_a_number_is_never_in_range() {
        assert!(DUT1.check(f64::NAN).is_err());
        assert!(DUT1.check(0.9).is_ok());
    }
}
