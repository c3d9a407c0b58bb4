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

/// What makes cutting off the fraction a rounding up.
const ROUND_UP: f64 = 1.0 - 1e-9;

/// Rows are weighed in blocks that stay close at hand.
const BLOCK: usize = 1024;

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
        let lost =
            |(at, word): (usize, &Likenesses)| word.is_nowhere() && beside.word(at).is_none();
        if words.iter().enumerate().any(lost) {
            return Candidates {
                most: Vec::new(),
                counts: Vec::new(),
            };
        }
        // by how many words typed are of a name, and how many the name has
        let factors: Vec<[f64; 256]> = (0..=words.len())
            .map(|of_name| {
                std::array::from_fn(|length| likeness::whole(1.0, words.len(), of_name, length))
            })
            .collect();
        let mut found = Candidates {
            most: vec![0; self.rows()],
            counts: vec![0; usize::from(STEPS) + 1],
        };
        let blocks = found.most.chunks_mut(BLOCK).zip(shortest.chunks(BLOCK));
        let mut sums = Sums::default();
        for (block, (most, shortest)) in blocks.enumerate() {
            let is_lost = |(at, word): (usize, &Likenesses)| {
                beside.word(at).is_none() && word.block(block, BLOCK).iter().all(|code| *code == 0)
            };
            if words.iter().enumerate().any(is_lost) {
                continue;
            }
            sums.clear();
            for (at, word) in words.iter().enumerate() {
                let codes = word.block(block, BLOCK);
                match beside.word(at) {
                    Some(worth) => sums.add_with(word, codes, worth, beside.block(block)),
                    None => sums.add(word, codes),
                }
            }
            let rows = most.iter_mut().zip(shortest).zip(sums.of_rows());
            for ((most, shortest), (sum, of_name)) in rows {
                if sum <= 0.0 {
                    continue;
                }
                let of_length = factors.get(usize::from(of_name));
                let factor = of_length.and_then(|factors| factors.get(usize::from(*shortest)));
                let score = sum * factor.copied().unwrap_or(1.0);
                // rounded up, but not for what rounding of the last digits has added
                #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // from 0 to 1001
                let steps = (score * f64::from(STEPS) + ROUND_UP) as u16;
                *most = steps.min(STEPS);
                if let Some(count) = found.counts.get_mut(usize::from(*most)) {
                    *count += 1;
                }
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

/// Of each row of a block, the sum of the likenesses of the words typed, and how many of them are found in its names.
struct Sums {
    sums: [f64; BLOCK],
    of_name: [u8; BLOCK],
}

impl Default for Sums {
    fn default() -> Self {
        Self {
            sums: [0.0; BLOCK],
            of_name: [0; BLOCK],
        }
    }
}

impl Sums {
    fn clear(&mut self) {
        self.sums.fill(0.0);
        self.of_name.fill(0);
    }

    /// Adds a word typed that is nothing beside a name; a row in whose names it is not is lost.
    fn add(&mut self, word: &Likenesses, codes: &[u8]) {
        let rows = self.sums.iter_mut().zip(&mut self.of_name).zip(codes);
        for ((sum, of_name), code) in rows {
            *sum += word.value_or_lost(*code);
            *of_name = of_name.wrapping_add(1);
        }
    }

    /// Adds a word typed that may stand beside a name.
    fn add_with(
        &mut self,
        word: &Likenesses,
        codes: &[u8],
        worth: &Worth,
        (kinds, constellations): (&[u32], &[u8]),
    ) {
        let rows = self.sums.iter_mut().zip(&mut self.of_name).zip(codes);
        let beside = kinds.iter().zip(constellations);
        for (((sum, of_name), code), (kinds, constellation)) in rows.zip(beside) {
            if *code > 0 {
                *sum += word.value_or_lost(*code);
                *of_name = of_name.wrapping_add(1);
            } else {
                let beside = worth.value(*kinds, *constellation);
                *sum += if beside > 0.0 {
                    beside
                } else {
                    f64::NEG_INFINITY
                };
            }
        }
    }

    fn of_rows(&self) -> impl Iterator<Item = (f64, u8)> {
        self.sums.iter().copied().zip(self.of_name.iter().copied())
    }
}

/// What stands beside the names of every row.
struct Beside {
    kinds: Vec<u32>,
    constellations: Vec<u8>,
    /// For each word typed what it is worth beside a name, if it is worth anything.
    words: Vec<Option<Worth>>,
}

/// What a word typed is worth beside a name.
struct Worth {
    /// The kinds it tells of, and the most it is worth so.
    kinds: u32,
    of_kind: f64,
    /// By the row's constellation.
    of_constellation: [f64; 256],
}

impl Beside {
    fn of(index: &Index, words: usize, around: &Surroundings) -> Self {
        let words: Vec<Option<Worth>> = if around.matter() {
            (0..words).map(|word| Worth::of(word, around)).collect()
        } else {
            Vec::new()
        };
        let wanted = words.iter().any(Option::is_some);
        let of_rows = |wanted: bool| wanted.then(|| (index.kinds(), index.constellations()));
        let (kinds, constellations) = of_rows(wanted).unwrap_or_default();
        Self {
            kinds,
            constellations,
            words,
        }
    }

    fn word(&self, at: usize) -> Option<&Worth> {
        self.words.get(at)?.as_ref()
    }

    fn block(&self, block: usize) -> (&[u32], &[u8]) {
        let kinds = self.kinds.chunks(BLOCK).nth(block);
        let constellations = self.constellations.chunks(BLOCK).nth(block);
        (kinds.unwrap_or(&[]), constellations.unwrap_or(&[]))
    }
}

impl Worth {
    fn of(word: usize, around: &Surroundings) -> Option<Self> {
        let (kinds, of_kind, by_constellation) = around.worth(word);
        let mut of_constellation = [0.0; 256];
        for (known, worth) in of_constellation.iter_mut().zip(&by_constellation) {
            *known = *worth;
        }
        let any = kinds != 0 || of_constellation.iter().any(|worth| *worth > 0.0);
        any.then_some(Self {
            kinds,
            of_kind,
            of_constellation,
        })
    }

    #[inline]
    fn value(&self, kinds: u32, constellation: u8) -> f64 {
        let by_kind = if kinds & self.kinds == 0 {
            0.0
        } else {
            self.of_kind
        };
        let by_constellation = self.of_constellation.get(usize::from(constellation));
        by_kind.max(by_constellation.copied().unwrap_or(0.0))
    }
}
