//! Refraction in the air at the observer.

use crate::angle::{Altitude, Angle};
use crate::sky::air::Air;

/// How far the air lifts what is seen at an observed altitude.
#[must_use]
pub fn at_observed(altitude: Altitude, air: Air) -> Angle {
    let air = air.held();
    let h = altitude.degrees().max(-1.0);
    let arcmin = 1.0 / (h + 7.32 / (h + 4.32)).to_radians().tan();
    Angle::from_arcminutes(
        arcmin.max(0.0) * air.pressure_hpa / 1010.0 * 283.0 / (273.0 + air.temperature_c),
    )
}

/// How far the air lifts what stands at a true altitude.
#[must_use]
pub fn at_true(altitude: Altitude, air: Air) -> Angle {
    let mut refraction = Angle::ZERO;
    for _ in 0..20 {
        refraction = at_observed(Altitude::new(altitude.angle() + refraction), air);
    }
    refraction
}
