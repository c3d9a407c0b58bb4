//! What the circles show, worked out by hand from the axis angles for three engravings, and its text.

use serde_json::Value;

use crate::program::{Home, number, text, wrapped};

const SAME_DEG: f64 = 1e-9;

fn dials(site: &str, mount: &str) -> (f64, Vec<Value>) {
    let mut words = vec![
        "dial",
        "M 37",
        "Vega",
        "M 42",
        "Fomalhaut",
        "Achernar",
        "Polaris",
        "Saturn",
    ];
    words.extend([
        "--at",
        "2026-12-01T21:30:00Z",
        "--site",
        site,
        "--mount",
        mount,
    ]);
    let mut all = Vec::new();
    let mut sidereal = 0.0;
    let sides: &[&str] = if mount == "fork" {
        &["single"]
    } else {
        &["tube-west", "tube-east"]
    };
    for side in sides {
        let sheet = Home::new().json(&[&words[..], &["--side", side]].concat());
        sidereal = number(&sheet, "/sidereal/apparent_deg");
        all.extend(sheet["dials"].as_array().unwrap().clone());
    }
    assert_eq!(all.len(), 7 * sides.len());
    (sidereal, all)
}

fn readings(dial: &Value) -> (f64, f64, f64, f64) {
    (
        number(dial, "/axes/hour_deg"),
        number(dial, "/axes/dec_deg"),
        number(dial, "/hour_circle/reading_deg"),
        number(dial, "/declination_circle/reading_deg"),
    )
}

/// The declination axis angle as a declination: beyond the pole it counts back.
fn counted_back(axis_deg: f64) -> f64 {
    axis_deg.to_radians().sin().asin().to_degrees()
}

/// The numbers of a text such as `20h 56m 40s` or `-5° 24'` as one, in its first unit, without sign.
fn size(text: &str) -> f64 {
    let numbers = text.split(|c: char| !c.is_ascii_digit() && c != '.');
    let parts = numbers
        .filter(|part| !part.is_empty())
        .map(|part| part.parse::<f64>().unwrap());
    parts
        .zip([1.0, 60.0, 3600.0])
        .map(|(part, unit)| part / unit)
        .sum()
}

#[test]
fn a_fixed_ring_of_24_hours_and_a_quartered_circle() {
    let (_, dials) = dials("tarn-hollow", "six-inch");
    for dial in &dials {
        let (hour, dec, hour_reading, dec_reading) = readings(dial);
        assert!(
            (hour_reading - hour.rem_euclid(360.0)).abs() < SAME_DEG,
            "{dial}"
        );
        // arcsine loses half the digits near the pole
        assert!(
            (dec_reading - counted_back(dec).abs()).abs() < 1e-6,
            "{dial}"
        );
        // rounded to the verniers: 20 s of time and 5'
        let off = wrapped(size(text(dial, "/hour_circle/text")) * 15.0 - hour_reading).abs();
        assert!(off <= 10.0 * 15.0 / 3600.0 + SAME_DEG, "{dial}");
        let off = (size(text(dial, "/declination_circle/text")) - dec_reading).abs();
        assert!(off <= 2.5 / 60.0 + SAME_DEG, "{dial}");
    }
}

#[test]
fn a_driven_ring_numbered_eastward_and_a_signed_circle() {
    for site in ["tarn-hollow", "saltpan-ridge"] {
        let (sidereal, dials) = dials(site, "portable");
        for dial in &dials {
            let (hour, dec, hour_reading, dec_reading) = readings(dial);
            // on the ring's own side it reads right ascension
            let expected = (sidereal - hour).rem_euclid(360.0);
            assert!(wrapped(hour_reading - expected).abs() < SAME_DEG, "{dial}");
            assert!((dec_reading - counted_back(dec)).abs() < 1e-6, "{dial}");
            let written = text(dial, "/declination_circle/text");
            assert_eq!(written.starts_with('-'), dec_reading < -0.25, "{dial}");
        }
    }
}

#[test]
fn a_ring_in_degrees_and_a_polar_distance() {
    let (_, dials) = dials("tarn-hollow", "fork");
    for dial in &dials {
        let (hour, dec, hour_reading, dec_reading) = readings(dial);
        assert!((hour_reading - hour).abs() < SAME_DEG, "{dial}");
        assert!((dec_reading - (90.0 - dec)).abs() < SAME_DEG, "{dial}");
        let written = text(dial, "/hour_circle/text");
        assert_eq!(written.starts_with('-'), hour < 0.0, "{dial}");
        // the vernier of the ring: 6'
        assert!(
            (size(written) - hour.abs()).abs() <= 3.0 / 60.0 + SAME_DEG,
            "{dial}"
        );
    }
}
