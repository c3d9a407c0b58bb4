//! Observers, moments and directions of any kind, for the tests of this room.

use proptest::prelude::*;

use crate::angle::{Declination, Latitude, Longitude, RightAscension};
use crate::sky::{Air, Moment, Observer};
use crate::time::{Dut1, Utc};

/// Longitude -2.2°, at sea level, 10 °C.
pub fn at(utc: &str, latitude_deg: f64, pressure_hpa: f64) -> Moment {
    let observer = Observer {
        latitude: Latitude::from_degrees(latitude_deg),
        longitude: Longitude::from_degrees(-2.2),
        elevation_m: 0.0,
        dut1: Dut1::default(),
        air: Air {
            pressure_hpa,
            temperature_c: 10.0,
        },
    };
    Moment::new(&observer, Utc::parse(utc).unwrap())
}

/// The corners of the Earth as often as its inside.
fn degrees(most: f64) -> impl Strategy<Value = f64> {
    prop_oneof![1 => Just(-most), 1 => Just(0.0), 1 => Just(most), 6 => -most..=most]
}

pub fn any_observer() -> impl Strategy<Value = Observer> {
    (
        degrees(90.0),
        degrees(180.0),
        -500.0..9000.0,
        -0.9..0.9,
        (0.0..1100.0, -80.0..60.0),
    )
        .prop_map(|(latitude, longitude, elevation_m, dut1, air)| Observer {
            latitude: Latitude::from_degrees(latitude),
            longitude: Longitude::from_degrees(longitude),
            elevation_m,
            dut1: Dut1::from_seconds(dut1).unwrap(),
            air: Air {
                pressure_hpa: air.0,
                temperature_c: air.1,
            },
        })
}

/// 1972 to 2100.
pub fn any_utc() -> impl Strategy<Value = Utc> {
    let start = Utc::parse("1972-01-01T00:00:00Z").unwrap();
    (0.0..129.0 * 365.2425 * 86_400.0).prop_map(move |seconds| start.plus_seconds(seconds))
}

pub fn any_moment() -> impl Strategy<Value = Moment> {
    (any_observer(), any_utc()).prop_map(|(observer, utc)| Moment::new(&observer, utc))
}

pub fn any_direction() -> impl Strategy<Value = (RightAscension, Declination)> {
    (0.0..360.0, degrees(90.0)).prop_map(|(ra, dec)| {
        (
            RightAscension::from_degrees(ra),
            Declination::from_degrees(dec),
        )
    })
}
