//! `dial --json`: every member of its shape, and what they must be to one another.

use nonius::angle::{Declination, HourAngle, Latitude};
use nonius::metal::{MountErrors, Side, to_axes};
use serde_json::{Value, json};

use crate::program::{Home, cautions, number, repository, text, wrapped};
use crate::shape::assert_shape;

const AT: &str = "2026-12-01T21:30:00Z";

/// Sums and differences of angles in degrees, in double precision.
const SAME_DEG: f64 = 1e-9;

fn shape() -> Value {
    json!({
        "format": "", "utc": "", "site": "", "mount": "",
        "sidereal": {"apparent_deg": 0.0, "mean_deg": 0.0},
        "dials": [{
            "target": "", "side": "",
            "of_date": {"ra_deg": 0.0, "dec_deg": 0.0},
            "apparent": {"hour_angle_deg": 0.0, "declination_deg": 0.0},
            "observed": {"hour_angle_deg": 0.0, "declination_deg": 0.0, "azimuth_deg": 0.0,
                         "altitude_deg": 0.0, "refraction_arcmin": 0.0},
            "axes": {"hour_deg": 0.0, "dec_deg": 0.0},
            "hour_circle": {"reading_deg": 0.0, "text": "",
                            "next_mark": {"text": "", "utc": "", "wait_s": 0.0}},
            "declination_circle": {"reading_deg": 0.0, "text": ""},
            "uncertainty": {"hour_arcmin": 0.0, "dec_arcmin": 0.0},
            "chances": [{"optic": "", "field_deg": 0.0, "probability": 0.0}],
            "swing": {"hour_deg": 0.0, "dec_deg": 0.0},
            "dome": {"azimuth_deg": 0.0, "altitude_deg": 0.0},
            "eyepiece": {"height_m": 0.0, "east_m": 0.0, "north_m": 0.0},
            "cautions": [{"code": "", "text": ""}]
        }],
        "not_dialled": [{"target": "", "reason": ""}]
    })
}

/// The shape with these members null.
fn shape_without(pointers: &[&str]) -> Value {
    let mut shape = shape();
    for pointer in pointers {
        *shape.pointer_mut(pointer).unwrap() = Value::Null;
    }
    shape
}

#[test]
fn every_member_of_the_agreed_shape_is_there_and_nothing_else() {
    let readings = repository("tests/files/good/readings-tarn-hollow.csv");
    let words = [
        "dial",
        "Antares",
        "Polaris",
        "Xyzzy 9",
        "--at",
        AT,
        "--readings",
        &readings,
    ];
    let sheet = Home::new().json(&words);
    assert_shape(&sheet, &shape());
    assert_eq!(sheet["format"], "nonius.dial/1");
    assert_eq!(
        (&sheet["utc"], &sheet["site"], &sheet["mount"]),
        (&json!(AT), &json!("tarn-hollow"), &json!("six-inch"))
    );
    assert_eq!(sheet["not_dialled"][0]["target"], "Xyzzy 9");
    let optics: Vec<_> = sheet["dials"][1]["chances"]
        .as_array()
        .unwrap()
        .iter()
        .collect();
    for (chance, (optic, field)) in
        optics
            .iter()
            .zip([("finder", 6.0), ("40 mm", 1.0), ("15 mm", 0.4)])
    {
        assert_eq!(chance["optic"], optic);
        assert!((number(chance, "/field_deg") - field).abs() < SAME_DEG);
    }
    assert_eq!(optics.len(), 3);
    // a wider field never has the smaller chance
    let probabilities: Vec<f64> = optics
        .iter()
        .map(|one| number(one, "/probability"))
        .collect();
    assert!(
        probabilities.is_sorted_by(|wide, narrow| wide >= narrow),
        "{probabilities:?}"
    );
    assert!(
        probabilities
            .iter()
            .all(|chance| (0.0..=1.0).contains(chance))
    );
}

#[test]
fn what_the_mount_does_not_have_is_null() {
    let home = Home::new();
    let words = ["dial", "M 37", "--at", AT];
    let mut sheet = home.json(&words);
    sheet["not_dialled"] = shape()["not_dialled"].clone();
    assert_shape(&sheet, &shape_without(&["/dials/0/swing"]));

    // a ring that rides with the drive; a tube, but no dome
    let mut portable = home.json(&[&words[..], &["--site", "saltpan-ridge"]].concat());
    portable["not_dialled"] = shape()["not_dialled"].clone();
    let absent = [
        "/dials/0/hour_circle/next_mark",
        "/dials/0/swing",
        "/dials/0/dome",
    ];
    assert_shape(&portable, &shape_without(&absent));

    // neither dome nor tube: the mount as its starting file has it
    home.run(&["new", "mount", "plain"]);
    let mut plain = home.json(&[&words[..], &["--mount", "plain"]].concat());
    plain["not_dialled"] = shape()["not_dialled"].clone();
    let absent = [&absent[..], &["/dials/0/eyepiece"]].concat();
    assert_shape(&plain, &shape_without(&absent));
    assert_eq!(plain["mount"], "plain");
}

#[test]
fn the_swing_leads_from_the_last_star_read_to_the_target() {
    // the last of the file, undriven: the tube stands where its axes were then
    let undriven = nonius::site::builtin::files(nonius::site::Shelf::Mounts)
        .iter()
        .find(|file| file.id == "six-inch")
        .unwrap()
        .text
        .replace("clock-drive = true", "clock-drive = false");
    let home = Home::new();
    let mount = home.write("undriven.toml", &undriven);
    let readings = home.write(
        "one.csv",
        "utc,star,hour,dec,side\n2026-12-01T21:00:00Z,Capella,20h 24m 00s,44 15 N,tube-west\n",
    );
    let sheet = home.json(&[
        "dial",
        "M 37",
        "--at",
        AT,
        "--mount",
        &mount,
        "--readings",
        &readings,
    ]);
    let dial = &sheet["dials"][0];
    // 20h 24m is an axis angle of -54°
    let hour = number(dial, "/axes/hour_deg") + 54.0;
    let dec = number(dial, "/axes/dec_deg") - 44.25;
    assert!(
        (number(dial, "/swing/hour_deg") - wrapped(hour)).abs() < SAME_DEG,
        "{dial}"
    );
    assert!(
        (number(dial, "/swing/dec_deg") - wrapped(dec)).abs() < SAME_DEG,
        "{dial}"
    );
}

#[test]
fn the_hour_angle_is_sidereal_time_less_right_ascension() {
    let targets = [
        "Vega",
        "Capella",
        "Antares",
        "M 31",
        "Spica",
        "Moon",
        "Saturn",
        "Deneb Algedi",
        "Polaris",
    ];
    let sheet = Home::new().json(&[&["dial", "--at", AT][..], &targets].concat());
    let sidereal = number(&sheet, "/sidereal/apparent_deg");
    assert!((0.0..360.0).contains(&sidereal));
    // the equation of the equinoxes stays within 1.2 s of time, and is not nothing
    let off = wrapped(sidereal - number(&sheet, "/sidereal/mean_deg")).abs();
    assert!(off > 1e-7 && off < 1.2 * 15.0 / 3600.0, "{off}");
    let (mut west, mut east) = (0, 0);
    for dial in sheet["dials"].as_array().unwrap() {
        let hour_angle = number(dial, "/apparent/hour_angle_deg");
        let expected = wrapped(sidereal - number(dial, "/of_date/ra_deg"));
        assert!((hour_angle - expected).abs() < SAME_DEG, "{dial}");
        assert!(hour_angle > -180.0 && hour_angle <= 180.0);
        assert_eq!(
            dial["apparent"]["declination_deg"],
            dial["of_date"]["dec_deg"]
        );
        if hour_angle > 0.0 {
            west += 1;
        } else {
            east += 1;
        }
    }
    assert!(west + east == targets.len() && west > 1 && east > 1);
}

#[test]
fn without_readings_the_axes_are_those_of_a_perfect_mount() {
    let home = Home::new();
    for (site, latitude) in [("tarn-hollow", 54.52), ("saltpan-ridge", -31.4)] {
        for (word, side) in [("tube-west", Side::TubeWest), ("tube-east", Side::TubeEast)] {
            let words = [
                "dial",
                "M 37",
                "Vega",
                "Fomalhaut",
                "Moon",
                "--at",
                AT,
                "--site",
                site,
                "--side",
                word,
            ];
            let sheet = home.json(&words);
            let dials = sheet["dials"].as_array().unwrap();
            assert_eq!(dials.len(), 4);
            for dial in dials {
                let axes = to_axes(
                    HourAngle::from_degrees(number(dial, "/observed/hour_angle_deg")),
                    Declination::from_degrees(number(dial, "/observed/declination_deg")),
                    Latitude::from_degrees(latitude),
                    &MountErrors::default(),
                    side,
                )
                .unwrap();
                assert!(
                    wrapped(number(dial, "/axes/hour_deg") - axes.hour.degrees()).abs() < SAME_DEG,
                    "{dial}"
                );
                assert!(
                    wrapped(number(dial, "/axes/dec_deg") - axes.dec.degrees()).abs() < SAME_DEG,
                    "{dial}"
                );
                assert_eq!(dial["side"], word);
                assert!(cautions(dial).contains(&"uncalibrated"));
            }
        }
    }
}

#[test]
fn the_other_side_is_half_a_turn_away_and_through_the_pole() {
    let home = Home::new();
    let on = |side| {
        let sheet = home.json(&["dial", "M 37", "--at", AT, "--side", side]);
        sheet["dials"][0].clone()
    };
    let (west, east, auto) = (on("tube-west"), on("tube-east"), on("auto"));
    let hour = number(&east, "/axes/hour_deg") - number(&west, "/axes/hour_deg");
    assert!((wrapped(hour).abs() - 180.0).abs() < SAME_DEG, "{hour}");
    let dec = number(&east, "/axes/dec_deg") + number(&west, "/axes/dec_deg");
    assert!((dec - 180.0).abs() < SAME_DEG, "{dec}");
    // M 37 is east of the meridian: the tube goes west of the pier
    assert!(number(&auto, "/apparent/hour_angle_deg") < 0.0);
    assert_eq!(auto, west);
    let later = home.json(&["dial", "M 37", "--at", "2026-12-02T04:00:00Z"]);
    assert!(number(&later, "/dials/0/apparent/hour_angle_deg") > 0.0);
    assert_eq!(later["dials"][0]["side"], "tube-east");
}

#[test]
fn a_fork_has_its_one_side_and_no_other() {
    let home = Home::new();
    for asked in ["auto", "single"] {
        let sheet = home.json(&[
            "dial", "M 37", "--at", AT, "--mount", "fork", "--side", asked,
        ]);
        assert_eq!(sheet["dials"][0]["side"], "single");
    }
    for words in [["fork", "tube-east"], ["six-inch", "single"]] {
        let ran = home.run(&[
            "dial", "M 37", "--at", AT, "--mount", words[0], "--side", words[1],
        ]);
        assert_eq!((ran.status, ran.out.as_str()), (2, ""), "{words:?}");
        assert!(ran.err.contains("--side"), "{}", ran.err);
    }
}

#[test]
fn a_lead_gives_the_settings_of_that_much_later() {
    let home = Home::new();
    let now = home.json(&["dial", "M 37", "Moon", "--at", AT]);
    let led = home.json(&["dial", "M 37", "Moon", "--at", AT, "--lead", "20s"]);
    let later = home.json(&["dial", "M 37", "Moon", "--at", "2026-12-01T21:30:20Z"]);
    assert_eq!(led, later);
    let moved = number(&led, "/sidereal/apparent_deg") - number(&now, "/sidereal/apparent_deg");
    // 20 s of the mean sun are 20.0548 s of sidereal time (IAU: 1.002737909 to one)
    assert!(
        (moved * 240.0 - 20.0 * 1.002_737_909).abs() < 1e-4,
        "{moved}"
    );
}

#[test]
fn the_same_question_has_the_same_answer_to_the_last_digit() {
    let home = Home::new();
    let words = ["dial", "M 37", "--at", AT, "--json"];
    assert_eq!(home.out(&words), home.out(&words));
    assert_eq!(home.json(&words[..4])["utc"], AT);
}

#[test]
fn below_the_horizon_it_is_dialled_with_its_caution() {
    let sheet = Home::new().json(&["dial", "Antares", "Capella", "--at", AT]);
    let [low, high] = [&sheet["dials"][0], &sheet["dials"][1]];
    assert!(number(low, "/observed/altitude_deg") < 0.0);
    assert!(cautions(low).contains(&"below-horizon"), "{low}");
    assert!(number(high, "/observed/altitude_deg") > 30.0);
    assert!(!cautions(high).contains(&"below-horizon"), "{high}");
}

#[test]
fn unknown_names_are_not_dialled_and_the_rest_is() {
    let home = Home::new();
    let sheet = home.json(&["dial", "Nonesuch", "M 37", "M 999", "--at", AT]);
    assert_eq!(sheet["dials"].as_array().unwrap().len(), 1);
    assert_eq!(sheet["dials"][0]["target"], "M 37");
    let names: Vec<&str> = sheet["not_dialled"]
        .as_array()
        .unwrap()
        .iter()
        .inspect(|one| assert!(!text(one, "/reason").is_empty()))
        .map(|one| text(one, "/target"))
        .collect();
    assert_eq!(names, ["Nonesuch", "M 999"]);
}

#[test]
fn nothing_known_at_all_is_a_wrong_request() {
    let home = Home::new();
    let ran = home.run(&["dial", "Nonesuch", "--at", AT]);
    assert_eq!((ran.status, ran.out.as_str()), (2, ""));
    assert!(
        ran.err.contains("Nonesuch") && ran.err.contains("hint: "),
        "{}",
        ran.err
    );
    let ran = home.run(&["dial", "Nonesuch", "--at", AT, "--json"]);
    assert_eq!(ran.status, 2);
    let sheet: Value = serde_json::from_str(&ran.out).unwrap();
    assert_eq!(sheet["dials"], json!([]));
    assert_eq!(sheet["not_dialled"][0]["target"], "Nonesuch");
}

#[test]
fn every_way_of_naming_a_target_leads_to_its_place() {
    let home = Home::new();
    for names in [
        &["M 37", "m37", "NGC 2099", "ngc2099"][..],
        &["Vega", "alpha Lyrae", "HIP 91262", "vega"],
    ] {
        let sheet = home.json(&[&["dial", "--at", AT][..], names].concat());
        let dials = sheet["dials"].as_array().unwrap();
        assert_eq!(dials.len(), names.len(), "{sheet}");
        assert!(dials.iter().all(|dial| dial == &dials[0]), "{sheet}");
    }
}

#[test]
fn an_instant_may_be_given_in_any_zone() {
    let home = Home::new();
    let utc = home.json(&["dial", "Vega", "--at", AT]);
    let cape = home.json(&["dial", "Vega", "--at", "2026-12-01T23:30:00+02:00"]);
    assert_eq!(utc, cape);
}
