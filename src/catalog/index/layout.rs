//! How an index is laid out: a head, then one section after another, every number little-endian.
//!
//! | section | an entry | for each |
//! |---|---|---|
//! | references | u64: what the catalogue calls the row | row |
//! | magnitudes | f32: not a number where unknown | row |
//! | directions | 3 f32: the unit vector in the ICRS, not numbers where there is no fixed place | row |
//! | kinds | u32: a bit for each kind it is | row |
//! | constellations | u8: 255 for none | row |
//! | shortest | u8: words of its shortest name | row |
//! | names | u32 check sum of a folded name, u32 row; in order of the check sum | name |
//! | word ends | u32: where its letters end in the section of letters | word |
//! | row ends | u32: where its rows end in the section of rows | word |
//! | rows | u32: the rows that hold the word, in order | word and row |
//! | letters | the words themselves, in alphabetical order | |

use std::borrow::Cow;
use std::ops::Range;

use crate::catalog::index::bytes::Bytes;

/// The first bytes of an index; the last of them counts the changes of the layout.
const MARK: [u8; 8] = *b"nonius\x00\x01";

/// The head: the mark, eight counts.
const HEAD: u64 = 8 + 8 * 8;

/// Of which state of which file an index was made: one made of another is out of date.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Stamp {
    /// The file's length in bytes.
    pub length: u64,
    /// When it was last written, in nanoseconds since 1970, as the file system says.
    pub written: u64,
    /// How many of its rows could not be read.
    pub unread: u64,
}

/// An index that cannot be read: cut short, or not one.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error("this is not a whole index")]
pub struct Damaged;

/// How many of everything.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Counts {
    pub rows: u64,
    pub names: u64,
    pub words: u64,
    pub postings: u64,
    pub letters: u64,
}

/// A section, in its order.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Section {
    References,
    Magnitudes,
    Directions,
    Kinds,
    Constellations,
    Shortest,
    Names,
    WordEnds,
    RowEnds,
    Rows,
    Letters,
}

impl Section {
    pub const ALL: [Self; 11] = [
        Self::References,
        Self::Magnitudes,
        Self::Directions,
        Self::Kinds,
        Self::Constellations,
        Self::Shortest,
        Self::Names,
        Self::WordEnds,
        Self::RowEnds,
        Self::Rows,
        Self::Letters,
    ];

    /// Bytes of one entry.
    const fn width(self) -> u64 {
        match self {
            Self::References | Self::Names => 8,
            Self::Directions => 12,
            Self::Magnitudes | Self::Kinds | Self::WordEnds | Self::RowEnds | Self::Rows => 4,
            Self::Constellations | Self::Shortest | Self::Letters => 1,
        }
    }

    const fn entries(self, counts: &Counts) -> u64 {
        match self {
            Self::References
            | Self::Magnitudes
            | Self::Directions
            | Self::Kinds
            | Self::Constellations
            | Self::Shortest => counts.rows,
            Self::Names => counts.names,
            Self::WordEnds | Self::RowEnds => counts.words,
            Self::Rows => counts.postings,
            Self::Letters => counts.letters,
        }
    }
}

/// The head of an index.
pub(super) fn head(counts: &Counts, stamp: &Stamp) -> Vec<u8> {
    let numbers = [
        counts.rows,
        counts.names,
        counts.words,
        counts.postings,
        counts.letters,
        stamp.length,
        stamp.written,
        stamp.unread,
    ];
    let numbers = numbers.into_iter().flat_map(u64::to_le_bytes);
    MARK.into_iter().chain(numbers).collect()
}

/// An index to be searched.
#[derive(Debug)]
pub struct Index {
    bytes: Bytes,
    counts: Counts,
    stamp: Stamp,
}

impl Index {
    /// Reads the head; the rest is read as it is wanted.
    pub fn open(bytes: Bytes) -> Result<Self, Damaged> {
        let head = bytes.part(0..HEAD).ok_or(Damaged)?;
        let numbers = head.strip_prefix(&MARK).ok_or(Damaged)?;
        let numbers: Vec<u64> = numbers
            .as_chunks::<8>()
            .0
            .iter()
            .map(|bytes| u64::from_le_bytes(*bytes))
            .collect();
        let &[
            rows,
            names,
            words,
            postings,
            letters,
            length,
            written,
            unread,
        ] = numbers.as_slice()
        else {
            return Err(Damaged);
        };
        let counts = Counts {
            rows,
            names,
            words,
            postings,
            letters,
        };
        // no count of a whole index is beyond what its numbers can hold
        let most = u64::from(u32::MAX);
        if [rows, names, words, postings, letters]
            .iter()
            .any(|&count| count > most)
        {
            return Err(Damaged);
        }
        let stamp = Stamp {
            length,
            written,
            unread,
        };
        drop(head);
        let index = Self {
            bytes,
            counts,
            stamp,
        };
        // the last byte is there, and so is all before it
        let end = index.place(Section::Letters).end;
        index.bytes.part(end - 1..end).ok_or(Damaged)?;
        Ok(index)
    }

    /// Of what it was made.
    #[must_use]
    pub const fn stamp(&self) -> Stamp {
        self.stamp
    }

    /// How many rows it has.
    #[must_use]
    pub fn rows(&self) -> usize {
        usize::try_from(self.counts.rows).unwrap_or(usize::MAX)
    }

    pub(super) const fn words(&self) -> u64 {
        self.counts.words
    }

    pub(super) const fn names(&self) -> u64 {
        self.counts.names
    }

    fn place(&self, section: Section) -> Range<u64> {
        let mut start = HEAD;
        for one in Section::ALL {
            let end = start + one.width() * one.entries(&self.counts);
            if one == section {
                return start..end;
            }
            start = end;
        }
        start..start
    }

    /// Entries of a section; nothing beyond its end.
    pub(super) fn entries(&self, section: Section, range: Range<u64>) -> Cow<'_, [u8]> {
        let place = self.place(section);
        let at = |entry: u64| {
            place
                .start
                .saturating_add(entry.saturating_mul(section.width()))
        };
        let (start, end) = (at(range.start), at(range.end));
        if start > end || end > place.end {
            return Cow::Borrowed(&[]);
        }
        self.bytes.part(start..end).unwrap_or_default()
    }

    /// All of a section that has an entry for each row.
    pub(super) fn of_rows(&self, section: Section) -> Cow<'_, [u8]> {
        self.entries(section, 0..self.counts.rows)
    }

    /// The bits of the kinds of every row.
    #[must_use]
    pub fn kinds(&self) -> Vec<u32> {
        numbers(&self.of_rows(Section::Kinds)).collect()
    }

    /// The bits of the kinds of one row.
    #[must_use]
    pub fn kinds_of(&self, row: usize) -> u32 {
        let row = u64::try_from(row).unwrap_or(u64::MAX - 1);
        numbers(&self.entries(Section::Kinds, row..row + 1))
            .next()
            .unwrap_or(0)
    }

    /// The place in the table of constellations of every row's; 255 for none.
    #[must_use]
    pub fn constellations(&self) -> Vec<u8> {
        self.of_rows(Section::Constellations).into_owned()
    }

    /// The unit vector of every row in the ICRS; not numbers where it has no fixed place.
    #[must_use]
    pub fn directions(&self) -> Vec<[f32; 3]> {
        let parts: Vec<f32> = fractions(&self.of_rows(Section::Directions)).collect();
        parts.as_chunks::<3>().0.to_vec()
    }

    /// What the catalogue calls a row.
    #[must_use]
    pub fn reference(&self, row: usize) -> Option<u64> {
        let row = u64::try_from(row).ok()?;
        let entry = self.entries(Section::References, row..row + 1);
        Some(u64::from_le_bytes(*entry.first_chunk()?))
    }
}

/// The whole numbers of a run of bytes.
pub(super) fn numbers(bytes: &[u8]) -> impl Iterator<Item = u32> {
    bytes
        .as_chunks::<4>()
        .0
        .iter()
        .map(|bytes| u32::from_le_bytes(*bytes))
}

/// The fractions of a run of bytes.
pub(super) fn fractions(bytes: &[u8]) -> impl Iterator<Item = f32> {
    numbers(bytes).map(f32::from_bits)
}
