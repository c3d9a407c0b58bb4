//! A catalogue as a CSV table (RFC 4180) with a header; a row is a line.
//!
//! Columns are those of a list (`name,ra,dec` and optional `equinox,epoch,pm-ra-mas,pm-dec-mas,magnitude,size,note`), every
//! row with its place, and `also` (further names, `;` between them), `kind`, `constellation`, `parallax-mas`. Columns of
//! other names are passed over, unless one looks like a slip in one of these.

use crate::bounds::PARALLAX;
use crate::catalog::{Constellation, Kind, Origin, Target, clean};
use crate::site::fault::{Fault, Faults, FileText};
use crate::site::list_row;
use crate::site::own::format::{Format, Read};
use crate::site::table::{Columns, Header, Others, Row, header_line};
use crate::sky::{CataloguePlace, Source};

/// The columns of a catalogue.
const COLUMNS: Columns = Columns {
    required: &["name", "ra", "dec"],
    optional: &[
        "equinox",
        "epoch",
        "pm-ra-mas",
        "pm-dec-mas",
        "parallax-mas",
        "magnitude",
        "size",
        "kind",
        "constellation",
        "also",
        "note",
    ],
    others: Others::ArePassedOver,
};

/// The format of one table.
#[derive(Debug)]
pub struct Csv {
    header: Header,
    begin: u64,
}

impl Csv {
    /// Reads the header.
    pub fn of(head: &FileText) -> Result<Self, Faults> {
        let mut faults = Vec::new();
        let line = header_line(&head.text);
        let header = Header::read(&head.text, line.clone(), COLUMNS, &mut faults);
        match header {
            Some(header) if faults.is_empty() => Ok(Self {
                header,
                begin: line.end as u64,
            }),
            _ => Err(Faults::new(head.clone(), faults)),
        }
    }
}

impl Format for Csv {
    fn end(&self) -> &'static [u8] {
        b"\n"
    }

    fn begin(&self) -> u64 {
        self.begin
    }

    fn read(&self, piece: &str) -> Read {
        if piece.trim().is_empty() || piece.starts_with('#') {
            return Read::Nothing;
        }
        let mut faults = Vec::new();
        let target = self
            .header
            .row(piece, &mut faults)
            .and_then(|row| target(&row, &mut faults));
        match target {
            Some(target) if faults.is_empty() => Read::Target(Box::new(target)),
            _ => Read::Wrong(faults),
        }
    }
}

fn target(row: &Row, faults: &mut Vec<Fault>) -> Option<Target> {
    for column in ["ra", "dec"] {
        row.required(column, faults);
    }
    let line = list_row::read(row, faults)?;
    let kind = row.cell("kind").and_then(|cell| {
        let read = cell.text.parse::<Kind>();
        let fault = |unknown: crate::catalog::UnknownKind| {
            Fault::new(cell.span.clone(), unknown.to_string()).hint("write one of these, or none")
        };
        read.map_err(|unknown| faults.push(fault(unknown))).ok()
    });
    let constellation = row.cell("constellation").and_then(|cell| {
        let called = Constellation::called(&cell.text);
        if called.is_none() {
            let message = format!("\"{}\" is not a constellation", cell.text);
            let hint = "write its name or abbreviation, as Lyra or Lyr";
            faults.push(Fault::new(cell.span.clone(), message).hint(hint));
        }
        called
    });
    let parallax_mas = row
        .cell("parallax-mas")
        .and_then(|cell| list_row::number(cell, &PARALLAX, faults));
    let also = row.cell("also").map_or("", |cell| cell.text.as_str());
    let place = CataloguePlace {
        parallax_mas: parallax_mas.unwrap_or(0.0),
        ..line.written.place?
    };
    Some(Target {
        name: line.written.name,
        also: also
            .split(';')
            .map(clean)
            .filter(|name| !name.is_empty())
            .collect(),
        kind: kind.unwrap_or(Kind::Place),
        source: Source::Catalogue(place),
        magnitude: line.written.magnitude,
        size_arcmin: line.written.size_arcmin,
        constellation,
        catalogue: Origin::List,
        note: line.written.note,
    })
}
