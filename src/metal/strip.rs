//! The picture of a circle under its index, as data: the engraved marks to either side, as they will look.
//!
//! Every so many marks is numbered, by round steps (common practice, no source).

use crate::angle::{Angle, AxisAngle};
use crate::metal::circle::{DeclinationCircle, HourCircle};
use crate::metal::marks::is_whole;
use crate::metal::scale::Scale;
use crate::metal::side::Side;
use crate::sexagesimal::Unit;
use crate::time::SiderealTime;

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
    /// The step of numbering: the least round one that is whole divisions and at least three
    /// of them, else ten divisions.
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
        // the last unit is plain from the circle, but for whole hours, whose h is kept
        let label = match self.unit {
            Unit::Hours => bare.trim_end_matches(['m', 's']),
            Unit::Degrees => bare.trim_end_matches(['°', '\'', '"']),
        };
        Some(label.to_owned())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::metal::circle::samples::{declination_circle, hour_circle};
    use crate::metal::{DeclinationNumbering, HourNumbering, Increases};

    /// Rounding, in divisions.
    const ROUNDING: f64 = 1e-7;

    fn minutes(minutes: f64) -> Angle {
        Angle::from_time_seconds(minutes * 60.0)
    }

    fn hour_strip(circle: &HourCircle, shown_minutes: f64, divisions: f64) -> Vec<StripMark> {
        let shown = AxisAngle::new(minutes(shown_minutes));
        circle.strip(shown, SiderealTime::default(), Side::Single, divisions)
    }

    fn labels(strip: &[StripMark]) -> Vec<(f64, String)> {
        let rounded = |offset: f64| (offset * 1000.0).round() / 1000.0;
        strip
            .iter()
            .filter_map(|mark| Some((rounded(mark.offset), mark.label.clone()?)))
            .collect()
    }

    fn own(labels: &[(f64, &str)]) -> Vec<(f64, String)> {
        labels
            .iter()
            .map(|(at, label)| (*at, (*label).to_owned()))
            .collect()
    }

    #[test]
    fn the_picture_has_every_mark_in_the_window_one_division_apart() {
        // 20h 48m 40s on 4-minute divisions
        let circle = hour_circle(HourNumbering::Full);
        let strip = hour_strip(&circle, 20.0 * 60.0 + 48.0 + 40.0 / 60.0, 6.0);
        assert_eq!(strip.len(), 12);
        for pair in strip.windows(2) {
            assert!((pair[1].offset - pair[0].offset - 1.0).abs() < ROUNDING);
        }
        assert_eq!(labels(&strip), own(&[(-2.167, "20h40"), (2.833, "21h00")]));
    }

    #[test]
    fn numbers_grow_with_the_axis_or_against_it_as_the_ring_is_numbered() {
        let west = HourCircle {
            division: minutes(20.0),
            ..hour_circle(HourNumbering::Full)
        };
        let east = HourCircle {
            increases: Increases::East,
            ..west
        };
        assert_eq!(
            labels(&hour_strip(&west, 0.0, 4.0)),
            own(&[(-3.0, "23h"), (0.0, "0h"), (3.0, "1h")])
        );
        assert_eq!(
            labels(&hour_strip(&east, 0.0, 4.0)),
            own(&[(-3.0, "1h"), (0.0, "0h"), (3.0, "23h")])
        );
    }

    #[test]
    fn beyond_the_pole_the_numbers_count_back() {
        use DeclinationNumbering::{Full, PolarDistance, Quarters, Signed};
        let strip = |numbering, shown| {
            labels(&declination_circle(numbering).strip(AxisAngle::from_degrees(shown), 6.0))
        };
        assert_eq!(
            strip(Signed, 90.0),
            own(&[(-5.0, "85"), (0.0, "90"), (5.0, "85")])
        );
        assert_eq!(
            strip(Signed, -1.0),
            own(&[(-4.0, "-5"), (1.0, "0"), (6.0, "5")])
        );
        assert_eq!(
            strip(Quarters, -1.0),
            own(&[(-4.0, "5"), (1.0, "0"), (6.0, "5")])
        );
        assert_eq!(
            strip(Quarters, 180.0),
            own(&[(-5.0, "5"), (0.0, "0"), (5.0, "5")])
        );
        assert_eq!(
            strip(PolarDistance, 89.0),
            own(&[(-4.0, "5"), (1.0, "0"), (6.0, "5")])
        );
        assert_eq!(strip(Full, -2.0), own(&[(-3.0, "355"), (2.0, "0")]));
    }

    #[test]
    fn numbered_marks_are_round_whatever_the_division() {
        let hours = |division: f64| {
            let circle = HourCircle {
                division: minutes(division),
                ..hour_circle(HourNumbering::Full)
            };
            circle.scale().numbered_step().hours() * 60.0
        };
        for (division, expected) in [
            (1.0, 5.0),
            (2.0, 10.0),
            (4.0, 20.0),
            (5.0, 20.0),
            (10.0, 30.0),
            (20.0, 60.0),
            (30.0, 120.0),
            (7.0, 70.0),
        ] {
            assert!((hours(division) - expected).abs() < ROUNDING, "{division}");
        }
        let degrees = |division: f64| {
            let plain = declination_circle(DeclinationNumbering::Signed);
            let circle = DeclinationCircle {
                division: Angle::from_degrees(division),
                ..plain
            };
            circle.scale().numbered_step().degrees()
        };
        for (division, expected) in [
            (2.5, 10.0),
            (2.0, 10.0),
            (1.0, 5.0),
            (0.5, 5.0),
            (1.0 / 6.0, 0.5),
            (1.0 / 12.0, 0.5),
        ] {
            assert!(
                (degrees(division) - expected).abs() < ROUNDING,
                "{division}"
            );
        }
    }

    #[test]
    fn a_division_of_nothing_has_no_picture() {
        let circle = HourCircle {
            division: Angle::ZERO,
            ..hour_circle(HourNumbering::Full)
        };
        assert!(hour_strip(&circle, 1.0, 5.0).is_empty());
    }
}
