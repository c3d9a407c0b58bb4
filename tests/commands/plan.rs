//! `nonius plan`: windows, order and swing for a list, in both hemispheres and where it does not get dark.

use nonius::time::Utc;
use serde_json::{Value, json};

use crate::program::{Home, cautions, number, text};
use crate::shape::assert_shape;

const NIGHT: &str = "2026-12-01";
const SITES: [&str; 2] = ["tarn-hollow", "saltpan-ridge"];

fn plan(home: &Home, site: &str, words: &[&str]) -> Value {
    home.json(&[&["plan", "--site", site, "--date", NIGHT], words].concat())
}

fn objects(plan: &Value) -> &[Value] {
    plan["objects"].as_array().unwrap()
}

fn utc(value: &Value) -> Utc {
    Utc::parse(value.as_str().unwrap()).unwrap()
}

/// The targets in the order planned.
fn order(plan: &Value) -> Vec<&str> {
    let mut taken: Vec<(u64, &str)> = objects(plan)
        .iter()
        .filter_map(|object| Some((object["place_in_order"].as_u64()?, text(object, "/target"))))
        .collect();
    taken.sort_unstable();
    let places: Vec<u64> = taken.iter().map(|(place, _)| *place).collect();
    assert_eq!(places, (1..=taken.len() as u64).collect::<Vec<_>>());
    taken.into_iter().map(|(_, target)| target).collect()
}

#[test]
fn a_plan_has_its_shape_at_both_demonstration_sites() {
    let home = Home::new();
    for site in SITES {
        let plan = plan(&home, site, &[]);
        let sun = json!({"set": "", "civil_dusk": "", "nautical_dusk": "", "astronomical_dusk": "",
            "astronomical_dawn": "", "nautical_dawn": "", "civil_dawn": "", "rise": ""});
        let any = |value: &Value| {
            if value.is_null() {
                json!(null)
            } else {
                json!("")
            }
        };
        let shape = json!({"format": "", "site": "", "night": "", "sun": sun,
            "moon": {"rise": "", "set": "", "illuminated": 0.0}, "objects": [],
            "swing_deg": 0.0, "turns_over": 0, "given_order": {"swing_deg": 0.0, "turns_over": 0}});
        for object in objects(&plan) {
            let windows = object["windows"].as_array().unwrap();
            let window = json!({"from": "", "to": "", "side": ""});
            let windows = if windows.is_empty() {
                json!([])
            } else {
                json!([window])
            };
            let place = if object["place_in_order"].is_null() {
                json!(null)
            } else {
                json!(1)
            };
            let of_one = json!({"target": "", "place_in_order": place, "rise": any(&object["rise"]),
                "transit": any(&object["transit"]), "set": any(&object["set"]), "windows": windows,
                "why_not": any(&object["why_not"])});
            assert_shape(object, &of_one);
        }
        let mut rest = plan.clone();
        rest["objects"] = json!([]);
        assert_shape(&rest, &shape);
        assert_eq!(
            (
                text(&plan, "/format"),
                text(&plan, "/site"),
                text(&plan, "/night")
            ),
            ("nonius.plan/1", site, NIGHT)
        );
        let moments: Vec<Utc> = [
            "set",
            "civil_dusk",
            "nautical_dusk",
            "astronomical_dusk",
            "astronomical_dawn",
            "nautical_dawn",
            "civil_dawn",
            "rise",
        ]
        .map(|moment| utc(&plan["sun"][moment]))
        .to_vec();
        assert!(moments.is_sorted(), "{}", plan["sun"]);
        // last quarter was in the morning of December 1, by the almanacs (from memory)
        assert!((0.3..0.5).contains(&number(&plan, "/moon/illuminated")));
    }
}

#[test]
fn the_whole_of_a_list_that_can_be_had_is_put_in_order_with_less_swing_than_as_given() {
    let home = Home::new();
    for site in SITES {
        let (best, kept) = (plan(&home, site, &[]), plan(&home, site, &["--keep-order"]));
        assert_eq!(order(&best).len(), 18, "{best}");
        let listed: Vec<&str> = objects(&kept)
            .iter()
            .map(|object| text(object, "/target"))
            .collect();
        assert_eq!(order(&kept), listed);
        assert!(number(&best, "/swing_deg") < 0.9 * number(&best, "/given_order/swing_deg"));
        assert!(best["turns_over"].as_u64() <= best["given_order"]["turns_over"].as_u64());
        assert_eq!(kept["given_order"], best["given_order"]);
        assert_eq!(kept["swing_deg"], kept["given_order"]["swing_deg"]);
        assert_eq!(kept["turns_over"], kept["given_order"]["turns_over"]);
    }
}

#[test]
fn in_every_window_the_dial_has_nothing_against_it() {
    let home = Home::new();
    for site in SITES {
        let plan = plan(&home, site, &[]);
        for object in objects(&plan).iter().step_by(3) {
            for window in object["windows"].as_array().unwrap() {
                let (from, to) = (utc(&window["from"]), utc(&window["to"]));
                // a hair inside either end
                for at in [from.plus_seconds(10.0), to.plus_seconds(-10.0)] {
                    let (target, side) = (text(object, "/target"), text(window, "/side"));
                    let words = [
                        "dial",
                        target,
                        "--site",
                        site,
                        "--at",
                        &at.rfc3339(),
                        "--side",
                        side,
                    ];
                    let dial = &home.json(&words)["dials"][0];
                    for code in [
                        "below-horizon",
                        "behind-horizon-mask",
                        "beyond-limit",
                        "near-sun",
                        "sun-up",
                    ] {
                        assert!(!cautions(dial).contains(&code), "{words:?}: {dial}");
                    }
                }
            }
        }
    }
}

#[test]
fn a_part_of_the_night_can_be_asked_for_by_the_clock_or_by_instants() {
    let home = Home::new();
    let by_clock = plan(
        &home,
        "saltpan-ridge",
        &["--from", "22:00", "--to", "01:00"],
    );
    let instants = [
        "--from",
        "2026-12-01T20:00:00Z",
        "--to",
        "2026-12-02T01:00:00+02:00",
    ];
    assert_eq!(by_clock, plan(&home, "saltpan-ridge", &instants));
    let (from, to) = (
        Utc::parse("2026-12-01T20:00:00Z").unwrap(),
        Utc::parse("2026-12-01T23:00:00Z").unwrap(),
    );
    let windows = objects(&by_clock)
        .iter()
        .flat_map(|object| object["windows"].as_array().unwrap());
    let mut count = 0;
    for window in windows {
        assert!(
            utc(&window["from"]) >= from && utc(&window["to"]) <= to,
            "{window}"
        );
        count += 1;
    }
    assert!(count > 10, "{by_clock}");
}

#[test]
fn tonight_is_the_night_of_the_instant_asked_for() {
    let home = Home::new();
    let words = [
        "plan",
        "--site",
        "tarn-hollow",
        "--at",
        "2026-12-02T03:00:00Z",
    ];
    assert_eq!(home.json(&words), plan(&home, "tarn-hollow", &[]));
}

#[test]
fn in_a_polar_summer_nothing_is_to_be_had_and_why_is_said() {
    let home = Home::new();
    let site = home.write(
        "config/nonius/sites/north.toml",
        "name = \"North\"\nlatitude = 69.6\nlongitude = 19.0\nelevation-m = 10.0\ntime-zone = \"Europe/Oslo\"\nmount = \"fork\"\n",
    );
    let words = [
        "plan",
        "--site",
        &site,
        "--list",
        "tarn-hollow",
        "--date",
        "2026-06-21",
    ];
    let plan = home.json(&words);
    for moment in plan["sun"].as_object().unwrap().values() {
        assert!(moment.is_null(), "{}", plan["sun"]);
    }
    for object in objects(&plan) {
        assert!(
            object["place_in_order"].is_null() && object["windows"].as_array().unwrap().is_empty()
        );
        assert!(
            text(object, "/why_not").starts_with("not dark enough: the Sun stays less than "),
            "{object}"
        );
    }
    assert_eq!(
        (number(&plan, "/swing_deg"), plan["turns_over"].as_u64()),
        (0.0, Some(0))
    );
    let page = home.out(&words);
    assert!(
        page.contains("Sun sets never, rises never") && page.contains("not to be had:"),
        "{page}"
    );
}

#[test]
fn a_fork_has_its_one_side_and_never_turns_over() {
    let plan = plan(&Home::new(), "tarn-hollow", &["--mount", "fork"]);
    let mut windows = objects(&plan)
        .iter()
        .flat_map(|object| object["windows"].as_array().unwrap());
    assert!(windows.all(|window| window["side"] == "single"), "{plan}");
    assert_eq!(plan["turns_over"].as_u64(), Some(0));
    assert!(order(&plan).len() > 10);
}

#[test]
fn a_side_asked_for_is_kept_to() {
    let plan = plan(&Home::new(), "tarn-hollow", &["--side", "tube-west"]);
    let mut windows = objects(&plan)
        .iter()
        .flat_map(|object| object["windows"].as_array().unwrap());
    assert!(
        windows.all(|window| window["side"] == "tube-west"),
        "{plan}"
    );
    let albireo = &objects(&plan)[0];
    assert_eq!(
        (text(albireo, "/target"), text(albireo, "/why_not")),
        ("Albireo", "to be had from the other side of the pier only")
    );
}

#[test]
fn a_name_no_catalogue_knows_is_planned_for_no_time_and_reported() {
    let home = Home::new();
    let list = home.write("list.txt", "M 37\nM 370\nSun\n");
    let ran = home.run(&["plan", "--list", &list, "--date", NIGHT, "--json"]);
    assert_eq!(ran.status, 0, "{}", ran.err);
    assert!(
        ran.err.contains("list.txt:2:1") && ran.err.contains("M 370"),
        "{}",
        ran.err
    );
    let plan: Value = serde_json::from_str(&ran.out).unwrap();
    let said: Vec<(&str, Option<&str>)> = objects(&plan)
        .iter()
        .map(|object| (text(object, "/target"), object["why_not"].as_str()))
        .collect();
    assert_eq!(
        said,
        [
            ("M 37", None),
            ("M 370", Some("no catalogue knows this name")),
            ("Sun", Some("the Sun is not for the night")),
        ]
    );
}

#[test]
fn what_there_is_no_time_for_keeps_its_windows_and_is_named() {
    let home = Home::new();
    let plan = plan(&home, "tarn-hollow", &["--each", "1h"]);
    let without: Vec<&Value> = objects(&plan)
        .iter()
        .filter(|o| o["place_in_order"].is_null())
        .collect();
    assert!(!without.is_empty() && without.len() < 12, "{plan}");
    for object in without {
        assert!(
            text(object, "/why_not").starts_with("no time left"),
            "{object}"
        );
        assert!(!object["windows"].as_array().unwrap().is_empty());
    }
}

#[test]
fn the_page_has_a_row_for_each_object_with_its_window_its_side_and_its_turn() {
    let page = Home::new().out(&["plan", "--site", "saltpan-ridge", "--date", NIGHT]);
    let mut lines = page.lines();
    assert_eq!(
        lines.next(),
        Some("Saltpan Ridge · Portable mount · list saltpan-ridge · night of Tue 1 December 2026")
    );
    assert_eq!(lines.next(), Some("Sun sets 19:26, rises 05:24"));
    let rows: Vec<&str> = page
        .lines()
        .filter(|line| line.contains(" to ") && line.contains("tube "))
        .collect();
    assert_eq!(rows.len(), 18, "{page}");
    assert!(rows[0].trim_start().starts_with("1 "), "{page}");
    let over = rows
        .iter()
        .filter(|row| row.ends_with(", over the pier"))
        .count();
    assert_eq!(over, 1, "{page}");
    assert!(
        page.contains("swing in all: ") && page.contains("; in the order given: "),
        "{page}"
    );
}

#[test]
fn what_cannot_be_planned_is_refused() {
    let home = Home::new();
    for (words, said) in [
        (&["--date", "1 December"][..], "write it as in 2026-12-01"),
        (&["--from", "noon"], "write 21:30"),
        (&["--each", "20s"], "an object takes from 1m to 24h"),
        (
            &["--from", "03:00", "--to", "22:00"],
            "nothing of the night",
        ),
        (&["--date", "1900-01-01"], "outside the years"),
    ] {
        let ran = home.run(&[&["plan", "--site", "tarn-hollow"], words].concat());
        assert_eq!(
            (ran.status, ran.out.as_str()),
            (2, ""),
            "{words:?}: {}",
            ran.err
        );
        assert!(ran.err.contains(said), "{words:?}: {}", ran.err);
    }
}
