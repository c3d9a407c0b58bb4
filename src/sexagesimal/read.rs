//! Reading a written angle.
//!
//! Read: `20h 56m 40.5s`, `20 56 40`, `20:56:40`, `314.2d`, `32° 35'`, `32 35 N`, `-5.4`, `+0h40m`,
//! `4m`, `20s`, `30'`. The first mark settles the unit; a bare number is in the unit the caller
//! expects there. Only the last part may have decimals, and minutes and seconds stay below sixty
//! unless they stand first.

use std::ops::Range;

use super::{Half, TextFault, Unit, Written};
use crate::angle::Angle;

/// The places of a written angle.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
enum Place {
    Whole,
    Minutes,
    Seconds,
}

impl Place {
    const fn next(self) -> Option<Self> {
        match self {
            Self::Whole => Some(Self::Minutes),
            Self::Minutes => Some(Self::Seconds),
            Self::Seconds => None,
        }
    }

    const fn per_whole(self) -> f64 {
        match self {
            Self::Whole => 1.0,
            Self::Minutes => 60.0,
            Self::Seconds => 3600.0,
        }
    }
}

/// What a mark after a number says.
struct Mark {
    place: Place,
    /// The unit it names by itself; `m` and `s` after degrees are minutes and seconds of arc.
    unit: Option<Unit>,
}

fn mark(c: char) -> Option<Mark> {
    let (place, unit) = match c {
        'h' | 'H' => (Place::Whole, Some(Unit::Hours)),
        'd' | 'D' | '°' | 'º' => (Place::Whole, Some(Unit::Degrees)),
        'm' | 'M' => (Place::Minutes, None),
        's' => (Place::Seconds, None),
        '\'' | '′' | '’' => (Place::Minutes, Some(Unit::Degrees)),
        '"' | '″' | '”' => (Place::Seconds, Some(Unit::Degrees)),
        _ => return None,
    };
    Some(Mark { place, unit })
}

const fn half(c: char) -> Option<Half> {
    match c {
        'N' | 'n' => Some(Half::North),
        'S' => Some(Half::South),
        'E' | 'e' => Some(Half::East),
        'W' | 'w' => Some(Half::West),
        _ => None,
    }
}

/// No reading is near this; it keeps every sum finite.
const FAR_TOO_LARGE: f64 = 1e9;

const HINT_FORMS: &str = "write it as 20h 56m 40s, 20 56 40, 314.2d, 32° 35' or 32 35 N";

/// Reads a written angle; numbers without a mark begin in the unit `bare`.
pub fn read(text: &str, bare: Unit) -> Result<Written, TextFault> {
    Reader { text, at: 0 }.read(bare)
}

struct Reader<'t> {
    text: &'t str,
    at: usize,
}

/// A number met in the text, where it stands and whether it had decimals.
struct Part {
    value: f64,
    decimals: bool,
    span: Range<usize>,
}

impl Reader<'_> {
    fn read(mut self, bare: Unit) -> Result<Written, TextFault> {
        let mut written = Written {
            negative: self.sign(),
            size: Angle::ZERO,
            unit: bare,
            unit_was_named: false,
            half: None,
        };
        let mut total = 0.0;
        let mut last: Option<(Place, bool)> = None;
        while let Some(part) = self.number()? {
            let named = self.mark_after_number(last.map(|_| written.unit));
            let place = self.place_of(&part, named.as_ref(), last)?;
            if let Some(mark) = &named {
                self.settle_unit(&mut written, mark, last.is_some(), &part)?;
            }
            if place != Place::Whole && last.is_some() && part.value >= 60.0 {
                return Err(Self::fault(
                    part.span,
                    "minutes and seconds stay below 60",
                    HINT_FORMS,
                ));
            }
            total += part.value / place.per_whole();
            last = Some((place, part.decimals));
            self.skip(|c| c == ':' || c.is_whitespace());
        }
        if last.is_none() {
            return Err(self.fault_here("there is no number here"));
        }
        written.size = written.unit.of(total);
        written.half = self.letter();
        self.skip(char::is_whitespace);
        if self.at < self.text.len() {
            return Err(self.fault_here("this is not part of an angle"));
        }
        if written.half.is_some() && written.negative.is_some() {
            let whole = 0..self.text.len();
            return Err(Self::fault(
                whole,
                "a sign and a letter say the same thing twice",
                "leave one of them out",
            ));
        }
        Ok(written)
    }

    fn place_of(
        &self,
        part: &Part,
        named: Option<&Mark>,
        last: Option<(Place, bool)>,
    ) -> Result<Place, TextFault> {
        let free = match last {
            None => Some(Place::Whole),
            Some((_, true)) => {
                return Err(Self::fault(
                    part.span.clone(),
                    "only the last part may have decimals",
                    HINT_FORMS,
                ));
            }
            Some((place, false)) => place.next(),
        };
        match (free, named) {
            (None, _) => Err(Self::fault(
                part.span.clone(),
                "there is nothing below seconds",
                HINT_FORMS,
            )),
            (Some(free), Some(mark)) if mark.place >= free => Ok(mark.place),
            (Some(_), Some(_)) => Err(Self::fault(
                part.span.start..self.at,
                "this part stands out of order",
                HINT_FORMS,
            )),
            (Some(free), None) => Ok(free),
        }
    }

    fn settle_unit(
        &self,
        written: &mut Written,
        mark: &Mark,
        follows: bool,
        part: &Part,
    ) -> Result<(), TextFault> {
        let unit = match (mark.unit, follows) {
            (Some(unit), _) => unit,
            // m and s alone are minutes and seconds of time; after degrees they are of arc
            (None, false) => Unit::Hours,
            (None, true) => written.unit,
        };
        if follows && unit != written.unit {
            let at = part.span.start..self.at;
            return Err(Self::fault(
                at,
                "hours and degrees are mixed",
                "h goes with m and s, ° with ' and \"",
            ));
        }
        written.unit = unit;
        written.unit_was_named = true;
        Ok(())
    }

    fn rest(&self) -> &str {
        self.text.get(self.at..).unwrap_or("")
    }

    fn skip(&mut self, skipped: impl Fn(char) -> bool) {
        let rest = self.rest();
        self.at += rest.len() - rest.trim_start_matches(skipped).len();
    }

    fn sign(&mut self) -> Option<bool> {
        self.skip(char::is_whitespace);
        let first = self.rest().chars().next()?;
        let negative = match first {
            '+' => false,
            '-' | '−' | '–' => true,
            _ => return None,
        };
        self.at += first.len_utf8();
        self.skip(char::is_whitespace);
        Some(negative)
    }

    fn number(&mut self) -> Result<Option<Part>, TextFault> {
        let rest = self.rest();
        let digits = rest.len()
            - rest
                .trim_start_matches(|c: char| c.is_ascii_digit() || c == '.')
                .len();
        if digits == 0 {
            return Ok(None);
        }
        let span = self.at..self.at + digits;
        let number = rest.get(..digits).unwrap_or("");
        let Ok(value) = number.parse::<f64>() else {
            return Err(Self::fault(span, "this is not a number", HINT_FORMS));
        };
        if value >= FAR_TOO_LARGE {
            return Err(Self::fault(
                span,
                "this number is far too large for an angle",
                HINT_FORMS,
            ));
        }
        let decimals = number.contains('.');
        self.at = span.end;
        Ok(Some(Part {
            value,
            decimals,
            span,
        }))
    }

    /// The mark after a number; `so_far` is the unit in force, and says whether an `S` could be seconds.
    fn mark_after_number(&mut self, so_far: Option<Unit>) -> Option<Mark> {
        let rest = self.rest();
        let spaces = rest.len() - rest.trim_start().len();
        let c = rest.trim_start().chars().next()?;
        // "5 s" may stand apart; "32 35 S" is the south, and so is a lower-case s standing apart after degrees
        if spaces > 0 && (c == 's' || c == 'd' || c == 'm') && so_far != Some(Unit::Hours) {
            return None;
        }
        let found = mark(c)?;
        self.at += spaces + c.len_utf8();
        // two single quotes are a double one
        if c == '\'' && self.rest().starts_with('\'') {
            self.at += 1;
            return mark('"');
        }
        Some(found)
    }

    fn letter(&mut self) -> Option<Half> {
        self.skip(char::is_whitespace);
        let c = self.rest().chars().next()?;
        let found = if c == 's' { Half::South } else { half(c)? };
        self.at += c.len_utf8();
        Some(found)
    }

    fn fault(at: Range<usize>, message: &str, hint: &'static str) -> TextFault {
        TextFault {
            at,
            message: message.to_owned(),
            hint,
        }
    }

    fn fault_here(&self, message: &str) -> TextFault {
        let next = self.rest().chars().next().map_or(0, char::len_utf8);
        Self::fault(self.at..self.at + next, message, HINT_FORMS)
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    /// Rounding of a sum of three parts, in degrees.
    const ROUNDING_DEG: f64 = 1e-9;

    fn degrees(text: &str, bare: Unit) -> f64 {
        read(text, bare).unwrap().signed().degrees()
    }

    #[test]
    fn hours_and_degrees_are_told_by_their_marks() {
        for (text, bare, expected) in [
            ("20h 56m 40.5s", Unit::Degrees, 314.168_75),
            ("20 56 40", Unit::Hours, 314.166_666_666_7),
            ("20:56:40", Unit::Hours, 314.166_666_666_7),
            ("314.2d", Unit::Hours, 314.2),
            ("32° 35'", Unit::Hours, 32.583_333_333_3),
            ("32d35m10s", Unit::Hours, 32.586_111_111_1),
            ("-5.4", Unit::Degrees, -5.4),
            ("-0 30 00", Unit::Degrees, -0.5),
            ("+0h40m", Unit::Degrees, 10.0),
            ("4m", Unit::Degrees, 1.0),
            ("20s", Unit::Degrees, 0.083_333_333_3),
            ("90m", Unit::Degrees, 22.5),
            ("30'", Unit::Hours, 0.5),
            ("12''", Unit::Hours, 0.003_333_333_3),
            ("312 30 15", Unit::Degrees, 312.504_166_666_7),
            ("20 h 56 m 40 s", Unit::Degrees, 314.166_666_666_7),
        ] {
            assert!(
                (degrees(text, bare) - expected).abs() < ROUNDING_DEG,
                "{text}"
            );
        }
    }

    #[test]
    fn a_letter_after_the_number_is_kept_apart() {
        for (text, half, size) in [
            ("32 35 N", Half::North, 32.583_333_333_3),
            ("32 35 S", Half::South, 32.583_333_333_3),
            ("32 35 s", Half::South, 32.583_333_333_3),
            ("5.5S", Half::South, 5.5),
            ("32° 35' S", Half::South, 32.583_333_333_3),
            ("3 12 E", Half::East, 3.2),
        ] {
            let written = read(text, Unit::Degrees).unwrap();
            assert_eq!(written.half, Some(half), "{text}");
            assert!(
                (written.size.degrees() - size).abs() < ROUNDING_DEG,
                "{text}"
            );
        }
        assert_eq!(
            read("3h 12m W", Unit::Degrees).unwrap().half,
            Some(Half::West)
        );
    }

    #[test]
    fn what_is_wrong_is_pointed_at() {
        for (text, at, message) in [
            ("", 0..0, "there is no number here"),
            ("20h 61m", 4..6, "minutes and seconds stay below 60"),
            ("20.5h 30m", 6..8, "only the last part may have decimals"),
            ("20h 30'", 4..7, "hours and degrees are mixed"),
            ("20h 5s 3m", 7..8, "there is nothing below seconds"),
            ("20m 5h", 4..6, "this part stands out of order"),
            ("1 2 3 4", 6..7, "there is nothing below seconds"),
            ("1.2.3", 0..5, "this is not a number"),
            ("32 35 X", 6..7, "this is not part of an angle"),
            (
                "-32 35 N",
                0..8,
                "a sign and a letter say the same thing twice",
            ),
        ] {
            let fault = read(text, Unit::Hours).unwrap_err();
            assert_eq!(
                (fault.at.clone(), fault.message.as_str()),
                (at, message),
                "{text}"
            );
        }
    }

    proptest! {
        #[test]
        fn reading_never_panics(text in "\\PC{0,24}") {
            let _ = read(&text, Unit::Hours);
        }
    }
}
