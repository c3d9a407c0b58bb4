//! The picture of a graduated circle under its index: the engraved marks and numbers to either side
//! as they will look when the circle is set.
//!
//! The ring lies along the row with the index in the middle. The axis angle grows to the right: to
//! the right lies what comes under the index when the tube swings west, or north.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::metal::StripMark;
use crate::screen::light::Strength;
use crate::screen::look::Look;

/// What is engraved about the index.
pub struct Strip<'s> {
    /// The marks, by their divisions from the index.
    pub marks: &'s [StripMark],
    /// How wide a division is drawn.
    pub columns: u16,
}

/// The columns a division takes in a picture so wide: as many as let two numbered marks be seen,
/// where every so many divisions are numbered; a tenth of a division a column is as fine as it gets.
#[must_use]
pub fn columns(width: u16, divisions_numbered: f64) -> u16 {
    const LEAST: f64 = 2.0;
    const MOST: f64 = 10.0;
    const LABEL: f64 = 6.0;
    let columns = (f64::from(width) - LABEL) / divisions_numbered.max(1.0);
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // 2 to 10
    let columns = columns.clamp(LEAST, MOST).floor() as u16;
    columns
}

/// How many divisions to either side of the index a picture so wide can show.
#[must_use]
pub fn divisions(width: u16, columns: u16) -> f64 {
    f64::from(width) / 2.0 / f64::from(columns.max(1)) + 1.0
}

/// Draws the picture in two rows, or three with the index in one of its own.
pub fn draw(look: Look, buffer: &mut Buffer, area: Rect, strip: &Strip<'_>) {
    let middle = i32::from(area.width) / 2;
    let rows: Vec<Rect> = area.rows().collect();
    let [.., ring, numbers] = rows.as_slice() else {
        return;
    };
    let above = rows.len().checked_sub(3).and_then(|row| rows.get(row));
    let mut put = |row: &Rect, column: i32, text: &str, strength: Strength| {
        let width = i32::try_from(text.chars().count()).unwrap_or(i32::MAX);
        let start = middle + column - width / 2;
        if let Ok(x) = u16::try_from(start)
            && start + width <= i32::from(area.width)
        {
            buffer.set_string(area.x + x, row.y, text, look.style(strength));
        }
    };
    for column in 0..i32::from(area.width) {
        put(ring, column - middle, "·", Strength::Faint);
    }
    let mut free_from = i32::MIN;
    for mark in strip.marks {
        #[allow(clippy::cast_possible_truncation)] // within a few hundred columns
        let column = (mark.offset * f64::from(strip.columns)).round() as i32;
        let (line, strength) = if mark.is_numbered() {
            ("┃", Strength::Strong)
        } else {
            ("│", Strength::Plain)
        };
        put(ring, column, line, strength);
        if let Some(label) = &mark.label {
            let width = i32::try_from(label.chars().count()).unwrap_or(i32::MAX);
            if column - width / 2 >= free_from {
                put(numbers, column, label, Strength::Plain);
                free_from = column - width / 2 + width + 1;
            }
        }
    }
    put(above.unwrap_or(ring), 0, "▼", Strength::Strong);
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::screen::figures::Glyphs;
    use crate::screen::light::{Depth, Light, Palette};

    fn picture(width: u16, height: u16, marks: &[StripMark]) -> Vec<String> {
        let look = Look {
            palette: Palette::new(Light::Night, Depth::Full),
            glyphs: Glyphs::Full,
        };
        let area = Rect::new(0, 0, width, height);
        let mut buffer = Buffer::empty(area);
        let strip = Strip { marks, columns: 6 };
        draw(look, &mut buffer, area, &strip);
        buffer
            .content
            .chunks(usize::from(width))
            .map(|row| row.iter().map(ratatui::buffer::Cell::symbol).collect())
            .collect()
    }

    fn marks() -> Vec<StripMark> {
        (-3..=3)
            .map(|count| StripMark {
                offset: f64::from(count) + 0.5,
                label: (count % 2 == 0).then(|| format!("20h{:02}", 40 + 4 * count)),
            })
            .collect()
    }

    #[test]
    fn marks_and_numbers_stand_where_they_will_be_seen() {
        assert_eq!(
            picture(32, 3, &marks()),
            [
                "                ▼               ",
                "·│·····┃·····│·····┃·····│·····┃",
                "     20h32       20h40          ",
            ]
        );
    }

    #[test]
    fn in_two_rows_the_index_stands_on_the_ring() {
        let [ring, _] = picture(31, 2, &marks()).try_into().unwrap();
        assert_eq!(ring.chars().nth(15), Some('▼'));
    }

    #[test]
    fn a_picture_too_narrow_draws_nothing_outside() {
        assert_eq!(picture(3, 2, &marks()), ["·▼·", "   "]);
    }

    #[test]
    fn a_division_is_as_wide_as_shows_two_numbers() {
        assert_eq!(columns(38, 5.0), 6);
        assert_eq!(columns(29, 5.0), 4);
        assert_eq!(columns(90, 5.0), 10);
        assert_eq!(columns(10, 12.0), 2);
    }
}
