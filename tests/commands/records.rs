//! `find` and `log`: their tables and their JSON.

use std::path::Path;

use nonius::metal::Side;
use nonius::night::{
    Event, ListedPlace, ListedTarget, Opening, Session, Setting, ShownAxes, journal,
};
use nonius::time::Utc;
use serde_json::{Value, json};

use crate::program::{Home, number, text};
use crate::shape::assert_shape;

fn target(name: &str) -> ListedTarget {
    ListedTarget {
        name: name.to_owned(),
        place: ListedPlace::Body {
            body: name.to_owned(),
        },
        also: Vec::new(),
        catalogue: None,
        kind: None,
        constellation: None,
        magnitude: None,
        size_arcmin: None,
        note: String::new(),
    }
}

/// A short night: an object found, another missed, a note, and one taken back.
fn night(path: &Path, site: &str) {
    let utc = |seconds: f64| {
        Utc::parse("2026-12-01T23:59:00Z")
            .unwrap()
            .plus_seconds(seconds)
    };
    let opening = Opening {
        program: "0.1.0".to_owned(),
        site: site.to_owned(),
        site_name: "Saltpan Ridge".to_owned(),
        latitude_deg: -31.4,
        longitude_deg: 21.1,
        elevation_m: 1060.0,
        time_zone: "Africa/Johannesburg".to_owned(),
        mount: "portable".to_owned(),
        list: None,
        side: None,
        clock_correction_s: 0.0,
        targets: vec![target("Saturn"), target("Uranus")],
    };
    let setting = |hour: &str, dec: &str| {
        Some(Setting {
            hour: hour.to_owned(),
            dec: dec.to_owned(),
            side: Side::TubeEast,
            axes: ShownAxes {
                hour_deg: 20.0,
                dec_deg: 190.0,
            },
        })
    };
    let (mut session, _) = Session::begin(path, utc(0.0), opening).unwrap();
    let mut act = |seconds, event| session.act(utc(seconds), &event).unwrap();
    act(
        1.0,
        Event::TargetTaken {
            place: 1,
            target: Box::new(target("Saturn")),
        },
    );
    act(
        90.5,
        Event::Found {
            target: "Saturn".to_owned(),
            setting: setting("0h 35m", "-1° 30'"),
            reading: None,
        },
    );
    act(
        100.0,
        Event::TargetTaken {
            place: 2,
            target: Box::new(target("Uranus")),
        },
    );
    act(
        200.0,
        Event::Missed {
            target: "Uranus".to_owned(),
            setting: setting("4h 02m", "+20° 30'"),
        },
    );
    act(
        210.0,
        Event::Note {
            target: None,
            text: "haze, \"thin\"".to_owned(),
        },
    );
    act(
        220.0,
        Event::Note {
            target: None,
            text: "a slip".to_owned(),
        },
    );
    act(230.0, Event::Undone { line: 7 });
}

#[test]
fn the_log_has_its_shape_and_its_entries_from_the_users_own_folder() {
    let home = Home::new();
    let name = journal::file_name("2026-12-01".parse().unwrap(), "saltpan-ridge");
    night(
        &home.path("state/nonius/nights").join(name),
        "saltpan-ridge",
    );
    let log = home.json(&["log", "2026-12-01"]);
    let mut shaped = log.clone();
    for entry in shaped["entries"].as_array_mut().unwrap() {
        assert!(entry["off_arcmin"].is_null(), "no star was read");
        entry["off_arcmin"] = json!(0.0);
    }
    assert_shape(
        &shaped,
        &json!({"format": "", "night": "", "site": "", "entries": [{
            "utc": "", "civil": "", "act": "", "target": "", "hour": "", "dec": "", "side": "",
            "off_arcmin": 0.0, "note": ""}]}),
    );
    assert_eq!(
        (&log["format"], &log["night"], &log["site"]),
        (
            &json!("nonius.log/1"),
            &json!("2026-12-01"),
            &json!("saltpan-ridge")
        )
    );
    let entries = log["entries"].as_array().unwrap();
    let found = entries
        .iter()
        .find(|entry| entry["act"] == "found")
        .unwrap();
    assert_eq!(
        found,
        &json!({"utc": "2026-12-02T00:00:30.500Z", "civil": "2026-12-02T02:00:30+02:00", "act": "found",
                "target": "Saturn", "hour": "0h 35m", "dec": "-1° 30'", "side": "tube-east",
                "off_arcmin": null, "note": ""})
    );
    let notes: Vec<&str> = entries
        .iter()
        .filter(|one| one["act"] == "note")
        .map(|one| text(one, "/note"))
        .collect();
    assert_eq!(notes, ["haze, \"thin\""], "what was taken back is gone");

    // the last night, the same file by its path, and --format say the same
    assert_eq!(home.json(&["log"]), log);
    let by_format: Value = serde_json::from_str(&home.out(&["log", "--format", "json"])).unwrap();
    assert_eq!(by_format, log);
    let csv = home.out(&["log", "--format", "csv"]);
    assert_eq!(csv.lines().count(), entries.len() + 1, "{csv}");
    assert!(csv.contains("\"haze, \"\"thin\"\"\""), "{csv}");
    let table = home.out(&["log"]);
    assert!(
        table
            .lines()
            .any(|line| line.starts_with("02:00:30  found") && line.contains("0h 35m")),
        "{table}"
    );
}

#[test]
fn a_journal_named_is_the_one_printed_and_all_nights_are_listed() {
    let home = Home::new();
    let own = home.path("elsewhere.jsonl");
    night(&own, "moor");
    let name = own.to_str().unwrap();
    assert_eq!(home.json(&["log", "--night", name])["site"], "moor");
    assert_eq!(home.json(&["log", name])["site"], "moor");
    let none = home.run(&["log"]);
    assert_eq!((none.status, none.out.as_str()), (2, ""), "{}", none.err);

    for site in ["moor", "tarn-hollow"] {
        let name = journal::file_name("2026-12-01".parse().unwrap(), site);
        night(&home.path("state/nonius/nights").join(name), site);
    }
    let all = home.json(&["log", "--all"]);
    let sites: Vec<&str> = all["nights"]
        .as_array()
        .unwrap()
        .iter()
        .map(|one| text(one, "/site"))
        .collect();
    assert_eq!(sites, ["moor", "tarn-hollow"]);
    assert_eq!(
        (&all["nights"][0]["found"], &all["nights"][0]["missed"]),
        (&json!(1), &json!(1))
    );
    let which = home.run(&["log", "2026-12-01"]);
    assert_eq!(which.status, 2);
    assert!(which.err.contains("--site"), "{}", which.err);
    assert_eq!(
        home.json(&["log", "2026-12-01", "--site", "moor"])["site"],
        "moor"
    );
}

#[test]
fn what_is_found_has_its_shape() {
    let home = Home::new();
    let report = home.json(&["find", "owl", "clus"]);
    assert_shape(
        &report,
        &json!({"format": "", "query": "", "found": [{"name": "", "also": [""], "kind": "", "constellation": "",
            "ra_deg": 0.0, "dec_deg": 0.0, "equinox": "", "magnitude": 0.0, "size_arcmin": [0.0],
            "catalogue": "", "score": 0.0}]}),
    );
    assert_eq!(
        (&report["format"], &report["query"]),
        (&json!("nonius.find/1"), &json!("owl clus"))
    );
    let owl = &report["found"][0];
    assert_eq!(
        (&owl["name"], &owl["kind"], &owl["constellation"]),
        (&json!("NGC 457"), &json!("open cluster"), &json!("Cas"))
    );
    assert_eq!(
        (&owl["catalogue"], &owl["equinox"]),
        (&json!("ngc"), &json!("ICRS"))
    );
    assert!((0.5..=1.0).contains(&number(owl, "/score")));
    assert_eq!(owl["size_arcmin"].as_array().unwrap().len(), 2);

    // the table shows the same place, to a second of time and of arc
    let table = home.out(&["find", "owl", "clus"]);
    let line = table
        .lines()
        .find(|line| line.starts_with("NGC 457"))
        .unwrap();
    let seconds = (number(owl, "/ra_deg") * 240.0).round();
    let written = format!(
        "{}h {:02}m {:02}s",
        (seconds / 3600.0).floor(),
        (seconds / 60.0).floor() % 60.0,
        seconds % 60.0
    );
    assert!(line.contains(&written), "{line}: {written}");
    let arcseconds = (number(owl, "/dec_deg") * 3600.0).round();
    let written = format!(
        "+{}° {:02}' {:02}\"",
        (arcseconds / 3600.0).floor(),
        (arcseconds / 60.0).floor() % 60.0,
        arcseconds % 60.0
    );
    assert!(line.contains(&written), "{line}: {written}");
}

#[test]
fn filters_hold_for_everything_found() {
    let home = Home::new();
    let words = [
        "find",
        "--constellation",
        "Virgo",
        "--kind",
        "galaxy",
        "--brighter-than",
        "10",
        "--limit",
        "7",
    ];
    let report = home.json(&words);
    let found = report["found"].as_array().unwrap();
    assert_eq!(found.len(), 7);
    for one in found {
        assert_eq!(
            (&one["constellation"], &one["kind"]),
            (&json!("Vir"), &json!("galaxy"))
        );
        assert!(number(one, "/magnitude") < 10.0);
    }
    let near = home.json(&[
        "find", "--near", "Vega", "--within", "3d", "--kind", "star", "--limit", "50",
    ]);
    let vega = home.json(&["find", "Vega", "--limit", "1"])["found"][0].clone();
    let direction = |one: &Value| {
        let (ra, dec) = (
            number(one, "/ra_deg").to_radians(),
            number(one, "/dec_deg").to_radians(),
        );
        [dec.cos() * ra.cos(), dec.cos() * ra.sin(), dec.sin()]
    };
    let stars = near["found"].as_array().unwrap();
    assert!(stars.len() > 3, "{near}");
    for star in stars {
        let cosine: f64 = direction(star)
            .iter()
            .zip(direction(&vega))
            .map(|(a, b)| a * b)
            .sum();
        assert!(cosine >= 3.001_f64.to_radians().cos(), "{star}");
    }
    assert_eq!(home.json(&["find", "xyzzy"])["found"], json!([]));
}
