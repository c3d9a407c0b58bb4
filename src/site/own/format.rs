//! The formats a catalogue may be in, told by the file's first lines.

use std::fmt;
use std::fs::File;
use std::io::{self, Read as _, Seek, SeekFrom};
use std::path::Path;

use crate::catalog::Target;
use crate::site::fault::{Fault, Faults, FileText};
use crate::site::own::cannot_be_read;
use crate::site::own::csv_format::Csv;
use crate::site::own::orbits::Orbits;
use crate::site::own::votable::Votable;

/// What stands before the rows is looked for among so many bytes.
const HEAD_BYTES: u64 = 256 * 1024;

/// What was read of a piece of a file.
#[derive(Clone, Debug, PartialEq)]
pub enum Read {
    /// No row: a comment, an empty line, a heading.
    Nothing,
    /// A row.
    Target(Box<Target>),
    /// No row, and none follows.
    End,
    /// A row with faults; the spans count from the beginning of the piece.
    Wrong(Vec<Fault>),
}

/// How the rows of a file are written.
pub trait Format: fmt::Debug + Send + Sync {
    /// What ends a row.
    fn end(&self) -> &'static [u8];

    /// Where the rows begin, in bytes.
    fn begin(&self) -> u64;

    /// Reads one row, from behind the end of the one before.
    fn read(&self, piece: &str) -> Read;
}

/// The format of a file; its faults are those of what tells of the columns.
pub(super) fn of(path: &Path, file: &File) -> Result<Box<dyn Format>, Faults> {
    let head = head(file).map_err(|error| cannot_be_read(path, &error))?;
    let head = FileText::from_bytes(path.display().to_string(), head)?;
    if Votable::is_begun_by(&head.text) {
        return Ok(Box::new(Votable::of(&head)?));
    }
    if Orbits::is_begun_by(path, &head.text) {
        return Ok(Box::new(Orbits::of(&head)));
    }
    Ok(Box::new(Csv::of(&head)?))
}

/// The beginning of a file, cut where a character ends.
fn head(mut file: &File) -> io::Result<Vec<u8>> {
    let mut head = Vec::new();
    file.seek(SeekFrom::Start(0))?;
    let read = file.take(HEAD_BYTES).read_to_end(&mut head)?;
    if read as u64 == HEAD_BYTES {
        let whole = head.utf8_chunks().next();
        let whole = whole.map_or(0, |chunk| chunk.valid().len());
        // no more than the last character was cut
        if head.len() - whole < 4 {
            head.truncate(whole);
        }
    }
    Ok(head)
}

/// True of a file that begins as nothing but a catalogue does.
#[must_use]
pub fn is_told_by_beginning(path: &Path) -> bool {
    let beginning = File::open(path).and_then(|file| head(&file));
    beginning.is_ok_and(|head| {
        let text = String::from_utf8_lossy(&head);
        Votable::is_begun_by(&text) || Orbits::is_begun_by(path, &text)
    })
}
