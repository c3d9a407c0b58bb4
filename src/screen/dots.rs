//! A round picture out of characters: stars, rings and a mark about its middle.
//!
//! Places are counted in rows from the middle, to the right and upward; a column is half a row wide. With all glyphs a
//! cell holds two by four dots of braille; in ASCII a star is one character.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::screen::figures::Glyphs;
use crate::screen::light::Strength;
use crate::screen::look::Look;

/// How large a star is drawn.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Size {
    /// One dot.
    Faint,
    /// Two dots.
    Middling,
    /// Two by two dots.
    Bright,
    /// Five dots, as a cross.
    Brightest,
}

impl Size {
    /// Of a star in a picture whose brightest star has the magnitude `brightest`: a step for every magnitude and a fifth
    /// from there on, from 6 where the brightest is fainter.
    #[must_use]
    pub fn of(magnitude: f64, brightest: Option<f64>) -> Self {
        const STEP: f64 = 1.2;
        const FAINT_FIELD: f64 = 6.0;
        let from = brightest.unwrap_or(magnitude).min(FAINT_FIELD);
        match (magnitude - from) / STEP {
            steps if steps < 1.0 => Self::Brightest,
            steps if steps < 2.0 => Self::Bright,
            steps if steps < 3.0 => Self::Middling,
            _ => Self::Faint,
        }
    }

    const fn ascii(self) -> char {
        match self {
            Self::Faint => '.',
            Self::Middling => 'o',
            Self::Bright => 'O',
            Self::Brightest => '*',
        }
    }

    /// Its dots, from its middle, right and down in half dots.
    const fn dots(self) -> &'static [(i32, i32)] {
        match self {
            Self::Faint => &[(0, 0)],
            Self::Middling => &[(-1, 0), (1, 0)],
            Self::Bright => &[(-1, -1), (1, -1), (-1, 1), (1, 1)],
            Self::Brightest => &[(0, -2), (-2, 0), (0, 0), (2, 0), (0, 2)],
        }
    }
}

/// One cell of the picture.
#[derive(Clone, Copy, Debug, Default)]
struct Cell {
    /// Braille dots, as in its Unicode block.
    dots: u8,
    /// What stands there in ASCII.
    ascii: Option<char>,
    /// A star has part in it, or the mark.
    strong: bool,
}

/// The picture.
#[derive(Clone, Debug)]
pub struct Canvas {
    area: Rect,
    glyphs: Glyphs,
    cells: Vec<Cell>,
}

/// Dots of braille in a row, down; and across two columns.
const DOTS_A_ROW: f64 = 4.0;

impl Canvas {
    /// An empty one.
    #[must_use]
    pub fn new(area: Rect, glyphs: Glyphs) -> Self {
        Self {
            area,
            glyphs,
            cells: vec![Cell::default(); usize::from(area.width) * usize::from(area.height)],
        }
    }

    /// A circle so many rows from the middle.
    pub fn ring(&mut self, radius_rows: f64) {
        self.circle(radius_rows, 1.0, ':');
    }

    /// The same, thinner.
    pub fn dotted_ring(&mut self, radius_rows: f64) {
        self.circle(radius_rows, 3.0, '-');
    }

    /// A circle with a dot every so many dots.
    fn circle(&mut self, radius_rows: f64, every: f64, ascii: char) {
        let around = std::f64::consts::TAU * radius_rows * DOTS_A_ROW / every;
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // a few hundred
        let count = around.round().max(1.0) as u32;
        for at in 0..count {
            let turn = std::f64::consts::TAU * f64::from(at) / f64::from(count);
            let place = (radius_rows * turn.sin(), radius_rows * turn.cos());
            self.dot(self.dot_of(place), false);
            if self.glyphs == Glyphs::Ascii {
                self.character(place, ascii, false);
            }
        }
    }

    /// A star.
    pub fn star(&mut self, place: (f64, f64), size: Size) {
        if self.glyphs == Glyphs::Ascii {
            self.character(place, size.ascii(), true);
            return;
        }
        let (across, down) = self.half_dots(place);
        for (right, below) in size.dots() {
            let half = |at: f64, by: i32| {
                #[allow(clippy::cast_possible_truncation)] // within the screen
                let dot = f64::midpoint(at, f64::from(by)).floor() as i32;
                dot
            };
            self.dot((half(across, *right), half(down, *below)), true);
        }
    }

    /// The mark of the target: two strokes with the middle left free.
    pub fn mark_the_middle(&mut self) {
        const FREE: f64 = 1.0;
        const STROKE: f64 = 0.5;
        if self.glyphs == Glyphs::Ascii {
            for (right, stroke) in [(-FREE, '>'), (FREE, '<')] {
                self.character((right, 0.0), stroke, true);
            }
            return;
        }
        for side in [-1.0, 1.0] {
            for step in 0..3 {
                let right = side * (FREE + STROKE * f64::from(step) / 2.0);
                self.dot(self.dot_of((right, 0.0)), true);
            }
        }
    }

    /// The cell of a place: column and row on the screen, the nearest inside the picture.
    #[must_use]
    pub fn cell(&self, place: (f64, f64)) -> (u16, u16) {
        let (across, down) = self.half_dots(place);
        let cell = |at: f64, halves: f64, count: u16| {
            #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // within the area
            let cell = (at / halves)
                .floor()
                .clamp(0.0, f64::from(count.max(1)) - 1.0) as u16;
            cell
        };
        (
            self.area.x + cell(across, 4.0, self.area.width),
            self.area.y + cell(down, 8.0, self.area.height),
        )
    }

    /// Puts the picture on the screen.
    pub fn put(&self, look: Look, buffer: &mut Buffer) {
        let width = usize::from(self.area.width).max(1);
        for (line, row) in self.cells.chunks(width).zip(self.area.rows()) {
            for (cell, column) in line.iter().zip(row.columns()) {
                let shown = match self.glyphs {
                    Glyphs::Ascii => cell.ascii,
                    // the block begins with the empty pattern
                    Glyphs::Full if cell.dots == 0 => None,
                    Glyphs::Full => char::from_u32(0x2800 + u32::from(cell.dots)),
                };
                let strength = if cell.strong {
                    Strength::Strong
                } else {
                    Strength::Faint
                };
                if let Some(shown) = shown {
                    buffer.set_string(column.x, column.y, shown.to_string(), look.style(strength));
                }
            }
        }
    }

    /// Half dots of braille from the upper left corner, across and down.
    fn half_dots(&self, (right, up): (f64, f64)) -> (f64, f64) {
        let (across, down) = (f64::from(self.area.width), f64::from(self.area.height));
        (
            // two dots a column, four a row: a row is as high as two columns are wide
            (across / 4.0 + right) * DOTS_A_ROW * 2.0,
            (down / 2.0 - up) * DOTS_A_ROW * 2.0,
        )
    }

    fn dot_of(&self, place: (f64, f64)) -> (i32, i32) {
        let (across, down) = self.half_dots(place);
        #[allow(clippy::cast_possible_truncation)] // within a few screens
        let dot = ((across / 2.0).floor() as i32, (down / 2.0).floor() as i32);
        dot
    }

    /// Sets a dot, if it is inside.
    fn dot(&mut self, (across, down): (i32, i32), strong: bool) {
        /// The bits of the left and the right column, downward (the Unicode Standard, block Braille Patterns).
        const BITS: [[u8; 4]; 2] = [[0x01, 0x02, 0x04, 0x40], [0x08, 0x10, 0x20, 0x80]];
        let (Ok(across), Ok(down)) = (usize::try_from(across), usize::try_from(down)) else {
            return;
        };
        let bit = BITS.get(across % 2).and_then(|column| column.get(down % 4));
        let place = self.index(across / 2, down / 4);
        if let (Some(bit), Some(cell)) = (bit, place.and_then(|at| self.cells.get_mut(at))) {
            cell.dots |= bit;
            cell.strong |= strong;
        }
    }

    fn index(&self, column: usize, row: usize) -> Option<usize> {
        let (width, height) = (usize::from(self.area.width), usize::from(self.area.height));
        (column < width && row < height).then_some(row * width + column)
    }

    fn place_of(&self, place: (f64, f64)) -> Option<usize> {
        let (across, down) = self.dot_of(place);
        let column = usize::try_from(across.div_euclid(2)).ok()?;
        let row = usize::try_from(down.div_euclid(4)).ok()?;
        self.index(column, row)
    }

    /// Puts a character in the cell of a place, if it is inside.
    fn character(&mut self, place: (f64, f64), character: char, strong: bool) {
        if let Some(cell) = self.place_of(place).and_then(|at| self.cells.get_mut(at)) {
            cell.ascii = Some(character);
            cell.strong = strong;
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::screen::light::{Depth, Light, Palette};

    fn drawn(canvas: &Canvas, glyphs: Glyphs) -> Vec<String> {
        let look = Look {
            palette: Palette::new(Light::Night, Depth::Full),
            glyphs,
        };
        let mut buffer = Buffer::empty(canvas.area);
        canvas.put(look, &mut buffer);
        let rows = buffer.content.chunks(usize::from(canvas.area.width));
        rows.map(|row| row.iter().map(ratatui::buffer::Cell::symbol).collect())
            .collect()
    }

    #[test]
    fn a_ring_is_as_many_dots_wide_as_high_and_touches_all_four_edges() {
        let mut canvas = Canvas::new(Rect::new(0, 0, 16, 8), Glyphs::Full);
        canvas.ring(3.9);
        let inked =
            |canvas: &Canvas, column: usize, row: usize| canvas.cells[row * 16 + column].dots != 0;
        assert!((0..16).any(|column| inked(&canvas, column, 0)));
        assert!((0..16).any(|column| inked(&canvas, column, 7)));
        assert!((0..8).any(|row| inked(&canvas, 0, row)));
        assert!((0..8).any(|row| inked(&canvas, 15, row)));
        assert!(!inked(&canvas, 0, 0) && !inked(&canvas, 7, 4));
    }

    #[test]
    fn in_ascii_stars_stand_to_the_right_and_above_where_they_are() {
        let mut canvas = Canvas::new(Rect::new(0, 0, 12, 6), Glyphs::Ascii);
        canvas.star((2.0, 1.0), Size::Brightest);
        canvas.star((-2.0, -2.0), Size::Faint);
        canvas.mark_the_middle();
        canvas.star((90.0, 0.0), Size::Faint);
        assert_eq!(
            drawn(&canvas, Glyphs::Ascii),
            [
                "            ",
                "            ",
                "          * ",
                "    >   <   ",
                "            ",
                "  .         ",
            ]
        );
    }

    #[test]
    fn a_brighter_star_is_drawn_with_more_dots() {
        let sizes = [8.0, 6.0, 4.5, 3.0].map(|hp| Size::of(hp, Some(3.0)));
        assert!(sizes.is_sorted() && sizes.windows(2).all(|two| two[0] != two[1]));
        assert!(
            sizes
                .windows(2)
                .all(|two| two[0].dots().len() < two[1].dots().len())
        );
        // among faint stars alone none is made to look bright
        assert_eq!(Size::of(9.0, Some(8.9)), Size::Middling);
    }
}
