//! The words typed held against one entry of the catalogues after another; scores from 0 to 1.

use crate::catalog::deep_sky::DeepSkyObject;
use crate::catalog::fold::Words;
use crate::catalog::likeness::Typed;
use crate::catalog::stars::{Star, StarNames};
use crate::catalog::surroundings::Surroundings;
use crate::catalog::{Constellation, Target};

/// What is typed, and the words of one entry after another.
#[derive(Clone, Debug)]
pub struct Scorer {
    typed: Typed,
    around: Surroundings,
    words: Words,
    beside: Vec<f64>,
}

impl Scorer {
    /// For the words typed.
    #[must_use]
    pub fn new(typed: Typed) -> Self {
        Self {
            around: Surroundings::new(&typed),
            typed,
            words: Words::default(),
            beside: Vec::new(),
        }
    }

    /// The words typed.
    #[must_use]
    pub const fn typed(&self) -> &Typed {
        &self.typed
    }

    /// What the words typed tell of kinds and constellations.
    #[must_use]
    pub const fn around(&self) -> &Surroundings {
        &self.around
    }

    /// Takes what stands beside the names that follow.
    fn beside(
        &mut self,
        kinds: impl FnOnce() -> u32,
        constellation: impl FnOnce() -> Option<usize>,
    ) {
        self.around.fill(&mut self.beside, kinds, constellation);
    }

    /// The likeness of the best of several names.
    fn best<'n>(&mut self, names: impl IntoIterator<Item = &'n str>) -> f64 {
        let mut best: f64 = 0.0;
        for name in names {
            self.words.clear();
            self.words.add(name);
            best = best.max(self.typed.likeness(self.words.iter(), None, &self.beside));
        }
        best
    }

    /// The likeness of a target by its names; 1 where nothing was typed.
    pub fn target(&mut self, target: &Target) -> f64 {
        if self.typed.is_empty() {
            return 1.0;
        }
        let position = || Constellation::position(target.constellation?.abbreviation);
        self.beside(|| target.kind.bit(), position);
        self.best(target.names())
    }

    /// The likeness of a cluster, nebula or galaxy.
    pub fn deep_sky(&mut self, object: DeepSkyObject) -> f64 {
        self.beside(|| object.kind().bit(), || object.constellation_position());
        self.best(object.names())
    }

    /// The likeness of a star, which is of these kinds, by its names.
    pub fn star(&mut self, names: &StarNames, kinds: u32) -> f64 {
        let constellation = Constellation::position(names.constellation);
        self.beside(|| kinds, || constellation);
        let proper = self.best(names.proper());
        let within = Some(self.around.within_name(constellation));
        // letter and number are written in the table as they fold
        let designations = [names.bayer, names.flamsteed]
            .into_iter()
            .filter(|before| !before.is_empty());
        designations
            .map(|before| self.typed.likeness(before.split(' '), within, &self.beside))
            .fold(proper, f64::max)
    }

    /// The likeness of a star by its Hipparcos number.
    #[must_use]
    pub fn hip(&self, star: Star) -> f64 {
        let nothing = self.around.within_name(None);
        self.typed
            .likeness(["hip", star.hip_text()].into_iter(), None, nothing)
    }
}
