//! The circles as told and as read, in the form the journal keeps.
//!
//! Angles in degrees: axis angles in (-180, 180], hour angle positive west, declination positive
//! north (mount errors not taken out: these are the shown angles).

use serde::{Deserialize, Serialize};

use crate::metal::Side;

/// What the circles were told to be set to.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Setting {
    /// The hour circle, as shown to the observer.
    pub hour: String,
    /// The declination circle, as shown to the observer.
    pub dec: String,
    /// The side of the pier it was meant for.
    pub side: Side,
    /// The shown hour axis angle.
    pub hour_axis_deg: f64,
    /// The shown declination axis angle.
    pub dec_axis_deg: f64,
}

/// A star (or any object) centred, and both circles read.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct StarReading {
    /// The star's name.
    pub star: String,
    /// Its observed hour angle at that moment.
    pub hour_angle_deg: f64,
    /// Its observed declination at that moment.
    pub declination_deg: f64,
    /// Local apparent sidereal time at that moment.
    pub sidereal_deg: f64,
    /// The side of the pier the tube was on.
    pub side: Side,
    /// The hour circle, as typed.
    pub hour: String,
    /// The declination circle, as typed.
    pub dec: String,
    /// The shown hour axis angle the reading was understood as.
    pub hour_axis_deg: f64,
    /// The shown declination axis angle the reading was understood as.
    pub dec_axis_deg: f64,
    /// Error of one look at the hour circle, 1 sigma.
    pub hour_sigma_deg: f64,
    /// Error of one look at the declination circle, 1 sigma.
    pub dec_sigma_deg: f64,
    /// The hour ring rides with the drive: its reading does not depend on the clock.
    #[serde(default)]
    pub driven: bool,
    /// The star was timed as it crossed the middle, with the circle set on a mark.
    #[serde(default)]
    pub timed: bool,
    /// How far on the sky the reading lay from what was expected, where anything was.
    #[serde(default)]
    pub off_arcmin: Option<f64>,
    /// False if it is kept in the record and not used in the estimate.
    #[serde(default = "used")]
    pub used: bool,
}

/// A reading is used unless it says otherwise.
const fn used() -> bool {
    true
}
