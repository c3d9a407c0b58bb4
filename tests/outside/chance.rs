//! The chance of a first look against an integral by slices, apart from the program.

use nalgebra::Matrix2;
use nonius::angle::Angle;
use nonius::estimate::chance;

use crate::table::rows;

/// The head of the file says why.
const TOLERANCE: f64 = 1e-6;

#[test]
fn chances_agree_with_an_integral_by_slices() {
    let square = Angle::from_radians(1.0).arcminutes().powi(2);
    let mut worst = 0.0_f64;
    for row in rows("chance.csv") {
        let covariance = Matrix2::new(
            row.number("west_variance_arcmin2"),
            row.number("covariance_arcmin2"),
            row.number("covariance_arcmin2"),
            row.number("north_variance_arcmin2"),
        ) / square;
        let field = Angle::from_arcminutes(row.number("field_arcmin"));
        let off = (chance(&covariance, field) - row.number("chance")).abs();
        assert!(off < TOLERANCE, "{row:?} is off by {off:e}");
        worst = worst.max(off);
    }
    println!("worst {worst:e}");
}
