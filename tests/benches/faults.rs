//! How well improbable readings are explained, and how rarely sound ones are suspected, over many mounts by chance.
#![allow(clippy::unwrap_used, clippy::panic, missing_docs)]

use std::process::ExitCode;

#[path = "../doubt/chance.rs"]
mod chance;
#[path = "../doubt/fault.rs"]
mod fault;
#[path = "../doubt/night.rs"]
mod night;
#[path = "../doubt/rates.rs"]
mod rates;

fn main() -> ExitCode {
    let stars = night::bright_stars();
    let count = |name: &str, usual: usize| {
        std::env::var(name)
            .ok()
            .and_then(|n| n.parse().ok())
            .unwrap_or(usual)
    };
    let (mut sound, mut suspected) = (0, 0);
    for (before, (of, alarms)) in rates::false_alarms(1, &stars, count("SOUND", 1000)) {
        println!("{alarms:>5} of {of} sound readings suspected after {before}");
        sound += of;
        suspected += alarms;
    }
    let (mut spoilt, mut right) = (0, 0);
    for (kind, tally) in rates::explained(2, &stars, count("SPOILT", 100)) {
        println!("{:<14}{tally:?}", kind.word());
        spoilt += tally.spoilt;
        right += tally.right;
    }
    println!("{suspected} of {sound} sound readings suspected; {right} of {spoilt} explained");
    let good = suspected * 500 <= sound && right * 10 >= spoilt * 9;
    if good {
        ExitCode::SUCCESS
    } else {
        ExitCode::FAILURE
    }
}
