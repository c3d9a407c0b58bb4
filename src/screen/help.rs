//! The keys, as the help view lists them.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::screen::keys::{self, Mode};
use crate::screen::light::Strength;
use crate::screen::look::Look;

/// Draws the keys of a mode; where there are more than the area holds, one page of them after another.
pub fn draw(look: Look, buffer: &mut Buffer, area: Rect, mode: Mode, page: usize) {
    let held: Vec<_> = keys::held(mode).collect();
    let room = usize::from(area.height).max(1);
    let mut rows = area.rows();
    let pages = held.len().div_ceil(room.saturating_sub(1).max(1));
    if held.len() >= room
        && let Some(row) = rows.next()
    {
        let turn = format!("page {} of {pages}, space for more", page % pages + 1);
        look.right(buffer, row, &turn, Strength::Plain);
        heading(look, buffer, row, mode);
    } else if let Some(row) = rows.next() {
        heading(look, buffer, row, mode);
    }
    let rows: Vec<Rect> = rows.collect();
    let held = held
        .chunks(rows.len().max(1))
        .nth(page % pages)
        .unwrap_or(&[]);
    for (key, row) in held.iter().zip(rows) {
        look.left(buffer, row, key.name, Strength::Strong);
        let text = Rect {
            x: row.x + 7,
            width: row.width.saturating_sub(7),
            ..row
        };
        look.left(buffer, text, key.sentence, Strength::Plain);
    }
}

fn heading(look: Look, buffer: &mut Buffer, row: Rect, mode: Mode) {
    let heading = format!("keys while {}", mode.words());
    look.left(buffer, row, &heading, Strength::Strong);
}
