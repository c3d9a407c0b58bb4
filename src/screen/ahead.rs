//! What there is to expect of the objects of the list: how high, from which side of the pier, until when.

use crate::angle::Altitude;
use crate::metal::Side;
use crate::night::State;
use crate::plan::{End, Reach, Site, fewest_turns, reaches};
use crate::screen::observatory::Observatory;
use crate::sky::Moment;
use crate::time::Utc;

/// What there is to expect of an object of the list.
#[derive(Clone, Debug, PartialEq)]
pub struct Ahead {
    altitude: Altitude,
    /// When and from where it can be had next.
    reach: Option<Reach>,
    /// It can be had now.
    now: bool,
}

impl Ahead {
    /// In words; clock times as `at` says them.
    #[must_use]
    pub fn words(&self, at: impl Fn(Utc) -> String) -> String {
        let Some(reach) = &self.reach else {
            return "not to be had before morning".to_owned();
        };
        let side = match reach.side {
            Side::Single => String::new(),
            side => format!("{} ", side.in_words()),
        };
        if !self.now {
            return format!("{side}from {}", at(reach.from));
        }
        let high = format!("{:.0}° up", self.altitude.degrees());
        match reach.end {
            End::Asked => format!("{high}  {side}all night"),
            End::Side => format!("{high}  {side}until {}, then over", at(reach.until)),
            End::Low => format!("{high}  {side}until {}", at(reach.until)),
        }
    }
}

/// An object takes so long, with people waiting to look (common practice, no source).
const PACE_S: f64 = 300.0;

/// As far ahead as a night goes.
const NIGHT_S: f64 = 12.0 * 3600.0;

/// How high an object stands, and when it can be had.
type Standing = (Altitude, Vec<Reach>);

/// What there is to expect of every object of the list, in its order: nothing of a name no catalogue knows. Of the sides
/// an object can be had from, that is named which keeps the turns over the pier few.
#[must_use]
pub fn ahead(observatory: &Observatory, state: &State, moment: &Moment) -> Vec<Option<Ahead>> {
    let site = Site {
        horizon: &observatory.horizon,
        mount: &observatory.mount,
    };
    let current = state.current.unwrap_or_default();
    let mut wait = 0.0;
    let entries: Vec<(Option<Standing>, Vec<Side>)> = state
        .targets
        .iter()
        .enumerate()
        .map(|(index, entry)| {
            let Some(target) = entry.target.target() else {
                return (None, Vec::new());
            };
            let place = moment.observed(&moment.apparent(&target.source));
            let reaches = reaches(&site, moment, NIGHT_S, &target.source);
            let to_come = index >= current && entry.outcome.is_none();
            let at = moment.utc().plus_seconds(wait);
            let within = |reach: &&Reach| {
                at.seconds_since(reach.from) >= 0.0 && reach.until.seconds_since(at) > 0.0
            };
            let sides: Vec<Side> = if to_come {
                reaches
                    .iter()
                    .filter(within)
                    .map(|reach| reach.side)
                    .collect()
            } else {
                Vec::new()
            };
            if !sides.is_empty() {
                wait += PACE_S;
            }
            (Some((place.altitude, reaches)), sides)
        })
        .collect();
    let sides: Vec<Vec<Side>> = entries.iter().map(|(_, sides)| sides.clone()).collect();
    let taken = fewest_turns(&sides, state.tube.as_ref().map(|tube| tube.side));
    entries
        .into_iter()
        .zip(taken)
        .map(|((found, _), side)| {
            let (altitude, reaches) = found?;
            let now = |reach: &&Reach| reach.from.seconds_since(moment.utc()) <= 0.0;
            let wanted = |reach: &&Reach| side.is_none_or(|side| reach.side == side);
            let reach = reaches.iter().find(|reach| now(reach) && wanted(reach));
            let reach = reach.or_else(|| reaches.first()).copied();
            Some(Ahead {
                altitude,
                now: reach.as_ref().is_some_and(|reach| now(&reach)),
                reach,
            })
        })
        .collect()
}
