//! The cautions that go with a setting, and that they stay away where there is nothing to say.

use crate::program::{Home, cautions, number};

/// The cautions of one target at Tarn Hollow on its mount, without those of the calibration.
fn of(target: &str, at: &str, side: &str) -> Vec<String> {
    let words = [
        "dial",
        target,
        "--site",
        "tarn-hollow",
        "--at",
        at,
        "--side",
        side,
    ];
    let sheet = Home::new().json(&words);
    let codes = cautions(&sheet["dials"][0]).into_iter().map(str::to_owned);
    codes.filter(|code| code != "uncalibrated").collect()
}

const NONE: [&str; 0] = [];

#[test]
fn a_target_well_placed_has_none() {
    assert_eq!(of("M 33", "2026-12-01T20:30:00Z", "auto"), NONE);
}

/// Fomalhaut culminates at 6° there, over a southern horizon of 5° to 6° (the site's file).
#[test]
fn low_then_behind_the_mask_then_below_the_horizon() {
    for (at, code) in [
        ("2026-12-01T18:25:00Z", "low"),
        ("2026-12-01T20:20:00Z", "behind-horizon-mask"),
        ("2026-12-01T21:30:00Z", "below-horizon"),
    ] {
        // lower than the mount may go, too: 12°
        assert_eq!(of("Fomalhaut", at, "auto"), [code, "beyond-limit"], "{at}");
    }
}

/// With the tube west the mount reaches 40 min past the meridian (the mount's file).
#[test]
fn a_turn_is_foretold_and_then_due() {
    let home = Home::new();
    let words = ["dial", "Hamal", "--at", "2026-12-01T21:30:00Z"];
    let now = number(&home.json(&words), "/dials/0/apparent/hour_angle_deg");
    let minutes_past = |past: f64| {
        let wait = (past - now * 4.0) / 1.002_737_909;
        let minute = 21.0 * 60.0 + 30.0 + wait;
        assert!(minute < 24.0 * 60.0);
        format!(
            "2026-12-01T{:02}:{:02}:00Z",
            (minute / 60.0).floor(),
            minute.rem_euclid(60.0).floor()
        )
    };
    assert_eq!(of("Hamal", &minutes_past(22.0), "tube-west"), NONE);
    assert_eq!(
        of("Hamal", &minutes_past(28.0), "tube-west"),
        ["turn-over-soon"]
    );
    assert_eq!(
        of("Hamal", &minutes_past(38.0), "tube-west"),
        ["turn-over-soon"]
    );
    assert_eq!(
        of("Hamal", &minutes_past(43.0), "tube-west"),
        ["beyond-limit"]
    );
    assert_eq!(of("Hamal", &minutes_past(43.0), "tube-east"), NONE);
}

#[test]
fn near_the_pole_the_hour_circle_tells_little() {
    assert_eq!(of("Polaris", "2026-12-01T20:30:00Z", "auto"), ["near-pole"]);
}

#[test]
fn near_the_moon_but_not_for_the_moon_itself() {
    let at = "2026-12-20T21:30:00Z";
    let moon = Home::new().json(&["dial", "Moon", "--at", at]);
    assert!(number(&moon, "/dials/0/observed/altitude_deg") > 30.0);
    assert!(!cautions(&moon["dials"][0]).contains(&"near-moon"));
    let seconds = number(&moon, "/dials/0/of_date/ra_deg") * 240.0;
    let dec = number(&moon, "/dials/0/of_date/dec_deg").floor();
    let (hours, minutes) = ((seconds / 3600.0).floor(), (seconds / 60.0).floor() % 60.0);
    for (north, near) in [(5.0, true), (14.0, false)] {
        let place = format!("{hours:02}:{minutes:02}:00 +{:02}:00:00 @date", dec + north);
        assert_eq!(
            of(&place, at, "auto").contains(&"near-moon".to_owned()),
            near,
            "{place}"
        );
    }
}
