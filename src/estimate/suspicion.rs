//! How improbable a sight is to an estimate that does not contain it, and how likely under another account of it.
//!
//! A sight is foretold as a bivariate normal of the two shown axis angles, from the estimate and the errors of the
//! looks. Its squared distance d² in sigmas (P. C. Mahalanobis, 1936; from memory) is a chi-squared of two degrees of
//! freedom, so the chance of one as far or farther is `exp(-d²/2)`. A reading that can mean several axis angles is as
//! improbable as the nearest of them and as likely as all of them together.
//!
//! Densities are per square radian of the two axes.

use std::f64::consts::TAU;

use nalgebra::{Matrix2, Vector2};

use crate::angle::{Angle, Latitude};
use crate::estimate::descent::sigma_rad;
use crate::estimate::prediction::Estimate;
use crate::estimate::sight::{Residual, Sight, off};
use crate::metal::TooNearPole;

/// A sight of which sound ones come farther off only once in a thousand is suspicious.
pub const SUSPICIOUS: f64 = 0.001;

/// How far a ring slips: equally often by about two degrees, six, twenty and sixty (1 sigma each), which comes near to
/// any size being as likely as any other from a degree to half a turn (common practice, no source).
const SLIPS: [Angle; 4] = [
    Angle::from_degrees(2.0),
    Angle::from_degrees(6.0),
    Angle::from_degrees(20.0),
    Angle::from_degrees(60.0),
];

/// Which circles may have slipped since the estimate was made.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Slipped {
    /// The hour circle.
    pub hour: bool,
    /// The declination circle.
    pub dec: bool,
}

/// A sight held against an estimate.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Held {
    /// The hour axis angle shown less that expected, of the meaning nearest to what was expected.
    pub hour_off: Angle,
    /// The same of the declination axis.
    pub dec_off: Angle,
    /// Squared distance of that meaning from what was expected, in sigmas.
    pub squared: f64,
    /// Natural logarithm of the density of the sight.
    pub ln_density: f64,
}

impl Held {
    /// The chance that a sound sight is as far off as this or farther, 0 to 1.
    #[must_use]
    pub fn improbability(&self) -> f64 {
        (-self.squared / 2.0).exp()
    }

    /// True if it is too improbable to be taken without a question.
    #[must_use]
    pub fn is_suspicious(&self) -> bool {
        self.improbability() < SUSPICIOUS
    }
}

impl Estimate {
    /// Holds a sight against this estimate, which must not rest on it. Nothing for a circle that was not read.
    pub fn hold(
        &self,
        latitude: Latitude,
        sight: &Sight,
        slipped: Slipped,
    ) -> Result<Option<Held>, TooNearPole> {
        let expected = self.predict_sight(latitude, sight)?;
        let (hour, dec) = (sigma_rad(sight.sigma_hour), sigma_rad(sight.sigma_dec));
        let sound = expected.covariance + Matrix2::new(hour * hour, 0.0, 0.0, dec * dec);
        let spreads = spreads(sound, slipped);
        let meanings = sight
            .hour
            .iter()
            .flat_map(|&hour| sight.dec.iter().map(move |&dec| (hour, dec)))
            .map(|(hour, dec)| {
                Vector2::new(off(hour, expected.axes.hour), off(dec, expected.axes.dec))
            });
        let mut nearest: Option<(f64, Vector2<f64>)> = None;
        let mut ln_densities = Vec::new();
        for away in meanings {
            for (spread, ln_share) in &spreads {
                let squared = away.dot(&(spread.inverse * away));
                ln_densities.push(ln_share - squared / 2.0 - spread.ln_size);
                if nearest.is_none_or(|(least, _)| squared < least) {
                    nearest = Some((squared, away));
                }
            }
        }
        Ok(nearest.map(|(squared, away)| Held {
            hour_off: Angle::from_radians(away.x),
            dec_off: Angle::from_radians(away.y),
            squared,
            ln_density: ln_sum(&ln_densities),
        }))
    }
}

impl Estimate {
    /// The squared distance in sigmas that a sight this estimate rests on would have from the estimate of the others, to
    /// first order: what is left unexplained of it, by the spread that leaves (R. D. Cook, *Technometrics* 19, 1977; from
    /// memory). Nothing for a sight not trusted in full, of which the estimate hardly knows.
    #[must_use]
    pub fn squared_without(
        &self,
        latitude: Latitude,
        sight: &Sight,
        residual: &Residual,
    ) -> Option<f64> {
        if residual.weight() < 1.0 {
            return None;
        }
        let (hour, dec) = (sigma_rad(sight.sigma_hour), sigma_rad(sight.sigma_dec));
        let looks = Matrix2::new(hour * hour, 0.0, 0.0, dec * dec);
        let left = looks - self.predict_sight(latitude, sight).ok()?.covariance;
        let away = Vector2::new(residual.hour.radians(), residual.dec.radians());
        let inverse = left.cholesky()?.inverse();
        Some(away.dot(&(inverse * away)))
    }
}

/// A bivariate normal about nothing.
struct Spread {
    inverse: Matrix2<f64>,
    /// Natural logarithm of 2π times the root of the determinant.
    ln_size: f64,
}

/// What the sight is spread by, with the logarithm of the share of each.
fn spreads(sound: Matrix2<f64>, slipped: Slipped) -> Vec<(Spread, f64)> {
    let widths = |slips: bool| -> Vec<f64> {
        if slips {
            SLIPS.iter().map(|width| width.radians()).collect()
        } else {
            vec![0.0]
        }
    };
    let (hours, decs) = (widths(slipped.hour), widths(slipped.dec));
    let ln_share = -((hours.len() * decs.len()) as f64).ln();
    hours
        .iter()
        .flat_map(|&hour| decs.iter().map(move |&dec| (hour, dec)))
        .filter_map(|(hour, dec)| {
            let wide = sound + Matrix2::new(hour * hour, 0.0, 0.0, dec * dec);
            let inverse = wide.try_inverse()?;
            let ln_size = TAU.ln() + wide.determinant().ln() / 2.0;
            Some((Spread { inverse, ln_size }, ln_share))
        })
        .collect()
}

/// The logarithm of the sum of what these are the logarithms of; minus infinity of none.
#[must_use]
pub fn ln_sum(ln_parts: &[f64]) -> f64 {
    let greatest = ln_parts.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    if greatest.is_finite() {
        let sum: f64 = ln_parts.iter().map(|part| (part - greatest).exp()).sum();
        greatest + sum.ln()
    } else {
        greatest
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{AxisAngle, Declination, HourAngle};
    use crate::estimate::{Prior, fit};
    use crate::metal::{ExpectedErrors, OppositeVerniers, Side};

    const LATITUDE_DEG: f64 = 52.0;

    fn sight(hour: &[f64], dec: &[f64]) -> Sight {
        let axes = |degrees: &[f64]| {
            degrees
                .iter()
                .map(|&d| AxisAngle::from_degrees(d))
                .collect()
        };
        Sight {
            hour_angle: HourAngle::from_degrees(-30.0),
            declination: Declination::from_degrees(20.0),
            side: Side::TubeWest,
            hour: axes(hour),
            dec: axes(dec),
            sigma_hour: Angle::from_arcminutes(3.0),
            sigma_dec: Angle::from_arcminutes(4.0),
            opposite: OppositeVerniers::default(),
        }
    }

    /// A mount of which all but the looks is known: the indexes from many readings of the star itself.
    fn well_known() -> Estimate {
        let prior = Prior::from_expected(&ExpectedErrors::default());
        let readings = vec![sight(&[-30.0], &[20.0]); 400];
        (&fit(Latitude::from_degrees(LATITUDE_DEG), &prior, &readings)).into()
    }

    fn held(sight: &Sight, slipped: Slipped) -> Held {
        let latitude = Latitude::from_degrees(LATITUDE_DEG);
        well_known()
            .hold(latitude, sight, slipped)
            .unwrap()
            .unwrap()
    }

    #[test]
    fn the_distance_is_counted_in_sigmas_of_estimate_and_look() {
        /// The estimate's own share of the variance is one in four hundred.
        const SHARE: f64 = 0.01;
        let off = held(&sight(&[-30.0 + 0.15], &[20.0 - 0.2]), Slipped::default());
        assert!((off.squared - 18.0).abs() < 18.0 * SHARE, "{off:?}");
        assert!((off.hour_off.arcminutes() - 9.0).abs() < 0.01);
        assert!((off.dec_off.arcminutes() + 12.0).abs() < 0.01);
        assert!((off.improbability() / (-9.0_f64).exp() - 1.0).abs() < 10.0 * SHARE);
        assert!(off.is_suspicious());
        assert!(!held(&sight(&[-29.95], &[20.1]), Slipped::default()).is_suspicious());
    }

    #[test]
    fn the_density_of_a_sound_sight_sums_to_one() {
        let step = 0.02;
        let (latitude, known) = (Latitude::from_degrees(LATITUDE_DEG), well_known());
        let mut sum = 0.0;
        for i in -30..=30 {
            for j in -30..=30 {
                let off = |n: i32| f64::from(n) * step;
                let one = sight(&[-30.0 + off(i)], &[20.0 + off(j)]);
                let held = known.hold(latitude, &one, Slipped::default());
                sum += held.unwrap().unwrap().ln_density.exp();
            }
        }
        let whole = sum * f64::to_radians(step) * f64::to_radians(step);
        assert!((whole - 1.0).abs() < 1e-3, "{whole}");
    }

    #[test]
    fn the_nearest_meaning_decides() {
        let one = held(&sight(&[-30.01], &[20.01]), Slipped::default());
        let two = held(
            &sight(&[30.01, -30.01], &[160.0, 20.01]),
            Slipped::default(),
        );
        assert!((one.squared - two.squared).abs() < 1e-9);
        assert!((one.ln_density - two.ln_density).abs() < 1e-9);
        assert_eq!(
            well_known().hold(
                Latitude::from_degrees(LATITUDE_DEG),
                &sight(&[], &[20.0]),
                Slipped::default()
            ),
            Ok(None)
        );
    }

    #[test]
    fn a_slip_takes_any_size_of_one_circle_and_of_no_other() {
        let hour = Slipped {
            hour: true,
            dec: false,
        };
        for slip in [1.0, 5.0, 30.0, 170.0] {
            let turned = sight(&[-30.0 + slip], &[20.0]);
            let (sound, slipped) = (held(&turned, Slipped::default()), held(&turned, hour));
            assert!(slipped.ln_density > sound.ln_density + 20.0, "{slip}");
            let both = sight(&[-30.0 + slip], &[22.0]);
            assert!(held(&both, hour).ln_density < slipped.ln_density - 100.0);
        }
        // of what has not slipped, sound is the likelier account
        let sound = sight(&[-30.0], &[20.0]);
        assert!(held(&sound, Slipped::default()).ln_density > held(&sound, hour).ln_density + 2.0);
    }

    #[test]
    fn the_distance_from_the_others_follows_from_what_is_left_unexplained() {
        /// Bent by the second order of errors of a degree.
        const OF_FIRST_ORDER: f64 = 0.05;
        let latitude = Latitude::from_degrees(LATITUDE_DEG);
        let prior = Prior::from_expected(&ExpectedErrors::default());
        let places = [(-50.0, 20.0), (40.0, -5.0), (-20.0, 55.0), (25.0, 35.0)];
        let sights: Vec<Sight> = places
            .into_iter()
            .enumerate()
            .map(|(n, (hour_angle, declination))| Sight {
                hour_angle: HourAngle::from_degrees(hour_angle),
                declination: Declination::from_degrees(declination),
                // off by up to 5' and 6'
                ..sight(
                    &[hour_angle + (n as f64).sin() / 12.0],
                    &[declination + (2.0 * n as f64).cos() / 10.0],
                )
            })
            .collect();
        let all = fit(latitude, &prior, &sights);
        for (left_out, one) in sights.iter().enumerate() {
            let mut others = sights.clone();
            others.remove(left_out);
            let others = Estimate::from(&fit(latitude, &prior, &others));
            let held = others.hold(latitude, one, Slipped::default());
            let squared = held.unwrap().unwrap().squared;
            let residual = all.residuals[left_out].unwrap();
            let followed = Estimate::from(&all).squared_without(latitude, one, &residual);
            let followed = followed.unwrap();
            assert!(
                (followed - squared).abs() < OF_FIRST_ORDER * squared.max(0.1),
                "{followed} {squared}"
            );
        }
    }

    #[test]
    fn logarithms_sum_without_loss() {
        assert!((ln_sum(&[-1000.0, -1000.0]) - (2.0_f64.ln() - 1000.0)).abs() < 1e-9);
        assert!(ln_sum(&[]).exp() <= 0.0);
        assert!(ln_sum(&[f64::NEG_INFINITY]).exp() <= 0.0);
    }
}
