//! What is found up from the site, and what is found put into a list.

use std::fs;

use crate::program::Home;

const EVENING: &str = "2026-12-01T21:30:00Z";

fn names(home: &Home, words: &[&str]) -> Vec<String> {
    let json = home.json(&[&["find", "--at", EVENING], words].concat());
    let found = json["found"].as_array().unwrap();
    found
        .iter()
        .map(|one| one["name"].as_str().unwrap().to_owned())
        .collect()
}

#[test]
fn only_what_is_up_is_found() {
    let home = Home::new();
    let up = names(
        &home,
        &["--kind", "star", "--brighter-than", "1", "--up", "now"],
    );
    // late on an autumn evening at latitude +54: Capella is high, Spica is under the Earth, the southern ones never rise
    assert!(up.contains(&"Capella".to_owned()), "{up:?}");
    for down in ["Spica", "Canopus", "Achernar"] {
        assert!(!up.contains(&down.to_owned()), "{up:?}");
    }
    // Spica clears the mask before dawn, and stars are looked at in twilight too; Canopus never does
    let tonight = names(
        &home,
        &["--kind", "star", "--brighter-than", "1", "--up", "tonight"],
    );
    assert!(tonight.len() > up.len(), "{tonight:?}");
    assert!(tonight.contains(&"Arcturus".to_owned()) && !up.contains(&"Arcturus".to_owned()));
    assert!(!tonight.contains(&"Canopus".to_owned()));
    let south = [
        "--site",
        "saltpan-ridge",
        "--kind",
        "star",
        "--brighter-than",
        "0",
        "--up",
        "tonight",
    ];
    assert!(names(&home, &south).contains(&"Canopus".to_owned()));
}

#[test]
fn what_is_up_agrees_with_what_is_dialled() {
    let home = Home::new();
    let up = names(
        &home,
        &[
            "--kind",
            "globular cluster",
            "--brighter-than",
            "7",
            "--up",
            "now",
            "--limit",
            "100",
        ],
    );
    let all = names(
        &home,
        &[
            "--kind",
            "globular cluster",
            "--brighter-than",
            "7",
            "--limit",
            "100",
        ],
    );
    assert!(!up.is_empty() && up.len() < all.len());
    for name in &all {
        let json = home.json(&["dial", name, "--at", EVENING]);
        let cautions = json["dials"][0]["cautions"].as_array().unwrap();
        let codes: Vec<&str> = cautions
            .iter()
            .map(|one| one["code"].as_str().unwrap())
            .collect();
        let hidden = ["below-horizon", "behind-horizon-mask"]
            .iter()
            .any(|code| codes.contains(code));
        if hidden {
            assert!(!up.contains(name), "{name} {codes:?}");
        } else if !codes.contains(&"beyond-limit") {
            assert!(up.contains(name), "{name} {codes:?}");
        }
    }
}

#[test]
fn a_list_is_built_by_searching_and_keeps_what_is_written_in_it() {
    let home = Home::new();
    let said = home.out(&[
        "find",
        "--kind",
        "globular cluster",
        "--brighter-than",
        "6",
        "--limit",
        "3",
        "--list",
        "globulars",
    ]);
    let path = home.path("config/nonius/lists/globulars.txt");
    assert!(
        said.ends_with(&format!("3 added to {}\n", path.display())),
        "{said}"
    );
    let first = fs::read_to_string(&path).unwrap();
    let noted = first.replace("M 22", "M 22  low in the south  # try in July");
    assert_ne!(noted, first);
    fs::write(&path, &noted).unwrap();
    let said = home.out(&["find", "m 22", "--limit", "1", "--list", "globulars"]);
    assert!(
        said.contains("0 added to") && said.contains("1 in it already"),
        "{said}"
    );
    let said = home.out(&["find", "m 13", "--limit", "1", "--list", "globulars"]);
    assert!(said.contains("1 added to"), "{said}");
    assert_eq!(fs::read_to_string(&path).unwrap(), format!("{noted}M 13\n"));
    // the list is one to dial and to plan from
    assert!(
        home.out(&["plan", "--list", "globulars", "--date", "2026-07-01"])
            .contains("M 13")
    );
    let ran = home.run(&["find", "m 13", "--list", "no/such folder"]);
    assert_eq!(ran.status, 2, "{ran:?}");
}

#[test]
fn doubles_and_variables_are_found_by_their_kind() {
    let home = Home::new();
    let doubles = names(&home, &["--kind", "double star", "--constellation", "Gem"]);
    assert!(doubles.contains(&"Castor".to_owned()), "{doubles:?}");
    let variables = names(
        &home,
        &["--kind", "variable star", "--constellation", "Per"],
    );
    assert!(variables.contains(&"Algol".to_owned()), "{variables:?}");
    assert!(!variables.contains(&"Mirfak".to_owned()), "{variables:?}");
    let typed = names(&home, &["double", "star", "gem", "--limit", "5"]);
    assert!(typed.contains(&"Castor".to_owned()), "{typed:?}");
    let page = home.out(&["dial", "Algol", "--at", EVENING]);
    assert!(
        page.contains("  star                varies from 2.1 to 3.4 every 2.87 days"),
        "{page}"
    );
}
