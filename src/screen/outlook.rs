//! Where an object is going: rising or setting, and until when it stays clear of the horizon mask
//! and within the mount's reach.

use std::rc::Rc;

use crate::dial::neighbour::Neighbour;
use crate::screen::ahead::Ahead;
use crate::screen::insight::Insight;
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
    insight: Option<(Utc, Rc<Insight>)>,
    ahead: Option<(Utc, Rc<Vec<Option<Ahead>>>)>,
    neighbour: Option<(String, Utc, Option<Neighbour>)>,
}

/// What was foreseen holds so long.
const GOOD_FOR_S: f64 = 60.0;

impl Foresight {
    /// What follows from what is known of the mount, worked out anew once a minute.
    pub fn insight(&mut self, utc: Utc, work_out: impl FnOnce() -> Insight) -> Rc<Insight> {
        if let Some((at, insight)) = &self.insight
            && (0.0..GOOD_FOR_S).contains(&utc.seconds_since(*at))
        {
            return Rc::clone(insight);
        }
        let insight = Rc::new(work_out());
        self.insight = Some((utc, Rc::clone(&insight)));
        insight
    }

    /// The neighbour of an object by its name, worked out anew once a minute.
    pub fn neighbour(
        &mut self,
        name: &str,
        utc: Utc,
        work_out: impl FnOnce() -> Option<Neighbour>,
    ) -> Option<Neighbour> {
        if let Some((last, at, neighbour)) = &self.neighbour
            && last == name
            && (0.0..GOOD_FOR_S).contains(&utc.seconds_since(*at))
        {
            return neighbour.clone();
        }
        let neighbour = work_out();
        self.neighbour = Some((name.to_owned(), utc, neighbour.clone()));
        neighbour
    }

    /// What there is to expect of the objects of the list, worked out anew once a minute.
    pub fn ahead(
        &mut self,
        utc: Utc,
        work_out: impl FnOnce() -> Vec<Option<Ahead>>,
    ) -> Rc<Vec<Option<Ahead>>> {
        if let Some((at, ahead)) = &self.ahead
            && (0.0..GOOD_FOR_S).contains(&utc.seconds_since(*at))
        {
            return Rc::clone(ahead);
        }
        let ahead = Rc::new(work_out());
        self.ahead = Some((utc, Rc::clone(&ahead)));
        ahead
    }

    /// The record has changed: what followed from it no longer does.
    pub fn forget(&mut self) {
        self.insight = None;
        self.neighbour = None;
        self.ahead = None;
    }

    /// The outlook of an object by its name, worked out anew once a minute.
    pub fn outlook(
        &mut self,
        observatory: &Observatory,
        name: &str,
        source: &Source,
        moment: &Moment,
    ) -> Outlook {
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
