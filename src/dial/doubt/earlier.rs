//! What the other readings of a night tell, while it may still be open what they mean.
//!
//! A circle numbered in quarters, or 0-12-0 without letters, says several things at once, and after one star or two the
//! likeliest of them need not be the true one. A new reading that agrees with another meaning of the others, under which
//! each of them is as sound as before, is no suspicious one: it has told them apart.

use crate::angle::{Angle, Latitude};
use crate::estimate::{Estimate, Fit, Held, Prior, Residual, Sight, fit};

/// A reading trusted less than this, of 1, does not agree with the others.
const TRUSTED: f64 = 0.999;

/// The other readings.
#[derive(Clone, Copy, Debug)]
pub struct Earlier<'a> {
    /// What was known before any reading.
    pub prior: &'a Prior,
    /// The other readings, in any order.
    pub sights: &'a [Sight],
}

impl Earlier<'_> {
    /// The estimate the others make, by the meaning of theirs that the new reading goes best with. `hold` holds the new
    /// reading against an estimate.
    pub(super) fn estimate(
        &self,
        latitude: Latitude,
        new: &Sight,
        hold: impl Fn(&Estimate) -> Option<Held>,
    ) -> Estimate {
        let alone = fit(latitude, self.prior, self.sights);
        let estimate = Estimate::from(&alone);
        let is_open = self
            .sights
            .iter()
            .any(|sight| sight.hour.len() * sight.dec.len() > 1);
        let goes = |estimate: &Estimate| hold(estimate).is_some_and(|held| !held.is_suspicious());
        if !is_open || goes(&estimate) {
            return estimate;
        }
        let other = self
            .by_other_meanings(latitude, new, &alone)
            .map(|fit| Estimate::from(&fit));
        other.filter(goes).unwrap_or(estimate)
    }

    /// The others taken to mean what they do together with the new reading, if that is something else and all of them
    /// are sound by it.
    fn by_other_meanings(&self, latitude: Latitude, new: &Sight, alone: &Fit) -> Option<Fit> {
        let mut together = self.sights.to_vec();
        together.push(new.clone());
        let joint = fit(latitude, self.prior, &together);
        let mut settled = Vec::with_capacity(self.sights.len());
        for (sight, residual) in self.sights.iter().zip(&joint.residuals) {
            let shown = residual.as_ref()?.shown;
            settled.push(Sight {
                hour: vec![shown.hour],
                dec: vec![shown.dec],
                ..sight.clone()
            });
        }
        let same = joint
            .residuals
            .iter()
            .zip(&alone.residuals)
            .all(|(a, b)| matches!((a, b), (Some(a), Some(b)) if is_same(a, b)));
        if same {
            return None;
        }
        let other = fit(latitude, self.prior, &settled);
        let sound = |residual: &Option<Residual>| {
            residual
                .as_ref()
                .is_some_and(|residual| residual.weight() > TRUSTED)
        };
        other.residuals.iter().all(sound).then_some(other)
    }
}

/// True if a reading was taken to mean the same angles.
fn is_same(a: &Residual, b: &Residual) -> bool {
    let same = |a: Angle, b: Angle| (a - b).wrapped_signed().abs().arcseconds() < 1.0;
    same(a.shown.hour.angle(), b.shown.hour.angle())
        && same(a.shown.dec.angle(), b.shown.dec.angle())
}
