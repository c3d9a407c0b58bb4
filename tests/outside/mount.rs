//! The exact geometry of the mount against derivations apart from the program, and a published pair of readings.

use nonius::angle::{Angle, AxisAngle, Declination, HourAngle, Latitude};
use nonius::metal::{Axes, MountErrors, Side, to_axes};

use crate::table::{Row, number_of, rows};

/// The names of the errors in the columns, in the order of `MountErrors::to_array`.
const ERRORS: [&str; 7] = [
    "hour_index_arcmin",
    "dec_index_arcmin",
    "polar_high_arcmin",
    "polar_east_arcmin",
    "cone_arcmin",
    "skew_arcmin",
    "sag_arcmin",
];

/// The side a row names.
pub fn side(row: &Row) -> Side {
    match row.text("side") {
        "tube-west" => Side::TubeWest,
        "tube-east" => Side::TubeEast,
        "single" => Side::Single,
        other => panic!("no side is called {other}"),
    }
}

/// The errors a row names.
pub fn errors(row: &Row) -> MountErrors {
    MountErrors::with_centred_circles(ERRORS.map(|name| Angle::from_arcminutes(row.number(name))))
}

/// The observed place and latitude a row names.
pub fn place(row: &Row) -> (HourAngle, Declination, Latitude) {
    (
        HourAngle::from_degrees(row.number("hour_angle_deg")),
        Declination::from_degrees(row.number("declination_deg")),
        Latitude::from_degrees(row.number("latitude_deg")),
    )
}

/// How far an axis angle lies from a number of degrees, in degrees, the shorter way round.
pub fn off_deg(axis: AxisAngle, degrees: f64) -> f64 {
    (axis.angle() - Angle::from_degrees(degrees))
        .wrapped_signed()
        .abs()
        .degrees()
}

fn compare(file: &str, tolerance_deg: f64) -> usize {
    let mut out_of_reach = 0;
    let table = rows(file);
    for row in &table {
        let (hour_angle, declination, latitude) = place(row);
        let found = to_axes(hour_angle, declination, latitude, &errors(row), side(row));
        if row.text("hour_axis_deg").is_empty() {
            assert!(found.is_err(), "{row:?}");
            out_of_reach += 1;
        } else {
            let axes = found.unwrap();
            assert!(
                off_deg(axes.hour, row.number("hour_axis_deg")) < tolerance_deg,
                "{row:?} {axes:?}"
            );
            assert!(
                off_deg(axes.dec, row.number("dec_axis_deg")) < tolerance_deg,
                "{row:?} {axes:?}"
            );
        }
    }
    println!("{file}: {} rows, {out_of_reach} out of reach", table.len());
    out_of_reach
}

#[test]
fn axes_agree_with_the_worked_checks() {
    /// Twice the rounding of the printed values.
    const TOLERANCE_DEG: f64 = 1e-5;
    compare("mount_worked.csv", TOLERANCE_DEG);
}

#[test]
fn axes_agree_with_a_second_derivation() {
    /// Double precision made worse by the nearness of the pole; the head of the file says the same.
    const TOLERANCE_DEG: f64 = 1e-8;
    assert!(
        compare("mount_geometry.csv", TOLERANCE_DEG) > 0,
        "no row was out of reach"
    );
}

/// J. N. Lockyer, Stargazing, ch. XXI: a star near the upper meridian, read on both sides of the pier on a quartered
/// declination circle, gives the index error and how low the instrument's pole lies.
#[test]
fn a_published_pair_of_readings_comes_out_of_its_index_and_polar_error() {
    /// Each printed value is rounded to a second, and two of them enter.
    const TOLERANCE_ARCSEC: f64 = 1.0;
    let table = rows("mount_two_sides.csv");
    let value = |quantity: &str| Angle::from_degrees(number_of(&table, quantity));
    let errors = MountErrors {
        dec_index: value("index error"),
        polar_high: -value("pole of the instrument too low by"),
        ..MountErrors::default()
    };
    // the observed place is lifted by refraction; on the meridian the latitude does not enter
    let declination = Declination::new(value("declination of the star") + value("refraction"));
    let read = |side| -> Axes {
        let (meridian, latitude) = (HourAngle::default(), Latitude::from_degrees(52.0));
        to_axes(meridian, declination, latitude, &errors, side).unwrap()
    };
    let west = read(Side::TubeWest).dec.angle();
    // beyond the pole a quartered circle counts back
    let east = Angle::HALF_TURN - read(Side::TubeEast).dec.angle();
    let low = value("reading tube on one side");
    let high = value("reading tube on the other side");
    assert!(
        (west - high).abs().arcseconds() < TOLERANCE_ARCSEC,
        "{}",
        west.degrees()
    );
    assert!(
        (east - low).abs().arcseconds() < TOLERANCE_ARCSEC,
        "{}",
        east.degrees()
    );
}
