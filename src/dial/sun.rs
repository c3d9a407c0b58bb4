//! The Sun rule.
//!
//! While the Sun is up, the Sun itself and everything within 20° of it is not dialled unless the
//! observer has taken the risk on themselves, and then carries the caution. A swing whose way
//! there passes as near is cautioned too. A setting for later is looked at from its asking on: the hand
//! obeys it at once. The distance is the project's own, wide enough for a
//! finder's field and a mount a degree or two out; house rules come first.

use crate::angle::{Angle, AxisAngle, Latitude};
use crate::metal::{Axes, MountErrors, to_sky};
use crate::sky::{Moment, Observed, Source, separation};

/// Nearer the Sun than this, nothing is dialled while it is up.
pub const NEAR_SUN: Angle = Angle::from_degrees(20.0);

/// The Sun is looked for so often between the asking and the moment a setting is for: it moves 4° in that time.
const OFTEN_S: f64 = 900.0;

/// A setting for later than a day ahead is looked at over its last day.
const MOST_STEPS: u32 = 96;

/// The moment a setting is for, and those from its asking on, `lead_s` seconds before: at any of them
/// the tube may be on its way.
pub(super) fn while_set(moment: &Moment, lead_s: f64) -> impl Iterator<Item = Moment> {
    let steps = (lead_s.max(0.0) / OFTEN_S)
        .ceil()
        .min(f64::from(MOST_STEPS));
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // 0 to MOST_STEPS
    let steps = steps as u32;
    let earlier = (1..=steps).map(move |step| (f64::from(step) * OFTEN_S).min(lead_s));
    std::iter::once(*moment).chain(earlier.map(|earlier| moment.later(-earlier)))
}

/// How near the Sun a setting may bring the tube from its asking on: the place it is set to, and the
/// target as it stands at each moment.
pub(super) fn near_while_set(
    moment: &Moment,
    source: &Source,
    place: &Observed,
    lead_s: f64,
) -> Option<Angle> {
    let apart = while_set(moment, lead_s).filter_map(|then| {
        let target = then.observed(&then.apparent(source));
        let nearer = |a: Angle, b: Angle| if b < a { b } else { a };
        let (to_target, to_place) = (near(&then, &target), near(&then, place));
        to_target.into_iter().chain(to_place).reduce(nearer)
    });
    apart.reduce(|a, b| if b < a { b } else { a })
}

/// How far a place is from the Sun, if the Sun is up and nearer than [`NEAR_SUN`].
#[must_use]
pub fn near(moment: &Moment, place: &Observed) -> Option<Angle> {
    let apart = moment.sun().separation(place);
    (moment.sun_is_up() && apart < NEAR_SUN).then_some(apart)
}

/// The nearest the tube comes to the Sun on its way from one pair of axis angles to another, if the
/// Sun is up and that is nearer than [`NEAR_SUN`].
///
/// A hand moves one axis after the other, or both at once: the three ways are looked at, the short
/// way round each, in steps of two degrees or less.
#[must_use]
pub fn near_on_the_way(
    moment: &Moment,
    from: Axes,
    to: Axes,
    errors: &MountErrors,
) -> Option<Angle> {
    const STEP_DEG: f64 = 2.0;
    if !moment.sun_is_up() {
        return None;
    }
    let hour = (to.hour.angle() - from.hour.angle()).wrapped_signed();
    let dec = (to.dec.angle() - from.dec.angle()).wrapped_signed();
    let steps = (hour.abs().degrees().max(dec.abs().degrees()) / STEP_DEG)
        .ceil()
        .max(1.0);
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // 1 to 90
    let fractions = (0..=steps as u32).map(|step| f64::from(step) / steps);
    let latitude = moment.observer().latitude;
    let nearest = fractions
        .flat_map(|part| {
            [
                (part, part),
                (part, 0.0),
                (1.0, part),
                (0.0, part),
                (part, 1.0),
            ]
        })
        .map(|(along_hour, along_dec)| {
            let axes = Axes {
                hour: AxisAngle::new(from.hour.angle() + hour * along_hour),
                dec: AxisAngle::new(from.dec.angle() + dec * along_dec),
            };
            from_sun(moment, axes, latitude, errors)
        })
        .fold(
            Angle::HALF_TURN,
            |least, apart| if apart < least { apart } else { least },
        );
    (nearest < NEAR_SUN).then_some(nearest)
}

fn from_sun(moment: &Moment, axes: Axes, latitude: Latitude, errors: &MountErrors) -> Angle {
    let (hour_angle, declination) = to_sky(axes, latitude, errors);
    let sun = moment.sun();
    separation(
        (sun.hour_angle.angle(), sun.declination),
        (hour_angle.angle(), declination),
    )
}
