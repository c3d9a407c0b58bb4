//! The list: what became of each object, how high it stands, from which side of the pier and until when.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::night::{NightTarget, Outcome, State};
use crate::screen::ahead::Ahead;
use crate::screen::keys::{Act, Mode};
use crate::screen::light::Strength;
use crate::screen::look::Look;
use crate::screen::panel::{Doing, Panel};
use crate::screen::scene::{Scene, entered, record};
use crate::screen::shown::From;

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
