//! A site file: the place, its air, its horizon, and which mount stands there.
//!
//! Latitude north positive, longitude east positive, degrees; elevation in metres, pressure in hPa,
//! temperature in degrees Celsius, UT1-UTC in seconds.

use std::ops::Range;

use crate::angle::{Altitude, Azimuth, Latitude, Longitude};
use crate::bounds::{
    AZIMUTH, DUT1, ELEVATION, LATITUDE, LONGITUDE, MASK_ALTITUDE, PRESSURE, TEMPERATURE,
};
use crate::sexagesimal::Half;
use crate::site::document::{self, Section};
use crate::site::fault::{Faults, FileText};
use crate::site::value::Value;
use crate::site::written_angle;
use crate::sky::{Air, HorizonMask, Observer};
use crate::time::{CivilZone, Dut1};

/// A place to observe from.
#[derive(Clone, Debug, PartialEq)]
pub struct Site {
    /// The name of its file, without folder and ending.
    pub id: String,
    /// Its name for people.
    pub name: String,
    /// North positive.
    pub latitude: Latitude,
    /// East positive.
    pub longitude: Longitude,
    /// Metres above the sea.
    pub elevation_m: f64,
    /// Its civil time.
    pub zone: CivilZone,
    /// The name of the mount's file.
    pub mount: String,
    /// The air there: as given, else the standard atmosphere at the elevation.
    pub air: Air,
    /// UT1 - UTC.
    pub dut1: Dut1,
    /// What trees, walls and hills leave of the sky.
    pub horizon: HorizonMask,
}

/// A site and the file it came from.
#[derive(Clone, Debug, PartialEq)]
pub struct SiteFile {
    /// The site.
    pub site: Site,
    /// The file, untouched.
    pub file: FileText,
    /// Where the file names its mount.
    pub mount_at: Range<usize>,
}

impl Site {
    /// An observer at the site.
    #[must_use]
    pub const fn observer(&self) -> Observer {
        Observer {
            latitude: self.latitude,
            longitude: self.longitude,
            elevation_m: self.elevation_m,
            dut1: self.dut1,
            air: self.air,
        }
    }
}

impl SiteFile {
    /// Reads a site from the text of its file; `id` is the file's name without folder and ending.
    pub fn read(id: &str, file: FileText) -> Result<Self, Faults> {
        match document::read(&file, |top| site(top, id)) {
            Ok((site, mount_at)) => Ok(Self {
                site,
                file,
                mount_at,
            }),
            Err(faults) => Err(Faults::new(file, faults)),
        }
    }
}

fn site(top: &mut Section<'_>, id: &str) -> Option<(Site, Range<usize>)> {
    let name = top.required("name").and_then(|v| v.text("the site's name"));
    let latitude = top
        .required("latitude")
        .and_then(|v| written_angle::degrees(&v, &LATITUDE, [Half::North, Half::South]));
    let longitude = top
        .required("longitude")
        .and_then(|v| written_angle::degrees(&v, &LONGITUDE, [Half::East, Half::West]));
    let elevation_m = top
        .required("elevation-m")
        .and_then(|v| v.number(&ELEVATION));
    let zone = top.required("time-zone").and_then(|v| zone(&v));
    let mount = top.required("mount").and_then(|v| {
        let name = v.text("the name of a mount's file, as \"six-inch\"")?;
        Some((name.to_owned(), v.span()))
    });
    let pressure_hpa = top
        .optional("pressure-hpa")
        .and_then(|v| v.number(&PRESSURE));
    let temperature_c = top
        .optional("temperature-c")
        .and_then(|v| v.number(&TEMPERATURE));
    let dut1 = top
        .optional("dut1-s")
        .and_then(|v| v.number(&DUT1))
        .map(Dut1::from_seconds);
    let horizon = top.optional("horizon").map(|v| horizon(&v));
    let (elevation_m, (mount, mount_at)) = (elevation_m?, mount?);
    let standard = Air::standard(elevation_m);
    let site = Site {
        id: id.to_owned(),
        name: name?.to_owned(),
        latitude: Latitude::from_degrees(latitude?),
        longitude: Longitude::from_degrees(longitude?),
        elevation_m,
        zone: zone?,
        mount,
        air: Air {
            pressure_hpa: pressure_hpa.unwrap_or(standard.pressure_hpa),
            temperature_c: temperature_c.unwrap_or(standard.temperature_c),
        },
        dut1: dut1.transpose().ok()?.unwrap_or_default(),
        horizon: horizon.unwrap_or_default(),
    };
    Some((site, mount_at))
}

fn zone(value: &Value<'_>) -> Option<CivilZone> {
    let text = value.text("the name of a time zone, as \"Europe/London\"")?;
    match text.parse::<CivilZone>() {
        Ok(zone) => Some(zone),
        Err(unknown) => {
            let hint = unknown.nearest.map_or_else(
                || "write the zone's IANA name, as \"Europe/London\"".to_owned(),
                |nearest| format!("did you mean {nearest}?"),
            );
            value.fault(unknown.to_string(), hint);
            None
        }
    }
}

fn horizon(value: &Value<'_>) -> HorizonMask {
    const WANTED: &str = "a list of points, each [azimuth, altitude] in degrees";
    let points = value.items(WANTED).unwrap_or_default();
    let mask = points.iter().filter_map(|point| {
        let numbers = point.items(WANTED)?;
        let [azimuth, altitude] = numbers.as_slice() else {
            point.fault(
                format!(
                    "a point of the horizon has two numbers, this has {}",
                    numbers.len()
                ),
                "write [azimuth, altitude] in degrees",
            );
            return None;
        };
        let (azimuth, altitude) = (azimuth.number(&AZIMUTH), altitude.number(&MASK_ALTITUDE));
        Some((
            Azimuth::from_degrees(azimuth?),
            Altitude::from_degrees(altitude?),
        ))
    });
    HorizonMask::new(mask.collect())
}

#[cfg(test)]
mod tests {
    use super::*;

    const GOOD: &str = "name = \"Here\"\nlatitude = \"54 31 12 N\"\nlongitude = \"2 12 36 W\"\n\
        elevation-m = 352\ntime-zone = \"Europe/London\"\nmount = \"six-inch\"\n";

    /// Rounding of a sum of three parts, in degrees.
    const ROUNDING_DEG: f64 = 1e-12;

    fn read(text: &str) -> Result<SiteFile, Faults> {
        let file = FileText {
            name: "here.toml".to_owned(),
            text: text.to_owned(),
        };
        SiteFile::read("here", file)
    }

    #[test]
    fn letters_signs_and_numbers_give_the_same_place() {
        for (latitude, longitude) in [
            ("\"54 31 12 N\"", "\"2 12 36 W\""),
            ("\"+54 31 12\"", "\"-2 12 36\""),
            ("54.52", "-2.21"),
            ("\"54d31m12s N\"", "\"2d 12' 36\\\" W\""),
        ] {
            let text = GOOD
                .replace("\"54 31 12 N\"", latitude)
                .replace("\"2 12 36 W\"", longitude);
            let site = read(&text).unwrap().site;
            assert!(
                (site.latitude.degrees() - 54.52).abs() < ROUNDING_DEG,
                "{latitude}"
            );
            assert!(
                (site.longitude.degrees() + 2.21).abs() < ROUNDING_DEG,
                "{longitude}"
            );
        }
    }

    #[test]
    fn what_is_not_given_is_the_standard_atmosphere_and_a_level_horizon() {
        let site = read(GOOD).unwrap().site;
        assert_eq!(site.air, Air::standard(352.0));
        assert_eq!(site.dut1, Dut1::default());
        assert!(site.horizon.points().is_empty());
        assert_eq!(
            (site.id.as_str(), site.mount.as_str()),
            ("here", "six-inch")
        );
    }

    #[test]
    fn no_pressure_switches_refraction_off_and_keeps_the_temperature() {
        let site = read(&format!("{GOOD}pressure-hpa = 0\ntemperature-c = -4\n"))
            .unwrap()
            .site;
        assert_eq!((site.air.pressure_hpa, site.air.temperature_c), (0.0, -4.0));
    }

    #[test]
    fn the_text_comes_back_untouched() {
        let text = format!("# mine\n{GOOD}");
        assert_eq!(read(&text).unwrap().file.text, text);
    }
}
