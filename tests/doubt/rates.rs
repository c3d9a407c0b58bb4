//! How often sound readings are suspected, and how often the first explanation of a spoilt one is the right one.

use std::collections::BTreeMap;

use nonius::catalog::Target;
use nonius::dial::doubt::{Kind, Suspected, suspicions};
use nonius::dial::{Circumstances, Earlier, Questioned, Suspicion};
use nonius::estimate::Sight;

use crate::chance::Chance;
use crate::fault::{Spoilt, SpoiltSet, agreed, spoil, spoil_one, spoil_the_rest};
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
            let earlier: Vec<Read> = night.some_readings(&mut chance, before);
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
            let earlier: Vec<Read> = night.some_readings(&mut chance, before);
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

/// Sets of readings by chance of which one, or all from one on, are spoilt; a set is suspected if the spoilt readings and no
/// others are, and explained if the first explanation of each is the right one.
pub fn explained_in_sets(seed: u64, stars: &[Target], per_kind: usize) -> BTreeMap<String, Tally> {
    let mut chance = Chance::seeded(seed);
    let one: Spoiler = spoil_one;
    let the_rest: Spoiler = spoil_the_rest;
    // a ring or a clock that is wrong stays so
    let single = KINDS
        .into_iter()
        .filter(|kind| !matches!(kind, Kind::Clock | Kind::RingSlipped));
    let ways = single
        .map(|kind| (format!("one {}", kind.word()), kind, one))
        .chain([
            (
                "a ring from then on".to_owned(),
                Kind::RingSlipped,
                the_rest,
            ),
            ("the clock from then on".to_owned(), Kind::Clock, the_rest),
        ]);
    ways.map(|(name, kind, way)| {
        let mut tally = Tally::default();
        while tally.spoilt < per_kind {
            let night = Night::by_chance(&mut chance, stars);
            let Some(set) = way(&mut chance, &night, kind) else {
                continue;
            };
            tally.spoilt += 1;
            let found = in_set(&night, &set.reads);
            let rows: Vec<usize> = found.iter().map(|one| one.row).collect();
            if rows != set.rows.collect::<Vec<_>>() {
                continue;
            }
            tally.suspected += 1;
            let right = found.iter().all(|one| {
                let first = one.suspicion.explanations.first();
                first.is_some_and(|first| set.truth.is(first))
            });
            tally.right += usize::from(right);
        }
        (name, tally)
    })
    .collect()
}

/// Sets of two to seven sound readings by chance: readings, and those suspected.
pub fn false_alarms_in_sets(seed: u64, stars: &[Target], sets: usize) -> (usize, usize) {
    let mut chance = Chance::seeded(seed);
    let (mut sound, mut suspected) = (0, 0);
    for set in 0..sets {
        let night = Night::by_chance(&mut chance, stars);
        let mut reads = night.some_readings(&mut chance, 2 + set % 6);
        reads.sort_by_key(|read| read.moment.utc());
        sound += reads.len();
        suspected += in_set(&night, &reads).len();
    }
    (sound, suspected)
}

/// Spoils a set in one way, if that can be.
type Spoiler = fn(&mut Chance, &Night<'_>, Kind) -> Option<SpoiltSet>;

fn in_set(night: &Night<'_>, reads: &[Read]) -> Vec<Suspected> {
    let rows: Vec<Questioned<'_>> = reads
        .iter()
        .map(|read| read.questioned(night, agreed()))
        .collect();
    suspicions(&night.prior, &rows)
}
