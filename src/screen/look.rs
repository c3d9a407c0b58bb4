//! How the panes put ink on the screen: the light, the glyphs, and lines laid left and right.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;
use ratatui::text::Line;

use crate::screen::figures::Glyphs;
use crate::screen::light::{Palette, Strength};

/// The light and the glyphs of the terminal.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Look {
    /// The light.
    pub palette: Palette,
    /// The glyphs.
    pub glyphs: Glyphs,
}

/// What stands for a character where only ASCII is shown.
const IN_ASCII: &[(&str, &str)] = &[
    ("°", "d"),
    ("·", "."),
    ("─", "-"),
    ("│", "|"),
    ("┃", "|"),
    ("▼", "v"),
    ("…", "~"),
    ("±", "+"),
    ("′", "'"),
    ("″", "\""),
];

impl Look {
    /// The style of a strength.
    #[must_use]
    pub fn style(self, strength: Strength) -> Style {
        self.palette.style(strength)
    }

    /// Puts text at the left of a row, cut with an ellipsis if it is too long.
    pub fn left(self, buffer: &mut Buffer, row: Rect, text: &str, strength: Strength) {
        buffer.set_stringn(
            row.x,
            row.y,
            cut(text, usize::from(row.width)),
            usize::from(row.width),
            self.style(strength),
        );
    }

    /// Puts text at the right of a row, and gives the room left of it, one column apart.
    pub fn right(self, buffer: &mut Buffer, row: Rect, text: &str, strength: Strength) -> Rect {
        let width = columns(text).min(usize::from(row.width));
        #[allow(clippy::cast_possible_truncation)] // no wider than the row
        let taken = width as u16;
        let place = Rect {
            x: row.right() - taken,
            width: taken,
            ..row
        };
        self.left(buffer, place, text, strength);
        let left = if taken == 0 { 0 } else { taken + 1 };
        Rect {
            width: row.width.saturating_sub(left),
            ..row
        }
    }

    /// Puts text in reverse over a whole row: a caution, or the line chosen.
    pub fn reversed(self, buffer: &mut Buffer, row: Rect, text: &str) {
        let style = self.palette.reverse();
        buffer.set_style(row, style);
        buffer.set_stringn(
            row.x,
            row.y,
            cut(text, usize::from(row.width)),
            usize::from(row.width),
            style,
        );
    }

    /// Draws a rule.
    pub fn rule(self, buffer: &mut Buffer, row: Rect) {
        let line = "─".repeat(usize::from(row.width));
        buffer.set_string(row.x, row.y, line, self.style(Strength::Faint));
    }

    /// Gives the whole area its ground, so that no cell is left in another colour.
    pub fn ground(self, buffer: &mut Buffer, area: Rect) {
        buffer.set_style(area, self.style(Strength::Plain));
    }

    /// Makes what was drawn plain ASCII, where that is all there is.
    pub fn settle(self, buffer: &mut Buffer) {
        if self.glyphs == Glyphs::Full {
            return;
        }
        for cell in &mut buffer.content {
            if !cell.symbol().is_ascii() {
                let known = IN_ASCII
                    .iter()
                    .find(|(symbol, _)| *symbol == cell.symbol())
                    .map_or("?", |(_, ascii)| ascii);
                cell.set_symbol(known);
            }
        }
    }
}

/// The columns a text takes.
#[must_use]
pub fn columns(text: &str) -> usize {
    Line::raw(text).width()
}

/// A text in so many columns, cut with an ellipsis.
fn cut(text: &str, width: usize) -> String {
    if columns(text) <= width {
        return text.to_owned();
    }
    let mut kept = String::new();
    for c in text.chars() {
        kept.push(c);
        if columns(&kept) >= width {
            kept.pop();
            break;
        }
    }
    kept.truncate(kept.trim_end().len());
    if width > 0 {
        kept.push('…');
    }
    kept
}

/// A text in lines of so many columns at most, broken between words.
#[must_use]
pub fn wrapped(text: &str, width: usize) -> Vec<String> {
    let mut lines: Vec<String> = Vec::new();
    for word in text.split_whitespace() {
        match lines.last_mut() {
            Some(line) if columns(line) + 1 + columns(word) <= width => {
                line.push(' ');
                line.push_str(word);
            }
            _ => lines.push(word.to_owned()),
        }
    }
    lines
}

/// The longest of several wordings that fits, else the last.
#[must_use]
pub fn fitting(wordings: &[String], width: usize) -> &str {
    wordings
        .iter()
        .find(|wording| columns(wording) <= width)
        .or(wordings.last())
        .map_or("", String::as_str)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_is_too_long_is_cut_with_an_ellipsis() {
        assert_eq!(cut("Tarn Hollow", 11), "Tarn Hollow");
        assert_eq!(cut("Tarn Hollow", 10), "Tarn Holl…");
        assert_eq!(cut("Tarn Hollow", 6), "Tarn…");
        assert_eq!(cut("Tarn", 0), "");
    }

    #[test]
    fn lines_break_between_words() {
        assert_eq!(
            wrapped("the Sun is up: keep the tube capped", 16),
            ["the Sun is up:", "keep the tube", "capped"]
        );
    }
}
