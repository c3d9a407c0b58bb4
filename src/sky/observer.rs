//! The observer: where on the Earth, in what air, and how far UT1 is from UTC there and then.

use crate::angle::{Latitude, Longitude};
use crate::sky::air::Air;
use crate::time::Dut1;

/// An observer at a place.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Observer {
    /// Geodetic latitude (WGS84), north positive.
    pub latitude: Latitude,
    /// Longitude, east positive.
    pub longitude: Longitude,
    /// Height in metres; height above the sea will do for that above the ellipsoid.
    pub elevation_m: f64,
    /// UT1 - UTC.
    pub dut1: Dut1,
    /// The air, for refraction.
    pub air: Air,
}
