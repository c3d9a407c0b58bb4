//! What the circles show, as typed: understood at once, held against what was expected, and made into
//! a reading for the record.

use crate::angle::{Angle, AxisAngle};
use crate::catalog::Target;
use crate::dial::doubt::{Circumstances, Earlier, Questioned, Suspicion};
use crate::dial::{Sighting, sighting::Understood};
use crate::metal::typed::{read_dec, read_hour};
use crate::metal::{Reading, Ring, Scale, Side};
use crate::night::{Known, StarReading};
use crate::screen::observatory::Observatory;
use crate::screen::panel::Typed;
use crate::screen::words::rough;
use crate::sexagesimal::TextFault;
use crate::sky::Moment;

/// Stars fainter than this are not gone to in place of another (common practice, no source).
const MISTAKABLE_HP: f64 = 3.5;

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
    /// The same as numbers under the two indexes.
    pub sighting: Sighting,
}

/// What is read, from where, and when.
#[derive(Clone, Copy)]
pub struct Sitting<'s> {
    /// What stays the same.
    pub observatory: &'s Observatory,
    /// The bright stars, the brightest first.
    pub bright: &'s [Target],
    /// What is known of the mount.
    pub known: &'s Known,
    /// The moment the star stood in the middle.
    pub moment: &'s Moment,
    /// The star.
    pub star: &'s Target,
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
            (Some(hour), Some(dec), Some(held)) => Some(Whole {
                reading: self.record(held, hour_text, dec_text),
                sighting: self.sighting(hour, dec),
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
        let place = self
            .moment
            .observed(&self.moment.apparent(&self.star.source));
        let latitude = self.moment.observer().latitude;
        let estimate = &self.known.estimate;
        let expected = estimate
            .predict(place.hour_angle, place.declination, latitude, self.side)
            .ok()?
            .axes;
        let sidereal = self.moment.apparent_sidereal();
        let sighting = self.sighting(
            hour.unwrap_or_else(|| {
                mount
                    .hour_circle
                    .reading(expected.hour, sidereal, self.side)
            }),
            dec.unwrap_or_else(|| mount.declination_circle.reading(expected.dec)),
        );
        sighting
            .understand(mount, self.moment, &self.star.source, estimate)
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

    /// Numbers under the two indexes.
    const fn sighting(&self, hour: Reading, dec: Reading) -> Sighting {
        Sighting {
            side: self.side,
            hour,
            dec,
            hour_opposite: None,
            dec_opposite: None,
            timed: self.timed,
        }
    }

    /// What there is to say against a reading.
    #[must_use]
    pub fn suspicion(
        &self,
        sighting: &Sighting,
        circumstances: Circumstances,
    ) -> Option<Suspicion> {
        let stars: Vec<Target> = self
            .bright
            .iter()
            .filter(|star| is_mistakable(star))
            .cloned()
            .collect();
        let questioned = Questioned {
            mount: &self.observatory.mount,
            moment: self.moment,
            target: self.star,
            sighting,
            stars: &stars,
            circumstances,
        };
        questioned.suspicion(&Earlier {
            prior: &self.known.prior,
            sights: &self.known.sights,
        })
    }

    /// A sighting made into a reading for the record, with what was said of it.
    #[must_use]
    pub fn recorded(&self, sighting: &Sighting, doubted: &str) -> Option<StarReading> {
        let mount = &self.observatory.mount;
        let held = sighting
            .understand(mount, self.moment, &self.star.source, &self.known.estimate)
            .ok()?;
        let hour = mount.hour_circle.scale().text(sighting.hour);
        let dec = mount.declination_circle.scale().text(sighting.dec);
        Some(StarReading {
            doubted: doubted.to_owned(),
            ..self.record(&held, &hour, &dec)
        })
    }

    fn record(&self, held: &Understood, hour: &str, dec: &str) -> StarReading {
        let sight = &held.sight;
        let west = held.hour_off.radians() * sight.declination.angle().cos();
        let off = Angle::from_radians(west.hypot(held.dec_off.radians()));
        StarReading {
            star: self.star.name.clone(),
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
            doubted: String::new(),
            off_arcmin: self
                .known
                .estimate
                .is_calibrated()
                .then(|| off.arcminutes()),
            used: true,
        }
    }
}

fn is_mistakable(star: &Target) -> bool {
    star.magnitude.is_some_and(|hp| hp <= MISTAKABLE_HP)
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
