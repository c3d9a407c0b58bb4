//! The built-in catalogues: every row can be read, every name leads to its own row.
//!
//! Expected places are the tables' own; they come from the sources named at the tables' heads.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use std::collections::HashMap;
use std::fs;
use std::path::{Path, PathBuf};

use nonius::catalog::constellation::CONSTELLATIONS;
use nonius::catalog::{Catalogue, Constellation, Filter, Greek, Kind, Origin, Target, Unresolved};
use nonius::sky::{Body, CataloguePlace, Source, separation};

/// Places are copied from the tables, so nothing but the last digit of a double may differ.
const SAME_DEG: f64 = 1e-9;

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("catalogs")
}

/// The rows of a table by column name, read by a library of its own.
fn rows(file: &str) -> Vec<HashMap<String, String>> {
    let mut reader = csv::ReaderBuilder::new()
        .comment(Some(b'#'))
        .from_path(folder().join(file))
        .unwrap();
    let rows: Vec<HashMap<String, String>> = reader.deserialize().map(Result::unwrap).collect();
    assert!(rows.len() > 50, "{file}");
    rows
}

fn place(target: &Target) -> CataloguePlace {
    match target.source {
        Source::Catalogue(place) => place,
        Source::Body(body) => panic!("{body:?} has no fixed place"),
        Source::Orbit(orbit) => panic!("{orbit:?} has no fixed place"),
    }
}

fn number(row: &HashMap<String, String>, column: &str) -> f64 {
    row[column]
        .parse()
        .unwrap_or_else(|_| panic!("{column} of {row:?}"))
}

fn assert_at(target: &Target, row: &HashMap<String, String>) {
    let place = place(target);
    let ra = (place.right_ascension.degrees() - number(row, "ra_deg")).abs();
    let dec = (place.declination.degrees() - number(row, "dec_deg")).abs();
    assert!(ra < SAME_DEG && dec < SAME_DEG, "{target:?}");
}

fn constellation(abbreviation: &str) -> Option<&'static Constellation> {
    let found = Constellation::abbreviated(abbreviation);
    assert!(found.is_some(), "{abbreviation}");
    found
}

#[test]
fn every_star_is_found_by_its_number_with_its_whole_row() {
    let catalogue = Catalogue::builtin();
    for row in rows("stars.csv") {
        let target = catalogue.resolve(&format!("hip{}", row["hip"])).unwrap();
        assert_at(&target, &row);
        let place = place(&target);
        for (value, column) in [
            (place.pm_ra_mas, "pm_ra_mas"),
            (place.pm_dec_mas, "pm_dec_mas"),
            (place.parallax_mas, "parallax_mas"),
            (target.magnitude.unwrap(), "hp"),
        ] {
            assert!((value - number(&row, column)).abs() < SAME_DEG, "{row:?}");
        }
        assert_eq!(target.constellation, constellation(&row["constellation"]));
        assert_eq!((target.kind, target.catalogue), (Kind::Star, Origin::Stars));
    }
}

#[test]
fn stars_stand_in_all_88_constellations() {
    let rows = rows("stars.csv");
    for constellation in &CONSTELLATIONS {
        let abbreviation = constellation.abbreviation;
        assert!(
            rows.iter().any(|row| row["constellation"] == abbreviation),
            "{abbreviation}"
        );
    }
}

#[test]
fn every_name_of_a_star_leads_to_that_star() {
    let catalogue = Catalogue::builtin();
    for row in rows("star-names.csv") {
        let own = constellation(&row["constellation"]).unwrap();
        let mut names: Vec<String> = row["names"].split(';').map(str::to_owned).collect();
        for before in [&row["bayer"], &row["flamsteed"]] {
            for after in [own.abbreviation, own.name, own.genitive] {
                if !before.is_empty() {
                    names.push(format!("{before} {after}"));
                    names.push(format!("{before}{after}").to_uppercase());
                }
            }
        }
        if let Some(letter) = Greek::named(row["bayer"].split(' ').next().unwrap()) {
            let component = row["bayer"].trim_start_matches(letter.name());
            names.push(format!("{}{component} {own}", letter.letter()));
        } else {
            assert_eq!(row["bayer"], "", "not a Greek letter");
        }
        for name in names.iter().filter(|name| !name.is_empty()) {
            let target = catalogue.resolve(name).unwrap();
            let hip = format!("HIP {}", row["hip"]);
            assert!(
                target.also.contains(&hip),
                "{name} is {target:?}, not {hip}"
            );
        }
    }
}

#[test]
fn every_name_of_a_messier_object_leads_to_that_object() {
    let catalogue = Catalogue::builtin();
    for row in rows("messier.csv") {
        let number = row["name"].strip_prefix("M ").unwrap();
        let spellings = [
            row["name"].clone(),
            format!("m{number}"),
            format!("M0{number}"),
            format!("Messier {number}"),
        ];
        let also = row["also"].split(';').filter(|name| !name.is_empty());
        for name in spellings.iter().map(String::as_str).chain(also) {
            let target = catalogue.resolve(name).unwrap();
            assert_eq!(target.name, row["name"], "{name}");
            assert_at(&target, &row);
        }
        let target = catalogue.resolve(&row["name"]).unwrap();
        assert_eq!(target.kind.words(), row["kind"], "{row:?}");
        assert_eq!(target.constellation, constellation(&row["constellation"]));
        assert_eq!(
            target
                .magnitude
                .map_or(String::new(), |m| format!("{m:.1}")),
            row["magnitude"]
        );
        assert!(target.size_arcmin.is_some(), "{row:?}");
    }
}

#[test]
fn every_name_of_the_ngc_and_ic_leads_to_that_object() {
    let catalogue = Catalogue::builtin();
    let mut messier = 0;
    for row in rows("ngc.csv") {
        let also = || row["also"].split(';').filter(|name| !name.is_empty());
        let of_messier = also().find(|name| name.starts_with("M "));
        let own = of_messier.unwrap_or(&row["name"]);
        messier += usize::from(of_messier.is_some());
        for name in std::iter::once(row["name"].as_str()).chain(also()) {
            let target = catalogue.resolve(name).unwrap();
            assert_eq!(target.name, own, "{name}");
        }
        if of_messier.is_none() {
            let target = catalogue.resolve(own).unwrap();
            assert_at(&target, &row);
            assert_eq!(target.kind.words(), row["kind"], "{row:?}");
            assert_eq!(target.constellation, constellation(&row["constellation"]));
            assert_eq!(
                target.size_arcmin.is_some(),
                !row["major_arcmin"].is_empty()
            );
            assert_eq!(target.magnitude.is_some(), !row["magnitude"].is_empty());
            assert_eq!(target.catalogue, Origin::Ngc);
        }
    }
    assert!(
        messier > 100,
        "{messier} of Messier's objects have a number in the NGC"
    );
}

#[test]
fn the_tables_are_written_as_they_are_read() {
    for file in ["stars.csv", "star-names.csv", "messier.csv", "ngc.csv"] {
        let text = fs::read_to_string(folder().join(file)).unwrap();
        let rows = text.lines().filter(|line| !line.starts_with('#'));
        let columns = rows.clone().next().unwrap().split(',').count();
        for row in rows {
            assert!(!row.contains('"'), "{file}: {row}");
            assert_eq!(row.split(',').count(), columns, "{file}: {row}");
        }
    }
}

#[test]
fn every_body_of_the_solar_system_is_found_in_any_case() {
    let catalogue = Catalogue::builtin();
    for body in Body::ALL {
        for name in [body.name().to_lowercase(), format!("the {}", body.name())] {
            assert_eq!(catalogue.resolve(&name).unwrap().source, Source::Body(body));
        }
    }
}

#[test]
fn what_an_observer_writes_is_understood() {
    let catalogue = Catalogue::builtin();
    for (text, name) in [
        ("M 37", "M 37"),
        ("m37", "M 37"),
        ("Messier 37", "M 37"),
        ("NGC 2099", "M 37"),
        ("ngc2099", "M 37"),
        ("HIP 91262", "Vega"),
        ("vega", "Vega"),
        ("alpha Lyrae", "Vega"),
        ("alpha Lyr", "Vega"),
        ("alf Lyr", "Vega"),
        ("α Lyr", "Vega"),
        ("61 Cygni", "61 Cyg"),
        ("61 Cyg", "61 Cyg"),
        ("eps1 Lyr", "epsilon 1 Lyr"),
        ("epsilon 1 Lyrae", "epsilon 1 Lyr"),
        ("ε¹ Lyrae", "epsilon 1 Lyr"),
        ("R Leo", "R Leonis"),
        ("Barnards star", "Barnard's Star"),
        ("the Moon", "Moon"),
        ("NGC 20", "NGC 6"),
        ("ngc0457", "NGC 457"),
        ("ic 1396", "IC 1396"),
        ("Rosette Nebula", "Rosette Nebula"),
        ("Collinder 399", "Cr 399"),
        ("coathanger", "Cr 399"),
        ("Barnard 33", "B 33"),
        ("05:52:18.3 +32:33:11", "05:52:18.3 +32:33:11"),
    ] {
        let target = catalogue
            .resolve(text)
            .unwrap_or_else(|wrong| panic!("{wrong}"));
        let known = target.name == name || target.also.iter().any(|also| also == name);
        assert!(known, "{text} is {target:?}");
    }
}

#[test]
fn a_letter_without_its_number_is_one_close_pair_or_a_question() {
    let catalogue = Catalogue::builtin();
    let pair = catalogue.resolve("epsilon Lyrae").unwrap();
    assert!(pair.name.starts_with("epsilon "), "{pair:?}");
    let Err(Unresolved::Several { choices, .. }) = catalogue.resolve("pi Orionis") else {
        panic!("pi Orionis is six stars along nine degrees");
    };
    assert!(choices.len() >= 4 && choices.iter().all(|name| catalogue.resolve(name).is_ok()));
}

#[test]
fn a_slip_brings_the_right_name_as_a_suggestion() {
    let catalogue = Catalogue::builtin();
    for (slip, name) in [
        ("Betelguese", "Betelgeuse"),
        ("wega", "Vega"),
        ("aldeberan", "Aldebaran"),
    ] {
        let Err(Unresolved::Unknown { nearest, .. }) = catalogue.resolve(slip) else {
            panic!("{slip} is no name");
        };
        assert_eq!(nearest.first().map(String::as_str), Some(name), "{slip}");
    }
    assert!(catalogue.resolve("M 111").is_err());
    assert!(catalogue.resolve("").is_err());
}

#[test]
fn coordinates_of_b1950_come_to_the_place_of_today() {
    // M 37 at B1950: 5h49.1m +32°33' (from memory of older catalogues, to their last digit)
    let catalogue = Catalogue::builtin();
    let given = catalogue.resolve("05:49:00 +32:32:30 @B1950").unwrap();
    let given = Catalogue::fixed_place(&given).unwrap();
    let known = place(&catalogue.resolve("M 37").unwrap());
    let apart = separation(
        (given.right_ascension.angle(), given.declination),
        (known.right_ascension.angle(), known.declination),
    );
    assert!(apart.arcminutes() < 3.0, "{}'", apart.arcminutes());
}

#[test]
fn bright_stars_are_all_there_and_the_brightest_is_first() {
    let bright = Catalogue::builtin().bright_stars(2.5);
    let expected = rows("stars.csv")
        .iter()
        .filter(|row| number(row, "hp") <= 2.5)
        .count();
    assert_eq!(bright.len(), expected);
    assert_eq!(
        bright.first().map(|star| star.name.as_str()),
        Some("Sirius")
    );
    assert!(bright.is_sorted_by(|a, b| a.magnitude <= b.magnitude));
    let unnamed: Vec<_> = bright
        .iter()
        .filter(|star| star.name.starts_with("HIP"))
        .collect();
    assert!(unnamed.is_empty(), "{unnamed:?}");
}

#[test]
fn a_search_finds_every_object_by_its_own_name_first() {
    let catalogue = Catalogue::builtin();
    for row in rows("messier.csv") {
        let found = catalogue.search(&row["name"], &Filter::default());
        assert_eq!(
            found.first().map(|found| found.target.name.as_str()),
            Some(row["name"].as_str())
        );
        assert!(found.is_sorted_by(|a, b| a.score >= b.score));
    }
    let found = catalogue.search("owl clus", &Filter::default());
    let owl = &found[0].target;
    assert_eq!(
        (owl.name.as_str(), owl.kind),
        ("NGC 457", Kind::OpenCluster)
    );
}

/// The name of a line of a list: what stands before two spaces, a tab or a `#`.
fn listed_name(line: &str) -> &str {
    let line = line.split('#').next().unwrap().trim_end();
    line.split(['\t'])
        .next()
        .unwrap()
        .split("  ")
        .next()
        .unwrap()
        .trim()
}

#[test]
fn every_name_of_the_built_in_lists_is_known() {
    let catalogue = Catalogue::builtin();
    let lists: Vec<PathBuf> = fs::read_dir(folder().join("lists"))
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|extension| extension == "txt"))
        .collect();
    assert!(!lists.is_empty());
    for path in lists {
        let text = fs::read_to_string(&path).unwrap();
        let names: Vec<_> = text
            .lines()
            .map(listed_name)
            .filter(|name| !name.is_empty())
            .collect();
        assert!(!names.is_empty(), "{}", path.display());
        for name in names {
            if let Err(wrong) = catalogue.resolve(name) {
                panic!("{}: {wrong}", path.display());
            }
        }
    }
}

#[test]
fn every_double_in_its_table_is_a_star_with_a_pair_that_can_be_seen() {
    let catalogue = Catalogue::builtin();
    for row in rows("doubles.csv") {
        let star = catalogue.resolve(&format!("HIP {}", row["hip"])).unwrap();
        assert_eq!(star.catalogue, Origin::Stars, "{row:?}");
        assert!(number(&row, "separation_arcsec") > 0.5, "{row:?}");
        assert!(
            (0.0..=360.0).contains(&number(&row, "angle_deg")),
            "{row:?}"
        );
        assert!(number(&row, "secondary") < 12.0, "{row:?}");
        assert!((1990.0..2027.0).contains(&number(&row, "epoch")), "{row:?}");
        assert!(["gaia", "hipparcos", "memory"].contains(&row["source"].as_str()));
    }
}

#[test]
fn every_variable_in_its_table_is_a_star_within_its_range() {
    /// Hp may lie so far outside the range in V; the table's own margin.
    const MARGIN_MAG: f64 = 0.6;
    let catalogue = Catalogue::builtin();
    for row in rows("variables.csv") {
        let star = catalogue.resolve(&format!("HIP {}", row["hip"])).unwrap();
        let (brightest, faintest) = (number(&row, "brightest"), number(&row, "faintest"));
        let hp = star.magnitude.unwrap();
        assert!(brightest < faintest, "{row:?}");
        assert!(
            hp > brightest - MARGIN_MAG && hp < faintest + MARGIN_MAG,
            "{row:?}: Hp {hp}"
        );
        if !row["epoch_jd"].is_empty() {
            assert!(number(&row, "period_days") > 0.0, "{row:?}");
            assert!(
                ["minimum", "maximum"].contains(&row["event"].as_str()),
                "{row:?}"
            );
        }
    }
}
