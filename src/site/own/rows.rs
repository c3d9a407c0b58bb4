//! The rows of a catalogue, read one by one from its file.

use std::fs::File;
use std::sync::{Mutex, PoisonError};

use crate::catalog::{Rows, Target};
use crate::site::own::format::{Format, Read};
use crate::site::own::pieces;

/// A file and how its rows are written; a row goes by the byte it begins at.
#[derive(Debug)]
pub struct FileRows {
    file: Mutex<File>,
    format: Box<dyn Format>,
}

impl FileRows {
    /// The rows of an open file.
    pub fn new(file: File, format: Box<dyn Format>) -> Self {
        let file = Mutex::new(file);
        Self { file, format }
    }
}

impl Rows for FileRows {
    fn target(&self, reference: u64) -> Option<Target> {
        // the place in the file is sought anew each time: one who panicked leaves nothing behind
        let file = self.file.lock().unwrap_or_else(PoisonError::into_inner);
        let piece = pieces::one(&file, self.format.end(), reference)?;
        match self.format.read(&piece) {
            Read::Target(target) => Some(*target),
            Read::Nothing | Read::End | Read::Wrong(_) => None,
        }
    }
}
