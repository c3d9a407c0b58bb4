//! The bright stars well placed to be read: high enough, clear of the horizon mask and of the Sun,
//! within the mount's reach.

use crate::angle::Altitude;
use crate::catalog::Target;
use crate::dial::sun;
use crate::metal::{Side, SideRequest};
use crate::screen::observatory::Observatory;
use crate::sky::{Moment, Observed};

/// The faintest star offered: all brighter ones are easily told apart by eye and finder (common
/// practice, no source).
pub const FAINTEST_HP: f64 = 3.0;

/// Lower than this, refraction is uncertain by more than a good circle shows.
const LOWEST_DEG: f64 = 20.0;

/// Nearer a pole than this, a star tells little of the hour circle.
const NEAREST_POLE_DEG: f64 = 10.0;

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

/// The well placed among these stars, in their order, that fit what is typed.
#[must_use]
pub fn well_placed(
    observatory: &Observatory,
    stars: &[Target],
    moment: &Moment,
    request: SideRequest,
    tube: Option<Side>,
    typed: &str,
) -> Vec<Placed> {
    let typed = typed.trim().to_lowercase();
    stars
        .iter()
        .filter(|star| {
            star.names()
                .any(|name| name.to_lowercase().contains(&typed))
        })
        .filter_map(|star| {
            let observed = moment.observed(&moment.apparent(&star.source));
            let mount = &observatory.mount;
            let side = mount.choose_side(request, observed.hour_angle, tube).ok()?;
            let lowest = mount.limits.lowest_altitude.unwrap_or_default();
            let reach = mount.limits.span(side);
            let placed = observed.altitude >= Altitude::from_degrees(LOWEST_DEG)
                && observed.altitude >= lowest
                && observed.altitude > observatory.horizon.altitude_at(observed.azimuth)
                && observed.declination.degrees().abs() < 90.0 - NEAREST_POLE_DEG
                && reach.is_none_or(|span| span.contains(observed.hour_angle))
                && sun::near(moment, &observed).is_none();
            placed.then(|| Placed {
                star: star.clone(),
                observed,
                side,
            })
        })
        .collect()
}
