//! From apparent place to observed place and back, at one moment: the air between.

use crate::angle::{Altitude, Angle, Declination, HourAngle, Latitude, RightAscension};
use crate::sky::body::Body;
use crate::sky::moment::Moment;
use crate::sky::place::{Apparent, Observed};
use crate::sky::refraction;
use crate::sky::vector::{equatorial, horizontal};

/// The place an apparent one is lifted to, by as much as is said for its airless altitude.
pub(super) fn lifted(
    apparent: &Apparent,
    latitude: Latitude,
    lift: impl FnOnce(Altitude) -> Angle,
) -> Observed {
    let (azimuth, airless) = horizontal(apparent.hour_angle, apparent.declination, latitude);
    let refraction = lift(airless);
    let altitude = Altitude::new(airless.angle() + refraction);
    let (hour_angle, declination) = equatorial(azimuth, altitude, latitude);
    Observed {
        hour_angle,
        declination,
        azimuth,
        altitude,
        refraction,
    }
}

impl Moment {
    /// The observed place: the apparent one lifted by refraction.
    #[must_use]
    pub fn observed(&self, apparent: &Apparent) -> Observed {
        lifted(apparent, self.observer().latitude, |airless| {
            refraction::at_true(airless, self.observer().air)
        })
    }

    /// The observed place at an hour angle and declination the tube points to.
    #[must_use]
    pub fn observed_at(&self, hour_angle: HourAngle, declination: Declination) -> Observed {
        let (azimuth, altitude) = horizontal(hour_angle, declination, self.observer().latitude);
        Observed {
            hour_angle,
            declination,
            azimuth,
            altitude,
            refraction: refraction::at_observed(altitude, self.observer().air),
        }
    }

    /// The apparent place of what is seen at an observed place: the inverse of [`Self::observed`].
    #[must_use]
    pub fn airless(&self, observed: &Observed) -> Apparent {
        let airless = Altitude::new(observed.altitude.angle() - observed.refraction);
        let (hour_angle, declination) =
            equatorial(observed.azimuth, airless, self.observer().latitude);
        Apparent {
            hour_angle,
            right_ascension: RightAscension::new(
                self.apparent_sidereal().angle() - hour_angle.angle(),
            ),
            declination,
        }
    }

    /// Altitude of an apparent place, without air.
    #[must_use]
    pub fn airless_altitude(&self, apparent: &Apparent) -> Altitude {
        horizontal(
            apparent.hour_angle,
            apparent.declination,
            self.observer().latitude,
        )
        .1
    }

    /// The Sun's observed place.
    #[must_use]
    pub fn sun(&self) -> Observed {
        self.observed(&self.apparent_body(Body::Sun))
    }

    /// The Moon's observed place.
    #[must_use]
    pub fn moon(&self) -> Observed {
        self.observed(&self.apparent_body(Body::Moon))
    }

    /// True while the Sun's upper limb is above the level horizon: its centre, without air, higher
    /// than its semidiameter and the 34' of horizontal refraction below it (the almanacs' sunrise).
    /// That refraction is allowed for in any air, also where refraction is switched off.
    #[must_use]
    pub fn sun_is_up(&self) -> bool {
        const HORIZONTAL_REFRACTION: Angle = Angle::from_arcminutes(34.0);
        let semidiameter = Body::Sun
            .semidiameter(self.distance_au(Body::Sun))
            .unwrap_or(Angle::ZERO);
        let centre = self.airless_altitude(&self.apparent_body(Body::Sun));
        (centre.angle() + semidiameter + HORIZONTAL_REFRACTION).radians() > 0.0
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::sky::samples::{any_direction, any_moment};

    /// A thousandth of a second of arc: far below a mount, above the rounding of four turns.
    const ROUND_TRIP_ARCSEC: f64 = 0.001;

    proptest! {
        #[test]
        fn what_is_seen_through_the_air_is_found_again_without_it(
            moment in any_moment(), (ra, dec) in any_direction(),
        ) {
            let apparent = moment.at_right_ascension(ra, dec);
            let observed = moment.observed(&apparent);
            let back = moment.airless(&observed);
            prop_assert!(back.separation(&apparent).arcseconds() < ROUND_TRIP_ARCSEC);
            // from the tube's direction alone, too
            let seen = moment.observed_at(observed.hour_angle, observed.declination);
            let again = moment.airless(&seen);
            prop_assert!(again.separation(&apparent).arcseconds() < ROUND_TRIP_ARCSEC);
        }

        #[test]
        fn refraction_moves_a_place_straight_up_by_what_it_says(
            moment in any_moment(), (ra, dec) in any_direction(),
        ) {
            let apparent = moment.at_right_ascension(ra, dec);
            let observed = moment.observed(&apparent);
            let moved = crate::sky::separation(
                (apparent.hour_angle.angle(), apparent.declination),
                (observed.hour_angle.angle(), observed.declination),
            );
            prop_assert!((moved - observed.refraction).abs().arcseconds() < ROUND_TRIP_ARCSEC);
            let lifted = observed.altitude.angle() - moment.airless_altitude(&apparent).angle();
            prop_assert!((lifted - observed.refraction).abs().arcseconds() < ROUND_TRIP_ARCSEC);
        }
    }

    #[test]
    fn the_hour_angle_of_what_is_low_in_the_east_is_drawn_toward_the_meridian() {
        let moment = crate::sky::samples::at("2026-12-01T21:30:00Z", 50.0, 1010.0);
        let rising = moment.airless(&moment.observed_at(
            HourAngle::from_degrees(-80.0),
            Declination::from_degrees(0.0),
        ));
        assert!(rising.hour_angle.degrees() < -80.0);
    }
}
