//! What the program has learnt of the mount, and goes by: a night's journal, the next star, a journal where a file of
//! readings was wanted.

use nonius::angle::Angle;
use nonius::estimate::Sight;
use nonius::metal::{OppositeVerniers, Side};
use nonius::night::{Event, Opening, Session, StarReading, last_before};
use nonius::time::Utc;
use serde_json::{Value, json};

use crate::pretended::{AS_ENGRAVED, NORTHERN, TARN_HOLLOW, observed, readings};
use crate::program::{Home, number, text};

fn opening() -> Opening {
    Opening {
        program: "0.1.0".to_owned(),
        site: TARN_HOLLOW.site.to_owned(),
        site_name: "Tarn Hollow".to_owned(),
        latitude_deg: 54.52,
        longitude_deg: -2.21,
        elevation_m: 352.0,
        time_zone: "Europe/London".to_owned(),
        mount: TARN_HOLLOW.mount.to_owned(),
        list: None,
        side: None,
        clock_correction_s: 0.0,
        targets: Vec::new(),
    }
}

/// A star read on the pretended mount, its circles read to a minute of arc.
fn read(utc: &str, star: &str, side: Side) -> StarReading {
    let moment = TARN_HOLLOW.moment(utc);
    let place = observed(&moment, star);
    let axes = TARN_HOLLOW.axes(utc, star, side);
    let sight = Sight {
        hour_angle: place.hour_angle,
        declination: place.declination,
        side,
        hour: vec![axes.hour],
        dec: vec![axes.dec],
        sigma_hour: Angle::from_arcminutes(1.0),
        sigma_dec: Angle::from_arcminutes(1.0),
        opposite: OppositeVerniers::default(),
    };
    StarReading {
        sidereal_deg: moment.apparent_sidereal().degrees(),
        ..StarReading::of_sight(star, &sight, ("", ""))
    }
}

/// A night in which six stars were read on either side of the pier.
fn night(home: &Home, name: &str) -> String {
    let path = home.path(name);
    std::fs::create_dir_all(path.parent().unwrap()).unwrap();
    let utc = |text: &str| Utc::parse(text).unwrap();
    let start = utc("2026-12-01T18:30:00Z");
    let (mut session, _) = Session::begin(&path, start, opening()).unwrap();
    for (index, star) in NORTHERN.iter().take(6).enumerate() {
        let at = format!("2026-12-01T18:{}:07Z", 35 + 3 * index);
        let side = if index % 2 == 0 {
            Side::TubeEast
        } else {
            Side::TubeWest
        };
        let event = Event::StarRead(Box::new(read(&at, star, side)));
        session.act(utc(&at), &event).unwrap();
    }
    path.to_str().unwrap().to_owned()
}

const AT: [&str; 4] = ["--at", "2026-12-01T21:30:00Z", "--site", "tarn-hollow"];

#[test]
fn dial_goes_by_the_night_it_is_given() {
    /// Six stars read without error, as far as a minute of arc of uncertainty leaves the free index alone.
    const TOLERANCE_ARCMIN: f64 = 1.0;
    let home = Home::new();
    let journal = night(&home, "night.jsonl");
    let sheet = home.json(&[&AT[..], &["dial", "M 37", "--night", &journal]].concat());
    let dial = &sheet["dials"][0];
    let axes = TARN_HOLLOW.axes("2026-12-01T21:30:00Z", "M 37", Side::TubeWest);
    let off = |axis: &str, shown: f64| (number(dial, axis) - shown) * 60.0;
    let hour = off("/axes/hour_deg", axes.hour.degrees());
    let dec = off("/axes/dec_deg", axes.dec.degrees());
    assert!(hour.abs() < TOLERANCE_ARCMIN, "{hour}'");
    assert!(dec.abs() < TOLERANCE_ARCMIN, "{dec}'");
    assert_eq!(dial["cautions"], json!([]));
    // the tube was last at the sixth star
    assert!(dial["swing"].is_object());
}

#[test]
fn a_night_not_begun_yet_tells_nothing_and_one_of_another_mount_is_refused() {
    let home = Home::new();
    let sheet = home.json(&[&AT[..], &["dial", "M 37", "--night", "none.jsonl"]].concat());
    let code = text(&sheet, "/dials/0/cautions/0/code").to_owned();
    assert_eq!(code, "uncalibrated");
    let journal = night(&home, "night.jsonl");
    let ran = home.run(&[
        "--site",
        "saltpan-ridge",
        "dial",
        "M 37",
        "--night",
        &journal,
    ]);
    assert_ne!(ran.status, 0);
    assert!(ran.err.contains("tarn-hollow"), "{}", ran.err);
}

#[test]
fn calibrate_names_the_star_that_helps_most() {
    let home = Home::new();
    let file = readings(&TARN_HOLLOW, &NORTHERN[..1], AS_ENGRAVED);
    let file = home.write("readings.csv", &file);
    let report = home.json(&["--site", "tarn-hollow", "calibrate", &file]);
    let next = &report["next_star"];
    assert!(number(next, "/gain") > 0.02, "{next}");
    assert!(text(next, "/side").starts_with("tube-"));
    assert_ne!(next["star"], json!("Vega"));
    let ran = home.run(&["--site", "tarn-hollow", "calibrate", &file]);
    let line = format!("next star: {}", text(next, "/star"));
    assert!(ran.out.contains(&line), "{}", ran.out);
    // twelve stars leave nothing worth the time
    let all = home.write("all.csv", &readings(&TARN_HOLLOW, &NORTHERN, AS_ENGRAVED));
    let report = home.json(&["--site", "tarn-hollow", "calibrate", &all]);
    assert_eq!(report["next_star"], Value::Null);
}

#[test]
fn a_journal_is_not_taken_for_a_file_of_readings() {
    let home = Home::new();
    let journal = night(&home, "night.jsonl");
    let ran = home.run(&["--site", "tarn-hollow", "calibrate", &journal]);
    assert_eq!(ran.status, 2);
    assert!(
        ran.err.contains("journal") && ran.err.lines().count() < 6,
        "{}",
        ran.err
    );
}

#[test]
fn the_last_night_with_a_star_is_found_and_no_other() {
    let home = Home::new();
    night(&home, "nights/2026-12-01-tarn-hollow.jsonl");
    home.write("nights/2026-12-02-tarn-hollow.jsonl", "not a journal");
    let folder = home.path("nights");
    let whose = (TARN_HOLLOW.site, TARN_HOLLOW.mount);
    let found = last_before(&folder, "2026-12-05", whose);
    assert_eq!(found.unwrap().0, "2026-12-01");
    assert!(last_before(&folder, "2026-12-01", whose).is_none());
    assert!(last_before(&folder, "2026-12-05", ("tarn-hollow", "other")).is_none());
    assert!(last_before(&home.path("no-such-folder"), "2026-12-05", whose).is_none());
}
