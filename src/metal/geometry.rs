//! The exact geometry of the metal: from an observed place to the angles of the two axes, and back.
//!
//! Angles in radians. Hour angle positive west, declination positive north; a tube east of the pier has its
//! declination axis angle beyond 90°. Vectors in the equatorial frame point x to the meridian on the equator,
//! y to hour angle +6h, z to the north celestial pole; in the horizon frame east, north and up. No small angles are
//! assumed anywhere. The formulas are plain rotations, derived for this program and checked against a second
//! derivation (`tests/reference/mount_model.py`).

use nalgebra::{Matrix2, SMatrix};

use crate::angle::{Angle, AxisAngle, Declination, HourAngle, Latitude};
use crate::metal::Side;
use crate::metal::dual::{Dual, Scalar};
use crate::metal::eccentricity::Eccentricity;
use crate::metal::errors::{COUNT, MountErrors};
use crate::metal::frames::{direction, from_horizon, hemisphere, to_horizon};

/// The undoing of the sag halves its error, or better, at every step while the sag is below half a radian; Newton's
/// rule needs four for any sag a tube could have, the rest is for numbers no tube could have.
const MOST_SAG_STEPS: usize = 20;

/// A step of the undoing of the sag that no longer matters: a hundred-thousandth of an arcsecond.
const SAG_STEP_RAD: f64 = 5e-11;

/// The angles the two axes show, index errors and the eccentricity of the circles included.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Axes {
    /// Of the hour axis, positive west.
    pub hour: AxisAngle,
    /// Of the declination axis, positive north, beyond 90° with the tube east.
    pub dec: AxisAngle,
}

/// How the axis angles move with the mount's errors and with the place, radian per radian.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Slopes {
    /// Rows hour axis, declination axis; columns the errors in the order of [`MountErrors::to_array`].
    pub by_errors: SMatrix<f64, 2, COUNT>,
    /// Rows hour axis, declination axis; columns a step of the place on the sky westward (`cos δ Δh`) and
    /// northward (`Δδ`).
    pub by_place: Matrix2<f64>,
}

/// A place nearer the pole of the mount than cone and skew let the tube come.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error("nearer the mount's pole than the tube can come")]
pub struct TooNearPole;

/// The five errors that bend the geometry: all but those of the circles.
struct Bent<S> {
    high: S,
    east: S,
    cone: S,
    skew: S,
    sag: S,
}

/// The axis angles to be shown for an observed place (refraction included) with the tube on that side.
pub fn to_axes(
    hour_angle: HourAngle,
    declination: Declination,
    latitude: Latitude,
    errors: &MountErrors,
    side: Side,
) -> Result<Axes, TooNearPole> {
    let bent = Bent {
        high: errors.polar_high.radians(),
        east: errors.polar_east.radians(),
        cone: errors.cone.radians(),
        skew: errors.skew.radians(),
        sag: errors.sag.radians(),
    };
    let (hour, dec) =
        axes_without_index(direction(hour_angle, declination), latitude, &bent, side)?;
    Ok(shown(hour, dec, errors))
}

/// As [`to_axes`], with the exact slopes there.
pub fn to_axes_with_slopes(
    hour_angle: HourAngle,
    declination: Declination,
    latitude: Latitude,
    errors: &MountErrors,
    side: Side,
) -> Result<(Axes, Slopes), TooNearPole> {
    let independent = |error: Angle, number| Dual::independent(error.radians(), number);
    let bent = Bent {
        high: independent(errors.polar_high, 0),
        east: independent(errors.polar_east, 1),
        cone: independent(errors.cone, 2),
        skew: independent(errors.skew, 3),
        sag: independent(errors.sag, 4),
    };
    let (sin_h, cos_h) = hour_angle.angle().radians().sin_cos();
    let (sin_d, cos_d) = declination.angle().radians().sin_cos();
    let step = |value, west, north| Dual::new(value, [0.0, 0.0, 0.0, 0.0, 0.0, west, north]);
    let place = [
        step(cos_d * cos_h, -sin_h, -sin_d * cos_h),
        step(cos_d * sin_h, cos_h, -sin_d * sin_h),
        step(sin_d, 0.0, cos_d),
    ];
    let (hour, dec) = axes_without_index(place, latitude, &bent, side)?;
    let [h_high, h_east, h_cone, h_skew, h_sag, h_west, h_north] = hour.slopes();
    let [d_high, d_east, d_cone, d_skew, d_sag, d_west, d_north] = dec.slopes();
    let axes = shown(hour.value(), dec.value(), errors);
    let [h, h_sine, h_cosine] =
        Eccentricity::of_hour_circle(errors).slopes(axes.hour.angle().radians());
    let [d, d_sine, d_cosine] =
        Eccentricity::of_declination_circle(errors).slopes(axes.dec.angle().radians());
    let slopes = Slopes {
        #[rustfmt::skip]
        by_errors: SMatrix::from_row_slice(&[
            h, 0.0, h * h_high, h * h_east, h * h_cone, h * h_skew, h * h_sag, h_sine, h_cosine, 0.0, 0.0,
            0.0, d, d * d_high, d * d_east, d * d_cone, d * d_skew, d * d_sag, 0.0, 0.0, d_sine, d_cosine,
        ]),
        by_place: Matrix2::new(h * h_west, h * h_north, d * d_west, d * d_north),
    };
    Ok((axes, slopes))
}

/// The observed place (refraction included) at which the tube looks when the axes show these angles. The axis
/// angles themselves tell on which side of the pier the tube is.
#[must_use]
pub fn to_sky(axes: Axes, latitude: Latitude, errors: &MountErrors) -> (HourAngle, Declination) {
    let turned = |shown: AxisAngle, index: Angle, circle: Eccentricity| {
        let shown = shown.angle().radians();
        shown - circle.at(shown) - index.radians()
    };
    let hour_circle = Eccentricity::of_hour_circle(errors);
    let dec_circle = Eccentricity::of_declination_circle(errors);
    let (sin_hour, cos_hour) = turned(axes.hour, errors.hour_index, hour_circle).sin_cos();
    let (sin_dec, cos_dec) = turned(axes.dec, errors.dec_index, dec_circle).sin_cos();
    let (sin_cone, cos_cone) = errors.cone.radians().sin_cos();
    let (sin_skew, cos_skew) = errors.skew.radians().sin_cos();
    // The line of sight, from the mount's equator, the turn about the declination axis, and that axis itself.
    let x = cos_cone * (cos_dec * cos_hour + sin_dec * sin_hour * sin_skew)
        - sin_cone * sin_hour * cos_skew;
    let y = cos_cone * (cos_dec * sin_hour - sin_dec * cos_hour * sin_skew)
        + sin_cone * cos_hour * cos_skew;
    let z = cos_cone * sin_dec * cos_skew + sin_cone * sin_skew;

    let [east, north, up] = to_horizon([x, y, z], latitude);
    let raised = hemisphere(latitude);
    let (sin_high, cos_high) = (raised * errors.polar_high.radians()).sin_cos();
    let (north, up) = (
        north * cos_high - up * sin_high,
        north * sin_high + up * cos_high,
    );
    let (sin_east, cos_east) = (raised * errors.polar_east.radians()).sin_cos();
    let (east, north) = (
        east * cos_east + north * sin_east,
        north * cos_east - east * sin_east,
    );

    let [x, y, z] = from_horizon(without_sag([east, north, up], errors.sag), latitude);
    (
        HourAngle::new(Angle::from_radians(y.atan2(x))),
        Declination::new(Angle::from_radians(z.atan2(x.hypot(y)))),
    )
}

/// Hour and declination axis angles without what the circles add, in radians, unwrapped.
fn axes_without_index<S: Scalar>(
    place: [S; 3],
    latitude: Latitude,
    errors: &Bent<S>,
    side: Side,
) -> Result<(S, S), TooNearPole> {
    let [east, north, up] = to_horizon(place, latitude);
    // The tube droops, so the axes point higher by sag times the cosine of the altitude.
    let level = (east * east + north * north).root();
    let lift = errors.sag * level;
    let (sin_lift, cos_lift) = lift.sine_cosine();
    let shortened = cos_lift - up * errors.sag * lift.sinc();
    let (east, north, up) = (
        east * shortened,
        north * shortened,
        up * cos_lift + level * sin_lift,
    );
    // Undo the turn of the base about the vertical, then the raise about the east-west line.
    let raised = S::from(hemisphere(latitude));
    let (sin_east, cos_east) = (raised * errors.east).sine_cosine();
    let (east, north) = (
        east * cos_east - north * sin_east,
        east * sin_east + north * cos_east,
    );
    let (sin_high, cos_high) = (raised * errors.high).sine_cosine();
    let (north, up) = (
        north * cos_high + up * sin_high,
        up * cos_high - north * sin_high,
    );
    let [x, y, z] = from_horizon([east, north, up], latitude);
    // The hour axis makes up for what cone and skew put the line of sight off.
    let (sin_cone, _) = errors.cone.sine_cosine();
    let (sin_skew, cos_skew) = errors.skew.sine_cosine();
    let asked = (sin_cone - sin_skew * z) / (cos_skew * (x * x + y * y).root());
    // what is not a number is out of reach too
    if !(-1.0..=1.0).contains(&asked.value()) {
        return Err(TooNearPole);
    }
    let (place, offset) = (y.angle_from(x), asked.inverse_sine());
    let hour = match side {
        Side::TubeWest | Side::Single => place - offset,
        Side::TubeEast => place - S::from(Angle::HALF_TURN.radians()) + offset,
    };
    let (sin_hour, cos_hour) = hour.sine_cosine();
    let from_equator = (x * sin_hour - y * cos_hour) * sin_skew + z * cos_skew;
    let dec = from_equator.angle_from(x * cos_hour + y * sin_hour);
    Ok((hour, dec))
}

/// What the circles show where the axes are turned by these angles.
fn shown(hour: f64, dec: f64, errors: &MountErrors) -> Axes {
    let shown = |turned: f64, index: Angle, circle: Eccentricity| {
        AxisAngle::new(Angle::from_radians(circle.shown(turned + index.radians())))
    };
    let hour_circle = Eccentricity::of_hour_circle(errors);
    let dec_circle = Eccentricity::of_declination_circle(errors);
    Axes {
        hour: shown(hour, errors.hour_index, hour_circle),
        dec: shown(dec, errors.dec_index, dec_circle),
    }
}

/// Where the tube looks when its axes point in this direction of the horizon frame.
fn without_sag([east, north, up]: [f64; 3], sag: Angle) -> [f64; 3] {
    let level = east.hypot(north);
    if level <= 0.0 {
        return [east, north, up];
    }
    let sag = sag.radians();
    let pointed = up.atan2(level);
    let mut altitude = pointed;
    for _ in 0..MOST_SAG_STEPS {
        let (sin, cos) = altitude.sin_cos();
        let step = (altitude + sag * cos - pointed) / (1.0 - sag * sin);
        if !step.is_finite() {
            break;
        }
        altitude -= step;
        if step.abs() < SAG_STEP_RAD {
            break;
        }
    }
    let shortened = altitude.cos() / level;
    [east * shortened, north * shortened, altitude.sin()]
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    /// The round trip asked for: a thousandth of an arcsecond on the sky.
    const ROUND_TRIP_ARCSEC: f64 = 0.001;

    fn errors(arcminutes: [f64; COUNT]) -> MountErrors {
        MountErrors::from_array(arcminutes.map(Angle::from_arcminutes))
    }

    fn side() -> impl Strategy<Value = Side> {
        prop::sample::select(vec![Side::TubeWest, Side::TubeEast, Side::Single])
    }

    /// Errors far larger than a mount in use has.
    fn large_errors() -> impl Strategy<Value = MountErrors> {
        (
            [-10_800.0..10_800.0, -10_800.0..10_800.0],
            [
                -300.0..300.0,
                -300.0..300.0,
                -180.0..180.0,
                -90.0..90.0,
                -30.0..30.0,
            ],
            [-90.0..90.0, -90.0..90.0, -90.0..90.0, -90.0..90.0],
        )
            .prop_map(|([a, b], [c, d, e, f, g], [h, i, j, k])| {
                errors([a, b, c, d, e, f, g, h, i, j, k])
            })
    }

    fn apart_arcsec(a: [f64; 3], b: [f64; 3]) -> f64 {
        let chord = a.iter().zip(b).map(|(a, b)| (a - b) * (a - b)).sum::<f64>();
        Angle::from_radians(chord.sqrt()).arcseconds()
    }

    proptest! {
        #[test]
        fn from_the_sky_to_the_axes_and_back_is_the_same_place(
            latitude in -90.0..90.0,
            hour_angle in -180.0..180.0,
            declination in -90.0..90.0,
            errors in large_errors(),
            side in side(),
        ) {
            let (h, d) = (HourAngle::from_degrees(hour_angle), Declination::from_degrees(declination));
            let latitude = Latitude::from_degrees(latitude);
            if let Ok(axes) = to_axes(h, d, latitude, &errors, side) {
                let (h2, d2) = to_sky(axes, latitude, &errors);
                prop_assert!(apart_arcsec(direction(h, d), direction(h2, d2)) < ROUND_TRIP_ARCSEC);
            }
        }

        #[test]
        fn no_finite_numbers_make_it_stumble(
            place in [any::<f64>(), any::<f64>(), any::<f64>()],
            arcminutes in prop::array::uniform11(any::<f64>()),
            side in side(),
        ) {
            prop_assume!(place.iter().chain(&arcminutes).all(|x| x.is_finite()));
            let [h, d, latitude] = place;
            let (h, d) = (HourAngle::from_degrees(h), Declination::from_degrees(d));
            let latitude = Latitude::from_degrees(latitude);
            let _ = to_axes_with_slopes(h, d, latitude, &errors(arcminutes), side);
            if let Ok(axes) = to_axes(h, d, latitude, &errors(arcminutes), side) {
                let _ = to_sky(axes, latitude, &errors(arcminutes));
            }
        }

        #[test]
        fn slopes_foretell_a_small_change(
            latitude in -80.0..80.0,
            hour_angle in -180.0..180.0,
            declination in -75.0..75.0,
            errors in large_errors(),
            side in side(),
            changes in prop::array::uniform11(-1.0..1.0),
            north in -1.0..1.0,
            west in -1.0..1.0,
        ) {
            /// Steps of an arcsecond leave second-order terms below a few thousandths of it at these declinations.
            const LEFT_ARCSEC: f64 = 0.01;
            let latitude = Latitude::from_degrees(latitude);
            let (h, d) = (Angle::from_degrees(hour_angle), Angle::from_degrees(declination));
            let (axes, slopes) =
                to_axes_with_slopes(HourAngle::new(h), Declination::new(d), latitude, &errors, side).unwrap();
            let mut moved = errors.to_array();
            for (error, change) in moved.iter_mut().zip(changes) {
                *error += Angle::from_arcseconds(change);
            }
            let there = to_axes(
                HourAngle::new(h + Angle::from_arcseconds(west / d.cos())),
                Declination::new(d + Angle::from_arcseconds(north)),
                latitude,
                &MountErrors::from_array(moved),
                side,
            ).unwrap();
            let foretold = slopes.by_errors * nalgebra::SVector::from(changes)
                + slopes.by_place * nalgebra::Vector2::new(west, north);
            let hour = (there.hour.angle() - axes.hour.angle()).wrapped_signed().arcseconds();
            let dec = (there.dec.angle() - axes.dec.angle()).wrapped_signed().arcseconds();
            prop_assert!((hour - foretold.x).abs() < LEFT_ARCSEC, "{hour} {foretold}");
            prop_assert!((dec - foretold.y).abs() < LEFT_ARCSEC, "{dec} {foretold}");
        }
    }

    #[test]
    fn small_errors_act_to_first_order_as_the_short_formulas_say() {
        /// Errors of an arcminute leave second-order terms below this at 60° of declination.
        const SECOND_ORDER_ARCMIN: f64 = 0.005;
        let (phi, h, d) = (51.0_f64.to_radians(), -0.8_f64, 0.9_f64);
        let (i_h, i_d, a, b, c, p) = (1.0, -0.7, 0.6, -0.9, 0.8, -0.5);
        for (side, sign) in [(Side::TubeWest, 1.0), (Side::TubeEast, -1.0)] {
            let at = |errors: &MountErrors| {
                to_axes(
                    HourAngle::new(Angle::from_radians(h)),
                    Declination::new(Angle::from_radians(d)),
                    Latitude::new(Angle::from_radians(phi)),
                    errors,
                    side,
                )
                .unwrap()
            };
            let (free, axes) = (
                at(&MountErrors::default()),
                at(&errors([i_h, i_d, a, b, c, p, 0.0, 0.0, 0.0, 0.0, 0.0])),
            );
            let hour = (axes.hour.angle() - free.hour.angle()).arcminutes();
            let dec = (axes.dec.angle() - free.dec.angle()).arcminutes();
            let expected_hour =
                i_h + a * h.sin() * d.tan() + b * (phi.cos() * h.cos() * d.tan() - phi.sin())
                    - sign * c / d.cos()
                    + sign * p * d.tan();
            let expected_dec = i_d + sign * (a * h.cos() - b * phi.cos() * h.sin());
            assert!(
                (hour - expected_hour).abs() < SECOND_ORDER_ARCMIN,
                "{hour} {expected_hour}"
            );
            assert!(
                (dec - expected_dec).abs() < SECOND_ORDER_ARCMIN,
                "{dec} {expected_dec}"
            );
        }
    }
}
