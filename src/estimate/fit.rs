//! The fit: the likeliest errors of the mount, given the prior and every accepted sight since the last ring setting.
//!
//! Maximum a posteriori over the errors of the mount. Each circle's reading is trusted in full while its residual is within
//! three sigma, by Huber's weights beyond, and hardly at all once it can only be a mistake; readings that can mean several
//! angles are resolved together. Residuals are shown less predicted.

use crate::angle::{Angle, Latitude};
use crate::estimate::prior::{Covariance, Prior};
use crate::estimate::search::{Found, search};
use crate::estimate::sight::{Residual, Sight};
use crate::metal::MountErrors;

/// The errors of the mount as the sights tell them.
#[derive(Clone, Debug, PartialEq)]
pub struct Fit {
    /// The likeliest errors; the indexes in (-180°, 180°] of the prior's.
    pub errors: MountErrors,
    /// Their covariance, in square radians.
    pub covariance: Covariance,
    /// One per sight, in order. Nothing for a sight that could not be used: its place lies nearer the mount's pole
    /// than the tube can come, or a circle was not read.
    pub residuals: Vec<Option<Residual>>,
    /// Root mean square of the residuals on both axes, by weight; nothing without a sight.
    pub spread: Angle,
    /// Steps the descent took.
    pub steps: usize,
    /// False if the descent ran out of steps: then the figures are not to be relied on.
    pub converged: bool,
    /// How much less likely the next best meaning of ambiguous readings is, as the natural logarithm of the ratio;
    /// `None` if no other meaning was worth following. Below about 5 (one to 150) the observer had better say which.
    pub lead: Option<f64>,
}

impl Fit {
    /// How many sights could be used.
    #[must_use]
    pub fn sights_used(&self) -> usize {
        self.residuals.iter().flatten().count()
    }
}

/// Fits the mount's errors. Without a sight that can be used the prior comes back.
#[must_use]
pub fn fit(latitude: Latitude, prior: &Prior, sights: &[Sight]) -> Fit {
    let Some(Found { best, lead }) = search(latitude, prior, sights) else {
        return unread(prior, sights);
    };
    let standing = &best.descent.standing;
    let Some(covariance) = standing.covariance(prior) else {
        return unread(prior, sights);
    };
    let residuals: Vec<Option<Residual>> = best.residuals(latitude).collect();
    Fit {
        errors: standing.errors,
        covariance,
        spread: spread(&residuals),
        residuals,
        steps: best.descent.steps,
        converged: best.descent.converged,
        lead,
    }
}

fn spread(residuals: &[Option<Residual>]) -> Angle {
    let (mut squares, mut weights) = (0.0, 0.0);
    for residual in residuals.iter().flatten() {
        for (off, weight) in [
            (residual.hour, residual.hour_weight),
            (residual.dec, residual.dec_weight),
        ] {
            squares += weight * off.radians() * off.radians();
            weights += weight;
        }
    }
    Angle::from_radians(if weights > 0.0 {
        (squares / weights).sqrt()
    } else {
        0.0
    })
}

/// What is known when no sight tells anything.
fn unread(prior: &Prior, sights: &[Sight]) -> Fit {
    Fit {
        errors: prior.mean(),
        covariance: *prior.covariance(),
        residuals: vec![None; sights.len()],
        spread: Angle::ZERO,
        steps: 0,
        converged: sights.is_empty(),
        lead: None,
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::angle::{AxisAngle, Declination, HourAngle};
    use crate::estimate::Estimate;
    use crate::estimate::sight::off;
    use crate::metal::errors::ALWAYS;
    use crate::metal::{ExpectedErrors, OppositeVerniers, Side, to_axes};

    const LATITUDE_DEG: f64 = 52.0;

    /// Six stars over the sky, hour angle and declination in degrees.
    const SIX: [(f64, f64); 6] = [
        (-50.0, 20.0),
        (40.0, -5.0),
        (-20.0, 55.0),
        (25.0, 35.0),
        (-35.0, -10.0),
        (60.0, 45.0),
    ];

    fn usual_side(hour_angle: f64) -> Side {
        if hour_angle < 0.0 {
            Side::TubeWest
        } else {
            Side::TubeEast
        }
    }

    fn default_prior() -> Prior {
        Prior::from_expected(&ExpectedErrors::default())
    }

    fn mount(arcminutes: [f64; ALWAYS]) -> MountErrors {
        MountErrors::with_centred_circles(arcminutes.map(Angle::from_arcminutes))
    }

    /// What a mount shows, read without error though the observer allows for 3'.
    fn read(errors: &MountErrors, (hour_angle, declination): (f64, f64), side: Side) -> Sight {
        let (h, d) = (
            HourAngle::from_degrees(hour_angle),
            Declination::from_degrees(declination),
        );
        let axes = to_axes(h, d, Latitude::from_degrees(LATITUDE_DEG), errors, side).unwrap();
        Sight {
            hour_angle: h,
            declination: d,
            side,
            hour: vec![axes.hour],
            dec: vec![axes.dec],
            sigma_hour: Angle::from_arcminutes(3.0),
            sigma_dec: Angle::from_arcminutes(3.0),
            opposite: OppositeVerniers::default(),
        }
    }

    fn six(errors: &MountErrors) -> Vec<Sight> {
        SIX.iter()
            .map(|&star| read(errors, star, usual_side(star.0)))
            .collect()
    }

    fn fitted(sights: &[Sight]) -> Fit {
        fit(
            Latitude::from_degrees(LATITUDE_DEG),
            &default_prior(),
            sights,
        )
    }

    /// How far, in sigmas, predictions all over the sky differ between two fits.
    fn dragged(reference: &Fit, other: &Fit) -> f64 {
        let latitude = Latitude::from_degrees(LATITUDE_DEG);
        let mut most = 0.0_f64;
        for hour_angle in [-75.0, -45.0, -15.0, 15.0, 45.0, 75.0] {
            for declination in [-10.0, 15.0, 40.0, 65.0] {
                let predict = |fit: &Fit| {
                    let (h, d) = (
                        HourAngle::from_degrees(hour_angle),
                        Declination::from_degrees(declination),
                    );
                    Estimate::from(fit)
                        .predict(h, d, latitude, usual_side(hour_angle))
                        .unwrap()
                };
                let (a, b) = (predict(reference), predict(other));
                most = most
                    .max(off(b.axes.hour, a.axes.hour).abs() / a.hour_sigma().radians())
                    .max(off(b.axes.dec, a.axes.dec).abs() / a.dec_sigma().radians());
            }
        }
        most
    }

    #[test]
    fn without_a_sight_the_prior_comes_back() {
        let fit = fitted(&[]);
        assert_eq!(fit.errors, default_prior().mean());
        assert!((fit.covariance - default_prior().covariance()).abs().max() < 1e-15);
        assert!(fit.converged && fit.sights_used() == 0);
    }

    #[test]
    fn what_one_side_cannot_tell_of_the_other_is_not_falsely_sharp() {
        let truth = mount([600.0, -200.0, 30.0, -40.0, 25.0, -10.0, 2.0]);
        let west: Vec<Sight> = SIX.map(|star| read(&truth, star, Side::TubeWest)).to_vec();
        let both = six(&truth);
        let (one_side, two_sides) = (fitted(&west), fitted(&both));
        let sigma = |fit: &Fit, error: usize| {
            Angle::from_radians(fit.covariance[(error, error)].sqrt()).arcminutes()
        };
        // index, cone and skew add up to what one side shows of them
        for error in [0, 4, 5] {
            let (one, two) = (sigma(&one_side, error), sigma(&two_sides, error));
            assert!(one > 1.5 * two, "{error}: {one}' {two}'");
        }
        let latitude = Latitude::from_degrees(LATITUDE_DEG);
        for (hour_angle, declination) in SIX {
            let (h, d) = (
                HourAngle::from_degrees(hour_angle),
                Declination::from_degrees(declination),
            );
            let on = |side| {
                let estimate = Estimate::from(&one_side);
                let told = estimate.predict(h, d, latitude, side).unwrap();
                let shown = to_axes(h, d, latitude, &truth, side).unwrap();
                (
                    off(told.axes.hour, shown.hour).abs() / told.hour_sigma().radians(),
                    off(told.axes.dec, shown.dec).abs() / told.dec_sigma().radians(),
                    told.sky.trace(),
                )
            };
            let (near, far) = (on(Side::TubeWest), on(Side::TubeEast));
            assert!(far.2 > 4.0 * near.2, "{near:?} {far:?}");
            // where it is wrong, it says how far it may be
            assert!(far.0 < 3.0 && far.1 < 3.0, "{far:?}");
        }
    }

    #[test]
    fn one_star_gives_the_indexes_and_leaves_the_rest_to_the_prior() {
        let truth = mount([5000.0, -3000.0, 0.0, 0.0, 0.0, 0.0, 0.0]);
        let fit = fitted(&[read(&truth, (-30.0, 25.0), Side::TubeWest)]);
        // the free index is still believed to be small, by 60 degrees: some 5' of 5000' go to the other errors
        for (found, (truth, limit)) in fit.errors.to_array().into_iter().zip(
            truth
                .to_array()
                .into_iter()
                .zip([5.0, 5.0, 2.0, 2.0, 2.0, 1.0, 0.1]),
        ) {
            assert!(
                (found - truth).abs().arcminutes() < limit,
                "{:?}",
                fit.errors
            );
        }
        let prior = default_prior();
        for error in 2..ALWAYS {
            assert!(fit.covariance[(error, error)] > 0.9 * prior.covariance()[(error, error)]);
        }
        let residual = fit.residuals[0].unwrap();
        assert!(residual.hour.abs().arcminutes() < 0.1 && residual.dec.abs().arcminutes() < 0.1);
    }

    #[test]
    // wrong by less than two degrees, a reading of a star with leverage can still be laid to the polar axis
    fn one_wrong_reading_among_six_does_not_drag_the_others() {
        /// Against a fit without the wrong star, in sigmas of its predictions: what a reading let go still pulls, and
        /// what its sound circle adds.
        const MOST_DRAG_SIGMAS: f64 = 0.5;
        let truth = mount([2000.0, 900.0, 40.0, -50.0, 20.0, -8.0, 2.0]);
        let turned =
            |axis: AxisAngle, by: f64| vec![AxisAngle::new(axis.angle() + Angle::from_degrees(by))];
        for wrong in 0..6 {
            let mut others = six(&truth);
            let sound = others.remove(wrong);
            let without = fitted(&others);
            for (hour, dec) in [
                (15.0, 0.0),
                (-15.0, 0.0),
                (2.0, 0.0),
                (0.0, 10.0),
                (0.0, -10.0),
                (7.0, -5.0),
                (90.0, 40.0),
            ] {
                let mut sights = six(&truth);
                sights[wrong].hour = turned(sound.hour[0], hour);
                sights[wrong].dec = turned(sound.dec[0], dec);
                let fit = fitted(&sights);
                assert!(fit.converged);
                let drag = dragged(&without, &fit);
                assert!(
                    drag < MOST_DRAG_SIGMAS,
                    "{drag}: star {wrong} wrong by {hour}, {dec}"
                );
                let weights: Vec<f64> = fit.residuals.iter().map(|r| r.unwrap().weight()).collect();
                let least = (0..6)
                    .min_by(|&a, &b| weights[a].total_cmp(&weights[b]))
                    .unwrap();
                assert_eq!(least, wrong, "{weights:?}");
                assert!(weights[wrong] < 0.1, "{weights:?}");
            }
        }
    }

    #[test]
    fn ambiguous_readings_are_resolved_together() {
        let truth = mount([-1200.0, 700.0, 40.0, -50.0, 20.0, -8.0, 2.0]);
        let plain = fitted(&six(&truth));
        let mut sights = six(&truth);
        for sight in &mut sights {
            // numbered 0-12-0 without E and W; four quarters without N and S
            let (hour, dec) = (sight.hour[0].angle(), sight.dec[0].angle());
            sight.hour = vec![AxisAngle::new(-hour), AxisAngle::new(hour)];
            sight.dec = [Angle::HALF_TURN - dec, dec, -dec, dec - Angle::HALF_TURN]
                .map(AxisAngle::new)
                .to_vec();
        }
        let fit = fitted(&sights);
        assert!(dragged(&plain, &fit) < 1e-3, "{fit:?}");
        for (found, sight) in fit.residuals.iter().zip(six(&truth)) {
            assert_eq!(found.unwrap().shown.hour, sight.hour[0]);
            assert_eq!(found.unwrap().shown.dec, sight.dec[0]);
        }
    }

    #[test]
    fn a_sight_out_of_reach_is_reported_and_the_others_used() {
        let truth = mount([100.0, 50.0, 0.0, 0.0, 25.0, 0.0, 0.0]);
        let mut sights = six(&truth);
        let plain = fitted(&sights);
        sights.insert(
            2,
            Sight {
                declination: Declination::from_degrees(89.9),
                ..sights[0].clone()
            },
        );
        let fit = fitted(&sights);
        assert!(fit.residuals[2].is_none());
        assert_eq!(fit.sights_used(), 6);
        assert!(dragged(&plain, &fit) < 1e-3);
    }

    proptest! {
        #[test]
        fn clean_readings_give_the_mount_back_whatever_its_indexes(
            indexes in [-10_800.0..10_800.0, -10_800.0..10_800.0],
            rest in [-60.0..60.0, -60.0..60.0, -30.0..30.0, -12.0..12.0, -3.0..3.0],
        ) {
            let ([a, b], [c, d, e, f, g]) = (indexes, rest);
            let truth = mount([a, b, c, d, e, f, g]);
            let mut sights = six(&truth);
            for sight in &mut sights {
                sight.sigma_hour = Angle::from_arcseconds(0.1);
                sight.sigma_dec = Angle::from_arcseconds(0.1);
            }
            let fit = fitted(&sights);
            prop_assert!(fit.converged);
            for (found, truth) in fit.errors.to_array().into_iter().zip(truth.to_array()) {
                prop_assert!((found - truth).wrapped_signed().abs().arcminutes() < 0.01, "{:?}", fit);
            }
        }

        #[test]
        fn no_finite_readings_make_it_stumble(
            places in prop::collection::vec((any::<f64>(), -100.0..100.0, any::<f64>(), any::<f64>(), 0.0..1e9, any::<bool>()), 0..5),
            expected in any::<f64>(),
            latitude in -90.0..90.0,
        ) {
            prop_assume!(expected.is_finite());
            let sights: Vec<Sight> = places
                .into_iter()
                .filter(|(h, _, a, b, _, _)| h.is_finite() && a.is_finite() && b.is_finite())
                .map(|(h, d, a, b, sigma, west)| Sight {
                    hour_angle: HourAngle::from_degrees(h),
                    declination: Declination::from_degrees(d),
                    side: if west { Side::TubeWest } else { Side::TubeEast },
                    hour: vec![AxisAngle::from_degrees(a), AxisAngle::from_degrees(-a)],
                    dec: if west { vec![] } else { vec![AxisAngle::from_degrees(b)] },
                    sigma_hour: Angle::from_degrees(sigma),
                    sigma_dec: Angle::from_degrees(-sigma),
                    opposite: OppositeVerniers { hour: !west, dec: west },
                })
                .collect();
            let expected = Angle::from_degrees(expected);
            let prior = Prior::from_expected(&ExpectedErrors {
                polar_high: expected,
                polar_east: expected,
                cone: expected,
                hour_eccentric: expected,
                dec_eccentric: expected,
                ..ExpectedErrors::default()
            });
            let fit = fit(Latitude::from_degrees(latitude), &prior, &sights);
            prop_assert_eq!(fit.residuals.len(), sights.len());
            prop_assert!(fit.errors.to_array().iter().all(|error| error.is_finite()));
            prop_assert!(fit.covariance.iter().all(|element| element.is_finite()));
        }
    }
}
