//! What is being typed: a line with a mark where the next character goes, and what is made of it.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use tui_input::Input;

use crate::screen::light::Strength;
use crate::screen::look::{Look, columns};

/// Draws the line of an entry after its label.
pub fn draw(look: Look, buffer: &mut Buffer, row: Rect, label: &str, input: &Input, active: bool) {
    let strength = if active {
        Strength::Strong
    } else {
        Strength::Plain
    };
    look.left(buffer, row, label, strength);
    #[allow(clippy::cast_possible_truncation)] // labels are short
    let after = (columns(label) + 1) as u16;
    let place = Rect {
        x: row.x + after.min(row.width),
        width: row.width.saturating_sub(after),
        ..row
    };
    let room = usize::from(place.width).saturating_sub(1);
    let hidden = input.visual_scroll(room);
    let shown: String = input.value().chars().skip(hidden).collect();
    let style = look.style(strength);
    buffer.set_stringn(place.x, place.y, &shown, room, style);
    if active {
        #[allow(clippy::cast_possible_truncation)] // within the row
        let x = place.x + input.visual_cursor().saturating_sub(hidden) as u16;
        if let Some(cell) = buffer.cell_mut((x, place.y)) {
            // a cursor of our own: the terminal's has a colour of its own
            cell.set_style(look.palette.reverse());
        }
    }
}
