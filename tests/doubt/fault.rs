//! A reading spoilt in one way, and whether an explanation names it.

use std::ops::Range;

use nonius::angle::Angle;
use nonius::catalog::Target;
use nonius::dial::doubt::{Circle, Correction, Explanation, Kind};
use nonius::dial::{Circumstances, Sighting};
use nonius::metal::{Reading, Ring, Scale, Side, read_dec, read_hour};
use nonius::sexagesimal::Unit;
use nonius::sky::Moment;

use crate::chance::Chance;
use crate::night::{Night, Read, happens, pick};

/// Another star is one within this distance of the one meant.
const NEIGHBOUR_DEG: f64 = 25.0;

/// And differs from it by no more than this.
const ALIKE_MAGNITUDES: f64 = 1.0;

/// A ring that slips does so by this or more, and by a division at least: less is not seen on the circle.
const LEAST_SLIP_DEG: f64 = 1.0;

/// A number counted the wrong way by less than this many divisions is not seen either.
const LEAST_DIVISIONS_COUNTED: f64 = 2.0;

/// Of stars as near as this to a brighter one the circles know only that.
const PAIR_ARCMIN: f64 = 1.0;

/// What was done to a reading.
pub struct Spoilt {
    pub read: Read,
    pub circumstances: Circumstances,
    pub truth: Truth,
}

/// What really was.
pub enum Truth {
    Star(Box<Target>),
    Hour(Kind, Reading),
    Dec(Kind, Reading),
    Side(Side),
    Slipped { hour: bool, dec: bool },
    Clock(f64),
}

impl Truth {
    pub fn kind(&self) -> Kind {
        match self {
            Self::Star(_) => Kind::OtherStar,
            Self::Hour(kind, _) | Self::Dec(kind, _) => *kind,
            Self::Side(_) => Kind::OtherSide,
            Self::Slipped { .. } => Kind::RingSlipped,
            Self::Clock(_) => Kind::Clock,
        }
    }

    /// True if an explanation names the fault, and all that is to be put right.
    pub fn is(&self, explanation: &Explanation) -> bool {
        let same = |a: Reading, b: Reading| {
            (a.value - b.value).abs().arcseconds() < 1.0 && a.half == b.half
        };
        explanation.kind == self.kind()
            && match (self, &explanation.correction) {
                (Self::Star(star), Correction::Star(named)) => star.name == named.name,
                (
                    Self::Hour(_, was),
                    Correction::Reading {
                        circle, reading, ..
                    },
                ) => *circle == Circle::Hour && same(*was, *reading),
                (
                    Self::Dec(_, was),
                    Correction::Reading {
                        circle, reading, ..
                    },
                ) => *circle == Circle::Dec && same(*was, *reading),
                (Self::Side(was), Correction::Side(side)) => was == side,
                (Self::Slipped { hour, dec }, Correction::Slipped { hour: h, dec: d }) => {
                    *hour == h.is_some() && *dec == d.is_some()
                }
                (Self::Clock(was), Correction::Clock { seconds }) => (was - seconds).abs() < 1.0,
                _ => false,
            }
    }
}

/// Readings of a night in the order of time, of which some were spoilt.
pub struct SpoiltSet {
    pub reads: Vec<Read>,
    /// Which.
    pub rows: Range<usize>,
    pub truth: Truth,
}

/// A set in which one reading is spoilt in that way.
pub fn spoil_one(chance: &mut Chance, night: &Night<'_>, kind: Kind) -> Option<SpoiltSet> {
    let Spoilt { read, truth, .. } = spoil(chance, night, kind)?;
    let reads = in_order(night.some_readings(chance, 5), Some(&read));
    let row = reads.iter().position(|one| one.sighting == read.sighting)?;
    Some(SpoiltSet {
        reads,
        rows: row..row + 1,
        truth,
    })
}

/// A set in which the clock was set an hour wrong, or a ring slipped, for the last two or three.
pub fn spoil_the_rest(chance: &mut Chance, night: &Night<'_>, kind: Kind) -> Option<SpoiltSet> {
    let mut reads = in_order(night.some_readings(chance, 6), None);
    let from = 3 + chance.one_of(2);
    let truth = if kind == Kind::Clock {
        if night.mount.hour_circle.ring == Ring::Driven {
            return None;
        }
        let ahead = pick(chance, &[3600.0, -3600.0]);
        for read in reads.iter_mut().skip(from) {
            *read = wrong_clock(read, ahead);
        }
        Truth::Clock(-ahead)
    } else {
        let (turned, truth) = turned(chance, night)?;
        for read in reads.iter_mut().skip(from) {
            let side = read.sighting.side;
            *read = turned.read(chance, &read.moment, &read.target, side)?;
        }
        truth
    };
    // by the clock as it was
    let in_order = reads.windows(2).all(|two| is_before(&two[0], &two[1]));
    let rows = from..reads.len();
    in_order.then_some(SpoiltSet { reads, rows, truth })
}

fn is_before(a: &Read, b: &Read) -> bool {
    a.moment.utc() <= b.moment.utc()
}

fn in_order(mut reads: Vec<Read>, more: Option<&Read>) -> Vec<Read> {
    reads.extend(more.cloned());
    reads.sort_by_key(|read| read.moment.utc());
    reads
}

/// Spoils a reading of a night in that way, if that can happen with such a mount and star.
pub fn spoil(chance: &mut Chance, night: &Night<'_>, kind: Kind) -> Option<Spoilt> {
    let sound = night.some_reading(chance);
    let plain = |sighting: Sighting, truth: Truth| Spoilt {
        read: Read {
            sighting,
            ..sound.clone()
        },
        circumstances: agreed(),
        truth,
    };
    let (hour, dec) = (sound.sighting.hour, sound.sighting.dec);
    match kind {
        Kind::OtherStar => other_star(chance, night),
        Kind::HourMisread => {
            let scale = night.mount.hour_circle.scale();
            let typed = stepped(chance, &scale, hour)?;
            Some(plain(
                Sighting {
                    hour: typed,
                    ..sound.sighting
                },
                Truth::Hour(kind, hour),
            ))
        }
        Kind::DecMisread => {
            let scale = night.mount.declination_circle.scale();
            let typed = stepped(chance, &scale, dec)?;
            Some(plain(
                Sighting {
                    dec: typed,
                    ..sound.sighting
                },
                Truth::Dec(kind, dec),
            ))
        }
        Kind::WrongSign => {
            if happens(chance, 0.5) {
                let typed = turned_round(chance, night, hour, true)?;
                Some(plain(
                    Sighting {
                        hour: typed,
                        ..sound.sighting
                    },
                    Truth::Hour(kind, hour),
                ))
            } else {
                let typed = turned_round(chance, night, dec, false)?;
                Some(plain(
                    Sighting {
                        dec: typed,
                        ..sound.sighting
                    },
                    Truth::Dec(kind, dec),
                ))
            }
        }
        Kind::OtherSide => {
            let side = sound.sighting.side.other()?;
            // with a mark for either side, and a declination circle that says the same on both, there is nothing to see
            if night.mount.hour_circle.second_fiducial {
                return None;
            }
            Some(plain(
                Sighting {
                    side,
                    ..sound.sighting
                },
                Truth::Side(sound.sighting.side),
            ))
        }
        Kind::RingSlipped => slipped(chance, night),
        Kind::Clock => leapt(chance, night),
    }
}

/// The clock has been right so far.
pub fn agreed() -> Circumstances {
    Circumstances {
        clock_agreed: true,
        clock_leapt_s: None,
    }
}

fn other_star(chance: &mut Chance, night: &Night<'_>) -> Option<Spoilt> {
    let moment = night.some_time(chance);
    let meant = night.some_star(chance, &moment);
    let place = |star: &Target| moment.apparent(&star.source);
    let others: Vec<&Target> = night
        .stars
        .iter()
        .filter(|star| {
            let apart = place(star).separation(&place(&meant)).degrees();
            let fainter = star.magnitude.unwrap() - meant.magnitude.unwrap();
            (1.0..NEIGHBOUR_DEG).contains(&apart)
                && fainter.abs() < ALIKE_MAGNITUDES
                && Night::is_up(star, &moment)
                && !night.stars.iter().any(|brighter| {
                    brighter.magnitude < star.magnitude
                        && place(brighter).separation(&place(star)).arcminutes() < PAIR_ARCMIN
                })
        })
        .collect();
    if others.is_empty() {
        return None;
    }
    let other = pick(chance, &others);
    let side = night.some_side(chance, other, &moment);
    let read = night.read(chance, &moment, other, side)?;
    Some(Spoilt {
        read: Read {
            target: meant,
            ..read
        },
        circumstances: agreed(),
        truth: Truth::Star(Box::new(other.clone())),
    })
}

/// A number misread by a step that such a circle can be misread by.
fn stepped(chance: &mut Chance, scale: &Scale, was: Reading) -> Option<Reading> {
    let division = scale.division();
    let steps: Vec<Angle> = match scale.unit() {
        Unit::Hours => vec![
            Angle::from_hours(1.0),
            Angle::from_hours(1.0),
            Angle::from_time_seconds(600.0),
            scale.numbered_step(),
            division,
        ],
        Unit::Degrees => vec![
            Angle::from_degrees(10.0),
            Angle::from_degrees(10.0),
            Angle::from_degrees(5.0),
            Angle::from_degrees(1.0),
            scale.numbered_step(),
            division,
        ],
    };
    let steps: Vec<Angle> = steps.into_iter().filter(|step| *step >= division).collect();
    let step = pick(chance, &steps);
    let by = if happens(chance, 0.5) { step } else { -step };
    let larger = was.value.abs() + by;
    let whole_turn = scale.positions_of(Reading {
        value: Angle::from_degrees(300.0),
        half: None,
    });
    let size = if whole_turn.is_empty() {
        larger
    } else {
        larger.wrapped_positive()
    };
    let value = if was.value < Angle::ZERO { -size } else { size };
    let typed = Reading { value, ..was };
    (size >= Angle::ZERO && !scale.positions_of(typed).is_empty()).then_some(typed)
}

/// A number with the wrong letter or sign, or counted the wrong way.
fn turned_round(
    chance: &mut Chance,
    night: &Night<'_>,
    was: Reading,
    hour: bool,
) -> Option<Reading> {
    let mount = &night.mount;
    let scale = if hour {
        mount.hour_circle.scale()
    } else {
        mount.declination_circle.scale()
    };
    let text = scale.text(was);
    let swapped = if let Some(rest) = text.strip_prefix('-') {
        format!("+{rest}")
    } else if let Some(rest) = text.strip_prefix('+') {
        format!("-{rest}")
    } else if was.half.is_some() && happens(chance, 0.7) {
        let (rest, letter) = text.split_at(text.len() - 1);
        let other = match letter {
            "N" => "S",
            "S" => "N",
            "E" => "W",
            _ => "E",
        };
        format!("{rest}{other}")
    } else {
        let numbered = scale.numbered_step();
        let mark = numbered * (was.value / numbered).round();
        let value = mark * 2.0 - was.value;
        let seen = (value - was.value).abs() / scale.division() >= LEAST_DIVISIONS_COUNTED;
        return (seen
            && value >= Angle::ZERO
            && !scale.positions_of(Reading { value, ..was }).is_empty())
        .then_some(Reading { value, ..was });
    };
    if hour {
        read_hour(&mount.hour_circle, &swapped).ok()
    } else {
        read_dec(&mount.declination_circle, &swapped).ok()
    }
}

fn slipped(chance: &mut Chance, night: &Night<'_>) -> Option<Spoilt> {
    let (turned, truth) = turned(chance, night)?;
    Some(Spoilt {
        read: turned.some_reading(chance),
        circumstances: agreed(),
        truth,
    })
}

/// The night with a ring that has slipped.
fn turned<'a>(chance: &mut Chance, night: &Night<'a>) -> Option<(Night<'a>, Truth)> {
    let (hour_loose, dec_loose) = (
        night.mount.hour_circle.ring != Ring::Fixed,
        night.mount.declination_circle.slips,
    );
    let hour = hour_loose && (!dec_loose || happens(chance, 0.6));
    let dec = dec_loose && !hour;
    if !hour && !dec {
        return None;
    }
    let mut by = |division: Angle| {
        let least = division.degrees().max(LEAST_SLIP_DEG);
        let size = least * (chance.uniform() * (90.0 / least).ln()).exp();
        Angle::from_degrees(if happens(chance, 0.5) { size } else { -size })
    };
    let mut turned = Night {
        mount: night.mount.clone(),
        prior: night.prior.clone(),
        ..*night
    };
    if hour {
        turned.truth.hour_index += by(night.mount.hour_circle.division);
    }
    if dec {
        turned.truth.dec_index += by(night.mount.declination_circle.division);
    }
    Some((turned, Truth::Slipped { hour, dec }))
}

/// The clock has leapt, and that is known.
fn leapt(chance: &mut Chance, night: &Night<'_>) -> Option<Spoilt> {
    if night.mount.hour_circle.ring == Ring::Driven {
        return None;
    }
    let by = pick(chance, &[3600.0, -3600.0, 7200.0, 0.0]);
    let by = if by == 0.0 {
        chance.between(400.0, 5000.0)
    } else {
        by
    };
    let read = night.some_reading(chance);
    Some(Spoilt {
        read: wrong_clock(&read, by),
        circumstances: Circumstances {
            clock_agreed: true,
            clock_leapt_s: Some(by),
        },
        truth: Truth::Clock(-by),
    })
}

/// The same reading, by a clock so many seconds ahead.
pub fn wrong_clock(read: &Read, ahead_s: f64) -> Read {
    let moment: Moment = read.moment.later(ahead_s);
    Read {
        moment,
        ..read.clone()
    }
}
