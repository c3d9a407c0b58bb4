//! Wait on the mark: at the moment said, the circle shows the mark itself.

use serde_json::Value;

use crate::program::{Home, number, repository, text, wrapped};

/// A twentieth of a second of time; the moment is said to the millisecond.
const TOLERANCE_DEG: f64 = 0.05 * 15.0 / 3600.0;

const AT: &str = "2026-12-01T21:30:00Z";

/// Dials again at the moment of each setting's next mark, and holds the reading against the mark.
fn assert_marks_are_met(words: &[&str], mark_deg: fn(&str) -> f64, least_deg: f64) {
    let home = Home::new();
    let sheet = home.json(&[words, &["--at", AT]].concat());
    let dials = sheet["dials"].as_array().unwrap();
    assert!(dials.len() >= 2);
    for (index, dial) in dials.iter().enumerate() {
        let mark = &dial["hour_circle"]["next_mark"];
        let wait = number(mark, "/wait_s");
        // no further than one division, and the time a hand needs
        assert!(wait >= 5.0 && wait <= least_deg * 240.0 + 15.0, "{dial}");
        let then = text(mark, "/utc");
        let at_mark = home.json(&[words, &["--at", then]].concat());
        let met: &Value = &at_mark["dials"][index];
        assert_eq!(
            (&met["target"], &met["side"]),
            (&dial["target"], &dial["side"])
        );
        let reading = number(met, "/hour_circle/reading_deg");
        let off = wrapped(reading - mark_deg(text(mark, "/text")));
        assert!(off.abs() < TOLERANCE_DEG, "{off} {mark} {met}");
        // the reading moved on by what the sky moves, so the test is of the moment, not of the mark alone
        let moved = wrapped(reading - number(dial, "/hour_circle/reading_deg"));
        assert!(
            (moved * 240.0 / wait - 1.0).abs() < 0.1,
            "{moved} in {wait} s"
        );
    }
}

fn hours(text: &str) -> f64 {
    let (hours, minutes) = text.strip_suffix('m').unwrap().split_once("h ").unwrap();
    (hours.parse::<f64>().unwrap() + minutes.parse::<f64>().unwrap() / 60.0) * 15.0
}

fn degrees(text: &str) -> f64 {
    text.strip_suffix('°').unwrap().parse().unwrap()
}

#[test]
fn the_star_crosses_the_mark_at_the_moment_said() {
    let words = ["dial", "M 37", "Vega", "Moon", "Saturn", "Castor"];
    for side in ["tube-west", "tube-east"] {
        assert_marks_are_met(&[&words[..], &["--side", side]].concat(), hours, 1.0);
    }
}

#[test]
fn with_the_errors_of_the_mount_too() {
    let readings = repository("tests/files/good/readings-tarn-hollow.csv");
    let words = ["dial", "M 37", "Capella", "M 42", "--readings", &readings];
    assert_marks_are_met(&words, hours, 1.0);
}

#[test]
fn on_a_ring_in_degrees_as_well() {
    assert_marks_are_met(
        &["dial", "M 37", "M 31", "Capella", "--mount", "fork"],
        degrees,
        1.0,
    );
}
