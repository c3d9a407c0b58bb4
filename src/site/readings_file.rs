//! A file of readings: what both circles showed on known stars, one row a reading.
//!
//! The header is `utc,star,hour,dec,side`; optional columns are `hour-b` and `dec-b` (the opposite
//! vernier), `timed` (yes: the star was timed on a mark) and `note`. What the circles showed stays
//! text here, since only the mount says how it is meant; each cell knows its place for that.

use std::ops::Range;

use crate::catalog::clean;
use crate::metal::{Mount, Reading, Side, read_dec, read_hour};
use crate::sexagesimal::{self, TextFault, Unit};
use crate::site::fault::{Fault, Faults, FileText};
use crate::site::likely::did_you_mean;
use crate::site::table::{self, Cell, Columns, Others, Row};
use crate::time::Utc;

const COLUMNS: Columns = Columns {
    required: &["utc", "star", "hour", "dec", "side"],
    optional: &["hour-b", "dec-b", "timed", "note"],
    others: Others::AreFaults,
};

const SIDES: [Side; 3] = [Side::TubeWest, Side::TubeEast, Side::Single];

/// Readings and the file they came from.
#[derive(Clone, Debug, PartialEq)]
pub struct ReadingsFile {
    /// The readings in order.
    pub readings: Vec<RawReading>,
    /// The file, untouched.
    pub file: FileText,
}

/// One reading as written.
#[derive(Clone, Debug, PartialEq)]
pub struct RawReading {
    /// Its row in the table, from 1, the header not counted.
    pub row: usize,
    /// When the star was in the middle.
    pub utc: Utc,
    /// Which star, by name or coordinates.
    pub star: Cell,
    /// What the hour circle showed.
    pub hour: Cell,
    /// What the declination circle showed.
    pub dec: Cell,
    /// The side of the pier the tube was on.
    pub side: Side,
    /// Where the side stands in the file.
    pub side_at: Range<usize>,
    /// What the opposite vernier of the hour circle showed.
    pub hour_b: Option<Cell>,
    /// What the opposite vernier of the declination circle showed.
    pub dec_b: Option<Cell>,
    /// True if the circle was set on a mark and the star's crossing was timed.
    pub timed: bool,
    /// The observer's note, cleaned of control characters.
    pub note: String,
}

/// A reading as the circles of its mount are engraved.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ReadOnMount {
    /// What the hour circle showed.
    pub hour: Reading,
    /// What the declination circle showed.
    pub dec: Reading,
    /// What the opposite vernier of the hour circle showed.
    pub hour_b: Option<Reading>,
    /// What the opposite vernier of the declination circle showed.
    pub dec_b: Option<Reading>,
    /// The side of the pier, `Single` on a mount that has one.
    pub side: Side,
}

impl RawReading {
    /// The reading in the notation of a mount's circles, or all that is wrong with it there.
    pub fn on_mount(&self, mount: &Mount) -> Result<ReadOnMount, Vec<Fault>> {
        let mut faults = Vec::new();
        let hour = |text: &str| read_hour(&mount.hour_circle, text);
        let dec = |text: &str| read_dec(&mount.declination_circle, text);
        let read = (
            noted(Some(&self.hour), hour, &mut faults),
            noted(Some(&self.dec), dec, &mut faults),
        );
        let hour_b = noted(self.hour_b.as_ref(), hour, &mut faults);
        let dec_b = noted(self.dec_b.as_ref(), dec, &mut faults);
        let side = match (mount.kind.has_two_sides(), self.side) {
            (true, Side::Single) => Err("this mount has two sides: was the tube west or east?"),
            (false, Side::TubeEast) => Err("this mount has one side only"),
            (false, _) => Ok(Side::Single),
            (true, side) => Ok(side),
        };
        let side = side
            .map_err(|wrong| {
                let hint = if mount.kind.has_two_sides() {
                    "write tube-west or tube-east"
                } else {
                    "write single"
                };
                faults.push(Fault::new(self.side_at.clone(), wrong).hint(hint));
            })
            .ok();
        match (read, side) {
            ((Some(hour), Some(dec)), Some(side)) if faults.is_empty() => Ok(ReadOnMount {
                hour,
                dec,
                hour_b,
                dec_b,
                side,
            }),
            _ => Err(faults),
        }
    }

    /// What is wrong with the reading whatever the mount is.
    #[must_use]
    pub fn faults_on_any_mount(&self) -> Vec<Fault> {
        let mut faults = Vec::new();
        for (cell, unit) in [
            (Some(&self.hour), Unit::Hours),
            (self.hour_b.as_ref(), Unit::Hours),
            (Some(&self.dec), Unit::Degrees),
            (self.dec_b.as_ref(), Unit::Degrees),
        ] {
            noted(cell, |text| sexagesimal::read(text, unit), &mut faults);
        }
        faults
    }
}

/// What was read of a cell, if there is one; its fault is noted.
fn noted<T>(
    cell: Option<&Cell>,
    read: impl Fn(&str) -> Result<T, TextFault>,
    faults: &mut Vec<Fault>,
) -> Option<T> {
    let cell = cell?;
    read(&cell.text)
        .map_err(|fault| faults.push(cell.fault(&fault)))
        .ok()
}

impl ReadingsFile {
    /// Reads readings from the text of their file.
    pub fn read(file: FileText) -> Result<Self, Faults> {
        let mut faults = Vec::new();
        let rows = table::read(&file.text, COLUMNS, &mut faults);
        let readings: Vec<RawReading> = rows
            .iter()
            .enumerate()
            .filter_map(|(before, row)| reading(before + 1, row, &mut faults))
            .collect();
        if rows.is_empty() && faults.is_empty() {
            faults.push(
                Fault::new(0..0, "this table holds no reading")
                    .hint("write one row for each star read"),
            );
        }
        if faults.is_empty() {
            Ok(Self { readings, file })
        } else {
            Err(Faults::new(file, faults))
        }
    }
}

/// True if the first line that says anything is the header of such a file.
pub(super) fn is_header(text: &str) -> bool {
    let first = text
        .trim_start_matches('\u{feff}')
        .lines()
        .find(|line| !line.trim().is_empty() && !line.starts_with('#'))
        .unwrap_or("");
    let cells: Vec<String> = first
        .split([',', ';', '\t'])
        .map(|cell| cell.trim().trim_matches('"').to_ascii_lowercase())
        .collect();
    cells.len() > 1
        && ["utc", "star"]
            .iter()
            .any(|name| cells.iter().any(|cell| cell == name))
}

fn reading(number: usize, row: &Row, faults: &mut Vec<Fault>) -> Option<RawReading> {
    let utc = row
        .required("utc", faults)
        .and_then(|cell| utc(cell, faults));
    let star = row.required("star", faults);
    let hour = row.required("hour", faults);
    let dec = row.required("dec", faults);
    let side_cell = row.required("side", faults);
    let side = side_cell.and_then(|cell| side(cell, faults));
    let timed = row.cell("timed").and_then(|cell| timed(cell, faults));
    Some(RawReading {
        row: number,
        utc: utc?,
        star: star?.clone(),
        hour: hour?.clone(),
        dec: dec?.clone(),
        side: side?,
        side_at: side_cell?.span.clone(),
        hour_b: row.cell("hour-b").cloned(),
        dec_b: row.cell("dec-b").cloned(),
        timed: timed.unwrap_or(false),
        note: row
            .cell("note")
            .map_or_else(String::new, |cell| clean(&cell.text)),
    })
}

fn utc(cell: &Cell, faults: &mut Vec<Fault>) -> Option<Utc> {
    Utc::parse(&cell.text)
        .map_err(|fault| {
            faults.push(
                Fault::new(cell.span.clone(), fault.to_string())
                    .hint("write it as 2026-12-01T21:30:00Z"),
            );
        })
        .ok()
}

fn side(cell: &Cell, faults: &mut Vec<Fault>) -> Option<Side> {
    let side = SIDES.into_iter().find(|side| side.word() == cell.text);
    if side.is_none() {
        let words = SIDES.map(Side::word);
        faults.push(
            Fault::new(
                cell.span.clone(),
                format!("\"{}\" is no side of the pier", cell.text),
            )
            .hint(did_you_mean(&cell.text, &words)),
        );
    }
    side
}

fn timed(cell: &Cell, faults: &mut Vec<Fault>) -> Option<bool> {
    match cell.text.as_str() {
        "yes" => Some(true),
        "no" => Some(false),
        other => {
            faults.push(
                Fault::new(cell.span.clone(), format!("timed is \"{other}\""))
                    .hint("write yes or no, or leave it empty"),
            );
            None
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn read(text: &str) -> Result<ReadingsFile, Faults> {
        ReadingsFile::read(FileText {
            name: "readings.csv".to_owned(),
            text: text.to_owned(),
        })
    }

    #[test]
    fn a_reading_keeps_what_the_circles_showed_and_where_it_stands() {
        let text = "utc,star,hour,dec,side,timed\n2026-12-01T21:30:00Z,Vega,20h 61m,38 47 N,tube-west,yes\n";
        let file = read(text).unwrap();
        let first = &file.readings[0];
        assert_eq!(
            (first.row, first.side, first.timed),
            (1, Side::TubeWest, true)
        );
        let fault = first.hour.fault(&TextFault {
            at: 4..6,
            message: "minutes and seconds stay below 60".to_owned(),
            hint: "",
        });
        assert_eq!(&text[fault.span.clone().unwrap()], "61");
        let message = Faults::new(file.file, vec![fault]).to_string();
        assert!(message.contains("readings.csv:2:31\n"), "{message}");
    }

    #[test]
    fn every_fault_of_every_row_is_found() {
        let text = "utc,star,hour,dec,side,timed\nyesterday,Vega,1,2,tube-wst,perhaps\n2026-12-01T21:30:00Z,,1,,west,\n";
        let faults = read(text).unwrap_err();
        assert_eq!(faults.list().len(), 6, "{faults}");
    }
}
