//! Circles that are not centred: found from one vernier each where the mount file asks for it, and without any effect
//! where two opposite verniers are read.
//!
//! What such a circle shows is found here by repetition of its definition, apart from the library: the number `r` under
//! a mark exceeds the angle turned by `e_s sin r + e_c cos r`, also under a second mark half a turn away.

use std::fmt::Write as _;

use nonius::metal::Side;
use serde_json::Value;

use crate::calibrate::{calibrated, errors};
use crate::pretended::{NORTHERN, TARN_HOLLOW, TRUE};
use crate::program::{Home, number, text, wrapped};

/// Sine and cosine part, in arcminutes: 10' altogether on each circle.
const HOUR: (f64, f64) = (8.0, -6.0);
const DECLINATION: (f64, f64) = (-6.0, 8.0);

/// As a mount file may expect it.
const ASKED: &str =
    "hour-circle-eccentricity = \"10'\"\ndeclination-circle-eccentricity = \"10'\"\n";

const NAMES: [&str; 4] = [
    "hour-circle eccentricity, sine",
    "hour-circle eccentricity, cosine",
    "declination-circle eccentricity, sine",
    "declination-circle eccentricity, cosine",
];

/// The number under a mark, in degrees, where a centred circle would show `centred`.
fn shown(centred: f64, (sine, cosine): (f64, f64)) -> f64 {
    let mut shown = centred;
    for _ in 0..10 {
        let (sin, cos) = shown.to_radians().sin_cos();
        shown = centred + (sine * sin + cosine * cos) / 60.0;
    }
    shown
}

/// What the axes of the mount show with a star in the middle, each circle under its two marks, in degrees.
fn axes(utc: &str, star: &str, side: Side) -> ([f64; 2], [f64; 2]) {
    let axes = TARN_HOLLOW.axes(utc, star, side);
    let both = |centred: f64, circle| [centred, centred + 180.0].map(|mark| shown(mark, circle));
    (
        both(axes.hour.degrees(), HOUR),
        both(axes.dec.degrees(), DECLINATION),
    )
}

/// Twelve stars on the two sides of the pier by turns, read exactly.
fn night(both_verniers: bool) -> String {
    let hours = |degrees: f64| format!("{:.7}", degrees.rem_euclid(360.0) / 15.0);
    let quarter = |degrees: f64| {
        format!(
            "{:.7}",
            degrees.to_radians().sin().asin().to_degrees().abs()
        )
    };
    let mut file = String::from("utc,star,hour,dec,side");
    file += if both_verniers {
        ",hour-b,dec-b\n"
    } else {
        "\n"
    };
    for (index, star) in NORTHERN.iter().enumerate() {
        let minutes = 18 * 60 + 30 + index * 5;
        let utc = format!("2026-12-01T{:02}:{:02}:07Z", minutes / 60, minutes % 60);
        let side = [Side::TubeEast, Side::TubeWest][index % 2];
        let (hour, dec) = axes(&utc, star, side);
        write!(
            file,
            "{utc},{star},{},{},{side}",
            hours(hour[0]),
            quarter(dec[0])
        )
        .unwrap();
        if both_verniers {
            write!(file, ",{},{}", hours(hour[1]), quarter(dec[1])).unwrap();
        }
        file.push('\n');
    }
    file
}

/// The mount read finely, with these lines among what is expected of its errors.
fn mount(expected: &str) -> String {
    let line = "[expected-errors]";
    let fine = TARN_HOLLOW.finely_read();
    let (before, after) = fine.split_once(line).unwrap();
    let (comment, after) = after.split_once('\n').unwrap();
    format!("{before}{line}{comment}\n{expected}{after}")
}

fn calibrate(home: &Home, expected: &str, both_verniers: bool) -> Value {
    let mount = home.write("off-centre.toml", &mount(expected));
    let file = home.write("night.csv", &night(both_verniers));
    calibrated(home, &TARN_HOLLOW, &mount, &file)
}

/// The farthest any of the seven usual errors is from the truth, in arcminutes.
fn worst(report: &Value) -> f64 {
    report["errors"].as_array().unwrap()[..7]
        .iter()
        .zip(TRUE)
        .map(|(term, truth)| (number(term, "/value_arcmin") - truth).abs())
        .fold(0.0, f64::max)
}

/// Readings to a tenth of a second of arc, and the pull of what was expected beforehand.
const TOLERANCE_ARCMIN: f64 = 0.5;

#[test]
fn a_mount_with_circles_off_centre_is_found_from_twelve_stars() {
    let home = Home::new();
    let report = calibrate(&home, ASKED, false);
    let terms = report["errors"].as_array().unwrap();
    assert_eq!(terms.len(), 11);
    assert_eq!(report["covariance_arcmin2"].as_array().unwrap().len(), 11);
    assert!(worst(&report) < TOLERANCE_ARCMIN, "{terms:#?}");
    let truths = [HOUR.0, HOUR.1, DECLINATION.0, DECLINATION.1];
    for ((term, name), truth) in terms[7..].iter().zip(NAMES).zip(truths) {
        assert_eq!(text(term, "/name"), name);
        let (value, sigma) = (number(term, "/value_arcmin"), number(term, "/sigma_arcmin"));
        assert!((value - truth).abs() < TOLERANCE_ARCMIN, "{term}");
        assert!((value - truth).abs() < 3.0 * sigma && sigma < 2.0, "{term}");
    }
}

#[test]
fn unasked_for_the_eccentricity_is_left_out_and_spoils_the_other_errors() {
    let home = Home::new();
    let report = calibrate(&home, "", false);
    // as many as ever
    assert_eq!(errors(&report).len(), 7);
    assert!(worst(&report) > 4.0 * TOLERANCE_ARCMIN);
    let residuals = report["residuals"].as_array().unwrap();
    assert!(residuals.iter().any(|row| number(row, "/weight") < 0.5));
}

#[test]
fn asked_for_of_one_circle_it_is_told_of_that_circle() {
    let home = Home::new();
    let report = calibrate(&home, "declination-circle-eccentricity = \"10'\"\n", false);
    let terms = report["errors"].as_array().unwrap();
    let names: Vec<&str> = terms[7..].iter().map(|term| text(term, "/name")).collect();
    assert_eq!(names, NAMES[2..]);
    let rows = report["covariance_arcmin2"].as_array().unwrap();
    assert!(rows.len() == 9 && rows.iter().all(|row| row.as_array().unwrap().len() == 9));
    // the variances stand with their errors
    for (number_in_order, term) in terms.iter().enumerate() {
        let variance = number(&rows[number_in_order], &format!("/{number_in_order}"));
        let sigma = number(term, "/sigma_arcmin");
        assert!((variance - sigma * sigma).abs() < 1e-6 * variance, "{term}");
    }
}

#[test]
fn two_opposite_verniers_need_no_such_term_and_tell_nothing_of_it() {
    let home = Home::new();
    assert!(worst(&calibrate(&home, "", true)) < TOLERANCE_ARCMIN);
    let asked = calibrate(&home, ASKED, true);
    assert!(worst(&asked) < TOLERANCE_ARCMIN);
    for term in &asked["errors"].as_array().unwrap()[7..] {
        assert!(number(term, "/value_arcmin").abs() < 1e-9, "{term}");
        assert!(
            (number(term, "/sigma_arcmin") - 10.0).abs() < 1e-9,
            "{term}"
        );
    }
}

#[test]
fn what_is_to_be_set_allows_for_the_circles_being_off_centre() {
    let home = Home::new();
    let mount = home.write("off-centre.toml", &mount(ASKED));
    let file = home.write("night.csv", &night(false));
    let at = "2026-12-01T20:00:00Z";
    let report = home.json(&[
        "dial",
        "Vega",
        "--site",
        TARN_HOLLOW.site,
        "--mount",
        &mount,
        "--readings",
        &file,
        "--at",
        at,
        "--side",
        "tube-east",
    ]);
    let dial = &report["dials"][0];
    let (hour, dec) = axes(at, "Vega", Side::TubeEast);
    for (pointer, truth) in [("/axes/hour_deg", hour[0]), ("/axes/dec_deg", dec[0])] {
        let off = wrapped(number(dial, pointer) - truth) * 60.0;
        assert!(off.abs() < TOLERANCE_ARCMIN, "{pointer}: {off}");
    }
}
