//! The chance that an object lies in the field at the first look.
//!
//! It is the integral of a bivariate normal distribution about the middle of the field over a disc. In the coordinates of
//! the distribution's own axes, `x = s1 r cos u`, `y = s2 r sin u`, the integral over `r` is elementary and leaves a mean
//! over the angle `u`,
//!
//! `P = mean of 1 - exp(-R² / (2 (s1² cos² u + s2² sin² u)))`,
//!
//! derived for this program and checked against an integral by slices (`tests/reference/chance.csv`). Where the
//! distribution is a long streak the integrand changes only close to the direction of its narrow axis, over an angle of
//! some (s2 or R) / s1; so the quarter turn is halved toward that direction until that angle is reached, and each part is
//! integrated by Gauss's rule.

use std::f64::consts::FRAC_PI_2;

use nalgebra::Matrix2;

use crate::angle::Angle;

/// The positive nodes of Gauss's rule of ten points on [-1, 1], with their weights: numpy 2.4.6,
/// polynomial.legendre.leggauss(10).
const GAUSS: [(f64, f64); 5] = [
    (0.148_874_338_981_631_22, 0.295_524_224_714_753_04),
    (0.433_395_394_129_247_2, 0.269_266_719_309_996_35),
    (0.679_409_568_299_024_4, 0.219_086_362_515_982_07),
    (0.865_063_366_688_984_5, 0.149_451_349_150_580_47),
    (0.973_906_528_517_171_7, 0.066_671_344_308_688_4),
];

/// Halvings beyond this end nearer the narrow axis than any streak needs: 2^-40 of a quarter turn.
const MOST_HALVINGS: u32 = 40;

/// The chance, 0 to 1, that an object whose place is uncertain by that covariance (square radians on the sky, about the
/// middle of the field, errors of setting included) lies in a round field of that diameter. A covariance that is none
/// gives no chance.
///
/// Good to 1e-6, on a plane: fields and uncertainties of a few degrees.
#[must_use]
pub fn chance(covariance: &Matrix2<f64>, field: Angle) -> f64 {
    let radius = field.radians() / 2.0;
    let half_sum = f64::midpoint(covariance.m11, covariance.m22);
    let half_difference = (covariance.m11 - covariance.m22) / 2.0;
    let swing = half_difference.hypot(f64::midpoint(covariance.m12, covariance.m21));
    let (long, short) = (half_sum + swing, (half_sum - swing).max(0.0));
    if !(radius > 0.0 && long.is_finite() && long >= 0.0) {
        return 0.0;
    }
    // everything in terms of the long sigma, so that no square of a tiny number is lost
    let reach = radius / long.sqrt();
    let squared = reach * reach;
    if !squared.is_finite() {
        return 1.0;
    }
    let narrow = short / long;
    let streak = ((narrow + squared) / (1.0 + squared)).sqrt();
    // u is counted from the narrow axis
    let within = |u: f64| {
        let (sin, cos) = u.sin_cos();
        -(-squared / (2.0 * (narrow * cos * cos + sin * sin))).exp_m1()
    };
    let mut total = 0.0;
    let mut far = FRAC_PI_2;
    for _ in 0..MOST_HALVINGS {
        if far < streak / 4.0 {
            break;
        }
        total += integral(&within, far / 2.0, far);
        far /= 2.0;
    }
    total += integral(&within, 0.0, far);
    (total / FRAC_PI_2).clamp(0.0, 1.0)
}

/// Integral between two angles by Gauss's rule.
fn integral(function: &impl Fn(f64) -> f64, from: f64, to: f64) -> f64 {
    let (middle, half) = (f64::midpoint(from, to), (to - from) / 2.0);
    GAUSS
        .iter()
        .map(|&(node, weight)| {
            weight * (function(middle - half * node) + function(middle + half * node))
        })
        .sum::<f64>()
        * half
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    /// What the function promises.
    const PROMISED: f64 = 1e-6;

    fn round(sigma: f64) -> Matrix2<f64> {
        Matrix2::identity() * (sigma * sigma)
    }

    #[test]
    fn a_round_distribution_follows_rayleigh() {
        for over in [0.01, 0.5, 1.0, 2.0, 5.0] {
            let found = chance(&round(0.01), Angle::from_radians(2.0 * 0.01 * over));
            let expected = 1.0 - (-over * over / 2.0_f64).exp();
            assert!(
                (found - expected).abs() < PROMISED,
                "{over}: {found} {expected}"
            );
        }
    }

    #[test]
    fn a_streak_without_width_follows_the_normal_law() {
        // within one, two and three sigma
        for (sigmas, expected) in [
            (1.0, 0.682_689_492_137),
            (2.0, 0.954_499_736_104),
            (3.0, 0.997_300_203_937),
        ] {
            let streak = Matrix2::new(1e-4, 0.0, 0.0, 0.0);
            let found = chance(&streak, Angle::from_radians(2.0 * 0.01 * sigmas));
            assert!((found - expected).abs() < PROMISED, "{sigmas}: {found}");
        }
    }

    #[test]
    fn what_is_sure_is_in_any_field_and_nothing_is_in_no_field() {
        let field = Angle::from_degrees(1.0);
        assert!((chance(&Matrix2::zeros(), field) - 1.0).abs() < f64::EPSILON);
        assert!((chance(&round(1e-200), field) - 1.0).abs() < f64::EPSILON);
        assert!(chance(&round(0.01), Angle::ZERO).abs() < f64::EPSILON);
        assert!(chance(&Matrix2::repeat(f64::NAN), field).abs() < f64::EPSILON);
    }

    #[test]
    fn a_field_whose_square_is_lost_in_rounding_still_has_a_chance() {
        // neither a chance of "not a number" nor a panic: both squares are below the least double
        let streak = Matrix2::new(0.0, -1.3e-308, -1.3e-308, 0.0);
        assert!(chance(&streak, Angle::from_degrees(1.1e-182)).abs() < PROMISED);
        // a round distribution follows Rayleigh at any size
        let found = chance(&round(1e-150), Angle::from_radians(2e-150));
        assert!(
            (found - (1.0 - (-0.5_f64).exp())).abs() < PROMISED,
            "{found}"
        );
    }

    proptest! {
        #[test]
        fn it_is_a_chance_and_grows_with_the_field(
            east in -0.1..0.1, north in -0.1..0.1, width in 0.0..0.1, field in 0.0..0.2,
        ) {
            let along = nalgebra::Vector2::new(east, north);
            let covariance = along * along.transpose() + round(width);
            let smaller = chance(&covariance, Angle::from_radians(field));
            let larger = chance(&covariance, Angle::from_radians(field * 1.1));
            prop_assert!((0.0..=1.0).contains(&smaller));
            prop_assert!(larger >= smaller - PROMISED);
        }

        #[test]
        fn no_numbers_make_it_stumble(a in any::<f64>(), b in any::<f64>(), c in any::<f64>(), field in any::<f64>()) {
            let found = chance(&Matrix2::new(a, b, b, c), Angle::from_radians(field));
            prop_assert!((0.0..=1.0).contains(&found));
        }
    }
}
