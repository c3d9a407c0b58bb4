//! Large figures, several rows tall, drawn from a small table of our own.
//!
//! Every figure is three strokes wide and five bars high in the table; a cut says how thick the
//! strokes and bars are and how far apart, so one table serves every size. Half blocks make a dot
//! about as wide as it is high. The marks of hours, minutes and degrees stand small at the top, as
//! in a printed ephemeris. Where block characters cannot be shown, `#` stands for them.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;
use ratatui::widgets::Widget;

/// Whether the terminal shows characters beyond ASCII.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Glyphs {
    /// It does.
    #[default]
    Full,
    /// It does not.
    Ascii,
}

impl Glyphs {
    /// What the environment's locale says: the first of `LC_ALL`, `LC_CTYPE` and `LANG` that is set.
    #[must_use]
    pub fn of_locale(locale: Option<&str>) -> Self {
        let locale = locale.unwrap_or_default().to_ascii_lowercase();
        if locale.contains("utf-8") || locale.contains("utf8") {
            Self::Full
        } else {
            Self::Ascii
        }
    }
}

/// The figures: three strokes of five bars each, a letter as many strokes as it needs.
const FIGURES: &[(char, [&str; 5])] = &[
    ('0', ["###", "#.#", "#.#", "#.#", "###"]),
    ('1', ["..#", "..#", "..#", "..#", "..#"]),
    ('2', ["###", "..#", "###", "#..", "###"]),
    ('3', ["###", "..#", "###", "..#", "###"]),
    ('4', ["#.#", "#.#", "###", "..#", "..#"]),
    ('5', ["###", "#..", "###", "..#", "###"]),
    ('6', ["###", "#..", "###", "#.#", "###"]),
    ('7', ["###", "..#", "..#", "..#", "..#"]),
    ('8', ["###", "#.#", "###", "#.#", "###"]),
    ('9', ["###", "#.#", "###", "..#", "###"]),
    ('-', ["...", "...", "###", "...", "..."]),
    ('+', ["...", ".#.", "###", ".#.", "..."]),
    ('.', [".", ".", ".", ".", "#"]),
    ('N', ["#..#", "##.#", "#.##", "#..#", "#..#"]),
    ('S', ["###", "#..", "###", "..#", "###"]),
    ('E', ["###", "#..", "##.", "#..", "###"]),
    ('W', ["#...#", "#...#", "#.#.#", "#.#.#", ".#.#."]),
];

/// How a figure of the table is cut: thickness and distance, in columns and in half rows.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
struct Cut {
    /// Columns of an outer stroke.
    stroke: usize,
    /// Columns between the outer strokes.
    between: usize,
    /// Half rows of a bar.
    bar: usize,
    /// Half rows between bars.
    apart: usize,
}

/// The cuts, the largest first.
const CUTS: [Cut; 5] = [
    Cut::new(3, 3, 3, 4),
    Cut::new(2, 2, 2, 3),
    Cut::new(2, 1, 2, 2),
    Cut::new(1, 2, 1, 3),
    Cut::new(1, 1, 1, 1),
];

impl Cut {
    const fn new(stroke: usize, between: usize, bar: usize, apart: usize) -> Self {
        Self {
            stroke,
            between,
            bar,
            apart,
        }
    }

    /// The half rows of each of the five bars of the table.
    const fn heights(self) -> [usize; 5] {
        [self.bar, self.apart, self.bar, self.apart, self.bar]
    }

    /// The rows of the terminal.
    fn rows(self, glyphs: Glyphs) -> usize {
        let halves: usize = self.heights().iter().sum();
        match glyphs {
            Glyphs::Full => halves.div_ceil(2),
            Glyphs::Ascii => halves,
        }
    }

    /// The columns of one stroke of a figure that has so many.
    const fn columns(self, stroke: usize, strokes: usize) -> usize {
        if strokes == 3 && stroke == 1 {
            self.between
        } else {
            self.stroke
        }
    }

    fn width(self, figure: &[&str; 5]) -> usize {
        let strokes = figure[0].len();
        (0..strokes)
            .map(|stroke| self.columns(stroke, strokes))
            .sum()
    }
}

/// A line of large figures, cut to a room.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Figures {
    rows: Vec<String>,
    width: usize,
}

fn figure(c: char) -> Option<&'static [&'static str; 5]> {
    FIGURES
        .iter()
        .find(|(name, _)| *name == c)
        .map(|(_, figure)| figure)
}

impl Figures {
    /// Texts in the largest figures of one cut in which each fits its width, or as they are, in one
    /// row, if there is none: one that is larger than the other would seem to matter more.
    #[must_use]
    pub fn together<const N: usize>(
        texts: [(&str, usize); N],
        height: usize,
        glyphs: Glyphs,
    ) -> [Self; N] {
        let cut = CUTS
            .iter()
            .filter(|cut| cut.rows(glyphs) <= height)
            .find(|cut| {
                let fits = |&(text, width): &(&str, usize)| {
                    Self::spaced(text, **cut, width, glyphs).is_some()
                };
                texts.iter().all(fits)
            });
        texts.map(|(text, width)| {
            cut.and_then(|cut| Self::spaced(text, *cut, width, glyphs))
                .unwrap_or_else(|| Self {
                    rows: vec![text.to_owned()],
                    width: text.chars().count(),
                })
        })
    }

    /// The text in a cut, spaced as widely as the width allows.
    fn spaced(text: &str, cut: Cut, width: usize, glyphs: Glyphs) -> Option<Self> {
        [2, 1]
            .into_iter()
            .map(|space| Self::cut(text, cut, space, glyphs))
            .find(|figures| figures.width <= width)
    }

    /// The columns it takes.
    #[must_use]
    pub const fn width(&self) -> usize {
        self.width
    }

    /// The rows it takes.
    #[must_use]
    pub fn height(&self) -> usize {
        self.rows.len()
    }

    /// The rows as text.
    #[must_use]
    pub fn rows(&self) -> &[String] {
        &self.rows
    }

    fn cut(text: &str, cut: Cut, space: usize, glyphs: Glyphs) -> Self {
        let halves: usize = cut.heights().iter().sum();
        let mut dots: Vec<Vec<bool>> = vec![Vec::new(); halves];
        // small characters, with their column, for the top row
        let mut marks: Vec<(usize, char)> = Vec::new();
        let mut after_figure = false;
        let widen = |dots: &mut Vec<Vec<bool>>, by: usize| {
            for row in dots.iter_mut() {
                row.resize(row.len() + by, false);
            }
        };
        for c in text.chars() {
            let at = dots.first().map_or(0, Vec::len);
            match (figure(c), c) {
                (Some(figure), _) => {
                    if after_figure {
                        widen(&mut dots, cut.stroke.div_ceil(2));
                    }
                    Self::append(&mut dots, figure, cut);
                }
                (None, ' ') => widen(&mut dots, space),
                (None, mark) => {
                    marks.push((at, mark));
                    widen(&mut dots, 1);
                }
            }
            after_figure = figure(c).is_some();
        }
        let mut rows = match glyphs {
            Glyphs::Full => dots.chunks(2).map(fold).collect::<Vec<_>>(),
            Glyphs::Ascii => dots
                .iter()
                .map(|row| row.iter().map(|dot| if *dot { '#' } else { ' ' }).collect())
                .collect(),
        };
        if let Some(top) = rows.first_mut() {
            for (at, mark) in marks {
                if let Some(place) = top.get_mut(at) {
                    *place = mark;
                }
            }
        }
        Self {
            width: dots.first().map_or(0, Vec::len),
            rows: rows
                .into_iter()
                .map(|row: Vec<char>| row.into_iter().collect())
                .collect(),
        }
    }

    fn append(dots: &mut [Vec<bool>], figure: &[&str; 5], cut: Cut) {
        debug_assert!(cut.width(figure) > 0);
        let bars = figure
            .iter()
            .zip(cut.heights())
            .flat_map(|(bar, height)| std::iter::repeat_n(bar, height));
        for (row, bar) in dots.iter_mut().zip(bars) {
            for (stroke, dot) in bar.chars().enumerate() {
                let columns = cut.columns(stroke, bar.len());
                row.extend(std::iter::repeat_n(dot == '#', columns));
            }
        }
    }
}

/// Two half rows as one row of half blocks.
fn fold(pair: &[Vec<bool>]) -> Vec<char> {
    let upper = pair.first().map(Vec::as_slice).unwrap_or_default();
    let lower = pair.get(1).map(Vec::as_slice).unwrap_or_default();
    upper
        .iter()
        .enumerate()
        .map(
            |(column, up)| match (*up, lower.get(column).copied().unwrap_or(false)) {
                (true, true) => '█',
                (true, false) => '▀',
                (false, true) => '▄',
                (false, false) => ' ',
            },
        )
        .collect()
}

/// Figures in a style, to be drawn.
pub struct Drawn<'f> {
    /// The figures.
    pub figures: &'f Figures,
    /// Their style.
    pub style: Style,
}

impl Widget for Drawn<'_> {
    fn render(self, area: Rect, buffer: &mut Buffer) {
        for (row, y) in self.figures.rows.iter().zip(area.rows()) {
            buffer.set_stringn(y.x, y.y, row, usize::from(area.width), self.style);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn alone(text: &str, width: usize, height: usize, glyphs: Glyphs) -> Figures {
        let [figures] = Figures::together([(text, width)], height, glyphs);
        figures
    }

    fn picture(text: &str, width: usize, height: usize, glyphs: Glyphs) -> String {
        let figures = alone(text, width, height, glyphs);
        assert!(figures.width() <= width && figures.height() <= height);
        figures.rows().join("\n")
    }

    #[test]
    fn a_reading_to_the_second_fits_half_of_sixty_columns() {
        insta::assert_snapshot!(picture("20h 56m 40s", 29, 3, Glyphs::Full));
        insta::assert_snapshot!(picture("-32° 35' 30\"", 30, 3, Glyphs::Full));
    }

    #[test]
    fn more_room_makes_larger_figures() {
        insta::assert_snapshot!(picture("20h 48m 39s", 38, 5, Glyphs::Full));
        insta::assert_snapshot!(picture("167° 15' N", 60, 6, Glyphs::Full));
        let heights = [3, 5, 6, 9].map(|rows| alone("12h", 60, rows, Glyphs::Full).height());
        assert_eq!(heights, [3, 5, 6, 9]);
    }

    #[test]
    fn two_readings_are_cut_alike() {
        let texts = [("20h 12m 20s", 57), ("32° 35' N", 57)];
        let [hour, dec] = Figures::together(texts, 9, Glyphs::Full);
        assert_eq!(hour.height(), dec.height());
    }

    #[test]
    fn without_block_characters_it_is_plain_ascii() {
        let picture = picture("20h 56m 40s", 29, 5, Glyphs::Ascii);
        assert!(picture.is_ascii());
        insta::assert_snapshot!(picture);
    }

    #[test]
    fn with_no_room_for_figures_the_text_stands_as_it_is() {
        let figures = alone("20h 56m 40s", 20, 9, Glyphs::Full);
        assert_eq!(figures.rows(), ["20h 56m 40s"]);
    }

    #[test]
    fn figures_keep_their_width_as_they_count() {
        for (one, other) in [("11h 11m 11s", "08h 28m 59s"), ("12 N", "90 S")] {
            let width = |text| alone(text, 60, 3, Glyphs::Full).width();
            assert!(width(one).abs_diff(width(other)) <= 1);
        }
    }

    #[test]
    fn the_locale_says_what_can_be_shown() {
        assert_eq!(Glyphs::of_locale(Some("en_GB.UTF-8")), Glyphs::Full);
        assert_eq!(Glyphs::of_locale(Some("C")), Glyphs::Ascii);
        assert_eq!(Glyphs::of_locale(None), Glyphs::Ascii);
    }
}
