//! Minor planets and comets whose elements the observer has put among the catalogues.

use crate::program::{Home, cautions, number, repository, text, wrapped};

/// The elements of two minor planets and two comets (`tests/reference/orbits.csv` says whence).
const ELEMENTS: &str = include_str!("../reference/orbit_elements.txt");

fn home() -> Home {
    let home = Home::new();
    home.write("config/nonius/catalogs/mine.mpc", ELEMENTS);
    home
}

#[test]
fn a_minor_planet_of_the_users_is_dialled_where_jpl_puts_it() {
    // JPL's place in tests/reference/orbits.csv for another site: Ceres is 2.1 au away, its parallax 4"
    const MINUTE_DEG: f64 = 1.0 / 60.0;
    let sheet = home().json(&["dial", "Ceres", "--at", "2020-07-24T20:24:52.553Z"]);
    let dial = &sheet["dials"][0];
    assert_eq!(text(dial, "/target"), "(1) Ceres");
    let ra = number(dial, "/of_date/ra_deg") - 348.844_656;
    assert!(wrapped(ra).abs() < MINUTE_DEG, "{dial}");
    let dec = number(dial, "/of_date/dec_deg") + 19.808_578;
    assert!(dec.abs() < MINUTE_DEG, "{dial}");
    assert!(!cautions(dial).contains(&"old-elements"), "{dial}");
}

#[test]
fn old_elements_carry_a_caution() {
    let sheet = home().json(&["dial", "1 Ceres", "--at", "2020-12-31T21:00:00Z"]);
    let dial = &sheet["dials"][0];
    let list = dial["cautions"].as_array().unwrap();
    let old = list
        .iter()
        .find(|caution| text(caution, "/code") == "old-elements")
        .unwrap();
    assert_eq!(
        text(old, "/text"),
        "elements are 215 days old: two-body places drift; get new ones from the Minor Planet Center"
    );
}

#[test]
fn a_bad_line_is_reported_by_check_and_leaves_the_others_usable() {
    let home = Home::new();
    let bad = std::fs::read_to_string(repository(
        "tests/files/bad/catalogs/orbits-minor-planets.mpc",
    ));
    let file = home.write("config/nonius/catalogs/mine.mpc", &bad.unwrap());
    let checked = home.run(&["check", &file]);
    assert_eq!(checked.status, 2, "{}", checked.err);
    assert!(checked.err.contains("mine.mpc:7:21\n"), "{}", checked.err);
    let dialled = home.run(&["dial", "Ceres", "--at", "2020-06-17T22:00:00Z"]);
    assert_eq!(dialled.status, 0, "{}", dialled.err);
    assert!(dialled.out.contains("(1) Ceres"), "{}", dialled.out);
    assert!(
        dialled.err.starts_with("warning: 6 rows of"),
        "{}",
        dialled.err
    );
}

#[test]
fn a_wanderer_is_found_by_every_name_it_goes_by() {
    let home = home();
    for (asked, name) in [
        ("Ceres", "(1) Ceres"),
        ("1 Ceres", "(1) Ceres"),
        ("(2) pallas", "(2) Pallas"),
        ("hale bopp", "C/1995 O1 (Hale-Bopp)"),
        ("C/1995 O1", "C/1995 O1 (Hale-Bopp)"),
        ("panstarrs", "C/2015 A2 (PANSTARRS)"),
    ] {
        let sheet = home.json(&["dial", asked, "--at", "2020-06-17T23:00:00Z"]);
        assert_eq!(text(&sheet["dials"][0], "/target"), name, "{asked}");
    }
    let found = home.json(&["find", "ceres", "--kind", "minor planet"]);
    let found = &found["found"][0];
    assert_eq!(text(found, "/name"), "(1) Ceres");
    assert_eq!(text(found, "/catalogue"), "orbits");
    assert!(found["ra_deg"].is_null(), "{found}");
}
