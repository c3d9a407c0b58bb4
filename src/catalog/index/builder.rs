//! Making an index, row by row.

use std::collections::HashMap;

use crate::catalog::fold::{Words, folded};
use crate::catalog::index::bytes::Bytes;
use crate::catalog::index::layout::{Counts, Index, Section, Stamp, head};

/// What a search asks of a row beside its names.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Facts {
    /// What the catalogue calls the row.
    pub reference: u64,
    /// Magnitude; nothing where it is unknown.
    pub magnitude: Option<f32>,
    /// The unit vector to it in the ICRS at J2000.0; nothing for what wanders.
    pub direction: Option<[f32; 3]>,
    /// A bit for each kind it is.
    pub kinds: u32,
    /// Its constellation's place in the table of constellations.
    pub constellation: Option<u8>,
}

/// An index in the making.
#[derive(Debug, Default)]
pub struct Builder {
    facts: Vec<Facts>,
    /// Of each row, the words of its shortest name.
    shortest: Vec<u8>,
    /// The words of the rows, one row after another, by their number in the order they came.
    words: Vec<u32>,
    /// Of each row, where its words end.
    ends: Vec<usize>,
    /// Where those of the row begun begin.
    begun: usize,
    dictionary: HashMap<Box<str>, u32>,
    /// Check sums of the folded names, and the rows.
    names: Vec<(u32, u32)>,
    room: Words,
    letters: String,
}

impl Builder {
    /// Begins a row; its names follow.
    pub fn row(&mut self, facts: Facts) {
        self.facts.push(facts);
        self.shortest.push(u8::MAX);
        self.begun = self.words.len();
        self.ends.push(self.begun);
    }

    /// A name of the row begun.
    pub fn name(&mut self, name: &str) {
        self.letters.clear();
        self.letters.extend(folded(name));
        let row = u32::try_from(self.facts.len().saturating_sub(1)).unwrap_or(u32::MAX);
        self.names.push((sum(&self.letters), row));
        let mut room = std::mem::take(&mut self.room);
        room.clear();
        room.add(name);
        let mut count = 0_usize;
        for word in room.iter() {
            self.word(word);
            count += 1;
        }
        self.room = room;
        self.shorten(count);
    }

    /// A designation of the row begun, and the spellings of the word it ends with.
    pub fn designation<'s>(&mut self, before: &str, last: impl IntoIterator<Item = &'s str>) {
        let mut room = std::mem::take(&mut self.room);
        room.clear();
        room.add(before);
        let count = room.iter().count();
        for spelling in last {
            room.add(spelling);
        }
        for word in room.iter() {
            self.word(word);
        }
        self.room = room;
        self.shorten(count + 1);
    }

    fn word(&mut self, word: &str) {
        let known = self.dictionary.get(word).copied();
        let number = known.unwrap_or_else(|| {
            let number = u32::try_from(self.dictionary.len()).unwrap_or(u32::MAX);
            self.dictionary.insert(word.into(), number);
            number
        });
        let so_far = self.words.get(self.begun..).unwrap_or(&[]);
        if !so_far.contains(&number) {
            self.words.push(number);
        }
        if let Some(end) = self.ends.last_mut() {
            *end = self.words.len();
        }
    }

    fn shorten(&mut self, words: usize) {
        let words = u8::try_from(words).unwrap_or(u8::MAX);
        if let Some(shortest) = self.shortest.last_mut() {
            *shortest = words.min(*shortest);
        }
    }

    /// Lays everything out, rows in order of brightness and as they came where that is equal or unknown.
    #[must_use]
    pub fn finish(self, stamp: &Stamp) -> Vec<u8> {
        let of = |row: usize| self.facts.get(row).copied().unwrap_or_default();
        let mut order: Vec<usize> = (0..self.facts.len()).collect();
        let magnitude = |row: usize| of(row).magnitude.unwrap_or(f32::INFINITY);
        order.sort_by(|a, b| magnitude(*a).total_cmp(&magnitude(*b)));

        let mut alphabet: Vec<(&str, u32)> = self
            .dictionary
            .iter()
            .map(|(word, number)| (word.as_ref(), *number))
            .collect();
        alphabet.sort_unstable();
        let mut rank = vec![0_usize; alphabet.len()];
        for (place, (_, number)) in alphabet.iter().enumerate() {
            if let Some(rank) = rank.get_mut(*number as usize) {
                *rank = place;
            }
        }
        let postings = self.postings(&order, &rank);

        let mut place = vec![0_u32; order.len()];
        for (new, old) in order.iter().enumerate() {
            if let (Some(place), Ok(new)) = (place.get_mut(*old), u32::try_from(new)) {
                *place = new;
            }
        }
        let mut names = self.names;
        for (_, row) in &mut names {
            *row = place.get(*row as usize).copied().unwrap_or(*row);
        }
        names.sort_unstable();
        names.dedup();

        let letters: usize = alphabet.iter().map(|(word, _)| word.len()).sum();
        let count = |length: usize| length as u64;
        let counts = Counts {
            rows: count(order.len()),
            names: count(names.len()),
            words: count(alphabet.len()),
            postings: count(postings.rows.len()),
            letters: count(letters),
        };
        let mut bytes = head(&counts, stamp);
        for section in Section::ALL {
            match section {
                Section::References => {
                    bytes.extend(
                        order
                            .iter()
                            .flat_map(|&row| of(row).reference.to_le_bytes()),
                    );
                }
                Section::Magnitudes => bytes.extend(
                    order
                        .iter()
                        .flat_map(|&row| of(row).magnitude.unwrap_or(f32::NAN).to_le_bytes()),
                ),
                Section::Directions => bytes.extend(order.iter().flat_map(|&row| {
                    let direction = of(row).direction.unwrap_or([f32::NAN; 3]);
                    direction.into_iter().flat_map(f32::to_le_bytes)
                })),
                Section::Kinds => {
                    bytes.extend(order.iter().flat_map(|&row| of(row).kinds.to_le_bytes()));
                }
                Section::Constellations => bytes.extend(
                    order
                        .iter()
                        .map(|&row| of(row).constellation.unwrap_or(u8::MAX)),
                ),
                Section::Shortest => bytes.extend(
                    order
                        .iter()
                        .map(|&row| self.shortest.get(row).copied().unwrap_or(u8::MAX)),
                ),
                Section::Names => bytes.extend(
                    names
                        .iter()
                        .flat_map(|(sum, row)| [*sum, *row])
                        .flat_map(u32::to_le_bytes),
                ),
                Section::WordEnds => {
                    let mut end = 0_u32;
                    bytes.extend(alphabet.iter().flat_map(|(word, _)| {
                        end += u32::try_from(word.len()).unwrap_or(0);
                        end.to_le_bytes()
                    }));
                }
                Section::RowEnds => {
                    bytes.extend(postings.ends.iter().flat_map(|end| end.to_le_bytes()));
                }
                Section::Rows => {
                    bytes.extend(postings.rows.iter().flat_map(|row| row.to_le_bytes()));
                }
                Section::Letters => {
                    for (word, _) in &alphabet {
                        bytes.extend(word.as_bytes());
                    }
                }
            }
        }
        bytes
    }

    /// For each word in alphabetical order the rows that hold it.
    fn postings(&self, order: &[usize], rank: &[usize]) -> Postings {
        let mut ends = vec![0_u32; rank.len() + 1];
        let ranked = |number: &u32| rank.get(*number as usize).copied().unwrap_or(0);
        for number in &self.words {
            if let Some(end) = ends.get_mut(ranked(number) + 1) {
                *end += 1;
            }
        }
        let mut sum = 0;
        for end in &mut ends {
            sum += *end;
            *end = sum;
        }
        // the starts move to the ends while the rows are put in
        let mut rows = vec![0_u32; self.words.len()];
        for (new, &old) in order.iter().enumerate() {
            let start = old
                .checked_sub(1)
                .and_then(|before| self.ends.get(before).copied())
                .unwrap_or(0);
            let end = self.ends.get(old).copied().unwrap_or(start);
            for number in self.words.get(start..end).unwrap_or(&[]) {
                let Some(next) = ends.get_mut(ranked(number)) else {
                    continue;
                };
                if let (Some(room), Ok(new)) = (rows.get_mut(*next as usize), u32::try_from(new)) {
                    *room = new;
                }
                *next += 1;
            }
        }
        ends.pop();
        Postings { ends, rows }
    }

    /// The index itself, in memory.
    #[must_use]
    pub fn index(self, stamp: &Stamp) -> Option<Index> {
        Index::open(Bytes::Memory(self.finish(stamp))).ok()
    }
}

struct Postings {
    ends: Vec<u32>,
    rows: Vec<u32>,
}

/// The check sum of a folded name.
pub(super) fn sum(folded_name: &str) -> u32 {
    crc32fast::hash(folded_name.as_bytes())
}
