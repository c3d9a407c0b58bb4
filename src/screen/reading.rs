//! What the circles show, as typed: understood at once, held against what was expected, and made into
//! a reading for the record.

use nalgebra::{Matrix2, Vector2};

use crate::angle::{Angle, AxisAngle};
use crate::dial::{Sighting, sighting::Understood};
use crate::metal::typed::{read_dec, read_hour};
use crate::metal::{Reading, Ring, Scale, Side};
use crate::night::{Known, StarReading};
use crate::screen::observatory::Observatory;
use crate::screen::panel::Typed;
use crate::screen::words::rough;
use crate::sexagesimal::TextFault;
use crate::sky::{Moment, Source};

/// A reading this unlikely, or more, is questioned: one in a thousand of good ones.
///
/// Source: the chi-squared distribution of two degrees of freedom, -2 ln 0.001.
const QUESTIONED_CHI_SQUARED: f64 = 13.815_510_557_964_274;

/// What was typed for one circle.
#[derive(Clone, Debug, PartialEq)]
pub enum Line {
    /// Nothing yet.
    Empty,
    /// It was understood so.
    Understood(String),
    /// It cannot be read.
    Fault(String),
}

/// What was typed for both circles.
#[derive(Clone, Debug, PartialEq)]
pub struct TypedReading {
    /// The hour circle.
    pub hour: Line,
    /// The declination circle.
    pub dec: Line,
    /// Both, once both are understood.
    pub whole: Option<Whole>,
}

/// Both circles understood.
#[derive(Clone, Debug, PartialEq)]
pub struct Whole {
    /// The reading for the record.
    pub reading: StarReading,
    /// It is so far from what was expected that it should be looked at again.
    pub questionable: bool,
}

/// What is read, from where, and when.
#[derive(Clone, Copy)]
pub struct Sitting<'s> {
    /// What stays the same.
    pub observatory: &'s Observatory,
    /// What is known of the mount.
    pub known: &'s Known,
    /// The moment the star stood in the middle.
    pub moment: &'s Moment,
    /// The star's name.
    pub star: &'s str,
    /// Its place.
    pub source: &'s Source,
    /// The side of the pier the tube is on.
    pub side: Side,
    /// The star was timed across the middle, with the hour circle set on a mark.
    pub timed: bool,
}

impl Sitting<'_> {
    /// Understands what was typed.
    #[must_use]
    pub fn understand(&self, typed: &Typed) -> TypedReading {
        let mount = &self.observatory.mount;
        let (hour_text, dec_text) = (typed.first.value(), typed.second.value());
        let hour = some(hour_text, |text| self.hour(text));
        let dec = some(dec_text, |text| read_dec(&mount.declination_circle, text));
        let good = |typed: &Option<Result<Reading, TextFault>>| match typed {
            Some(Ok(reading)) => Some(*reading),
            _ => None,
        };
        let (hour_read, dec_read) = (good(&hour), good(&dec));
        let held = self.held_against_expected(hour_read, dec_read);
        let off = |off: fn(&Understood) -> Angle| held.as_ref().map(off);
        let whole = match (hour_read, dec_read, &held) {
            (Some(_), Some(_), Some(held)) => Some(Whole {
                reading: self.record(held, hour_text, dec_text),
                questionable: self.is_questionable(held),
            }),
            _ => None,
        };
        TypedReading {
            hour: self.line(
                (hour_text, hour),
                mount.hour_circle.scale(),
                off(|held| held.hour_off),
            ),
            dec: self.line(
                (dec_text, dec),
                mount.declination_circle.scale(),
                off(|held| held.dec_off),
            ),
            whole,
        }
    }

    /// What is typed for the hour circle. A star is timed with the circle set on a mark.
    fn hour(&self, text: &str) -> Result<Reading, TextFault> {
        let circle = &self.observatory.mount.hour_circle;
        let reading = read_hour(circle, text)?;
        let scale = circle.scale();
        if self.timed && !scale.is_on_a_mark(reading) {
            return Err(TextFault {
                message: format!(
                    "a timed star is read on a mark, and {} is none",
                    scale.text(reading)
                ),
                hint: "type the mark the circle was set on; else esc, and strike enter with it centred",
                at: 0..text.len(),
            });
        }
        Ok(reading)
    }

    /// Held against the estimate; a circle not read yet is taken to show what is expected of it.
    fn held_against_expected(
        &self,
        hour: Option<Reading>,
        dec: Option<Reading>,
    ) -> Option<Understood> {
        let mount = &self.observatory.mount;
        let place = self.moment.observed(&self.moment.apparent(self.source));
        let latitude = self.moment.observer().latitude;
        let estimate = &self.known.estimate;
        let expected = estimate
            .predict(place.hour_angle, place.declination, latitude, self.side)
            .ok()?
            .axes;
        let sidereal = self.moment.apparent_sidereal();
        let sighting = Sighting {
            side: self.side,
            hour: hour.unwrap_or_else(|| {
                mount
                    .hour_circle
                    .reading(expected.hour, sidereal, self.side)
            }),
            dec: dec.unwrap_or_else(|| mount.declination_circle.reading(expected.dec)),
            hour_opposite: None,
            dec_opposite: None,
            timed: self.timed,
        };
        sighting
            .understand(mount, self.moment, self.source, estimate)
            .ok()
    }

    fn line(
        &self,
        (text, typed): (&str, Option<Result<Reading, TextFault>>),
        scale: Scale,
        off: Option<Angle>,
    ) -> Line {
        match typed {
            None => Line::Empty,
            Some(Err(fault)) => Line::Fault(format!("{}: {}", fault.message, fault.hint)),
            Some(Ok(reading)) => {
                let expected = match off {
                    Some(off) if self.known.estimate.is_calibrated() => {
                        format!("; {} from expected", rough(off))
                    }
                    Some(off) => format!("; {} from a perfect mount", rough(off)),
                    None => String::new(),
                };
                let decimal = if is_decimal(text) { " by decimals" } else { "" };
                let understood = scale.understood(reading);
                Line::Understood(format!("{understood}{decimal}{expected}"))
            }
        }
    }

    /// True if a good reading would be this far off less than once in a thousand times.
    fn is_questionable(&self, held: &Understood) -> bool {
        let sight = &held.sight;
        let latitude = self.moment.observer().latitude;
        let predicted =
            self.known
                .estimate
                .predict(sight.hour_angle, sight.declination, latitude, self.side);
        let Ok(predicted) = predicted else {
            return false;
        };
        let square = |sigma: Angle| sigma.radians() * sigma.radians();
        let reading = Matrix2::new(square(sight.sigma_hour), 0.0, 0.0, square(sight.sigma_dec));
        let off = Vector2::new(held.hour_off.radians(), held.dec_off.radians());
        (predicted.covariance + reading)
            .try_inverse()
            .is_some_and(|inverse| (off.transpose() * inverse * off).x > QUESTIONED_CHI_SQUARED)
    }

    fn record(&self, held: &Understood, hour: &str, dec: &str) -> StarReading {
        let sight = &held.sight;
        let west = held.hour_off.radians() * sight.declination.angle().cos();
        let off = Angle::from_radians(west.hypot(held.dec_off.radians()));
        StarReading {
            star: self.star.to_owned(),
            hour_angle_deg: sight.hour_angle.degrees(),
            declination_deg: sight.declination.degrees(),
            sidereal_deg: self.moment.apparent_sidereal().degrees(),
            side: self.side,
            hour: hour.trim().to_owned(),
            dec: dec.trim().to_owned(),
            hour_candidates_deg: degrees(&sight.hour),
            dec_candidates_deg: degrees(&sight.dec),
            taken_as: Some(held.shown.into()),
            hour_sigma_deg: sight.sigma_hour.degrees(),
            dec_sigma_deg: sight.sigma_dec.degrees(),
            driven: self.observatory.mount.hour_circle.ring == Ring::Driven,
            timed: self.timed,
            off_arcmin: self
                .known
                .estimate
                .is_calibrated()
                .then(|| off.arcminutes()),
            used: true,
        }
    }
}

/// Nothing for an empty text, else what it is read as.
fn some<T>(text: &str, read: impl Fn(&str) -> T) -> Option<T> {
    (!text.trim().is_empty()).then(|| read(text))
}

/// True for one number with decimals: `40.40`, which may have been meant as `40 40`.
fn is_decimal(text: &str) -> bool {
    let mut words = text.split_whitespace();
    let number = words.next().is_some_and(|word| {
        let digits = word.trim_end_matches(|c: char| c.is_alphabetic());
        digits.contains(['.', ',']) && digits.parse::<f64>().is_ok()
    });
    number && words.all(|word| word.chars().all(char::is_alphabetic))
}

fn degrees(axes: &[AxisAngle]) -> Vec<f64> {
    axes.iter().map(|axis| axis.degrees()).collect()
}
