//! Coordinates as a target: `05:52:18.3 +32:33:11`, `5h52m18s +32d33m`, `88.076d +32.55d`, and an
//! equinox after `@` if it is not J2000.
//!
//! A right ascension is sexagesimal hours, or a number with its unit. A single bare number could be
//! hours or degrees, and is not guessed at.

use std::ops::Range;

use crate::angle::{Declination, RightAscension};
use crate::bounds::{Bound, DECLINATION, RIGHT_ASCENSION};
use crate::catalog::target::Origin;
use crate::catalog::{Kind, Target};
use crate::sexagesimal::{self, Half, TextFault, Unit, Written};
use crate::sky::{CataloguePlace, Equinox, EquinoxFault, Source};

const HINT_PLACE: &str = "write a place as in 05:52:18.3 +32:33:11 or 88.076d +32.55d";
const HINT_UNIT: &str = "write sexagesimal hours as in 5h 52m or 05:52:18, or degrees as in 88.1d";

/// True for a text that starts as a number does and has nothing but the marks of angles before its `@`.
#[must_use]
pub fn looks_like(text: &str) -> bool {
    let place = text.split('@').next().unwrap_or("").trim();
    let number = place.trim_start_matches(is_sign).trim_start();
    number.starts_with(|c: char| c.is_ascii_digit() || c == '.')
        && (text.contains('@') || place.chars().all(is_of_an_angle))
}

const fn is_sign(c: char) -> bool {
    matches!(c, '+' | '-' | '−' | '–')
}

fn is_of_an_angle(c: char) -> bool {
    c.is_ascii_digit() || c.is_whitespace() || is_sign(c) || ".,:;hHmMdDsSnN°º'′’\"″”".contains(c)
}

/// Reads coordinates into a target named by its text.
pub fn read(text: &str) -> Result<Target, TextFault> {
    let name = text.trim();
    let place = read_place(text)?;
    Ok(Target {
        name: name.split_whitespace().collect::<Vec<_>>().join(" "),
        also: Vec::new(),
        kind: Kind::Place,
        source: Source::Catalogue(place),
        magnitude: None,
        size_arcmin: None,
        constellation: None,
        catalogue: Origin::Given,
        note: String::new(),
    })
}

/// Reads coordinates; the epoch is that of the equinox.
fn read_place(text: &str) -> Result<CataloguePlace, TextFault> {
    let (angles, equinox) = match text.split_once('@') {
        None => (text, Equinox::J2000),
        Some((angles, equinox)) => {
            let from = angles.len() + 1;
            let read = read_equinox(equinox).map_err(|fault| moved(fault, from))?;
            (angles, read)
        }
    };
    let (ra, dec_from) = part(angles)?;
    let right_ascension = read_right_ascension(ra)?;
    let dec = angles.get(dec_from..).unwrap_or("");
    let declination = read_declination(dec).map_err(|fault| moved(fault, dec_from))?;
    Ok(CataloguePlace {
        equinox,
        epoch: equinox.epoch(),
        ..CataloguePlace::icrs(right_ascension, declination)
    })
}

/// Parts the right ascension from the declination, which begins at the second number returned.
fn part(angles: &str) -> Result<(&str, usize), TextFault> {
    let leading = angles.len()
        - angles
            .trim_start_matches(|c| is_sign(c) || char::is_whitespace(c))
            .len();
    let rest = angles.get(leading..).unwrap_or("");
    let found = rest
        .find(is_sign)
        .map(|at| (leading + at, leading + at))
        .or_else(|| rest.find(',').map(|at| (leading + at, leading + at + 1)));
    let Some((ends, begins)) = found else {
        return Err(fault(
            angles.len()..angles.len(),
            "the sign of the declination is missing",
            HINT_PLACE,
        ));
    };
    let ra = angles.get(..ends).unwrap_or("");
    Ok((ra.trim_end().trim_end_matches([',', ';']), begins))
}

/// Reads an equinox as it stands after the `@` or in the field of a list.
pub fn read_equinox(text: &str) -> Result<Equinox, TextFault> {
    text.parse()
        .map_err(|wrong: EquinoxFault| fault(inner(text), &wrong.to_string(), EquinoxFault::HINT))
}

/// Reads a right ascension: sexagesimal hours, or a number with its unit.
pub fn read_right_ascension(text: &str) -> Result<RightAscension, TextFault> {
    let written = sexagesimal::read(text, Unit::Hours)?;
    if written.half.is_some() {
        return Err(fault(
            inner(text),
            "a right ascension has no such letter",
            HINT_UNIT,
        ));
    }
    let one_number = !text
        .trim()
        .contains(|c: char| c == ':' || c.is_whitespace());
    if one_number && !written.unit_was_named {
        return Err(fault(
            inner(text),
            "these could be hours or degrees",
            HINT_UNIT,
        ));
    }
    bounded(text, &written, RIGHT_ASCENSION).map(RightAscension::from_degrees)
}

/// Reads a declination in degrees, north positive, or with N or S after it.
pub fn read_declination(text: &str) -> Result<Declination, TextFault> {
    let written = sexagesimal::read(text, Unit::Degrees)?;
    if written.unit == Unit::Hours {
        return Err(fault(
            inner(text),
            "a declination is in degrees",
            HINT_PLACE,
        ));
    }
    let written = match written.half {
        None | Some(Half::North) => written,
        Some(Half::South) => Written {
            negative: Some(true),
            ..written
        },
        Some(Half::East | Half::West) => {
            return Err(fault(
                inner(text),
                "a declination is north or south",
                HINT_PLACE,
            ));
        }
    };
    bounded(text, &written, DECLINATION).map(Declination::from_degrees)
}

fn bounded(text: &str, written: &Written, bound: Bound) -> Result<f64, TextFault> {
    bound
        .check(written.signed().degrees())
        .map_err(|out| fault(inner(text), &out.to_string(), HINT_PLACE))
}

/// Where the text is without the space around it.
fn inner(text: &str) -> Range<usize> {
    let start = text.len() - text.trim_start().len();
    start..start + text.trim().len()
}

fn fault(at: Range<usize>, message: &str, hint: &'static str) -> TextFault {
    TextFault {
        at,
        message: message.to_owned(),
        hint,
    }
}

/// The same fault in a text that begins earlier.
fn moved(fault: TextFault, by: usize) -> TextFault {
    TextFault {
        at: fault.at.start + by..fault.at.end + by,
        ..fault
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    /// Rounding of a sum of three parts, in degrees.
    const ROUNDING_DEG: f64 = 1e-9;

    #[test]
    fn one_place_in_many_ways() {
        for text in [
            "05:52:18.3 +32:33:11",
            " 05 52 18.3  +32 33 11 ",
            "5h52m18.3s +32d33m11s",
            "5h 52m 18.3s, 32° 33' 11\" N",
            "05:52:18.3,32:33:11",
            "88.07625d+32.553055555556d",
            "88.07625° +32.553055555556",
            "05:52:18.3 +32:33:11@J2000",
        ] {
            assert!(looks_like(text), "{text}");
            let place = read_place(text).unwrap();
            assert!(
                (place.right_ascension.degrees() - 88.076_25).abs() < ROUNDING_DEG,
                "{text}"
            );
            assert!(
                (place.declination.degrees() - 32.553_055_555_556).abs() < ROUNDING_DEG,
                "{text}"
            );
            assert_eq!(place.equinox, Equinox::J2000, "{text}");
        }
    }

    #[test]
    fn south_may_be_a_sign_of_any_kind_or_a_letter() {
        for text in [
            "1:00:00 -5:30:00",
            "1:00:00 −5:30:00",
            "1:00:00 – 5 30",
            "1 00 00, 5 30 S",
        ] {
            let place = read_place(text).unwrap();
            assert!(
                (place.declination.degrees() + 5.5).abs() < ROUNDING_DEG,
                "{text}"
            );
        }
        assert!(
            (read_place("1:00 -0:30").unwrap().declination.degrees() + 0.5).abs() < ROUNDING_DEG
        );
    }

    #[test]
    fn the_equinox_follows_the_at_sign_and_sets_the_epoch() {
        for (written, equinox) in [
            ("@B1950", Equinox::B1950),
            (" @ J2026.9", Equinox::Julian(2026.9)),
            ("@date", Equinox::OfDate),
            ("@ICRS", Equinox::Icrs),
        ] {
            let place = read_place(&format!("05:52:18.3 +32:33:11{written}")).unwrap();
            assert_eq!(place.equinox, equinox);
            assert!((place.epoch - equinox.epoch()).abs() < ROUNDING_DEG);
        }
    }

    #[test]
    fn what_is_wrong_is_pointed_at_within_the_whole_text() {
        for (text, at, message) in [
            ("05:61:00 +32", 3..5, "minutes and seconds stay below 60"),
            (
                "05:52:18 +32:61",
                13..15,
                "minutes and seconds stay below 60",
            ),
            (
                "05:52:18 +95:00",
                9..15,
                "declination 95 is outside -90 to 90 degrees",
            ),
            (
                "25:00:00 +32:00",
                0..8,
                "right ascension 375 is outside 0 to 360 degrees",
            ),
            ("88.1 +32.5", 0..4, "these could be hours or degrees"),
            (
                "05:52:18 32:33:11",
                17..17,
                "the sign of the declination is missing",
            ),
            ("5h52m +2h", 6..9, "a declination is in degrees"),
            (
                "05:52:18 +32:33:11 @1950",
                20..24,
                "the year 1950 needs its letter: J for Julian, B for Besselian",
            ),
            ("05:52:18 +32:33:11@K9", 19..21, "\"K9\" is not an equinox"),
        ] {
            assert!(looks_like(text), "{text}");
            let fault = read(text).unwrap_err();
            assert_eq!((fault.at, fault.message.as_str()), (at, message), "{text}");
        }
    }

    #[test]
    fn a_name_is_not_taken_for_a_place() {
        for name in [
            "61 Cygni",
            "M 37",
            "47 Tuc",
            "30 Doradus",
            "3C 273",
            "Vega",
            "",
            "NGC 2099",
        ] {
            assert!(!looks_like(name), "{name}");
        }
    }

    proptest! {
        #[test]
        fn reading_never_panics_and_faults_lie_within_the_text(text in "[0-9:+\\-−., hmdsNS°'@JB]{0,24}|\\PC{0,24}") {
            let _ = looks_like(&text);
            if let Err(fault) = read(&text) {
                prop_assert!(fault.at.end <= text.len() && fault.at.start <= fault.at.end);
                prop_assert!(text.get(fault.at).is_some());
            }
        }
    }
}
