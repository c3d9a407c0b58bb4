//! The air at the observer: pressure in hPa (millibar) as a barometer at the site shows it, not
//! reduced to sea level, and temperature in degrees Celsius.

use crate::bounds::{PRESSURE, TEMPERATURE};

/// The air at the observer.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Air {
    /// Pressure at the site in hPa; zero for no refraction at all.
    pub pressure_hpa: f64,
    /// Temperature at the site in degrees Celsius.
    pub temperature_c: f64,
}

impl Air {
    /// No air: places are left unrefracted.
    pub const NONE: Self = Self {
        pressure_hpa: 0.0,
        temperature_c: Self::USUAL_TEMPERATURE_C,
    };

    /// The temperature taken where none is given, that of *The Nautical Almanac*'s refraction table.
    pub const USUAL_TEMPERATURE_C: f64 = 10.0;

    /// The pressure of the standard atmosphere at a height above the sea, at 10 °C.
    ///
    /// Source: International Standard Atmosphere (ISO 2533): 1013.25 hPa and 288.15 K at the sea,
    /// 6.5 K less for every kilometre up to 11 km, exponent g M / (R L) = 5.25588.
    #[must_use]
    pub fn standard(elevation_m: f64) -> Self {
        const SEA_LEVEL_HPA: f64 = 1013.25;
        const SEA_LEVEL_K: f64 = 288.15;
        const LAPSE_K_PER_M: f64 = 0.0065;
        const EXPONENT: f64 = 5.255_88;
        /// The top of the layer the formula holds in.
        const TROPOPAUSE_M: f64 = 11_000.0;
        let warmth = 1.0 - LAPSE_K_PER_M * elevation_m.min(TROPOPAUSE_M) / SEA_LEVEL_K;
        Self {
            pressure_hpa: SEA_LEVEL_HPA * warmth.powf(EXPONENT),
            temperature_c: Self::USUAL_TEMPERATURE_C,
        }
    }

    /// The same air held within the named ranges of pressure and temperature; what is not a number
    /// counts as no air, and as the usual temperature.
    #[must_use]
    pub(crate) fn held(self) -> Self {
        let or = |value: f64, otherwise: f64| if value.is_nan() { otherwise } else { value };
        Self {
            pressure_hpa: or(self.pressure_hpa, 0.0).clamp(PRESSURE.least, PRESSURE.greatest),
            temperature_c: or(self.temperature_c, Self::USUAL_TEMPERATURE_C)
                .clamp(TEMPERATURE.least, TEMPERATURE.greatest),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_standard_pressure_falls_with_height_as_the_tables_say() {
        // Source: ISO 2533 table values at 0, 1000, 2000 and 5000 m (from memory).
        for (height, pressure) in [
            (0.0, 1013.25),
            (1000.0, 898.75),
            (2000.0, 794.95),
            (5000.0, 540.20),
        ] {
            assert!((Air::standard(height).pressure_hpa - pressure).abs() < 0.1);
        }
    }

    #[test]
    fn air_that_is_no_air_is_held_in_its_ranges() {
        let odd = Air {
            pressure_hpa: f64::NAN,
            temperature_c: f64::INFINITY,
        };
        let held = odd.held();
        assert!(held.pressure_hpa.abs() < f64::EPSILON);
        assert!((held.temperature_c - TEMPERATURE.greatest).abs() < f64::EPSILON);
    }
}
