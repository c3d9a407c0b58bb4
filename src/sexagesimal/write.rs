//! Writing an angle, as fine as the step asked for: `20h 56m 40s`, `32° 35'`.

use super::Unit;
use crate::angle::Angle;

/// How an angle is written: its unit, and the step it is rounded to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Notation {
    unit: Unit,
    /// The step in seconds of the unit, above zero.
    step_s: f64,
}

impl Notation {
    /// The finest step written, in seconds.
    const FINEST_S: f64 = 0.001;

    /// Writes in `unit`, rounded to `step` (held at a thousandth of a second or more).
    #[must_use]
    pub fn new(unit: Unit, step: Angle) -> Self {
        Self {
            unit,
            step_s: (unit.measure(step) * 3600.0).abs().max(Self::FINEST_S),
        }
    }

    /// The nearest multiple of the step.
    #[must_use]
    pub fn round(&self, angle: Angle) -> Angle {
        let seconds = self.unit.measure(angle) * 3600.0;
        self.unit
            .of((seconds / self.step_s).round() * self.step_s / 3600.0)
    }

    /// The rounded angle as text, with a minus sign where it is negative.
    #[must_use]
    pub fn write(&self, angle: Angle) -> String {
        let rounded = self.unit.measure(self.round(angle)) * 3600.0;
        let sign = if rounded < -Self::FINEST_S / 2.0 {
            "-"
        } else {
            ""
        };
        format!("{sign}{}", self.unsigned(rounded.abs()))
    }

    /// As [`Self::write`], without leading parts that are nothing: `2m 20s`, `35'`, `0s`.
    #[must_use]
    pub fn write_size(&self, angle: Angle) -> String {
        let full = self.write(angle.abs());
        let is_nothing = |c: char| c == '0' || c == ' ';
        let mut rest = full.as_str();
        while let Some((part, after)) = rest.split_once(' ') {
            if part.chars().any(|c| ('1'..='9').contains(&c)) {
                break;
            }
            rest = after;
        }
        let short = rest.trim_start_matches(is_nothing);
        if short.starts_with(|c: char| c.is_ascii_digit()) {
            short.to_owned()
        } else {
            format!("0{short}")
        }
    }

    /// True if `step` is a whole number of `seconds`.
    fn in_whole(&self, seconds: f64) -> bool {
        let steps = self.step_s / seconds;
        (steps - steps.round()).abs() < 1e-6 && steps > 0.5
    }

    fn unsigned(&self, seconds: f64) -> String {
        let [whole_mark, minute_mark, second_mark] = match self.unit {
            Unit::Hours => ["h", "m", "s"],
            Unit::Degrees => ["°", "'", "\""],
        };
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
        // not negative, and bounded by the reader
        let thousandths = (seconds * 1000.0).round() as u64;
        let (whole, minutes) = (thousandths / 3_600_000, thousandths / 60_000 % 60);
        let (second, thousandth) = (thousandths / 1000 % 60, thousandths % 1000);
        if self.in_whole(3600.0) {
            format!("{whole}{whole_mark}")
        } else if self.in_whole(60.0) {
            format!("{whole}{whole_mark} {minutes:02}{minute_mark}")
        } else if self.in_whole(1.0) {
            format!("{whole}{whole_mark} {minutes:02}{minute_mark} {second:02}{second_mark}")
        } else if self.in_whole(0.1) {
            format!(
                "{whole}{whole_mark} {minutes:02}{minute_mark} {second:02}.{}{second_mark}",
                thousandth / 100
            )
        } else {
            format!(
                "{whole}{whole_mark} {minutes:02}{minute_mark} {second:02}.{thousandth:03}{second_mark}"
            )
        }
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::sexagesimal::read;

    #[test]
    fn text_is_as_fine_as_the_step() {
        let hours = |step_s: f64| Notation::new(Unit::Hours, Angle::from_time_seconds(step_s));
        let value = Angle::from_hours(20.944_5);
        assert_eq!(hours(20.0).write(value), "20h 56m 40s");
        assert_eq!(hours(60.0).write(value), "20h 57m");
        assert_eq!(hours(300.0).write(value), "20h 55m");
        assert_eq!(hours(3600.0).write(value), "21h");
        assert_eq!(hours(0.1).write(value), "20h 56m 40.2s");
        let degrees =
            |step_arcmin: f64| Notation::new(Unit::Degrees, Angle::from_arcminutes(step_arcmin));
        assert_eq!(degrees(5.0).write(Angle::from_degrees(-32.59)), "-32° 35'");
        assert_eq!(
            degrees(0.5).write(Angle::from_degrees(32.59)),
            "32° 35' 30\""
        );
        assert_eq!(degrees(15.0).write(Angle::from_degrees(-0.05)), "0° 00'");
    }

    #[test]
    fn a_size_leaves_out_what_is_nothing() {
        let hours = |step_s: f64| Notation::new(Unit::Hours, Angle::from_time_seconds(step_s));
        let seconds = Angle::from_time_seconds;
        assert_eq!(hours(20.0).write_size(seconds(140.0)), "2m 20s");
        assert_eq!(hours(20.0).write_size(seconds(20.0)), "20s");
        assert_eq!(hours(20.0).write_size(seconds(3600.0)), "1h 00m 00s");
        assert_eq!(hours(20.0).write_size(seconds(0.0)), "0s");
        assert_eq!(hours(0.1).write_size(seconds(0.5)), "0.5s");
        let minutes = Notation::new(Unit::Degrees, Angle::from_arcminutes(5.0));
        assert_eq!(minutes.write_size(Angle::from_arcminutes(-35.0)), "35'");
    }

    #[test]
    fn rounding_carries_into_the_whole() {
        let notation = Notation::new(Unit::Hours, Angle::from_time_seconds(1.0));
        assert_eq!(notation.write(Angle::from_hours(2.999_99)), "3h 00m 00s");
    }

    proptest! {
        #[test]
        fn what_is_written_is_read_back(degrees in -400.0..400.0f64, step in 0.001..7200.0f64) {
            for unit in [Unit::Hours, Unit::Degrees] {
                let notation = Notation::new(unit, Angle::from_arcseconds(step));
                let angle = Angle::from_degrees(degrees);
                let back = read(&notation.write(angle), unit).unwrap().signed();
                // half a thousandth of a second of the unit is lost where the step is an odd fraction
                let lost = if notation.in_whole(1.0) { 1e-6 } else { 0.0006 * 15.0 };
                prop_assert!((back - notation.round(angle)).arcseconds().abs() <= lost + 1e-6);
            }
        }
    }
}
