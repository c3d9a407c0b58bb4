//! What follows from what is known of the mount: which star next and what it would gain, what timing would gain. Worked out
//! when the observer looks, and again when something has changed.

use crate::catalog::Target;
use crate::dial::Setup;
use crate::dial::bright::{self, Placed};
use crate::dial::next_star::{self, NextStar, Timing};
use crate::night::{Known, State};
use crate::screen::words::chance;
use crate::sky::Moment;

/// What follows from what is known of the mount.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Insight {
    /// The stars worth reading, the most helpful first.
    pub next: Vec<NextStar>,
    /// What timing would gain.
    pub timing: Option<Timing>,
    /// All stars well placed: those worth reading first, then by brightness.
    pub stars: Vec<Placed>,
}

impl Insight {
    /// At a moment, for the objects of the list still to be dialled.
    #[must_use]
    pub fn of(
        setup: &Setup<'_>,
        moment: &Moment,
        bright: &[Target],
        known: &Known,
        state: &State,
    ) -> Self {
        let rest = still_to_dial(state);
        let next = next_star::next_stars(setup, moment, bright, &rest);
        let mut stars: Vec<Placed> = next.iter().map(|next| next.placed.clone()).collect();
        let others = bright::well_placed(setup, moment, bright).into_iter();
        let others = others.filter(|placed| {
            let mut known = stars.iter();
            !known.any(|star| star.star.name == placed.star.name)
        });
        let others: Vec<Placed> = others.collect();
        stars.extend(others);
        let before = known.prior.covariance();
        Self {
            timing: next_star::timing(setup, moment, before, &known.sights, &rest),
            next,
            stars,
        }
    }

    /// What reading a star would gain, if it is worth reading.
    #[must_use]
    pub fn gain(&self, star: &str) -> Option<f64> {
        let mut next = self.next.iter();
        let found = next.find(|next| next.placed.star.name == star)?;
        Some(found.gain())
    }

    /// Which star next, in a sentence.
    #[must_use]
    pub fn next_in_words(&self) -> String {
        self.next.first().map_or_else(
            || "no star would help much now".to_owned(),
            |next| {
                format!(
                    "next star: {}, {}: first look {} -> {}",
                    next.placed.star.name,
                    next.placed.side.in_words(),
                    chance(next.first_look),
                    chance(next.first_look_after)
                )
            },
        )
    }

    /// What timing would gain, in a sentence, if it is worth a word.
    #[must_use]
    pub fn timing_in_words(&self) -> Option<String> {
        /// Points of a first look.
        const WORTH_A_WORD: f64 = 0.02;
        let timing = self
            .timing
            .filter(|timing| timing.timed - timing.first_look > WORTH_A_WORD)?;
        Some(format!(
            "stars timed on a mark (d) and objects awaited on the mark: {} -> {}",
            chance(timing.first_look),
            chance(timing.timed)
        ))
    }
}

/// The objects of the list still to be dialled, that being dialled first.
fn still_to_dial(state: &State) -> Vec<Target> {
    let from = state.current.unwrap_or_default();
    let after = state.targets.iter().skip(from);
    after
        .filter(|entry| entry.outcome.is_none())
        .filter_map(|entry| entry.target.target())
        .collect()
}
