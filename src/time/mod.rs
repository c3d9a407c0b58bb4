//! Instants and their scales, sidereal time, civil time, and the clock with its correction.
//!
//! Nothing below [`clock`] asks what time it is: every function takes the instant it speaks of.

pub mod clock;
pub mod instant;
pub mod sidereal;
pub mod zone;

pub use clock::Clock;
pub use instant::{Dut1, InstantFault, Tt, Ut1, Utc};
pub use sidereal::SiderealTime;
pub use zone::{CivilZone, Night};
