//! Catalogues in the user's own folder: found, dialled, and what is said of rows that cannot be read.

use std::fs;

use crate::program::Home;

const GOOD: &str = concat!(env!("CARGO_MANIFEST_DIR"), "/tests/files/good/catalogs");
const BAD: &str = concat!(env!("CARGO_MANIFEST_DIR"), "/tests/files/bad/catalogs");

/// The same star from two catalogues: the last digits each gives, of a place that has moved 35 years.
const SAME_STAR_DEG: f64 = 1.0 / 3600.0;

/// A place at B1950.0 to a second of time and of arc, from memory, carried to the ICRS.
const B1950_PLACE_DEG: f64 = 3.0 / 3600.0;

fn home_with(files: &[(&str, &str)]) -> Home {
    let home = Home::new();
    for (folder, name) in files {
        let text = fs::read_to_string(format!("{folder}/{name}")).unwrap();
        home.write(&format!("config/nonius/catalogs/{name}"), &text);
    }
    home
}

fn place(home: &Home, words: &[&str]) -> (f64, f64) {
    let json = home.json(&[&["find"], words].concat());
    let found = &json["found"][0];
    let of = |key: &str| found[key].as_f64().unwrap_or_else(|| panic!("{json}"));
    (of("ra_deg"), of("dec_deg"))
}

fn apart((ra, dec): (f64, f64), (other_ra, other_dec): (f64, f64)) -> f64 {
    let east = (ra - other_ra) * dec.to_radians().cos();
    east.hypot(dec - other_dec)
}

#[test]
fn a_star_is_the_same_from_any_catalogue_whatever_its_units_equinox_and_epoch() {
    let built_in = place(&Home::new(), &["Vega"]);
    let table = home_with(&[(GOOD, "table.csv")]);
    assert!(apart(place(&table, &["Fidis"]), built_in) < SAME_STAR_DEG);
    let degrees = home_with(&[(GOOD, "degrees.vot")]);
    assert!(apart(place(&degrees, &["Wega", "&", "companion"]), built_in) < SAME_STAR_DEG);
    // a table of 1950 without motions gives the place the star has left since: 0.35" and 0.66" a year (Hipparcos)
    let b1950 = home_with(&[(GOOD, "sexagesimal-b1950.vot")]);
    for (name, named, yearly_arcsec) in [("Wega", "Vega", 0.350), ("Atair", "Altair", 0.660)] {
        let left = apart(place(&b1950, &[name]), place(&Home::new(), &[named]));
        let expected = 50.0 * yearly_arcsec / 3600.0;
        assert!((left - expected).abs() < B1950_PLACE_DEG, "{name}: {left}");
    }
    let json = b1950.json(&["find", "Wega"]);
    assert_eq!(json["found"][0]["catalogue"], "list");
}

#[test]
fn the_fastest_star_is_where_it_is_now() {
    let dialled = |home: &Home| {
        let json = home.json(&["dial", "HIP 87937", "--at", "2026-12-01T21:30:00Z"]);
        let of_date = json["dials"][0]["of_date"].clone();
        (
            of_date["ra_deg"].as_f64().unwrap(),
            of_date["dec_deg"].as_f64().unwrap(),
        )
    };
    let built_in = dialled(&Home::new());
    for file in ["table.csv", "degrees.vot"] {
        // 35 years at 10.3" a year lie between its epoch and now
        assert!(
            apart(dialled(&home_with(&[(GOOD, file)])), built_in) < SAME_STAR_DEG,
            "{file}"
        );
    }
}

#[test]
fn what_cannot_be_read_is_said_and_the_rest_is_used() {
    for (name, sound, left_out) in [("rows.csv", "Sound", 7), ("rows.vot", "Sound", 5)] {
        let home = home_with(&[(BAD, name)]);
        let ran = home.run(&["find", sound]);
        assert_eq!(ran.status, 0, "{ran:?}");
        assert!(ran.out.contains(sound), "{ran:?}");
        let said = format!("warning: {left_out} rows of ");
        assert!(ran.err.starts_with(&said), "{ran:?}");
        assert_eq!(ran.err.lines().count(), 1, "{ran:?}");
        // checked, each is said with its line, and once
        let checked = home.run(&["check"]);
        assert_eq!(checked.status, 2);
        assert!(checked.err.contains(&format!("{name}:8:")), "{checked:?}");
        assert!(!checked.err.contains("warning"), "{checked:?}");
    }
}

#[test]
fn a_catalogue_that_is_wrong_as_a_whole_is_left_out_and_the_night_goes_on() {
    let home = home_with(&[(BAD, "columns.csv"), (GOOD, "degrees.vot")]);
    let ran = home.run(&["dial", "HIP 70890", "--at", "2026-12-01T21:30:00Z"]);
    assert_eq!(ran.status, 0, "{ran:?}");
    assert!(ran.err.contains("columns.csv is left out"), "{ran:?}");
    assert!(ran.err.contains("columns.csv:1:9\n"), "{ran:?}");
}

#[test]
fn the_index_of_a_large_catalogue_is_kept_and_made_anew_when_the_file_changes() {
    let home = Home::new();
    let row = |n: u32| format!("Trial {n},{}d,+10\n", f64::from(n % 3600) / 10.0);
    let text: String = (0..20_000).map(row).collect();
    let name = "config/nonius/catalogs/large.csv";
    home.write(name, &format!("name,ra,dec\n{text}"));
    assert!(
        home.out(&["find", "trial", "12345"])
            .contains("Trial 12345")
    );
    let kept = || -> Vec<std::path::PathBuf> {
        let folder = home.path("cache/nonius/catalogs");
        fs::read_dir(folder)
            .unwrap()
            .map(|entry| entry.unwrap().path())
            .collect()
    };
    let [index] = kept().try_into().unwrap();
    let written = || fs::metadata(&index).unwrap().modified().unwrap();
    let first = written();
    assert!(home.out(&["find", "trial", "777"]).contains("Trial 777"));
    assert_eq!(written(), first, "the same file needs no new index");
    home.write(name, &format!("name,ra,dec\nNew one,1h,+1\n{text}"));
    assert!(home.out(&["find", "new", "one"]).contains("New one"));
    assert!(
        home.out(&["find", "trial", "19999"])
            .contains("Trial 19999")
    );
    // a damaged one is made anew, and a folder that cannot be written does no harm
    fs::write(&index, b"nonsense").unwrap();
    assert!(
        home.out(&["find", "trial", "19999"])
            .contains("Trial 19999")
    );
    assert_eq!(kept().len(), 1);
    fs::remove_dir_all(home.path("cache")).unwrap();
    home.write("cache", "in the way");
    assert!(
        home.out(&["find", "trial", "19999"])
            .contains("Trial 19999")
    );
}
