//! Instants in UTC, UT1 and TT.
//!
//! UTC is the civil instant of the observer's clock; UT1 is the angle of the Earth; TT runs the
//! Earth's motion, the Moon and the planets. The scales are related by the IAU SOFA models as
//! carried by `sofars` (leap seconds to the table's release, then unchanged), so the range is that
//! of UTC with leap seconds: 1972 to 2100. A Julian date in UTC is SOFA's quasi-JD, in which a
//! day with a leap second is 86,401 s long.

use std::fmt;

use chrono::{DateTime, Datelike, NaiveDateTime, SecondsFormat, TimeDelta, Timelike};

use crate::bounds::{DUT1, OutOfBounds};

/// The first year of UTC with leap seconds.
const FIRST_YEAR: i32 = 1972;
/// The last year in which a guess of ΔT by leap seconds alone is still good for setting circles.
const LAST_YEAR: i32 = 2100;

/// An instant in UTC, 1972 to 2100, to the nanosecond; a leap second is held as 59 s and more.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Utc(DateTime<chrono::Utc>);

/// UT1 - UTC in seconds, within ±0.9 s.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Dut1(f64);

/// An instant in UT1, as a two-part Julian date.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ut1(pub(crate) f64, pub(crate) f64);

/// An instant in Terrestrial Time, as a two-part Julian date.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Tt(pub(crate) f64, pub(crate) f64);

/// Why a text or a date is no instant the program can use.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum InstantFault {
    /// Not a date and time with a zone as in RFC 3339.
    #[error("\"{0}\" is not a date and time with its zone (RFC 3339), as in 2026-12-01T21:30:00Z")]
    NotAnInstant(String),
    /// Outside the years of UTC with leap seconds.
    #[error("the year {0} is outside {FIRST_YEAR} to {LAST_YEAR}")]
    YearOutOfRange(i32),
}

impl Dut1 {
    /// From seconds, refused beyond ±0.9 s.
    pub fn from_seconds(seconds: f64) -> Result<Self, OutOfBounds> {
        DUT1.check(seconds).map(Self)
    }

    /// In seconds.
    #[must_use]
    pub const fn seconds(self) -> f64 {
        self.0
    }
}

impl Utc {
    /// From a `chrono` instant, refused outside 1972 to 2100.
    pub fn new(instant: DateTime<chrono::Utc>) -> Result<Self, InstantFault> {
        if (FIRST_YEAR..=LAST_YEAR).contains(&instant.year()) {
            Ok(Self(instant))
        } else {
            Err(InstantFault::YearOutOfRange(instant.year()))
        }
    }

    /// From RFC 3339 text, in any zone.
    pub fn parse(text: &str) -> Result<Self, InstantFault> {
        let instant = DateTime::parse_from_rfc3339(text.trim())
            .map_err(|_| InstantFault::NotAnInstant(text.to_owned()))?;
        Self::new(instant.to_utc())
    }

    /// As a `chrono` instant.
    #[must_use]
    pub const fn chrono(self) -> DateTime<chrono::Utc> {
        self.0
    }

    /// Later by so many seconds, earlier if negative; held at the ends of the range.
    #[must_use]
    pub fn plus_seconds(self, seconds: f64) -> Self {
        // half the range in seconds, far inside what a TimeDelta holds
        const FAR: f64 = 4e9;
        #[allow(clippy::cast_possible_truncation)] // bounded by the clamp
        let nanoseconds = (seconds.clamp(-FAR, FAR) * 1e9).round() as i64;
        let moved = self
            .0
            .checked_add_signed(TimeDelta::nanoseconds(nanoseconds));
        match moved.map(Self::new) {
            Some(Ok(instant)) => instant,
            _ if seconds < 0.0 => Self::end_of_range(FIRST_YEAR, 1, 1),
            _ => Self::end_of_range(LAST_YEAR, 12, 31),
        }
    }

    fn end_of_range(year: i32, month: u32, day: u32) -> Self {
        let date = chrono::NaiveDate::from_ymd_opt(year, month, day).unwrap_or_default();
        Self(NaiveDateTime::from(date).and_utc())
    }

    /// Seconds from an earlier instant to this one, leap seconds not counted.
    #[must_use]
    pub fn seconds_since(self, earlier: Self) -> f64 {
        let apart = self.0.signed_duration_since(earlier.0);
        // whole seconds and the rest apart, so that decades keep their nanoseconds
        apart.num_seconds() as f64 + f64::from(apart.subsec_nanos()) * 1e-9
    }

    /// The whole second this instant lies in.
    #[must_use]
    pub fn floor_second(self) -> Self {
        let kept = if self.0.nanosecond() >= 1_000_000_000 {
            1_000_000_000
        } else {
            0
        };
        Self(self.0.with_nanosecond(kept).unwrap_or(self.0))
    }

    /// The next whole second of UTC after this instant.
    #[must_use]
    pub fn next_second(self) -> Self {
        self.floor_second().plus_seconds(1.0)
    }

    /// SOFA's quasi-Julian date, in two parts.
    #[must_use]
    pub fn quasi_julian(self) -> (f64, f64) {
        let date = self.0.date_naive();
        // MJD 0 is 1858-11-17; chrono counts days from the first of the year 1, which is MJD -678,575
        let midnight = 2_400_000.5 + f64::from(date.num_days_from_ce() - 678_576);
        let seconds =
            f64::from(self.0.num_seconds_from_midnight()) + f64::from(self.0.nanosecond()) * 1e-9;
        (midnight, seconds / self.seconds_in_day())
    }

    /// 86,400, or 86,401 on a day that ends with a leap second.
    fn seconds_in_day(self) -> f64 {
        const PLAIN: f64 = 86_400.0;
        let today = self.0.date_naive();
        let tomorrow = today.succ_opt().unwrap_or(today);
        match (leap_seconds(today), leap_seconds(tomorrow)) {
            (Some(now), Some(then)) if then - now > 0.5 => PLAIN + (then - now),
            _ => PLAIN,
        }
    }

    /// The same instant in UT1.
    #[must_use]
    pub fn ut1(self, dut1: Dut1) -> Ut1 {
        let (day, fraction) = self.quasi_julian();
        let elapsed = fraction * self.seconds_in_day();
        Ut1(day, (elapsed + dut1.0) / 86_400.0)
    }

    /// The same instant in Terrestrial Time.
    #[must_use]
    pub fn tt(self) -> Tt {
        /// TT - TAI, by definition.
        const TT_MINUS_TAI_S: f64 = 32.184;
        let (day, fraction) = self.quasi_julian();
        let elapsed = fraction * self.seconds_in_day();
        let tai_minus_utc = leap_seconds(self.0.date_naive()).unwrap_or(LAST_TAI_MINUS_UTC_S);
        Tt(day, (elapsed + tai_minus_utc + TT_MINUS_TAI_S) / 86_400.0)
    }

    /// The same instant as a Julian year, as epochs and equinoxes are named.
    #[must_use]
    pub fn julian_year(self) -> f64 {
        let Tt(day, fraction) = self.tt();
        sofars::cal::epj(day, fraction)
    }

    /// RFC 3339 text with as many decimals of a second as it has, up to milliseconds.
    #[must_use]
    pub fn rfc3339(self) -> String {
        let digits = if self.0.nanosecond() % 1_000_000_000 < 500_000 {
            SecondsFormat::Secs
        } else {
            SecondsFormat::Millis
        };
        self.0.to_rfc3339_opts(digits, true)
    }
}

/// TAI - UTC since 2017 January 1 (IERS Bulletin C), used where the table ends.
const LAST_TAI_MINUS_UTC_S: f64 = 37.0;

/// TAI - UTC in seconds at the start of a civil day.
fn leap_seconds(date: chrono::NaiveDate) -> Option<f64> {
    let number = |value: u32| i32::try_from(value).unwrap_or(1);
    // beyond the table's release the model warns and still answers
    sofars::ts::dat(date.year(), number(date.month()), number(date.day()), 0.0).ok()
}

impl Tt {
    /// At a Julian date of TT, kept to a tenth of a millisecond.
    #[must_use]
    pub fn at_julian_day(julian_day: f64) -> Self {
        Self(julian_day.floor(), julian_day - julian_day.floor())
    }

    /// At a day of the Gregorian calendar and its fraction, 1.0 the first midnight; nothing if there is no such day.
    #[must_use]
    pub fn of_date(year: i32, month: i32, day: f64) -> Option<Self> {
        #[allow(clippy::cast_possible_truncation)] // a day of a month, else there is no such day
        let whole = day.floor() as i32;
        let (zero, midnight) = sofars::cal::cal2jd(year, month, whole).ok()?;
        Some(Self(zero + midnight, day - day.floor()))
    }

    /// The Julian date of TT, to a tenth of a millisecond.
    #[must_use]
    pub fn julian_day(self) -> f64 {
        self.0 + self.1
    }

    /// Later by so many days of 86,400 s, earlier if negative.
    #[must_use]
    pub fn plus_days(self, days: f64) -> Self {
        Self(self.0, self.1 + days)
    }

    /// Days of 86,400 s from an earlier instant to this one.
    #[must_use]
    pub fn days_since(self, earlier: Self) -> f64 {
        (self.0 - earlier.0) + (self.1 - earlier.1)
    }

    /// Julian years since J2000.0.
    #[must_use]
    pub fn julian_years_since_j2000(self) -> f64 {
        ((self.0 - 2_451_545.0) + self.1) / 365.25
    }
}

impl fmt::Display for Utc {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.rfc3339())
    }
}

impl serde::Serialize for Utc {
    fn serialize<S: serde::Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_str(self)
    }
}

impl<'de> serde::Deserialize<'de> for Utc {
    fn deserialize<D: serde::Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        let text = String::deserialize(deserializer)?;
        Self::parse(&text).map_err(serde::de::Error::custom)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Two-part Julian dates keep about 1e-11 day here.
    const DAY_ROUNDING: f64 = 1e-11;

    fn utc(text: &str) -> Utc {
        Utc::parse(text).unwrap()
    }

    #[test]
    fn j2000_is_noon_of_the_first_of_january_2000() {
        // TT J2000.0 = 2000-01-01 11:58:55.816 UTC, by definition of TT and TAI-UTC = 32 s
        let tt = utc("2000-01-01T11:58:55.816Z").tt();
        assert!(((tt.0 - 2_451_545.0) + tt.1).abs() < DAY_ROUNDING);
    }

    #[test]
    fn a_leap_second_is_a_second_of_its_own() {
        let before = utc("2016-12-31T23:59:59Z").tt();
        let leap = utc("2016-12-31T23:59:60Z").tt();
        let after = utc("2017-01-01T00:00:00Z").tt();
        let seconds = |a: Tt, b: Tt| ((b.0 - a.0) + (b.1 - a.1)) * 86_400.0;
        assert!((seconds(before, leap) - 1.0).abs() < 1e-5);
        assert!((seconds(leap, after) - 1.0).abs() < 1e-5);
    }

    #[test]
    fn a_year_out_of_range_is_refused_by_name() {
        assert_eq!(
            Utc::parse("1971-12-31T00:00:00Z"),
            Err(InstantFault::YearOutOfRange(1971))
        );
        assert!(Utc::parse("2026-12-01 21:30").is_err());
    }

    #[test]
    fn moving_far_stops_at_the_end_of_the_range() {
        assert_eq!(
            utc("2026-12-01T00:00:00Z")
                .plus_seconds(f64::INFINITY)
                .rfc3339(),
            "2100-12-31T00:00:00Z"
        );
    }

    #[test]
    fn the_next_second_is_a_whole_one() {
        assert_eq!(
            utc("2026-12-01T21:29:59.25Z").next_second().rfc3339(),
            "2026-12-01T21:30:00Z"
        );
    }

    #[test]
    fn text_keeps_milliseconds_only_when_there_are_any() {
        assert_eq!(
            utc("2026-12-01T21:30:00.25Z").rfc3339(),
            "2026-12-01T21:30:00.250Z"
        );
        assert_eq!(
            utc("2026-12-01T22:30:00+01:00").rfc3339(),
            "2026-12-01T21:30:00Z"
        );
    }
}
