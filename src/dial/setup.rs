//! What a setting is worked out from, beside the target and the instant.

use crate::dial::aside::Aside;
use crate::dial::tube::TubePlace;
use crate::estimate::Estimate;
use crate::metal::{Mount, SideRequest};
use crate::sky::HorizonMask;
use crate::time::Utc;

/// What a setting is worked out from, beside the target and the instant.
#[derive(Clone, Copy, Debug)]
pub struct Setup<'a> {
    /// What hides the sky at the site.
    pub horizon: &'a HorizonMask,
    /// The mount.
    pub mount: &'a Mount,
    /// What is known of its errors.
    pub estimate: &'a Estimate,
    /// The side of the pier asked for.
    pub side: SideRequest,
    /// How far aside of the target to look: a step of a sweep.
    pub aside: Aside,
    /// Where the tube was last known to be.
    pub tube: Option<TubePlace>,
    /// The moment dialled for is so many seconds after the observer asks: the Sun rule holds from the
    /// asking on.
    pub lead_s: f64,
    /// When the last star was read.
    pub calibrated_at: Option<Utc>,
    /// The observer has taken the risk of this target near the Sun on themselves.
    pub sun_risk_accepted: bool,
}
