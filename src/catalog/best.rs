//! The best of what a search has found so far.

use crate::catalog::{Found, Target};

/// Something in the catalogues that fits.
struct Hit {
    target: Target,
    score: f64,
    magnitude: f64,
}

/// The best found so far.
pub struct Best {
    hits: Vec<Hit>,
    limit: usize,
}

impl Best {
    /// None yet, of so many wanted.
    pub const fn of(limit: usize) -> Self {
        Self {
            hits: Vec::new(),
            limit,
        }
    }

    /// True if there are as many as are wanted, none worse than this.
    pub fn is_full_of(&self, score: f64) -> bool {
        self.hits.len() >= self.limit && self.hits.last().is_none_or(|worst| worst.score >= score)
    }

    /// Takes one in if it is among the best, after those that are as good and as bright.
    pub fn offer(
        &mut self,
        score: f64,
        magnitude: Option<f64>,
        target: impl FnOnce() -> Option<Target>,
    ) {
        let magnitude = magnitude.unwrap_or(f64::INFINITY);
        let place = self.hits.partition_point(|hit| {
            let worse = hit.score.total_cmp(&score).reverse();
            worse.then(hit.magnitude.total_cmp(&magnitude)).is_le()
        });
        if score <= 0.0 || place >= self.limit {
            return;
        }
        let Some(target) = target() else { return };
        let hit = Hit {
            target,
            score,
            magnitude,
        };
        self.hits.insert(place, hit);
        self.hits.truncate(self.limit);
    }

    /// Takes in what is among the best of others.
    pub fn join(&mut self, other: Self) {
        for hit in other.hits {
            let target = hit.target;
            self.offer(hit.score, target.magnitude, || Some(target));
        }
    }

    /// The best in order.
    pub fn found(self) -> Vec<Found> {
        let found = self.hits.into_iter();
        found
            .map(|Hit { target, score, .. }| Found { target, score })
            .collect()
    }
}
