//! What the circles show, as typed: understood at once, held against what was expected, and made into
//! a reading for the record.

use crate::angle::Angle;
use crate::catalog::Target;
use crate::dial::doubt::{Circumstances, Earlier, Questioned, Suspicion};
use crate::dial::{Sighting, sighting::Understood};
use crate::metal::typed::{read_dec, read_hour};
use crate::metal::{Reading, Scale, Side};
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
        let (hour_one, hour_other) = verniers(hour_text);
        let (dec_one, dec_other) = verniers(dec_text);
        let read_hour = |text: &str| self.hour(text);
        let read_dec = |text: &str| read_dec(&mount.declination_circle, text);
        let (hour, hour_opposite) = (some(hour_one, read_hour), some(hour_other, read_hour));
        let (dec, dec_opposite) = (some(dec_one, read_dec), some(dec_other, read_dec));
        let opposite = (good(hour_opposite.as_ref()), good(dec_opposite.as_ref()));
        let (hour_read, dec_read) = (good(hour.as_ref()), good(dec.as_ref()));
        let held = self.held_against_expected(hour_read, dec_read, opposite);
        let off = |off: fn(&Understood) -> Angle| held.as_ref().map(off);
        let faulty = [&hour_opposite, &dec_opposite];
        let faulty = faulty.iter().any(|typed| matches!(typed, Some(Err(_))));
        let held_whole = held.as_ref().filter(|_| !faulty);
        let whole = match (hour_read, dec_read, held_whole) {
            (Some(hour), Some(dec), Some(held)) => Some(Whole {
                reading: self.record(held, hour_text, dec_text),
                sighting: self.sighting((hour, dec), opposite),
            }),
            _ => None,
        };
        TypedReading {
            hour: self.line(
                (hour_text, worse(hour, hour_opposite)),
                mount.hour_circle.scale(),
                off(|held| held.hour_off),
            ),
            dec: self.line(
                (dec_text, worse(dec, dec_opposite)),
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
        opposite: (Option<Reading>, Option<Reading>),
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
        let circle = &mount.hour_circle;
        let hour = hour.unwrap_or_else(|| circle.reading(expected.hour, sidereal, self.side));
        let dec = dec.unwrap_or_else(|| mount.declination_circle.reading(expected.dec));
        let sighting = self.sighting((hour, dec), opposite);
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

    /// Numbers under the two indexes, and under the opposite verniers that were read.
    const fn sighting(
        &self,
        (hour, dec): (Reading, Reading),
        (hour_opposite, dec_opposite): (Option<Reading>, Option<Reading>),
    ) -> Sighting {
        Sighting {
            side: self.side,
            hour,
            dec,
            hour_opposite,
            dec_opposite,
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
            sidereal_deg: self.moment.apparent_sidereal().degrees(),
            taken_as: Some(held.shown.into()),
            driven: !self.observatory.mount.hour_circle.stands_still(),
            timed: self.timed,
            off_arcmin: self
                .known
                .estimate
                .is_calibrated()
                .then(|| off.arcminutes()),
            ..StarReading::of_sight(&self.star.name, sight, (hour, dec))
        }
    }
}

fn is_mistakable(star: &Target) -> bool {
    star.magnitude.is_some_and(|hp| hp <= MISTAKABLE_HP)
}

/// What is typed for one vernier, and for the opposite one after a stroke: `20 56 40 / 8 56 50`.
fn verniers(text: &str) -> (&str, &str) {
    text.split_once('/').unwrap_or((text, ""))
}

/// What was typed, or what is wrong with the opposite vernier.
fn worse(
    one: Option<Result<Reading, TextFault>>,
    other: Option<Result<Reading, TextFault>>,
) -> Option<Result<Reading, TextFault>> {
    match other {
        Some(Err(fault)) => Some(Err(fault)),
        _ => one,
    }
}

/// The reading, if it was understood.
fn good(typed: Option<&Result<Reading, TextFault>>) -> Option<Reading> {
    typed.and_then(|typed| typed.as_ref().ok().copied())
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
