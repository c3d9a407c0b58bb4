//! Local sidereal time, mean and apparent (IAU 2006/2000A, by the SOFA models in `sofars`).
//!
//! Local sidereal time is the right ascension on the meridian. Mean time refers to the mean
//! equinox of date, apparent time to the true equinox; they differ by the equation of the
//! equinoxes, at most 1.2 s. Longitude is positive east; polar motion (0.02 s) is left out.

use crate::angle::{Angle, Longitude, direction};
use crate::time::instant::{Dut1, Utc};

/// Degrees of sidereal time that pass in one second of UT1: 360° in 86,164.0905 s.
///
/// Source: IAU 2006 precession, rate of GMST at J2000 (1.002737909350795 turns a day).
pub const DEGREES_PER_SECOND: f64 = 1.002_737_909_350_795 * 360.0 / 86_400.0;

direction!(
    /// Local sidereal time as an angle, in [0°, 360°).
    SiderealTime,
    wrapped_positive
);

/// Mean sidereal time at a longitude.
#[must_use]
pub fn mean(utc: Utc, dut1: Dut1, longitude: Longitude) -> SiderealTime {
    let (ut1, tt) = (utc.ut1(dut1), utc.tt());
    let greenwich = sofars::erst::gmst06(ut1.0, ut1.1, tt.0, tt.1);
    SiderealTime::new(Angle::from_radians(greenwich) + longitude.angle())
}

/// Apparent sidereal time at a longitude.
#[must_use]
pub fn apparent(utc: Utc, dut1: Dut1, longitude: Longitude) -> SiderealTime {
    let (ut1, tt) = (utc.ut1(dut1), utc.tt());
    let greenwich = sofars::erst::gst06a(ut1.0, ut1.1, tt.0, tt.1);
    SiderealTime::new(Angle::from_radians(greenwich) + longitude.angle())
}

#[cfg(test)]
mod tests {
    use super::*;

    /// 0.05 s, the most the older models of the worked example may differ from today's
    /// (IAU 1982 against IAU 2006 sidereal time: some 0.02 s of ΔUT1 bookkeeping apart).
    const OLDER_MODEL_S: f64 = 0.05;

    #[test]
    fn greenwich_on_1987_april_10_is_as_worked_by_meeus() {
        // Source: J. Meeus, Astronomical Algorithms, 2nd ed., examples 12.a and 12.b (labels from
        // memory); the book takes UT for UT1, so does this with ΔUT1 = 0.
        let at = |text: &str| Utc::parse(text).unwrap();
        let seconds = |time: SiderealTime| time.angle().time_seconds();
        let (dut1, greenwich) = (Dut1::default(), Longitude::default());
        let hms = |h: f64, m: f64, s: f64| (h * 60.0 + m) * 60.0 + s;
        let midnight = at("1987-04-10T00:00:00Z");
        assert!(
            (seconds(mean(midnight, dut1, greenwich)) - hms(13.0, 10.0, 46.3668)).abs()
                < OLDER_MODEL_S
        );
        assert!(
            (seconds(apparent(midnight, dut1, greenwich)) - hms(13.0, 10.0, 46.1351)).abs()
                < OLDER_MODEL_S
        );
        let evening = at("1987-04-10T19:21:00Z");
        assert!(
            (seconds(mean(evening, dut1, greenwich)) - hms(8.0, 34.0, 57.0896)).abs()
                < OLDER_MODEL_S
        );
    }

    #[test]
    fn longitude_east_is_later() {
        let at = Utc::parse("2026-12-01T21:30:00Z").unwrap();
        let here = mean(at, Dut1::default(), Longitude::default());
        let east = mean(at, Dut1::default(), Longitude::from_degrees(15.0));
        assert!(((east.angle() - here.angle()).wrapped_signed().hours() - 1.0).abs() < 1e-9);
    }
}
