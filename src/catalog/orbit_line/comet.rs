//! A line of the Minor Planet Center's one-line format for comets' elements.
//!
//! | columns | what |
//! |---|---|
//! | 1-4, 5, 6-12 | number of a periodic comet, kind of orbit, packed provisional designation |
//! | 15-18, 20-21, 23-29 | year, month and day of perihelion, TT |
//! | 31-39 | perihelion distance, au |
//! | 42-49 | eccentricity |
//! | 52-59, 62-69, 72-79 | argument of perihelion, node, inclination; degrees, J2000.0 |
//! | 82-89 | epoch, year month day, 0h TT; blank where the planets were left out |
//! | 92-95, 97-100 | absolute magnitude and the power n of the distance from the Sun; may be blank |
//! | 103-158 | designation and name |

use crate::angle::Angle;
use crate::bounds::{
    ABSOLUTE_MAGNITUDE, ARGUMENT_OF_PERIHELION, DAY, ECCENTRICITY_OF_AN_ORBIT, INCLINATION, MONTH,
    NODE, PERIHELION_DISTANCE, POWER_OF_DISTANCE, YEAR,
};
use crate::catalog::orbit_line::columns::Columns;
use crate::catalog::{Kind, Origin, Target, clean};
use crate::sexagesimal::TextFault;
use crate::sky::{Brightness, Orbit, Source};
use crate::time::Tt;

/// The power of the distance where none is stated, the usual one.
const USUAL_POWER: f64 = 4.0;

/// Columns between the fields.
const BLANK: [usize; 18] = [
    13, 14, 19, 22, 30, 40, 41, 50, 51, 60, 61, 70, 71, 80, 81, 90, 91, 96,
];

const HINT_DATE: &str = "dates are year, month and day in their columns, as in 1997 03 29.6333";

/// The target of a line.
pub fn read(line: &str) -> Result<Target, TextFault> {
    let columns = Columns(line);
    columns.blank(&BLANK)?;
    let perihelion = date(columns, [(15, 18), (20, 21), (23, 29)])?
        .ok_or_else(|| columns.wrong(15, 29, "the date of perihelion is missing", HINT_DATE))?;
    let epoch = date(columns, [(82, 85), (86, 87), (88, 89)])?;
    let power = columns
        .number(97, 100, POWER_OF_DISTANCE)?
        .unwrap_or(USUAL_POWER);
    let brightness =
        columns
            .number(92, 95, ABSOLUTE_MAGNITUDE)?
            .map_or(Brightness::Unknown, |absolute| Brightness::Comet {
                absolute,
                power,
            });
    let name = columns.text(103, 158)?.map(clean).ok_or_else(|| {
        columns.wrong(
            103,
            158,
            "the comet has no name",
            "its designation and name stand in columns 103 to 158",
        )
    })?;
    let note = match (
        columns.text(82, 85)?,
        columns.text(86, 87)?,
        columns.text(88, 89)?,
    ) {
        (Some(year), Some(month), Some(day)) => format!("elements of {year}-{month:0>2}-{day:0>2}"),
        _ => "elements without an epoch".to_owned(),
    };
    Ok(Target {
        also: other_names(&name),
        name,
        kind: Kind::Comet,
        source: Source::Orbit(Orbit {
            perihelion_distance_au: columns.needed(31, 39, PERIHELION_DISTANCE)?,
            eccentricity: columns.needed(42, 49, ECCENTRICITY_OF_AN_ORBIT)?,
            inclination: Angle::from_degrees(columns.needed(72, 79, INCLINATION)?),
            node: Angle::from_degrees(columns.needed(62, 69, NODE)?),
            argument_of_perihelion: Angle::from_degrees(columns.needed(
                52,
                59,
                ARGUMENT_OF_PERIHELION,
            )?),
            perihelion,
            epoch,
            brightness,
        }),
        magnitude: None,
        size_arcmin: None,
        constellation: None,
        catalogue: Origin::Orbits,
        note,
    })
}

/// A date in three fields; nothing if all are blank.
fn date(columns: Columns, fields: [(usize, usize); 3]) -> Result<Option<Tt>, TextFault> {
    let [(first, year_end), month, (day_start, last)] = fields;
    if columns.text(first, last)?.is_none() {
        return Ok(None);
    }
    let whole = |(from, to): (usize, usize), bound| {
        let number = columns.needed(from, to, bound)?;
        #[allow(clippy::cast_possible_truncation)] // within its bound
        let whole = number as i32;
        if (number - f64::from(whole)).abs() > 0.0 {
            return Err(columns.wrong(from, to, "this is no whole number", HINT_DATE));
        }
        Ok(whole)
    };
    let (year, month) = (whole((first, year_end), YEAR)?, whole(month, MONTH)?);
    let day = columns.needed(day_start, last, DAY)?;
    Tt::of_date(year, month, day)
        .map(Some)
        .ok_or_else(|| columns.wrong(first, last, "there is no such day", HINT_DATE))
}

/// "C/1995 O1 (Hale-Bopp)" is also "C/1995 O1" and "Hale-Bopp"; "2P/Encke" also "2P" and "Encke".
fn other_names(name: &str) -> Vec<String> {
    let parts = match name.split_once('(') {
        Some((designation, discoverer)) => [designation, discoverer.trim_end_matches(')')],
        None => match name.split_once('/') {
            Some((number, discoverer)) if number.starts_with(|c: char| c.is_ascii_digit()) => {
                [number, discoverer]
            }
            _ => return Vec::new(),
        },
    };
    let named = parts
        .iter()
        .map(|part| part.trim())
        .filter(|part| !part.is_empty());
    named.map(str::to_owned).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_comet_goes_by_its_designation_and_by_its_name() {
        for (name, others) in [
            (
                "C/2023 A3 (Tsuchinshan-ATLAS)",
                &["C/2023 A3", "Tsuchinshan-ATLAS"][..],
            ),
            ("2P/Encke", &["2P", "Encke"]),
            ("C/2020 X9", &[]),
        ] {
            assert_eq!(other_names(name), others, "{name}");
        }
    }
}
