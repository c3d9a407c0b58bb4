//! What hour angles a mount can reach on each side of the pier.

use crate::angle::{Angle, HourAngle};
use crate::metal::mount::{HourAngleSpan, Limits};
use crate::metal::side::Side;

/// Rounding allowed at the ends of a span, in radians.
const AT_THE_END_RAD: f64 = 1e-11;

impl HourAngleSpan {
    /// How far it is from its eastern end westward to its western end, above 0° to 360°. Where both ends
    /// are one, as from -12h to +12h, the span is the whole turn.
    #[must_use]
    pub fn width(&self) -> Angle {
        let width = (self.to.angle() - self.from.angle()).wrapped_positive();
        if width.radians() > AT_THE_END_RAD {
            width
        } else {
            Angle::TURN
        }
    }

    /// True if an hour angle lies in the span, ends included; a span may run through 12h, below the pole.
    #[must_use]
    pub fn contains(&self, hour_angle: HourAngle) -> bool {
        let past = (hour_angle.angle() - self.from.angle()).wrapped_positive();
        let short_of_start = Angle::TURN - past;
        past.radians() <= self.width().radians() + AT_THE_END_RAD
            || short_of_start.radians() <= AT_THE_END_RAD
    }

    /// How far the sky can still turn west before an hour angle reaches the western end; none outside.
    #[must_use]
    pub fn left(&self, hour_angle: HourAngle) -> Option<Angle> {
        let left = (self.to.angle() - hour_angle.angle()).wrapped_positive();
        self.contains(hour_angle).then_some(left)
    }
}

impl Limits {
    /// The hour angles reachable on a side, if the mount file limits them.
    #[must_use]
    pub const fn span(&self, side: Side) -> Option<HourAngleSpan> {
        match side {
            Side::TubeWest | Side::Single => self.tube_west,
            Side::TubeEast => self.tube_east,
        }
    }

    /// True if the hour angle can be reached on that side.
    #[must_use]
    pub fn reachable(&self, hour_angle: HourAngle, side: Side) -> bool {
        self.span(side).is_none_or(|span| span.contains(hour_angle))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn span(from_hours: f64, to_hours: f64) -> HourAngleSpan {
        HourAngleSpan {
            from: hours(from_hours),
            to: hours(to_hours),
        }
    }

    fn hours(hours: f64) -> HourAngle {
        HourAngle::new(Angle::from_hours(hours))
    }

    #[test]
    fn a_span_holds_its_ends_and_what_lies_between_going_west() {
        let over_the_meridian = span(-7.0, 0.75);
        for inside in [-7.0, -6.0, 0.0, 0.75] {
            assert!(over_the_meridian.contains(hours(inside)), "{inside}");
        }
        for outside in [-7.01, 0.76, 6.0, 12.0, -11.0] {
            assert!(!over_the_meridian.contains(hours(outside)), "{outside}");
        }
    }

    #[test]
    fn a_span_may_run_below_the_pole() {
        let below = span(10.0, -10.0);
        for inside in [10.0, 11.0, 12.0, -12.0, -11.0, -10.0] {
            assert!(below.contains(hours(inside)), "{inside}");
        }
        for outside in [9.9, 0.0, -9.9] {
            assert!(!below.contains(hours(outside)), "{outside}");
        }
    }

    #[test]
    fn from_minus_to_plus_twelve_hours_is_everywhere() {
        let everywhere = span(-12.0, 12.0);
        for inside in [-12.0, -6.0, 0.0, 6.0, 12.0] {
            assert!(everywhere.contains(hours(inside)), "{inside}");
        }
    }

    #[test]
    fn what_is_left_ends_at_the_western_end() {
        let left = |h| span(-7.0, 0.75).left(hours(h)).map(Angle::hours);
        assert!((left(-1.0).unwrap() - 1.75).abs() < 1e-9);
        assert_eq!(left(1.0), None);
    }

    #[test]
    fn a_side_without_limits_reaches_everywhere() {
        let limits = Limits {
            tube_west: Some(span(-7.0, 0.75)),
            ..Limits::default()
        };
        assert!(!limits.reachable(hours(3.0), Side::TubeWest));
        assert!(!limits.reachable(hours(3.0), Side::Single));
        assert!(limits.reachable(hours(3.0), Side::TubeEast));
    }
}
