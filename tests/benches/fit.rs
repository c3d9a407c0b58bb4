//! How long the estimate takes: a fit of a night's readings must not be felt (10 ms for 200 readings).
//!
//! The slopes of the geometry at one place are measured in the same run; a fit of n readings cannot take less than
//! n times that per step.
#![allow(clippy::unwrap_used, missing_docs)]

use std::hint::black_box;

use criterion::{Criterion, criterion_group, criterion_main};
use nonius::angle::{Angle, AxisAngle, Declination, HourAngle, Latitude};
use nonius::estimate::{Prior, Sight, fit};
use nonius::metal::{
    ExpectedErrors, MountErrors, OppositeVerniers, Side, to_axes, to_axes_with_slopes,
};

const LATITUDE_DEG: f64 = 52.0;

fn mount() -> MountErrors {
    MountErrors::with_centred_circles(
        [2000.0, 900.0, 40.0, -50.0, 20.0, -8.0, 2.0].map(Angle::from_arcminutes),
    )
}

/// Readings spread over the sky and off by a sigma or so, without chance.
fn readings(count: usize) -> Vec<Sight> {
    (0..count)
        .map(|n| {
            let turn = n as f64 * 137.508;
            let hour_angle = turn % 140.0 - 70.0;
            let side = if hour_angle < 0.0 {
                Side::TubeWest
            } else {
                Side::TubeEast
            };
            let hour_angle = HourAngle::from_degrees(hour_angle);
            let declination = Declination::from_degrees((turn * 0.618) % 80.0 - 15.0);
            let latitude = Latitude::from_degrees(LATITUDE_DEG);
            let axes = to_axes(hour_angle, declination, latitude, &mount(), side).unwrap();
            let off = |angle: AxisAngle, by: f64| {
                AxisAngle::new(angle.angle() + Angle::from_arcminutes(4.0 * by.sin()))
            };
            Sight {
                hour_angle,
                declination,
                side,
                hour: vec![off(axes.hour, turn)],
                dec: vec![off(axes.dec, 2.0 * turn)],
                sigma_hour: Angle::from_arcminutes(3.0),
                sigma_dec: Angle::from_arcminutes(3.0),
                opposite: OppositeVerniers::default(),
            }
        })
        .collect()
}

/// The same on circles that say neither east nor west, north nor south.
fn ambiguous(sights: &[Sight]) -> Vec<Sight> {
    let mut sights = sights.to_vec();
    for sight in &mut sights {
        let (hour, dec) = (sight.hour[0].angle(), sight.dec[0].angle());
        sight.hour = [hour, -hour].map(AxisAngle::new).to_vec();
        sight.dec = [dec, -dec, Angle::HALF_TURN - dec, dec - Angle::HALF_TURN]
            .map(AxisAngle::new)
            .to_vec();
    }
    sights
}

/// The same with every `nth` hour misread by one.
fn misread(sights: &[Sight], nth: usize) -> Vec<Sight> {
    let mut sights = sights.to_vec();
    for sight in sights.iter_mut().step_by(nth) {
        sight.hour = vec![AxisAngle::new(
            sight.hour[0].angle() + Angle::from_hours(1.0),
        )];
    }
    sights
}

fn estimate(c: &mut Criterion) {
    let latitude = Latitude::from_degrees(LATITUDE_DEG);
    let prior = Prior::from_expected(&ExpectedErrors::default());
    let off_centre = Prior::from_expected(&ExpectedErrors {
        hour_eccentric: Angle::from_arcminutes(5.0),
        dec_eccentric: Angle::from_arcminutes(5.0),
        ..ExpectedErrors::default()
    });
    c.bench_function("slopes of the geometry at one place", |b| {
        let (h, d) = (
            HourAngle::from_degrees(-30.0),
            Declination::from_degrees(40.0),
        );
        b.iter(|| to_axes_with_slopes(black_box(h), d, latitude, &mount(), Side::TubeWest));
    });
    let many = readings(200);
    for (name, prior, sights) in [
        ("fit of 6 readings", &prior, readings(6)),
        (
            "fit of 6 readings, one misread",
            &prior,
            misread(&readings(6), 6),
        ),
        (
            "fit of 20 readings, two misread",
            &prior,
            misread(&readings(20), 10),
        ),
        ("fit of 200 readings", &prior, many.clone()),
        (
            "fit of 200 readings, circles off centre",
            &off_centre,
            many.clone(),
        ),
        ("fit of 200 ambiguous readings", &prior, ambiguous(&many)),
        (
            "fit of 200 readings, ten misread",
            &prior,
            misread(&many, 20),
        ),
    ] {
        assert!(fit(latitude, prior, &sights).converged, "{name}");
        c.bench_function(name, |b| {
            b.iter(|| fit(latitude, prior, black_box(&sights)));
        });
    }
}

criterion_group!(benches, estimate);
criterion_main!(benches);
