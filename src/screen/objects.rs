//! The list: what became of each object, how high it stands, from which side of the pier and until when.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::angle::Altitude;
use crate::metal::Side;
use crate::night::{NightTarget, Outcome, State};
use crate::plan::{End, Reach, Site, fewest_turns, reaches};
use crate::screen::keys::{Act, Mode};
use crate::screen::light::Strength;
use crate::screen::look::Look;
use crate::screen::panel::{Doing, Panel};
use crate::screen::shown::From;
use crate::screen::update::{Scene, entered, record};
use crate::time::Utc;

/// Draws the list, the line chosen in sight.
pub fn draw(look: Look, buffer: &mut Buffer, area: Rect, from: &From<'_>, ahead: &[Option<Ahead>]) {
    let state = from.night.state();
    let (found, missed) = state.tally();
    let mut rows = area.rows();
    if let Some(row) = rows.next() {
        let heading = format!(
            "{} objects: {found} found, {missed} missed",
            state.targets.len()
        );
        look.left(buffer, row, &heading, Strength::Plain);
    }
    let rows: Vec<Rect> = rows.collect();
    let chosen = from.panel.chosen;
    let first = (chosen + 1).saturating_sub(rows.len());
    let entries = state.targets.iter().enumerate().skip(first);
    for ((index, entry), row) in entries.zip(rows) {
        let (mark, strength) = if index == chosen {
            (">", Strength::Strong)
        } else {
            (" ", Strength::Plain)
        };
        let ahead = ahead.get(index).and_then(Option::as_ref);
        let beside = beside(from, entry, ahead);
        let room = look.right(buffer, row, &beside, strength);
        let line = format!("{mark} {:>3}  {}", index + 1, entry.target.name);
        look.left(buffer, room, &line, strength);
    }
}

/// What became of it, or where it stands and from which side it can be had until when.
fn beside(from: &From<'_>, entry: &NightTarget, ahead: Option<&Ahead>) -> String {
    let zone = from.observatory.zone;
    let at = |utc| zone.civil(utc).format("%H:%M").to_string();
    match entry.outcome {
        Some(Outcome::Found(utc)) => format!("found {}", at(utc)),
        Some(Outcome::Missed(utc)) => format!("missed {}", at(utc)),
        None => ahead.map_or_else(
            || "no catalogue knows it".to_owned(),
            |ahead| ahead.words(at),
        ),
    }
}

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
    fn words(&self, at: impl Fn(Utc) -> String) -> String {
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
pub fn ahead(from: &From<'_>) -> Vec<Option<Ahead>> {
    let state = from.night.state();
    let moment = from.moment;
    let site = Site {
        horizon: &from.observatory.horizon,
        mount: &from.observatory.mount,
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

/// A key struck while looking at the list.
pub(super) fn looking(panel: &mut Panel, scene: &Scene<'_>, act: Act) -> Vec<Doing> {
    let night = scene.from.night;
    let last = night.state().targets.len().saturating_sub(1);
    match act {
        Act::Up => panel.chosen = panel.chosen.saturating_sub(1),
        Act::Down => panel.chosen = (panel.chosen + 1).min(last),
        Act::Cancel => panel.enter(Mode::Stepping),
        Act::Accept => {
            return match night.take(panel.chosen) {
                Some(event) => record(event, "", Mode::Stepping),
                None => entered(panel, Mode::Stepping),
            };
        }
        _ => {}
    }
    Vec::new()
}

/// Opens the list at the object being dialled.
pub(super) fn open(panel: &mut Panel, state: &State) {
    panel.enter(Mode::Objects);
    panel.chosen = state.current.unwrap_or_default();
}
