//! What a circle may have shown when it was misread: the numbers one usual mistake away from a reading.
//!
//! Everything is worked on the scale as engraved, so that a misread number stays on the scale and keeps its sign or
//! letter unless that is the mistake. Which mistakes are usual is common practice, no source.

use crate::angle::Angle;
use crate::metal::circle::{DeclinationCircle, HourCircle};
use crate::metal::scale::{Face, Reading, SAME_POSITION_RAD, Scale};
use crate::sexagesimal::Unit;

/// From the equator to the pole.
const QUARTER_TURN: Angle = Angle::from_degrees(90.0);

/// What the circle shows if one mistake was made in reading it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Misreading {
    /// The number then really under the index.
    pub reading: Reading,
    /// The mistake.
    pub mistake: Mistake,
}

/// A mistake in reading a circle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Mistake {
    /// Out by one of these steps.
    Step(Step),
    /// The wrong letter, E for W or N for S.
    Letter,
    /// The wrong sign.
    Sign,
    /// Counted from a numbered mark against the way its numbers grow.
    CountedBack,
    /// A part of a division taken from the mark ahead instead of the mark behind.
    FromTheMarkAhead,
    /// Numbers taken as growing from the other end of the scale.
    OtherEnd,
    /// The complement, 90° less the number: a distance from the pole for one from the equator.
    Complement,
    /// Read at the mark opposite.
    OppositeMark,
}

/// A step by which circles are misread.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Step {
    /// An hour, fifteen degrees.
    Hour,
    /// Ten minutes of time.
    TenMinutes,
    /// Ten degrees.
    TenDegrees,
    /// Five degrees.
    FiveDegrees,
    /// One degree.
    Degree,
    /// From one numbered mark to the next.
    Number,
    /// A division.
    Division,
    /// Half a division: half the length of the vernier.
    HalfDivision,
}

/// The steps of a circle in hours, the commonest name of equal ones first.
const HOUR_STEPS: [Step; 5] = [
    Step::Hour,
    Step::TenMinutes,
    Step::Number,
    Step::Division,
    Step::HalfDivision,
];

/// The steps of a circle in degrees.
const DEGREE_STEPS: [Step; 6] = [
    Step::TenDegrees,
    Step::FiveDegrees,
    Step::Degree,
    Step::Number,
    Step::Division,
    Step::HalfDivision,
];

impl HourCircle {
    /// The readings one usual mistake away from this one.
    #[must_use]
    pub fn misreadings(&self, reading: Reading) -> Vec<Misreading> {
        let scale = self.scale();
        let mut found = scale.misreadings(reading);
        if self.second_fiducial {
            let opposite = scale.positions_of(reading).into_iter().map(|position| {
                let mut reading_there = scale.reading_at(position + Angle::HALF_TURN);
                reading_there.half = reading_there.half.filter(|_| reading.half.is_some());
                reading_there
            });
            for reading in opposite {
                scale.add(&mut found, reading, Mistake::OppositeMark);
            }
        }
        found
    }
}

impl DeclinationCircle {
    /// The readings one usual mistake away from this one.
    #[must_use]
    pub fn misreadings(&self, reading: Reading) -> Vec<Misreading> {
        self.scale().misreadings(reading)
    }
}

impl Scale {
    /// How large a step is on this scale.
    #[must_use]
    pub fn step(&self, step: Step) -> Angle {
        match step {
            Step::Hour => Angle::from_hours(1.0),
            Step::TenMinutes => Angle::from_time_seconds(600.0),
            Step::TenDegrees => Angle::from_degrees(10.0),
            Step::FiveDegrees => Angle::from_degrees(5.0),
            Step::Degree => Angle::from_degrees(1.0),
            Step::Number => self.numbered_step(),
            Step::Division => self.division,
            Step::HalfDivision => self.division / 2.0,
        }
    }

    /// The readings one usual mistake away from this one, each once.
    fn misreadings(&self, reading: Reading) -> Vec<Misreading> {
        let mut found = Vec::new();
        for (step, size) in self.usual_steps() {
            for by in [size, -size] {
                self.add_size(&mut found, reading, by, Mistake::Step(step));
            }
        }
        let size = reading.value.abs();
        if self.face.is_signed() {
            let value = -reading.value;
            self.add(&mut found, Reading { value, ..reading }, Mistake::Sign);
        }
        if let (Some(letters), Some(half)) = (self.letters, reading.half) {
            let other = if half == letters.growing {
                letters.falling
            } else {
                letters.growing
            };
            let half = Some(other);
            self.add(&mut found, Reading { half, ..reading }, Mistake::Letter);
        }
        let numbered = self.numbered_step();
        let below = numbered * (size / numbered).floor();
        for mark in [below, below + numbered] {
            let by = (mark - size) * 2.0;
            self.add_size(&mut found, reading, by, Mistake::CountedBack);
        }
        let behind = self.division * (size / self.division).floor();
        let by = behind * 2.0 + self.division - size * 2.0;
        self.add_size(&mut found, reading, by, Mistake::FromTheMarkAhead);
        let end = self.face.greatest();
        if self.face != Face::Quarters && self.face != Face::SignedQuarters {
            self.add_size(&mut found, reading, end - size * 2.0, Mistake::OtherEnd);
        }
        if self.unit == Unit::Degrees {
            let by = QUARTER_TURN - size * 2.0;
            self.add_size(&mut found, reading, by, Mistake::Complement);
        }
        found
    }

    /// The steps that can be misread on such a scale, each size once: none below a division but the half of it that a
    /// vernier spans.
    fn usual_steps(&self) -> Vec<(Step, Angle)> {
        let steps: &[Step] = match self.unit {
            Unit::Hours => &HOUR_STEPS,
            Unit::Degrees => &DEGREE_STEPS,
        };
        let mut found: Vec<(Step, Angle)> = Vec::with_capacity(steps.len());
        for &step in steps {
            let size = self.step(step);
            let on_the_scale = match step {
                Step::HalfDivision => self.vernier.is_some(),
                _ => size.radians() > self.division.radians() - SAME_POSITION_RAD,
            };
            let named = found.iter().any(|(_, other)| same(*other, size));
            if on_the_scale && !named {
                found.push((step, size));
            }
        }
        found
    }

    /// Adds the reading whose number is larger by so much, its sign and letter kept, if it is on the scale.
    fn add_size(&self, found: &mut Vec<Misreading>, reading: Reading, by: Angle, how: Mistake) {
        let size = reading.value.abs() + by;
        let size = match self.face {
            Face::Turn => size.wrapped_positive(),
            _ if size < Angle::ZERO => return,
            _ => size,
        };
        let value = if reading.value < Angle::ZERO {
            -size
        } else {
            size
        };
        self.add(found, Reading { value, ..reading }, how);
    }

    /// Adds a reading if it is on the scale, is not the one misread and is not there yet.
    fn add(&self, found: &mut Vec<Misreading>, reading: Reading, mistake: Mistake) {
        if self.holds(reading.value) && found.iter().all(|other| other.reading != reading) {
            found.push(Misreading { reading, mistake });
        }
    }
}

fn same(a: Angle, b: Angle) -> bool {
    (a - b).abs().radians() < SAME_POSITION_RAD
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::metal::circle::samples::{declination_circle, hour_circle};
    use crate::metal::{DeclinationNumbering, HourNumbering, Increases, read_dec, read_hour};

    fn hour_texts(circle: &HourCircle, typed: &str) -> Vec<(String, Mistake)> {
        let scale = circle.scale();
        let reading = read_hour(circle, typed).unwrap();
        circle
            .misreadings(reading)
            .into_iter()
            .map(|one| (scale.text(one.reading), one.mistake))
            .collect()
    }

    fn dec_texts(circle: &DeclinationCircle, typed: &str) -> Vec<(String, Mistake)> {
        let scale = circle.scale();
        let reading = read_dec(circle, typed).unwrap();
        circle
            .misreadings(reading)
            .into_iter()
            .map(|one| (scale.text(one.reading), one.mistake))
            .collect()
    }

    fn holds(found: &[(String, Mistake)], text: &str, mistake: Mistake) {
        assert!(
            found
                .iter()
                .any(|(seen, how)| seen == text && *how == mistake),
            "{text} {mistake:?} in {found:#?}"
        );
    }

    #[test]
    fn an_hour_circle_is_misread_by_its_own_steps() {
        let full = HourCircle {
            vernier: Some(Angle::from_time_seconds(20.0)),
            ..hour_circle(HourNumbering::Full)
        };
        let found = hour_texts(&full, "18h 58m 40s");
        for (text, step) in [
            ("17h 58m 40s", Step::Hour),
            ("19h 58m 40s", Step::Hour),
            ("18h 48m 40s", Step::TenMinutes),
            ("18h 38m 40s", Step::Number),
            ("19h 02m 40s", Step::Division),
            ("18h 56m 40s", Step::HalfDivision),
        ] {
            holds(&found, text, Mistake::Step(step));
        }
        holds(&found, "5h 01m 20s", Mistake::OtherEnd);
        holds(&found, "19h 01m 20s", Mistake::CountedBack);
        // over the end of the scale
        let found = hour_texts(&full, "23h 30m");
        holds(&found, "0h 30m 00s", Mistake::Step(Step::Hour));
    }

    #[test]
    fn a_letter_or_a_sign_may_be_the_wrong_one() {
        let halves = hour_circle(HourNumbering::Halves);
        let found = hour_texts(&halves, "3h 12m E");
        holds(&found, "3h 12m W", Mistake::Letter);
        holds(&found, "4h 12m E", Mistake::Step(Step::Hour));
        let found = hour_texts(&halves, "0h 12m E");
        assert!(found.iter().all(|(text, _)| !text.starts_with('-')));
        // a letter not typed cannot be wrong
        let found = hour_texts(&halves, "3h 12m");
        assert!(found.iter().all(|(_, how)| *how != Mistake::Letter));
        let signed = hour_circle(HourNumbering::PlusMinus);
        let found = hour_texts(&signed, "-3h 12m");
        holds(&found, "+3h 12m", Mistake::Sign);
        holds(&found, "-4h 12m", Mistake::Step(Step::Hour));
        let quarters = declination_circle(DeclinationNumbering::Quarters);
        holds(&dec_texts(&quarters, "32 N"), "32° 00' S", Mistake::Letter);
        let signed = declination_circle(DeclinationNumbering::Signed);
        holds(&dec_texts(&signed, "-5"), "+5° 00'", Mistake::Sign);
    }

    #[test]
    fn a_declination_circle_is_misread_by_degrees_and_from_its_numbers() {
        for (numbering, typed) in [
            (DeclinationNumbering::Signed, "37 30"),
            (DeclinationNumbering::Quarters, "37 30"),
            (DeclinationNumbering::PolarDistance, "37 30"),
            (DeclinationNumbering::SouthPolarDistance, "37 30"),
            (DeclinationNumbering::Full, "37 30"),
        ] {
            let found = dec_texts(&declination_circle(numbering), typed);
            let sign = if numbering == DeclinationNumbering::Signed {
                "+"
            } else {
                ""
            };
            for (text, how) in [
                ("47° 30'", Mistake::Step(Step::TenDegrees)),
                ("32° 30'", Mistake::Step(Step::FiveDegrees)),
                ("38° 30'", Mistake::Step(Step::Degree)),
                ("52° 30'", Mistake::Complement),
            ] {
                holds(&found, &format!("{sign}{text}"), how);
            }
        }
        let polar = declination_circle(DeclinationNumbering::PolarDistance);
        holds(&dec_texts(&polar, "63 45"), "116° 15'", Mistake::OtherEnd);
        holds(&dec_texts(&polar, "63 45"), "66° 15'", Mistake::CountedBack);
    }

    #[test]
    fn the_mark_opposite_reads_twelve_hours_on() {
        let full = HourCircle {
            second_fiducial: true,
            ..hour_circle(HourNumbering::Full)
        };
        holds(
            &hour_texts(&full, "3h 12m"),
            "15h 12m",
            Mistake::OppositeMark,
        );
        let halves = HourCircle {
            numbering: HourNumbering::Halves,
            increases: Increases::East,
            ..full
        };
        let found = hour_texts(&halves, "3h 12m E");
        holds(&found, "8h 48m W", Mistake::OppositeMark);
    }

    #[test]
    fn no_misreading_is_off_the_scale_or_there_twice() {
        for numbering in [
            HourNumbering::Full,
            HourNumbering::Halves,
            HourNumbering::PlusMinus,
        ] {
            for unit in [Unit::Hours, Unit::Degrees] {
                let circle = HourCircle {
                    unit,
                    ..hour_circle(numbering)
                };
                let scale = circle.scale();
                for tenth in 0..360 {
                    let reading = scale.reading_at(Angle::from_degrees(f64::from(tenth)));
                    let found = circle.misreadings(reading);
                    for (at, one) in found.iter().enumerate() {
                        assert!(!scale.positions_of(one.reading).is_empty());
                        let again = found.iter().skip(at + 1);
                        assert!(again.clone().all(|other| other.reading != one.reading));
                    }
                }
            }
        }
    }
}
