//! The rows that cannot be read, gathered for a report that shows each with its line.

use std::path::Path;

use crate::site::fault::{Fault, Faults, FileText};
use crate::site::own::pieces::Piece;

/// The text of more faulty rows than this is not kept: a report shows fewer.
const MOST_KEPT: usize = 500;

/// The faulty rows of a file.
///
/// The text kept of the file has all its lines, the sound ones empty: so every fault stands at its line, however large the
/// file is.
#[derive(Debug)]
pub struct Wrong {
    file: FileText,
    /// The line the text kept has come to.
    line: u64,
    list: Vec<Fault>,
    rows: usize,
}

impl Wrong {
    /// Of a file, none yet.
    pub fn of(path: &Path) -> Self {
        Self {
            file: FileText {
                name: path.display().to_string(),
                text: String::new(),
            },
            line: 1,
            list: Vec::new(),
            rows: 0,
        }
    }

    /// Adds a row.
    pub fn add(&mut self, piece: Piece<'_>, faults: Vec<Fault>) {
        self.rows += 1;
        if self.rows > MOST_KEPT {
            self.list.extend(faults.into_iter().map(|fault| Fault {
                span: None,
                ..fault
            }));
            return;
        }
        while self.line < piece.line {
            self.file.text.push('\n');
            self.line += 1;
        }
        let at = self.file.text.len();
        self.file.text.push_str(piece.text);
        self.line += piece.text.matches('\n').count() as u64;
        self.list.extend(faults.into_iter().map(|fault| Fault {
            span: fault.span.map(|span| span.start + at..span.end + at),
            ..fault
        }));
    }

    /// The report; a file without a row that is sound and without one that is wrong holds nothing.
    pub fn faults(self, sound: u64) -> Result<(), Faults> {
        if sound == 0 && self.list.is_empty() {
            let hint = "write a row for each target, below the header";
            let fault = Fault::new(0..0, "this catalogue holds no target").hint(hint);
            return Err(Faults::new(self.file, vec![fault]));
        }
        if self.list.is_empty() {
            return Ok(());
        }
        Err(Faults::new(self.file, self.list))
    }
}
