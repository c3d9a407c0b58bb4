//! A mount made up by chance, at a place and in a night made up by chance, and stars read with it.
//!
//! Circles as built (common practice, no source): small portable mounts with 10- or 20-minute hour divisions and 2° of
//! declination without vernier; larger ones with 5 minutes and 1°; observatory mounts with minutes and a vernier to 4 s,
//! 10' and a vernier to 10". Numbering, ring and hemisphere by chance. Readings are off by a look's error and rounded
//! to what the eye can set.

use nonius::angle::{Angle, AxisAngle, Latitude, Longitude};
use nonius::catalog::{Catalogue, Target};
use nonius::dial::{Circumstances, Questioned, Sighting};
use nonius::estimate::Prior;
use nonius::metal::{
    DeclinationCircle, DeclinationNumbering, ExpectedErrors, HourCircle, HourNumbering, Increases,
    Kind, Limits, Mount, MountErrors, Reading, Ring, Side, read_dec, read_hour, to_axes,
};
use nonius::sexagesimal::Unit;
use nonius::sky::{Air, Moment, Observer};
use nonius::time::{Dut1, Utc};

use crate::chance::Chance;

/// Lower stars are not read.
const LOWEST_DEG: f64 = 15.0;

/// Stars read are no fainter than this.
const READ_HP: f64 = 2.6;

/// Stars an observer might take for another are no fainter than this.
const FAINTEST_HP: f64 = 3.5;

/// The bright stars of the catalogue.
pub fn bright_stars() -> Vec<Target> {
    Catalogue::builtin().bright_stars(FAINTEST_HP)
}

/// A mount in a night.
pub struct Night<'a> {
    pub mount: Mount,
    pub truth: MountErrors,
    pub prior: Prior,
    pub dusk: Moment,
    pub stars: &'a [Target],
    /// The observer types the letters of the circles that have them.
    pub letters: bool,
}

/// A star read at a moment.
#[derive(Clone, Debug)]
pub struct Read {
    pub moment: Moment,
    pub target: Target,
    pub sighting: Sighting,
}

impl Read {
    pub fn questioned<'a>(
        &'a self,
        night: &'a Night<'_>,
        circumstances: Circumstances,
    ) -> Questioned<'a> {
        Questioned {
            mount: &night.mount,
            moment: &self.moment,
            target: &self.target,
            sighting: &self.sighting,
            stars: night.stars,
            circumstances,
        }
    }
}

impl<'a> Night<'a> {
    pub fn by_chance(chance: &mut Chance, stars: &'a [Target]) -> Self {
        let mount = mount(chance);
        let expected = mount.expected;
        let mut error = |sigma: Angle| sigma * chance.normal(1.0);
        let truth = MountErrors {
            hour_index: error(Angle::from_degrees(40.0)),
            dec_index: error(Angle::from_degrees(if mount.declination_circle.slips {
                40.0
            } else {
                3.0
            })),
            polar_high: error(expected.polar_high),
            polar_east: error(expected.polar_east),
            cone: error(expected.cone),
            skew: error(expected.skew),
            sag: error(expected.sag),
            ..MountErrors::default()
        };
        let south = if happens(chance, 0.5) { -1.0 } else { 1.0 };
        let observer = Observer {
            latitude: Latitude::from_degrees(south * chance.between(5.0, 58.0)),
            longitude: Longitude::from_degrees(chance.between(-180.0, 180.0)),
            elevation_m: 300.0,
            dut1: Dut1::default(),
            air: Air::standard(300.0),
        };
        let start = Utc::parse("2026-01-01T20:00:00Z").unwrap();
        let dusk = Moment::new(
            &observer,
            start.plus_seconds(chance.between(0.0, 365.0 * 86_400.0)),
        );
        Self {
            prior: Prior::from_expected(&expected),
            mount,
            truth,
            dusk,
            stars,
            letters: happens(chance, 0.6),
        }
    }

    /// A moment within three hours of dusk.
    pub fn some_time(&self, chance: &mut Chance) -> Moment {
        self.dusk.later(chance.between(0.0, 10_800.0))
    }

    /// A bright star well up.
    pub fn some_star(&self, chance: &mut Chance, moment: &Moment) -> Target {
        loop {
            let star = &self.stars[chance.one_of(self.stars.len())];
            let bright = star.magnitude.is_some_and(|hp| hp <= READ_HP);
            if bright && Self::is_up(star, moment) {
                return star.clone();
            }
        }
    }

    pub fn is_up(star: &Target, moment: &Moment) -> bool {
        let place = moment.observed(&moment.apparent(&star.source));
        place.altitude.degrees() > LOWEST_DEG && place.declination.degrees().abs() < 80.0
    }

    /// The side a star is usually seen from, and now and then the other.
    pub fn some_side(&self, chance: &mut Chance, star: &Target, moment: &Moment) -> Side {
        if !self.mount.kind.has_two_sides() {
            return Side::Single;
        }
        let east = moment.apparent(&star.source).hour_angle.degrees() < 0.0;
        if east == happens(chance, 0.85) {
            Side::TubeWest
        } else {
            Side::TubeEast
        }
    }

    /// What the circles show of a star, before the letters are left out.
    pub fn read(
        &self,
        chance: &mut Chance,
        moment: &Moment,
        star: &Target,
        side: Side,
    ) -> Option<Read> {
        let place = moment.observed(&moment.apparent(&star.source));
        let latitude = moment.observer().latitude;
        let axes = to_axes(
            place.hour_angle,
            place.declination,
            latitude,
            &self.truth,
            side,
        )
        .ok()?;
        let (hour, dec) = (&self.mount.hour_circle, &self.mount.declination_circle);
        let off =
            |angle: AxisAngle, sigma: Angle, by: f64| AxisAngle::new(angle.angle() + sigma * by);
        let hour_axis = off(axes.hour, hour.look_error(), chance.normal(1.0));
        let dec_axis = off(axes.dec, dec.look_error(), chance.normal(1.0));
        Some(Read {
            moment: *moment,
            target: star.clone(),
            sighting: Sighting {
                side,
                hour: self.typed_hour(hour.reading(hour_axis, moment.apparent_sidereal(), side)),
                dec: self.typed_dec(dec.reading(dec_axis)),
                hour_opposite: None,
                dec_opposite: None,
                timed: false,
            },
        })
    }

    /// A star by chance, read soundly.
    pub fn some_reading(&self, chance: &mut Chance) -> Read {
        loop {
            let moment = self.some_time(chance);
            let star = self.some_star(chance, &moment);
            let side = self.some_side(chance, &star, &moment);
            if let Some(read) = self.read(chance, &moment, &star, side) {
                return read;
            }
        }
    }

    /// So many of them.
    pub fn some_readings(&self, chance: &mut Chance, count: usize) -> Vec<Read> {
        (0..count).map(|_| self.some_reading(chance)).collect()
    }

    /// As typed: rounded as engraved.
    pub fn typed_hour(&self, reading: Reading) -> Reading {
        let circle = &self.mount.hour_circle;
        self.lettered(read_hour(circle, &circle.scale().text(reading)).unwrap())
    }

    /// As typed: rounded as engraved.
    pub fn typed_dec(&self, reading: Reading) -> Reading {
        let circle = &self.mount.declination_circle;
        self.lettered(read_dec(circle, &circle.scale().text(reading)).unwrap())
    }

    fn lettered(&self, reading: Reading) -> Reading {
        Reading {
            half: reading.half.filter(|_| self.letters),
            ..reading
        }
    }
}

/// True so often.
pub fn happens(chance: &mut Chance, share: f64) -> bool {
    chance.uniform() < share
}

/// One of them.
pub fn pick<T: Copy>(chance: &mut Chance, from: &[T]) -> T {
    from[chance.one_of(from.len())]
}

/// A mount of one of the three kinds of circles.
fn mount(chance: &mut Chance) -> Mount {
    let minutes = |m: f64| Angle::from_arcminutes(m);
    let size = chance.one_of(3);
    let degrees = happens(chance, 0.2);
    let (unit, numbering) = (
        if degrees { Unit::Degrees } else { Unit::Hours },
        pick(
            chance,
            &[
                HourNumbering::Full,
                HourNumbering::Full,
                HourNumbering::Halves,
                HourNumbering::PlusMinus,
            ],
        ),
    );
    let [hour_division, hour_vernier, dec_division, dec_vernier] =
        graduation(chance, size, degrees);
    let portable = size < 2;
    let ring = if portable {
        pick(chance, &[Ring::Slips, Ring::Driven, Ring::Driven])
    } else {
        pick(chance, &[Ring::Fixed, Ring::Fixed, Ring::Slips])
    };
    let expected = if portable {
        ExpectedErrors::default()
    } else {
        ExpectedErrors {
            polar_high: minutes(10.0),
            polar_east: minutes(10.0),
            cone: minutes(8.0),
            skew: minutes(6.0),
            sag: minutes(3.0),
            ..ExpectedErrors::default()
        }
    };
    Mount {
        name: "by chance".to_owned(),
        kind: pick(
            chance,
            &[Kind::German, Kind::German, Kind::German, Kind::Fork],
        ),
        clock_drive: true,
        hour_circle: HourCircle {
            ring,
            unit,
            numbering: if ring == Ring::Driven {
                HourNumbering::Full
            } else {
                numbering
            },
            increases: if ring == Ring::Driven {
                Increases::East
            } else {
                pick(chance, &[Increases::West, Increases::West, Increases::East])
            },
            division: hour_division.unwrap(),
            vernier: hour_vernier,
            second_fiducial: happens(chance, 0.15),
            reading_error: None,
        },
        declination_circle: DeclinationCircle {
            numbering: pick(
                chance,
                &[
                    DeclinationNumbering::Signed,
                    DeclinationNumbering::Signed,
                    DeclinationNumbering::Quarters,
                    DeclinationNumbering::PolarDistance,
                    DeclinationNumbering::Full,
                ],
            ),
            division: dec_division.unwrap(),
            vernier: dec_vernier,
            slips: portable && happens(chance, 0.4),
            reading_error: None,
        },
        limits: Limits::default(),
        expected,
        dome: None,
        tube: None,
        optics: Vec::new(),
    }
}

/// Divisions and verniers of the hour and the declination circle, by the size of the mount.
fn graduation(chance: &mut Chance, size: usize, degrees: bool) -> [Option<Angle>; 4] {
    let seconds = |s: f64| Some(Angle::from_time_seconds(s));
    let minutes = |m: f64| Some(Angle::from_arcminutes(m));
    let [dec, dec_vernier] = match size {
        0 => [minutes(120.0), None],
        1 => [minutes(60.0), None],
        _ => [minutes(10.0), minutes(1.0 / 6.0)],
    };
    let [hour, hour_vernier] = match (size, degrees) {
        (0, false) => [seconds(pick(chance, &[600.0, 1200.0])), None],
        (1, false) => [seconds(300.0), None],
        (_, false) => [seconds(60.0), seconds(4.0)],
        (0 | 1, true) => [dec, None],
        (_, true) => [minutes(30.0), minutes(1.0)],
    };
    [hour, hour_vernier, dec, dec_vernier]
}
