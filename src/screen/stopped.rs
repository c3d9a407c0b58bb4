//! What stands in place of the settings: a caution that stops them, or why there are none.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::screen::light::Strength;
use crate::screen::look::{Look, wrapped};
use crate::screen::shown::Settings;

/// Draws it; does nothing where there are settings.
pub fn draw(look: Look, buffer: &mut Buffer, area: Rect, settings: &Settings) {
    let (heading, words, after) = match settings {
        Settings::Dialled(_) => return,
        Settings::Nothing { words, after } => ("", words.as_str(), *after),
        Settings::Stopped {
            heading,
            words,
            answerable: true,
        } => (*heading, words.as_str(), "space goes on. a answers for it."),
        Settings::Stopped { heading, words, .. } => {
            (*heading, words.as_str(), "there is nothing to set")
        }
    };
    let mut rows = area.rows().skip(1);
    if !heading.is_empty()
        && let Some(row) = rows.next()
    {
        let text = format!("  {heading}  ");
        buffer.set_stringn(
            row.x,
            row.y,
            &text,
            usize::from(row.width),
            look.palette.reverse(),
        );
        rows.next();
    }
    let width = usize::from(area.width).min(70);
    for line in wrapped(words, width) {
        if let Some(row) = rows.next() {
            look.left(buffer, row, &line, Strength::Strong);
        }
    }
    rows.next();
    for line in wrapped(after, width) {
        if let Some(row) = rows.next() {
            look.left(buffer, row, &line, Strength::Plain);
        }
    }
}
