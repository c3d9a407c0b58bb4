//! Coordinates as targets, with their equinox.

use crate::program::{Home, number, wrapped};

const AT: &str = "2026-12-01T21:30:00Z";

/// A place in Andromeda, and the same in degrees.
const PLACE: &str = "00:42:44.3 +41:16:09";
const RA_DEG: f64 = (42.0 * 60.0 + 44.3) / 240.0;
const DEC_DEG: f64 = 41.0 + 16.0 / 60.0 + 9.0 / 3600.0;

fn of_date(equinox: &str) -> (f64, f64) {
    let target = format!("{PLACE} {equinox}");
    let sheet = Home::new().json(&["dial", target.trim(), "--at", AT]);
    (
        number(&sheet, "/dials/0/of_date/ra_deg"),
        number(&sheet, "/dials/0/of_date/dec_deg"),
    )
}

#[test]
fn without_an_equinox_it_is_j2000() {
    assert_eq!(of_date(""), of_date("@J2000"));
}

#[test]
fn a_place_of_date_is_left_where_it_is() {
    /// Diurnal aberration, 0.3" at most, and rounding.
    const LEFT_DEG: f64 = 0.5 / 3600.0;
    let (ra, dec) = of_date("@date");
    assert!(wrapped(ra - RA_DEG).abs() < LEFT_DEG, "{ra}");
    assert!((dec - DEC_DEG).abs() < LEFT_DEG, "{dec}");
}

#[test]
fn a_mean_place_of_the_year_is_off_by_aberration_and_nutation() {
    // 20.5" of annual aberration, at most 17" of nutation in longitude, 9" in obliquity; the right
    // ascension stretched by 1 / cos 41°
    let (ra, dec) = of_date("@J2026.9");
    let (ra_off, dec_off) = (wrapped(ra - RA_DEG).abs(), (dec - DEC_DEG).abs());
    assert!(
        ra_off < 60.0 / 3600.0 && dec_off < 40.0 / 3600.0,
        "{ra_off} {dec_off}"
    );
    assert!(ra_off.hypot(dec_off) > 2.0 / 3600.0);
}

/// The annual precession m + n sin α tan δ in right ascension and n cos α in declination, with the
/// textbooks' m = 3.0730 s and n = 20.05" about 1975 (from memory), at the place half way.
#[test]
fn between_the_equinoxes_lies_the_precession() {
    /// The third order of the change, and what the aberration differs by a degree further on.
    const TOLERANCE_DEG: f64 = 0.001;
    let (old, new, year) = (of_date("@B1950"), of_date("@J2000"), of_date("@J2026.9"));
    for (earlier, later, years) in [(old, new, 50.0), (new, year, 26.9)] {
        let half_way = |a: f64, b: f64| f64::midpoint(a, b).to_radians();
        let (ra, dec) = (half_way(earlier.0, later.0), half_way(earlier.1, later.1));
        let ra_change = years * (3.0730 / 240.0 + 20.05 / 3600.0 * ra.sin() * dec.tan());
        let dec_change = years * 20.05 / 3600.0 * ra.cos();
        let ra_off = wrapped(earlier.0 - later.0) - ra_change;
        let dec_off = earlier.1 - later.1 - dec_change;
        assert!(ra_off.abs() < TOLERANCE_DEG, "{ra_off} of {ra_change}");
        assert!(dec_off.abs() < TOLERANCE_DEG, "{dec_off} of {dec_change}");
    }
}

#[test]
fn a_wrong_place_is_shown_where_it_is_wrong() {
    for (wrong, column, at) in [
        ("05:72:18 +32:33:11", 4, "72"),
        ("05:52:18 +92:33:11", 10, "+92:33:11"),
        ("05:52:18 +32:33:11 @X1900", 21, "X1900"),
    ] {
        let ran = Home::new().run(&["dial", wrong, "--at", AT]);
        assert_eq!((ran.status, ran.out.as_str()), (2, ""), "{wrong}");
        assert!(
            ran.err.contains(&format!("TARGET:1:{column}\n")),
            "{wrong} {at}\n{}",
            ran.err
        );
        assert!(
            ran.err.contains(wrong) && ran.err.contains('^'),
            "{}",
            ran.err
        );
        assert!(ran.err.contains("hint: "), "{}", ran.err);
    }
}
