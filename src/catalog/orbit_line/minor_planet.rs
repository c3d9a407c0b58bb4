//! A line of the Minor Planet Center's export format for minor-planet orbits.
//!
//! | columns | what |
//! |---|---|
//! | 1-7 | number or provisional designation, packed |
//! | 9-13, 15-19 | absolute magnitude H, slope parameter G; may be blank |
//! | 21-25 | epoch, packed, 0h TT |
//! | 27-35 | mean anomaly at the epoch, degrees |
//! | 38-46, 49-57, 60-68 | argument of perihelion, node, inclination; degrees, J2000.0 |
//! | 71-79 | eccentricity |
//! | 93-103 | semimajor axis, au |
//! | 167-194 | number and name in words; may be blank |

use crate::angle::Angle;
use crate::bounds::{
    ABSOLUTE_MAGNITUDE, ARGUMENT_OF_PERIHELION, ECCENTRICITY_OF_AN_ELLIPSE, INCLINATION,
    MEAN_ANOMALY, NODE, SEMIMAJOR_AXIS, SLOPE_PARAMETER,
};
use crate::catalog::orbit_line::columns::Columns;
use crate::catalog::orbit_line::packed;
use crate::catalog::{Kind, Origin, Target};
use crate::sexagesimal::TextFault;
use crate::sky::{Brightness, Orbit, Source};
use crate::time::Tt;

/// The slope parameter where none is stated, the usual one.
const USUAL_SLOPE: f64 = 0.15;

/// Columns between the fields.
const BLANK: [usize; 12] = [8, 14, 20, 26, 36, 37, 47, 48, 58, 59, 69, 70];

/// The target of a line.
pub fn read(line: &str) -> Result<Target, TextFault> {
    let columns = Columns(line);
    columns.blank(&BLANK)?;
    let (year, month, day) = packed::date(columns.raw(21, 25)?).ok_or_else(|| {
        columns.wrong(
            21,
            25,
            "this is no packed epoch",
            "an epoch is packed as in K205V for 2020 May 31",
        )
    })?;
    let epoch = Tt::of_date(year, month, f64::from(day)).ok_or_else(|| {
        columns.wrong(
            21,
            25,
            "there is no such day",
            "an epoch is packed as in K205V for 2020 May 31",
        )
    })?;
    let semimajor_axis_au = columns.needed(93, 103, SEMIMAJOR_AXIS)?;
    let eccentricity = columns.needed(71, 79, ECCENTRICITY_OF_AN_ELLIPSE)?;
    let mean_anomaly = Angle::from_degrees(columns.needed(27, 35, MEAN_ANOMALY)?);
    let slope = columns
        .number(15, 19, SLOPE_PARAMETER)?
        .unwrap_or(USUAL_SLOPE);
    let brightness =
        columns
            .number(9, 13, ABSOLUTE_MAGNITUDE)?
            .map_or(Brightness::Unknown, |absolute| Brightness::MinorPlanet {
                absolute,
                slope,
            });
    let (name, also) = names(columns)?;
    Ok(Target {
        name,
        also,
        kind: Kind::MinorPlanet,
        source: Source::Orbit(Orbit {
            perihelion_distance_au: semimajor_axis_au * (1.0 - eccentricity),
            eccentricity,
            inclination: Angle::from_degrees(columns.needed(60, 68, INCLINATION)?),
            node: Angle::from_degrees(columns.needed(49, 57, NODE)?),
            argument_of_perihelion: Angle::from_degrees(columns.needed(
                38,
                46,
                ARGUMENT_OF_PERIHELION,
            )?),
            perihelion: Orbit::perihelion_of(epoch, mean_anomaly, semimajor_axis_au),
            epoch: Some(epoch),
            brightness,
        }),
        magnitude: None,
        size_arcmin: None,
        constellation: None,
        catalogue: Origin::Orbits,
        note: format!("elements of {year}-{month:02}-{day:02}"),
    })
}

/// The name it goes by and others: "(1) Ceres" and "Ceres", "2024 AH".
fn names(columns: Columns) -> Result<(String, Vec<String>), TextFault> {
    let packed = columns.text(1, 7)?.and_then(packed::designation);
    let Some(words) = columns.text(167, 194)? else {
        return packed.map(|name| (name, Vec::new())).ok_or_else(|| {
            columns.wrong(
                1,
                7,
                "this is no packed number or designation, and the line has no name",
                "a number is packed as in 00001, a designation as in K24A00H",
            )
        });
    };
    let words = crate::catalog::clean(words);
    let alone = words
        .split_once(')')
        .map(|(_, name)| name.trim().to_owned());
    let alone = alone.filter(|name| !name.is_empty());
    let other = packed.filter(|packed| *packed != words && !words.starts_with(packed.as_str()));
    Ok((words, alone.into_iter().chain(other).collect()))
}
