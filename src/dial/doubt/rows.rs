//! Which of a set of readings are wrong, when any may be.

use crate::dial::doubt::{Earlier, Questioned, Suspicion};
use crate::estimate::{Estimate, Prior, Sight};

/// A suspicious reading of a set.
#[derive(Clone, Debug, PartialEq)]
pub struct Suspected {
    /// Its place in the set, from 0.
    pub row: usize,
    /// What there is to say against it.
    pub suspicion: Suspicion,
}

/// The suspicious readings of a set, in its order. Each is held against the estimate that the readings not suspected
/// make without it; the one against which most is to be said is set aside first.
#[must_use]
pub fn suspicions(prior: &Prior, rows: &[Questioned<'_>]) -> Vec<Suspected> {
    let sights: Vec<Sight> = rows
        .iter()
        .map(|row| {
            row.sighting
                .sight(row.mount, row.moment, &row.target.source)
        })
        .collect();
    let mut aside: Vec<usize> = Vec::new();
    while let Some(worst) = worst(prior, rows, &sights, &aside) {
        aside.push(worst);
    }
    let mut found: Vec<Suspected> = aside
        .iter()
        .filter_map(|&row| {
            let questioned = rows.get(row)?;
            let estimate = without(prior, rows, &sights, &aside, row)?;
            let suspicion = questioned.suspicion_against(&estimate)?;
            Some(Suspected { row, suspicion })
        })
        .collect();
    found.sort_by_key(|one| one.row);
    found
}

/// The row against which most is to be said, if it is suspicious.
fn worst(
    prior: &Prior,
    rows: &[Questioned<'_>],
    sights: &[Sight],
    aside: &[usize],
) -> Option<usize> {
    rows.iter()
        .enumerate()
        .filter(|(row, _)| !aside.contains(row))
        .filter_map(|(row, questioned)| {
            let estimate = without(prior, rows, sights, aside, row)?;
            let held = questioned.held(&estimate)?;
            if !held.is_suspicious() {
                return None;
            }
            Some((row, questioned.weighed(&estimate)?.ln_mistaken()))
        })
        .max_by(|(_, a), (_, b)| a.total_cmp(b))
        .map(|(row, _)| row)
}

/// The estimate from all readings but one and those set aside, to hold that one against.
fn without(
    prior: &Prior,
    rows: &[Questioned<'_>],
    sights: &[Sight],
    aside: &[usize],
    row: usize,
) -> Option<Estimate> {
    let others: Vec<Sight> = sights
        .iter()
        .enumerate()
        .filter(|(other, _)| *other != row && !aside.contains(other))
        .map(|(_, sight)| sight.clone())
        .collect();
    let earlier = Earlier {
        prior,
        sights: &others,
    };
    Some(rows.get(row)?.estimate(&earlier))
}
