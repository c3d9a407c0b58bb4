//! A mount with known errors, and the files of readings its circles would give.
//!
//! The readings are by the exact geometry of the library, and by the definition of each circle,
//! written out here.

use std::fmt::Write as _;

use nonius::angle::Angle;
use nonius::catalog::Catalogue;
use nonius::metal::{Axes, MountErrors, Side, to_axes};
use nonius::site::{Folders, Shelf, builtin};
use nonius::sky::{Moment, Observed};
use nonius::time::Utc;

/// The errors of the pretended mount, in arcminutes, in the order of the report.
pub const TRUE: [f64; 7] = [205.0, -94.0, 14.0, -22.0, 9.0, -4.0, 1.5];

pub const NAMES: [&str; 7] = [
    "hour-circle index",
    "declination-circle index",
    "polar axis high",
    "polar axis east",
    "cone",
    "skew",
    "sag",
];

pub const NORTHERN: [&str; 12] = [
    "Vega",
    "Capella",
    "Altair",
    "Mirfak",
    "Deneb",
    "Hamal",
    "Caph",
    "Alpheratz",
    "Enif",
    "Algol",
    "Schedar",
    "Aldebaran",
];

pub const SOUTHERN: [&str; 12] = [
    "Fomalhaut",
    "Achernar",
    "Diphda",
    "Canopus",
    "Ankaa",
    "Rigel",
    "Hamal",
    "Acamar",
    "Peacock",
    "Aldebaran",
    "Mirach",
    "Menkar",
];

pub fn pretended() -> MountErrors {
    MountErrors::with_centred_circles(TRUE.map(Angle::from_arcminutes))
}

/// What the program needs to be told of a station.
pub struct Station {
    pub site: &'static str,
    pub mount: &'static str,
}

pub const TARN_HOLLOW: Station = Station {
    site: "tarn-hollow",
    mount: "six-inch",
};
pub const SALTPAN_RIDGE: Station = Station {
    site: "saltpan-ridge",
    mount: "portable",
};

impl Station {
    pub fn moment(&self, utc: &str) -> Moment {
        let nowhere = std::path::Path::new("no-such-folder");
        let site = Folders::at(nowhere, nowhere, nowhere)
            .site(self.site)
            .unwrap()
            .site;
        Moment::new(&site.observer(), Utc::parse(utc).unwrap())
    }

    /// Its mount with circles that are read to a second of time and a fifth of a minute.
    pub fn finely_read(&self) -> String {
        let mounts = builtin::files(Shelf::Mounts);
        let text = mounts
            .iter()
            .find(|file| file.id == self.mount)
            .unwrap()
            .text;
        let (hour, dec) = if self.mount == "six-inch" {
            ("4m", "1d")
        } else {
            ("10m", "2d")
        };
        let mut fine = text.to_owned();
        for (division, error) in [(hour, "1s"), (dec, "0.2'")] {
            let line = format!("division = \"{division}\"");
            assert_eq!(fine.matches(&line).count(), 1);
            fine = fine.replace(&line, &format!("reading-error = \"{error}\"\n{line}"));
        }
        fine
    }

    /// What the axes of the pretended mount show with a star in the middle.
    pub fn axes(&self, utc: &str, star: &str, side: Side) -> Axes {
        let moment = self.moment(utc);
        let place = observed(&moment, star);
        let latitude = moment.observer().latitude;
        to_axes(
            place.hour_angle,
            place.declination,
            latitude,
            &pretended(),
            side,
        )
        .unwrap()
    }

    /// What the circles show, in degrees on their scales: 0-24 westward on a ring that stands still
    /// and four quarters; or 0-24 eastward on a ring that rides with the drive, and signed.
    fn shown(&self, utc: &str, star: &str, side: Side) -> (f64, f64) {
        let moment = self.moment(utc);
        let axes = self.axes(utc, star, side);
        let (hour, dec) = (axes.hour.degrees(), axes.dec.degrees());
        let north = if dec.abs() > 90.0 {
            180.0_f64.copysign(dec) - dec
        } else {
            dec
        };
        if self.mount == "six-inch" {
            (hour.rem_euclid(360.0), north.abs())
        } else {
            (
                (moment.apparent_sidereal().degrees() - hour).rem_euclid(360.0),
                north,
            )
        }
    }
}

pub fn observed(moment: &Moment, star: &str) -> Observed {
    let star = Catalogue::builtin().resolve(star).unwrap();
    moment.observed(&moment.apparent(&star.source))
}

/// Units, minutes and seconds, with no more rounding than to a hundredth of a second.
fn sexagesimal(value: f64) -> String {
    let hundredths = (value.abs() * 360_000.0).round();
    let (seconds, minutes) = (
        hundredths.rem_euclid(6000.0) / 100.0,
        (hundredths / 6000.0).floor(),
    );
    let sign = if value < 0.0 { "-" } else { "" };
    format!(
        "{sign}{} {:02} {seconds:05.2}",
        (minutes / 60.0).floor(),
        minutes.rem_euclid(60.0)
    )
}

/// A file of readings, five minutes apart, the tube west and east by turns, each circle's number
/// rounded to so many degrees.
pub fn readings(station: &Station, stars: &[&str], (hour_step, dec_step): (f64, f64)) -> String {
    let rounded = |value: f64, step: f64| {
        if step > 0.0 {
            (value / step).round() * step
        } else {
            value
        }
    };
    let mut file = String::from("utc,star,hour,dec,side\n");
    for (index, star) in stars.iter().enumerate() {
        let minutes = 18 * 60 + 30 + index * 5;
        let utc = format!("2026-12-01T{:02}:{:02}:07Z", minutes / 60, minutes % 60);
        let side = if index % 2 == 0 {
            Side::TubeEast
        } else {
            Side::TubeWest
        };
        let (hour, dec) = station.shown(&utc, star, side);
        let hour = rounded(hour, hour_step).rem_euclid(360.0) / 15.0;
        let (hour, dec) = (sexagesimal(hour), sexagesimal(rounded(dec, dec_step)));
        writeln!(file, "{utc},{star},{hour},{dec},{side}").unwrap();
    }
    file
}

pub const EXACTLY: (f64, f64) = (0.0, 0.0);
/// The verniers of the six-inch mount: 20 s of time and 5'.
pub const AS_ENGRAVED: (f64, f64) = (20.0 / 240.0, 5.0 / 60.0);
