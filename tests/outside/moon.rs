//! How much of the Moon is lit, against J. Meeus, *Astronomical Algorithms*, 2nd edition, example 48.a (its numbers from
//! memory), and against Skyfield at random sites.

use nonius::sky::{Body, Moment};

use crate::observing::{geocentre, moment, utc_of_tt};
use crate::table::rows;

#[test]
fn the_moon_is_lit_as_in_meeuss_example() {
    /// 1992 April 12, 0h TD, as a Julian date.
    const JD: f64 = 2_448_724.5;
    const LIT: f64 = 0.6786;
    /// Printed to four decimals, by a series for the Moon good to 10".
    const PRINTED: f64 = 0.0001;
    let moment = Moment::new(&geocentre(), utc_of_tt(JD));
    let lit = moment.illuminated(Body::Moon);
    assert!((lit - LIT).abs() < PRINTED, "{lit}");
}

#[test]
fn the_moon_is_lit_as_skyfield_has_it() {
    /// By the table's head.
    const TABLE: f64 = 0.0001;
    let mut worst = 0.0_f64;
    for row in rows("moon_lit.csv") {
        let off = moment(&row).illuminated(Body::Moon) - row.number("illuminated");
        worst = worst.max(off.abs());
    }
    assert!(worst < TABLE, "{worst}");
}
