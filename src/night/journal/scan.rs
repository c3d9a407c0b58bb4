//! The bytes of a journal, whole or hurt, into its events and what is amiss with it.
//!
//! Whatever the bytes, every line that is whole is found: also one that lost the newline before or
//! after it and now stands on one line with damaged neighbours.

use crate::night::event::Stamped;
use crate::night::journal::line::{self, HEAD, Line};
use crate::night::journal::notice::Notice;

/// A journal's bytes, understood.
#[derive(Debug, Default)]
pub(super) struct Scan {
    /// The events in the order they stand in.
    pub events: Vec<Stamped>,
    /// What is amiss.
    pub notices: Vec<Notice>,
    /// How many bytes from the start are to be kept; what follows is torn.
    pub kept: usize,
    /// True if the last kept line lacks its newline.
    pub lacks_newline: bool,
    /// The number of the next line.
    pub next_number: u64,
    /// Lines damaged since the last whole one: they bore numbers too.
    damaged_since: u64,
}

/// True if these bytes could be a journal, be it empty, torn in its first line or damaged.
///
/// Anything else must not be opened for writing: it is somebody's file.
pub(super) fn is_a_journal(bytes: &[u8]) -> bool {
    HEAD.starts_with(bytes)
        || bytes.windows(HEAD.len()).any(|window| window == HEAD)
        // a machine that lost power may leave a file grown and never filled
        || bytes.iter().all(|byte| *byte == 0)
}

/// Reads a whole file.
pub(super) fn scan(bytes: &[u8]) -> Scan {
    let mut scan = Scan {
        next_number: 1,
        ..Scan::default()
    };
    let mut start = 0;
    for (index, piece) in bytes.split_inclusive(|byte| *byte == b'\n').enumerate() {
        let line = index + 1;
        match piece.strip_suffix(b"\n") {
            Some(whole) => {
                scan.ended(line, whole);
                scan.kept = start + piece.len();
            }
            None => scan.unended(line, piece, start),
        }
        start += piece.len();
    }
    scan
}

impl Scan {
    /// A line with its newline.
    fn ended(&mut self, line: usize, bytes: &[u8]) {
        let bytes = bytes.trim_ascii();
        if bytes.is_empty() {
            return;
        }
        if let Some(found) = line::read(bytes) {
            self.take(line, found);
        } else {
            self.notices.push(Notice::Damaged { line });
            self.damaged_since += 1;
            for (found, _) in whole_lines_within(bytes) {
                self.take(line, found);
            }
        }
    }

    /// What stands after the last newline, `start` bytes into the file.
    fn unended(&mut self, line: usize, bytes: &[u8], start: usize) {
        let mut kept = 0;
        for (found, end) in whole_lines_within(bytes) {
            self.take(line, found);
            kept = end;
        }
        if kept > 0 {
            self.kept = start + kept;
            self.lacks_newline = true;
            self.notices.push(Notice::EndLost { line });
        }
        let torn = bytes.get(kept..).unwrap_or_default();
        if !torn.is_empty() {
            let text = String::from_utf8_lossy(torn);
            self.notices.push(Notice::Torn {
                line,
                text: text.escape_debug().to_string(),
            });
        }
    }

    fn take(&mut self, line: usize, found: Line) {
        let number = match &found {
            Line::Event(stamped) => stamped.number,
            Line::Unknown { number, .. } => *number,
        };
        if number < self.next_number {
            if let Line::Event(stamped) = &found
                && self.events.contains(stamped)
            {
                self.notices.push(Notice::Repeated { line, number });
                return;
            }
            self.notices.push(Notice::OutOfOrder { line, number });
        } else {
            if number - self.next_number > self.damaged_since {
                self.notices.push(Notice::Gap {
                    first: self.next_number,
                    last: number - 1,
                });
            }
            self.next_number = number.saturating_add(1);
            self.damaged_since = 0;
        }
        match found {
            Line::Event(stamped) => self.events.push(stamped),
            Line::Unknown { kind, .. } => self.notices.push(Notice::UnknownKind { line, kind }),
        }
    }

    /// The number for the next line: damaged lines at the end have used theirs.
    pub(super) const fn number_to_write(&self) -> u64 {
        self.next_number.saturating_add(self.damaged_since)
    }
}

/// The whole lines anywhere in these bytes, each with where it ends.
fn whole_lines_within(bytes: &[u8]) -> Vec<(Line, usize)> {
    let mut found = Vec::new();
    let starts: Vec<usize> = bytes
        .windows(HEAD.len())
        .enumerate()
        .filter(|(_, window)| *window == HEAD)
        .map(|(at, _)| at)
        .collect();
    for (index, &start) in starts.iter().enumerate() {
        // a line ends before the next one starts
        let limit = starts.get(index + 1).copied().unwrap_or(bytes.len());
        let ends = (start..limit)
            .rev()
            .filter(|at| bytes.get(*at) == Some(&b'}'));
        for end in ends {
            if let Some(line) = bytes.get(start..=end).and_then(line::read) {
                found.push((line, end + 1));
                break;
            }
        }
    }
    found
}
