//! A catalogue of the observer's own: an index of its names, and a way to read one row of it.
//!
//! The rows stay in the file they are in, however many they are; only what is found is read.

use std::fmt;

use crate::catalog::Target;
use crate::catalog::asked::Asked;
use crate::catalog::index::Index;

/// The rows of a catalogue.
pub trait Rows: fmt::Debug + Send + Sync {
    /// The target of a row, by what the index calls it; nothing if it can no longer be read.
    fn target(&self, reference: u64) -> Option<Target>;
}

/// A catalogue of the observer's own.
#[derive(Debug)]
pub struct OwnCatalogue {
    index: Index,
    rows: Box<dyn Rows>,
}

impl OwnCatalogue {
    /// From its index and its rows.
    #[must_use]
    pub fn new(index: Index, rows: Box<dyn Rows>) -> Self {
        Self { index, rows }
    }

    /// Its index.
    #[must_use]
    pub const fn index(&self) -> &Index {
        &self.index
    }

    /// The target of a row of the index.
    #[must_use]
    pub fn row(&self, row: usize) -> Option<Target> {
        self.rows.target(self.index.reference(row)?)
    }

    /// What goes by exactly this name; the brightest if several do.
    #[must_use]
    pub fn named(&self, asked: &Asked) -> Option<Target> {
        let mut rows: Vec<usize> = asked
            .spellings()
            .flat_map(|spelling| self.index.rows_named(spelling))
            .collect();
        rows.sort_unstable();
        // a check sum may be shared by another name
        let targets = rows.into_iter().filter_map(|row| self.row(row));
        let mut named = targets.filter(|target| target.names().any(|name| asked.is(name)));
        named.next()
    }
}
