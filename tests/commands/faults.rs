//! Wrong files and wrong requests: what is said, where, and with which exit status.

use serde_json::{Value, json};

use crate::program::Home;
use crate::shape::assert_shape;

const HEADER: &str = "utc,star,hour,dec,side\n";
const SOUND: &str = "2026-12-01T19:00:00Z,Capella,17h 58m 00s,44 15 N,tube-west\n";

/// A wrong row in the third line, and the cell to be pointed at.
const WRONG: [(&str, &str); 7] = [
    (
        "2026-12-01T19:05:00Z,Nonesuch,17h 58m,44 15 N,tube-west",
        "Nonesuch",
    ),
    (
        "2026-12-01T19:05:00Z,Capella,17h 61m,44 15 N,tube-west",
        "61m,44",
    ),
    (
        "2026-12-01T19:05:00Z,Capella,25h 10m,44 15 N,tube-west",
        "25h 10m",
    ),
    (
        "2026-12-01T19:05:00Z,Capella,17h 58m,98 15,tube-west",
        "98 15",
    ),
    (
        "2026-12-01T19:05:00Z,Capella,17h 58m,44 15 N,tube-wst",
        "tube-wst",
    ),
    (
        "2026-12-01T19:05:00Z,Capella,17h 58m,44 15 N,single",
        "single",
    ),
    ("yesterday,Capella,17h 58m,44 15 N,tube-west", "yesterday"),
];

#[test]
fn a_fault_of_the_readings_is_shown_with_its_file_line_and_column() {
    for (row, cell) in WRONG {
        let home = Home::new();
        let file = home.write("night.csv", &format!("{HEADER}{SOUND}{row}\n"));
        let column = row.find(cell).unwrap() + 1;
        for words in [
            &["calibrate", &file][..],
            &["calibrate", &file, "--json"],
            &["dial", "Vega", "--readings", &file],
            &["check", &file, "--mount", "six-inch"],
        ] {
            let ran = home.run(words);
            assert_eq!(ran.status, 2, "{words:?}: {ran:?}");
            assert_eq!(ran.out, "", "{words:?}");
            assert!(
                ran.err.contains(&format!("--> {file}:3:{column}\n")),
                "{words:?} {column}\n{}",
                ran.err
            );
            // the line as it stands, a caret under the cell, and what to do
            assert!(ran.err.contains(&format!("3 | {row}\n")), "{}", ran.err);
            let caret = ran.err.lines().find(|line| line.contains('^')).unwrap();
            assert_eq!(
                caret.find('^').unwrap() - caret.find('|').unwrap() - 2,
                column - 1,
                "{}",
                ran.err
            );
            assert!(ran.err.contains("hint: "), "{}", ran.err);
        }
    }
}

#[test]
fn all_faults_of_a_file_are_said_at_once() {
    let home = Home::new();
    let rows: Vec<&str> = WRONG[..4].iter().map(|(row, _)| *row).collect();
    let file = home.write("night.csv", &format!("{HEADER}{}\n", rows.join("\n")));
    let ran = home.run(&["calibrate", &file]);
    assert_eq!(
        (ran.status, ran.err.matches("error: ").count()),
        (2, 4),
        "{}",
        ran.err
    );
    for line in 2..6 {
        assert!(
            ran.err.contains(&format!("--> {file}:{line}:")),
            "{}",
            ran.err
        );
    }
}

#[test]
fn check_says_of_each_file_what_it_is_and_what_is_wrong() {
    let home = Home::new();
    let good = home.write("night.csv", &format!("{HEADER}{SOUND}"));
    let bad = home.write("mount.toml", "name = \"A\"\nkind = \"germ\"\n");
    assert_eq!(
        home.out(&["check", &good]),
        format!("{good}: readings, no faults\n")
    );
    let report = home.json(&["check", &good]);
    assert_eq!(
        report,
        json!({"format": "nonius.check/1", "files": [{"file": good, "kind": "readings", "faults": []}]})
    );

    let both = home.run(&["check", &good, &bad]);
    assert_eq!(both.status, 2);
    assert_eq!(both.out, format!("{good}: readings, no faults\n"));
    assert!(
        both.err.contains(&format!("--> {bad}:2:8\n")),
        "{}",
        both.err
    );

    let both = home.run(&["check", &good, &bad, "--json"]);
    assert_eq!(both.status, 2);
    let report: Value = serde_json::from_str(&both.out).unwrap();
    let wrong = &report["files"][1];
    assert_eq!(
        (&wrong["file"], &wrong["kind"]),
        (&json!(bad), &json!("mount"))
    );
    let kind = wrong["faults"]
        .as_array()
        .unwrap()
        .iter()
        .find(|fault| fault["line"] == 2)
        .unwrap();
    assert_shape(
        kind,
        &json!({"line": 0, "column": 0, "message": "", "hint": ""}),
    );
    assert_eq!(kind["column"], 8);
    assert!(kind["message"].as_str().unwrap().contains("germ"), "{kind}");
}

#[test]
fn a_file_that_is_not_there_is_a_wrong_request() {
    let home = Home::new();
    for words in [
        &["check", "missing.csv"][..],
        &["calibrate", "missing.csv"],
        &["dial", "Vega", "--readings", "missing.csv"],
        &["dial", "Vega", "--site", "missing.toml"],
        &["dial", "Vega", "--mount", "missing.toml"],
    ] {
        let ran = home.run(words);
        assert_eq!(
            (ran.status, ran.out.as_str()),
            (2, ""),
            "{words:?}: {}",
            ran.err
        );
        assert!(ran.err.contains("missing."), "{}", ran.err);
    }
}

#[test]
fn work_that_fails_ends_with_1() {
    let home = Home::new();
    // a file where the folder should be
    home.write("config", "in the way");
    let ran = home.run(&["new", "list", "tonight"]);
    assert_eq!((ran.status, ran.out.as_str()), (1, ""), "{}", ran.err);
    assert!(
        ran.err.starts_with("error: ") && ran.err.contains("tonight.txt"),
        "{}",
        ran.err
    );
    let ran = Home::new().run(&["log", "missing.jsonl"]);
    assert_eq!((ran.status, ran.out.as_str()), (1, ""), "{}", ran.err);
    assert!(ran.err.contains("missing.jsonl"), "{}", ran.err);
    assert_eq!(
        ran.err.matches("(os error 2)").count(),
        1,
        "said twice: {}",
        ran.err
    );
}

#[test]
fn wrong_options_are_refused_by_their_words() {
    let home = Home::new();
    for (words, said) in [
        (&["dial", "Vega", "--at", "yesterday"][..], "yesterday"),
        (
            &["dial", "Vega", "--at", "2026-13-01T00:00:00Z"],
            "2026-13-01",
        ),
        (&["dial", "Vega", "--side", "north"], "north"),
        (&["dial", "Vega", "--lead", "20"], "20"),
        (&["dial", "Vega", "--lead=-5s"], "-5s"),
        (&["dial", "Vega", "--every", "0.2s"], "0.2s"),
        (&["dial", "Vega", "--color", "blue"], "blue"),
        (&["dial", "Vega", "--site", "nowhere"], "nowhere"),
        (&["dial", "Vega", "--mount", "nothing"], "nothing"),
        (&["dial", "Vega", "--fast"], "--fast"),
        (&["dial"], "TARGET"),
        (&["log", "--format", "xml"], "xml"),
        (&["log", "2026-12-01", "--all"], "--all"),
        (&["new", "planet", "x"], "planet"),
        (&["new", "site", "no/name"], "no/name"),
        (&["completions", "abacus"], "abacus"),
        (&["find", "x", "--kind", "blob"], "blob"),
        (&["find", "--near", "Moon"], "Moon"),
        (&["polish"], "polish"),
    ] {
        let ran = home.run(words);
        assert_eq!(
            (ran.status, ran.out.as_str()),
            (2, ""),
            "{words:?}: {}",
            ran.err
        );
        assert!(ran.err.contains(said), "{words:?}: {}", ran.err);
        assert!(!ran.err.contains('\u{1b}'), "colour in a pipe: {}", ran.err);
    }
}

#[test]
fn without_a_terminal_the_screen_is_refused_in_one_line() {
    let ran = Home::new().run(&[]);
    assert_eq!((ran.status, ran.out.as_str()), (2, ""));
    assert_eq!(ran.err.lines().count(), 1, "{}", ran.err);
    assert!(
        ran.err.contains("terminal") && ran.err.contains("nonius dial"),
        "{}",
        ran.err
    );
}

#[test]
fn colour_is_there_when_asked_for_and_says_the_same() {
    let home = Home::new();
    let file = home.write("night.csv", &format!("{HEADER}{}\n", WRONG[0].0));
    let words = ["calibrate", &file, "--color"];
    let plain = home.run(&[&words[..], &["never"]].concat());
    let coloured = home.run(&[&words[..], &["always"]].concat());
    assert!(coloured.err.contains('\u{1b}') && !plain.err.contains('\u{1b}'));
    assert_eq!((plain.status, coloured.status), (2, 2));
}

#[test]
fn every_command_takes_the_shared_options() {
    let home = Home::new();
    let readings = home.write("night.csv", &format!("{HEADER}{SOUND}"));
    let shared = [
        "--site",
        "tarn-hollow",
        "--mount",
        "six-inch",
        "--list",
        "tarn-hollow",
        "--at",
        "2026-12-01T22:30:00Z",
        "--side",
        "tube-west",
        "--readings",
        &readings,
        "--lead",
        "5s",
        "--accept-sun-risk",
        "--json",
        "--color",
        "never",
        "--night",
        "night.jsonl",
    ];
    for words in [
        &["dial", "Vega"][..],
        &["calibrate", &readings],
        &["find", "Vega"],
        &["check", &readings],
        &["new", "list", "tonight"],
        &["log", "--all"],
        &["completions", "bash"],
        &["manual"],
    ] {
        // before the command and after it
        for line in [[&shared[..], words].concat(), [words, &shared[..]].concat()] {
            let ran = home.run(&line);
            let again = words[0] == "new" && ran.err.contains("is there already");
            assert!(
                (ran.status == 0 && ran.err.is_empty()) || again,
                "{line:?}: {ran:?}"
            );
        }
    }
}
