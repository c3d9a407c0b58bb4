//! The way to the likeliest errors: from several starts, past mistakes, to what ambiguous readings were meant.

use crate::angle::{Angle, Declination, Latitude};
use crate::estimate::descent::{Descent, GROSS_SIGMAS, Gross, Settled, descend, sigma_rad};
use crate::estimate::prior::Prior;
use crate::estimate::resolve::{settle, starts};
use crate::estimate::sight::{Residual, Sight, off};
use crate::metal::{Axes, MountErrors};

/// Readings are taken anew to mean what is nearest to the fit, until none changes; two or three rounds do.
const MOST_ROUNDS: usize = 8;

/// Up to so many sights each is left out in turn where one may be mistaken; among more, one mistake has little leverage.
const MOST_LEFT_OUT: usize = 12;

/// So near a pole the hour axis angle hangs on errors not yet known: such sights join after the others have been fitted.
const NEAR_POLE: Angle = Angle::from_degrees(3.0);

/// The best way found.
pub(super) struct Found {
    pub best: Followed,
    /// How much more the next best meaning of the readings costs, if another was followed.
    pub lead: Option<f64>,
}

/// One start, followed to its end.
pub(super) struct Followed {
    pub descent: Descent,
    settled: Vec<Option<Settled>>,
}

impl Followed {
    fn meanings(&self) -> impl Iterator<Item = Option<Axes>> {
        self.settled
            .iter()
            .map(|settled| settled.as_ref().map(|one| one.shown))
    }

    fn used(&self) -> usize {
        self.settled.iter().flatten().count()
    }

    /// What is left unexplained of each sight, in order.
    pub fn residuals(&self, latitude: Latitude) -> impl Iterator<Item = Option<Residual>> {
        self.settled.iter().map(move |settled| {
            residual(latitude, &self.descent.standing.errors, settled.as_ref()?)
        })
    }
}

/// The cheapest way that uses the most sights; nothing if no start leads anywhere.
pub(super) fn search(latitude: Latitude, prior: &Prior, sights: &[Sight]) -> Option<Found> {
    let mut followed: Vec<Followed> = starts(latitude, prior, sights)
        .iter()
        .filter_map(|start| {
            let near = approach(latitude, prior, sights, start)?;
            follow(latitude, prior, sights, near)
        })
        .collect();
    let cost = |one: &Followed| one.descent.standing.cost;
    // letting a reading go costs at least this, so what is cheaper hides no mistake
    let clean = Gross::LetGo.cost(GROSS_SIGMAS);
    if !followed.iter().any(|one| cost(one) <= clean) {
        followed.extend(without_each(latitude, prior, sights));
    }
    followed.sort_by(|a, b| b.used().cmp(&a.used()).then(cost(a).total_cmp(&cost(b))));
    let mut followed = followed.into_iter();
    let best = followed.next()?;
    let lead = followed
        .find(|other| other.used() == best.used() && !other.meanings().eq(best.meanings()))
        .map(|other| cost(&other) - cost(&best));
    Some(Found { best, lead })
}

/// First descent from a start, with Huber's pull on what is far off.
fn approach(
    latitude: Latitude,
    prior: &Prior,
    sights: &[Sight],
    start: &MountErrors,
) -> Option<Descent> {
    let start = prior.errors_of(&prior.independent(start));
    let mut settled: Vec<Settled> = settle(latitude, &start, sights)
        .into_iter()
        .flatten()
        .collect();
    if settled.iter().any(|one| !near_pole(one.place.declination)) {
        settled.retain(|one| !near_pole(one.place.declination));
    }
    descend(latitude, prior, &start, &settled, Gross::Held)
}

/// Asks what the readings mean and descends again, letting mistakes go, until nothing changes.
fn follow(latitude: Latitude, prior: &Prior, sights: &[Sight], near: Descent) -> Option<Followed> {
    let mut descent = near;
    let mut settled = Vec::new();
    for _ in 0..MOST_ROUNDS {
        let again = settle(latitude, &descent.standing.errors, sights);
        if again == settled {
            break;
        }
        let used: Vec<Settled> = again.iter().flatten().copied().collect();
        let before = descent.steps;
        descent = descend(
            latitude,
            prior,
            &descent.standing.errors,
            &used,
            Gross::LetGo,
        )?;
        descent.steps += before;
        settled = again;
    }
    Some(Followed { descent, settled })
}

/// With few sights a mistake can bend the whole approach. So each is left out of it in turn: without the mistaken one
/// the approach finds the others in agreement.
fn without_each<'a>(
    latitude: Latitude,
    prior: &'a Prior,
    sights: &'a [Sight],
) -> impl Iterator<Item = Followed> + 'a {
    let count = if sights.len() > MOST_LEFT_OUT {
        0
    } else {
        sights.len()
    };
    (0..count).filter_map(move |left_out| {
        let mut others = sights.to_vec();
        others.remove(left_out);
        let start = starts(latitude, prior, &others).into_iter().next()?;
        follow(
            latitude,
            prior,
            sights,
            approach(latitude, prior, &others, &start)?,
        )
    })
}

fn near_pole(declination: Declination) -> bool {
    Angle::from_degrees(90.0) - declination.angle().abs() < NEAR_POLE
}

fn residual(latitude: Latitude, errors: &MountErrors, sight: &Settled) -> Option<Residual> {
    let (predicted, _) = sight.place.foretold(latitude, errors).ok()?;
    let hour = off(sight.shown.hour, predicted.hour);
    let dec = off(sight.shown.dec, predicted.dec);
    Some(Residual {
        shown: sight.shown,
        hour: Angle::from_radians(hour),
        dec: Angle::from_radians(dec),
        hour_weight: Gross::LetGo.weight(hour / sigma_rad(sight.sigma_hour)),
        dec_weight: Gross::LetGo.weight(dec / sigma_rad(sight.sigma_dec)),
    })
}
