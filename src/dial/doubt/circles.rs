//! The circles misread: one number of the reading at a time, by each usual mistake.

use crate::dial::Sighting;
use crate::dial::doubt::account::{Account, What};
use crate::dial::doubt::explanation::{Circle, Kind};
use crate::dial::doubt::{Questioned, weights};
use crate::metal::{Misreading, Reading};

/// Every account of the reading in which one number was misread.
pub(super) fn misread(questioned: &Questioned<'_>) -> Vec<Account> {
    let mount = questioned.mount;
    let Sighting {
        hour,
        dec,
        hour_opposite,
        dec_opposite,
        ..
    } = *questioned.sighting;
    let numbers = [
        (Circle::Hour, Some(hour)),
        (Circle::HourOpposite, hour_opposite),
        (Circle::Dec, Some(dec)),
        (Circle::DecOpposite, dec_opposite),
    ];
    let mut accounts: Vec<Account> = Vec::new();
    for (circle, reading) in numbers {
        let Some(reading) = reading else { continue };
        let misreadings = match circle {
            Circle::Hour | Circle::HourOpposite => mount.hour_circle.misreadings(reading),
            Circle::Dec | Circle::DecOpposite => mount.declination_circle.misreadings(reading),
        };
        accounts.extend(misreadings.into_iter().map(|misreading| {
            let sighting = with(questioned.sighting, circle, misreading);
            Account {
                what: What::Misread(circle, misreading),
                sight: questioned.sight_of(&sighting, questioned.moment, questioned.target),
                prior: weights::of(misreading.mistake),
            }
        }));
    }
    // of each kind, the accounts share what the kind as a whole has
    for (kind, whole) in [
        (Kind::HourMisread, weights::HOUR_MISREAD),
        (Kind::DecMisread, weights::DEC_MISREAD),
        (Kind::WrongSign, weights::WRONG_SIGN),
    ] {
        let of_kind = |account: &&mut Account| account.what.kind() == kind;
        let sum: f64 = accounts
            .iter_mut()
            .filter(of_kind)
            .map(|account| account.prior)
            .sum();
        for account in accounts.iter_mut().filter(of_kind) {
            account.prior *= whole / sum;
        }
    }
    accounts
}

/// The reading with one number put right.
fn with(sighting: &Sighting, circle: Circle, misreading: Misreading) -> Sighting {
    let mut right = *sighting;
    let reading: Reading = misreading.reading;
    match circle {
        Circle::Hour => right.hour = reading,
        Circle::HourOpposite => right.hour_opposite = Some(reading),
        Circle::Dec => right.dec = reading,
        Circle::DecOpposite => right.dec_opposite = Some(reading),
    }
    right
}
