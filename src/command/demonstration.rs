//! The demonstration night: what opens where nothing is configured.
//!
//! The built-in sites do not exist, and neither do their mounts: when the screen stands at one of
//! them it also says what the circles of the pretended mount show, so that a whole night can be
//! played through at a desk. All numbers here are invented.

use crate::angle::Angle;
use crate::metal::MountErrors;

/// When the demonstration night's clock starts, in UTC: a moonless December evening at the site.
pub const EVENING: &str = "2026-12-01T18:30:00Z";

/// The errors of the pretended mount: an old pier, set up with care long ago, with a ring and a
/// circle that nobody has zeroed since.
#[must_use]
pub fn errors() -> MountErrors {
    MountErrors {
        hour_index: Angle::from_arcminutes(205.0),
        dec_index: Angle::from_arcminutes(-94.0),
        polar_high: Angle::from_arcminutes(14.0),
        polar_east: Angle::from_arcminutes(-22.0),
        cone: Angle::from_arcminutes(9.0),
        skew: Angle::from_arcminutes(-4.0),
        sag: Angle::from_arcminutes(1.5),
        ..MountErrors::default()
    }
}
