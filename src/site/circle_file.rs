//! The two circles of a mount file: `[hour-circle]` and `[declination-circle]`.
//!
//! A division must part the scale into whole divisions, so that its ends are engraved; a vernier's
//! least count must part the division the same way.

use crate::angle::Angle;
use crate::bounds::{DIVISION, READING_ERROR};
use crate::metal::{
    DeclinationCircle, DeclinationNumbering, HourCircle, HourNumbering, Increases, Ring,
};
use crate::sexagesimal::Unit;
use crate::site::document::Section;
use crate::site::value::Value;
use crate::site::written_angle;

/// Rounding allowed in the number of divisions on a scale.
const WHOLE_TOLERANCE: f64 = 1e-6;

const UNITS: [(&str, Unit); 2] = [("hours", Unit::Hours), ("degrees", Unit::Degrees)];

const RINGS: [(&str, Ring); 3] = [
    ("fixed", Ring::Fixed),
    ("slips", Ring::Slips),
    ("driven", Ring::Driven),
];

const DIRECTIONS: [(&str, Increases); 2] = [("west", Increases::West), ("east", Increases::East)];

const HOUR_NUMBERINGS: [(&str, (Unit, HourNumbering)); 6] = [
    ("0-24", (Unit::Hours, HourNumbering::Full)),
    ("0-12-0", (Unit::Hours, HourNumbering::Halves)),
    ("plus-minus-12", (Unit::Hours, HourNumbering::PlusMinus)),
    ("0-360", (Unit::Degrees, HourNumbering::Full)),
    ("0-180-0", (Unit::Degrees, HourNumbering::Halves)),
    ("plus-minus-180", (Unit::Degrees, HourNumbering::PlusMinus)),
];

const DECLINATION_NUMBERINGS: [(&str, DeclinationNumbering); 5] = [
    ("signed", DeclinationNumbering::Signed),
    ("quarters", DeclinationNumbering::Quarters),
    ("polar-distance", DeclinationNumbering::PolarDistance),
    (
        "south-polar-distance",
        DeclinationNumbering::SouthPolarDistance,
    ),
    ("0-360", DeclinationNumbering::Full),
];

/// Reads `[hour-circle]`.
pub fn hour_circle(section: &mut Section<'_>) -> Option<HourCircle> {
    let ring = section.required("ring").and_then(|v| v.word(&RINGS));
    let unit = section.required("unit").and_then(|v| v.word(&UNITS));
    let numbering = section
        .required("numbering")
        .and_then(|v| hour_numbering(&v, unit));
    let increases = section
        .required("increases")
        .and_then(|v| v.word(&DIRECTIONS));
    let scale = numbering.map(|numbering| match numbering {
        HourNumbering::Full => Angle::TURN,
        HourNumbering::Halves | HourNumbering::PlusMinus => Angle::HALF_TURN,
    });
    let (division, vernier) = graduation(section, unit, scale);
    let second_fiducial = section.optional("second-fiducial").and_then(|v| v.flag());
    let reading_error = reading_error(section);
    Some(HourCircle {
        ring: ring?,
        unit: unit?,
        numbering: numbering?,
        increases: increases?,
        division: division?,
        vernier,
        second_fiducial: second_fiducial.unwrap_or(false),
        reading_error,
    })
}

/// Reads `[declination-circle]`.
pub fn declination_circle(section: &mut Section<'_>) -> Option<DeclinationCircle> {
    let numbering = section
        .required("numbering")
        .and_then(|v| v.word(&DECLINATION_NUMBERINGS));
    let scale = numbering.map(|numbering| match numbering {
        DeclinationNumbering::Signed | DeclinationNumbering::Quarters => Angle::HALF_TURN / 2.0,
        DeclinationNumbering::PolarDistance | DeclinationNumbering::SouthPolarDistance => {
            Angle::HALF_TURN
        }
        DeclinationNumbering::Full => Angle::TURN,
    });
    let (division, vernier) = graduation(section, Some(Unit::Degrees), scale);
    let slips = section.optional("slips").and_then(|v| v.flag());
    let reading_error = reading_error(section);
    Some(DeclinationCircle {
        numbering: numbering?,
        division: division?,
        vernier,
        slips: slips.unwrap_or(false),
        reading_error,
    })
}

/// The numbering of an hour circle, which must be one of its unit.
fn hour_numbering(value: &Value<'_>, unit: Option<Unit>) -> Option<HourNumbering> {
    let suits = |of: Unit| unit.is_none_or(|unit| unit == of);
    let suiting: Vec<_> = HOUR_NUMBERINGS
        .into_iter()
        .filter(|(_, (of, _))| suits(*of))
        .collect();
    value
        .word_or(&suiting, |text| {
            let (_, (of, _)) = HOUR_NUMBERINGS.iter().find(|(word, _)| *word == text)?;
            let unit = UNITS.iter().find(|(_, unit)| unit == of)?.0;
            Some(format!("numbering {text} is for a circle in {unit}"))
        })
        .map(|(_, numbering)| numbering)
}

/// The division and the vernier of a circle whose scale runs over `scale`.
fn graduation(
    section: &mut Section<'_>,
    unit: Option<Unit>,
    scale: Option<Angle>,
) -> (Option<Angle>, Option<Angle>) {
    let of_unit =
        |value: &Value<'_>| written_angle::size(value, unit, &DIVISION, Angle::arcseconds);
    let division = section.required("division").and_then(|value| {
        let division = of_unit(&value)?;
        if let (Some(unit), Some(scale)) = (unit, scale)
            && !parts(scale, division)
        {
            let whole = match unit {
                Unit::Hours => format!("{} hours", scale.hours().round()),
                Unit::Degrees => format!("{} degrees", scale.degrees().round()),
            };
            value.fault(
                format!("the division does not part {whole} into whole divisions"),
                "write the step from one engraved line to the next",
            );
        }
        Some(division)
    });
    let vernier = section.optional("vernier").and_then(|value| {
        let vernier = of_unit(&value)?;
        if let Some(division) = division
            && (!parts(division, vernier) || division / vernier < 2.0 - WHOLE_TOLERANCE)
        {
            value.fault(
                "the vernier does not part the division into whole parts",
                "write the vernier's least count: the division over the number of its lines",
            );
        }
        Some(vernier)
    });
    (division, vernier)
}

fn reading_error(section: &mut Section<'_>) -> Option<Angle> {
    section
        .optional("reading-error")
        .and_then(|v| written_angle::size(&v, None, &READING_ERROR, Angle::degrees))
}

/// True if the whole is a whole number of parts.
fn parts(whole: Angle, part: Angle) -> bool {
    let count = whole / part;
    (count - count.round()).abs() < WHOLE_TOLERANCE * count.max(1.0)
}
