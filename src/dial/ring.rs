//! What to turn a ring to that is set by hand: with the star in the middle, to what it would show on a mount whose index
//! is true. All else that is known of the mount is allowed for.

use crate::angle::{Angle, AxisAngle};
use crate::dial::setup::Setup;
use crate::estimate::Estimate;
use crate::metal::{Mount, MountErrors, Ring, Side, TooNearPole};
use crate::sky::{Moment, Source};

/// What to turn the rings to, as engraved; nothing for a circle that is fixed.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct RingSetting {
    /// The hour circle.
    pub hour: Option<String>,
    /// The declination circle.
    pub dec: Option<String>,
}

impl RingSetting {
    /// What to turn the rings of a mount to on a star at a moment.
    pub fn on(
        setup: &Setup<'_>,
        moment: &Moment,
        star: &Source,
        side: Side,
    ) -> Result<Self, TooNearPole> {
        let Mount {
            hour_circle,
            declination_circle,
            ..
        } = setup.mount;
        let place = moment.observed(&moment.apparent(star));
        let true_index = MountErrors {
            hour_index: Angle::ZERO,
            dec_index: Angle::ZERO,
            ..setup.estimate.errors()
        };
        let latitude = moment.observer().latitude;
        let axes = Estimate::new(true_index, *setup.estimate.covariance())
            .predict(place.hour_angle, place.declination, latitude, side)?
            .axes;
        // so that the ring shows the star's own hour angle or right ascension on this side too, as an observer expects
        let turned = if side == Side::TubeEast && !hour_circle.second_fiducial {
            Angle::HALF_TURN
        } else {
            Angle::ZERO
        };
        let hour = || {
            let sidereal = moment.apparent_sidereal();
            let shown = AxisAngle::new(axes.hour.angle() + turned);
            let reading = hour_circle.reading(shown, sidereal, side);
            hour_circle.scale().text(reading)
        };
        let dec = || {
            let reading = declination_circle.reading(axes.dec);
            declination_circle.scale().text(reading)
        };
        Ok(Self {
            hour: (hour_circle.ring != Ring::Fixed).then(hour),
            dec: declination_circle.slips.then(dec),
        })
    }

    /// In words; nothing where no ring is set by hand.
    #[must_use]
    pub fn in_words(&self) -> Option<String> {
        match (&self.hour, &self.dec) {
            (Some(hour), Some(dec)) => Some(format!("the rings to {hour} and {dec}")),
            (Some(hour), None) => Some(format!("the hour ring to {hour}")),
            (None, Some(dec)) => Some(format!("the declination ring to {dec}")),
            (None, None) => None,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::dial::dial;
    use crate::dial::trial::{Trial, moment, target};
    use crate::metal::{Increases, SideRequest};

    #[test]
    fn a_driven_ring_numbered_eastward_is_set_to_the_right_ascension() {
        let mut trial = Trial::new();
        trial.mount.hour_circle.ring = Ring::Driven;
        trial.mount.hour_circle.increases = Increases::East;
        trial.mount.declination_circle.slips = true;
        // the index there is now says nothing of what to turn the ring to
        let errors = MountErrors {
            hour_index: Angle::from_degrees(77.0),
            dec_index: Angle::from_degrees(-12.0),
            ..MountErrors::default()
        };
        trial.estimate = Estimate::new(errors, *trial.estimate.covariance());
        let (now, vega) = (moment("2026-12-01T18:30:00Z"), target("Vega"));
        let side = Side::TubeEast;
        let told = RingSetting::on(&trial.setup(), &now, &vega.source, side).unwrap();
        // of date, 18h 37m 51s and 38° 48'; the circles are set to 20 s and 5'
        assert_eq!(told.hour.as_deref(), Some("18h 38m 00s"));
        assert_eq!(told.dec.as_deref(), Some("+38° 50'"));
        // once it is set so, that is what it is dialled at
        let set = MountErrors {
            hour_index: Angle::HALF_TURN,
            ..MountErrors::default()
        };
        trial.estimate = Estimate::new(set, *trial.estimate.covariance());
        let setup = crate::dial::Setup {
            side: SideRequest::Only(side),
            ..trial.setup()
        };
        let dialled = dial(&setup, &now, &vega).unwrap();
        assert_eq!(Some(dialled.hour.text), told.hour);
        assert_eq!(Some(dialled.dec.text), told.dec);
    }

    #[test]
    fn nothing_is_told_of_circles_that_are_fixed() {
        let trial = Trial::new();
        let (now, vega) = (moment("2026-12-01T18:30:00Z"), target("Vega"));
        let told = RingSetting::on(&trial.setup(), &now, &vega.source, Side::TubeEast).unwrap();
        assert_eq!(told.in_words(), None);
    }
}
