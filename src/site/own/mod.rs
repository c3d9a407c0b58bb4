//! The observer's own catalogues: files of any size in a format of the trade, of which a row is read when it is wanted.
//!
//! [`open`] tells the format by the file's first lines (`format.rs`) and brings the index of its names, kept from an earlier
//! run if the file is still what it was (`kept.rs`), else made now, which for millions of rows takes seconds. Rows that
//! cannot be read are counted and left out; [`check`] says what is wrong with them.

mod csv_format;
mod format;
mod kept;
mod orbits;
mod pieces;
mod rows;
mod votable;
mod votable_field;
mod votable_head;
mod votable_unit;
mod wrong;

use std::fs::File;
use std::path::{Path, PathBuf};
use std::sync::Arc;

use crate::catalog::OwnCatalogue;
use crate::site::fault::Faults;

pub use format::is_told_by_beginning;
pub use kept::Progress;

/// A catalogue opened.
#[derive(Clone, Debug)]
pub struct Opened {
    /// The catalogue.
    pub catalogue: Arc<OwnCatalogue>,
    /// How many of its rows could not be read.
    pub unread: u64,
}

/// A catalogue's file, and the catalogue or what is wrong with it as a whole.
pub type Tried = (PathBuf, Result<Opened, Faults>);

/// Opens a catalogue; `kept` is the folder in which the indexes of large ones are kept.
///
/// Fails if the file cannot be read, or what tells of its columns is wrong.
pub fn open(path: &Path, kept: &Path, progress: &mut Progress<'_>) -> Result<Opened, Faults> {
    let file = opened(path)?;
    let format = format::of(path, &file)?;
    let index = kept::index(path, &file, format.as_ref(), kept, progress)?;
    let unread = index.stamp().unread;
    let rows = rows::FileRows::new(file, format);
    Ok(Opened {
        catalogue: Arc::new(OwnCatalogue::new(index, Box::new(rows))),
        unread,
    })
}

/// Reads a catalogue from beginning to end and says what is wrong with it.
pub fn check(path: &Path) -> Result<(), Faults> {
    let file = opened(path)?;
    let format = format::of(path, &file)?;
    let mut wrong = wrong::Wrong::of(path);
    let mut sound = 0_u64;
    pieces::each(path, &file, format.as_ref(), |piece, read| match read {
        format::Read::Nothing | format::Read::End => {}
        format::Read::Target(_) => sound += 1,
        format::Read::Wrong(faults) => wrong.add(piece, faults),
    })?;
    wrong.faults(sound)
}

fn opened(path: &Path) -> Result<File, Faults> {
    File::open(path).map_err(|error| cannot_be_read(path, &error))
}

fn cannot_be_read(path: &Path, error: &std::io::Error) -> Faults {
    let hint = Some("look at its name and folder, and whether you may read it".to_owned());
    let message = format!("this file cannot be read: {error}");
    Faults::of_the_file(&path.display().to_string(), message, hint)
}
