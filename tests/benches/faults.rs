//! How well improbable readings are explained, and how rarely sound ones are suspected, over many mounts by chance.
#![allow(
    clippy::unwrap_used,
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    missing_docs
)]

use std::process::ExitCode;

#[path = "../nights/chance.rs"]
mod chance;
#[path = "../doubt/fault.rs"]
mod fault;
#[path = "../doubt/night.rs"]
mod night;
#[path = "../doubt/rates.rs"]
mod rates;

/// Sound readings after each number of readings before.
const SOUND_OF_EACH: usize = 2000;

/// Sets with each kind of fault.
const SETS_OF_EACH: usize = 100;

/// Sets of sound readings.
const SOUND_SETS: usize = 1200;

/// Spoilt readings of each kind.
const SPOILT_OF_EACH: usize = 400;

fn main() -> ExitCode {
    let stars = night::bright_stars();
    let (mut sound, mut suspected) = (0, 0);
    for (before, (of, alarms)) in rates::false_alarms(1, &stars, SOUND_OF_EACH) {
        println!("{alarms:>5} of {of} sound readings suspected after {before}");
        sound += of;
        suspected += alarms;
    }
    let (mut spoilt, mut right) = (0, 0);
    for (kind, tally) in rates::explained(2, &stars, SPOILT_OF_EACH) {
        let rates::Tally {
            spoilt: of,
            suspected,
            right: named,
        } = tally;
        println!(
            "{:<14}{of} spoilt, {suspected} suspected, {named} explained by the first",
            kind.word()
        );
        spoilt += tally.spoilt;
        right += tally.right;
    }
    println!("{suspected} of {sound} sound readings suspected; {right} of {spoilt} explained");
    let (mut set_spoilt, mut set_right) = (0, 0);
    for (name, tally) in rates::explained_in_sets(3, &stars, SETS_OF_EACH) {
        let rates::Tally {
            spoilt: of,
            suspected,
            right: named,
        } = tally;
        println!("{name:<24}{of} sets, {suspected} with the right rows, {named} explained");
        set_spoilt += of;
        set_right += named;
    }
    let (in_sets, alarms) = rates::false_alarms_in_sets(4, &stars, SOUND_SETS);
    println!(
        "{alarms} of {in_sets} sound readings of sets suspected; {set_right} of {set_spoilt} sets explained"
    );
    let rarely = suspected * 500 <= sound && alarms * 500 <= in_sets;
    let mostly = right * 10 >= spoilt * 9 && set_right * 10 >= set_spoilt * 9;
    let good = rarely && mostly;
    if good {
        ExitCode::SUCCESS
    } else {
        ExitCode::FAILURE
    }
}
