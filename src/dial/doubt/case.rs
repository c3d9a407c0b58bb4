//! One reading with all accounts of it, held against one estimate or another.
//!
//! What each account makes of the reading does not hang on the estimate and is worked out once, when it is first asked
//! for: a sound reading never asks.

use std::cell::OnceCell;

use crate::dial::doubt::account::{self, Account};
use crate::dial::doubt::explanation::{LEAST_SHARE, Off};
use crate::dial::doubt::weights::{SOUND, UNEXPLAINED};
use crate::dial::doubt::{Earlier, Explanation, Questioned, Suspicion};
use crate::estimate::{Estimate, Held, Sight, Slipped, ln_sum};

/// A reading with all accounts of it.
pub(super) struct Case<'a> {
    pub questioned: Questioned<'a>,
    /// What the reading says as it was given.
    pub sight: Sight,
    accounts: OnceCell<Vec<Account>>,
}

/// All accounts of a reading, weighed: natural logarithms of prior times density.
pub(super) struct Weighed<'a> {
    questioned: &'a Questioned<'a>,
    held: Held,
    sound_ln: f64,
    unexplained_ln: f64,
    accounts: Vec<(&'a Account, Held, f64)>,
}

impl<'a> Case<'a> {
    pub fn new(questioned: Questioned<'a>) -> Self {
        let Questioned {
            sighting,
            moment,
            target,
            ..
        } = questioned;
        Self {
            sight: questioned.sight_of(sighting, moment, target),
            questioned,
            accounts: OnceCell::new(),
        }
    }

    /// What there is to say against the reading, if it is suspicious by an estimate that does not rest on it.
    pub fn suspicion(&self, estimate: &Estimate) -> Option<Suspicion> {
        self.suspicious(estimate).map(|weighed| weighed.suspicion())
    }

    /// All that weighs against the reading, if it is suspicious.
    pub fn suspicious(&self, estimate: &Estimate) -> Option<Weighed<'_>> {
        self.held(estimate).filter(Held::is_suspicious)?;
        self.weighed(estimate)
    }

    /// The estimate of other readings, by the meaning of theirs that goes best with this one.
    pub fn estimate(&self, earlier: &Earlier<'_>) -> Estimate {
        let latitude = self.questioned.moment.observer().latitude;
        earlier.estimate(latitude, &self.sight, |estimate| self.held(estimate))
    }

    /// The reading held against an estimate that does not rest on it.
    pub fn held(&self, estimate: &Estimate) -> Option<Held> {
        self.hold(estimate, &self.sight, Slipped::default())
    }

    fn hold(&self, estimate: &Estimate, sight: &Sight, slipped: Slipped) -> Option<Held> {
        let latitude = self.questioned.moment.observer().latitude;
        estimate.hold(latitude, sight, slipped).ok().flatten()
    }

    /// Weighs every account of the reading.
    pub fn weighed(&self, estimate: &Estimate) -> Option<Weighed<'_>> {
        let held = self.held(estimate)?;
        let blunders = [(true, false), (false, true)].map(|(hour, dec)| {
            let held = self.hold(estimate, &self.sight, Slipped { hour, dec });
            held.map_or(f64::NEG_INFINITY, |held| held.ln_density)
        });
        let accounts = self
            .accounts
            .get_or_init(|| account::all(&self.questioned, &self.sight));
        let accounts = accounts.iter().filter_map(|account| {
            let held = self.hold(estimate, &account.sight, account.slipped())?;
            Some((account, held, account.prior.ln() + held.ln_density))
        });
        Some(Weighed {
            questioned: &self.questioned,
            held,
            sound_ln: SOUND.ln() + held.ln_density,
            unexplained_ln: UNEXPLAINED.ln() + ln_sum(&blunders),
            accounts: accounts.collect(),
        })
    }
}

impl Weighed<'_> {
    /// How much likelier some mistake is than a sound reading, as the natural logarithm of the ratio.
    pub(super) fn ln_mistaken(&self) -> f64 {
        let mut parts: Vec<f64> = self.accounts.iter().map(|(_, _, ln)| *ln).collect();
        parts.push(self.unexplained_ln);
        ln_sum(&parts) - self.sound_ln
    }

    /// The likelihood of the reading under all accounts together, a natural logarithm.
    pub(super) fn ln_all(&self) -> f64 {
        let mistaken = self.sound_ln + self.ln_mistaken();
        ln_sum(&[self.sound_ln, mistaken])
    }

    /// A suspicion of the same reading with explanations from elsewhere, which it ranks.
    pub(super) fn with(&self, mut explanations: Vec<Explanation>) -> Suspicion {
        explanations.sort_by(|a, b| b.share.total_cmp(&a.share));
        let least = explanations
            .first()
            .map_or(0.0, |best| best.share.min(LEAST_SHARE));
        explanations.retain(|one| one.share >= least);
        let sum: f64 = explanations.iter().map(|one| one.share).sum();
        Suspicion {
            improbability: self.held.improbability(),
            hour_off: self.held.hour_off,
            dec_off: self.held.dec_off,
            sound: 0.0,
            unexplained: (1.0 - sum).max(0.0),
            explanations,
        }
    }

    /// Ranks the accounts by their share.
    pub(super) fn suspicion(&self) -> Suspicion {
        let whole = self.ln_all();
        let share = |ln: f64| (ln - whole).exp();
        let mut ranked: Vec<_> = self.accounts.iter().collect();
        ranked.sort_by(|(_, _, a), (_, _, b)| b.total_cmp(a));
        let explanations = ranked
            .into_iter()
            .enumerate()
            .map(|(rank, (account, held, ln))| (rank, account, held, share(*ln)))
            .filter(|(rank, _, _, share)| *rank == 0 || *share >= LEAST_SHARE)
            .map(|(_, account, held, share)| {
                Explanation::of(self.questioned, &account.what, Off::from(held), share)
            })
            .collect();
        Suspicion {
            improbability: self.held.improbability(),
            hour_off: self.held.hour_off,
            dec_off: self.held.dec_off,
            sound: share(self.sound_ln),
            unexplained: share(self.unexplained_ln),
            explanations,
        }
    }
}
