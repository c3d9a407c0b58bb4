//! Civil time at a site, by its IANA zone, and the civil date a night belongs to.

use std::fmt;
use std::str::FromStr;

use chrono::{DateTime, Datelike, NaiveDate, NaiveTime, Offset, TimeDelta, TimeZone};
use chrono_tz::Tz;

use crate::time::instant::Utc;

/// A site's civil time zone, from the IANA database compiled into the program.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct CivilZone(Tz);

/// A name that is not in the IANA time zone database.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[error("\"{name}\" is not a time zone of the IANA database")]
pub struct UnknownZone {
    /// The name as given.
    pub name: String,
    /// The known name most like it, if any is much alike.
    pub nearest: Option<&'static str>,
}

/// A night, named by the civil date of its evening: from noon of that date to the next noon.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Night(NaiveDate);

impl CivilZone {
    /// Coordinated universal time as a civil zone.
    pub const UTC: Self = Self(Tz::UTC);

    /// The zone's IANA name.
    #[must_use]
    pub fn name(self) -> &'static str {
        self.0.name()
    }

    /// The civil date and time at an instant.
    #[must_use]
    pub fn civil(self, utc: Utc) -> DateTime<Tz> {
        utc.chrono().with_timezone(&self.0)
    }

    /// How far civil time is ahead of UTC at an instant, in seconds.
    #[must_use]
    pub fn seconds_ahead_of_utc(self, utc: Utc) -> i32 {
        self.0
            .offset_from_utc_datetime(&utc.chrono().naive_utc())
            .fix()
            .local_minus_utc()
    }

    /// The night an instant belongs to.
    #[must_use]
    pub fn night(self, utc: Utc) -> Night {
        let civil = self.civil(utc).naive_local();
        let half_a_day = TimeDelta::hours(12);
        Night(civil.checked_sub_signed(half_a_day).unwrap_or(civil).date())
    }

    /// Noon of a night's civil date, when the night begins.
    #[must_use]
    pub fn noon(self, night: Night) -> Option<Utc> {
        let noon = night.0.and_time(NaiveTime::from_hms_opt(12, 0, 0)?);
        // no zone has ever skipped noon for long; the earlier of two is the first noon
        let instant = self.0.from_local_datetime(&noon).earliest()?;
        Utc::new(instant.to_utc()).ok()
    }

    /// When civil clocks show a time in a night: from noon on in its evening, before noon the morning after. The first of two,
    /// where clocks are set back; nothing where they are set forward past it.
    #[must_use]
    pub fn at_clock(self, night: Night, clock: NaiveTime) -> Option<Utc> {
        let noon = NaiveTime::from_hms_opt(12, 0, 0)?;
        let date = if clock >= noon {
            night.0
        } else {
            night.0.succ_opt()?
        };
        let civil = date.and_time(clock);
        let instant = self.0.from_local_datetime(&civil).earliest()?;
        Utc::new(instant.to_utc()).ok()
    }
}

impl Night {
    /// The night that begins on the evening of a civil date.
    #[must_use]
    pub const fn of_evening(date: NaiveDate) -> Self {
        Self(date)
    }

    /// The civil date of its evening.
    #[must_use]
    pub const fn evening(self) -> NaiveDate {
        self.0
    }
}

impl fmt::Display for Night {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(
            f,
            "{:04}-{:02}-{:02}",
            self.0.year(),
            self.0.month(),
            self.0.day()
        )
    }
}

impl FromStr for Night {
    type Err = chrono::ParseError;
    fn from_str(text: &str) -> Result<Self, Self::Err> {
        NaiveDate::parse_from_str(text, "%Y-%m-%d").map(Self)
    }
}

impl FromStr for CivilZone {
    type Err = UnknownZone;
    fn from_str(name: &str) -> Result<Self, UnknownZone> {
        /// Below this likeness (0 to 1, Jaro-Winkler) a suggestion would puzzle rather than help.
        const MUCH_ALIKE: f64 = 0.8;
        name.parse().map(Self).map_err(|_| UnknownZone {
            name: name.to_owned(),
            nearest: chrono_tz::TZ_VARIANTS
                .iter()
                .map(|zone| (strsim::jaro_winkler(zone.name(), name), zone.name()))
                .filter(|(likeness, _)| *likeness > MUCH_ALIKE)
                .max_by(|a, b| a.0.total_cmp(&b.0))
                .map(|(_, zone)| zone),
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_small_hours_belong_to_the_evening_before() {
        let zone: CivilZone = "Europe/London".parse().unwrap();
        let night = |text| zone.night(Utc::parse(text).unwrap()).to_string();
        assert_eq!(night("2026-12-02T05:30:00Z"), "2026-12-01");
        assert_eq!(night("2026-12-02T11:59:59Z"), "2026-12-01");
        assert_eq!(night("2026-12-02T12:00:00Z"), "2026-12-02");
        // in summer time noon is at 11h UTC
        assert_eq!(night("2026-07-01T11:00:00Z"), "2026-07-01");
    }

    #[test]
    fn a_night_begins_at_civil_noon() {
        let zone: CivilZone = "Australia/Sydney".parse().unwrap();
        let noon = zone.noon("2026-12-01".parse().unwrap()).unwrap();
        assert_eq!(noon.rfc3339(), "2026-12-01T01:00:00Z");
    }

    #[test]
    fn a_clock_time_of_a_night_is_that_of_its_evening_or_of_the_morning_after() {
        let zone: CivilZone = "Europe/London".parse().unwrap();
        let at = |night: &str, hour, minute| {
            let clock = NaiveTime::from_hms_opt(hour, minute, 0).unwrap();
            let utc = zone.at_clock(night.parse().unwrap(), clock);
            utc.map(Utc::rfc3339)
        };
        let text = |text: &str| Some(text.to_owned());
        assert_eq!(at("2026-12-01", 21, 30), text("2026-12-01T21:30:00Z"));
        assert_eq!(at("2026-12-01", 3, 0), text("2026-12-02T03:00:00Z"));
        // clocks go back at 2h on October 25 and forward at 1h on March 29
        assert_eq!(at("2026-10-24", 3, 0), text("2026-10-25T03:00:00Z"));
        assert_eq!(at("2026-10-24", 1, 30), text("2026-10-25T00:30:00Z"));
        assert_eq!(at("2026-03-28", 1, 30), None);
    }

    #[test]
    fn a_slip_in_a_zone_name_brings_the_right_one() {
        let fault = "Europe/Londn".parse::<CivilZone>().unwrap_err();
        assert_eq!(fault.nearest, Some("Europe/London"));
    }
}
