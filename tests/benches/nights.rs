//! Whole nights on many mounts that do not exist: how often an object is in the field at the first look, whether stated
//! chances come true, how near the estimate comes to what is possible.
//!
//! `cargo bench --bench nights [-- NIGHTS [SEED]]`; ends with status 1 if a figure is not what it should be.
#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    missing_docs
)]

#[path = "../nights/chance.rs"]
mod chance;
#[path = "../nights/circles.rs"]
mod circles;
#[path = "../nights/night.rs"]
mod night;
#[path = "../nights/sky.rs"]
mod sky;
#[path = "../nights/tally.rs"]
mod tally;

use std::process::ExitCode;

use night::{FED, Figures, nights};

/// Enough that chance moves a rate by less than half a point or so.
const NIGHTS: usize = 2000;
/// How far a rate may be from what it should be, in points.
const RATE_POINTS: f64 = 1.5;
/// How far a stated chance may be from what comes true, in points.
const STATED_POINTS: f64 = 2.0;
/// A tenth with fewer looks than this says little: chance alone moves it by a point.
const ENOUGH_LOOKS: u32 = 2000;

fn main() -> ExitCode {
    // cargo passes --bench
    let mut numbers = std::env::args()
        .skip(1)
        .filter_map(|word| word.parse::<u64>().ok());
    let count = numbers.next().map_or(NIGHTS, |count| count as usize);
    let seed = numbers.next().unwrap_or(1);
    let figures = nights(count, seed);
    if report(&figures) {
        ExitCode::SUCCESS
    } else {
        println!("not every figure is what it should be");
        ExitCode::FAILURE
    }
}

/// Prints the figures; true if all are what they should be.
fn report(figures: &Figures) -> bool {
    let mut good = true;
    println!("{} nights of 20 objects, a field of 1°", figures.count);
    println!("first look                           found      should be");
    let mut rate = |what: &str, rate: &tally::Rate, should: f64, within: f64| {
        let holds = (rate.percent() - should).abs() <= within;
        good &= holds;
        let mark = if holds { "" } else { "  <-- off" };
        println!(
            "{what:<36}{:>5.1} %     {should:>5.1} %{mark}",
            rate.percent()
        );
    };
    let [one, three, six] = &figures.random;
    println!(
        "  index of one star only            {:>5.1} %",
        figures.index_only.percent()
    );
    rate("  one star at random", one, 24.0, RATE_POINTS);
    rate("  three", three, 76.0, RATE_POINTS);
    rate("  six", six, 90.0, RATE_POINTS);
    let [one, three, six] = &figures.chosen;
    rate("  one star chosen for the list", one, 30.0, RATE_POINTS);
    rate("  three", three, 84.0, RATE_POINTS);
    rate("  six", six, 93.0, RATE_POINTS);
    let [one, three, six] = &figures.timed;
    rate("  one chosen, timed, on the mark", one, 35.0, RATE_POINTS);
    rate("  three", three, 98.0, RATE_POINTS);
    rate("  six", six, 99.5, RATE_POINTS);
    rate(
        "  perfect knowledge of the mount",
        &figures.perfect,
        97.0,
        RATE_POINTS,
    );
    let perfect = figures.perfect.percent();
    // ten readings more, or thirty, cannot bring it within a point of that: the estimate is at the bound, see below
    rate(
        "  three chosen, ten objects read",
        &figures.fed[10],
        94.5,
        RATE_POINTS,
    );
    rate(
        "  three chosen, fifty objects read",
        &figures.fed[FED],
        perfect,
        1.0,
    );
    print!("three chosen, and so many objects read:");
    for (count, fed) in figures.fed.iter().enumerate().step_by(10) {
        print!("  {count}: {:.0} %", fed.percent());
    }
    println!();
    println!("circles as built, stars chosen:           one  three    six  perfect knowledge");
    for (kind, rates) in circles::Circles::kinds().iter().zip(&figures.circles) {
        let [one, three, six, perfect] = rates.map(tally::Rate::percent);
        println!(
            "  {:<38}{one:>4.0} %  {three:>3.0} %  {six:>3.0} %  {perfect:>3.0} %",
            kind.name
        );
    }
    println!("stated    came true    looks");
    for (stated, came, looks) in figures.stated.tenths() {
        let holds = looks < ENOUGH_LOOKS || (stated - came).abs() <= STATED_POINTS;
        good &= holds;
        let mark = if holds { "" } else { "  <-- off" };
        println!("{stated:>5.1} %     {came:>5.1} %  {looks:>7}{mark}");
    }
    let bound = figures.against_bound;
    let holds = (bound - 1.0).abs() <= 0.05;
    good &= holds;
    println!("error of the estimate against the Cramér-Rao bound at six stars: {bound:.3}");
    let holds = figures.one_wrong <= 1.5;
    good &= holds;
    println!(
        "one wrong reading in six: the rest is told wrong by {:.2} stated sigmas in the median",
        figures.one_wrong
    );
    good
}
