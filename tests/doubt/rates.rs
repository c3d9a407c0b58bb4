//! How often sound readings are suspected, and how often the first explanation of a spoilt one is the right one.

use std::collections::BTreeMap;

use nonius::catalog::Target;
use nonius::dial::doubt::Kind;
use nonius::dial::{Circumstances, Earlier, Suspicion};
use nonius::estimate::Sight;

use crate::chance::Chance;
use crate::fault::{Spoilt, agreed, spoil};
use crate::night::{Night, Read};

pub const KINDS: [Kind; 7] = [
    Kind::OtherStar,
    Kind::HourMisread,
    Kind::DecMisread,
    Kind::WrongSign,
    Kind::OtherSide,
    Kind::RingSlipped,
    Kind::Clock,
];

/// What came of the spoilt readings of one kind.
#[derive(Clone, Copy, Debug, Default)]
pub struct Tally {
    pub spoilt: usize,
    pub suspected: usize,
    pub right: usize,
}

/// What there is to say against a reading after those before.
fn suspicion(
    night: &Night<'_>,
    before: &[Read],
    read: &Read,
    circumstances: Circumstances,
) -> Option<Suspicion> {
    let sights: Vec<Sight> = before
        .iter()
        .map(|read| {
            read.sighting
                .sight(&night.mount, &read.moment, &read.target.source)
        })
        .collect();
    let earlier = Earlier {
        prior: &night.prior,
        sights: &sights,
    };
    read.questioned(night, circumstances).suspicion(&earlier)
}

/// Sound readings by chance, and how many of them are suspected, by the number of readings before.
pub fn false_alarms(
    seed: u64,
    stars: &[Target],
    per_count: usize,
) -> BTreeMap<usize, (usize, usize)> {
    let mut chance = Chance::seeded(seed);
    let mut rates = BTreeMap::new();
    for before in 1..=6 {
        let mut suspected = 0;
        for _ in 0..per_count {
            let night = Night::by_chance(&mut chance, stars);
            let earlier: Vec<Read> = (0..before)
                .map(|_| night.some_reading(&mut chance))
                .collect();
            let read = night.some_reading(&mut chance);
            let suspicion = suspicion(&night, &earlier, &read, agreed());
            suspected += usize::from(suspicion.is_some());
        }
        rates.insert(before, (per_count, suspected));
    }
    rates
}

/// Spoilt readings by chance after three to six sound ones.
pub fn explained(seed: u64, stars: &[Target], per_kind: usize) -> BTreeMap<Kind, Tally> {
    let mut chance = Chance::seeded(seed);
    let mut tallies = BTreeMap::new();
    for kind in KINDS {
        let mut tally = Tally::default();
        while tally.spoilt < per_kind {
            let night = Night::by_chance(&mut chance, stars);
            let before = 3 + chance.one_of(4);
            let Some(Spoilt {
                read,
                circumstances,
                truth,
            }) = spoil(&mut chance, &night, kind)
            else {
                continue;
            };
            let earlier: Vec<Read> = (0..before)
                .map(|_| night.some_reading(&mut chance))
                .collect();
            tally.spoilt += 1;
            let Some(suspicion) = suspicion(&night, &earlier, &read, circumstances) else {
                continue;
            };
            tally.suspected += 1;
            let right = suspicion
                .explanations
                .first()
                .is_some_and(|first| truth.is(first));
            tally.right += usize::from(right);
        }
        tallies.insert(kind, tally);
    }
    tallies
}
