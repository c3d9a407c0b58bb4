//! A catalogue of orbital elements in the Minor Planet Center's one-line formats; a row is a line.

use std::path::Path;

use crate::catalog::orbit_line;
use crate::site::fault::{Fault, FileText};
use crate::site::own::format::{Format, Read};

/// How the names of such files end, if they say nothing else.
const ENDING: &str = "mpc";

/// The format of one file.
#[derive(Debug)]
pub struct Orbits {
    /// Which of the two its lines are in.
    usual: Option<orbit_line::Format>,
    begin: u64,
}

impl Orbits {
    /// True of a file whose name ends so, or whose text begins with elements.
    pub fn is_begun_by(path: &Path, text: &str) -> bool {
        path.extension().is_some_and(|ending| ending == ENDING)
            || orbit_line::Format::of_text(text).is_some()
    }

    /// Passes over the heading.
    pub fn of(head: &FileText) -> Self {
        Self {
            usual: orbit_line::Format::of_text(&head.text),
            begin: orbit_line::heading(&head.text) as u64,
        }
    }
}

impl Format for Orbits {
    fn end(&self) -> &'static [u8] {
        b"\n"
    }

    fn begin(&self) -> u64 {
        self.begin
    }

    fn read(&self, piece: &str) -> Read {
        let line = piece.trim_end();
        if line.is_empty() {
            return Read::Nothing;
        }
        match orbit_line::read_among(self.usual, line) {
            Ok(target) => Read::Target(Box::new(target)),
            Err(fault) => Read::Wrong(vec![Fault::new(fault.at, fault.message).hint(fault.hint)]),
        }
    }
}
