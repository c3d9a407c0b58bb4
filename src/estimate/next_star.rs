//! Which star to read next: the one whose reading would leave the least uncertainty over the places still to be dialled.
//!
//! The readings of a star change the covariance of the errors by a known amount, whatever they turn out to be. So for each
//! star the mean variance on the sky over the places wanted is worked out as it would be after reading it (I-optimal
//! design: A. C. Atkinson, A. N. Donev, *Optimum Experimental Designs*, 1992, ch. 10; the reference is from memory).

use nalgebra::{Matrix2, SMatrix};

use crate::angle::{Angle, Declination, HourAngle, Latitude};
use crate::estimate::chance::chance;
use crate::estimate::prediction::Estimate;
use crate::estimate::prior::Covariance;
use crate::metal::errors::COUNT;
use crate::metal::{Side, to_axes_with_slopes};

/// How errors move the two axis angles, or the place looked at.
type Rows = SMatrix<f64, 2, COUNT>;

/// A place where a star could be read, or an object is to be dialled.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Station {
    /// Hour angle of the observed place.
    pub hour_angle: HourAngle,
    /// Declination of the observed place.
    pub declination: Declination,
    /// The side of the pier.
    pub side: Side,
    /// Error of reading the hour circle there, or of setting it, 1 sigma, on the axis.
    pub sigma_hour: Angle,
    /// The same of the declination circle.
    pub sigma_dec: Angle,
}

/// What is wanted: places to be dialled, and what is known of the mount.
#[derive(Clone, Debug)]
pub struct Wanted {
    covariance: Covariance,
    /// Of each place: how errors move the place looked at, and what the setting adds to its covariance on the sky.
    places: Vec<(Rows, Matrix2<f64>)>,
    /// The mean of the squares of those movements.
    moments: Covariance,
    /// The mean variance that the setting adds.
    by_setting: f64,
}

/// A star that could be read.
#[derive(Clone, Copy, Debug)]
pub struct Offered {
    rows: Rows,
    reading: Matrix2<f64>,
}

impl Offered {
    /// A star at a place; nothing if it cannot be reached.
    #[must_use]
    pub fn new(estimate: &Estimate, latitude: Latitude, star: &Station) -> Option<Self> {
        let errors = estimate.errors();
        let slopes = to_axes_with_slopes(
            star.hour_angle,
            star.declination,
            latitude,
            &errors,
            star.side,
        )
        .ok()?
        .1;
        Some(Self {
            rows: slopes.by_errors,
            reading: squares(star.sigma_hour, star.sigma_dec),
        })
    }

    /// The covariance of the errors once this star has been read.
    #[must_use]
    pub fn after_reading(&self, covariance: &Covariance) -> Covariance {
        let seen = covariance * self.rows.transpose();
        let foretold = self.rows * seen + self.reading;
        foretold.try_inverse().map_or(*covariance, |inverse| {
            let after = covariance - seen * inverse * seen.transpose();
            (after + after.transpose()) * 0.5
        })
    }
}

impl Wanted {
    /// The places wanted; those out of reach are left out. Each weighs the same.
    #[must_use]
    pub fn new(estimate: &Estimate, latitude: Latitude, places: &[Station]) -> Self {
        let errors = estimate.errors();
        let movement = |place: &Station| {
            let (_, slopes) = to_axes_with_slopes(
                place.hour_angle,
                place.declination,
                latitude,
                &errors,
                place.side,
            )
            .ok()?;
            let by_axes = slopes.by_place.try_inverse()?;
            let setting =
                by_axes * squares(place.sigma_hour, place.sigma_dec) * by_axes.transpose();
            Some((by_axes * slopes.by_errors, setting))
        };
        let places: Vec<(Rows, Matrix2<f64>)> = places.iter().filter_map(movement).collect();
        let count = places.len().max(1) as f64;
        let mut moments = Covariance::zeros();
        let mut by_setting = 0.0;
        for (rows, setting) in &places {
            moments += rows.transpose() * rows / count;
            by_setting += setting.trace() / count;
        }
        Self {
            covariance: *estimate.covariance(),
            places,
            moments,
            by_setting,
        }
    }

    /// True if nothing is wanted that can be reached.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.places.is_empty()
    }

    /// What is known of the mount now.
    #[must_use]
    pub const fn covariance(&self) -> &Covariance {
        &self.covariance
    }

    /// The mean variance on the sky, both directions together, in square radians, were the errors known like that.
    #[must_use]
    pub fn mean_variance(&self, covariance: &Covariance) -> f64 {
        (self.moments * covariance).trace() + self.by_setting
    }

    /// The mean chance that a place is in a field of that diameter at the first look, were the errors known like that;
    /// nothing if nothing is wanted.
    #[must_use]
    pub fn first_look(&self, covariance: &Covariance, field: Angle) -> f64 {
        let of_each = self.places.iter().map(|(rows, setting)| {
            chance(&(rows * covariance * rows.transpose() + setting), field)
        });
        of_each.sum::<f64>() / self.places.len().max(1) as f64
    }

    /// The stars by their places in the order given, the most helpful first, with the mean variance each would leave.
    #[must_use]
    pub fn ranked(&self, stars: &[Offered]) -> Vec<(usize, f64)> {
        let mut ranked: Vec<(usize, f64)> = stars
            .iter()
            .map(|star| self.mean_variance(&star.after_reading(&self.covariance)))
            .enumerate()
            .collect();
        ranked.sort_by(|(_, a), (_, b)| a.total_cmp(b));
        ranked
    }
}

fn squares(sigma_hour: Angle, sigma_dec: Angle) -> Matrix2<f64> {
    let (hour, dec) = (sigma_hour.radians(), sigma_dec.radians());
    Matrix2::new(hour * hour, 0.0, 0.0, dec * dec)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::AxisAngle;
    use crate::estimate::{Prior, Sight, fit};
    use crate::metal::{ExpectedErrors, OppositeVerniers};

    const LATITUDE_DEG: f64 = 52.0;

    fn at(hour_angle: f64, declination: f64) -> Station {
        Station {
            hour_angle: HourAngle::from_degrees(hour_angle),
            declination: Declination::from_degrees(declination),
            side: if hour_angle < 0.0 {
                Side::TubeWest
            } else {
                Side::TubeEast
            },
            sigma_hour: Angle::from_degrees(0.25),
            sigma_dec: Angle::from_degrees(0.15),
        }
    }

    fn sight(place: &Station) -> Sight {
        let axes = crate::metal::to_axes(
            place.hour_angle,
            place.declination,
            Latitude::from_degrees(LATITUDE_DEG),
            &crate::metal::MountErrors::default(),
            place.side,
        )
        .unwrap();
        Sight {
            hour_angle: place.hour_angle,
            declination: place.declination,
            side: place.side,
            hour: vec![AxisAngle::new(axes.hour.angle())],
            dec: vec![AxisAngle::new(axes.dec.angle())],
            sigma_hour: place.sigma_hour,
            sigma_dec: place.sigma_dec,
            opposite: OppositeVerniers::default(),
        }
    }

    fn known(sights: &[Station]) -> Estimate {
        let prior = Prior::from_expected(&ExpectedErrors::default());
        let sights: Vec<Sight> = sights.iter().map(sight).collect();
        Estimate::from(&fit(Latitude::from_degrees(LATITUDE_DEG), &prior, &sights))
    }

    #[test]
    fn what_is_foretold_of_a_reading_is_what_the_fit_makes_of_it() {
        let latitude = Latitude::from_degrees(LATITUDE_DEG);
        let (read, next) = (at(-30.0, 20.0), at(35.0, 5.0));
        let before = known(&[read]);
        let offered = Offered::new(&before, latitude, &next).unwrap();
        let foretold = offered.after_reading(before.covariance());
        let after = known(&[read, next]);
        let off = (foretold - after.covariance()).abs().max();
        // the fit's slopes are taken at the errors it finds, here none at all
        assert!(off < 1e-4 * after.covariance().abs().max(), "{off}");
    }

    #[test]
    fn what_is_foretold_of_a_place_is_what_the_estimate_says_of_it() {
        let latitude = Latitude::from_degrees(LATITUDE_DEG);
        let estimate = known(&[at(-30.0, 20.0)]);
        let place = at(10.0, 40.0);
        let wanted = Wanted::new(&estimate, latitude, &[place]);
        let predicted = estimate
            .predict(place.hour_angle, place.declination, latitude, place.side)
            .unwrap()
            .sky_with_setting(place.sigma_hour, place.sigma_dec);
        let variance = wanted.mean_variance(wanted.covariance());
        assert!((variance / predicted.trace() - 1.0).abs() < 1e-9);
        let field = Angle::from_degrees(1.0);
        let first_look = wanted.first_look(wanted.covariance(), field);
        assert!((first_look - chance(&predicted, field)).abs() < 1e-9);
    }

    #[test]
    fn the_other_side_of_the_sky_helps_more_than_the_star_next_door() {
        let latitude = Latitude::from_degrees(LATITUDE_DEG);
        let estimate = known(&[at(-30.0, 20.0)]);
        let places: Vec<Station> = [(-50.0, 0.0), (-10.0, 60.0), (20.0, 30.0), (55.0, 10.0)]
            .map(|(h, d)| at(h, d))
            .to_vec();
        let wanted = Wanted::new(&estimate, latitude, &places);
        let stars = [at(-32.0, 22.0), at(40.0, 25.0)];
        let offered: Vec<Offered> = stars
            .iter()
            .map(|star| Offered::new(&estimate, latitude, star).unwrap())
            .collect();
        let ranked = wanted.ranked(&offered);
        assert_eq!(ranked[0].0, 1);
        assert!(ranked[0].1 < wanted.mean_variance(wanted.covariance()));
    }
}
