//! Eccentric circles: a ring whose centre does not lie on its axis.
//!
//! Where the centre of the graduation lies beside the axis, the angle under the index differs from the angle turned by
//! `e_s sin r + e_c cos r`, where `r` is the shown angle of that axis: index included, in radians, positive as axis
//! angles are. On a ring that stands still `r` differs from the engraved number by a constant and perhaps its sense
//! only, so the two parts belong to the engraving. The triangle of axis, centre and index gives
//! `sin(shown - turned) = ε sin(r - γ)` exactly, so the formula is good to the cube of `ε`: 0.1" at one degree.
//!
//! A mark right across reads the opposite of it, and the mean of two opposite verniers is free of it (common practice, no
//! source). A ring that rides with the clock drive turns under its index, so nothing of this belongs to its axis angle.

use serde::{Deserialize, Serialize};

use nalgebra::SMatrix;

use crate::angle::Angle;
use crate::metal::errors::{COUNT, MountErrors};

/// Newton's rule doubles the digits at each step; from a first guess good to the square of the eccentricity three are
/// enough for any circle that can be read, the rest is for numbers no circle could have.
const MOST_STEPS: usize = 20;

/// A step that no longer matters: a hundred-thousandth of an arcsecond.
const STEP_RAD: f64 = 5e-11;

/// The eccentricity of one circle, radians.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Eccentricity {
    /// What is shown too much at a shown angle of 90°.
    sine: f64,
    /// What is shown too much at a shown angle of 0°.
    cosine: f64,
}

impl Eccentricity {
    /// That of the hour circle.
    pub(super) const fn of_hour_circle(errors: &MountErrors) -> Self {
        Self {
            sine: errors.hour_eccentric_sine.radians(),
            cosine: errors.hour_eccentric_cosine.radians(),
        }
    }

    /// That of the declination circle.
    pub(super) const fn of_declination_circle(errors: &MountErrors) -> Self {
        Self {
            sine: errors.dec_eccentric_sine.radians(),
            cosine: errors.dec_eccentric_cosine.radians(),
        }
    }

    /// What is shown too much at a shown angle.
    pub(super) fn at(self, shown: f64) -> f64 {
        let (sin, cos) = shown.sin_cos();
        self.sine * sin + self.cosine * cos
    }

    /// By how much that grows with the shown angle.
    fn growth(self, shown: f64) -> f64 {
        let (sin, cos) = shown.sin_cos();
        self.sine * cos - self.cosine * sin
    }

    /// The angle shown where a centred circle would show `centred`.
    pub(super) fn shown(self, centred: f64) -> f64 {
        if self.sine == 0.0 && self.cosine == 0.0 {
            return centred;
        }
        let mut shown = centred + self.at(centred);
        for _ in 0..MOST_STEPS {
            let step = (shown - centred - self.at(shown)) / (1.0 - self.growth(shown));
            if !step.is_finite() {
                break;
            }
            shown -= step;
            if step.abs() < STEP_RAD {
                break;
            }
        }
        shown
    }

    /// How the shown angle moves with what a centred circle would show, and with the two parts of the eccentricity.
    pub(super) fn slopes(self, shown: f64) -> [f64; 3] {
        let (sin, cos) = shown.sin_cos();
        let stretched = 1.0 / (1.0 - self.growth(shown));
        [stretched, stretched * sin, stretched * cos]
    }
}

/// Which circles were read at two opposite marks or verniers, and the mean taken.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
pub struct OppositeVerniers {
    /// The hour circle.
    pub hour: bool,
    /// The declination circle.
    pub dec: bool,
}

impl OppositeVerniers {
    /// The errors that reach such a reading: all but the eccentricity of the circles read so.
    #[must_use]
    pub fn errors_seen(self, errors: &MountErrors) -> MountErrors {
        let mut seen = *errors;
        if self.hour {
            seen.hour_eccentric_sine = Angle::ZERO;
            seen.hour_eccentric_cosine = Angle::ZERO;
        }
        if self.dec {
            seen.dec_eccentric_sine = Angle::ZERO;
            seen.dec_eccentric_cosine = Angle::ZERO;
        }
        seen
    }

    /// The same of the slopes by the errors, rows hour axis and declination axis, columns in the order of
    /// [`MountErrors::to_array`].
    #[must_use]
    pub fn slopes_seen(self, by_errors: SMatrix<f64, 2, COUNT>) -> SMatrix<f64, 2, COUNT> {
        let mut seen = by_errors;
        if self.hour {
            seen.fixed_columns_mut::<2>(COUNT - 4).fill(0.0);
        }
        if self.dec {
            seen.fixed_columns_mut::<2>(COUNT - 2).fill(0.0);
        }
        seen
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn eccentricity(sine_arcmin: f64, cosine_arcmin: f64) -> Eccentricity {
        Eccentricity::of_hour_circle(&MountErrors {
            hour_eccentric_sine: Angle::from_arcminutes(sine_arcmin),
            hour_eccentric_cosine: Angle::from_arcminutes(cosine_arcmin),
            ..MountErrors::default()
        })
    }

    #[test]
    fn it_is_the_triangle_of_axis_centre_and_index() {
        /// Cube of the eccentricity, 1° here, over six.
        const CUBE_RAD: f64 = 1e-6;
        // the centre of the graduation a distance of 1° of arc at the rim from the axis, toward the number gamma
        let (distance, gamma) = (1.0_f64.to_radians(), 0.7_f64);
        let circle = Eccentricity {
            sine: -distance * gamma.cos(),
            cosine: distance * gamma.sin(),
        };
        for turned in [-3.0, -1.2, 0.0, 0.4, 1.9, 2.8_f64] {
            // the index as seen from the centre, in the frame of the ring
            let (x, y) = (
                turned.cos() + distance * gamma.cos(),
                turned.sin() + distance * gamma.sin(),
            );
            let off = circle.shown(turned) - y.atan2(x);
            assert!(
                Angle::from_radians(off).wrapped_signed().radians().abs() < CUBE_RAD,
                "{turned}: {off}"
            );
        }
    }

    #[test]
    fn what_is_shown_less_the_eccentricity_there_is_what_a_centred_circle_shows() {
        for (sine, cosine) in [(10.0, -4.0), (-90.0, 120.0), (0.0, 0.0)] {
            let circle = eccentricity(sine, cosine);
            for centred in [-3.1, -0.5, 0.0, 1.0, 2.2] {
                let shown = circle.shown(centred);
                assert!((shown - circle.at(shown) - centred).abs() < STEP_RAD);
            }
        }
    }

    #[test]
    fn a_mark_right_across_reads_the_opposite_of_it() {
        let circle = eccentricity(10.0, -4.0);
        let here = circle.at(0.6);
        let across = circle.at(0.6 + std::f64::consts::PI);
        assert!(here.abs() > Angle::from_arcminutes(2.0).radians());
        assert!((here + across).abs() < 1e-15);
    }
}
