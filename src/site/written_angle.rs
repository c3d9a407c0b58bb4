//! Angles in TOML files: texts with their unit, read by `sexagesimal` and held to what the key takes.

use crate::angle::Angle;
use crate::bounds::Bound;
use crate::sexagesimal::{self, Half, Unit, Written};
use crate::site::value::Value;

/// What a person would write for an angle in a unit.
const fn example(unit: Unit) -> &'static str {
    match unit {
        Unit::Hours => "\"4m\" or \"20s\"",
        Unit::Degrees => "\"1d\" or \"30'\"",
    }
}

const fn named(unit: Unit) -> &'static str {
    match unit {
        Unit::Hours => "hours, minutes or seconds of time",
        Unit::Degrees => "degrees, minutes or seconds of arc",
    }
}

/// An angle as written, a bare number being in the unit `bare`; faults lie at their letters.
fn written(value: &Value<'_>, wanted: &str, bare: Unit) -> Option<Written> {
    let text = value.text(wanted)?;
    match sexagesimal::read(text, bare) {
        Ok(written) => Some(written),
        Err(fault) => {
            value.fault_at(
                &fault.at,
                format!("{}: {}", value.key(), fault.message),
                fault.hint,
            );
            None
        }
    }
}

/// An angle that names its unit, which must be the one wanted if one is.
fn with_unit(value: &Value<'_>, unit: Option<Unit>) -> Option<Written> {
    let bare = unit.unwrap_or(Unit::Degrees);
    let wanted = format!("an angle with its unit, as {}", example(bare));
    let read = written(value, &wanted, bare)?;
    if !read.unit_was_named {
        value.fault(
            format!("{} has no unit", value.key()),
            format!("write it as {}", example(bare)),
        );
        return None;
    }
    if unit.is_some_and(|unit| unit != read.unit) {
        value.fault(
            format!(
                "{} is in {}, not in {}",
                value.key(),
                named(read.unit),
                named(bare)
            ),
            format!("write it as {}", example(bare)),
        );
        return None;
    }
    Some(read)
}

/// The size of something: an angle with its unit and without sign or letter, within a bound of
/// which `measure` gives the unit.
pub fn size(
    value: &Value<'_>,
    unit: Option<Unit>,
    bound: &Bound,
    measure: impl Fn(Angle) -> f64,
) -> Option<Angle> {
    let read = with_unit(value, unit)?;
    if read.half.is_some() || read.negative == Some(true) {
        value.fault(
            format!("{} is a size, without sign or letter", value.key()),
            format!("write it as {}", example(read.unit)),
        );
        return None;
    }
    value.within(bound, measure(read.size)).map(|_| read.size)
}

/// An hour angle with its unit, west positive, by sign or by the letter E or W.
pub fn hour_angle(value: &Value<'_>, bound: &Bound) -> Option<Angle> {
    let read = with_unit(value, None)?;
    let angle = match read.half {
        None | Some(Half::West) => read.signed(),
        Some(Half::East) => -read.size,
        Some(Half::North | Half::South) => {
            value.fault(
                "an hour angle is east or west",
                "write it as \"-7h\" or \"7h E\"",
            );
            return None;
        }
    };
    value.within(bound, angle.hours()).map(|_| angle)
}

/// Degrees as a number, or as sexagesimal text with a sign or one of two letters (the positive first).
pub fn degrees(value: &Value<'_>, bound: &Bound, letters: [Half; 2]) -> Option<f64> {
    let [positive, negative] = letters;
    let wanted =
        format!("a number of degrees, or text as \"54 31 12 {positive}\" or \"-54 31 12\"");
    if let Some(number) = value.plain_number() {
        return value.within(bound, number);
    }
    let read = written(value, &wanted, Unit::Degrees)?;
    if read.unit == Unit::Hours {
        value.fault(
            format!("{} is in degrees", value.key()),
            format!("write {wanted}"),
        );
        return None;
    }
    let angle = match read.half {
        Some(half) if half == negative => -read.size,
        Some(half) if half != positive => {
            value.fault(
                format!(
                    "{} has the letter {positive} or {negative}, not {half}",
                    value.key()
                ),
                format!("write {wanted}"),
            );
            return None;
        }
        _ => read.signed(),
    };
    value.within(bound, angle.degrees())
}
