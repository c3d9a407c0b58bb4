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
        if self.face.is_signed() {
            let value = if backwards {
                -written.size
            } else {
                written.size
            };
            return Ok(Reading { value, half: None });
        }
        // the end of a scale that goes once round is its beginning
        let value = match self.face {
            Face::Turn => written.size.wrapped_positive(),
            _ => written.size,
        };
        let half = written.half;
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
