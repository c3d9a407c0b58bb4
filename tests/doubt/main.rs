//! Improbable readings explained: a small version of what `cargo test --bench faults` weighs over many nights.
#![allow(clippy::unwrap_used)]

mod chance;
mod fault;
mod night;
mod rates;

#[test]
fn the_first_explanation_is_nearly_always_the_right_one() {
    /// Nine in ten, asked of some thousand faults, holds of a hundred too.
    const RIGHT: f64 = 0.9;
    let stars = night::bright_stars();
    let tallies = rates::explained(5, &stars, 16);
    let sum = |of: fn(&rates::Tally) -> usize| tallies.values().map(of).sum::<usize>() as f64;
    let (spoilt, right) = (sum(|one| one.spoilt), sum(|one| one.right));
    assert!(right >= RIGHT * spoilt, "{right} of {spoilt}: {tallies:#?}");
}

#[test]
fn sound_readings_are_hardly_ever_suspected() {
    let stars = night::bright_stars();
    let rates = rates::false_alarms(6, &stars, 50);
    let suspected: usize = rates.values().map(|(_, suspected)| suspected).sum();
    // one in a thousand is what chance makes; three hundred hold two only once in thirty runs
    assert!(suspected <= 1, "{rates:?}");
}
