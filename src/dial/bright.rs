//! The bright stars well placed to be read: high enough, clear of the horizon mask, of Sun and Moon, within the mount's
//! reach, and not to be mistaken for another.

use std::cmp::Ordering;

use crate::angle::{Altitude, Angle};
use crate::catalog::Target;
use crate::dial::setup::Setup;
use crate::dial::sun;
use crate::metal::Side;
use crate::sky::{Apparent, Moment, Observed};

/// The faintest star offered: all brighter ones are easily told apart by eye and finder (common practice, no source).
pub const FAINTEST_HP: f64 = 3.0;

/// Stars to this magnitude can be mistaken for one offered.
pub const FAINTEST_RIVAL_HP: f64 = 4.0;

/// A star fainter than another by more than this is not taken for it (common practice, no source).
const LIKE_BRIGHTNESS_MAG: f64 = 1.0;

/// Lower than this, refraction is uncertain by more than a good circle shows.
const LOWEST_DEG: f64 = 20.0;

/// Nearer a pole than this, a star tells little of the hour circle.
const NEAREST_POLE_DEG: f64 = 10.0;

/// Nearer the Moon than this, the finder is full of light (common practice, no source).
const NEAR_MOON: Angle = Angle::from_degrees(10.0);

/// Two stars this near are in the finder together, however well the mount is known.
const NEAREST_RIVAL: Angle = Angle::from_degrees(1.0);

/// Farther than this they are told apart by the eye along the tube, however little is known of the mount.
const FARTHEST_RIVAL: Angle = Angle::from_degrees(5.0);

/// A star well placed.
#[derive(Clone, Debug, PartialEq)]
pub struct Placed {
    /// The star.
    pub star: Target,
    /// Where it stands.
    pub observed: Observed,
    /// The side of the pier to read it from.
    pub side: Side,
}

/// The well placed among these stars, in their order; `stars` are all to [`FAINTEST_RIVAL_HP`], of which those to
/// [`FAINTEST_HP`] are offered.
#[must_use]
pub fn well_placed(setup: &Setup<'_>, moment: &Moment, stars: &[Target]) -> Vec<Placed> {
    let offered = stars.iter().filter(|star| magnitude(star) <= FAINTEST_HP);
    offered
        .filter_map(|star| {
            let observed = moment.observed(&moment.apparent(&star.source));
            let side = side_for(setup, &observed)?;
            let placed = is_clear(setup, moment, &observed, side)
                && observed.declination.degrees().abs() < 90.0 - NEAREST_POLE_DEG;
            placed.then(|| Placed {
                star: star.clone(),
                observed,
                side,
            })
        })
        .collect()
}

/// Those of them that are not to be mistaken for another of these stars: none of like brightness, or brighter, is nearer
/// than the tube can be expected to be off.
#[must_use]
pub fn unmistakable(
    setup: &Setup<'_>,
    moment: &Moment,
    placed: Vec<Placed>,
    stars: &[Target],
) -> Vec<Placed> {
    let rivals: Vec<(&Target, Apparent)> = stars
        .iter()
        .map(|star| (star, moment.apparent(&star.source)))
        .collect();
    let stands_alone = |placed: &Placed| {
        let own = magnitude(&placed.star);
        let apparent = moment.apparent(&placed.star.source);
        let reach = reach(setup, moment, placed);
        !rivals.iter().any(|(other, place)| {
            magnitude(other) < own + LIKE_BRIGHTNESS_MAG
                && other.name != placed.star.name
                && place.separation(&apparent) < reach
        })
    };
    placed.into_iter().filter(stands_alone).collect()
}

/// How far the tube may be off a star it is set on: two sigmas of both directions together.
fn reach(setup: &Setup<'_>, moment: &Moment, placed: &Placed) -> Angle {
    let latitude = moment.observer().latitude;
    let at = &placed.observed;
    let predicted = setup
        .estimate
        .predict(at.hour_angle, at.declination, latitude, placed.side);
    let off = predicted.map_or(FARTHEST_RIVAL, |predicted| {
        Angle::from_radians(2.0 * predicted.sky.trace().max(0.0).sqrt())
    });
    if off < NEAREST_RIVAL {
        NEAREST_RIVAL
    } else if off < FARTHEST_RIVAL {
        off
    } else {
        FARTHEST_RIVAL
    }
}

/// The side of the pier a place is reached from.
pub(super) fn side_for(setup: &Setup<'_>, observed: &Observed) -> Option<Side> {
    let present = setup.tube.map(|tube| tube.side);
    setup
        .mount
        .choose_side(setup.side, observed.hour_angle, present)
        .ok()
}

/// True for a place high enough, clear of the mask, of Sun and Moon, and within the mount's reach on that side.
pub(super) fn is_clear(
    setup: &Setup<'_>,
    moment: &Moment,
    observed: &Observed,
    side: Side,
) -> bool {
    let limits = &setup.mount.limits;
    let moon = moment.moon();
    observed.altitude >= Altitude::from_degrees(LOWEST_DEG)
        && limits
            .lowest_altitude
            .is_none_or(|lowest| observed.altitude >= lowest)
        && observed.altitude > setup.horizon.altitude_at(observed.azimuth)
        && limits
            .span(side)
            .is_none_or(|span| span.contains(observed.hour_angle))
        && sun::near(moment, observed).is_none()
        && (moon.altitude <= Altitude::default() || moon.separation(observed) > NEAR_MOON)
}

/// The brighter first.
pub(super) fn by_brightness(a: &Target, b: &Target) -> Ordering {
    magnitude(a).total_cmp(&magnitude(b))
}

fn magnitude(star: &Target) -> f64 {
    star.magnitude.unwrap_or(f64::INFINITY)
}
