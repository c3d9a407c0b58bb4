//! Refraction: how far the air lifts what is seen through it, always upward.
//!
//! Each formula where it is good, by observed altitude:
//!
//! * above 14°: SOFA's `refco`, A tan z + B tan³ z, dry air (damp air bends light by some 0.1 % less),
//!   yellow light (0.55 µm);
//! * from the horizon to 4°: the formula of *The Nautical Almanac*, 1/tan(H + 7.32/(H + 4.32)) minutes of
//!   arc with H in degrees, for 10 °C and 1010 hPa, times the density of the air, and corrected in
//!   other weather because the air near the ground bends light more than in proportion;
//! * between 4° and 14°: both, faded smoothly from one to the other;
//! * below the horizon, where nothing is seen and no formula holds: the Almanac's formula to its own turning
//!   point, then fading to nothing at 12° below, so that altitudes keep their order and no step shows.
//!
//! Against the numerical integral of Hohenkerk and Sinclair (`tests/reference/refraction.csv`; 700 to
//! 1030 hPa, -20 to 35 °C) it is good to 0.09' from 1° up and 0.14' from the horizon up; in the
//! Almanac's own weather to 0.09' of its formula everywhere. The real air near the horizon departs
//! from any model by more than that.

use crate::angle::{Altitude, Angle};
use crate::sky::air::Air;

/// How far the air lifts what is seen at an observed altitude.
#[must_use]
pub fn at_observed(altitude: Altitude, air: Air) -> Angle {
    Layer::of(air).lift(altitude)
}

/// How far the air lifts what stands at a true (airless) altitude.
///
/// Solved by iteration until the step is below 0.00002": what is seen at the true altitude plus this
/// is lifted by just this.
#[must_use]
pub fn at_true(altitude: Altitude, air: Air) -> Angle {
    const STEP_RAD: f64 = 1e-10;
    /// Each round is nearer by the slope of refraction, 0.4 at the worst (the horizon at -80 °C).
    const ROUNDS: usize = 40;
    let layer = Layer::of(air);
    let mut lift = Angle::ZERO;
    for _ in 0..ROUNDS {
        let next = layer.lift(Altitude::new(altitude.angle() + lift));
        let step = (next - lift).abs();
        lift = next;
        if step.radians() < STEP_RAD {
            break;
        }
    }
    lift
}

/// The lowest altitude, in degrees, that the formula of the zenith distance alone has a hand in, and
/// the lowest at which it stands alone.
const HIGH_FROM_DEG: f64 = 4.0;
const HIGH_ALONE_DEG: f64 = 14.0;
/// Where the Almanac's formula has its greatest value: H + 4.32 = sqrt(7.32).
const TURNING_POINT_DEG: f64 = -1.614_450_515;
/// Where refraction has faded out.
const FADED_OUT_DEG: f64 = -12.0;

/// What depends on the air alone.
struct Layer {
    /// Of the high formula.
    a: Angle,
    /// Of the high formula.
    b: Angle,
    /// Density over that at 10 °C and 1010 hPa.
    density: f64,
    /// By what share of itself the low formula falls short at the horizon.
    bends_more: f64,
}

impl Layer {
    fn of(air: Air) -> Self {
        /// The Almanac's weather; its formula holds with this zero of temperature.
        const PRESSURE_HPA: f64 = 1010.0;
        const KELVIN: f64 = 283.0;
        const ICE_K: f64 = 273.0;
        /// With more, `refco` fails in thin hot air, where it would put more vapour than air.
        const HUMIDITY: f64 = 0.0;
        const YELLOW_MICROMETRE: f64 = 0.55;
        let air = air.held();
        let (a, b) = sofars::astro::refco(
            air.pressure_hpa,
            air.temperature_c,
            HUMIDITY,
            YELLOW_MICROMETRE,
        );
        let cold = KELVIN / (ICE_K + air.temperature_c);
        let density = air.pressure_hpa / PRESSURE_HPA * cold;
        let colder = cold - 1.0;
        Self {
            a: Angle::from_radians(a),
            b: Angle::from_radians(b),
            density,
            // fitted to the numerical integral at 25 weathers, 0 to 90 degrees
            bends_more: (0.67 - 0.708 * colder) * colder + 0.095 * (density - 1.0),
        }
    }

    /// How far it lifts what is seen at an altitude.
    fn lift(&self, altitude: Altitude) -> Angle {
        let h = altitude.degrees();
        let high = smooth_step(h, HIGH_FROM_DEG, HIGH_ALONE_DEG);
        if high <= 0.0 {
            self.low(h) * smooth_step(h, FADED_OUT_DEG, TURNING_POINT_DEG)
        } else if high >= 1.0 {
            self.high(altitude)
        } else {
            self.low(h) * (1.0 - high) + self.high(altitude) * high
        }
    }

    fn high(&self, altitude: Altitude) -> Angle {
        let tan_z = (Angle::HALF_TURN / 2.0 - altitude.angle()).tan();
        self.a * tan_z + self.b * tan_z.powi(3)
    }

    fn low(&self, altitude_deg: f64) -> Angle {
        /// The Almanac's horizontal refraction, where the correction for the weather is whole.
        const AT_HORIZON_ARCMIN: f64 = 33.8;
        /// How fast that correction falls off as refraction does, from the same fit.
        const FALL_OFF: f64 = 1.3;
        let h = altitude_deg.max(TURNING_POINT_DEG);
        let almanac = 1.0 / Angle::from_degrees(h + 7.32 / (h + 4.32)).tan();
        let correction = self.bends_more * (almanac / AT_HORIZON_ARCMIN).powf(FALL_OFF);
        Angle::from_arcminutes(almanac * self.density * (1.0 + correction))
    }
}

/// From 0 at one value to 1 at another, level at both ends.
fn smooth_step(value: f64, from: f64, to: f64) -> f64 {
    let share = ((value - from) / (to - from)).clamp(0.0, 1.0);
    share * share * (3.0 - 2.0 * share)
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::bounds::{PRESSURE, TEMPERATURE};

    /// A thousandth of a second of arc, far below anything a mount shows.
    const ROUND_TRIP_ARCSEC: f64 = 0.001;

    fn any_air() -> impl Strategy<Value = Air> {
        (
            PRESSURE.least..=PRESSURE.greatest,
            TEMPERATURE.least..=TEMPERATURE.greatest,
        )
            .prop_map(|(pressure_hpa, temperature_c)| Air {
                pressure_hpa,
                temperature_c,
            })
    }

    proptest! {
        #[test]
        fn up_through_the_air_and_back_is_the_same_altitude(air in any_air(), deg in -90.0..=90.0) {
            let truth = Altitude::from_degrees(deg);
            let seen = Altitude::new(truth.angle() + at_true(truth, air));
            let back = seen.angle() - at_observed(seen, air);
            prop_assert!((back - truth.angle()).abs().arcseconds() < ROUND_TRIP_ARCSEC);
        }

        #[test]
        fn what_stands_higher_is_seen_higher_and_near_stays_near(
            air in any_air(), deg in -90.0..89.9, step in 1e-4..0.1,
        ) {
            let seen = |deg: f64| {
                let truth = Altitude::from_degrees(deg);
                (truth.angle() + at_true(truth, air)).degrees()
            };
            let rise = seen(deg + step) - seen(deg);
            prop_assert!(rise > 0.0);
            // below the horizon, in the densest air, the fading stretches the scale by no more than this
            prop_assert!(rise < 2.0 * step);
        }

        #[test]
        fn the_air_lifts_and_never_far(air in any_air(), deg in -90.0..=90.0) {
            let lift = at_true(Altitude::from_degrees(deg), air).degrees();
            prop_assert!((-1e-9..2.0).contains(&lift), "{lift}");
        }
    }

    #[test]
    fn no_pressure_is_no_refraction() {
        for deg in [-5.0, 0.0, 3.0, 6.0, 40.0] {
            assert!(at_true(Altitude::from_degrees(deg), Air::NONE).arcseconds() < 1e-12);
        }
    }

    #[test]
    fn in_the_almanacs_weather_the_low_formula_is_the_almanacs() {
        let air = Air {
            pressure_hpa: 1010.0,
            temperature_c: 10.0,
        };
        let formula = |h: f64| 1.0 / (h + 7.32 / (h + 4.32)).to_radians().tan();
        for h in [0.0, 0.25, 1.0, 4.0] {
            let ours = at_observed(Altitude::from_degrees(h), air).arcminutes();
            assert!((ours - formula(h)).abs() < 1e-9);
        }
    }
}
