//! The Sun rule: what is near a Sun that is up is withheld until the risk is accepted.

use serde_json::Value;

use crate::program::{Home, cautions, number, text};

const NOON: &str = "2026-06-21T12:00:00Z";
const MIDNIGHT: &str = "2026-06-21T00:00:00Z";

fn withheld(sheet: &Value) -> Vec<&str> {
    let list = sheet["not_dialled"].as_array().unwrap();
    list.iter().map(|one| text(one, "/target")).collect()
}

#[test]
fn at_noon_the_sun_and_what_is_near_it_are_withheld_and_the_rest_is_not() {
    let sheet = Home::new().json(&["dial", "Sun", "beta Tauri", "Vega", "--at", NOON]);
    assert_eq!(withheld(&sheet).len(), 2, "{sheet}");
    assert_eq!(withheld(&sheet)[0], "Sun");
    for one in sheet["not_dialled"].as_array().unwrap() {
        let reason = text(one, "/reason");
        assert!(
            reason.contains("Sun") && reason.contains("--accept-sun-risk"),
            "{reason}"
        );
    }
    let dials = sheet["dials"].as_array().unwrap();
    assert_eq!((dials.len(), &dials[0]["target"]), (1, &"Vega".into()));
    assert!(cautions(&dials[0]).contains(&"sun-up"), "{sheet}");
}

#[test]
fn the_risk_accepted_it_is_dialled_and_carries_the_caution() {
    let words = [
        "dial",
        "Sun",
        "beta Tauri",
        "--at",
        NOON,
        "--accept-sun-risk",
    ];
    let sheet = Home::new().json(&words);
    assert!(withheld(&sheet).is_empty(), "{sheet}");
    let dials = sheet["dials"].as_array().unwrap();
    assert_eq!(dials.len(), 2);
    for dial in dials {
        // the gravest first
        assert_eq!(cautions(dial)[0], "near-sun", "{dial}");
    }
    // at the solstice the Sun stands 23.4° north, high in the south
    assert!((number(&dials[0], "/of_date/dec_deg") - 23.43).abs() < 0.02);
    assert!(number(&dials[0], "/observed/altitude_deg") > 55.0);
}

#[test]
fn the_rule_reaches_to_twenty_degrees_and_no_further() {
    let home = Home::new();
    let sun = home.json(&["dial", "Sun", "--at", NOON, "--accept-sun-risk"]);
    let ra_deg = number(&sun, "/dials/0/of_date/ra_deg");
    let dec_deg = number(&sun, "/dials/0/of_date/dec_deg");
    let place = |north: f64| {
        let seconds = ra_deg * 240.0;
        let (hours, rest) = ((seconds / 3600.0).floor(), seconds.rem_euclid(3600.0));
        let (minutes, seconds) = ((rest / 60.0).floor(), rest.rem_euclid(60.0));
        let minutes_of_dec = ((dec_deg + north) * 60.0).floor();
        let (degrees, dec_minutes) = (
            (minutes_of_dec / 60.0).floor(),
            minutes_of_dec.rem_euclid(60.0),
        );
        format!("{hours:02}:{minutes:02}:{seconds:04.1} +{degrees:02}:{dec_minutes:02}:00 @date")
    };
    let sheet = home.json(&["dial", &place(19.7), &place(20.3), "--at", NOON]);
    assert_eq!(withheld(&sheet).len(), 1, "{sheet}");
    assert_eq!(sheet["dials"].as_array().unwrap().len(), 1);
    assert!(
        (number(&sheet, "/dials/0/of_date/dec_deg") - dec_deg - 20.3).abs() < 0.05,
        "{sheet}"
    );
}

#[test]
fn with_the_sun_down_nothing_is_withheld() {
    let sheet = Home::new().json(&["dial", "Sun", "beta Tauri", "--at", MIDNIGHT]);
    assert!(withheld(&sheet).is_empty(), "{sheet}");
    let dials = sheet["dials"].as_array().unwrap();
    assert!(number(&dials[0], "/observed/altitude_deg") < 0.0);
    for dial in dials {
        let codes = cautions(dial);
        assert!(
            !codes.contains(&"near-sun") && !codes.contains(&"sun-up"),
            "{dial}"
        );
        assert!(codes.contains(&"below-horizon"), "{dial}");
    }
}

#[test]
fn in_words_the_danger_is_named() {
    let out = Home::new().out(&["dial", "Sun", "--at", NOON]);
    assert!(
        out.contains("blinds at once") && out.contains("--accept-sun-risk"),
        "{out}"
    );
    assert!(!out.contains("hour circle"), "{out}");
}
