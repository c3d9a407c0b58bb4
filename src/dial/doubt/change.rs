//! Something that changed between two readings and stayed so: a ring slipped, or the clock set wrong.
//!
//! What was learnt before the change is kept but for the index of a ring that slipped; the readings after it are told by
//! that, and by one another.

use crate::angle::Angle;
use crate::dial::doubt::account::{self, What};
use crate::dial::doubt::case::Case;
use crate::dial::doubt::explanation::Off;
use crate::dial::doubt::rows::Told;
use crate::dial::doubt::{Circumstances, Explanation, Questioned};
use crate::estimate::{Prior, Residual, Sight, fit};
use crate::metal::errors::COUNT;
use crate::sky::Moment;

/// A ring that slipped between two readings may have done so by about this, 1 sigma (common practice, no source).
const SLIP: Angle = Angle::from_degrees(20.0);

/// Of the readings after a change one in so many may be wrong for all that.
const ONE_WRONG_IN: usize = 4;

/// So many places at which something may have changed are looked at.
const MOST_PLACES: usize = 4;

/// The story that something changed before a reading.
pub(super) struct Change {
    /// The first reading after it.
    pub from: usize,
    /// The natural logarithm of how likely the readings are so.
    pub ln: f64,
    /// What the readings before it tell.
    pub before: Told,
    /// What those after it tell, counted from the first of them.
    pub after: Told,
    what: What,
}

impl Change {
    /// It as an explanation of one of the readings after it.
    fn explanation(&self, questioned: &Questioned<'_>, share: f64) -> Explanation {
        let (before, after) = (self.before.estimate.errors(), self.after.estimate.errors());
        let off = Off {
            hour: (after.hour_index - before.hour_index).wrapped_signed(),
            dec: (after.dec_index - before.dec_index).wrapped_signed(),
        };
        Explanation::of(questioned, &self.what, off, share)
    }
}

/// The changes as explanations of a reading, of those that come to the same the likeliest with the share of all; `whole`
/// is the natural logarithm of what all stories together come to.
pub(super) fn explanations(
    changes: &[Change],
    row: usize,
    questioned: &Questioned<'_>,
    whole: f64,
) -> Vec<Explanation> {
    let mut before: Vec<&Change> = changes.iter().filter(|change| change.from <= row).collect();
    before.sort_by(|a, b| b.ln.total_cmp(&a.ln));
    let mut likeliest: Vec<(&Change, f64)> = Vec::new();
    for change in before {
        let share = (change.ln - whole).exp();
        match likeliest
            .iter_mut()
            .find(|(other, _)| other.what == change.what)
        {
            Some((_, sum)) => *sum += share,
            None => likeliest.push((change, share)),
        }
    }
    likeliest
        .into_iter()
        .map(|(change, share)| change.explanation(questioned, share))
        .collect()
}

/// What may have changed in a set, as the readings that seem wrong by themselves suggest.
pub(super) fn possible(prior: &Prior, rows: &[Case<'_>], singly: &Told) -> Vec<Change> {
    places(singly, rows.len())
        .into_iter()
        .filter_map(|from| rows.split_at_checked(from))
        .flat_map(|(before, after)| {
            let told = Told::of(prior, before);
            let first = after.first();
            let changes = first.map_or_else(Vec::new, |first| whats(&first.questioned));
            changes.into_iter().filter_map(move |(what, often)| {
                let after = tell_after(&told, &what, after)?;
                Some(Change {
                    from: before.len(),
                    ln: often.ln() + told.ln + after.ln,
                    before: told.clone(),
                    after,
                    what,
                })
            })
        })
        .collect()
}

/// The readings before which something may have changed: where a run of suspicious ones begins or ends. One reading alone
/// after the change is no other story than that it is wrong by itself.
fn places(singly: &Told, rows: usize) -> Vec<usize> {
    let suspected = |row: usize| singly.suspected.iter().any(|one| one.row == row);
    (1..rows.saturating_sub(1))
        .filter(|&row| suspected(row) != suspected(row - 1))
        .take(MOST_PLACES)
        .collect()
}

/// What may change for good before a reading, and how often it does.
fn whats(first: &Questioned<'_>) -> Vec<(What, f64)> {
    let slipped = account::slips(first);
    // one clock may well have been right before
    let clock = account::clock_errors(&Circumstances {
        clock_agreed: false,
        ..first.circumstances
    });
    let slipped = slipped
        .into_iter()
        .map(|(slipped, often)| (What::Slipped(slipped), often));
    let clock = clock
        .into_iter()
        .map(|(seconds, often)| (What::Clock(seconds), often));
    slipped.chain(clock).collect()
}

/// The readings after a change, by what was learnt before it; nothing if they do not agree by it either.
fn tell_after(before: &Told, what: &What, after: &[Case<'_>]) -> Option<Told> {
    let free = |is_free: bool| if is_free { SLIP } else { Angle::ZERO };
    let mut widened_by = [Angle::ZERO; COUNT];
    if let (What::Slipped(slipped), [hour, dec, ..]) = (what, &mut widened_by) {
        (*hour, *dec) = (free(slipped.hour), free(slipped.dec));
    }
    let prior = Prior::from_estimate(&before.estimate, widened_by);
    let What::Clock(seconds) = what else {
        return told_if_agreed(&prior, after);
    };
    let moments: Vec<Moment> = after
        .iter()
        .map(|row| row.questioned.moment.later(*seconds))
        .collect();
    let right: Vec<Case<'_>> = after
        .iter()
        .zip(&moments)
        .map(|(row, moment)| {
            Case::new(Questioned {
                moment,
                ..row.questioned
            })
        })
        .collect();
    told_if_agreed(&prior, &right)
}

/// The story of readings of which a fit trusts all in full, but for one in so many.
fn told_if_agreed(prior: &Prior, rows: &[Case<'_>]) -> Option<Told> {
    let latitude = rows.first()?.questioned.moment.observer().latitude;
    let sights: Vec<Sight> = rows.iter().map(|case| case.sight.clone()).collect();
    let residuals = fit(latitude, prior, &sights).residuals;
    let trusted = |residual: &Residual| residual.weight() >= 1.0;
    let agreed = residuals
        .iter()
        .flatten()
        .filter(|one| trusted(one))
        .count();
    let wrong = rows.len() - agreed;
    (wrong * ONE_WRONG_IN < rows.len()).then(|| Told::of(prior, rows))
}
