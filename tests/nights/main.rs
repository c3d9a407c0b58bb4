//! Whole nights on mounts that do not exist: a few of those that `cargo bench --bench nights` simulates, so that a change
//! that spoils them is noticed at once. Tolerances are five sigmas of chance about the figures of the many.
#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss
)]

mod chance;
mod circles;
mod night;
mod sky;
mod tally;

use night::{FED, nights};

/// Few enough to be quick.
const NIGHTS: usize = 40;

/// Five sigmas of chance, in points: the looks of one night hang together, so that nights count rather than looks.
fn chance_points(rate: tally::Rate) -> f64 {
    let share = (rate.percent() / 100.0).clamp(0.01, 0.99);
    500.0 * (share * (1.0 - share) / NIGHTS as f64).sqrt()
}

#[test]
fn a_few_nights_come_out_as_many_do() {
    let figures = nights(NIGHTS, 1);
    for (what, rate, expected) in [
        ("one star", figures.random[0], 24.0),
        ("three stars", figures.random[1], 76.0),
        ("six stars", figures.random[2], 90.0),
        ("six chosen", figures.chosen[2], 93.0),
        ("six timed", figures.timed[2], 99.5),
        ("perfect", figures.perfect, 97.0),
    ] {
        let off = (rate.percent() - expected).abs();
        assert!(off < chance_points(rate), "{what}: {} %", rate.percent());
    }
    assert!(
        (figures.against_bound - 1.0).abs() < 0.3,
        "{}",
        figures.against_bound
    );
    assert!(figures.one_wrong < 1.5, "{}", figures.one_wrong);
    assert!(figures.count == NIGHTS && figures.index_only.percent() < 60.0);
    assert!((figures.fed[FED].percent() - 97.0).abs() < chance_points(figures.fed[FED]));
    // finer circles find more, at every stage
    let [small, large, observatory] = figures.circles;
    let finest = circles::Circles::kinds()[2].name;
    assert!(observatory[2].percent() > 95.0, "{finest}: {observatory:?}");
    for stage in 1..4 {
        assert!(observatory[stage].percent() > large[stage].percent());
        assert!(large[stage].percent() > small[stage].percent());
    }
    for (stated, came, looks) in figures.stated.tenths() {
        // the looks of a night hang together: taken for a tenth as many
        let sigma = 100.0 * (0.25 / (f64::from(looks) / 10.0)).sqrt();
        assert!(
            (stated - came).abs() < 5.0 * sigma,
            "{stated} {came} {looks}"
        );
    }
}
