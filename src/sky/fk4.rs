//! Old equinoxes: precession of the FK4 by Newcomb's constants, and the E-terms of aberration that
//! FK4 places contain.
//!
//! Source: C. A. Smith and others 1989, *Astronomical Journal* 97, 265 (E-terms, and precession by
//! Newcomb's constants in Kinoshita's form, 1975, SAO Special Report 364, as given there). Years are
//! Besselian. The constants are from memory; tests hold them to those of `fk425` and, with
//! `tests/reference/equinoxes.csv`, to another writing of the same formulas.

use sofars::consts::DAS2R;
use sofars::vm;

use crate::sky::vector::{Matrix, Vector, length_and_direction, plus};

/// The E-terms of aberration at a Besselian year, in radians, on the mean equator of that year.
pub fn e_terms(year: f64) -> Vector {
    let t = (year - 1950.0) * 1.000_021_359_03e-2;
    let eccentricity = 0.016_730_11 - (0.000_041_93 + 0.000_000_126 * t) * t;
    let obliquity = (84_404.836 - (46.8495 + (0.003_19 + 0.001_81 * t) * t) * t) * DAS2R;
    let perihelion = (1_015_489.951 + (6_190.67 + (1.65 + 0.012 * t) * t) * t) * DAS2R;
    let size = eccentricity * 20.495_52 * DAS2R;
    let (sin, cos) = perihelion.sin_cos();
    [
        size * sin,
        -size * cos * obliquity.cos(),
        -size * cos * obliquity.sin(),
    ]
}

/// A place freed of its E-terms, to first order in them.
pub fn without_e_terms(place: &Vector, year: f64) -> Vector {
    let terms = e_terms(year);
    let freed = plus(place, -1.0, &terms);
    length_and_direction(&plus(&freed, vm::pdp(place, &terms), place)).1
}

/// A place with E-terms put in: the inverse, by iteration.
pub fn with_e_terms(place: &Vector, year: f64) -> Vector {
    let mut given = *place;
    // each round is nearer by the size of the terms, 2e-6: three reach double precision
    for _ in 0..3 {
        let off = plus(place, -1.0, &without_e_terms(&given, year));
        given = length_and_direction(&plus(&given, 1.0, &off)).1;
    }
    given
}

/// The rotation from the mean equator and equinox of one Besselian year to those of another.
pub fn precession(from: f64, to: f64) -> Matrix {
    let start = (from - 1850.0) / 100.0;
    let t = (to - from) / 100.0;
    let scale = t * DAS2R;
    let w = 2303.5548 + (1.397_20 + 0.000_059 * start) * start;
    let zeta = (w + (0.302_42 - 0.000_269 * start + 0.017_996 * t) * t) * scale;
    let z = (w + (1.094_78 + 0.000_387 * start + 0.018_324 * t) * t) * scale;
    let theta = (2005.1125
        + (-0.852_94 - 0.000_365 * start) * start
        + (-0.426_47 - 0.000_365 * start - 0.041_802 * t) * t)
        * scale;
    let mut rotation = Matrix::default();
    vm::ir(&mut rotation);
    vm::rz(-zeta, &mut rotation);
    vm::ry(theta, &mut rotation);
    vm::rz(-z, &mut rotation);
    rotation
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_e_terms_of_1950_are_the_constant_vector_of_the_fk4() {
        // Source: the vector A of IAU SOFA's fk425 (Explanatory Supplement 1992, 3.591-2), five figures
        let printed = [-1.625_57e-6, -0.319_19e-6, -0.138_43e-6];
        for (ours, theirs) in e_terms(1950.0).iter().zip(printed) {
            assert!((ours - theirs).abs() < 0.000_03e-6, "{ours} {theirs}");
        }
    }

    #[test]
    fn e_terms_put_in_come_out_again() {
        for place in [[0.0, 0.0, 1.0], [1.0, 0.0, 0.0], [0.6, -0.48, 0.64]] {
            let back = without_e_terms(&with_e_terms(&place, 1875.0), 1875.0);
            for (ours, theirs) in back.iter().zip(place) {
                assert!((ours - theirs).abs() < 1e-15);
            }
        }
    }

    #[test]
    fn precession_to_and_fro_is_none() {
        // the constants are not quite their own inverse: a thousandth of a second in a century
        let place = [0.6, -0.48, 0.64];
        let there = crate::sky::vector::turned(&precession(1875.0, 1950.0), &place);
        let back = crate::sky::vector::turned(&precession(1950.0, 1875.0), &there);
        assert!(vm::sepp(&place, &back) < 0.002 * DAS2R);
    }
}
