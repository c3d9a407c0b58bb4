//! A look aside of the target: a step of a sweep, and what it tells when the target is found there.

use crate::angle::{Angle, Declination, HourAngle};
use crate::dial::setting::Dial;
use crate::estimate::{Sight, SweepStep, sweep};
use crate::metal::{Mount, OppositeVerniers};
use crate::sky::{Moment, Observed, Source};

/// An object found in a sweep is somewhere in the field: of its diameter so much, 1 sigma in each direction (uniform over
/// the disc: half the radius).
const OF_FIELD: f64 = 0.25;

/// How far aside of the target to look, on the sky.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Aside {
    /// Positive west.
    pub west: Angle,
    /// Positive north.
    pub north: Angle,
}

impl Aside {
    /// The place so far aside of a place.
    #[must_use]
    pub fn of(&self, moment: &Moment, place: &Observed) -> Observed {
        if *self == Self::default() {
            return *place;
        }
        let shrunk = place.declination.angle().cos().max(f64::EPSILON);
        moment.observed_at(
            HourAngle::new(place.hour_angle.angle() + self.west / shrunk),
            Declination::new(place.declination.angle() + self.north),
        )
    }
}

impl From<&SweepStep> for Aside {
    fn from(step: &SweepStep) -> Self {
        Self {
            west: step.west,
            north: step.north,
        }
    }
}

/// The sweep for a target that was dialled and is not in the field of the eyepiece.
#[must_use]
pub fn sweep_for(mount: &Mount, dial: &Dial) -> Vec<SweepStep> {
    sweep(&dial.sky, mount.field_looked_into())
}

/// What it tells that the target was found with the circles set as dialled, aside of it or not, without their being read:
/// they show what was set, as well as it was set, and the target is somewhere in the field.
#[must_use]
pub fn found_there(mount: &Mount, moment: &Moment, source: &Source, dial: &Dial) -> Sight {
    let place = moment.observed(&moment.apparent(source));
    let in_field = mount.field_looked_into() * OF_FIELD;
    let shrunk = place.declination.angle().cos().max(f64::EPSILON);
    let both =
        |look: Angle, field: Angle| Angle::from_radians(look.radians().hypot(field.radians()));
    Sight {
        hour_angle: place.hour_angle,
        declination: place.declination,
        side: dial.side,
        hour: vec![dial.axes.hour],
        dec: vec![dial.axes.dec],
        sigma_hour: both(mount.hour_circle.look_error(), in_field / shrunk),
        sigma_dec: both(mount.declination_circle.look_error(), in_field),
        opposite: OppositeVerniers::default(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::dial::trial::{Trial, moment, target};
    use crate::dial::{Setup, dial};
    use crate::estimate::{Estimate, Prior, fit};
    use crate::metal::to_sky;
    use crate::sky::separation;

    const ASIDE: Aside = Aside {
        west: Angle::from_degrees(1.5),
        north: Angle::from_degrees(-0.5),
    };

    #[test]
    fn the_circles_are_set_aside_of_the_target_by_as_much_as_the_step_says() {
        let trial = Trial::new();
        let now = moment("2026-12-01T21:30:00Z");
        let setup = Setup {
            aside: ASIDE,
            ..trial.setup()
        };
        let aside = dial(&setup, &now, &target("M 37")).unwrap();
        let straight = dial(&trial.setup(), &now, &target("M 37")).unwrap();
        let latitude = now.observer().latitude;
        let errors = trial.estimate.errors();
        let (a, b) = (
            to_sky(aside.axes, latitude, &errors),
            to_sky(straight.axes, latitude, &errors),
        );
        let apart = separation((a.0.angle(), a.1), (b.0.angle(), b.1));
        // on a sphere the two legs do not quite make a right angle
        assert!(
            (apart.degrees() - 1.5_f64.hypot(0.5)).abs() < 0.02,
            "{apart:?}"
        );
        let north = a.1.degrees() - b.1.degrees();
        assert!((north + 0.5).abs() < 1e-6, "{north}");
        // the target is still where it was
        assert_eq!(aside.of_date, straight.of_date);
    }

    #[test]
    fn what_is_found_in_a_sweep_brings_the_circles_there() {
        let mut trial = Trial::new();
        let now = moment("2026-12-01T21:30:00Z");
        let m37 = target("M 37");
        let setup = Setup {
            aside: ASIDE,
            ..trial.setup()
        };
        let aside = dial(&setup, &now, &m37).unwrap();
        let sight = found_there(&trial.mount, &now, &m37.source, &aside);
        let prior = Prior::from_expected(&trial.mount.expected);
        trial.estimate = Estimate::from(&fit(now.observer().latitude, &prior, &[sight]));
        let again = dial(&trial.setup(), &now, &m37).unwrap();
        let off = (again.axes.hour.angle() - aside.axes.hour.angle()).wrapped_signed();
        // the free index is still believed to be small, by 60 degrees
        assert!(off.abs().arcminutes() < 1.0, "{off:?}");
        let known = again.uncertainty.dec.degrees();
        assert!((known - 0.25).abs() < 0.02, "{known}");
    }
}
