//! The engraved marks near a position: the picture under the index, and the next mark to wait on.
//!
//! Marks stand at whole divisions from the scale's zero, on a scale that goes once round from 0° up, on the
//! others to both sides of zero. Every so many of them is numbered (common practice, no source).

use crate::angle::{Angle, AxisAngle};
use crate::metal::circle::{DeclinationCircle, HourCircle, Ring};
use crate::metal::scale::{Face, Reading, SAME_POSITION_RAD, Scale};
use crate::metal::side::Side;
use crate::sexagesimal::Unit;
use crate::time::SiderealTime;

/// A window of more marks than this is no picture and no wait.
const MOST_MARKS: f64 = 10_000.0;

/// Numbers stand at least this many divisions apart (common practice, no source).
const LEAST_DIVISIONS_NUMBERED: f64 = 3.0;

/// Round steps of numbering on a circle in hours, in seconds of time.
const ROUND_HOURS_S: [f64; 13] = [
    10.0, 30.0, 60.0, 300.0, 600.0, 1200.0, 1800.0, 3600.0, 7200.0, 10_800.0, 14_400.0, 21_600.0,
    43_200.0,
];

/// Round steps of numbering on a circle in degrees, in seconds of arc.
const ROUND_DEGREES_S: [f64; 11] = [
    10.0, 60.0, 300.0, 600.0, 1800.0, 3600.0, 18_000.0, 36_000.0, 54_000.0, 108_000.0, 324_000.0,
];

/// An engraved mark in the picture under the index.
#[derive(Clone, Debug, PartialEq)]
pub struct StripMark {
    /// Divisions from the index, positive toward growing axis angles (west, north).
    pub offset: f64,
    /// The number beside it (`20h40`, `3h`, `-5`, `32°30`), if it is a numbered mark.
    pub label: Option<String>,
}

impl StripMark {
    /// True for the longer marks that carry a number.
    #[must_use]
    pub const fn is_numbered(&self) -> bool {
        self.label.is_some()
    }
}

/// An engraved mark that will come under the index as the sky turns west.
#[derive(Clone, Debug, PartialEq)]
pub struct MarkAhead {
    /// The shown hour axis angle when it is there.
    pub shown: AxisAngle,
    /// How far the hour axis has to turn west until then; above zero.
    pub ahead: Angle,
    /// The number of the mark.
    pub reading: Reading,
    /// The mark as numbered, with its letter.
    pub text: String,
}

impl HourCircle {
    /// The marks within so many divisions of the index, in the order of growing axis angle.
    #[must_use]
    pub fn strip(
        &self,
        shown: AxisAngle,
        sidereal: SiderealTime,
        side: Side,
        divisions: f64,
    ) -> Vec<StripMark> {
        let position = self.position(shown, sidereal, side);
        self.scale().strip(position, self.sense(), divisions)
    }

    /// The next engraved mark to come under the index, more than `least_lead` ahead of the shown hour
    /// axis angle as the sky turns west. None on a driven ring, which keeps its reading.
    #[must_use]
    pub fn next_mark(&self, shown: AxisAngle, side: Side, least_lead: Angle) -> Option<MarkAhead> {
        if self.ring == Ring::Driven {
            return None;
        }
        // a ring that stands still does not ask for the time
        let sidereal = SiderealTime::default();
        let scale = self.scale();
        let position = self.position(shown, sidereal, side);
        let mark = scale.next_mark(position, self.sense(), least_lead)?;
        let reading = scale.reading_at(mark);
        Some(MarkAhead {
            shown: self.shown_at(mark, sidereal, side),
            ahead: (mark - position) * self.sense(),
            reading,
            text: scale.write(scale.rounded(reading, scale.division), scale.division),
        })
    }
}

impl DeclinationCircle {
    /// The marks within so many divisions of the index, in the order of growing axis angle.
    #[must_use]
    pub fn strip(&self, shown: AxisAngle, divisions: f64) -> Vec<StripMark> {
        self.scale()
            .strip(self.position(shown), self.sense(), divisions)
    }
}

impl Scale {
    /// The step of numbering: the least round one that is whole divisions and at least
    /// [`LEAST_DIVISIONS_NUMBERED`] of them, else ten divisions.
    #[must_use]
    pub fn numbered_step(&self) -> Angle {
        let steps: &[f64] = match self.unit {
            Unit::Hours => &ROUND_HOURS_S,
            Unit::Degrees => &ROUND_DEGREES_S,
        };
        steps
            .iter()
            .map(|seconds| self.unit.of(seconds / 3600.0))
            .find(|step| {
                let divisions = *step / self.division;
                divisions > LEAST_DIVISIONS_NUMBERED - 0.5 && is_whole(divisions)
            })
            .unwrap_or(self.division * 10.0)
    }

    fn strip(&self, position: Angle, sense: f64, divisions: f64) -> Vec<StripMark> {
        let window = self.division * divisions.abs();
        let numbered = self.numbered_step();
        let mut marks: Vec<StripMark> = self
            .marks_between(position - window, position + window)
            .into_iter()
            .map(|mark| StripMark {
                offset: (mark - position) / self.division * sense,
                label: self.label_at(mark, numbered),
            })
            .collect();
        if sense < 0.0 {
            marks.reverse();
        }
        marks
    }

    /// The number beside a mark, if it is one of those that carry one.
    fn label_at(&self, mark: Angle, numbered: Angle) -> Option<String> {
        let reading = self.rounded(self.reading_at(mark), self.division);
        if !is_whole(reading.value / numbered) {
            return None;
        }
        let written = self.write_unlettered(reading, numbered);
        let compact = written.replace(' ', "");
        let bare = compact.trim_start_matches('+');
        // the last mark of unit says nothing the circle does not, but for whole hours
        let label = match self.unit {
            Unit::Hours => bare.trim_end_matches(['m', 's']),
            Unit::Degrees => bare.trim_end_matches(['°', '\'', '"']),
        };
        Some(label.to_owned())
    }

    /// The first mark further on than `least_lead`, counted with the axis (`sense` as on the circle).
    fn next_mark(&self, position: Angle, sense: f64, least_lead: Angle) -> Option<Angle> {
        let lead = least_lead.radians().max(SAME_POSITION_RAD);
        let near = position + Angle::from_radians(lead) * sense;
        // two divisions hold a mark even where the last one before the scale's end is cut short
        let far = near + self.division * (2.0 * sense);
        let is_beyond = |mark: &Angle| ((*mark - position) * sense).radians() > lead;
        if sense > 0.0 {
            self.marks_between(near, far).into_iter().find(is_beyond)
        } else {
            let marks = self.marks_between(far, near);
            marks.into_iter().rev().find(is_beyond)
        }
    }

    /// The positions of all marks between two positions, in growing order.
    fn marks_between(&self, from: Angle, to: Angle) -> Vec<Angle> {
        let mut marks = Vec::new();
        let division = self.division.radians();
        let count = (to - from).radians() / division;
        // also false for what is not a number
        if !(division > 0.0 && (0.0..MOST_MARKS).contains(&count)) {
            return marks;
        }
        let (first, last) = self.mark_numbers();
        let turn = Angle::TURN.radians();
        let mut base = turn * (from.radians() / turn - 1.0).floor();
        while base <= to.radians() + turn {
            let mut number = ((from.radians() - base) / division).ceil().max(first);
            let end = ((to.radians() - base) / division).floor().min(last);
            while number <= end {
                marks.push(Angle::from_radians(base + number * division));
                number += 1.0;
            }
            base += turn;
        }
        marks
    }

    /// The numbers of the first and the last mark, in divisions from zero.
    fn mark_numbers(&self) -> (f64, f64) {
        let whole_down = |count: f64| (count + WHOLE_DIVISIONS).floor();
        if self.face == Face::Turn {
            let round = Angle::TURN / self.division;
            // 360° is 0° again
            let last = whole_down(round) - if is_whole(round) { 1.0 } else { 0.0 };
            return (0.0, last);
        }
        let half = Angle::HALF_TURN / self.division;
        let last = whole_down(half);
        // -180° is 180° again
        (if is_whole(half) { 1.0 - last } else { -last }, last)
    }
}

/// A count this near a whole number is one: rounding, not engraving.
const WHOLE_DIVISIONS: f64 = 1e-6;

fn is_whole(count: f64) -> bool {
    (count - count.round()).abs() < WHOLE_DIVISIONS
}
