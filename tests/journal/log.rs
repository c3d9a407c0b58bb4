//! The log of a night as people and programs read it.

use std::path::Path;

use nonius::command::log::{LogArgs, LogFormat, LogOptions, NoSuchLog, run};
use nonius::night::{Journal, Log, Night, Opening, Session, journal};
use serde_json::json;
use tempfile::TempDir;

use crate::sample::{every_kind, opening, utc};

/// Writes the sample night at a site into a folder.
fn night_at(folder: &Path, site: &str, start: u32) {
    let night = "2026-12-01".parse().unwrap();
    let path = folder.join(journal::file_name(night, site));
    let (site, opening) = (site.to_owned(), opening());
    let (mut session, _) = Session::begin(&path, utc(start), Opening { site, ..opening }).unwrap();
    for (seconds, event) in (start..).step_by(60).zip(every_kind().into_iter().skip(1)) {
        session.act(utc(seconds), &event).unwrap();
    }
}

fn printed(args: &LogArgs, options: LogOptions<'_>) -> String {
    let mut out = Vec::new();
    run(args, options, &mut out).unwrap();
    String::from_utf8(out).unwrap()
}

const fn options(folder: &Path) -> LogOptions<'_> {
    LogOptions {
        folder,
        site: None,
        journal: None,
        json: false,
    }
}

#[test]
fn the_table_holds_what_stands() {
    let folder = TempDir::new().unwrap();
    night_at(folder.path(), "tarn-hollow", 0);
    let args = LogArgs {
        night: Some("2026-12-01".to_owned()),
        ..LogArgs::default()
    };
    insta::assert_snapshot!(printed(&args, options(folder.path())));
}

#[test]
fn json_has_the_agreed_shape() {
    let folder = TempDir::new().unwrap();
    night_at(folder.path(), "tarn-hollow", 0);
    let options = LogOptions {
        json: true,
        ..options(folder.path())
    };
    let value: serde_json::Value =
        serde_json::from_str(&printed(&LogArgs::default(), options)).unwrap();
    assert_eq!(value["format"], "nonius.log/1");
    assert_eq!(value["night"], "2026-12-01");
    assert_eq!(value["site"], "tarn-hollow");
    let entries = value["entries"].as_array().unwrap();
    assert_eq!(
        entries[3],
        json!({
            "utc": "2026-12-01T19:02:00.125Z", "civil": "2026-12-01T19:02:00+00:00",
            "act": "found", "target": "M 37", "hour": "20h 56m 40s", "dec": "32° 35' N",
            "side": "tube-west", "off_arcmin": 7.0, "note": ""
        })
    );
    assert!(
        entries
            .iter()
            .all(|entry| entry["note"] != "cloud from the west")
    );
}

#[test]
fn csv_has_a_header_and_a_row_an_entry() {
    let folder = TempDir::new().unwrap();
    night_at(folder.path(), "tarn-hollow", 0);
    let args = LogArgs {
        format: LogFormat::Csv,
        ..LogArgs::default()
    };
    let text = printed(&args, options(folder.path()));
    assert!(text.starts_with("utc,civil,act,target,hour,dec,side,off_arcmin,note\n"));
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let rows: Vec<_> = reader.records().map(Result::unwrap).collect();
    let stands = every_kind().len() - 2;
    assert_eq!(rows.len(), stands);
    assert_eq!(&rows[4][8], "three bright ones in a row");
}

#[test]
fn the_nights_are_listed_and_told_apart_by_their_site() {
    let folder = TempDir::new().unwrap();
    let options = options(folder.path());
    let none = run(&LogArgs::default(), options, &mut Vec::new()).unwrap_err();
    assert!(matches!(
        none.downcast(),
        Ok(NoSuchLog::NoneRecorded { .. })
    ));

    night_at(folder.path(), "tarn-hollow", 0);
    night_at(folder.path(), "fell-top", 30);
    std::fs::write(folder.path().join("shopping.jsonl"), "bread").unwrap();
    let all = LogArgs {
        all: true,
        ..LogArgs::default()
    };
    assert_eq!(
        printed(&all, options),
        "night       site         mount     found  missed  readings\n\
         2026-12-01  fell-top     six-inch  1      1       3\n\
         2026-12-01  tarn-hollow  six-inch  1      1       3\n"
    );
    let several = run(&LogArgs::default(), options, &mut Vec::new()).unwrap_err();
    assert_eq!(
        several.to_string(),
        "that night is recorded at fell-top and at tarn-hollow: name one with --site"
    );
    let site = Some("fell-top");
    let one = printed(&LogArgs::default(), LogOptions { site, ..options });
    assert!(one.starts_with("2026-12-01  fell-top  six-inch\n"), "{one}");
    let site = Some("moor");
    let none = run(
        &LogArgs::default(),
        LogOptions { site, ..options },
        &mut Vec::new(),
    );
    let none: NoSuchLog = none.unwrap_err().downcast().unwrap();
    assert_eq!(none, NoSuchLog::NoneSuch);
}

#[test]
fn a_night_whose_first_line_was_lost_still_has_its_log() {
    let folder = TempDir::new().unwrap();
    let path = folder.path().join("n.jsonl");
    let (mut journal, _) = Journal::open(&path).unwrap();
    for event in every_kind().iter().skip(1) {
        journal.append(utc(0), event).unwrap();
    }
    let log = Log::of(&Night::replay(journal::read(&path).unwrap().events));
    assert_eq!((log.night.as_str(), log.site.as_str()), ("2026-12-01", ""));
    assert_eq!(log.entries[2].target, "M 37");
}
