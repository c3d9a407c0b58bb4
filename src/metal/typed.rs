//! What an observer types for a reading, in the circle's own notation.
//!
//! A bare number is in the circle's unit; degrees on a circle in hours, and hours on an hour circle in
//! degrees, are converted where they are marked. A sign is taken only where the engraving has one, a letter
//! only where it tells the halves apart, N and S on declination circles, E and W on hour circles.

use crate::angle::Angle;
use crate::metal::circle::{DeclinationCircle, HourCircle};
use crate::metal::scale::{Face, Reading, Scale};
use crate::sexagesimal::{Half, Notation, TextFault, Unit, Written, read};

/// What the letters of a kind of circle are, for messages.
#[derive(Clone, Copy, PartialEq, Eq)]
enum CircleKind {
    Hour,
    Declination,
}

/// Reads what was typed for an hour circle.
pub fn read_hour(circle: &HourCircle, text: &str) -> Result<Reading, TextFault> {
    let written = read(text, circle.unit)?;
    circle.scale().typed(&written, text, CircleKind::Hour)
}

/// Reads what was typed for a declination circle.
pub fn read_dec(circle: &DeclinationCircle, text: &str) -> Result<Reading, TextFault> {
    let written = read(text, Unit::Degrees)?;
    if written.unit == Unit::Hours {
        return Err(fault(
            text,
            "a declination circle has degrees, not hours".to_owned(),
            "write it as 32° 35', 32 35 or 32.6",
        ));
    }
    circle
        .scale()
        .typed(&written, text, CircleKind::Declination)
}

impl Scale {
    fn typed(&self, written: &Written, text: &str, kind: CircleKind) -> Result<Reading, TextFault> {
        if written.negative.is_some() && !self.face.is_signed() {
            return Err(fault(
                text,
                "this circle has no signs".to_owned(),
                match self.letters {
                    Some(_) if kind == CircleKind::Hour => "leave the sign out; E or W may follow",
                    Some(_) => "leave the sign out; N or S may follow",
                    None => "type the number as it is engraved",
                },
            ));
        }
        let backwards = match written.half {
            Some(letter) => self.letter_is_falling(letter, text, kind)?,
            None => written.negative == Some(true),
        };
        if !self.holds(written.size) {
            return Err(fault(text, self.range_in_words(), "look at it again"));
        }
        let signed = if backwards && self.face.is_signed() {
            -written.size
        } else {
            written.size
        };
        let value = match self.face {
            // the end of a scale that goes once round is its beginning
            Face::Turn => signed.wrapped_positive(),
            // ±180° is one mark
            Face::SignedHalves => signed.wrapped_signed(),
            _ => signed,
        };
        // a sign says already which half it is
        let half = written.half.filter(|_| !self.face.is_signed());
        Ok(Reading { value, half })
    }

    /// True if the letter names the half that falls from zero, an error if it names none of this circle's.
    fn letter_is_falling(
        &self,
        letter: Half,
        text: &str,
        kind: CircleKind,
    ) -> Result<bool, TextFault> {
        let hint = "leave the letter out";
        let Some(letters) = self.letters else {
            let message = match kind {
                CircleKind::Hour => "this circle has no E and W",
                CircleKind::Declination => "this circle has no N and S",
            };
            return Err(fault(text, message.to_owned(), hint));
        };
        if letter == letters.falling {
            Ok(true)
        } else if letter == letters.growing {
            Ok(false)
        } else {
            let message = match kind {
                CircleKind::Hour => "N and S belong to a declination circle",
                CircleKind::Declination => "E and W belong to an hour circle",
            };
            Err(fault(text, message.to_owned(), hint))
        }
    }

    fn range_in_words(&self) -> String {
        let greatest = self.face.greatest();
        let whole = Notation::new(self.unit, self.unit.of(1.0));
        let least = if self.face.is_signed() {
            -greatest
        } else {
            Angle::ZERO
        };
        format!(
            "the circle goes from {} to {}",
            whole.write(least),
            whole.write(greatest)
        )
    }

    /// How a reading was understood, as exactly as it was typed: `23h 04m 20s, vernier`,
    /// `3h 13m, E or W: a quarter of a division past 3h 12m`.
    #[must_use]
    pub fn understood(&self, reading: Reading) -> String {
        let number = self.write(reading, self.typed_step(reading.value));
        let unsaid = match self.letters {
            Some(letters)
                if reading.half.is_none()
                    && !self.face.is_signed()
                    && self.positions_of(reading).len() > 1 =>
            {
                let (one, other) = if letters.growing == Half::West {
                    (letters.falling, letters.growing)
                } else {
                    (letters.growing, letters.falling)
                };
                format!(", {one} or {other}")
            }
            _ => String::new(),
        };
        let graduation = self.graduation(reading);
        let between_marks = graduation.vernier.as_ref().map(|line| line.number > 0);
        match between_marks {
            Some(true) => format!("{number}{unsaid}, vernier"),
            Some(false) => format!("{number}{unsaid}, on a mark"),
            None => format!("{number}{unsaid}: {}", graduation.words),
        }
    }

    /// The coarsest of minutes, seconds and tenths that leaves nothing of a typed value out.
    fn typed_step(&self, value: Angle) -> Angle {
        /// A hundredth of a second typed is already finer than any circle.
        const NOTHING_S: f64 = 0.005;
        let seconds = self.unit.measure(value) * 3600.0;
        let step_s = [60.0, 1.0]
            .into_iter()
            .find(|step: &f64| (seconds - (seconds / step).round() * step).abs() < NOTHING_S)
            .unwrap_or(0.1);
        self.unit.of(step_s / 3600.0)
    }
}

/// A fault of the whole of what was typed, without the blanks around it.
fn fault(text: &str, message: String, hint: &'static str) -> TextFault {
    let start = text.len() - text.trim_start().len();
    let end = text.trim_end().len().max(start);
    TextFault {
        at: start..end,
        message,
        hint,
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::metal::circle::samples::{declination_circle, hour_circle};
    use crate::metal::{DeclinationNumbering, HourNumbering, Increases};

    /// Rounding of the change of units, in degrees.
    const ROUNDING_DEG: f64 = 1e-9;

    const HOUR_NUMBERINGS: [HourNumbering; 3] = [
        HourNumbering::Full,
        HourNumbering::Halves,
        HourNumbering::PlusMinus,
    ];
    const DECLINATION_NUMBERINGS: [DeclinationNumbering; 5] = [
        DeclinationNumbering::Signed,
        DeclinationNumbering::Quarters,
        DeclinationNumbering::PolarDistance,
        DeclinationNumbering::SouthPolarDistance,
        DeclinationNumbering::Full,
    ];

    fn degrees_circle(numbering: HourNumbering) -> HourCircle {
        HourCircle {
            unit: Unit::Degrees,
            ..hour_circle(numbering)
        }
    }

    fn assert_read(reading: Result<Reading, TextFault>, degrees: f64, half: Option<Half>) {
        let reading = reading.unwrap();
        assert!(
            (reading.value.degrees() - degrees).abs() < ROUNDING_DEG,
            "{reading:?}"
        );
        assert_eq!(reading.half, half, "{reading:?}");
    }

    #[test]
    fn an_hour_circle_takes_its_own_notation_and_the_other_unit_where_marked() {
        use HourNumbering::{Full, Halves, PlusMinus};
        for (circle, text, degrees, half) in [
            (hour_circle(Full), "20h 56m 40.5s", 314.168_75, None),
            (hour_circle(Full), "20 56 40", 314.166_666_666_667, None),
            (hour_circle(Full), "314.2d", 314.2, None),
            (hour_circle(Full), "24h", 0.0, None),
            (degrees_circle(Full), "314.2", 314.2, None),
            (degrees_circle(Full), "20h 56m", 314.0, None),
            (hour_circle(Halves), "3 12", 48.0, None),
            (hour_circle(Halves), "3h 12m E", 48.0, Some(Half::East)),
            (hour_circle(Halves), "12 W", 180.0, Some(Half::West)),
            (hour_circle(PlusMinus), "-3h 12m", -48.0, None),
            (hour_circle(PlusMinus), "-12h", 180.0, None),
            (hour_circle(PlusMinus), "+3h 12m", 48.0, None),
            (hour_circle(PlusMinus), "3 12", 48.0, None),
            (hour_circle(PlusMinus), "3 12 E", -48.0, None),
        ] {
            assert_read(read_hour(&circle, text), degrees, half);
        }
        // a sign follows the numbers, a letter the sky
        let eastward = HourCircle {
            increases: Increases::East,
            ..hour_circle(PlusMinus)
        };
        assert_read(read_hour(&eastward, "3 12 E"), 48.0, None);
    }

    #[test]
    fn a_declination_circle_takes_its_own_notation() {
        use DeclinationNumbering::{Full, PolarDistance, Quarters, Signed};
        for (numbering, text, degrees, half) in [
            (Quarters, "32 35 N", 32.583_333_333_333, Some(Half::North)),
            (Quarters, "32 35 s", 32.583_333_333_333, Some(Half::South)),
            (Quarters, "32.5", 32.5, None),
            (Signed, "-5.4", -5.4, None),
            (Signed, "-0 30", -0.5, None),
            (Signed, "5.4 S", -5.4, None),
            (PolarDistance, "157 25", 157.416_666_666_667, None),
            (Full, "312 30 15", 312.504_166_666_667, None),
        ] {
            assert_read(
                read_dec(&declination_circle(numbering), text),
                degrees,
                half,
            );
        }
    }

    #[test]
    fn a_quarter_without_its_letter_leaves_the_choice_open() {
        let circle = declination_circle(DeclinationNumbering::Quarters);
        let count = |text| circle.candidates(read_dec(&circle, text).unwrap()).len();
        assert_eq!(
            (count("32 N"), count("32"), count("0"), count("90")),
            (2, 4, 2, 2)
        );
    }

    #[test]
    fn what_is_not_on_the_circle_is_refused_and_said() {
        use DeclinationNumbering::{PolarDistance, Quarters, Signed};
        use HourNumbering::{Full, Halves, PlusMinus};
        let said = |circle: &HourCircle, text: &str| read_hour(circle, text).unwrap_err();
        for (circle, text, message) in [
            (hour_circle(Full), "25h", "the circle goes from 0h to 24h"),
            (
                hour_circle(Halves),
                "12 01",
                "the circle goes from 0h to 12h",
            ),
            (
                hour_circle(PlusMinus),
                "-13h",
                "the circle goes from -12h to 12h",
            ),
            (
                degrees_circle(Full),
                "361",
                "the circle goes from 0° to 360°",
            ),
            (hour_circle(Full), "-3h", "this circle has no signs"),
            (hour_circle(Full), "+3h", "this circle has no signs"),
            (hour_circle(Full), "3h W", "this circle has no E and W"),
            (
                hour_circle(Halves),
                "3h N",
                "N and S belong to a declination circle",
            ),
        ] {
            assert_eq!(said(&circle, text).message, message, "{text}");
        }
        let hint = said(&hour_circle(Halves), " -3h ");
        assert_eq!(
            (hint.at, hint.hint),
            (1..4, "leave the sign out; E or W may follow")
        );
        let said = |numbering, text: &str| {
            read_dec(&declination_circle(numbering), text)
                .unwrap_err()
                .message
        };
        assert_eq!(said(Signed, "91"), "the circle goes from -90° to 90°");
        assert_eq!(said(Quarters, "95 N"), "the circle goes from 0° to 90°");
        assert_eq!(
            said(PolarDistance, "181"),
            "the circle goes from 0° to 180°"
        );
        assert_eq!(said(PolarDistance, "80 N"), "this circle has no N and S");
        assert_eq!(said(Quarters, "-5"), "this circle has no signs");
        assert_eq!(said(Quarters, "5 W"), "E and W belong to an hour circle");
        assert_eq!(
            said(Signed, "5h"),
            "a declination circle has degrees, not hours"
        );
    }

    #[test]
    fn it_says_how_a_reading_was_understood() {
        let plain = hour_circle(HourNumbering::Halves);
        let vernier = HourCircle {
            vernier: Some(Angle::from_time_seconds(20.0)),
            ..hour_circle(HourNumbering::Full)
        };
        for (circle, text, expected) in [
            (vernier, "23 05 20", "23h 05m 20s, vernier"),
            (vernier, "23.0733333h", "23h 04m 24s, vernier"),
            (vernier, "23 04", "23h 04m, on a mark"),
            (
                plain,
                "3 13 E",
                "3h 13m E: a quarter of a division past 3h 12m",
            ),
            (
                plain,
                "3 13",
                "3h 13m, E or W: a quarter of a division past 3h 12m",
            ),
            (plain, "0", "0h 00m: on the mark 0h 00m"),
        ] {
            let reading = read_hour(&circle, text).unwrap();
            assert_eq!(circle.scale().understood(reading), expected, "{text}");
        }
        let quarters = declination_circle(DeclinationNumbering::Quarters);
        let understood = quarters
            .scale()
            .understood(read_dec(&quarters, "32 35").unwrap());
        assert_eq!(
            understood,
            "32° 35', N or S: three fifths of a division past 32°"
        );
    }

    proptest! {
        #[test]
        fn nothing_typed_makes_it_stumble(text in "(\\PC{0,16})|([0-9hmsd°'\"+\\-., NSEW]{0,16})") {
            for numbering in HOUR_NUMBERINGS {
                for circle in [hour_circle(numbering), degrees_circle(numbering)] {
                    if let Ok(reading) = read_hour(&circle, &text) {
                        prop_assert!(!circle.scale().positions_of(reading).is_empty());
                        prop_assert!(!circle.scale().understood(reading).is_empty());
                    }
                }
            }
            for numbering in DECLINATION_NUMBERINGS {
                let circle = declination_circle(numbering);
                match read_dec(&circle, &text) {
                    Ok(reading) => prop_assert!(!circle.candidates(reading).is_empty()),
                    Err(fault) => prop_assert!(text.get(fault.at).is_some()),
                }
            }
        }
    }
}
