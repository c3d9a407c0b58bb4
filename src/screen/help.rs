//! The keys, as the help view lists them.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::screen::keys::{self, Mode};
use crate::screen::light::Strength;
use crate::screen::look::Look;

/// Draws the keys of a mode.
pub fn draw(look: Look, buffer: &mut Buffer, area: Rect, mode: Mode) {
    let held: Vec<_> = keys::held(mode).collect();
    let mut rows = area.rows();
    // the keys need the room more than the heading does
    if usize::from(area.height) > held.len()
        && let Some(row) = rows.next()
    {
        let heading = format!("keys while {}", mode.words());
        look.left(buffer, row, &heading, Strength::Strong);
    }
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
