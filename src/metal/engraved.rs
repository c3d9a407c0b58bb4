//! A reading as the engraving has it: the text, and where it lies among the marks.
//!
//! The text is rounded to what the eye can set, the vernier's least count or else a quarter of a division
//! (common practice, no source), and brought back onto the scale after the rounding: 23h 59m 58s may become
//! 0h 00m. "Past" a mark is the way the numbers grow there, so away from zero on a scale that has two sides.

use crate::angle::Angle;
use crate::metal::graduation::{Graduation, VernierLine};
use crate::metal::scale::{Face, Reading, SAME_POSITION_RAD, Scale};
use crate::sexagesimal::Notation;

/// Without a vernier the eye sets a quarter of a division (common practice, no source).
const DIVISIONS_THE_EYE_SETS: f64 = 0.25;

/// A value this near the next mark, in divisions, lies on it: rounding, not engraving.
const ON_A_MARK_DIVISIONS: f64 = 1e-7;

/// Parts of a division as an observer says them, none further than a twentieth from its neighbour's middle.
const PARTS: [(f64, &str); 11] = [
    (0.1, "a tenth of a division"),
    (0.2, "a fifth of a division"),
    (0.25, "a quarter of a division"),
    (1.0 / 3.0, "a third of a division"),
    (0.4, "two fifths of a division"),
    (0.5, "half a division"),
    (0.6, "three fifths of a division"),
    (2.0 / 3.0, "two thirds of a division"),
    (0.75, "three quarters of a division"),
    (0.8, "four fifths of a division"),
    (0.9, "nine tenths of a division"),
];

impl Scale {
    /// The smallest step the eye can set.
    #[must_use]
    pub fn settable_step(&self) -> Angle {
        self.vernier
            .unwrap_or(self.division * DIVISIONS_THE_EYE_SETS)
    }

    /// The reading as engraved, rounded as the eye can set it: `20h 56m 40s`, `3h 12m E`, `-5° 24'`.
    #[must_use]
    pub fn text(&self, reading: Reading) -> String {
        let step = self.settable_step();
        self.write(self.rounded(reading, step), step)
    }

    /// Where the reading lies among the marks; with a vernier, after rounding to its least count.
    #[must_use]
    pub fn graduation(&self, reading: Reading) -> Graduation {
        let seen = match self.vernier {
            Some(least_count) => self.rounded(reading, least_count),
            None => reading,
        };
        let divisions = seen.value.abs() / self.division;
        let marks = (divisions + ON_A_MARK_DIVISIONS).floor();
        let past = (divisions - marks).max(0.0);
        let numbered = |marks: f64| {
            let size = self.division * marks;
            let value = if seen.value < Angle::ZERO {
                -size
            } else {
                size
            };
            let half = seen.half;
            let mark = self.on_scale(Reading { value, half });
            (mark, self.write_unlettered(mark, self.division))
        };
        let (mark, mark_text) = numbered(marks);
        let vernier = self.vernier.map(|least_count| {
            let line = (self.division * past / least_count).round();
            VernierLine {
                number: whole(line),
                text: Notation::new(self.unit, least_count).write_size(least_count * line),
            }
        });
        let between_marks = vernier.as_ref().is_some_and(|line| line.number > 0);
        let words = match part(past) {
            Part::Of(part) => format!("{part} past {mark_text}"),
            Part::None if between_marks => format!("just past {mark_text}"),
            Part::None => format!("on the mark {mark_text}"),
            Part::Whole if between_marks => format!("just short of {}", numbered(marks + 1.0).1),
            Part::Whole => format!("on the mark {}", numbered(marks + 1.0).1),
        };
        Graduation {
            mark,
            mark_text,
            past,
            words,
            vernier,
        }
    }

    /// The reading to the nearest step, on the scale.
    pub(super) fn rounded(&self, reading: Reading, step: Angle) -> Reading {
        let value = Notation::new(self.unit, step).round(reading.value);
        self.on_scale(Reading { value, ..reading })
    }

    /// The reading as text, as fine as the step, with sign and letter where the scale has them.
    pub(super) fn write(&self, reading: Reading, step: Angle) -> String {
        let number = self.write_unlettered(reading, step);
        match reading.half {
            Some(half) => format!("{number} {half}"),
            None => number,
        }
    }

    /// As [`Self::write`], without the letter.
    pub(super) fn write_unlettered(&self, reading: Reading, step: Angle) -> String {
        let number = Notation::new(self.unit, step).write(reading.value.abs());
        if !self.face.is_signed() || self.is_shared_by_both_halves(reading.value) {
            number
        } else if reading.value < Angle::ZERO {
            format!("-{number}")
        } else {
            format!("+{number}")
        }
    }

    /// A rounded reading brought back onto the scale: what has passed the end stands at the end, which is
    /// zero on a scale that goes once round, and no letter stays where the halves meet.
    fn on_scale(&self, reading: Reading) -> Reading {
        let end = self.face.greatest();
        let past_end = reading.value.abs().radians() > end.radians() - SAME_POSITION_RAD;
        let value = match self.face {
            Face::Turn if past_end => Angle::ZERO,
            Face::SignedQuarters if past_end && reading.value < Angle::ZERO => -end,
            // ±180° is one mark
            _ if past_end => end,
            _ => reading.value,
        };
        let half = reading
            .half
            .filter(|_| !self.is_shared_by_both_halves(value));
        Reading { value, half }
    }

    /// True at zero, and at 180° where that is the end.
    fn is_shared_by_both_halves(&self, value: Angle) -> bool {
        let size = value.abs();
        let ends_at_half_turn = matches!(self.face, Face::Halves | Face::SignedHalves);
        size.radians() < SAME_POSITION_RAD
            || ends_at_half_turn && (size - Angle::HALF_TURN).abs().radians() < SAME_POSITION_RAD
    }
}

/// A part of a division in words.
enum Part {
    None,
    Of(&'static str),
    Whole,
}

fn part(past: f64) -> Part {
    let whole = [(0.0, Part::None), (1.0, Part::Whole)].into_iter();
    let parts = PARTS.into_iter().map(|(size, said)| (size, Part::Of(said)));
    whole
        .chain(parts)
        .min_by(|a, b| (a.0 - past).abs().total_cmp(&(b.0 - past).abs()))
        .map_or(Part::None, |(_, part)| part)
}

/// A count of lines as a whole number.
#[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // not negative; a cast holds at the ends
fn whole(count: f64) -> u32 {
    count.max(0.0) as u32
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::AxisAngle;
    use crate::metal::circle::samples::{declination_circle, hour_circle};
    use crate::metal::{DeclinationNumbering, HourCircle, HourNumbering, Increases, Side};
    use crate::sexagesimal::Unit;
    use crate::time::SiderealTime;

    fn with_vernier(numbering: HourNumbering) -> HourCircle {
        HourCircle {
            vernier: Some(Angle::from_time_seconds(20.0)),
            ..hour_circle(numbering)
        }
    }

    fn text(circle: &HourCircle, shown: Angle) -> String {
        let reading = circle.reading(AxisAngle::new(shown), SiderealTime::default(), Side::Single);
        circle.scale().text(reading)
    }

    fn hms(h: f64, m: f64, s: f64) -> Angle {
        Angle::from_time_seconds(h.signum() * ((h.abs() * 60.0 + m) * 60.0 + s))
    }

    #[test]
    fn an_hour_circle_is_written_as_it_is_engraved() {
        let full = with_vernier(HourNumbering::Full);
        assert_eq!(text(&full, hms(20.0, 56.0, 38.0)), "20h 56m 40s");
        assert_eq!(text(&full, hms(-3.0, 3.0, 20.0)), "20h 56m 40s");
        let halves = hour_circle(HourNumbering::Halves);
        assert_eq!(text(&halves, hms(-3.0, 12.0, 20.0)), "3h 12m E");
        assert_eq!(text(&halves, hms(3.0, 12.0, 40.0)), "3h 13m W");
        let signed = hour_circle(HourNumbering::PlusMinus);
        assert_eq!(text(&signed, hms(3.0, 12.0, 0.0)), "+3h 12m");
        assert_eq!(text(&signed, hms(-3.0, 12.0, 0.0)), "-3h 12m");
        let degrees = HourCircle {
            unit: Unit::Degrees,
            division: Angle::from_arcminutes(48.0),
            ..hour_circle(HourNumbering::Full)
        };
        assert_eq!(text(&degrees, Angle::from_degrees(-45.8)), "314° 12'");
    }

    #[test]
    fn rounding_up_to_the_end_comes_back_onto_the_scale() {
        let full = with_vernier(HourNumbering::Full);
        assert_eq!(text(&full, hms(23.0, 59.0, 58.0)), "0h 00m 00s");
        assert_eq!(text(&full, hms(23.0, 59.0, 49.0)), "23h 59m 40s");
        let coarse = hour_circle(HourNumbering::Full);
        assert_eq!(text(&coarse, hms(23.0, 59.0, 58.0)), "0h 00m");
        let odd = HourCircle {
            division: hms(0.0, 28.0, 0.0),
            ..coarse
        };
        assert_eq!(text(&odd, hms(23.0, 59.0, 0.0)), "0h 00m");
    }

    #[test]
    fn where_the_halves_meet_there_is_no_letter_and_no_sign() {
        let just = [
            hms(0.0, 0.0, 10.0),
            hms(12.0, 0.0, 0.0) - hms(0.0, 0.0, 10.0),
        ];
        for (shown, at) in just.into_iter().zip(["0h 00m", "12h 00m"]) {
            for shown in [shown, -shown] {
                for numbering in [HourNumbering::Halves, HourNumbering::PlusMinus] {
                    assert_eq!(text(&hour_circle(numbering), shown), at);
                }
            }
        }
    }

    #[test]
    fn a_declination_circle_is_written_as_it_is_engraved() {
        use DeclinationNumbering::{Full, PolarDistance, Quarters, Signed, SouthPolarDistance};
        for (numbering, shown, expected) in [
            (Quarters, 32.59, "32° 35' N"),
            (Quarters, 147.41, "32° 35' N"),
            (Quarters, -5.4, "5° 25' S"),
            (Quarters, -179.99, "0° 00'"),
            (Quarters, 90.0, "90° 00' N"),
            (Signed, 32.59, "+32° 35'"),
            (Signed, 147.41, "+32° 35'"),
            (Signed, -5.4, "-5° 25'"),
            (Signed, -89.99, "-90° 00'"),
            (Signed, 0.01, "0° 00'"),
            (PolarDistance, 32.59, "57° 25'"),
            (PolarDistance, 147.41, "57° 25'"),
            (SouthPolarDistance, 32.59, "122° 35'"),
            (Full, -5.4, "354° 35'"),
            (Full, -0.01, "0° 00'"),
        ] {
            let circle = crate::metal::DeclinationCircle {
                vernier: Some(Angle::from_arcminutes(5.0)),
                ..declination_circle(numbering)
            };
            let reading = circle.reading(AxisAngle::from_degrees(shown));
            assert_eq!(
                circle.scale().text(reading),
                expected,
                "{numbering:?} {shown}"
            );
        }
    }

    #[test]
    fn without_a_vernier_a_quarter_of_a_division_is_set() {
        let circle = declination_circle(DeclinationNumbering::Signed);
        let reading = circle.reading(AxisAngle::from_degrees(32.59));
        assert_eq!(circle.scale().text(reading), "+32° 30'");
    }

    #[test]
    fn where_it_lies_is_said_the_way_the_numbers_grow() {
        let words = |numbering, shown: Angle| {
            let circle = hour_circle(numbering);
            let reading =
                circle.reading(AxisAngle::new(shown), SiderealTime::default(), Side::Single);
            circle.scale().graduation(reading).words
        };
        for (numbering, shown, expected) in [
            (
                HourNumbering::Full,
                hms(3.0, 13.0, 36.0),
                "two fifths of a division past 3h 12m",
            ),
            (
                HourNumbering::Full,
                hms(3.0, 12.0, 2.0),
                "on the mark 3h 12m",
            ),
            (
                HourNumbering::Full,
                hms(3.0, 12.0, 0.0),
                "on the mark 3h 12m",
            ),
            (
                HourNumbering::Full,
                hms(3.0, 15.0, 56.0),
                "on the mark 3h 16m",
            ),
            (
                HourNumbering::Full,
                hms(23.0, 59.0, 58.0),
                "on the mark 0h 00m",
            ),
            (
                HourNumbering::Halves,
                hms(-3.0, 14.0, 0.0),
                "half a division past 3h 12m",
            ),
            (
                HourNumbering::PlusMinus,
                hms(-3.0, 14.0, 0.0),
                "half a division past -3h 12m",
            ),
            (
                HourNumbering::PlusMinus,
                hms(-0.0, 0.0, 0.0),
                "on the mark 0h 00m",
            ),
        ] {
            assert_eq!(words(numbering, shown), expected, "{numbering:?} {shown:?}");
        }
    }

    #[test]
    fn the_vernier_line_adds_up_with_the_mark() {
        let circle = with_vernier(HourNumbering::Full);
        let at = |shown: Angle| {
            let reading =
                circle.reading(AxisAngle::new(shown), SiderealTime::default(), Side::Single);
            let seen = circle.scale().graduation(reading);
            let line = seen.vernier.unwrap();
            (seen.words, line.number, line.text)
        };
        let own = |words: &str, number, text: &str| (words.to_owned(), number, text.to_owned());
        // 2m 20s past a mark is the seventh line of 20s
        let seventh = at(hms(20.0, 58.0, 22.0));
        assert_eq!(
            seventh,
            own("three fifths of a division past 20h 56m", 7, "2m 20s")
        );
        assert_eq!(
            at(hms(20.0, 56.0, 5.0)),
            own("on the mark 20h 56m", 0, "0s")
        );
        assert_eq!(
            at(hms(20.0, 59.0, 55.0)),
            own("on the mark 21h 00m", 0, "0s")
        );
        let fine = HourCircle {
            vernier: Some(Angle::from_time_seconds(5.0)),
            increases: Increases::East,
            ..circle
        };
        let reading = fine.reading(
            AxisAngle::new(-hms(1.0, 0.0, 5.0)),
            SiderealTime::default(),
            Side::Single,
        );
        let seen = fine.scale().graduation(reading);
        assert_eq!(seen.words, "just past 1h 00m");
        assert_eq!(seen.vernier.unwrap().number, 1);
    }
}
