//! The line of the object being dialled: what it is, and where in the list it stands.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::catalog::{Kind, Target};
use crate::night::{Outcome, State};
use crate::screen::light::Strength;
use crate::screen::look::{Look, columns};

/// Draws the line; `beside` stands at its right end.
pub fn draw(look: Look, buffer: &mut Buffer, row: Rect, target: &Target, beside: &str) {
    let room = look.right(buffer, row, beside, Strength::Plain);
    look.left(buffer, room, &target.name, Strength::Strong);
    #[allow(clippy::cast_possible_truncation)] // far below the columns of any terminal
    let after = (columns(&target.name) + 2) as u16;
    let rest = Rect {
        x: room.x + after.min(room.width),
        width: room.width.saturating_sub(after),
        ..room
    };
    look.left(buffer, rest, &description(target), Strength::Plain);
}

/// The observer's note, where the line is too short for it.
#[must_use]
pub fn note_cut<'t>(row: Rect, target: &'t Target, beside: &str) -> &'t str {
    let whole = columns(&target.name) + 2 + columns(&description(target)) + 1 + columns(beside);
    if whole > usize::from(row.width) {
        &target.note
    } else {
        ""
    }
}

/// What the object is: kind, constellation, magnitude, size, the observer's note.
#[must_use]
pub fn description(target: &Target) -> String {
    let mut parts = Vec::new();
    if !matches!(target.kind, Kind::Place | Kind::Other) {
        parts.push(target.kind.words().to_owned());
    }
    parts.extend(target.constellation.map(|found| found.name.to_owned()));
    parts.extend(
        target
            .magnitude
            .map(|magnitude| format!("mag {magnitude:.1}")),
    );
    parts.extend(target.size_arcmin.and_then(|(length, width)| {
        if length <= 0.0 {
            None
        } else if (length - width).abs() < 0.1 * length {
            Some(format!("{length:.0}'"))
        } else {
            Some(format!("{length:.0}' x {width:.0}'"))
        }
    }));
    parts.extend(Some(target.note.clone()).filter(|note| !note.is_empty()));
    parts.join(", ")
}

/// Where the object being dialled stands in the list, and what became of it.
#[must_use]
pub fn place_in_list(state: &State) -> String {
    let Some(index) = state.current else {
        return format!("0 of {}", state.targets.len());
    };
    let place = format!("{} of {}", index + 1, state.targets.len());
    match state.current_target().and_then(|entry| entry.outcome) {
        Some(Outcome::Found(_)) => format!("found · {place}"),
        Some(Outcome::Missed(_)) => format!("missed · {place}"),
        None => place,
    }
}
