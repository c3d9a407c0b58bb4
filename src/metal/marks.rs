//! The engraved marks of a scale, and the next one the sky brings: waiting on the mark.
//!
//! Marks stand at whole divisions from the scale's zero: on a scale that goes once round from 0° up, on the
//! others to both sides of zero.

use crate::angle::{Angle, AxisAngle};
use crate::metal::circle::{HourCircle, Ring};
use crate::metal::scale::{Face, Reading, SAME_POSITION_RAD, Scale};
use crate::metal::side::Side;
use crate::time::SiderealTime;

/// A window of more marks than this is no picture and no wait.
const MOST_MARKS: f64 = 10_000.0;

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
    /// True for a ring that stands still while the sky turns under it: marks come and go by themselves.
    #[must_use]
    pub const fn stands_still(&self) -> bool {
        !matches!(self.ring, Ring::Driven)
    }

    /// The next engraved mark to come under the index, more than `least_lead` ahead of the shown hour
    /// axis angle as the sky turns west. None on a driven ring, which keeps its reading.
    #[must_use]
    pub fn next_mark(&self, shown: AxisAngle, side: Side, least_lead: Angle) -> Option<MarkAhead> {
        if !self.stands_still() {
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

impl Scale {
    /// True for the number of an engraved mark.
    #[must_use]
    pub fn is_on_a_mark(&self, reading: Reading) -> bool {
        is_whole(reading.value / self.division)
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

    /// The positions of all marks between two positions, ends included, in growing order.
    pub(super) fn marks_between(&self, from: Angle, to: Angle) -> Vec<Angle> {
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
            let mut number = whole_up((from.radians() - base) / division).max(first);
            let end = whole_down((to.radians() - base) / division).min(last);
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

/// The next whole number down; itself for one that is whole but for rounding.
fn whole_down(count: f64) -> f64 {
    (count + WHOLE_DIVISIONS).floor()
}

/// The next whole number up; itself for one that is whole but for rounding.
fn whole_up(count: f64) -> f64 {
    (count - WHOLE_DIVISIONS).ceil()
}

/// True for a count that is whole but for rounding.
pub(super) fn is_whole(count: f64) -> bool {
    (count - count.round()).abs() < WHOLE_DIVISIONS
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::metal::circle::samples::hour_circle;
    use crate::metal::{HourNumbering, Increases};

    fn minutes(minutes: f64) -> Angle {
        Angle::from_time_seconds(minutes * 60.0)
    }

    #[test]
    fn a_reading_between_the_marks_is_told_from_one_on_a_mark() {
        let scale = hour_circle(HourNumbering::Full).scale();
        let at = |value| Reading {
            value: minutes(value),
            half: None,
        };
        for (value, on) in [(0.0, true), (948.0, true), (949.0, false), (947.99, false)] {
            assert_eq!(scale.is_on_a_mark(at(value)), on, "{value}");
        }
    }

    #[test]
    fn the_next_mark_is_the_one_the_sky_brings() {
        let next = |circle: &HourCircle, shown: f64, lead_s: f64| {
            let lead = Angle::from_time_seconds(lead_s);
            let mark = circle
                .next_mark(AxisAngle::new(minutes(shown)), Side::Single, lead)
                .unwrap();
            let to_it = (mark.shown.angle() - minutes(shown)).wrapped_signed();
            assert!((to_it - mark.ahead).abs().degrees() < 1e-9);
            (
                mark.text,
                (mark.ahead.time_seconds() * 1000.0).round() / 1000.0,
            )
        };
        let own = |text: &str, ahead_s| (text.to_owned(), ahead_s);
        let west = hour_circle(HourNumbering::Full);
        let east = HourCircle {
            increases: Increases::East,
            ..west
        };
        assert_eq!(next(&west, 62.0, 0.0), own("1h 04m", 120.0));
        assert_eq!(next(&east, 62.0, 0.0), own("22h 56m", 120.0));
        // a mark just under the index has gone by; one nearer than the lead is let go
        assert_eq!(next(&west, 64.0, 0.0), own("1h 08m", 240.0));
        assert_eq!(next(&west, 63.0, 90.0), own("1h 08m", 300.0));
        assert_eq!(next(&east, 63.0, 90.0), own("22h 52m", 300.0));
        // over the end of the scale
        assert_eq!(next(&west, -1.0, 0.0), own("0h 00m", 60.0));
        assert_eq!(next(&east, -1.0, 0.0), own("0h 00m", 60.0));
        let halves = hour_circle(HourNumbering::Halves);
        assert_eq!(next(&halves, -62.0, 0.0), own("1h 00m E", 120.0));
        assert_eq!(next(&halves, 719.0, 0.0), own("12h 00m", 60.0));
        assert_eq!(next(&halves, -719.0, 0.0), own("11h 56m E", 180.0));
        let signed = hour_circle(HourNumbering::PlusMinus);
        assert_eq!(next(&signed, -62.0, 0.0), own("-1h 00m", 120.0));
        // divisions that do not fit: after the last one comes zero
        let odd = HourCircle {
            division: minutes(7.0),
            ..west
        };
        assert_eq!(next(&odd, 1436.0, 0.0), own("0h 00m", 240.0));
    }

    #[test]
    fn the_second_mark_reads_twelve_hours_on() {
        let circle = HourCircle {
            second_fiducial: true,
            ..hour_circle(HourNumbering::Full)
        };
        let shown = AxisAngle::new(minutes(62.0));
        let text = |side| circle.next_mark(shown, side, Angle::ZERO).unwrap().text;
        assert_eq!(text(Side::TubeWest), "1h 04m");
        assert_eq!(text(Side::TubeEast), "13h 04m");
    }

    #[test]
    fn a_driven_ring_keeps_its_reading_and_has_no_next_mark() {
        let circle = HourCircle {
            ring: Ring::Driven,
            ..hour_circle(HourNumbering::Full)
        };
        assert_eq!(
            circle.next_mark(AxisAngle::default(), Side::TubeWest, Angle::ZERO),
            None
        );
    }

    #[test]
    fn a_division_of_nothing_has_no_marks() {
        let circle = HourCircle {
            division: Angle::ZERO,
            ..hour_circle(HourNumbering::Full)
        };
        assert_eq!(
            circle.next_mark(AxisAngle::default(), Side::Single, Angle::ZERO),
            None
        );
    }
}
