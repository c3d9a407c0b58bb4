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

    /// The error of a star timed as it crosses the middle of the field with the circle set on a mark.
    #[must_use]
    pub fn timed_error(&self) -> Angle {
        let set = (self.division * OF_DIVISION_ON_A_MARK).radians();
        Angle::from_radians(set.hypot(STRIKING_THE_KEY.radians()))
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
}
