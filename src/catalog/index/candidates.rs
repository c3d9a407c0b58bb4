//! Which rows can fit what was typed, those that can fit best first.
//!
//! What a row can score at most is told from its words without reading the row; the true score, which knows which word
//! belongs to which of its names, is never greater. So the rows are looked at from the most promising down, and the search
//! ends where what is left cannot be better than what is found.

use crate::catalog::index::dictionary::Likenesses;
use crate::catalog::index::layout::{Index, Section, fractions};
use crate::catalog::likeness::{self, Typed};
use crate::catalog::surroundings::Surroundings;

/// Scores are told apart to this.
const STEPS: u16 = 1000;

/// The rows that can fit.
#[derive(Clone, Debug)]
pub struct Candidates {
    /// What each row can score at most, in steps, rounded up; 0 where it cannot fit.
    most: Vec<u16>,
    /// How many rows have each of these scores.
    counts: Vec<u32>,
}

impl Candidates {
    /// The rows and what each can score at most, that falling, and among equals the brightest first.
    pub fn iter(&self) -> impl Iterator<Item = (usize, f64)> {
        let steps = self.counts.iter().enumerate().rev();
        let steps = steps.filter(|(step, count)| *step > 0 && **count > 0);
        steps.flat_map(move |(step, count)| {
            let rows = self.most.iter().enumerate();
            let rows = rows.filter(move |(_, most)| usize::from(**most) == step);
            let score = step as f64 / f64::from(STEPS);
            rows.take(*count as usize).map(move |(row, _)| (row, score))
        })
    }

    /// Scores that differ by less are not told apart.
    #[must_use]
    pub fn step() -> f64 {
        1.0 / f64::from(STEPS)
    }
}

impl Index {
    /// The rows that can fit what was typed.
    #[must_use]
    pub fn candidates(&self, typed: &Typed, around: &Surroundings) -> Candidates {
        let words: Vec<Likenesses> = typed.words().map(|word| self.likenesses(word)).collect();
        let shortest = self.of_rows(Section::Shortest);
        let beside = Beside::of(self, words.len(), around);
        let mut found = Candidates {
            most: vec![0; self.rows()],
            counts: vec![0; usize::from(STEPS) + 1],
        };
        for (row, (most, shortest)) in found.most.iter_mut().zip(shortest.iter()).enumerate() {
            let Some((sum, of_name)) = sum(&words, row, &beside) else {
                continue;
            };
            let score = likeness::whole(sum, words.len(), of_name, usize::from(*shortest));
            #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // from 0 to 1000
            let steps = (score * f64::from(STEPS)).ceil() as u16;
            *most = steps.min(STEPS);
            if let Some(count) = found.counts.get_mut(usize::from(*most)) {
                *count += 1;
            }
        }
        found
    }

    /// Every row, the brightest first.
    #[must_use]
    pub fn everything(&self) -> Candidates {
        let mut counts = vec![0; usize::from(STEPS) + 1];
        if let Some(last) = counts.last_mut() {
            *last = u32::try_from(self.rows()).unwrap_or(u32::MAX);
        }
        Candidates {
            most: vec![STEPS; self.rows()],
            counts,
        }
    }

    /// How many rows are brighter than a magnitude; they are the first ones.
    #[must_use]
    pub fn brighter_than(&self, magnitude: f64) -> usize {
        let magnitudes = self.of_rows(Section::Magnitudes);
        fractions(&magnitudes)
            .take_while(|known| f64::from(*known) < magnitude)
            .count()
    }
}

/// The sum of the likenesses of the words typed, and how many of them are found in the row's names; nothing if a word is
/// nowhere in or beside them.
fn sum(words: &[Likenesses], row: usize, beside: &Beside) -> Option<(f64, usize)> {
    let mut sum = 0.0;
    let mut of_name = 0;
    for (at, word) in words.iter().enumerate() {
        let code = word.codes().get(row).copied().unwrap_or(0);
        if code > 0 {
            sum += word.value(code);
            of_name += 1;
        } else {
            let beside = beside.value(at, row);
            if beside <= 0.0 {
                return None;
            }
            sum += beside;
        }
    }
    Some((sum, of_name))
}

/// What stands beside the names: what each word typed is worth by a row's kinds and its constellation.
struct Beside {
    kinds: Vec<u32>,
    constellations: Vec<u8>,
    /// For each word typed, the kinds it tells of and the most it is worth so, and its worth by the constellation.
    words: Vec<(u32, f64, Vec<f64>)>,
}

impl Beside {
    fn of(index: &Index, words: usize, around: &Surroundings) -> Self {
        if !around.matter() {
            return Self {
                kinds: Vec::new(),
                constellations: Vec::new(),
                words: Vec::new(),
            };
        }
        Self {
            kinds: index.kinds(),
            constellations: index.constellations(),
            words: (0..words).map(|word| around.worth(word)).collect(),
        }
    }

    fn value(&self, word: usize, row: usize) -> f64 {
        let Some((told, worth, of_constellation)) = self.words.get(word) else {
            return 0.0;
        };
        let kinds = self.kinds.get(row).copied().unwrap_or(0);
        let by_kind = if kinds & told == 0 { 0.0 } else { *worth };
        let constellation = self.constellations.get(row).copied().unwrap_or(u8::MAX);
        let by_constellation = of_constellation.get(usize::from(constellation));
        by_kind.max(by_constellation.copied().unwrap_or(0.0))
    }
}
