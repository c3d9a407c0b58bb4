//! The estimate of the mount's errors against a maximum a posteriori fit apart from the program, and against a
//! published pair of readings.

use nonius::angle::{Angle, AxisAngle};
use nonius::estimate::{Estimate, Fit, Prior, Sight, fit};
use nonius::metal::{ExpectedErrors, OppositeVerniers};

use crate::mount::{errors, off_deg, place, side};
use crate::table::{Row, number_of, rows};

/// The fits are converged to some 1e-6'; the head of the file says the same.
const ERROR_TOLERANCE_ARCMIN: f64 = 0.001;

/// Of each covariance, relative to the two sigmas: the finite differences of the reference are good to 1e-8, the
/// ends of the two descents a little less.
const COVARIANCE_TOLERANCE: f64 = 1e-5;

/// Of each predicted axis angle.
const PREDICTION_TOLERANCE_DEG: f64 = 1e-5;

/// The index errors of the reference have a prior of 60°, as the program's always have.
const FREE_INDEX_ARCMIN: f64 = 3600.0;

fn prior(row: &Row) -> Prior {
    for index in ["prior_hour_index_arcmin", "prior_dec_index_arcmin"] {
        assert!((row.number(index) - FREE_INDEX_ARCMIN).abs() < 1e-9);
    }
    let sigma = |name: &str| Angle::from_arcminutes(row.number(&format!("prior_{name}_arcmin")));
    Prior::from_expected(&ExpectedErrors {
        polar_high: sigma("polar_high"),
        polar_east: sigma("polar_east"),
        cone: sigma("cone"),
        skew: sigma("skew"),
        sag: sigma("sag"),
        ..ExpectedErrors::default()
    })
}

fn sight(row: &Row) -> Sight {
    let (hour_angle, declination, _) = place(row);
    Sight {
        hour_angle,
        declination,
        side: side(row),
        hour: vec![AxisAngle::from_degrees(row.number("hour_axis_deg"))],
        dec: vec![AxisAngle::from_degrees(row.number("dec_axis_deg"))],
        sigma_hour: Angle::from_arcminutes(row.number("sigma_hour_arcmin")),
        sigma_dec: Angle::from_arcminutes(row.number("sigma_dec_arcmin")),
        opposite: OppositeVerniers::default(),
    }
}

/// Each mount of the reference: its row of expectations and its fit.
fn fits() -> Vec<(Row, Fit)> {
    let readings = rows("mount_map_readings.csv");
    rows("mount_map_expected.csv")
        .into_iter()
        .map(|expected| {
            let own: Vec<&Row> = readings
                .iter()
                .filter(|row| row.text("case") == expected.text("case"))
                .collect();
            let sights: Vec<Sight> = own.iter().map(|row| sight(row)).collect();
            let (_, _, latitude) = place(own.first().unwrap());
            let fit = fit(latitude, &prior(&expected), &sights);
            assert!(fit.converged, "case {}", expected.text("case"));
            (expected, fit)
        })
        .collect()
}

#[test]
fn errors_and_sigmas_agree_with_a_fit_apart_from_the_program() {
    let (mut worst_error, mut worst_covariance) = (0.0_f64, 0.0_f64);
    for (expected, fit) in fits() {
        let pairs = fit
            .errors
            .to_array()
            .into_iter()
            .zip(errors(&expected).to_array());
        for (found, expected) in pairs {
            worst_error = worst_error.max((found - expected).abs().arcminutes());
        }
        let reference: Vec<f64> = expected
            .text("covariance_arcmin2")
            .split(' ')
            .map(|number| number.parse().unwrap())
            .collect();
        assert_eq!(reference.len(), 49);
        let square = Angle::from_radians(1.0).arcminutes().powi(2);
        for row in 0..7 {
            for column in 0..7 {
                let sigmas = (reference[row * 8] * reference[column * 8]).sqrt();
                let off = fit.covariance[(row, column)] * square - reference[row * 7 + column];
                worst_covariance = worst_covariance.max((off / sigmas).abs());
            }
        }
        for residual in &fit.residuals {
            assert!((residual.unwrap().weight() - 1.0).abs() < f64::EPSILON);
        }
    }
    println!("worst error {worst_error:e}', worst covariance {worst_covariance:e}");
    assert!(worst_error < ERROR_TOLERANCE_ARCMIN, "{worst_error}");
    assert!(
        worst_covariance < COVARIANCE_TOLERANCE,
        "{worst_covariance}"
    );
}

#[test]
fn the_largest_residuals_agree_with_a_fit_apart_from_the_program() {
    /// Of a sigma: an error of 0.001' against the smallest reading error, 0.2'.
    const TOLERANCE_SIGMAS: f64 = 0.005;
    let readings = rows("mount_map_readings.csv");
    for (expected, fit) in fits() {
        let own = readings
            .iter()
            .filter(|row| row.text("case") == expected.text("case"));
        let largest = own
            .zip(&fit.residuals)
            .map(|(row, residual)| {
                let (sight, residual) = (sight(row), residual.unwrap());
                let hour = residual.hour / sight.sigma_hour;
                hour.abs().max((residual.dec / sight.sigma_dec).abs())
            })
            .fold(0.0_f64, f64::max);
        assert!((largest - expected.number("largest_residual_sigma")).abs() < TOLERANCE_SIGMAS);
    }
}

#[test]
fn predictions_agree_with_a_fit_apart_from_the_program() {
    let fits = fits();
    let square = Angle::from_radians(1.0).arcminutes().powi(2);
    for row in rows("mount_map_predictions.csv") {
        let (_, fit) = fits
            .iter()
            .find(|(expected, _)| expected.text("case") == row.text("case"))
            .unwrap();
        let (hour_angle, declination, latitude) = place(&row);
        let prediction = Estimate::from(fit)
            .predict(hour_angle, declination, latitude, side(&row))
            .unwrap();
        for (found, name) in [
            (prediction.axes.hour, "hour_axis_deg"),
            (prediction.axes.dec, "dec_axis_deg"),
        ] {
            assert!(
                off_deg(found, row.number(name)) < PREDICTION_TOLERANCE_DEG,
                "{row:?}"
            );
        }
        let (hour, dec) = (
            row.number("hour_variance_arcmin2"),
            row.number("dec_variance_arcmin2"),
        );
        let together = row.number("covariance_arcmin2");
        let found = prediction.covariance * square;
        assert!(
            (found.m11 / hour - 1.0).abs() < COVARIANCE_TOLERANCE,
            "{row:?} {found}"
        );
        assert!(
            (found.m22 / dec - 1.0).abs() < COVARIANCE_TOLERANCE,
            "{row:?} {found}"
        );
        let sigmas = (hour * dec).sqrt();
        assert!(
            (found.m12 - together).abs() < COVARIANCE_TOLERANCE * sigmas,
            "{row:?} {found}"
        );
    }
}

/// J. N. Lockyer, Stargazing, ch. XXI: one star on both sides of the pier gives the index and the polar axis.
#[test]
fn a_published_pair_of_readings_gives_its_index_and_polar_error() {
    /// Two printed values, each rounded to a second, and a prior that holds 0.1" against sigmas of 1".
    const TOLERANCE_ARCSEC: f64 = 2.0;
    let table = rows("mount_two_sides.csv");
    let value = |quantity: &str| Angle::from_degrees(number_of(&table, quantity));
    // a polar axis set by eye, and nothing else wrong, as the book takes it
    let prior = Prior::from_expected(&ExpectedErrors {
        polar_high: Angle::from_degrees(2.0),
        polar_east: Angle::ZERO,
        cone: Angle::ZERO,
        skew: Angle::ZERO,
        sag: Angle::ZERO,
        ..ExpectedErrors::default()
    });
    let seen = value("declination of the star") + value("refraction");
    let sights: Vec<Sight> = [
        ("tube-west", "reading tube on the other side"),
        ("tube-east", "reading tube on one side"),
    ]
    .into_iter()
    .map(|(word, quantity)| {
        // a quartered circle: either side of the equator, either side of the pole
        let read = value(quantity);
        let beyond = Angle::HALF_TURN - read;
        let west = word == "tube-west";
        Sight {
            hour_angle: nonius::angle::HourAngle::default(),
            declination: nonius::angle::Declination::new(seen),
            side: if west {
                nonius::metal::Side::TubeWest
            } else {
                nonius::metal::Side::TubeEast
            },
            hour: vec![AxisAngle::from_degrees(if west { 0.0 } else { 180.0 })],
            dec: [read, -read, beyond, -beyond].map(AxisAngle::new).to_vec(),
            sigma_hour: Angle::from_arcminutes(1.0),
            sigma_dec: Angle::from_arcseconds(1.0),
            opposite: OppositeVerniers::default(),
        }
    })
    .collect();
    let fit = fit(nonius::angle::Latitude::from_degrees(52.0), &prior, &sights);
    let index = fit.errors.dec_index - value("index error");
    let low = fit.errors.polar_high + value("pole of the instrument too low by");
    assert!(
        index.abs().arcseconds() < TOLERANCE_ARCSEC,
        "{}",
        index.arcseconds()
    );
    assert!(
        low.abs().arcseconds() < TOLERANCE_ARCSEC,
        "{}",
        low.arcseconds()
    );
}
