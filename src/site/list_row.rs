//! One row of a list written as a table: a target with its place.
//!
//! `ra` is sexagesimal hours or decimal degrees with a `d`, `dec` degrees, north positive; without an
//! equinox they are of J2000. Proper motion is in mas a year, that of `pm-ra-mas` on the sky
//! (cos(declination) included). A size is in minutes of arc unless it says otherwise.

use std::ops::Range;

use crate::bounds::{Bound, EPOCH, MAGNITUDE, PROPER_MOTION, SIZE};
use crate::catalog::list::Written;
use crate::catalog::{clean, given};
use crate::sexagesimal::{self, TextFault, Unit};
use crate::site::fault::Fault;
use crate::site::list_file::ListLine;
use crate::site::table::{Cell, Columns, Others, Row};
use crate::site::value::out_of_range_hint;
use crate::sky::{CataloguePlace, Equinox};

/// The columns of such a table.
pub const COLUMNS: Columns = Columns {
    required: &["name", "ra", "dec"],
    optional: &[
        "equinox",
        "epoch",
        "pm-ra-mas",
        "pm-dec-mas",
        "magnitude",
        "size",
        "note",
    ],
    others: Others::AreFaults,
};

/// The target of a row.
pub fn read(row: &Row, faults: &mut Vec<Fault>) -> Option<ListLine> {
    let place = place(row, faults);
    let magnitude = row
        .cell("magnitude")
        .and_then(|cell| number(cell, &MAGNITUDE, faults));
    let size_arcmin = row
        .cell("size")
        .and_then(|cell| noted(cell, size(cell), faults));
    let name = row.required("name", faults)?;
    Some(ListLine {
        written: Written {
            name: clean(&name.text),
            place,
            magnitude,
            size_arcmin,
            note: row
                .cell("note")
                .map_or_else(String::new, |cell| clean(&cell.text)),
        },
        name_at: name.span.clone(),
    })
}

fn place(row: &Row, faults: &mut Vec<Fault>) -> Option<CataloguePlace> {
    let (ra, dec) = (row.cell("ra"), row.cell("dec"));
    for (there, missing) in [(ra, "dec"), (dec, "ra")] {
        if let (Some(there), Some(_)) = (there, row.empty_cell(missing)) {
            faults.push(
                Fault::new(
                    there.span.clone(),
                    format!("{missing} is empty beside this"),
                )
                .hint("give both, or neither to look the name up"),
            );
        }
    }
    let ra = ra.and_then(|cell| noted(cell, given::read_right_ascension(&cell.text), faults));
    let dec = dec.and_then(|cell| noted(cell, given::read_declination(&cell.text), faults));
    let equinox = row
        .cell("equinox")
        .and_then(|cell| noted(cell, given::read_equinox(&cell.text), faults))
        .unwrap_or(Equinox::J2000);
    let epoch = row.cell("epoch").and_then(|cell| epoch(cell, faults));
    let mut motion = |column| {
        row.cell(column)
            .and_then(|cell| number(cell, &PROPER_MOTION, faults))
            .unwrap_or(0.0)
    };
    let (pm_ra_mas, pm_dec_mas) = (motion("pm-ra-mas"), motion("pm-dec-mas"));
    Some(CataloguePlace {
        equinox,
        epoch: epoch.unwrap_or_else(|| equinox.epoch()),
        pm_ra_mas,
        pm_dec_mas,
        ..CataloguePlace::icrs(ra?, dec?)
    })
}

/// What was read of a cell; its fault is noted.
fn noted<T>(cell: &Cell, read: Result<T, TextFault>, faults: &mut Vec<Fault>) -> Option<T> {
    read.map_err(|fault| faults.push(cell.fault(&fault))).ok()
}

/// A Julian year, with or without its `J`.
fn epoch(cell: &Cell, faults: &mut Vec<Fault>) -> Option<f64> {
    let year = cell.text.strip_prefix(['J', 'j']).unwrap_or(&cell.text);
    number_of(cell, year, &EPOCH, faults)
}

/// A number within its range.
pub(super) fn number(cell: &Cell, bound: &Bound, faults: &mut Vec<Fault>) -> Option<f64> {
    number_of(cell, &cell.text, bound, faults)
}

fn number_of(cell: &Cell, text: &str, bound: &Bound, faults: &mut Vec<Fault>) -> Option<f64> {
    let (message, hint) = match text.replace('−', "-").parse::<f64>() {
        Ok(number) => match bound.check(number) {
            Ok(number) => return Some(number),
            Err(out) => (out.to_string(), out_of_range_hint(bound)),
        },
        Err(_) => (
            format!("\"{}\" is not a number", cell.text),
            format!("write a number, the {}", bound.name),
        ),
    };
    faults.push(Fault::new(cell.span.clone(), message).hint(hint));
    None
}

/// One length, or length x width, in minutes of arc.
fn size(cell: &Cell) -> Result<(f64, f64), TextFault> {
    let text = cell.text.as_str();
    let cross = text.find(['x', 'X', '×']);
    let sign = cross
        .and_then(|at| text.get(at..))
        .and_then(|rest| rest.chars().next());
    let (length_end, width_start) = match (cross, sign) {
        (Some(at), Some(sign)) => (at, at + sign.len_utf8()),
        _ => (text.len(), 0),
    };
    let one = |from: usize, to: usize| length(text.get(from..to).unwrap_or(""), from);
    Ok((one(0, length_end)?, one(width_start, text.len())?))
}

fn length(text: &str, from: usize) -> Result<f64, TextFault> {
    const HINT: &str = "write minutes of arc, as 24, 24' or 24 x 12";
    let fault = |at: Range<usize>, message: String| TextFault {
        at: at.start + from..at.end + from,
        message,
        hint: HINT,
    };
    let whole = 0..text.len();
    let read =
        sexagesimal::read(text, Unit::Degrees).map_err(|wrong| fault(wrong.at, wrong.message))?;
    if read.half.is_some() || (read.unit_was_named && read.unit == Unit::Hours) {
        return Err(fault(whole, "a size is in minutes of arc".to_owned()));
    }
    let minutes = if read.unit_was_named {
        read.signed().arcminutes()
    } else {
        // a bare number was taken for degrees
        (read.signed() / 60.0).arcminutes()
    };
    SIZE.check(minutes)
        .map_err(|out| fault(whole, out.to_string()))
}
