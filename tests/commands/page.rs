//! The page for people prints the numbers that programs get.

use serde_json::Value;

use crate::program::{Home, number, repository, text};

const AT: &str = "2026-12-01T21:30:00Z";

/// The page and the value of the same question.
fn both(words: &[&str]) -> (String, Value) {
    let home = Home::new();
    let words = [&["dial", "--at", AT][..], words].concat();
    (home.out(&words), home.json(&words))
}

/// What stands beside the label in a block of the page.
fn beside<'a>(block: &'a str, label: &str) -> &'a str {
    let found = block
        .lines()
        .find_map(|line| line.strip_prefix("  ")?.strip_prefix(label));
    found
        .unwrap_or_else(|| panic!("no {label} in\n{block}"))
        .trim()
}

/// Hours and minutes of an angle in degrees, to the minute.
fn hours_and_minutes(degrees: f64) -> String {
    let minutes = (degrees * 4.0).round();
    format!("{}h {:02}m", (minutes / 60.0).floor(), minutes % 60.0)
}

fn uncertainty(arcminutes: f64) -> String {
    match arcminutes / 60.0 {
        wide if wide >= 3.0 => format!("{wide:.0}°"),
        wide if wide >= 1.0 => format!("{wide:.1}°"),
        _ => format!("{:.0}'", arcminutes.max(1.0)),
    }
}

fn assert_same(block: &str, dial: &Value) {
    assert!(block.starts_with(text(dial, "/target")), "{block}");
    let side = text(dial, "/side");
    assert_eq!(beside(block, "side"), side.replace('-', " "));
    for circle in ["hour", "declination"] {
        let setting = text(dial, &format!("/{circle}_circle/text"));
        let printed = beside(block, &format!("{circle} circle"));
        assert!(printed.starts_with(&format!("{setting}  ")), "{block}");
    }
    let mark = &dial["hour_circle"]["next_mark"];
    assert_eq!(
        beside(block, "next mark"),
        format!(
            "{} at {} UTC, in {:.0} s, with the drive off",
            text(mark, "/text"),
            &text(mark, "/utc")[11..19],
            number(mark, "/wait_s")
        )
    );
    let stands = beside(block, "stands");
    let altitude = number(dial, "/observed/altitude_deg");
    let azimuth = number(dial, "/observed/azimuth_deg");
    assert!(
        stands.starts_with(&format!("altitude {altitude:.0}°, azimuth {azimuth:.0}° (")),
        "{block}"
    );
    let (hour, dec) = (
        number(dial, "/swing/hour_deg"),
        number(dial, "/swing/dec_deg"),
    );
    let hour_way = if hour < 0.0 { "east" } else { "west" };
    let dec_way = if (dec >= 0.0) == (side == "tube-west") {
        "north"
    } else {
        "south"
    };
    let swing = format!(
        "{} {hour_way}, {:.0}° {dec_way}",
        hours_and_minutes(hour.abs()),
        dec.abs()
    );
    assert_eq!(beside(block, "swing"), swing);
    let known = format!(
        "{} on the hour circle, {} on the declination circle (1 sigma)",
        uncertainty(number(dial, "/uncertainty/hour_arcmin")),
        uncertainty(number(dial, "/uncertainty/dec_arcmin"))
    );
    assert_eq!(beside(block, "known to"), known);
    let chances: Vec<String> = dial["chances"]
        .as_array()
        .unwrap()
        .iter()
        .map(|chance| {
            let percent = (number(chance, "/probability") * 100.0).clamp(1.0, 99.0);
            format!("{} {percent:.0} %", text(chance, "/optic"))
        })
        .collect();
    assert_eq!(beside(block, "first look"), chances.join(", "));
    let (slit, up) = (
        number(dial, "/dome/azimuth_deg"),
        number(dial, "/dome/altitude_deg"),
    );
    assert_eq!(
        beside(block, "slit"),
        format!("azimuth {slit:.0}°, altitude {up:.0}°")
    );
    let (east, north) = (
        number(dial, "/eyepiece/east_m"),
        number(dial, "/eyepiece/north_m"),
    );
    assert_eq!(
        beside(block, "eyepiece"),
        format!(
            "{:.1} m above the floor, {:.1} m {} and {:.1} m {} of the axes",
            number(dial, "/eyepiece/height_m"),
            east.abs(),
            if east < 0.0 { "west" } else { "east" },
            north.abs(),
            if north < 0.0 { "south" } else { "north" }
        )
    );
    let printed = block.lines().filter(|line| line.starts_with("  caution"));
    let cautions = dial["cautions"].as_array().unwrap();
    assert_eq!(printed.clone().count(), cautions.len(), "{block}");
    for (line, caution) in printed.zip(cautions) {
        assert!(line.ends_with(text(caution, "/text")), "{line}");
    }
}

#[test]
fn every_number_of_the_page_is_that_of_the_json() {
    let readings = repository("tests/files/good/readings-tarn-hollow.csv");
    for side in ["auto", "tube-east"] {
        let (page, sheet) = both(&[
            "M 37",
            "M 31",
            "Antares",
            "Saturn",
            "--side",
            side,
            "--readings",
            &readings,
        ]);
        let blocks: Vec<&str> = page.split("\n\n").collect();
        let dials = sheet["dials"].as_array().unwrap();
        assert_eq!((blocks.len(), dials.len()), (5, 4), "{page}");
        // a clock shows the second that has begun
        let begun = (number(&sheet, "/sidereal/apparent_deg") * 240.0).floor();
        let sidereal = format!(
            "sidereal {}h {:02}m {:02}s · civil 21:30:00 · UTC 21:30:00",
            (begun / 3600.0).floor(),
            (begun / 60.0).floor() % 60.0,
            begun % 60.0
        );
        assert_eq!(blocks[0].lines().nth(1), Some(sidereal.as_str()));
        for (block, dial) in blocks[1..].iter().zip(dials) {
            assert_same(block, dial);
        }
    }
}

#[test]
fn what_is_null_has_no_line_and_what_is_not_dialled_says_why() {
    let (page, sheet) = both(&["M 42", "Nonesuch", "--site", "saltpan-ridge"]);
    let blocks: Vec<&str> = page.split("\n\n").collect();
    assert_eq!(blocks.len(), 3, "{page}");
    for label in ["next mark", "swing", "known to", "first look", "slit"] {
        assert!(!blocks[1].contains(label), "{page}");
    }
    assert_eq!(
        beside(blocks[1], "hour circle").split("  ").next(),
        sheet
            .pointer("/dials/0/hour_circle/text")
            .and_then(Value::as_str)
    );
    let reason = text(&sheet, "/not_dialled/0/reason");
    assert_eq!(blocks[2].trim(), format!("Nonesuch: {reason}"));
    // civil time is the site's: two hours before UTC there
    assert!(
        blocks[0].contains("civil 23:30:00 · UTC 21:30:00"),
        "{page}"
    );
}
