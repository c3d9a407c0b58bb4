//! Looking words up: which rows hold a word like the one typed, and how like it is.

use std::ops::Range;

use crate::catalog::index::builder::sum;
use crate::catalog::index::layout::{Index, Section, numbers};
use crate::catalog::likeness::{self, Nearness};

/// For every row, how like its likest word is to a word typed.
///
/// A row has a code, so that a row takes a byte; of two codes the higher one is the greater likeness.
#[derive(Clone, Debug)]
pub(super) struct Likenesses {
    codes: Vec<u8>,
    values: [f64; 256],
    nowhere: bool,
}

/// No word of the row is like it.
const NONE: u8 = 0;
/// The first digits of another number.
const DIGITS: u8 = 1;
/// One slip.
const SLIP: u8 = 2;
/// The beginning of a word that has so many more letters that no more are counted.
const LEAST_BEGINNING: u8 = 3;
/// The word itself; the beginning of a word one letter longer is just below.
const WHOLE: u8 = u8::MAX;

impl Likenesses {
    /// The codes of the rows of a block, blocks being of so many rows.
    pub fn block(&self, block: usize, rows: usize) -> &[u8] {
        let start = (block * rows).min(self.codes.len());
        let end = (start + rows).min(self.codes.len());
        self.codes.get(start..end).unwrap_or(&[])
    }

    /// What a code is worth; for a row without such a word less than anything.
    #[inline]
    pub fn value_or_lost(&self, code: u8) -> f64 {
        self.values
            .get(usize::from(code))
            .copied()
            .unwrap_or(f64::NEG_INFINITY)
    }

    /// True if no row has a word like it.
    pub const fn is_nowhere(&self) -> bool {
        self.nowhere
    }

    fn note(&mut self, code: u8, rows: &[u8]) {
        self.nowhere = false;
        for row in numbers(rows) {
            if let Some(known) = self.codes.get_mut(row as usize) {
                *known = code.max(*known);
            }
        }
    }
}

/// The values of the codes for a word of so many letters.
fn values(letters: usize) -> [f64; 256] {
    let mut values = [0.0; 256];
    for (code, value) in (0..=u8::MAX).zip(&mut values) {
        *value = match code {
            NONE => f64::NEG_INFINITY,
            DIGITS => Nearness::FirstDigits.value(),
            SLIP => Nearness::OneSlip.value(),
            WHOLE => Nearness::Whole.value(),
            beginning => {
                let more = usize::from(WHOLE - beginning);
                let of = letters + more;
                Nearness::Beginning { letters, of }.value()
            }
        };
    }
    values
}

impl Index {
    /// For every row, how like it is to a word typed, which is folded.
    pub(super) fn likenesses(&self, typed: &str) -> Likenesses {
        let mut found = Likenesses {
            codes: vec![NONE; self.rows()],
            values: values(typed.len()),
            nowhere: true,
        };
        if typed.is_empty() {
            return found;
        }
        let begin = self.first_word(|word| word >= typed.as_bytes());
        let end =
            self.first_word(|word| word >= typed.as_bytes() && !word.starts_with(typed.as_bytes()));
        let number = likeness::is_number(typed);
        self.each_of(begin..end, |word, rows| {
            let more = word.len().saturating_sub(typed.len());
            let code = match u8::try_from(more) {
                Ok(0) => WHOLE,
                _ if number => DIGITS,
                Ok(more) => (WHOLE - more).max(LEAST_BEGINNING),
                Err(_) => LEAST_BEGINNING,
            };
            found.note(code, rows);
        });
        if likeness::may_have_a_slip(typed) {
            // numbers stand before letters
            let letters = self.first_word(|word| word.first().is_some_and(|first| *first > b'9'));
            self.each_of(letters..self.words(), |word, rows| {
                if likeness::is_one_slip(typed, word) {
                    found.note(SLIP, rows);
                }
            });
        }
        found
    }

    /// The rows one of whose names may fold to this text, which is folded.
    pub(in crate::catalog) fn rows_named(&self, folded_name: &str) -> Vec<usize> {
        let wanted = sum(folded_name);
        let of = |at: u64| -> Option<(u32, u32)> {
            let entry = self.entries(Section::Names, at..at + 1);
            let mut pair = numbers(&entry);
            Some((pair.next()?, pair.next()?))
        };
        let first = halved(self.names(), |at| {
            of(at).is_some_and(|(sum, _)| sum >= wanted)
        });
        let found = (first..self.names())
            .map_while(of)
            .take_while(|(sum, _)| *sum == wanted);
        found.map(|(_, row)| row as usize).collect()
    }

    /// The place of the first word, in alphabetical order, of which this is true; it is then true of all that follow.
    fn first_word(&self, is_true: impl Fn(&[u8]) -> bool) -> u64 {
        halved(self.words(), |at| {
            let letters = self.span(Section::WordEnds, at..at + 1);
            is_true(&self.entries(Section::Letters, letters))
        })
    }

    /// From where to where, in another section, several entries of a section of ends reach.
    fn span(&self, ends: Section, range: Range<u64>) -> Range<u64> {
        let end = |entries: u64| match entries.checked_sub(1) {
            None => 0,
            Some(last) => {
                let end = numbers(&self.entries(ends, last..entries)).next();
                end.map_or(0, u64::from)
            }
        };
        end(range.start)..end(range.end)
    }

    /// Every word of a range with its rows.
    fn each_of(&self, words: Range<u64>, mut then: impl FnMut(&str, &[u8])) {
        if words.is_empty() {
            return;
        }
        let (letters_at, rows_at) = (
            self.span(Section::WordEnds, words.clone()),
            self.span(Section::RowEnds, words.clone()),
        );
        let letters = self.entries(Section::Letters, letters_at.clone());
        let rows = self.entries(Section::Rows, rows_at.clone());
        let word_ends = self.entries(Section::WordEnds, words.clone());
        let row_ends = self.entries(Section::RowEnds, words);
        let (mut letter, mut row) = (0, 0);
        for (word_end, row_end) in numbers(&word_ends).zip(numbers(&row_ends)) {
            let word_end = within(word_end, letters_at.start);
            let row_end = within(row_end, rows_at.start).saturating_mul(4);
            let word = letters.get(letter..word_end).unwrap_or(&[]);
            if let (Ok(word), Some(rows)) = (std::str::from_utf8(word), rows.get(row..row_end)) {
                then(word, rows);
            }
            (letter, row) = (word_end, row_end);
        }
    }
}

/// How far an end is from where the part read begins.
fn within(end: u32, start: u64) -> usize {
    let distance = u64::from(end).saturating_sub(start);
    usize::try_from(distance).unwrap_or(usize::MAX)
}

/// The first of so many places of which something is true that is true of all that follow it.
fn halved(places: u64, is_true: impl Fn(u64) -> bool) -> u64 {
    let (mut low, mut high) = (0, places);
    while low < high {
        let middle = low.midpoint(high);
        if is_true(middle) {
            high = middle;
        } else {
            low = middle + 1;
        }
    }
    low
}
