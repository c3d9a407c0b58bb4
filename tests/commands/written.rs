//! What the program writes for people to keep: starting files, completions, the manual.

use std::fs;

use crate::program::Home;

const COMMANDS: [&str; 8] = [
    "dial",
    "calibrate",
    "find",
    "check",
    "new",
    "log",
    "completions",
    "manual",
];

#[test]
fn a_starting_file_is_found_good_and_is_never_written_over() {
    let home = Home::new();
    for (what, place, kind) in [
        ("site", "sites/my-own.toml", "site"),
        ("mount", "mounts/my-own.toml", "mount"),
        ("list", "lists/my-own.txt", "list"),
    ] {
        let path = home.path("config/nonius").join(place);
        let said = home.out(&["new", what, "my-own"]);
        let name = path.to_str().unwrap();
        assert!(said.contains(name), "{said}");
        let text = fs::read_to_string(&path).unwrap();
        assert!(text.contains("my-own") && text.contains('#'), "{text}");
        assert_eq!(
            home.out(&["check", name]),
            format!("{name}: {kind}, no faults\n")
        );

        fs::write(&path, "# mine now\n").unwrap();
        let again = home.run(&["new", what, "my-own"]);
        assert_eq!((again.status, again.out.as_str()), (2, ""));
        assert!(again.err.contains(name), "{}", again.err);
        assert_eq!(fs::read_to_string(&path).unwrap(), "# mine now\n");
        fs::write(&path, text).unwrap();
    }
    // nothing else is left behind
    let left = fs::read_dir(home.path("config/nonius/sites"))
        .unwrap()
        .count();
    assert_eq!(left, 1);
    let all = home.out(&["check"]);
    let own = all.lines().filter(|line| line.contains("my-own")).count();
    assert_eq!(own, 3, "{all}");
    assert!(all.lines().all(|line| line.ends_with("no faults")), "{all}");
}

#[test]
fn the_only_site_of_ones_own_is_used_and_a_site_at_zero_is_said() {
    let home = Home::new();
    home.out(&["new", "site", "moor"]);
    let words = ["dial", "Vega", "--at", "2026-12-01T21:30:00Z", "--json"];
    let ran = home.run(&words);
    assert_eq!(ran.status, 0, "{}", ran.err);
    assert!(ran.out.contains("\"site\":\"moor\""), "{}", ran.out);
    assert!(
        ran.err.starts_with("warning: ") && ran.err.contains("0°, 0°"),
        "{}",
        ran.err
    );
    assert_eq!(ran.err.lines().count(), 1);

    home.out(&["new", "site", "garden"]);
    let ran = home.run(&words);
    assert_eq!((ran.status, ran.out.as_str()), (2, ""));
    assert!(
        ran.err.contains("garden, moor") && ran.err.contains("--site"),
        "{}",
        ran.err
    );
}

#[test]
fn each_shell_gets_its_completions_with_every_command() {
    let home = Home::new();
    let scripts = ["bash", "zsh", "fish"].map(|shell| home.out(&["completions", shell]));
    for script in &scripts {
        for command in COMMANDS {
            assert!(script.contains(command), "{command} is missing:\n{script}");
        }
        assert!(script.contains("accept-sun-risk"));
    }
    assert!(scripts[0].contains("complete -F _nonius"), "{}", scripts[0]);
    assert!(scripts[1].starts_with("#compdef nonius"), "{}", scripts[1]);
    assert!(scripts[2].contains("complete -c nonius"), "{}", scripts[2]);
}

#[test]
fn the_manual_is_a_manual_page_with_every_command_and_option() {
    let manual = Home::new().out(&["manual"]);
    assert!(
        manual.lines().any(|line| line.starts_with(".TH nonius 1")),
        "{manual}"
    );
    for section in ["NAME", "SYNOPSIS"] {
        assert!(manual.contains(&format!(".SH {section}\n")), "{section}");
    }
    for command in COMMANDS {
        assert!(manual.contains(&format!("nonius\\-{command}")), "{command}");
    }
    for option in [
        "site",
        "mount",
        "list",
        "at",
        "side",
        "readings",
        "night",
        "lead",
        "json",
        "color",
        "accept\\-sun\\-risk",
    ] {
        assert!(manual.contains(&format!("\\-\\-{option}")), "{option}");
    }
    // every request of roff stands at the head of its line and is one the man macros know
    let known = [
        "ie", "el", "TH", "SH", "SS", "TP", "PP", "RS", "RE", "br", "nf", "fi", "B", "I", "IP",
        "ds", "sp",
    ];
    for line in manual.lines().filter(|line| line.starts_with('.')) {
        let request = line[1..].split_whitespace().next().unwrap_or_default();
        assert!(known.contains(&request), "{line}");
    }
}
