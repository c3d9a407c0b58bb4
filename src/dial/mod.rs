//! The main job: from a target and an instant to what to set on each circle.
//!
//! [`dial`] is the one straight line: target → apparent place → observed place → axis angles with the
//! estimated errors → number under the index → text as engraved. Screen, text and JSON all print the
//! [`Dial`] it gives; nothing is worked out a second time.

use crate::angle::Angle;
use crate::angle::AxisAngle;
use crate::catalog::Target;
use crate::estimate::{Prediction, chance};
use crate::metal::{
    Axes, EyepiecePlace, Mount, NoSuchSide, Optic, Reading, Side, Slit, TooNearPole,
    TubeDirections, to_axes,
};
use crate::sky::{Apparent, Body, Moment, Observed, Source};

pub mod caution;
pub mod json;
pub mod mark;
mod outlook;
pub mod setup;
pub mod sighting;
pub mod sun;
pub mod tube;

pub use caution::{Caution, CautionCode};
pub use mark::NextMark;
pub use setup::Setup;
pub use sighting::{Sighting, Understood};
pub use tube::{Swing, TubePlace};

/// What to set on the hour circle.
#[derive(Clone, Debug, PartialEq)]
pub struct HourSetting {
    /// The number under the index.
    pub reading: Reading,
    /// As engraved, rounded as the eye can set it.
    pub text: String,
    /// The next engraved mark the target crosses, on a circle that stands still.
    pub next_mark: Option<NextMark>,
}

/// What to set on the declination circle.
#[derive(Clone, Debug, PartialEq)]
pub struct DeclinationSetting {
    /// The number under the index.
    pub reading: Reading,
    /// As engraved, rounded as the eye can set it.
    pub text: String,
}

/// How uncertain the settings are by what is known of the mount, 1 sigma each.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Uncertainty {
    /// Of the hour axis angle.
    pub hour: Angle,
    /// Of the declination axis angle.
    pub dec: Angle,
}

/// The chance that the target is in an optic's field at the first look.
#[derive(Clone, Debug, PartialEq)]
pub struct Chance {
    /// The optic's name.
    pub optic: String,
    /// The diameter of its field.
    pub field: Angle,
    /// 0 to 1.
    pub probability: f64,
}

/// What to set on each circle for a target at an instant, and what goes with it.
#[derive(Clone, Debug, PartialEq)]
pub struct Dial {
    /// The target's name.
    pub target: String,
    /// The side of the pier it is for.
    pub side: Side,
    /// Topocentric apparent place, airless, on the true equator and equinox of date.
    pub of_date: Apparent,
    /// The same with refraction.
    pub observed: Observed,
    /// The axis angles to be shown, index errors included.
    pub axes: Axes,
    /// The hour circle.
    pub hour: HourSetting,
    /// The declination circle.
    pub dec: DeclinationSetting,
    /// How uncertain they are.
    pub uncertainty: Uncertainty,
    /// The chance for each optic.
    pub chances: Vec<Chance>,
    /// How far to swing from where the tube was last known to be.
    pub swing: Option<Swing>,
    /// Where the slit must stand.
    pub slit: Option<Slit>,
    /// Where the eyepiece will be.
    pub eyepiece: Option<EyepiecePlace>,
    /// What to know before following the settings, the gravest first.
    pub cautions: Vec<Caution>,
}

/// Why a target was not dialled.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
pub enum NotDialled {
    /// Nearer the mount's pole than cone and skew let the tube come.
    #[error("nearer the mount's pole than the tube can come")]
    TooNearPole,
    /// The Sun rule withholds it.
    #[error(
        "withheld: the Sun is up and {:.0}° away; looking at or near it blinds at once. \
         Only with a full-aperture filter and by the rules of the house: --accept-sun-risk",
        .apart.degrees()
    )]
    SunNear {
        /// Its distance from the Sun.
        apart: Angle,
    },
    /// The mount has no such side.
    #[error(transparent)]
    NoSuchSide(NoSuchSide),
    /// The Sun itself, while it is up.
    #[error(
        "withheld: the Sun is up; looking at it blinds at once. \
         Only with a full-aperture filter and by the rules of the house: --accept-sun-risk"
    )]
    TheSun,
}

impl From<NoSuchSide> for NotDialled {
    fn from(side: NoSuchSide) -> Self {
        Self::NoSuchSide(side)
    }
}

impl From<TooNearPole> for NotDialled {
    fn from(_: TooNearPole) -> Self {
        Self::TooNearPole
    }
}

/// A mark nearer than this is past before the hand is off the circle (common practice, no source).
const LEAST_WAIT: Angle = Angle::from_time_seconds(10.0);

/// What to set on each circle for a target at an instant.
pub fn dial(setup: &Setup<'_>, moment: &Moment, target: &Target) -> Result<Dial, NotDialled> {
    let of_date = moment.apparent(&target.source);
    let observed = moment.observed(&of_date);
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
        chances: chances(mount, &prediction),
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
    match sun::near(moment, observed) {
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

/// The chance for each optic, the setting of both circles included.
fn chances(mount: &Mount, prediction: &Prediction) -> Vec<Chance> {
    let hour = mount.hour_circle.look_error();
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
