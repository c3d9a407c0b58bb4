//! Another star taken for the one meant: near enough to be gone to instead, and bright enough to be taken for it.

use crate::angle::Angle;
use crate::catalog::Target;
use crate::dial::doubt::account::{Account, What};
use crate::dial::doubt::{Questioned, weights};
use crate::sky::{Observed, Source};

/// Stars nearer than this in the finder are one and the same to the circles.
const SAME_PLACE: Angle = Angle::from_arcminutes(1.0);

/// At this distance a star is half as likely to be taken for another as beside it (common practice, no source).
const NEIGHBOURHOOD: Angle = Angle::from_degrees(15.0);

/// A star of the same constellation is likelier by this (common practice, no source).
const SAME_CONSTELLATION: f64 = 2.0;

/// A star brighter by two magnitudes is not mistaken for the one meant as readily as its equal (common practice, no
/// source).
const BRIGHTER_BY_MAGNITUDES: f64 = 2.0;

/// Taken for the magnitude of a star that states none: that of a bright one.
const BRIGHT: f64 = 1.0;

/// Accounts of the reading in which another star was centred.
pub(super) fn others(questioned: &Questioned<'_>) -> Vec<Account> {
    let Questioned { moment, target, .. } = *questioned;
    let place = |source: &Source| moment.observed(&moment.apparent(source));
    let meant = place(&target.source);
    let mut up: Vec<(&Target, Observed)> = questioned
        .stars
        .iter()
        .map(|star| (star, place(&star.source)))
        .filter(|(_, there)| there.altitude.angle() > Angle::ZERO)
        .collect();
    up.sort_by(|(a, _), (b, _)| magnitude(a).total_cmp(&magnitude(b)));
    let mut taken = vec![meant];
    let mut accounts = Vec::with_capacity(up.len());
    for (star, there) in up {
        // of a close pair the circles know only one
        if taken
            .iter()
            .any(|other| there.separation(other) < SAME_PLACE)
        {
            continue;
        }
        taken.push(there);
        accounts.push(Account {
            what: What::Star(Box::new(star.clone())),
            sight: questioned.sight_of(questioned.sighting, moment, star),
            prior: likeness(target, star, there.separation(&meant)),
        });
    }
    let sum: f64 = accounts.iter().map(|account| account.prior).sum();
    for account in &mut accounts {
        account.prior *= weights::OTHER_STAR / sum;
    }
    accounts
}

fn magnitude(target: &Target) -> f64 {
    target.magnitude.unwrap_or(BRIGHT)
}

/// How readily one star is taken for another, as a proportion.
fn likeness(meant: &Target, star: &Target, apart: Angle) -> f64 {
    let fainter = magnitude(star) - magnitude(meant);
    let alike = if fainter > 0.0 {
        (-fainter * fainter / 2.0).exp()
    } else {
        let brighter = fainter / BRIGHTER_BY_MAGNITUDES;
        (-brighter * brighter / 2.0).exp().max(0.2)
    };
    let distance = apart / NEIGHBOURHOOD;
    let near = 1.0 / (1.0 + distance * distance);
    let constellation = |target: &Target| target.constellation.map(|one| one.abbreviation);
    let same = constellation(meant).is_some() && constellation(meant) == constellation(star);
    alike * near * near * if same { SAME_CONSTELLATION } else { 1.0 }
}
