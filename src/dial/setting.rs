//! What to set on each circle, and what goes with it: the one value that screen, text and JSON print.

use nalgebra::Matrix2;

use crate::angle::Angle;
use crate::dial::caution::Caution;
use crate::dial::mark::NextMark;
use crate::dial::tube::Swing;
use crate::metal::{Axes, EyepiecePlace, Reading, Side, Slit};
use crate::sky::{Apparent, Observed};

/// What to set on the hour circle.
#[derive(Clone, Debug, PartialEq)]
pub struct HourSetting {
    /// The number under the index.
    pub reading: Reading,
    /// As engraved, rounded as the eye can set it.
    pub text: String,
    /// The next engraved mark the target crosses, on a circle that stands still.
    pub next_mark: Option<NextMark>,
}

/// What to set on the declination circle.
#[derive(Clone, Debug, PartialEq)]
pub struct DeclinationSetting {
    /// The number under the index.
    pub reading: Reading,
    /// As engraved, rounded as the eye can set it.
    pub text: String,
}

/// How uncertain the settings are by what is known of the mount, 1 sigma each.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Uncertainty {
    /// Of the hour axis angle.
    pub hour: Angle,
    /// Of the declination axis angle.
    pub dec: Angle,
}

/// The chance that the target is in an optic's field at the first look.
#[derive(Clone, Debug, PartialEq)]
pub struct Chance {
    /// The optic's name.
    pub optic: String,
    /// The diameter of its field.
    pub field: Angle,
    /// 0 to 1.
    pub probability: f64,
}

/// What to set on each circle for a target at an instant, and what goes with it.
#[derive(Clone, Debug, PartialEq)]
pub struct Dial {
    /// The target's name.
    pub target: String,
    /// The side of the pier it is for.
    pub side: Side,
    /// Topocentric apparent place, airless, on the true equator and equinox of date.
    pub of_date: Apparent,
    /// The same with refraction.
    pub observed: Observed,
    /// The axis angles to be shown, index errors included.
    pub axes: Axes,
    /// The hour circle.
    pub hour: HourSetting,
    /// The declination circle.
    pub dec: DeclinationSetting,
    /// How uncertain they are.
    pub uncertainty: Uncertainty,
    /// Covariance of where the tube then looks about the place dialled, setting included, in square radians on the sky,
    /// west first.
    pub sky: Matrix2<f64>,
    /// The chance for each optic.
    pub chances: Vec<Chance>,
    /// The same with the hour circle set exactly on the next mark and the object let drift in; none
    /// where the ring rides with the drive.
    pub chances_on_the_mark: Vec<Chance>,
    /// How far to swing from where the tube was last known to be.
    pub swing: Option<Swing>,
    /// Where the slit must stand.
    pub slit: Option<Slit>,
    /// Where the eyepiece will be.
    pub eyepiece: Option<EyepiecePlace>,
    /// What to know before following the settings, the gravest first.
    pub cautions: Vec<Caution>,
}
