//! A minor planet or a comet by the elements of its orbit: about the Sun alone, from the epoch on.
//!
//! Elements on the ecliptic and equinox of J2000.0, distances in au, days of TT. The way along the orbit
//! is Kepler's equation in universal variables with Stumpff's functions, counted from perihelion: one
//! form for every eccentricity, ellipse, parabola and hyperbola (J. M. A. Danby, *Fundamentals of
//! Celestial Mechanics*, 2nd ed., ch. 6, from memory). The pull of the planets is left out: within 60 days of the epoch that
//! moves Ceres by 3.1" and Pallas by 2.2" (JPL's SB441-N16, `tests/reference/orbits.csv`), a body that comes near
//! a planet by far more.

use sofars::vm;

use crate::angle::Angle;
use crate::sky::brightness::Brightness;
use crate::sky::vector::{Matrix, Vector, turned_back};
use crate::time::Tt;

/// The elements of an orbit about the Sun.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Orbit {
    /// Least distance from the Sun in au, above zero.
    pub perihelion_distance_au: f64,
    /// 0 a circle, below 1 an ellipse, 1 a parabola, above 1 a hyperbola.
    pub eccentricity: f64,
    /// Of the orbit to the ecliptic of J2000.0, 0° to 180°.
    pub inclination: Angle,
    /// Longitude of the ascending node from the equinox of J2000.0.
    pub node: Angle,
    /// From the ascending node to perihelion, along the motion.
    pub argument_of_perihelion: Angle,
    /// When it passes perihelion.
    pub perihelion: Tt,
    /// The instant for which the elements hold exactly; nothing where they state none.
    pub epoch: Option<Tt>,
    /// How bright it is from where.
    pub brightness: Brightness,
}

/// The Sun's attraction, au^3/day^2: Gauss's constant squared. The mass of the body itself is nothing.
const SUN: f64 = 0.017_202_098_95 * 0.017_202_098_95;

/// The obliquity of the ecliptic of J2000.0 that the published elements are referred to (IAU 1976).
const OBLIQUITY: Angle = Angle::from_arcseconds(84_381.448);

impl Orbit {
    /// The passage of perihelion nearest to the epoch, from the mean anomaly there of an ellipse of that
    /// semimajor axis in au.
    #[must_use]
    pub fn perihelion_of(epoch: Tt, mean_anomaly: Angle, semimajor_axis_au: f64) -> Tt {
        let a_day = (SUN / semimajor_axis_au.powi(3)).sqrt();
        epoch.plus_days(-mean_anomaly.wrapped_signed().radians() / a_day)
    }

    /// Days from the epoch of the elements to an instant, positive after it; nothing where they state no
    /// epoch.
    #[must_use]
    pub fn age_days(&self, tt: Tt) -> Option<f64> {
        self.epoch.map(|epoch| tt.days_since(epoch))
    }

    /// The place from the Sun in au, in the axes of the ICRS, by the Sun's attraction alone.
    #[must_use]
    pub(crate) fn heliocentric(&self, tt: Tt) -> Vector {
        let days = tt.days_since(self.perihelion);
        let (along, across) = in_plane(self.perihelion_distance_au, self.eccentricity, days);
        turned_back(&self.axes(), &[along, across, 0.0])
    }

    /// From the axes of the ICRS to those of the orbit: x to perihelion, y along the motion there, z from its
    /// plane. The 0.02" between the ICRS and J2000.0 are left out.
    fn axes(&self) -> Matrix {
        let mut axes = [[1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, 1.0]];
        vm::rx(OBLIQUITY.radians(), &mut axes);
        vm::rz(self.node.radians(), &mut axes);
        vm::rx(self.inclination.radians(), &mut axes);
        vm::rz(self.argument_of_perihelion.radians(), &mut axes);
        axes
    }
}

/// Place in the plane of the orbit so many days after perihelion: au toward perihelion, and au along the
/// motion there.
fn in_plane(perihelion_au: f64, eccentricity: f64, days: f64) -> (f64, f64) {
    // one over the semimajor axis, negative for a hyperbola
    let alpha = (1.0 - eccentricity) / perihelion_au;
    let way = universal_anomaly(perihelion_au, eccentricity, alpha, days * SUN.sqrt());
    let (c2, c3) = stumpff(alpha * way * way);
    let along = perihelion_au - way * way * c2;
    let across =
        (perihelion_au * (1.0 + eccentricity)).sqrt() * way * (1.0 - alpha * way * way * c3);
    (along, across)
}

/// The universal anomaly χ at a time from perihelion in units in which the Sun's attraction is one:
/// time = q χ + e χ³ c3(αχ²).
fn universal_anomaly(q: f64, e: f64, alpha: f64, time: f64) -> f64 {
    /// Far more than are ever taken: a dozen at most.
    const MOST_STEPS: usize = 100;
    let time = if alpha > 0.0 {
        // the nearest perihelion of an ellipse
        let period = std::f64::consts::TAU / alpha.powf(1.5);
        time - period * (time / period).round()
    } else {
        time
    };
    let since = time.abs();
    // The time grows ever faster with χ as far as aphelion: Newton's steps from beyond the root go down to
    // it and never past. Each of these is beyond it.
    let (root, size) = (alpha.abs().sqrt(), alpha.abs().powf(1.5) * since);
    let cubic = (std::f64::consts::PI.powi(2) * since / e).cbrt();
    let by_shape = if alpha > 0.0 {
        (size + e).min(std::f64::consts::PI) / root
    } else if alpha < 0.0 {
        (size / (e - 1.0)).asinh() / root
    } else {
        f64::INFINITY
    };
    let mut way = (since / q).min(cubic).min(by_shape);
    for _ in 0..MOST_STEPS {
        let square = way * way;
        let (c2, c3) = stumpff(alpha * square);
        let over = way * (q + e * square * c3) - since;
        let next = way - over / (q + e * square * c2);
        if next >= way || next.is_nan() {
            break;
        }
        way = next;
    }
    way.copysign(time)
}

/// Stumpff's functions c2 and c3.
fn stumpff(z: f64) -> (f64, f64) {
    /// Nearer to zero than this, the closed forms lose figures and the series needs few terms.
    const NEAR: f64 = 1.0;
    /// Terms of the series, the last below 1e-18 of the first.
    const TERMS: i32 = 10;
    if z.abs() < NEAR {
        let (mut c2, mut c3) = (0.0, 0.0);
        // by Horner: each bracket is one less a share of the next
        for term in (0..TERMS).rev() {
            let first = f64::from(2 * term + 1);
            c2 = (1.0 - z * c2) / (first * (first + 1.0));
            c3 = (1.0 - z * c3) / ((first + 1.0) * (first + 2.0));
        }
        (c2, c3)
    } else if z > 0.0 {
        let root = z.sqrt();
        ((1.0 - root.cos()) / z, (root - root.sin()) / (z * root))
    } else {
        let root = (-z).sqrt();
        ((root.cosh() - 1.0) / -z, (root.sinh() - root) / (-z * root))
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    /// What double precision leaves of a distance after the equation is solved, as a share of it.
    const ROUNDING: f64 = 1e-9;

    /// True anomaly in degrees and distance in au.
    fn polar(q: f64, e: f64, days: f64) -> (f64, f64) {
        let (x, y) = in_plane(q, e, days);
        (y.atan2(x).to_degrees(), x.hypot(y))
    }

    /// Days from perihelion to a true anomaly, by the classical equations: the way back of the solution.
    fn days_to(q: f64, e: f64, anomaly: f64) -> f64 {
        let half = (anomaly / 2.0).tan();
        let mean = if e < 1.0 {
            let eccentric = 2.0 * (half * ((1.0 - e) / (1.0 + e)).sqrt()).atan();
            eccentric - e * eccentric.sin()
        } else {
            let eccentric = 2.0 * (half * ((e - 1.0) / (e + 1.0)).sqrt()).atanh();
            e * eccentric.sinh() - eccentric
        };
        mean * (q / (1.0 - e).abs()).powf(1.5) / SUN.sqrt()
    }

    #[test]
    fn parabolas_and_what_is_near_one_are_solved_as_printed() {
        // Source: J. Meeus, Astronomical Algorithms, 2nd ed., ch. 34 and 35 (the tables and example 34.a), the
        // last two as PyMeeus 0.5.12 carries them in Minor._near_parabolic, the first two from memory
        for (q, e, days, anomaly, distance) in [
            (1.487_469, 1.0, 112.5642, 66.788_62, 2.133_911),
            (0.921_326, 1.0, 138.4783, 102.744_26, 2.364_192),
            (0.587_101_8, 0.967_274_6, 20.0, 52.853_31, 0.729_116),
            (3.363_943, 1.057_31, 1237.1, 109.405_98, 10.668_551),
        ] {
            let (ours, au) = polar(q, e, days);
            assert!((ours - anomaly).abs() < 1e-5, "{e}: {ours}");
            assert!((au - distance).abs() < 1e-6, "{e}: {au}");
        }
    }

    #[test]
    fn after_a_whole_period_the_body_is_where_it_was() {
        let period = std::f64::consts::TAU * 2.767_f64.powf(1.5) / SUN.sqrt();
        let q = 2.767 * (1.0 - 0.0776);
        let (then, later) = (
            polar(q, 0.0776, 100.0),
            polar(q, 0.0776, 100.0 + 3.0 * period),
        );
        assert!((then.0 - later.0).abs() < 1e-6 && (then.1 - later.1).abs() < 1e-9);
    }

    #[test]
    fn the_ecliptic_is_as_far_from_the_equator_as_it_should_be() {
        let epoch = Tt::at_julian_day(2_451_545.0);
        let orbit = Orbit {
            perihelion_distance_au: 2.0,
            eccentricity: 0.0,
            inclination: Angle::ZERO,
            node: Angle::from_degrees(40.0),
            argument_of_perihelion: Angle::from_degrees(50.0),
            perihelion: epoch,
            epoch: Some(epoch),
            brightness: Brightness::Unknown,
        };
        // ecliptic longitude 90°: the northernmost point of the ecliptic
        let [x, y, z] = orbit.heliocentric(epoch);
        assert!(x.abs() < ROUNDING, "{x}");
        assert!((z.atan2(y) - OBLIQUITY.radians()).abs() < ROUNDING);
        // tilted by 90° to it, a quarter turn from a node at the equinox: the ecliptic's pole
        let tilted = Orbit {
            inclination: Angle::from_degrees(90.0),
            node: Angle::ZERO,
            argument_of_perihelion: Angle::from_degrees(90.0),
            ..orbit
        };
        let [x, y, z] = tilted.heliocentric(epoch);
        assert!(x.abs() < ROUNDING && y < 0.0 && z > 0.0);
        assert!(((-y).atan2(z) - OBLIQUITY.radians()).abs() < ROUNDING);
    }

    #[test]
    fn the_mean_anomaly_gives_the_perihelion_nearest_the_epoch() {
        let epoch = Tt::at_julian_day(2_459_000.5);
        let period = std::f64::consts::TAU * 8.0 / SUN.sqrt();
        for (degrees, periods) in [
            (0.0, 0.0),
            (90.0, -0.25),
            (270.0, 0.25),
            (190.0, 170.0 / 360.0),
        ] {
            let at = Orbit::perihelion_of(epoch, Angle::from_degrees(degrees), 4.0);
            let off = at.days_since(epoch) - periods * period;
            assert!(off.abs() < 1e-6, "{degrees}: {off}");
        }
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(2000))]

        #[test]
        fn every_orbit_is_solved_at_every_anomaly(
            q in prop_oneof![0.002..0.1_f64, 0.1..5.0_f64, 5.0..50.0_f64],
            e in prop_oneof![
                Just(0.0), Just(1.0), 0.0..1.0, 1.0..5.0,
                (1e-12_f64..1e-2).prop_map(|off| 1.0 - off), (1e-12_f64..1e-2).prop_map(|off| 1.0 + off),
                (-12.0..-2.0).prop_map(|power| 1.0 - 10_f64.powf(power)),
                (-12.0..-2.0).prop_map(|power| 1.0 + 10_f64.powf(power)),
            ],
            share in -1.0..1.0_f64,
        ) {
            // as far as the branches of a hyperbola reach, and less than 1000 au on all but the longest ellipses
            let reach = if e < 1.0 { std::f64::consts::PI } else { (-1.0 / e).acos() };
            let anomaly = 0.999 * share * reach;
            let distance = q * (1.0 + e) / (1.0 + e * anomaly.cos());
            prop_assume!(distance < 3000.0);
            let days = if (e - 1.0).abs() < 1e-4 {
                // there the classical equations lose their figures: Barker's equation, and the answer held to the
                // conic and to the time's own integral instead
                let half = (anomaly / 2.0).tan();
                (half + half.powi(3) / 3.0) * (2.0 * q.powi(3) / SUN).sqrt()
            } else {
                days_to(q, e, anomaly)
            };
            let (x, y) = in_plane(q, e, days);
            let r = x.hypot(y);
            // on the conic
            prop_assert!((r - (q * (1.0 + e) - e * x)).abs() < 1e-9 * r.max(q), "{q} {e} {days}: {r}");
            // at the right place of it: exactly, or as near as the eccentricity is to one
            let expected = (distance * anomaly.cos(), distance * anomaly.sin());
            let off = (x - expected.0).hypot(y - expected.1) / distance;
            let allowed = if (e - 1.0).abs() < 1e-4 {
                10.0 * (e - 1.0).abs() * (1.0 + (anomaly / 2.0).tan().powi(2)) + 1e-9
            } else {
                1e-7
            };
            prop_assert!(off < allowed, "{q} {e} {days}: {off}");
        }

        #[test]
        fn equal_areas_are_swept_in_equal_times(
            q in 0.01..30.0_f64, e in prop_oneof![0.0..0.99, 0.99..1.01, 1.01..5.0], days in -20_000.0..20_000.0,
        ) {
            // Kepler's second law, by a central difference over a day that is short against the time from perihelion
            let step = 1e-3 * (q * q * q / SUN).sqrt();
            let (before, after) = (in_plane(q, e, days - step), in_plane(q, e, days + step));
            let area = (before.0 * after.1 - before.1 * after.0) / 2.0;
            let law = (SUN * q * (1.0 + e)).sqrt() * step;
            prop_assert!((area / law - 1.0).abs() < 1e-3, "{area} {law}");
        }
    }
}
