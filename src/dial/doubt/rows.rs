//! Which of a set of readings are wrong, when any may be.
//!
//! Two stories are told of a set and weighed against each other: that some readings are wrong each by itself, and that from
//! one of them on something had changed for all that follow, a ring or the clock ([`change`]).
//!
//! A reading is held against the estimate of the others. That of a wrong one among them drags nothing along as long as
//! there are enough sound ones; with two readings that disagree either may be the wrong one, and both are named.

use crate::angle::Latitude;
use crate::dial::doubt::case::{Case, Weighed};
use crate::dial::doubt::change::{self, Change};
use crate::dial::doubt::{Earlier, Questioned, Suspicion, weights};
use crate::estimate::{Estimate, Prior, Residual, Sight, fit, ln_sum};

/// Another row is named beside the likeliest culprit if it is the wrong one at least so often.
const RIVAL_SHARE: f64 = 0.1;

/// A reading whose squared distance from the others, in sigmas, comes to less than this to first order is held against
/// them no further: suspicious ones are beyond 13.8.
const NEAR_SQUARED: f64 = 6.0;

/// A suspicious reading of a set.
#[derive(Clone, Debug, PartialEq)]
pub struct Suspected {
    /// Its place in the set, from 0.
    pub row: usize,
    /// What there is to say against it.
    pub suspicion: Suspicion,
}

/// The suspicious readings of a set, which must be in the order of time.
#[must_use]
pub fn suspicions(prior: &Prior, rows: &[Questioned<'_>]) -> Vec<Suspected> {
    let rows: Vec<Case<'_>> = rows.iter().copied().map(Case::new).collect();
    let set = Set { prior, rows: &rows };
    let apart = set.set_apart();
    if apart.aside.is_empty() {
        return Vec::new();
    }
    let singly = set.told(apart);
    let changes = change::possible(prior, &rows, &singly);
    let mut lns: Vec<f64> = changes.iter().map(|change| change.ln).collect();
    lns.push(singly.ln);
    let whole = ln_sum(&lns);
    let likeliest = changes
        .iter()
        .filter(|change| change.ln > singly.ln)
        .max_by(|a, b| a.ln.total_cmp(&b.ln));
    match likeliest {
        Some(change) => changed(&rows, &singly, &changes, change, whole),
        None => singly.suspected,
    }
}

/// What is said of a set that something changed in: every reading from then on is suspicious for the same reason.
fn changed(
    rows: &[Case<'_>],
    singly: &Told,
    changes: &[Change],
    likeliest: &Change,
    whole: f64,
) -> Vec<Suspected> {
    let mut found = likeliest.before.suspected.clone();
    for (row, case) in rows.iter().enumerate().skip(likeliest.from) {
        let alone = likeliest.after.suspected.iter();
        let alone = alone.filter(|one| one.row + likeliest.from == row);
        if let Some(suspected) = alone.clone().next() {
            // wrong by itself, whatever else had changed
            found.push(Suspected {
                row,
                suspicion: suspected.suspicion.clone(),
            });
            continue;
        }
        let Some(weighed) = case.weighed(&likeliest.before.estimate) else {
            continue;
        };
        let mut explanations = change::explanations(changes, row, &case.questioned, whole);
        let by_itself = (singly.ln - whole).exp();
        let single = singly.suspected.iter().find(|one| one.row == row);
        if let Some(single) = single {
            explanations.extend(single.suspicion.clone().scaled(by_itself).explanations);
        }
        found.push(Suspected {
            row,
            suspicion: weighed.with(explanations),
        });
    }
    found
}

/// The story that some readings are wrong, each by itself.
#[derive(Clone, Debug)]
pub(super) struct Told {
    /// The natural logarithm of how likely the readings are so.
    pub ln: f64,
    /// Which are suspicious.
    pub suspected: Vec<Suspected>,
    /// What the others tell of the mount.
    pub estimate: Estimate,
}

/// A suspicious reading with all that weighs against it.
struct Against<'a> {
    row: usize,
    weighed: Weighed<'a>,
}

impl Against<'_> {
    fn ln(&self) -> f64 {
        self.weighed.ln_mistaken()
    }
}

impl Told {
    /// The story of a set.
    pub(super) fn of(prior: &Prior, rows: &[Case<'_>]) -> Self {
        let set = Set { prior, rows };
        set.told(set.set_apart())
    }
}

/// Those set aside of a set.
struct Apart {
    /// The rows, in the order in which they were set aside.
    aside: Vec<usize>,
    /// How likely the last of them is the wrong one, rather than one of its rivals.
    share_of_last: f64,
    /// Those that may as well be the wrong ones instead of the last.
    rivals: Vec<Suspected>,
}

/// A set of readings in the order of time.
struct Set<'a> {
    prior: &'a Prior,
    rows: &'a [Case<'a>],
}

impl Set<'_> {
    /// Sets the readings aside one by one against which most is to be said, until those that are left agree.
    fn set_apart(&self) -> Apart {
        let mut apart = Apart {
            aside: Vec::new(),
            share_of_last: 1.0,
            rivals: Vec::new(),
        };
        // more than half cannot all be wrong each by itself: then it is the mount that is not as the model has it
        let most = (self.rows.len() / 2).max(1);
        while apart.aside.len() < most {
            let mut against = self.against(&apart.aside);
            against.sort_by(|a, b| b.ln().total_cmp(&a.ln()));
            let lns: Vec<f64> = against.iter().map(Against::ln).collect();
            let whole = ln_sum(&lns);
            let mut against = against.into_iter();
            let Some(worst) = against.next() else {
                break;
            };
            apart.aside.push(worst.row);
            apart.rivals = against
                .map(|one| (one.row, (one.ln() - whole).exp(), one.weighed))
                .filter(|(_, share, _)| *share > RIVAL_SHARE)
                .map(|(row, share, weighed)| {
                    let suspicion = weighed.suspicion().scaled(share);
                    Suspected { row, suspicion }
                })
                .collect();
            apart.share_of_last = if apart.rivals.is_empty() {
                1.0
            } else {
                (lns.first().copied().unwrap_or(whole) - whole).exp()
            };
        }
        apart
    }

    /// The rows not yet set aside that may be suspicious, by a fit of them all.
    fn doubtful(&self, aside: &[usize]) -> Vec<usize> {
        let Some(latitude) = self.latitude() else {
            return Vec::new();
        };
        let left = (0..self.rows.len()).filter(|row| !aside.contains(row));
        let sights = self.sights(|row| !aside.contains(&row));
        let all = fit(latitude, self.prior, &sights);
        let estimate = Estimate::from(&all);
        let is_near = |sight: &Sight, residual: &Option<Residual>| {
            let residual = residual.as_ref()?;
            let squared = estimate.squared_without(latitude, sight, residual)?;
            Some(squared < NEAR_SQUARED)
        };
        left.zip(sights.iter().zip(&all.residuals))
            .filter(|(_, (sight, residual))| is_near(sight, residual) != Some(true))
            .map(|(row, _)| row)
            .collect()
    }

    fn latitude(&self) -> Option<Latitude> {
        self.rows
            .first()
            .map(|row| row.questioned.moment.observer().latitude)
    }

    /// What weighs against each suspicious reading not yet set aside.
    fn against(&self, aside: &[usize]) -> Vec<Against<'_>> {
        let doubtful = self.doubtful(aside).into_iter();
        doubtful
            .filter_map(|row| {
                let case = self.rows.get(row)?;
                let others = self.sights(|other| other != row && !aside.contains(&other));
                let estimate = case.estimate(&Earlier {
                    prior: self.prior,
                    sights: &others,
                });
                let weighed = case.suspicious(&estimate)?;
                Some(Against { row, weighed })
            })
            .collect()
    }

    /// The whole story, once it is known which are set aside: the others told one after the other, each by those before
    /// it, and those aside by all the others.
    fn told(&self, apart: Apart) -> Told {
        let Apart {
            aside,
            share_of_last,
            rivals,
        } = apart;
        let mut ln = 0.0;
        let mut suspected = Vec::new();
        for (row, case) in self.rows.iter().enumerate() {
            let is_aside = aside.contains(&row);
            let others = self.sights(|other| !aside.contains(&other) && (is_aside || other < row));
            let estimate = case.estimate(&Earlier {
                prior: self.prior,
                sights: &others,
            });
            if is_aside {
                let Some(weighed) = case.weighed(&estimate) else {
                    continue;
                };
                ln += weighed.ln_all();
                let suspicion = weighed.suspicion();
                let share = if aside.last() == Some(&row) {
                    share_of_last
                } else {
                    1.0
                };
                suspected.push(Suspected {
                    row,
                    suspicion: suspicion.scaled(share),
                });
            } else if let Some(held) = case.held(&estimate) {
                ln += weights::SOUND.ln() + held.ln_density;
            }
        }
        suspected.extend(rivals);
        suspected.sort_by_key(|one| one.row);
        let left = self.sights(|row| !aside.contains(&row));
        let estimate = self.latitude().map_or_else(
            || Estimate::from_prior(self.prior),
            |latitude| Estimate::from(&fit(latitude, self.prior, &left)),
        );
        Told {
            ln,
            suspected,
            estimate,
        }
    }

    fn sights(&self, wanted: impl Fn(usize) -> bool) -> Vec<Sight> {
        self.rows
            .iter()
            .enumerate()
            .filter(|(row, _)| wanted(*row))
            .map(|(_, case)| case.sight.clone())
            .collect()
    }
}
