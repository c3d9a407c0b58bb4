//! Refraction against *The Nautical Almanac* and the numerical integral of Hohenkerk and Sinclair.

use nonius::angle::Altitude;
use nonius::sky::{Air, refraction};

use crate::table::{Row, rows};

/// What a circle read to the minute can show.
const ALMANAC_ARCMIN: f64 = 0.1;
/// The same, of the integral, where the air can be known.
const INTEGRAL_ARCMIN: f64 = 0.1;
/// Altitude, in degrees, from which [`INTEGRAL_ARCMIN`] holds in any weather.
const KNOWN_FROM_DEG: f64 = 1.0;
/// Below that formula and integral part by 0.12' in the Almanac's own weather, and the real air by more.
const NEAR_HORIZON_ARCMIN: f64 = 0.15;

fn off(row: &Row) -> f64 {
    let altitude = Altitude::from_degrees(row.number("altitude_observed_deg"));
    let air = Air {
        pressure_hpa: row.number("pressure_hpa"),
        temperature_c: row.number("temperature_c"),
    };
    (refraction::at_observed(altitude, air).arcminutes() - row.number("refraction_arcmin")).abs()
}

#[test]
fn refraction_is_the_nautical_almanacs() {
    let mut read = 0;
    for row in rows("refraction.csv") {
        if row.text("source").starts_with("almanac") {
            assert!(off(&row) < ALMANAC_ARCMIN, "{row:?}");
            read += 1;
        }
    }
    assert!(read > 100);
}

#[test]
fn refraction_is_the_integrals_in_every_weather() {
    let mut read = 0;
    for row in rows("refraction.csv") {
        if row.text("source").starts_with("integral") {
            let most = if row.number("altitude_observed_deg") >= KNOWN_FROM_DEG {
                INTEGRAL_ARCMIN
            } else {
                NEAR_HORIZON_ARCMIN
            };
            assert!(off(&row) < most, "{}: {row:?}", off(&row));
            read += 1;
        }
    }
    assert!(read > 800);
}
