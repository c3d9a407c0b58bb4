//! What is known of the mount's errors, and what it foretells for a place on the sky.
//!
//! Covariances in square radians; on the sky they are of a step westward (`cos δ Δh`) and a step northward (`Δδ`).

use nalgebra::Matrix2;

use crate::angle::{Angle, Declination, HourAngle, Latitude};
use crate::estimate::fit::Fit;
use crate::estimate::prior::{Covariance, Prior};
use crate::estimate::sight::{Place, Sight};
use crate::metal::{Axes, MountErrors, OppositeVerniers, Side, TooNearPole};

/// An index this well known is no longer free, whose sigma is 60°.
const KNOWN_INDEX: Angle = Angle::from_degrees(10.0);

/// What is known of the mount's errors: this the rest of the program carries.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Estimate {
    errors: MountErrors,
    covariance: Covariance,
    sights_used: usize,
}

impl Estimate {
    /// Before any sight.
    #[must_use]
    pub fn from_prior(prior: &Prior) -> Self {
        Self::new(prior.mean(), *prior.covariance())
    }

    /// Of these errors with that covariance (square radians), from no sight of one's own.
    #[must_use]
    pub const fn new(errors: MountErrors, covariance: Covariance) -> Self {
        Self {
            errors,
            covariance,
            sights_used: 0,
        }
    }

    /// The likeliest errors.
    #[must_use]
    pub const fn errors(&self) -> MountErrors {
        self.errors
    }

    /// Their covariance in the order of [`MountErrors::to_array`].
    #[must_use]
    pub const fn covariance(&self) -> &Covariance {
        &self.covariance
    }

    /// How many sights it rests on.
    #[must_use]
    pub const fn sights_used(&self) -> usize {
        self.sights_used
    }

    /// True once it is known where the circles' zeros are: from a sight, or from an earlier night.
    #[must_use]
    pub fn is_calibrated(&self) -> bool {
        self.sights_used > 0 || (self.knows_hour_zero() && self.knows_dec_zero())
    }

    /// True if the zero of the hour circle is known.
    #[must_use]
    pub fn knows_hour_zero(&self) -> bool {
        self.covariance[(0, 0)].sqrt() < KNOWN_INDEX.radians()
    }

    /// True if the zero of the declination circle is known.
    #[must_use]
    pub fn knows_dec_zero(&self) -> bool {
        self.covariance[(1, 1)].sqrt() < KNOWN_INDEX.radians()
    }

    /// What the axes must show to look at an observed place (refraction included), and how sure that is. The circles are
    /// read at one mark or vernier each.
    pub fn predict(
        &self,
        hour_angle: HourAngle,
        declination: Declination,
        latitude: Latitude,
        side: Side,
    ) -> Result<Prediction, TooNearPole> {
        self.predict_read(
            latitude,
            Place {
                hour_angle,
                declination,
                side,
                opposite: OppositeVerniers::default(),
            },
        )
    }

    /// What the circles must have shown at a sight, read as they were, and how sure that is.
    pub fn predict_sight(
        &self,
        latitude: Latitude,
        sight: &Sight,
    ) -> Result<Prediction, TooNearPole> {
        self.predict_read(latitude, sight.place())
    }

    fn predict_read(&self, latitude: Latitude, place: Place) -> Result<Prediction, TooNearPole> {
        let (axes, slopes) = place.foretold(latitude, &self.errors)?;
        let covariance = slopes.by_errors * self.covariance * slopes.by_errors.transpose();
        let place_by_axes = slopes.by_place.try_inverse().ok_or(TooNearPole)?;
        let sky = place_by_axes * covariance * place_by_axes.transpose();
        if covariance
            .iter()
            .chain(&sky)
            .all(|element| element.is_finite())
        {
            Ok(Prediction {
                axes,
                covariance,
                sky,
                place_by_axes,
            })
        } else {
            Err(TooNearPole)
        }
    }
}

impl From<&Fit> for Estimate {
    fn from(fit: &Fit) -> Self {
        Self {
            errors: fit.errors,
            covariance: fit.covariance,
            sights_used: fit.sights_used(),
        }
    }
}

/// What the axes must show for a place, and how sure that is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Prediction {
    /// The axis angles to be shown.
    pub axes: Axes,
    /// Covariance of the hour and declination axis angles to be shown, from the estimate alone.
    pub covariance: Matrix2<f64>,
    /// Covariance of where the tube then looks on the sky, from the estimate alone.
    pub sky: Matrix2<f64>,
    /// How the place looked at moves with the axes.
    place_by_axes: Matrix2<f64>,
}

impl Prediction {
    /// How sure the hour axis angle is, 1 sigma.
    #[must_use]
    pub fn hour_sigma(&self) -> Angle {
        Angle::from_radians(self.covariance.m11.max(0.0).sqrt())
    }

    /// How sure the declination axis angle is, 1 sigma.
    #[must_use]
    pub fn dec_sigma(&self) -> Angle {
        Angle::from_radians(self.covariance.m22.max(0.0).sqrt())
    }

    /// Covariance of where the tube looks on the sky, with the errors of setting the two circles (1 sigma, on the
    /// axes).
    #[must_use]
    pub fn sky_with_setting(&self, sigma_hour: Angle, sigma_dec: Angle) -> Matrix2<f64> {
        let (hour, dec) = (sigma_hour.radians(), sigma_dec.radians());
        let setting = Matrix2::new(hour * hour, 0.0, 0.0, dec * dec);
        self.sky + self.place_by_axes * setting * self.place_by_axes.transpose()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::AxisAngle;
    use crate::estimate::fit;
    use crate::metal::ExpectedErrors;

    const LATITUDE_DEG: f64 = 52.0;

    fn one_star() -> Estimate {
        let star = Sight {
            hour_angle: HourAngle::from_degrees(-30.0),
            declination: Declination::from_degrees(20.0),
            side: Side::TubeWest,
            hour: vec![AxisAngle::from_degrees(-12.0)],
            dec: vec![AxisAngle::from_degrees(25.0)],
            sigma_hour: Angle::from_arcminutes(3.0),
            sigma_dec: Angle::from_arcminutes(3.0),
            opposite: OppositeVerniers::default(),
        };
        let prior = Prior::from_expected(&ExpectedErrors::default());
        Estimate::from(&fit(Latitude::from_degrees(LATITUDE_DEG), &prior, &[star]))
    }

    fn predicted(estimate: &Estimate, hour_angle: f64, declination: f64, side: Side) -> Prediction {
        let (h, d) = (
            HourAngle::from_degrees(hour_angle),
            Declination::from_degrees(declination),
        );
        estimate
            .predict(h, d, Latitude::from_degrees(LATITUDE_DEG), side)
            .unwrap()
    }

    #[test]
    fn after_one_star_it_is_less_sure_the_farther_from_that_star() {
        let estimate = one_star();
        let spread = |hour_angle: f64, declination: f64| {
            predicted(&estimate, hour_angle, declination, Side::TubeWest)
                .sky
                .trace()
                .sqrt()
        };
        let at_star = Angle::from_radians(spread(-30.0, 20.0)).arcminutes();
        // the reading's own 3' on each circle, on the sky shortened by the declination
        assert!(
            (at_star - 3.0_f64.hypot(3.0 * 20.0_f64.to_radians().cos())).abs() < 0.05,
            "{at_star}"
        );
        for (dh, dd) in [(1.0, 0.0), (-1.0, 0.0), (0.0, 1.0), (0.0, -1.0), (0.7, 0.7)] {
            let mut last = 0.0;
            for far in [0.0, 5.0, 15.0, 30.0, 45.0] {
                let here = spread(-30.0 + far * dh, 20.0 + far * dd);
                assert!(here > last, "{far} toward {dh}, {dd}");
                last = here;
            }
        }
    }

    #[test]
    fn before_any_star_it_is_unsure_by_the_free_index() {
        let estimate = Estimate::from_prior(&Prior::from_expected(&ExpectedErrors::default()));
        assert!(!estimate.is_calibrated());
        let prediction = predicted(&estimate, 10.0, 0.0, Side::Single);
        assert!((prediction.hour_sigma().degrees() - 60.0).abs() < 0.1);
        assert!((prediction.dec_sigma().degrees() - 60.0).abs() < 0.1);
        assert!(one_star().is_calibrated());
    }

    #[test]
    fn an_error_of_setting_the_hour_circle_shrinks_on_the_sky_toward_the_pole() {
        let estimate = one_star();
        for side in [Side::TubeWest, Side::TubeEast] {
            let prediction = predicted(&estimate, -30.0, 60.0, side);
            let added = prediction
                .sky_with_setting(Angle::from_arcminutes(10.0), Angle::from_arcminutes(4.0))
                - prediction.sky;
            let west = Angle::from_radians(added.m11.sqrt()).arcminutes();
            let north = Angle::from_radians(added.m22.sqrt()).arcminutes();
            // the mount's errors turn and stretch these by a percent or two
            assert!((west - 5.0).abs() < 0.2, "{west}");
            assert!((north - 4.0).abs() < 0.2, "{north}");
        }
    }
}
