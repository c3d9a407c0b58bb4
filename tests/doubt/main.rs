//! Improbable readings explained: a small version of what `cargo test --bench faults` weighs over many nights.
#![allow(
    clippy::unwrap_used,
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss
)]

#[path = "../nights/chance.rs"]
mod chance;
mod fault;
mod night;
mod rates;

#[test]
fn the_first_explanation_is_nearly_always_the_right_one() {
    /// Nine in ten.
    const RIGHT: f64 = 0.9;
    let stars = night::bright_stars();
    let tallies = rates::explained(5, &stars, 72);
    let sum = |of: fn(&rates::Tally) -> usize| tallies.values().map(of).sum::<usize>() as f64;
    let (spoilt, right) = (sum(|one| one.spoilt), sum(|one| one.right));
    assert!(right >= RIGHT * spoilt, "{right} of {spoilt}: {tallies:#?}");
}

#[test]
fn sound_readings_are_hardly_ever_suspected() {
    let stars = night::bright_stars();
    let rates = rates::false_alarms(6, &stars, 250);
    let sum = |of: fn(&(usize, usize)) -> usize| rates.values().map(of).sum::<usize>();
    let (sound, suspected) = (sum(|one| one.0), sum(|one| one.1));
    assert!(
        suspected * 500 <= sound,
        "{suspected} of {sound}: {rates:?}"
    );
}
