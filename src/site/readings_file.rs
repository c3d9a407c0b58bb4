//! A file of readings: what both circles showed on known stars, one row a reading.
//!
//! The header is `utc,star,hour,dec,side`; optional columns are `hour-b` and `dec-b` (the opposite
//! vernier), `timed` (yes: the star was timed on a mark) and `note`. What the circles showed stays
//! text here, since only the mount says how it is meant; each cell knows its place for that.

use crate::catalog::clean;
use crate::metal::Side;
use crate::site::document::did_you_mean;
use crate::site::fault::{Fault, Faults, FileText};
use crate::site::table::{self, Cell, Columns, Row};
use crate::time::Utc;

const COLUMNS: Columns = Columns {
    required: &["utc", "star", "hour", "dec", "side"],
    optional: &["hour-b", "dec-b", "timed", "note"],
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
    /// What the opposite vernier of the hour circle showed.
    pub hour_b: Option<Cell>,
    /// What the opposite vernier of the declination circle showed.
    pub dec_b: Option<Cell>,
    /// True if the circle was set on a mark and the star's crossing was timed.
    pub timed: bool,
    /// The observer's note, cleaned of control characters.
    pub note: String,
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
            faults.push(Fault::of_the_file("this table holds no reading", None));
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
    let side = row
        .required("side", faults)
        .and_then(|cell| side(cell, faults));
    let timed = row.cell("timed").and_then(|cell| timed(cell, faults));
    Some(RawReading {
        row: number,
        utc: utc?,
        star: star?.clone(),
        hour: hour?.clone(),
        dec: dec?.clone(),
        side: side?,
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
    use crate::sexagesimal::TextFault;

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
