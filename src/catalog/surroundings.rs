//! How like the words typed are to the words of each kind and each constellation, worked out once a search.

use crate::catalog::Kind;
use crate::catalog::constellation::CONSTELLATIONS;
use crate::catalog::fold::Words;
use crate::catalog::likeness::{BESIDE, Typed};

/// For every kind and every constellation, and every word typed, the likeness of its likest word.
#[derive(Clone, Debug)]
pub struct Surroundings {
    /// Beside a name, in the order of [`Kind::ALL`].
    kinds: Vec<Vec<f64>>,
    /// Beside a name, in the order of [`CONSTELLATIONS`].
    constellations: Vec<Vec<f64>>,
    /// Within a name, as in "alpha Lyrae", in the same order.
    within: Vec<Vec<f64>>,
    /// Of no words at all.
    nothing: Vec<f64>,
    /// Some word typed is like some kind or constellation beside a name.
    matter: bool,
}

impl Surroundings {
    /// For the words typed.
    #[must_use]
    pub fn new(typed: &Typed) -> Self {
        let words = |texts: &[&str]| {
            let mut words = Words::default();
            for text in texts {
                words.add(text);
            }
            words
        };
        let spelt: Vec<Words> = CONSTELLATIONS
            .iter()
            .map(|c| words(&c.spellings()))
            .collect();
        let kinds: Vec<Vec<f64>> = Kind::ALL
            .iter()
            .map(|kind| typed.beside(&words(&[kind.words()])))
            .collect();
        let constellations: Vec<Vec<f64>> = spelt.iter().map(|words| typed.beside(words)).collect();
        let mut best = typed.beside(&Words::default());
        for likenesses in kinds.iter().chain(&constellations) {
            raise(&mut best, likenesses);
        }
        Self {
            within: spelt.iter().map(|words| typed.each(words)).collect(),
            nothing: typed.beside(&Words::default()),
            matter: best.iter().any(|likeness| *likeness > 0.0),
            kinds,
            constellations,
        }
    }

    /// True if some word typed tells of a kind or a constellation.
    #[must_use]
    pub const fn matter(&self) -> bool {
        self.matter
    }

    /// What a word typed is worth beside a name: a bit for each kind it tells of and the most it is worth so, and its worth
    /// by each constellation, in the order of [`CONSTELLATIONS`].
    #[must_use]
    pub fn worth(&self, word: usize) -> (u32, f64, Vec<f64>) {
        let of = |likenesses: &Vec<f64>| BESIDE * likenesses.get(word).copied().unwrap_or(0.0);
        let (mut told, mut most) = (0, 0.0);
        for (kind, likenesses) in Kind::ALL.iter().zip(&self.kinds) {
            if of(likenesses) > 0.0 {
                told |= kind.bit();
                most = of(likenesses).max(most);
            }
        }
        (told, most, self.constellations.iter().map(of).collect())
    }

    /// For every word typed, its likeness to the spellings of a constellation within a name.
    #[must_use]
    pub fn within_name(&self, constellation: Option<usize>) -> &[f64] {
        let found = constellation.and_then(|at| self.within.get(at));
        found.unwrap_or(&self.nothing)
    }

    /// For every word typed, its likeness to the words of some kinds (by their bits) and a constellation (by its place
    /// among [`CONSTELLATIONS`]) beside a name; the two are looked up only if they matter.
    pub fn fill(
        &self,
        beside: &mut Vec<f64>,
        kinds: impl FnOnce() -> u32,
        constellation: impl FnOnce() -> Option<usize>,
    ) {
        beside.clone_from(&self.nothing);
        if !self.matter {
            return;
        }
        let bits = kinds();
        let told = Kind::ALL.iter().zip(&self.kinds);
        let of_kind = told
            .filter(|(kind, _)| kind.bit() & bits != 0)
            .map(|(_, told)| told);
        let of_constellation = constellation().and_then(|at| self.constellations.get(at));
        for likenesses in of_kind.chain(of_constellation) {
            raise(beside, likenesses);
        }
    }
}

fn raise(likenesses: &mut [f64], others: &[f64]) {
    for (likeness, other) in likenesses.iter_mut().zip(others) {
        *likeness = likeness.max(*other);
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalog::Constellation;

    #[test]
    fn each_word_typed_is_held_against_kind_and_constellation() {
        let around = Surroundings::new(&Typed::new("galaxy virg xyz"));
        let mut beside = Vec::new();
        around.fill(
            &mut beside,
            || Kind::Galaxy.bit(),
            || Constellation::position("Vir"),
        );
        assert!((beside[0] - 1.0).abs() < f64::EPSILON);
        assert!(beside[1] > 0.8 && beside[2] <= 0.0);
        around.fill(&mut beside, || Kind::OpenCluster.bit(), || None);
        assert!(beside.iter().all(|likeness| *likeness <= 0.0));
    }

    #[test]
    fn the_kinds_stand_in_the_order_of_their_numbers() {
        for (at, kind) in Kind::ALL.iter().enumerate() {
            assert_eq!(*kind as usize, at);
        }
    }
}
