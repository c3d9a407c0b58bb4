//! The error of one look at a circle, 1 sigma, as an angle of the axis.
//!
//! It counts twice: when a star is read, and when a circle is set.

use crate::angle::Angle;
use crate::metal::circle::{DeclinationCircle, HourCircle};

/// Of a vernier's least count (common practice, no source).
const OF_LEAST_COUNT: f64 = 0.5;
/// Of a division, where the eye estimates between two marks (common practice, no source).
const OF_DIVISION: f64 = 0.15;
/// Of a division, where the circle was set exactly on a mark (common practice, no source).
const OF_DIVISION_ON_A_MARK: f64 = 0.05;
/// Of striking a key as a star crosses the middle of the field (common practice, no source).
const STRIKING_THE_KEY: Angle = Angle::from_time_seconds(2.0);

impl HourCircle {
    /// The error of one look: as the mount file has it, else half the vernier's least count, else 0.15
    /// of a division.
    #[must_use]
    pub fn look_error(&self) -> Angle {
        one_look(self.reading_error, self.vernier, self.division)
    }

    /// The error of setting the circle exactly on a mark: a twentieth of a division, or that of a look
    /// where a vernier shows it better.
    #[must_use]
    pub fn on_a_mark_error(&self) -> Angle {
        let by_eye = self.division * OF_DIVISION_ON_A_MARK;
        smaller(by_eye, self.look_error())
    }

    /// The error of a star timed as it crosses the middle of the field with the circle set on a mark;
    /// never worse than that of a look, which is had besides.
    #[must_use]
    pub fn timed_error(&self) -> Angle {
        let set = self.on_a_mark_error().radians();
        let timed = Angle::from_radians(set.hypot(STRIKING_THE_KEY.radians()));
        smaller(timed, self.look_error())
    }
}

impl DeclinationCircle {
    /// The error of one look: as the mount file has it, else half the vernier's least count, else 0.15
    /// of a division.
    #[must_use]
    pub fn look_error(&self) -> Angle {
        one_look(self.reading_error, self.vernier, self.division)
    }
}

fn smaller(a: Angle, b: Angle) -> Angle {
    if b < a { b } else { a }
}

fn one_look(stated: Option<Angle>, vernier: Option<Angle>, division: Angle) -> Angle {
    match (stated, vernier) {
        (Some(stated), _) => stated,
        (None, Some(least_count)) => least_count * OF_LEAST_COUNT,
        (None, None) => division * OF_DIVISION,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::metal::HourNumbering;
    use crate::metal::circle::samples::hour_circle;

    /// Rounding, in minutes of arc.
    const ROUNDING_ARCMIN: f64 = 1e-9;

    #[test]
    fn what_the_mount_file_says_comes_before_the_vernier_and_the_vernier_before_the_eye() {
        let minutes = |x| Some(Angle::from_arcminutes(x));
        for (stated, vernier, expected) in [
            (minutes(7.0), minutes(5.0), 7.0),
            (minutes(7.0), None, 7.0),
            (None, minutes(5.0), 2.5),
            (None, None, 9.0),
        ] {
            let error = one_look(stated, vernier, Angle::from_degrees(1.0));
            assert!((error.arcminutes() - expected).abs() < ROUNDING_ARCMIN);
        }
    }

    #[test]
    fn a_star_is_timed_better_than_looked_at_where_the_eye_estimates() {
        let seconds = |angle: Angle| angle.time_seconds();
        // 4 minutes: 36 s by eye, 12 s on a mark, 2 s for the key
        let by_eye = hour_circle(HourNumbering::Full);
        assert!((seconds(by_eye.look_error()) - 36.0).abs() < 1e-6);
        assert!((seconds(by_eye.timed_error()) - 12.0_f64.hypot(2.0)).abs() < 1e-6);
        // a vernier to 20 s shows 10 s as well on a mark as off it
        let vernier = Some(Angle::from_time_seconds(20.0));
        let with_vernier = crate::metal::HourCircle { vernier, ..by_eye };
        assert!((seconds(with_vernier.timed_error()) - 10.0).abs() < 1e-6);
    }
}
