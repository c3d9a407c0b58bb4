//! Every kind of explanation, on every engraving.

use super::*;
use crate::angle::AxisAngle;
use crate::catalog::Catalogue;
use crate::dial::trial::{Trial, moment, target};
use crate::estimate::Prior;
use crate::metal::{
    DeclinationNumbering, HourCircle, HourNumbering, Increases, MountErrors, Reading, Ring, Side,
    to_axes,
};
use crate::sexagesimal::{Half, Unit};

/// Stars read soundly before, with the tube on either side.
const BEFORE: [(&str, Side); 5] = [
    ("Capella", Side::TubeWest),
    ("Vega", Side::TubeEast),
    ("Deneb", Side::TubeWest),
    ("Hamal", Side::TubeEast),
    ("Aldebaran", Side::TubeWest),
];

const EVENING: &str = "2026-12-01T22:30:00Z";

/// The errors of the mount.
fn true_errors() -> MountErrors {
    MountErrors {
        hour_index: Angle::from_arcminutes(205.0),
        dec_index: Angle::from_arcminutes(-94.0),
        polar_high: Angle::from_arcminutes(14.0),
        polar_east: Angle::from_arcminutes(-22.0),
        cone: Angle::from_arcminutes(9.0),
        skew: Angle::from_arcminutes(-4.0),
        sag: Angle::from_arcminutes(1.5),
        ..MountErrors::default()
    }
}

/// A mount with its circles and what they have shown.
struct Engraved {
    trial: Trial,
    prior: Prior,
    stars: Vec<Target>,
}

impl Engraved {
    /// On every engraving of the hour circle, and of the declination circle.
    fn all() -> Vec<Self> {
        let mut hours = Vec::new();
        for numbering in [
            HourNumbering::Full,
            HourNumbering::Halves,
            HourNumbering::PlusMinus,
        ] {
            for (unit, increases) in [
                (Unit::Hours, Increases::West),
                (Unit::Hours, Increases::East),
                (Unit::Degrees, Increases::West),
            ] {
                hours.push((Ring::Fixed, numbering, unit, increases));
            }
        }
        hours.push((
            Ring::Driven,
            HourNumbering::Full,
            Unit::Hours,
            Increases::East,
        ));
        let decs = [
            DeclinationNumbering::Signed,
            DeclinationNumbering::Quarters,
            DeclinationNumbering::PolarDistance,
            DeclinationNumbering::SouthPolarDistance,
            DeclinationNumbering::Full,
        ];
        let stars = Catalogue::builtin().bright_stars(2.6);
        hours
            .into_iter()
            .zip(decs.into_iter().cycle())
            .map(|((ring, numbering, unit, increases), dec)| {
                let mut trial = Trial::new();
                let circle = &mut trial.mount.hour_circle;
                (circle.ring, circle.numbering) = (ring, numbering);
                (circle.unit, circle.increases) = (unit, increases);
                if unit == Unit::Degrees {
                    circle.division = Angle::from_degrees(1.0);
                    circle.vernier = Some(Angle::from_arcminutes(5.0));
                }
                trial.mount.declination_circle.numbering = dec;
                Self {
                    prior: Prior::from_expected(&trial.mount.expected),
                    trial,
                    stars: stars.clone(),
                }
            })
            .collect()
    }

    /// What the circles show of a star, rounded to the vernier.
    fn read(&self, moment: &Moment, name: &str, side: Side, slipped: Angle) -> Sighting {
        let place = moment.observed(&moment.apparent(&target(name).source));
        let errors = true_errors();
        let latitude = moment.observer().latitude;
        let axes = to_axes(place.hour_angle, place.declination, latitude, &errors, side).unwrap();
        let (hour, dec) = (self.hour(), &self.trial.mount.declination_circle);
        let shown = AxisAngle::new(axes.hour.angle() + slipped);
        let (hour_scale, dec_scale) = (hour.scale(), dec.scale());
        let hour = hour.reading(shown, moment.apparent_sidereal(), side);
        Sighting {
            side,
            hour: rounded(hour, hour_scale.settable_step()),
            dec: rounded(dec.reading(axes.dec), dec_scale.settable_step()),
            hour_opposite: None,
            dec_opposite: None,
            timed: false,
        }
    }

    const fn hour(&self) -> &HourCircle {
        &self.trial.mount.hour_circle
    }

    fn suspicion(&self, now: &Moment, name: &str, sighting: &Sighting) -> Option<Suspicion> {
        self.suspicion_when(now, name, sighting, Circumstances::default())
    }

    fn suspicion_when(
        &self,
        now: &Moment,
        name: &str,
        sighting: &Sighting,
        circumstances: Circumstances,
    ) -> Option<Suspicion> {
        let then = moment(EVENING);
        let sights: Vec<Sight> = BEFORE
            .into_iter()
            .map(|(star, side)| {
                let read = self.read(&then, star, side, Angle::ZERO);
                read.sight(&self.trial.mount, &then, &target(star).source)
            })
            .collect();
        let questioned = Questioned {
            mount: &self.trial.mount,
            moment: now,
            target: &target(name),
            sighting,
            stars: &self.stars,
            circumstances,
        };
        questioned.suspicion(&Earlier {
            prior: &self.prior,
            sights: &sights,
        })
    }
}

fn rounded(reading: Reading, step: Angle) -> Reading {
    Reading {
        value: step * (reading.value / step).round(),
        ..reading
    }
}

fn first(suspicion: Option<Suspicion>) -> Explanation {
    let suspicion = suspicion.unwrap();
    let shares: f64 = suspicion.explanations.iter().map(|one| one.share).sum();
    let whole = shares + suspicion.sound + suspicion.unexplained;
    assert!(whole < 1.0 + 1e-9 && whole > 0.9, "{suspicion:?}");
    suspicion.explanations.into_iter().next().unwrap()
}

#[test]
fn a_sound_reading_is_not_suspicious() {
    let now = moment(EVENING);
    for engraved in Engraved::all() {
        for side in [Side::TubeWest, Side::TubeEast] {
            let sighting = engraved.read(&now, "Pollux", side, Angle::ZERO);
            assert_eq!(engraved.suspicion(&now, "Pollux", &sighting), None);
        }
    }
}

#[test]
fn another_star_is_named() {
    let now = moment(EVENING);
    for engraved in Engraved::all() {
        let sighting = engraved.read(&now, "Castor", Side::TubeWest, Angle::ZERO);
        let named = first(engraved.suspicion(&now, "Pollux", &sighting));
        assert_eq!(named.kind, Kind::OtherStar);
        assert_eq!(named.text, "this was Castor, not Pollux");
        assert!(matches!(named.correction, Correction::Star(star) if star.name == "Castor"));
    }
}

#[test]
fn a_circle_misread_by_a_step_is_put_right() {
    let now = moment(EVENING);
    for engraved in Engraved::all() {
        let sound = engraved.read(&now, "Pollux", Side::TubeWest, Angle::ZERO);
        let misread = |reading: Reading, by: Angle| Reading {
            value: if reading.value < Angle::ZERO {
                reading.value - by
            } else {
                reading.value + by
            },
            ..reading
        };
        let by = match engraved.hour().unit {
            Unit::Hours => Angle::from_hours(1.0),
            Unit::Degrees => Angle::from_degrees(10.0),
        };
        let hour = misread(sound.hour, by);
        let named = first(engraved.suspicion(&now, "Pollux", &Sighting { hour, ..sound }));
        assert_eq!(named.kind, Kind::HourMisread, "{named:?}");
        puts_right(&named, Circle::Hour, sound.hour);
        let dec = misread(sound.dec, Angle::from_degrees(10.0));
        let named = first(engraved.suspicion(&now, "Pollux", &Sighting { dec, ..sound }));
        assert_eq!(named.kind, Kind::DecMisread, "{named:?}");
        puts_right(&named, Circle::Dec, sound.dec);
        let scale = engraved.trial.mount.declination_circle.scale();
        let (right, wrong) = (scale.text(sound.dec), scale.text(dec));
        assert_eq!(
            named.text,
            format!("declination circle misread by ten degrees: {right} rather than {wrong}")
        );
    }
}

fn puts_right(named: &Explanation, number: Circle, was: Reading) {
    let Correction::Reading {
        circle, reading, ..
    } = &named.correction
    else {
        panic!("{named:?}")
    };
    assert_eq!(*circle, number);
    assert!(
        (reading.value - was.value).abs().arcseconds() < 1.0,
        "{named:?}"
    );
    assert_eq!(reading.half, was.half);
}

#[test]
fn a_wrong_sign_or_letter_is_put_right() {
    let now = moment(EVENING);
    for engraved in Engraved::all() {
        let sound = engraved.read(&now, "Pollux", Side::TubeWest, Angle::ZERO);
        let turned = |reading: Reading, is_signed: bool| match (is_signed, reading.half) {
            (true, _) => Some(Reading {
                value: -reading.value,
                ..reading
            }),
            (false, Some(half)) => Some(Reading {
                half: Some(match half {
                    Half::North => Half::South,
                    Half::South => Half::North,
                    Half::East => Half::West,
                    Half::West => Half::East,
                }),
                ..reading
            }),
            _ => None,
        };
        let signed = engraved.hour().numbering == HourNumbering::PlusMinus;
        if let Some(hour) = turned(sound.hour, signed) {
            let named = first(engraved.suspicion(&now, "Pollux", &Sighting { hour, ..sound }));
            assert_eq!(named.kind, Kind::WrongSign, "{named:?}");
            puts_right(&named, Circle::Hour, sound.hour);
        }
        let numbering = engraved.trial.mount.declination_circle.numbering;
        if let Some(dec) = turned(sound.dec, numbering == DeclinationNumbering::Signed) {
            let named = first(engraved.suspicion(&now, "Pollux", &Sighting { dec, ..sound }));
            assert_eq!(named.kind, Kind::WrongSign, "{named:?}");
            puts_right(&named, Circle::Dec, sound.dec);
        }
    }
}

#[test]
fn the_other_side_of_the_pier_is_named() {
    let now = moment(EVENING);
    for engraved in Engraved::all() {
        for (stood, said) in [
            (Side::TubeWest, Side::TubeEast),
            (Side::TubeEast, Side::TubeWest),
        ] {
            let sighting = Sighting {
                side: said,
                ..engraved.read(&now, "Pollux", stood, Angle::ZERO)
            };
            let named = first(engraved.suspicion(&now, "Pollux", &sighting));
            assert_eq!(named.kind, Kind::OtherSide, "{named:?}");
            assert_eq!(named.correction, Correction::Side(stood));
        }
    }
}

#[test]
fn a_slipped_ring_is_named_with_its_amount() {
    let now = moment(EVENING);
    let slip = Angle::from_degrees(3.2);
    for engraved in Engraved::all() {
        // a ring made fast hardly ever slips
        if engraved.hour().ring == Ring::Fixed {
            continue;
        }
        let sighting = engraved.read(&now, "Pollux", Side::TubeWest, slip);
        let named = first(engraved.suspicion(&now, "Pollux", &sighting));
        assert_eq!(named.kind, Kind::RingSlipped, "{named:?}");
        let Correction::Slipped {
            hour: Some(by),
            dec: None,
        } = named.correction
        else {
            panic!("{named:?}")
        };
        assert!((by - slip).abs().arcminutes() < 15.0, "{named:?}");
        assert!(
            named.text.starts_with("the hour circle has slipped by 1"),
            "{named:?}"
        );
    }
}

#[test]
fn a_clock_that_leapt_is_put_right_where_its_time_matters() {
    let now = moment(EVENING);
    let leapt = Circumstances {
        clock_agreed: true,
        clock_leapt_s: Some(1_234.0),
    };
    for engraved in Engraved::all() {
        let sighting = engraved.read(&now, "Pollux", Side::TubeWest, Angle::ZERO);
        let by_the_clock = now.later(1_234.0);
        let suspicion = engraved.suspicion_when(&by_the_clock, "Pollux", &sighting, leapt);
        if engraved.hour().ring == Ring::Driven {
            // its reading hangs on no clock
            assert_eq!(suspicion, None);
            continue;
        }
        let named = first(suspicion);
        assert_eq!(named.correction, Correction::Clock { seconds: -1_234.0 });
        assert_eq!(named.text, "the clock was 20m 34s ahead");
    }
}
