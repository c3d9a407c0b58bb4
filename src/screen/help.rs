//! The keys, as the help view lists them.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::screen::keys::{self, Mode};
use crate::screen::light::Strength;
use crate::screen::look::Look;

/// Draws the keys of a mode; where there are more than the area holds, one page of them after another.
pub fn draw(look: Look, buffer: &mut Buffer, area: Rect, mode: Mode, page: usize) {
    let held: Vec<_> = keys::held(mode).collect();
    let rows: Vec<Rect> = area.rows().collect();
    let Some((first, rows)) = rows.split_first() else {
        return;
    };
    let pages = held.len().div_ceil(rows.len().max(1)).max(1);
    let page = page % pages;
    let mut heading = format!("keys while {}", mode.words());
    if pages > 1 {
        heading = format!("{heading}, {} of {pages}", page + 1);
    }
    look.left(buffer, *first, &heading, Strength::Strong);
    for (key, row) in held.iter().skip(page * rows.len()).zip(rows) {
        look.left(buffer, *row, key.name, Strength::Strong);
        let text = Rect {
            x: row.x + 7,
            width: row.width.saturating_sub(7),
            ..*row
        };
        look.left(buffer, text, key.sentence, Strength::Plain);
    }
}
