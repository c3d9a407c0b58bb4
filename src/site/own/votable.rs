//! A catalogue as a `VOTable`: the first table of the document, its rows in a TABLEDATA.

use std::ops::Range;

use quick_xml::Reader;
use quick_xml::events::Event;

use crate::angle::{Angle, Declination, RightAscension};
use crate::bounds::{
    Bound, DECLINATION, EPOCH, MAGNITUDE, PARALLAX, PROPER_MOTION, RIGHT_ASCENSION,
};
use crate::catalog::{Kind, Origin, Target, clean};
use crate::sexagesimal::{self, Unit};
use crate::site::fault::{Fault, Faults, FileText};
use crate::site::own::format::{Format, Read};
use crate::site::own::votable_head::{Column, Head, Holds};
use crate::site::own::votable_unit::{Angular, PerYear};
use crate::sky::{CataloguePlace, Source};

/// The format of one document.
#[derive(Debug)]
pub struct Votable(Head);

impl Votable {
    /// True of a text that begins a `VOTable`.
    pub fn is_begun_by(text: &str) -> bool {
        let begin = text.trim_start_matches('\u{feff}').trim_start();
        let near = begin.get(..4096).unwrap_or(begin);
        begin.starts_with('<') && near.contains("VOTABLE")
    }

    /// Reads what stands before the rows.
    pub fn of(head: &FileText) -> Result<Self, Faults> {
        let read = Head::read(&head.text).map(Self);
        read.map_err(|faults| Faults::new(head.clone(), faults))
    }
}

impl Format for Votable {
    fn end(&self) -> &'static [u8] {
        b"</TR>"
    }

    fn begin(&self) -> u64 {
        self.0.begin as u64
    }

    fn read(&self, piece: &str) -> Read {
        let Some(start) = row_start(piece) else {
            return if piece.contains("</TABLEDATA>") {
                Read::End
            } else {
                Read::Nothing
            };
        };
        if piece
            .get(..start)
            .is_some_and(|before| before.contains("</TABLEDATA>"))
        {
            return Read::End;
        }
        let mut faults = Vec::new();
        let target = cells(piece, start, &mut faults)
            .and_then(|cells| target(&self.0, &cells, start, &mut faults));
        match target {
            Some(target) if faults.is_empty() => Read::Target(Box::new(target)),
            _ => Read::Wrong(faults),
        }
    }
}

/// Where the row's tag begins.
fn row_start(piece: &str) -> Option<usize> {
    let mut starts = piece.match_indices("<TR").map(|(at, _)| at);
    starts.find(|at| {
        let next = piece.get(at + 3..).and_then(|rest| rest.chars().next());
        next.is_some_and(|next| next == '>' || next.is_whitespace())
    })
}

/// A cell: its text, and where it stands in the piece.
struct Cell {
    text: String,
    at: Range<usize>,
}

fn cells(piece: &str, start: usize, faults: &mut Vec<Fault>) -> Option<Vec<Cell>> {
    let mut reader = Reader::from_str(piece.get(start..)?);
    let mut cells: Vec<Cell> = Vec::new();
    let mut open = false;
    let mut from = start;
    loop {
        let event = reader.read_event();
        let to = start + usize::try_from(reader.buffer_position()).ok()?;
        let mut add = |text: &str| {
            if let Some(cell) = cells.last_mut().filter(|_| open) {
                cell.text.push_str(text);
                cell.at.end = to;
            }
        };
        match event {
            Ok(Event::Start(tag)) if tag.local_name().as_ref() == "TD" => {
                open = true;
                let (text, at) = (String::new(), to..to);
                cells.push(Cell { text, at });
            }
            Ok(Event::Empty(tag)) if tag.local_name().as_ref() == "TD" => {
                let (text, at) = (String::new(), from..to);
                cells.push(Cell { text, at });
            }
            Ok(Event::Text(text)) => add(&text),
            Ok(Event::CData(text)) => add(&text),
            Ok(Event::GeneralRef(name)) => {
                let name: &str = &name;
                let written = format!("&{name};");
                add(&quick_xml::escape::unescape(&written).unwrap_or_default());
            }
            Ok(Event::End(tag)) => match tag.local_name().as_ref() {
                "TD" => open = false,
                "TR" => return Some(cells),
                _ => {}
            },
            Ok(Event::Eof) => return Some(cells),
            Ok(_) => {}
            Err(error) => {
                let message = format!("this is not well-formed XML: {error}");
                faults
                    .push(Fault::new(from..to.max(from + 1), message).hint("save the table anew"));
                return None;
            }
        }
        from = to;
    }
}

fn target(head: &Head, cells: &[Cell], start: usize, faults: &mut Vec<Fault>) -> Option<Target> {
    if cells.len() != head.columns.len() {
        let (row, columns) = (cells.len(), head.columns.len());
        let message = format!("this row has {row} cells, the table {columns} columns");
        faults.push(
            Fault::new(start..start + 3, message).hint("give every row a TD for every FIELD"),
        );
        return None;
    }
    let mut name = None;
    let mut also = Vec::new();
    let (mut ra, mut dec, mut magnitude) = (None, None, None);
    let (mut pm_ra_mas, mut pm_dec_mas, mut parallax_mas) = (0.0, 0.0, 0.0);
    let mut epoch = head.epoch;
    for (column, cell) in head.columns.iter().zip(cells) {
        let text = cell.text.trim();
        if text.is_empty()
            || column.null.as_deref() == Some(text)
            || text.eq_ignore_ascii_case("nan")
        {
            continue;
        }
        let mut number = |scale: f64, bound: &Bound| number(cell, scale, bound, faults);
        match column.holds {
            Holds::Other => {}
            Holds::Name => name = Some(named(column, text)),
            Holds::Also => also.push(named(column, text)),
            Holds::Ra(unit) => {
                ra = angle(cell, unit, Unit::Hours, &RIGHT_ASCENSION, faults)
                    .map(|angle| RightAscension::from_degrees(angle.degrees()));
            }
            Holds::Dec(unit) => {
                dec = angle(cell, unit, Unit::Degrees, &DECLINATION, faults)
                    .map(|angle| Declination::from_degrees(angle.degrees()));
            }
            Holds::PmRa(PerYear(mas)) => pm_ra_mas = number(mas, &PROPER_MOTION).unwrap_or(0.0),
            Holds::PmDec(PerYear(mas)) => pm_dec_mas = number(mas, &PROPER_MOTION).unwrap_or(0.0),
            Holds::Parallax(mas) => parallax_mas = number(mas, &PARALLAX).unwrap_or(0.0),
            Holds::Magnitude => magnitude = number(1.0, &MAGNITUDE),
            Holds::Epoch => epoch = number(1.0, &EPOCH).unwrap_or(epoch),
        }
    }
    if !faults.is_empty() {
        return None;
    }
    for (missing, what) in [
        (name.is_none(), "name"),
        (ra.is_none(), "right ascension"),
        (dec.is_none(), "declination"),
    ] {
        if missing {
            faults.push(
                Fault::new(start..start + 3, format!("this row has no {what}"))
                    .hint("fill it in, or leave out the row"),
            );
        }
    }
    Some(Target {
        name: name?,
        also,
        kind: Kind::Place,
        source: Source::Catalogue(CataloguePlace {
            equinox: head.equinox,
            epoch,
            pm_ra_mas,
            pm_dec_mas,
            parallax_mas,
            ..CataloguePlace::icrs(ra?, dec?)
        }),
        magnitude,
        size_arcmin: None,
        constellation: None,
        catalogue: Origin::List,
        note: String::new(),
    })
}

/// A name; a bare number is one of the column's, as the 91262 of a column HIP.
fn named(column: &Column, text: &str) -> String {
    let is_number = text.bytes().all(|b| b.is_ascii_digit());
    clean(&if is_number {
        format!("{} {text}", column.name)
    } else {
        text.to_owned()
    })
}

fn number(cell: &Cell, scale: f64, bound: &Bound, faults: &mut Vec<Fault>) -> Option<f64> {
    let text = cell.text.trim();
    let read = text
        .parse::<f64>()
        .map_err(|_| format!("\"{text}\" is not a number"));
    let checked =
        read.and_then(|number| bound.check(number * scale).map_err(|out| out.to_string()));
    let fault = |message| Fault::new(cell.at.clone(), message).hint("put this value right");
    checked.map_err(|message| faults.push(fault(message))).ok()
}

fn angle(
    cell: &Cell,
    unit: Angular,
    sexagesimal_unit: Unit,
    bound: &Bound,
    faults: &mut Vec<Fault>,
) -> Option<Angle> {
    if let Angular::Number(size) = unit {
        return number(cell, size.degrees(), bound, faults).map(Angle::from_degrees);
    }
    let text = cell.text.trim();
    match sexagesimal::read(text, sexagesimal_unit) {
        Ok(written) => match bound.check(written.signed().degrees()) {
            Ok(degrees) => return Some(Angle::from_degrees(degrees)),
            Err(out) => {
                faults.push(
                    Fault::new(cell.at.clone(), out.to_string()).hint("put this value right"),
                );
            }
        },
        Err(wrong) => faults.push(Fault::new(cell.at.clone(), wrong.message).hint(wrong.hint)),
    }
    None
}
