//! Circles as they are built, and what an observer makes of them: numbers rounded to what the eye can set, typed and read
//! back with all they can mean.
//!
//! Small portable mounts, larger ones, observatory refractors (common practice, no source).

use nonius::angle::{Angle, AxisAngle};
use nonius::estimate::Sight;
use nonius::metal::typed::{read_dec, read_hour};
use nonius::metal::{
    Axes, DeclinationCircle, DeclinationNumbering, HourCircle, HourNumbering, Increases, Ring,
};
use nonius::sexagesimal::Unit;
use nonius::time::SiderealTime;

use crate::chance::Chance;
use crate::sky::{Hand, Place, Sky, sight};

/// A pair of circles.
#[derive(Clone, Copy, Debug)]
pub struct Circles {
    pub name: &'static str,
    pub hour: HourCircle,
    pub dec: DeclinationCircle,
}

impl Circles {
    /// The three kinds.
    pub fn kinds() -> [Self; 3] {
        [
            Self {
                name: "small portable: 10 min and 2°",
                hour: hour(600.0, None, HourNumbering::Full, Increases::East),
                dec: dec(120.0, None, DeclinationNumbering::Signed),
            },
            Self {
                name: "large portable: 5 min and 1°",
                hour: hour(300.0, None, HourNumbering::Halves, Increases::West),
                dec: dec(60.0, None, DeclinationNumbering::Quarters),
            },
            Self {
                name: "observatory: 1 min to 4 s, 10' to 10\"",
                hour: hour(60.0, Some(4.0), HourNumbering::Full, Increases::West),
                dec: dec(10.0, Some(1.0 / 6.0), DeclinationNumbering::Quarters),
            },
        ]
    }

    /// How well they are read and set in one look.
    pub fn hand(&self) -> Hand {
        Hand {
            hour: self.hour.look_error(),
            dec: self.dec.look_error(),
        }
    }

    /// A star centred, both circles read and typed as they are engraved.
    pub fn read(&self, sky: &Sky, chance: &mut Chance, place: &Place) -> Sight {
        let hand = self.hand();
        let shown = sky.shown(place);
        let seen = seen(chance, shown, hand);
        let sidereal = SiderealTime::default();
        let hour = self.hour.reading(seen.hour, sidereal, place.side);
        let hour = read_hour(&self.hour, &self.hour.scale().text(hour)).unwrap();
        let dec = self.dec.reading(seen.dec);
        let dec = read_dec(&self.dec, &self.dec.scale().text(dec)).unwrap();
        Sight {
            hour: self.hour.candidates(hour, sidereal, place.side),
            dec: self.dec.candidates(dec),
            ..sight(place, hand)
        }
    }

    /// Where the tube stands once the circles were set as told in figures.
    pub fn set(&self, chance: &mut Chance, told: Axes, place: &Place) -> Axes {
        let sidereal = SiderealTime::default();
        let hour = self.hour.reading(told.hour, sidereal, place.side);
        let dec = self.dec.reading(told.dec);
        let hour = read_hour(&self.hour, &self.hour.scale().text(hour)).unwrap();
        let dec = read_dec(&self.dec, &self.dec.scale().text(dec)).unwrap();
        let near = |candidates: &[AxisAngle], told| {
            nonius::estimate::nearest(candidates, told).expect("a number of the circle")
        };
        let rounded = Axes {
            hour: near(&self.hour.candidates(hour, sidereal, place.side), told.hour),
            dec: near(&self.dec.candidates(dec), told.dec),
        };
        seen(chance, rounded, self.hand())
    }
}

fn seen(chance: &mut Chance, shown: Axes, hand: Hand) -> Axes {
    let mut off = |axis: AxisAngle, sigma: Angle| {
        AxisAngle::new(axis.angle() + Angle::from_radians(chance.normal(sigma.radians())))
    };
    Axes {
        hour: off(shown.hour, hand.hour),
        dec: off(shown.dec, hand.dec),
    }
}

fn hour(
    division_s: f64,
    vernier_s: Option<f64>,
    numbering: HourNumbering,
    increases: Increases,
) -> HourCircle {
    HourCircle {
        ring: Ring::Fixed,
        unit: Unit::Hours,
        numbering,
        increases,
        division: Angle::from_time_seconds(division_s),
        vernier: vernier_s.map(Angle::from_time_seconds),
        second_fiducial: false,
        reading_error: None,
    }
}

fn dec(
    division_arcmin: f64,
    vernier_arcmin: Option<f64>,
    numbering: DeclinationNumbering,
) -> DeclinationCircle {
    DeclinationCircle {
        numbering,
        division: Angle::from_arcminutes(division_arcmin),
        vernier: vernier_arcmin.map(Angle::from_arcminutes),
        slips: false,
        reading_error: None,
    }
}
