//! A file cut into its rows, one after another, of which each knows where it begins.

use std::fs::File;
use std::io::{self, BufRead, BufReader, Seek, SeekFrom};
use std::path::Path;

use crate::site::fault::{Fault, Faults};
use crate::site::own::cannot_be_read;
use crate::site::own::format::{Format, Read};

/// A row longer than this is no row: the file is something else.
const LONGEST_BYTES: usize = 1024 * 1024;

/// A row of a file as it is written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Piece<'p> {
    /// Where it begins, in bytes.
    pub at: u64,
    /// The line it begins in, from 1.
    pub line: u64,
    /// Its text, its end with it; what is not UTF-8 is replaced.
    pub text: &'p str,
}

/// Reads every row of a file.
pub fn each(
    path: &Path,
    file: &File,
    format: &dyn Format,
    mut then: impl FnMut(Piece<'_>, Read),
) -> Result<(), Faults> {
    let mut reader = BufReader::with_capacity(1 << 16, file);
    let cannot = |error: io::Error| cannot_be_read(path, &error);
    // the lines before the rows
    reader.seek(SeekFrom::Start(0)).map_err(cannot)?;
    let mut line = 1;
    let mut at = 0;
    let mut bytes = Vec::new();
    while at < format.begin() {
        bytes.clear();
        let before = usize::try_from(format.begin() - at).unwrap_or(usize::MAX);
        let there = reader.fill_buf().map_err(cannot)?;
        let read = there.len().min(before);
        if read == 0 {
            break;
        }
        line += lines(there.get(..read).unwrap_or(&[]));
        reader.consume(read);
        at += read as u64;
    }
    while read_piece(&mut reader, format.end(), &mut bytes).map_err(cannot)? {
        let text = String::from_utf8_lossy(&bytes);
        let read = match text {
            std::borrow::Cow::Borrowed(text) if text.len() < LONGEST_BYTES => format.read(text),
            std::borrow::Cow::Borrowed(_) => Read::Wrong(vec![
                Fault::new(0..1, "this row is too long").hint("is this file a catalogue?"),
            ]),
            std::borrow::Cow::Owned(_) => {
                let at = bytes
                    .utf8_chunks()
                    .next()
                    .map_or(0, |chunk| chunk.valid().len());
                let wide = char::REPLACEMENT_CHARACTER.len_utf8();
                let fault = Fault::new(at..at + wide, "this is not UTF-8 text");
                Read::Wrong(vec![fault.hint("save the file as UTF-8")])
            }
        };
        let piece = Piece {
            at,
            line,
            text: &text,
        };
        if read == Read::End {
            break;
        }
        then(piece, read);
        line += lines(&bytes);
        at += bytes.len() as u64;
        bytes.clear();
    }
    Ok(())
}

/// The row that begins at a byte, with its end.
pub fn one(file: &File, end: &[u8], at: u64) -> Option<String> {
    let mut reader = BufReader::with_capacity(1024, file);
    reader.seek(SeekFrom::Start(at)).ok()?;
    let mut bytes = Vec::new();
    read_piece(&mut reader, end, &mut bytes).ok()?;
    String::from_utf8(bytes).ok()
}

/// Reads up to the next end and over it; false if nothing is left.
fn read_piece(reader: &mut impl BufRead, end: &[u8], bytes: &mut Vec<u8>) -> io::Result<bool> {
    bytes.clear();
    let Some(last) = end.last() else {
        return Ok(false);
    };
    while reader.read_until(*last, bytes)? > 0 {
        if bytes.ends_with(end) || bytes.len() >= LONGEST_BYTES {
            break;
        }
    }
    Ok(!bytes.is_empty())
}

fn lines(bytes: &[u8]) -> u64 {
    memchr::memchr_iter(b'\n', bytes).count() as u64
}
