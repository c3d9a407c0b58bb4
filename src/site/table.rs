//! A CSV table (RFC 4180) with a header, whose every cell knows where it stands in the text.
//!
//! The cells are parted by `csv-core`, which says how many bytes each one took. Beside the RFC,
//! empty lines and lines that begin with `#` are passed over, space around a cell does not count,
//! and a quote mark inside an unquoted cell is itself: seconds of arc are written with it.

use std::ops::Range;

use csv_core::{ReadFieldResult, Reader};

use crate::sexagesimal::TextFault;
use crate::site::fault::Fault;
use crate::site::table_columns::header_names;
pub use crate::site::table_columns::{Columns, Others};

/// One cell: its text without quotes and surrounding space, and its place.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Cell {
    /// The text.
    pub text: String,
    /// The bytes of the file it stands in.
    pub span: Range<usize>,
    /// True if the text stands in the file letter for letter.
    verbatim: bool,
}

/// The columns of one table in their order, each by its known name; nothing for one that is passed over.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Header(Vec<Option<&'static str>>);

/// One row, its cells under their columns.
#[derive(Clone, Debug)]
pub struct Row {
    cells: Vec<(&'static str, Cell)>,
    /// The bytes of the file it stands in.
    pub span: Range<usize>,
}

impl Cell {
    /// The bytes of the file that hold a part of the text; the whole cell where quotes are doubled.
    #[must_use]
    pub fn part(&self, part: &Range<usize>) -> Range<usize> {
        if self.verbatim {
            let end = self.span.end;
            (self.span.start + part.start).min(end)..(self.span.start + part.end).min(end)
        } else {
            self.span.clone()
        }
    }

    /// A fault of the text as a fault of the file.
    #[must_use]
    pub fn fault(&self, fault: &TextFault) -> Fault {
        Fault::new(self.part(&fault.at), fault.message.clone()).hint(fault.hint)
    }
}

impl Row {
    /// The cell of a column, if it has one with something in it.
    #[must_use]
    pub fn cell(&self, column: &str) -> Option<&Cell> {
        self.cells
            .iter()
            .find(|(name, _)| *name == column)
            .map(|(_, cell)| cell)
            .filter(|cell| !cell.text.is_empty())
    }

    /// The cell of a column, if there is nothing in it.
    #[must_use]
    pub fn empty_cell(&self, column: &str) -> Option<&Cell> {
        let cell = self.cells.iter().find(|(name, _)| *name == column);
        cell.map(|(_, cell)| cell)
            .filter(|cell| cell.text.is_empty())
    }

    /// The cell of a column that has to have something in it; a fault is noted if it has not.
    pub fn required(&self, column: &str, faults: &mut Vec<Fault>) -> Option<&Cell> {
        // a column that is not there at all has been said at the header
        if let Some(empty) = self.empty_cell(column) {
            faults.push(
                Fault::new(empty.span.clone(), format!("{column} is empty"))
                    .hint("fill it in, or leave out the row"),
            );
        }
        self.cell(column)
    }
}

/// The bytes of a text in which its header stands: its first line that says anything, with what goes before.
#[must_use]
pub fn header_line(text: &str) -> Range<usize> {
    let mut records = Records::new(text);
    records.pass_over();
    let line = records.rest().split_inclusive('\n').next().unwrap_or("");
    records.at..records.at + line.len()
}

impl Header {
    /// Reads the header that stands at these bytes of a text.
    pub fn read(
        text: &str,
        line: Range<usize>,
        columns: Columns,
        faults: &mut Vec<Fault>,
    ) -> Option<Self> {
        let mut records = Records::new(text.get(..line.end).unwrap_or(text));
        Self::of(&mut records, columns, faults)
    }

    fn of(records: &mut Records<'_>, columns: Columns, faults: &mut Vec<Fault>) -> Option<Self> {
        let header = records.next(faults);
        if header.is_none() {
            let begin = format!("begin with the header {}", columns.required.join(","));
            faults.push(Fault::new(0..0, "this table is empty").hint(begin));
        }
        Some(Self(header_names(&header?, columns, faults)))
    }

    /// Reads a row that is a line of its own.
    pub fn row(&self, line: &str, faults: &mut Vec<Fault>) -> Option<Row> {
        let cells = if line.contains('"') {
            Records::new(line).next(faults)?
        } else {
            plain_cells(line, faults)
        };
        self.named(cells, faults)
    }

    /// The cells under their columns.
    fn named(&self, cells: Vec<Cell>, faults: &mut Vec<Fault>) -> Option<Row> {
        let span = cells.first()?.span.start..cells.last()?.span.end;
        if cells.len() == self.0.len() {
            let named = self.0.iter().zip(cells);
            let cells = named.filter_map(|(name, cell)| name.map(|name| (name, cell)));
            return Some(Row {
                cells: cells.collect(),
                span,
            });
        }
        let message = format!(
            "this row has {} cells, the header {}",
            cells.len(),
            self.0.len()
        );
        faults.push(
            Fault::new(span, message)
                .hint("a cell that holds a comma stands in quotes; an empty one keeps its comma"),
        );
        None
    }
}

/// Reads a table; its faults are noted, and the rows that could be read are given.
pub fn read(text: &str, columns: Columns, faults: &mut Vec<Fault>) -> Vec<Row> {
    let mut records = Records::new(text);
    let Some(header) = Header::of(&mut records, columns, faults) else {
        return Vec::new();
    };
    let mut rows = Vec::new();
    while let Some(cells) = records.next(faults) {
        rows.extend(header.named(cells, faults));
    }
    rows
}

/// The records of a text, one after another.
struct Records<'t> {
    text: &'t str,
    at: usize,
    reader: Reader,
    /// Room for the cells of the whole text.
    room: Vec<u8>,
}

impl<'t> Records<'t> {
    fn new(text: &'t str) -> Self {
        let at = text.len() - text.trim_start_matches('\u{feff}').len();
        Self {
            text,
            at,
            reader: Reader::new(),
            room: vec![0; text.len()],
        }
    }

    fn rest(&self) -> &'t str {
        self.text.get(self.at..).unwrap_or("")
    }

    /// Passes over empty lines and comments.
    fn pass_over(&mut self) {
        while let Some(line) = self.rest().split_inclusive('\n').next() {
            if !line.trim().is_empty() && !line.starts_with('#') {
                break;
            }
            self.at += line.len();
        }
    }

    /// The cells of the next record; none at the end.
    fn next(&mut self, faults: &mut Vec<Fault>) -> Option<Vec<Cell>> {
        self.pass_over();
        if self.rest().is_empty() {
            return None;
        }
        let mut cells = Vec::new();
        loop {
            let start = self.at;
            let mut written = 0;
            let record_end = loop {
                let input = self.text.as_bytes().get(self.at..).unwrap_or(&[]);
                let room = self.room.get_mut(written..).unwrap_or(&mut []);
                let (result, read, wrote) = self.reader.read_field(input, room);
                self.at += read;
                written += wrote;
                match result {
                    ReadFieldResult::InputEmpty if read > 0 => {}
                    ReadFieldResult::Field { record_end } => break record_end,
                    // the room is as long as the text, so only the end is left
                    _ => return Some(cells),
                }
            };
            let raw = self.text.get(start..self.at).unwrap_or("");
            let raw = if record_end {
                raw.trim_end_matches(['\n', '\r'])
            } else {
                raw.strip_suffix(',').unwrap_or(raw)
            };
            let text = String::from_utf8_lossy(self.room.get(..written).unwrap_or(&[]));
            cells.push(cell(start, raw, &text, faults));
            if record_end {
                return Some(cells);
            }
        }
    }
}

/// The cells of a line without a quote mark: the same, at a fraction of the cost of a reader for all that may be quoted.
fn plain_cells(line: &str, faults: &mut Vec<Fault>) -> Vec<Cell> {
    let mut cells = Vec::new();
    let mut start = 0;
    for raw in line.trim_end_matches(['\n', '\r']).split(',') {
        cells.push(cell(start, raw, raw, faults));
        start += raw.len() + 1;
    }
    cells
}

/// A cell from its place, its raw letters and the text they stand for.
fn cell(start: usize, raw: &str, text: &str, faults: &mut Vec<Fault>) -> Cell {
    let end = start + raw.len();
    let shown = text.trim();
    if let Some(inside) = raw.strip_prefix('"') {
        match closing_quote(inside) {
            None => faults.push(
                Fault::new(start..start + 1, "this quote is not closed")
                    .hint("close it, or leave it out"),
            ),
            Some(closed) if closed + 1 < inside.trim_end().len() => faults.push(
                Fault::new(
                    start + closed + 2..end,
                    "this stands after the closing quote",
                )
                .hint("a quote mark inside quotes is written twice"),
            ),
            Some(_) => {}
        }
    } else if raw.trim_start().starts_with('"') {
        faults.push(
            Fault::new(start..end, "a quoted cell begins right after the comma")
                .hint("leave out the space before the quote"),
        );
    }
    let inner = usize::from(raw.starts_with('"'));
    let leading = text.len() - text.trim_start().len();
    let from = inner + leading;
    let verbatim = raw.get(from..from + shown.len()) == Some(shown);
    Cell {
        text: shown.to_owned(),
        span: if verbatim {
            start + from..start + from + shown.len()
        } else {
            start..end
        },
        verbatim,
    }
}

/// Where the quote that closes a quoted cell stands in what follows the opening one.
fn closing_quote(inside: &str) -> Option<usize> {
    let mut quotes = inside.match_indices('"').map(|(at, _)| at).peekable();
    while let Some(at) = quotes.next() {
        if quotes.next_if_eq(&(at + 1)).is_none() {
            return Some(at);
        }
    }
    None
}

#[cfg(test)]
mod tests {
    use super::*;

    const COLUMNS: Columns = Columns {
        required: &["star", "dec"],
        optional: &["note"],
        others: Others::AreFaults,
    };

    fn rows(text: &str) -> (Vec<Row>, Vec<String>) {
        let mut faults = Vec::new();
        let rows = read(text, COLUMNS, &mut faults);
        let said = faults.into_iter().map(|fault| fault.message).collect();
        (rows, said)
    }

    #[test]
    fn every_cell_knows_where_it_stands() {
        let text = "\u{feff}star,dec,note\r\n\r\n# a remark\r\nVega, 38 47 N ,\"low, \"\r\n\"Deneb\",45° 17' 30\",\"a \"\"b\"\"\"";
        let (rows, said) = rows(text);
        assert_eq!(said, Vec::<String>::new());
        for (row, column, expected, raw) in [
            (0, "star", "Vega", "Vega"),
            (0, "dec", "38 47 N", "38 47 N"),
            (0, "note", "low,", "low,"),
            (1, "star", "Deneb", "Deneb"),
            (1, "dec", "45° 17' 30\"", "45° 17' 30\""),
            (1, "note", "a \"b\"", "\"a \"\"b\"\"\""),
        ] {
            let cell = rows[row].cell(column).unwrap();
            assert_eq!(
                (cell.text.as_str(), &text[cell.span.clone()]),
                (expected, raw)
            );
        }
        assert_eq!(&text[rows[0].cell("dec").unwrap().part(&(3..5))], "47");
    }

    #[test]
    fn a_line_by_itself_has_the_cells_it_has_in_its_table() {
        for line in [
            "Vega, 38 47 N ,low\r\n",
            "Vega,,\n",
            "\"De, neb\",45° 17' 30\",x",
            "Vega,38,low",
        ] {
            let mut faults = Vec::new();
            let text = format!("star,dec,note\n{line}");
            let begin = header_line(&text).end;
            let header = Header::read(&text, 0..begin, COLUMNS, &mut faults).unwrap();
            let alone = header.row(line, &mut faults).unwrap();
            let (among, _) = rows(&text);
            for column in ["star", "dec", "note"] {
                let text = |row: &Row| row.cell(column).map(|cell| cell.text.clone());
                assert_eq!(text(&alone), text(&among[0]), "{line} {column}");
                let start = |row: &Row| row.cell(column).map(|cell| cell.span.start);
                assert_eq!(
                    start(&alone).map(|at| at + begin),
                    start(&among[0]),
                    "{line}"
                );
            }
            assert_eq!(faults, []);
        }
    }

    #[test]
    fn an_empty_last_cell_is_a_cell() {
        let (rows, said) = rows("star,dec,note\nVega,38,");
        assert_eq!((rows.len(), said.len()), (1, 0));
        assert!(rows[0].cell("note").is_none());
    }

    #[test]
    fn all_faults_come_at_once() {
        let (_, said) = rows("star,decl,star\nVega,1\n\"open,2,3\n");
        assert_eq!(
            said,
            [
                "unknown column \"decl\"",
                "the column star stands here twice",
                "the column dec is missing",
                "this row has 2 cells, the header 3",
                "this quote is not closed",
                "this row has 1 cells, the header 3",
            ]
        );
        let (_, said) = rows("star,dec\n\"Vega\"x,1\n \"Deneb\",2\n");
        assert_eq!(
            said,
            [
                "this stands after the closing quote",
                "a quoted cell begins right after the comma"
            ]
        );
        assert_eq!(rows("").1, ["this table is empty"]);
    }
}
