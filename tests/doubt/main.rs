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
    let tallies = rates::explained(5, &stars, 40);
    let sum = |of: fn(&rates::Tally) -> usize| tallies.values().map(of).sum::<usize>() as f64;
    let (spoilt, right) = (sum(|one| one.spoilt), sum(|one| one.right));
    assert!(right >= RIGHT * spoilt, "{right} of {spoilt}: {tallies:#?}");
}

#[test]
fn sound_readings_are_hardly_ever_suspected() {
    let stars = night::bright_stars();
    let rates = rates::false_alarms(6, &stars, 100);
    let sum = |of: fn(&(usize, usize)) -> usize| rates.values().map(of).sum::<usize>();
    let (sound, suspected) = (sum(|one| one.0), sum(|one| one.1));
    assert!(
        suspected * 500 <= sound,
        "{suspected} of {sound}: {rates:?}"
    );
}

#[test]
fn of_a_set_the_wrong_readings_are_found_and_explained() {
    let stars = night::bright_stars();
    let tallies = rates::explained_in_sets(7, &stars, 3);
    let sum = |of: fn(&rates::Tally) -> usize| tallies.values().map(of).sum::<usize>();
    let (spoilt, right) = (sum(|one| one.spoilt), sum(|one| one.right));
    // nineteen in twenty of many sets; of these few two may be missed by chance
    assert!(right + 2 >= spoilt, "{right} of {spoilt}: {tallies:#?}");
    let (sound, suspected) = rates::false_alarms_in_sets(8, &stars, 40);
    assert!(suspected <= 1, "{suspected} of {sound}");
}
