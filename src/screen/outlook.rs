//! Where an object is going: rising or setting, and until when it stays clear of the horizon mask
//! and within the mount's reach.

use crate::screen::observatory::Observatory;
use crate::sky::{Moment, Observed, Source};
use crate::time::Utc;

/// Where an object is going.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Outlook {
    /// Its altitude grows.
    pub rising: bool,
    /// It is clear of the horizon mask now, and within the mount's reach.
    pub clear: bool,
    /// When that changes, within a day.
    pub changes: Option<Utc>,
}

/// A wall or a tree narrower than this on the sky's way may be overlooked.
const STEP_S: f64 = 600.0;
/// The end of the search.
const DAY_S: f64 = 86_400.0;
/// As finely as a clock time is shown, and a little more.
const FINE_S: f64 = 10.0;

impl Outlook {
    /// Of an object from a moment on.
    #[must_use]
    pub fn of(observatory: &Observatory, source: &Source, moment: &Moment) -> Self {
        let at = |seconds: f64| {
            let then = moment.later(seconds);
            then.observed(&then.apparent(source))
        };
        let limits = &observatory.mount.limits;
        let lowest = limits.lowest_altitude.unwrap_or_default();
        let clear = |place: &Observed| {
            place.altitude.degrees() > 0.0
                && place.altitude >= lowest
                && place.altitude > observatory.horizon.altitude_at(place.azimuth)
                && observatory.mount.reaches(place.hour_angle)
        };
        let now = at(0.0);
        let clear_now = clear(&now);
        let mut from = 0.0;
        let mut changes = None;
        while from < DAY_S && changes.is_none() {
            let to = from + STEP_S;
            if clear(&at(to)) != clear_now {
                let (mut before, mut after) = (from, to);
                while after - before > FINE_S {
                    let middle = f64::midpoint(before, after);
                    if clear(&at(middle)) == clear_now {
                        before = middle;
                    } else {
                        after = middle;
                    }
                }
                changes = Some(moment.utc().plus_seconds(after));
            }
            from = to;
        }
        Self {
            rising: at(60.0).altitude > now.altitude,
            clear: clear_now,
            changes,
        }
    }
}

/// The last outlook, kept while it is good enough: it moves by seconds while the clock moves by minutes.
#[derive(Clone, Debug, Default)]
pub struct Foresight {
    last: Option<(String, Utc, Outlook)>,
}

impl Foresight {
    /// The outlook of an object by its name, worked out anew once a minute.
    pub fn outlook(
        &mut self,
        observatory: &Observatory,
        name: &str,
        source: &Source,
        moment: &Moment,
    ) -> Outlook {
        const GOOD_FOR_S: f64 = 60.0;
        if let Some((last, at, outlook)) = &self.last
            && last == name
            && (0.0..GOOD_FOR_S).contains(&moment.utc().seconds_since(*at))
        {
            return *outlook;
        }
        let outlook = Outlook::of(observatory, source, moment);
        self.last = Some((name.to_owned(), moment.utc(), outlook));
        outlook
    }
}
