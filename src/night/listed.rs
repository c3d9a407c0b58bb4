//! An object of the list as the journal keeps it: its name, and a place that needs no catalogue.
//!
//! Right ascension and declination in degrees at the equinox named; proper motion in milliseconds of
//! arc a year, that in right ascension measured on the sky (times the cosine of the declination).

use serde::{Deserialize, Serialize};

/// An object of a list.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct ListedTarget {
    /// The name it goes by.
    pub name: String,
    /// Where it is.
    pub place: ListedPlace,
    /// Other names, the usual ones first.
    #[serde(default)]
    pub also: Vec<String>,
    /// What it is, in words: "open cluster".
    #[serde(default)]
    pub kind: Option<String>,
    /// The catalogue it was found in.
    #[serde(default)]
    pub catalogue: Option<String>,
    /// The constellation's three letters.
    #[serde(default)]
    pub constellation: Option<String>,
    /// Visual magnitude.
    #[serde(default)]
    pub magnitude: Option<f64>,
    /// Greatest and least extent, in minutes of arc.
    #[serde(default)]
    pub size_arcmin: Option<[f64; 2]>,
    /// The observer's note in the list.
    #[serde(default)]
    pub note: String,
}

/// Where an object is.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(tag = "is", rename_all = "kebab-case")]
pub enum ListedPlace {
    /// A place among the stars.
    Fixed {
        /// Right ascension.
        ra_deg: f64,
        /// Declination, positive north.
        dec_deg: f64,
        /// The equinox: "ICRS", "J2000", "B1950", "J2026.9", "date".
        equinox: String,
        /// The Julian year of the place.
        epoch: f64,
        /// Proper motion in right ascension, on the sky, milliseconds of arc a year.
        #[serde(default)]
        pm_ra_mas: f64,
        /// Proper motion in declination, milliseconds of arc a year.
        #[serde(default)]
        pm_dec_mas: f64,
        /// Parallax, in milliseconds of arc.
        #[serde(default)]
        parallax_mas: f64,
        /// Velocity away from the Sun.
        #[serde(default)]
        radial_velocity_km_s: f64,
    },
    /// The Sun, the Moon or a planet.
    Body {
        /// Its name.
        body: String,
    },
    /// A name no catalogue knew: kept in the list, never dialled.
    Unknown,
}
