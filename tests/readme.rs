//! The README keeps its word: every command of it runs, and prints what it shows.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use std::fs;
use std::path::Path;

use assert_cmd::Command;

const README: &str = include_str!("../README.md");

/// The program as a newcomer has it: no files, no nights, no colours of its own.
fn nonius(home: &Path) -> Command {
    let mut command = Command::cargo_bin("nonius").unwrap();
    command
        .current_dir(env!("CARGO_MANIFEST_DIR"))
        .env_clear()
        .env("HOME", home)
        .env("NO_COLOR", "1");
    command
}

/// The fenced blocks, without their fences.
fn blocks() -> Vec<&'static str> {
    README.split("```").skip(1).step_by(2).collect()
}

/// The words of a command line, with double quotes taken as a shell takes them.
fn words(line: &str) -> Vec<String> {
    let mut words = Vec::new();
    for (index, part) in line.split('"').enumerate() {
        if index % 2 == 1 {
            words.push(part.to_owned());
        } else {
            words.extend(part.split_whitespace().map(str::to_owned));
        }
    }
    words
}

#[test]
fn every_example_prints_what_the_readme_shows() {
    let home = tempfile::tempdir().unwrap();
    let mut run = 0;
    for block in blocks() {
        let Some(example) = block.trim().strip_prefix("$ nonius ") else {
            continue;
        };
        let (line, shown) = example.split_once('\n').unwrap();
        let output = nonius(home.path()).args(words(line)).output().unwrap();
        let printed = [output.stdout, output.stderr].concat();
        let printed = String::from_utf8(printed).unwrap();
        assert_eq!(printed.trim_end(), shown.trim_end(), "nonius {line}");
        run += 1;
    }
    assert!(run >= 4, "only {run} examples were found");
}

#[test]
fn the_commands_that_make_files_of_ones_own_run_in_their_order() {
    let home = tempfile::tempdir().unwrap();
    let block = blocks()
        .into_iter()
        .find(|block| block.trim().starts_with("nonius new"))
        .unwrap();
    let lines: Vec<&str> = block.trim().lines().collect();
    assert!(lines.len() >= 4, "{lines:?}");
    for line in lines {
        let line = line.strip_prefix("nonius ").unwrap();
        nonius(home.path()).args(words(line)).assert().success();
    }
    let own = home.path().join(".config/nonius");
    assert!(cfg!(not(target_os = "linux")) || own.join("sites/my-field.toml").exists());
}

#[test]
fn the_two_commands_come_first_and_the_manifest_can_run_them() {
    let first = blocks()[0].trim();
    assert_eq!(first, "cargo run --release\ncargo test");
    let manifest =
        fs::read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join("Cargo.toml")).unwrap();
    assert_eq!(
        manifest.matches("[[bin]]").count(),
        1,
        "cargo run must know which program is meant"
    );
}

#[test]
fn every_command_has_its_line_in_the_manual() {
    let home = tempfile::tempdir().unwrap();
    let output = nonius(home.path()).arg("manual").output().unwrap();
    let manual = String::from_utf8(output.stdout).unwrap();
    for command in [
        "dial",
        "calibrate",
        "plan",
        "find",
        "check",
        "new",
        "log",
        "completions",
        "manual",
    ] {
        assert!(
            manual.contains(&format!("nonius\\-{command}")),
            "{command} is missing:\n{manual}"
        );
    }
}
