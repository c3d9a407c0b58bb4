//! The circles as told and as read, in the form the journal keeps.
//!
//! Angles in degrees: axis angles in (-180, 180], hour angle positive west, declination positive
//! north (mount errors not taken out: these are the shown angles).

use serde::{Deserialize, Serialize};

use crate::angle::{Angle, AxisAngle, Declination, HourAngle};
use crate::estimate::Sight;
use crate::metal::{Axes, OppositeVerniers, Side};

/// The two shown axis angles.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
pub struct ShownAxes {
    /// Of the hour axis.
    pub hour_deg: f64,
    /// Of the declination axis.
    pub dec_deg: f64,
}

/// What the circles were told to be set to.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Setting {
    /// The hour circle, as shown to the observer.
    pub hour: String,
    /// The declination circle, as shown to the observer.
    pub dec: String,
    /// The side of the pier it was meant for.
    pub side: Side,
    /// The shown axis angles they stand for.
    pub axes: ShownAxes,
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
    /// Every shown hour axis angle the reading can stand for; the estimate finds which was meant.
    pub hour_candidates_deg: Vec<f64>,
    /// Every shown declination axis angle the reading can stand for.
    pub dec_candidates_deg: Vec<f64>,
    /// Which of them the readings were taken to stand for at that moment.
    #[serde(default)]
    pub taken_as: Option<ShownAxes>,
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
    /// The circles of which both opposite verniers were read, and their mean taken.
    #[serde(default)]
    pub opposite: OppositeVerniers,
    /// What was typed at first and what it was then taken for, where the reading was doubted.
    #[serde(default)]
    pub doubted: String,
    /// How far on the sky the reading lay from what was expected, where anything was.
    #[serde(default)]
    pub off_arcmin: Option<f64>,
    /// False if it is kept in the record and not used in the estimate.
    #[serde(default = "used")]
    pub used: bool,
}

impl StarReading {
    /// A star whose circles showed this, in a sight of it.
    #[must_use]
    pub fn of_sight(star: &str, sight: &Sight, (hour, dec): (&str, &str)) -> Self {
        let degrees = |axes: &[AxisAngle]| axes.iter().map(|axis| axis.degrees()).collect();
        Self {
            star: star.to_owned(),
            hour_angle_deg: sight.hour_angle.degrees(),
            declination_deg: sight.declination.degrees(),
            sidereal_deg: 0.0,
            side: sight.side,
            hour: hour.trim().to_owned(),
            dec: dec.trim().to_owned(),
            hour_candidates_deg: degrees(&sight.hour),
            dec_candidates_deg: degrees(&sight.dec),
            taken_as: None,
            hour_sigma_deg: sight.sigma_hour.degrees(),
            dec_sigma_deg: sight.sigma_dec.degrees(),
            driven: false,
            timed: false,
            opposite: sight.opposite,
            doubted: String::new(),
            off_arcmin: None,
            used: true,
        }
    }

    /// The shown axis angles, if it is known which were meant.
    #[must_use]
    pub fn shown(&self) -> Option<ShownAxes> {
        match (
            self.taken_as,
            self.hour_candidates_deg.as_slice(),
            self.dec_candidates_deg.as_slice(),
        ) {
            (Some(shown), ..) => Some(shown),
            (None, &[hour_deg], &[dec_deg]) => Some(ShownAxes { hour_deg, dec_deg }),
            _ => None,
        }
    }

    /// What it tells the estimate: with everything the circles can mean by it, so that what was
    /// ambiguous then is settled by all the stars together.
    #[must_use]
    pub fn sight(&self) -> Sight {
        let axes = |degrees: &[f64]| {
            let degrees = degrees.iter().copied();
            degrees.map(AxisAngle::from_degrees).collect()
        };
        Sight {
            hour_angle: HourAngle::from_degrees(self.hour_angle_deg),
            declination: Declination::from_degrees(self.declination_deg),
            side: self.side,
            hour: axes(&self.hour_candidates_deg),
            dec: axes(&self.dec_candidates_deg),
            sigma_hour: Angle::from_degrees(self.hour_sigma_deg),
            sigma_dec: Angle::from_degrees(self.dec_sigma_deg),
            opposite: self.opposite,
        }
    }
}

impl From<Axes> for ShownAxes {
    fn from(axes: Axes) -> Self {
        Self {
            hour_deg: axes.hour.degrees(),
            dec_deg: axes.dec.degrees(),
        }
    }
}

impl From<ShownAxes> for Axes {
    fn from(shown: ShownAxes) -> Self {
        Self {
            hour: AxisAngle::from_degrees(shown.hour_deg),
            dec: AxisAngle::from_degrees(shown.dec_deg),
        }
    }
}

/// A reading is used unless it says otherwise.
const fn used() -> bool {
    true
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Degrees to radians and back, in degrees.
    const ROUNDING_DEG: f64 = 1e-12;

    fn unsigned() -> StarReading {
        StarReading {
            star: "Vega".to_owned(),
            hour_angle_deg: 61.5,
            declination_deg: 38.8,
            sidereal_deg: 301.25,
            side: Side::TubeEast,
            hour: "4h 06m W".to_owned(),
            dec: "38 45".to_owned(),
            hour_candidates_deg: vec![61.5],
            dec_candidates_deg: vec![38.75, -38.75, 141.25, -141.25],
            taken_as: None,
            hour_sigma_deg: 0.25,
            dec_sigma_deg: 0.15,
            driven: false,
            timed: false,
            opposite: OppositeVerniers::default(),
            doubted: String::new(),
            off_arcmin: None,
            used: true,
        }
    }

    #[test]
    fn the_estimate_is_given_all_that_a_reading_can_mean() {
        let sight = unsigned().sight();
        assert_eq!((sight.hour.len(), sight.dec.len()), (1, 4));
        assert!((sight.dec[2].degrees() - 141.25).abs() < ROUNDING_DEG);
        assert!((sight.hour_angle.degrees() - 61.5).abs() < ROUNDING_DEG);
        assert!((sight.sigma_dec.degrees() - 0.15).abs() < ROUNDING_DEG);
        assert_eq!(sight.side, Side::TubeEast);
    }

    #[test]
    fn where_the_tube_was_is_not_guessed_from_an_ambiguous_reading() {
        assert_eq!(unsigned().shown(), None);
        let (hour_deg, dec_deg) = (61.5, 141.25);
        let taken_as = Some(ShownAxes { hour_deg, dec_deg });
        let taken = StarReading {
            taken_as,
            ..unsigned()
        };
        assert_eq!(taken.shown(), taken_as);
        let plain = StarReading {
            dec_candidates_deg: vec![dec_deg],
            ..unsigned()
        };
        assert_eq!(plain.shown(), taken_as);
    }
}
