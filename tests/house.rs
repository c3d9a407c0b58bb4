//! The house: a file may use its own folder and the floors below, never one above nor one beside.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use std::fs;
use std::path::{Path, PathBuf};

/// The floor of each room, the ground floor first.
const FLOORS: &[(&str, u8)] = &[
    ("angle", 1),
    ("sexagesimal", 1),
    ("bounds", 1),
    ("time", 1),
    ("sky", 2),
    ("metal", 2),
    ("estimate", 3),
    ("catalog", 3),
    ("site", 4),
    ("dial", 4),
    ("plan", 5),
    ("night", 6),
    ("sheet", 7),
    ("screen", 7),
    ("command", 8),
];

/// The plain values share the ground floor and may know each other.
const GROUND: u8 = 1;

fn floor(room: &str) -> Option<u8> {
    FLOORS
        .iter()
        .find(|(name, _)| *name == room)
        .map(|(_, floor)| *floor)
}

fn sources(folder: &Path, found: &mut Vec<PathBuf>) {
    for entry in fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            sources(&path, found);
        } else if path.extension().is_some_and(|extension| extension == "rs") {
            found.push(path);
        }
    }
}

/// The rooms a text reaches into: every word after `crate::`, also inside `use crate::{a, b::c}`.
fn rooms_used(text: &str) -> Vec<String> {
    let mut rooms = Vec::new();
    for (at, _) in text.match_indices("crate::") {
        let rest = &text[at + "crate::".len()..];
        if let Some(inside) = rest.strip_prefix('{') {
            let mut depth = 0_i32;
            let mut start = true;
            let mut word = String::new();
            for c in inside.chars() {
                match c {
                    '{' => depth += 1,
                    '}' if depth == 0 => break,
                    '}' => depth -= 1,
                    ',' if depth == 0 => start = true,
                    ':' | ' ' | '\n' if depth == 0 => start = start && word.is_empty(),
                    c if depth == 0 && start => word.push(c),
                    _ => {}
                }
                if (!start || c == ',') && !word.is_empty() {
                    rooms.push(std::mem::take(&mut word));
                }
            }
            if !word.is_empty() {
                rooms.push(word);
            }
        } else {
            rooms.push(
                rest.chars()
                    .take_while(|c| c.is_ascii_lowercase() || *c == '_')
                    .collect(),
            );
        }
    }
    rooms
}

/// The steps up or sideways in one file's text, in words.
fn wrong_steps(room: &str, text: &str) -> Vec<String> {
    let own =
        floor(room).unwrap_or_else(|| panic!("the room {room} has no floor: name it in FLOORS"));
    rooms_used(text)
        .into_iter()
        .filter(|used| used != room)
        .filter_map(|used| {
            let theirs = floor(&used)?;
            let neighbours_on_the_ground = own == GROUND && theirs == GROUND;
            (theirs >= own && !neighbours_on_the_ground)
                .then(|| format!("{room} (floor {own}) uses {used} (floor {theirs})"))
        })
        .collect()
}

#[test]
fn no_file_reaches_up_or_sideways() {
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    let mut files = Vec::new();
    sources(&root, &mut files);
    let mut wrong = Vec::new();
    let mut read = 0;
    for file in files {
        let inside = file.strip_prefix(&root).unwrap();
        let room = inside
            .components()
            .next()
            .unwrap()
            .as_os_str()
            .to_string_lossy()
            .trim_end_matches(".rs")
            .to_owned();
        if room == "main" || room == "lib" {
            continue;
        }
        read += 1;
        let text = fs::read_to_string(&file).unwrap();
        wrong.extend(
            wrong_steps(&room, &text)
                .into_iter()
                .map(|step| format!("{}: {step}", inside.display())),
        );
    }
    assert!(read > 10, "only {read} files were found");
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn a_step_up_or_sideways_is_seen() {
    assert_eq!(wrong_steps("sky", "use crate::metal::Side;").len(), 1);
    assert_eq!(
        wrong_steps(
            "sky",
            "use crate::{angle::Angle, dial::{Dial, Caution}, night};"
        )
        .len(),
        2
    );
    assert_eq!(
        wrong_steps("dial", "use crate::{sky::Moment, angle::{Angle}};").len(),
        0
    );
    assert_eq!(wrong_steps("time", "use crate::angle::direction;").len(), 0);
}

#[test]
fn every_file_opens_by_saying_what_it_is() {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let mut files = Vec::new();
    sources(&root.join("src"), &mut files);
    sources(&root.join("tests"), &mut files);
    for file in files {
        assert!(
            fs::read_to_string(&file).unwrap().starts_with("//!"),
            "{} does not open with //!",
            file.display()
        );
    }
}
