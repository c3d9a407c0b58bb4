//! The main job: from a target and an instant to what to set on each circle.
//!
//! [`dial`] is the one straight line: target → apparent place → observed place → axis angles with the
//! estimated errors → number under the index → text as engraved. Screen, text and JSON all print the
//! [`Dial`] it gives; nothing is worked out a second time.

use crate::angle::{Angle, AxisAngle};
use crate::catalog::Target;
use crate::estimate::{Prediction, chance};
use crate::metal::{Mount, Optic, Side, TubeDirections, to_axes};
use crate::sky::{Body, Moment, Observed, Source};

pub mod about;
pub mod aside;
pub mod bright;
pub mod caution;
pub mod doubt;
pub mod field;
pub mod json;
pub mod mark;
pub mod neighbour;
pub mod next_star;
mod outlook;
pub mod residual_plot;
pub mod ring;
pub mod setting;
pub mod setup;
pub mod sighting;
pub mod sun;
#[cfg(test)]
mod trial;
pub mod tube;
pub mod withheld;

pub use aside::Aside;
pub use caution::{Caution, CautionCode};
pub use doubt::{Circumstances, Correction, Earlier, Explanation, Questioned, Suspicion};
pub use field::{Field, SeenStar};
pub use mark::NextMark;
pub use residual_plot::{Plotted, ResidualPlot};
pub use setting::{Chance, DeclinationSetting, Dial, HourSetting, Uncertainty};
pub use setup::Setup;
pub use sighting::{Sighting, Understood};
pub use tube::{Swing, TubePlace};
pub use withheld::NotDialled;

/// A mark nearer than this is past before the hand is off the circle (common practice, no source).
const LEAST_WAIT: Angle = Angle::from_time_seconds(10.0);

/// What to set on each circle for a target at an instant.
pub fn dial(setup: &Setup<'_>, moment: &Moment, target: &Target) -> Result<Dial, NotDialled> {
    let of_date = moment.apparent(&target.source);
    let observed = setup.aside.of(moment, &moment.observed(&of_date));
    withhold_near_sun(setup, moment, &target.source, &observed)?;
    let (mount, latitude) = (setup.mount, moment.observer().latitude);
    let present = setup.tube.map(|tube| tube.side);
    let side = mount.choose_side(setup.side, observed.hour_angle, present)?;
    let prediction =
        setup
            .estimate
            .predict(observed.hour_angle, observed.declination, latitude, side)?;
    let axes = prediction.axes;
    let tube_now = setup
        .tube
        .map(|tube| tube.axes_at(moment.utc(), mount.clock_drive));
    let errors = setup.estimate.errors();
    let directions = TubeDirections::new(
        observed.hour_angle,
        observed.declination,
        axes,
        latitude,
        &errors,
    );
    let way = outlook::Way {
        from: tube_now,
        to: axes,
    };
    Ok(Dial {
        target: target.name.clone(),
        side,
        of_date,
        observed,
        axes,
        hour: hour_setting(setup, moment, &target.source, axes.hour, side),
        dec: dec_setting(mount, axes.dec),
        uncertainty: Uncertainty {
            hour: prediction.hour_sigma(),
            dec: prediction.dec_sigma(),
        },
        sky: prediction.sky_with_setting(
            mount.hour_circle.look_error(),
            mount.declination_circle.look_error(),
        ),
        chances: chances(mount, &prediction, mount.hour_circle.look_error()),
        chances_on_the_mark: if mount.hour_circle.stands_still() {
            chances(mount, &prediction, mount.hour_circle.timed_error())
        } else {
            Vec::new()
        },
        swing: tube_now.map(|from| Swing::between(from, axes)),
        slit: mount
            .dome
            .and_then(|dome| dome.slit(mount.tube.as_ref(), &directions)),
        eyepiece: mount.tube.map(|tube| tube.eyepiece(&directions)),
        cautions: outlook::cautions(setup, moment, &target.source, &observed, side, &way),
    })
}

fn withhold_near_sun(
    setup: &Setup<'_>,
    moment: &Moment,
    source: &Source,
    observed: &Observed,
) -> Result<(), NotDialled> {
    match sun::near_while_set(moment, source, observed, setup.lead_s) {
        Some(_) if setup.sun_risk_accepted => Ok(()),
        Some(_) if *source == Source::Body(Body::Sun) => Err(NotDialled::TheSun),
        Some(apart) => Err(NotDialled::SunNear { apart }),
        None => Ok(()),
    }
}

fn hour_setting(
    setup: &Setup<'_>,
    moment: &Moment,
    source: &Source,
    shown: AxisAngle,
    side: Side,
) -> HourSetting {
    let circle = &setup.mount.hour_circle;
    let reading = circle.reading(shown, moment.apparent_sidereal(), side);
    HourSetting {
        reading,
        text: circle.scale().text(reading),
        next_mark: next_mark(setup, moment, source, shown, side),
    }
}

fn dec_setting(mount: &Mount, shown: AxisAngle) -> DeclinationSetting {
    let circle = &mount.declination_circle;
    let reading = circle.reading(shown);
    DeclinationSetting {
        reading,
        text: circle.scale().text(reading),
    }
}

/// The chance for each optic, the setting of both circles included: that of the hour circle is `hour`,
/// 1 sigma.
fn chances(mount: &Mount, prediction: &Prediction, hour: Angle) -> Vec<Chance> {
    let dec = mount.declination_circle.look_error();
    let covariance = prediction.sky_with_setting(hour, dec);
    let of = |optic: &Optic| Chance {
        optic: optic.name.clone(),
        field: optic.field,
        probability: chance(&covariance, optic.field),
    };
    mount.optics.iter().map(of).collect()
}

/// The mark, and the moment at which the target itself, in the full model, stands where the circle
/// shows that mark.
fn next_mark(
    setup: &Setup<'_>,
    moment: &Moment,
    source: &Source,
    shown: AxisAngle,
    side: Side,
) -> Option<NextMark> {
    let mark = setup.mount.hour_circle.next_mark(shown, side, LEAST_WAIT)?;
    let (latitude, errors) = (moment.observer().latitude, setup.estimate.errors());
    let moved = |seconds: f64| {
        let then = moment.later(seconds);
        let place = then.observed(&then.apparent(source));
        let place = setup.aside.of(&then, &place);
        let axes = to_axes(place.hour_angle, place.declination, latitude, &errors, side).ok()?;
        Some((axes.hour.angle() - shown.angle()).wrapped_signed())
    };
    let wait_s = mark::moment_of(mark.ahead, moved)?;
    Some(NextMark {
        text: mark.text,
        utc: moment.utc().plus_seconds(wait_s),
        wait_s,
    })
}

#[cfg(test)]
mod tests {
    use super::trial::{Trial, moment, target};
    use super::*;
    use crate::metal::{Axes, SideRequest};
    use crate::time::Utc;

    /// The next mark is found to a thousandth of a second, 0.015" on the circle.
    const ON_THE_MARK_ARCSEC: f64 = 0.03;

    #[test]
    fn at_the_moment_of_the_next_mark_the_circle_stands_on_it() {
        let trial = Trial::new();
        let now = moment("2026-12-01T21:30:00Z");
        let mark = dial(&trial.setup(), &now, &target("M 37"))
            .unwrap()
            .hour
            .next_mark
            .unwrap();
        assert!(mark.wait_s >= LEAST_WAIT.time_seconds() * 0.99, "{mark:?}");
        let then = now.later(mark.wait_s);
        let reading = dial(&trial.setup(), &then, &target("M 37"))
            .unwrap()
            .hour
            .reading;
        let divisions = reading.value / trial.mount.hour_circle.division;
        let off = trial.mount.hour_circle.division * (divisions - divisions.round());
        assert!(off.abs().arcseconds() < ON_THE_MARK_ARCSEC, "{off:?}");
    }

    #[test]
    fn the_two_sides_show_the_same_place_half_a_turn_apart() {
        let trial = Trial::new();
        let now = moment("2026-12-01T21:30:00Z");
        let on = |side| {
            dial(
                &Setup {
                    side: SideRequest::Only(side),
                    ..trial.setup()
                },
                &now,
                &target("M 37"),
            )
            .unwrap()
        };
        let (west, east) = (on(Side::TubeWest), on(Side::TubeEast));
        let hours = (west.axes.hour.angle() - east.axes.hour.angle())
            .abs()
            .hours();
        assert!((hours - 12.0).abs() < 1e-9, "{hours}");
        assert!((west.axes.dec.degrees() + east.axes.dec.degrees() - 180.0).abs() < 1e-9);
        assert_eq!(west.dec.text, east.dec.text);
    }

    #[test]
    fn the_sun_and_what_is_near_it_are_withheld_while_it_is_up() {
        let trial = Trial::new();
        let noon = moment("2026-06-21T12:00:00Z");
        assert_eq!(
            dial(&trial.setup(), &noon, &target("Sun")),
            Err(NotDialled::TheSun)
        );
        // the Sun stands in Taurus's horns at midsummer; M 35 is a few degrees off
        let near = dial(&trial.setup(), &noon, &target("M 35")).unwrap_err();
        assert!(
            matches!(near, NotDialled::SunNear { apart } if apart < sun::NEAR_SUN),
            "{near}"
        );
        assert!(dial(&trial.setup(), &noon, &target("Vega")).is_ok());
        let midnight = moment("2026-06-21T00:00:00Z");
        assert!(dial(&trial.setup(), &midnight, &target("M 35")).is_ok());
    }

    #[test]
    fn a_setting_for_after_sunset_is_withheld_before_it() {
        let trial = Trial::new();
        // at 22:00 at midsummer the Sun has set; two hours and a half before it was up
        let night = moment("2026-06-21T22:00:00Z");
        let with_lead = |hours: f64| {
            let setup = Setup {
                lead_s: hours * 3600.0,
                ..trial.setup()
            };
            dial(&setup, &night, &target("M 35"))
        };
        assert!(with_lead(0.0).is_ok());
        assert!(with_lead(0.5).is_ok());
        for hours in [2.5, 23.0] {
            assert!(matches!(with_lead(hours), Err(NotDialled::SunNear { .. })));
        }
    }

    #[test]
    fn what_was_answered_for_carries_the_caution() {
        let trial = Trial::new();
        let noon = moment("2026-06-21T12:00:00Z");
        let setup = Setup {
            sun_risk_accepted: true,
            ..trial.setup()
        };
        let dialled = dial(&setup, &noon, &target("Sun")).unwrap();
        assert_eq!(dialled.cautions[0].code, CautionCode::NearSun);
    }

    #[test]
    fn a_swing_past_the_sun_is_cautioned() {
        let trial = Trial::new();
        let noon = moment("2026-06-21T12:00:00Z");
        // from well east of the Sun to well west of it, at its own declination
        let from = Axes {
            hour: AxisAngle::from_degrees(-60.0),
            dec: AxisAngle::from_degrees(23.4),
        };
        let to = Axes {
            hour: AxisAngle::from_degrees(60.0),
            ..from
        };
        let errors = trial.estimate.errors();
        assert!(sun::near_on_the_way(&noon, from, to, &errors).is_some());
        let low = |axes: Axes| Axes {
            dec: AxisAngle::from_degrees(-20.0),
            ..axes
        };
        assert_eq!(
            sun::near_on_the_way(&noon, low(from), low(to), &errors),
            None
        );
    }

    #[test]
    fn the_horizon_the_mask_and_the_limits_are_cautioned() {
        let mut trial = Trial::new();
        let codes = |trial: &Trial, utc: &str, name: &str| -> Vec<CautionCode> {
            let dialled = dial(&trial.setup(), &moment(utc), &target(name)).unwrap();
            dialled
                .cautions
                .iter()
                .map(|caution| caution.code)
                .collect()
        };
        let evening = "2026-12-01T21:30:00Z";
        assert_eq!(codes(&trial, evening, "M 37"), [CautionCode::Uncalibrated]);
        assert!(codes(&trial, evening, "Spica").contains(&CautionCode::BelowHorizon));
        assert!(codes(&trial, evening, "Polaris").contains(&CautionCode::NearPole));
        let wall = crate::angle::Altitude::from_degrees(60.0);
        trial.horizon =
            crate::sky::HorizonMask::new(vec![(crate::angle::Azimuth::default(), wall)]);
        assert!(codes(&trial, evening, "M 37").contains(&CautionCode::BehindHorizonMask));
        trial.mount.limits.lowest_altitude = Some(crate::angle::Altitude::from_degrees(50.0));
        assert!(codes(&trial, evening, "M 37").contains(&CautionCode::BeyondLimit));
    }

    #[test]
    fn old_elements_are_said_to_be_old() {
        let lines = include_str!("../../tests/reference/orbit_elements.txt");
        let (targets, _) = crate::catalog::orbit_line::read_all(lines);
        let trial = Trial::new();
        let said = |name: &str, utc: &str| -> Option<String> {
            let target = targets.iter().find(|target| target.name == name).unwrap();
            let dialled = dial(&trial.setup(), &moment(utc), target).unwrap();
            let old = dialled
                .cautions
                .into_iter()
                .find(|caution| caution.code == CautionCode::OldElements);
            old.map(|caution| caution.text)
        };
        let advice = "two-body places drift; get new ones from the Minor Planet Center";
        // the epoch is 2020 May 31.0 TT
        let ceres = |utc| said("(1) Ceres", utc);
        assert_eq!(ceres("2020-05-31T22:00:00Z"), None);
        assert_eq!(ceres("2020-09-07T22:00:00Z"), None);
        assert_eq!(
            ceres("2020-12-31T00:00:00Z"),
            Some(format!("elements are 214 days old: {advice}"))
        );
        assert_eq!(
            ceres("2020-02-01T00:00:00Z"),
            Some(format!("elements are for 120 days from now: {advice}"))
        );
        assert_eq!(
            said("C/2015 A2 (PANSTARRS)", "2015-08-02T22:00:00Z"),
            Some(format!("the elements state no epoch: {advice}"))
        );
    }

    #[test]
    fn an_old_calibration_is_said_to_be_old() {
        let mut trial = Trial::new();
        let now = moment("2026-12-01T21:30:00Z");
        let vega = target("Vega");
        let circles = dial(&trial.setup(), &now, &vega).unwrap();
        let sighting = Sighting {
            side: circles.side,
            hour: circles.hour.reading,
            dec: circles.dec.reading,
            hour_opposite: None,
            dec_opposite: None,
            timed: false,
        };
        let sights = [sighting.sight(&trial.mount, &now, &vega.source)];
        let prior = crate::estimate::Prior::from_expected(&trial.mount.expected);
        trial.estimate = (&crate::estimate::fit(now.observer().latitude, &prior, &sights)).into();
        let codes = |read: &str| -> Vec<CautionCode> {
            let calibrated_at = Some(Utc::parse(read).unwrap());
            let setup = Setup {
                calibrated_at,
                ..trial.setup()
            };
            dial(&setup, &now, &target("M 37"))
                .unwrap()
                .cautions
                .iter()
                .map(|caution| caution.code)
                .collect()
        };
        assert_eq!(codes("2026-12-01T20:30:00Z"), []);
        assert_eq!(
            codes("2026-12-01T08:30:00Z"),
            [CautionCode::StaleCalibration]
        );
    }
}
