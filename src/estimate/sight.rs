//! A star in the middle of the field with both circles read.

use crate::angle::{Angle, AxisAngle, Declination, HourAngle, Latitude};
use crate::metal::{
    Axes, MountErrors, OppositeVerniers, Side, Slopes, TooNearPole, to_axes_with_slopes,
};

/// A star centred, and what the circles showed.
///
/// A reading as engraved may stand for several axis angles: an hour circle numbered 0-12-0 does not say east or west, a
/// quartered declination circle neither north or south nor which half. Each circle therefore gives all the shown axis
/// angles it can mean, in any order, at least one; the fit finds which were meant.
#[derive(Clone, Debug, PartialEq)]
pub struct Sight {
    /// Hour angle of the star's observed place (refraction included) at the moment of reading.
    pub hour_angle: HourAngle,
    /// Declination of the observed place.
    pub declination: Declination,
    /// Where the tube was.
    pub side: Side,
    /// What the hour circle can mean.
    pub hour: Vec<AxisAngle>,
    /// What the declination circle can mean.
    pub dec: Vec<AxisAngle>,
    /// Error of the hour reading, 1 sigma, on the axis.
    pub sigma_hour: Angle,
    /// Error of the declination reading, 1 sigma, on the axis.
    pub sigma_dec: Angle,
    /// Which circles were read at two opposite verniers: such a reading is the mean of both, free of eccentricity.
    pub opposite: OppositeVerniers,
}

/// Where a star stood, and how the circles were read on it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Place {
    pub hour_angle: HourAngle,
    pub declination: Declination,
    pub side: Side,
    pub opposite: OppositeVerniers,
}

impl Sight {
    pub(super) const fn place(&self) -> Place {
        Place {
            hour_angle: self.hour_angle,
            declination: self.declination,
            side: self.side,
            opposite: self.opposite,
        }
    }
}

impl Place {
    /// What the circles, read so, show on a mount of such errors, with the slopes there.
    pub(super) fn foretold(
        &self,
        latitude: Latitude,
        errors: &MountErrors,
    ) -> Result<(Axes, Slopes), TooNearPole> {
        let (axes, mut slopes) = to_axes_with_slopes(
            self.hour_angle,
            self.declination,
            latitude,
            &self.opposite.errors_seen(errors),
            self.side,
        )?;
        slopes.by_errors = self.opposite.slopes_seen(slopes.by_errors);
        Ok((axes, slopes))
    }
}

/// What the estimate leaves unexplained of one sight.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Residual {
    /// The shown axis angles the readings were taken to mean.
    pub shown: Axes,
    /// Hour axis angle shown less that predicted, in (-180°, 180°].
    pub hour: Angle,
    /// Declination axis angle shown less that predicted, in (-180°, 180°].
    pub dec: Angle,
    /// How far the hour reading was trusted, 0 to 1.
    pub hour_weight: f64,
    /// How far the declination reading was trusted, 0 to 1.
    pub dec_weight: f64,
}

impl Residual {
    /// How far the sight as a whole was trusted, 0 to 1: as far as its less trusted circle.
    #[must_use]
    pub const fn weight(&self) -> f64 {
        self.hour_weight.min(self.dec_weight)
    }
}

/// The candidate nearest to a predicted axis angle, the shorter way round; none among none.
#[must_use]
pub fn nearest(candidates: &[AxisAngle], predicted: AxisAngle) -> Option<AxisAngle> {
    candidates
        .iter()
        .copied()
        .min_by(|&a, &b| off(a, predicted).abs().total_cmp(&off(b, predicted).abs()))
}

/// Shown less predicted, in radians, the shorter way round.
pub(super) fn off(shown: AxisAngle, predicted: AxisAngle) -> f64 {
    (shown.angle() - predicted.angle())
        .wrapped_signed()
        .radians()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_nearest_is_found_across_the_half_turn() {
        let candidates = [-170.0, 10.0].map(AxisAngle::from_degrees);
        assert_eq!(
            nearest(&candidates, AxisAngle::from_degrees(175.0)),
            Some(AxisAngle::from_degrees(-170.0))
        );
        assert_eq!(nearest(&[], AxisAngle::default()), None);
    }
}
