//! What the fit leaves of each reading, as a target of characters.
//!
//! Across, the hour circle's residual, shown too far west to the right; up, the declination circle's, shown too far north
//! upward; each in sigmas of its own reading, so that sound readings gather about the middle: about two in five within
//! the ring at one sigma, all but one in ninety within that at three. A number stands where its reading lies, or as near
//! as there is room. Two columns are as wide as one row is high.

use crate::estimate::{Residual, Sight};

/// Rows from the middle to the edge.
const HALF_ROWS: i32 = 8;

/// Columns from the middle to the edge: a character is about half as wide as high.
const HALF_COLUMNS: i32 = 2 * HALF_ROWS;

/// Where all readings lie within so many sigmas the target is drawn that near.
const NEAR_SIGMAS: f64 = 1.5;

/// Else it reaches so far.
const FAR_SIGMAS: f64 = 4.0;

/// The rings, in sigmas.
const RINGS: [f64; 2] = [1.0, 3.0];

/// Points drawn of a ring: more than it has cells.
const RING_POINTS: u32 = 240;

/// A reading trusted less than this is marked.
const TRUSTED: f64 = 0.5;

/// How far from its place a number may stand where others are in the way, in rows.
const FARTHEST_ROWS: i32 = 3;

/// A reading to be drawn.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Plotted {
    /// The number of its row, from 1.
    pub number: usize,
    /// The hour circle's residual in sigmas, positive west.
    pub hour: f64,
    /// The declination circle's residual in sigmas, positive north.
    pub dec: f64,
    /// False where the fit hardly uses it.
    pub trusted: bool,
}

/// What stands in a cell.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Cell {
    /// Nothing.
    Blank,
    /// A ring.
    Ring,
    /// The middle.
    Middle,
    /// Part of the number of a reading.
    Reading(char),
    /// Part of the number of a reading that is hardly used, or lies beyond the edge.
    Stray(char),
}

/// The target.
#[derive(Clone, Debug, PartialEq)]
pub struct ResidualPlot {
    rows: Vec<Vec<Cell>>,
    reach: f64,
}

impl Plotted {
    /// The reading of that number, from 1. Nothing for one that could not be used.
    #[must_use]
    pub fn new(number: usize, sight: &Sight, residual: Option<&Residual>) -> Option<Self> {
        let residual = residual?;
        let (hour, dec) = (
            residual.hour / sight.sigma_hour,
            residual.dec / sight.sigma_dec,
        );
        (hour.is_finite() && dec.is_finite()).then_some(Self {
            number,
            hour,
            dec,
            trusted: residual.weight() >= TRUSTED,
        })
    }
}

impl Cell {
    /// The character it is written with.
    #[must_use]
    pub const fn character(self) -> char {
        match self {
            Self::Blank => ' ',
            Self::Ring => '·',
            Self::Middle => '+',
            Self::Reading(character) | Self::Stray(character) => character,
        }
    }
}

impl ResidualPlot {
    /// Columns it takes.
    pub const WIDTH: usize = 2 * HALF_COLUMNS as usize + 1;
    /// Rows it takes.
    pub const HEIGHT: usize = 2 * HALF_ROWS as usize + 1;

    /// The target with these readings; those hardly used are written last, so that they are never covered.
    #[must_use]
    pub fn new(readings: &[Plotted]) -> Self {
        let near = readings
            .iter()
            .all(|reading| reading.hour.hypot(reading.dec) < NEAR_SIGMAS);
        let reach = if near { NEAR_SIGMAS } else { FAR_SIGMAS };
        let mut plot = Self {
            rows: vec![vec![Cell::Blank; Self::WIDTH]; Self::HEIGHT],
            reach,
        };
        for radius in plot.rings() {
            for point in 0..RING_POINTS {
                let turn = std::f64::consts::TAU * f64::from(point) / f64::from(RING_POINTS);
                let (row, column) = plot.place(radius * turn.sin(), radius * turn.cos());
                plot.set(row, column, Cell::Ring);
            }
        }
        plot.set(HALF_ROWS, HALF_COLUMNS, Cell::Middle);
        for trusted in [false, true] {
            for reading in readings.iter().filter(|one| one.trusted == trusted) {
                plot.write(reading);
            }
        }
        plot
    }

    /// The cells, row by row from the top.
    #[must_use]
    pub fn rows(&self) -> &[Vec<Cell>] {
        &self.rows
    }

    /// The rows as plain text, without blanks at their ends.
    pub fn lines(&self) -> impl Iterator<Item = String> + '_ {
        self.rows.iter().map(|row| {
            let line: String = row.iter().map(|cell| cell.character()).collect();
            line.trim_end().to_owned()
        })
    }

    /// The rings that are drawn, in sigmas.
    pub fn rings(&self) -> impl Iterator<Item = f64> + use<> {
        let reach = self.reach;
        RINGS.into_iter().filter(move |ring| *ring < reach)
    }

    /// Row and column of a place in sigmas, at the edge for one beyond it.
    #[allow(clippy::cast_possible_truncation)] // within the edges
    fn place(&self, north: f64, west: f64) -> (i32, i32) {
        let beyond = (north.hypot(west) / self.reach).max(1.0);
        let cells = |sigmas: f64, half: i32| {
            (sigmas / beyond / self.reach * f64::from(half)).round() as i32
        };
        (
            HALF_ROWS - cells(north, HALF_ROWS),
            HALF_COLUMNS + cells(west, HALF_COLUMNS),
        )
    }

    fn cell(&mut self, row: i32, column: i32) -> Option<&mut Cell> {
        let row = self.rows.get_mut(usize::try_from(row).ok()?)?;
        row.get_mut(usize::try_from(column).ok()?)
    }

    fn set(&mut self, row: i32, column: i32, cell: Cell) {
        if let Some(there) = self.cell(row, column) {
            *there = cell;
        }
    }

    /// Writes a reading's number at its place, or at the nearest where nothing else is written.
    fn write(&mut self, reading: &Plotted) {
        let beyond = reading.hour.hypot(reading.dec) > self.reach;
        let number = reading.number.to_string();
        let label = if reading.trusted && !beyond {
            number
        } else {
            format!("({number})")
        };
        #[allow(clippy::cast_possible_truncation, clippy::cast_possible_wrap)] // a few characters
        let length = label.len() as i32;
        let (row, column) = self.place(reading.dec, reading.hour);
        let column = (column - (length - 1) / 2).clamp(0, 2 * HALF_COLUMNS + 1 - length);
        let mut near: Vec<(i32, i32)> = (-FARTHEST_ROWS..=FARTHEST_ROWS)
            .flat_map(|down| {
                (-2 * FARTHEST_ROWS..=2 * FARTHEST_ROWS).map(move |right| (down, right))
            })
            .collect();
        // a column is half as far as a row
        near.sort_by_key(|&(down, right)| 4 * down * down + right * right);
        let free = near
            .into_iter()
            .map(|(down, right)| (row + down, column + right))
            .find(|&(row, column)| {
                // a blank or a ring on either side keeps numbers apart
                (-1..=length).all(|place| match self.cell(row, column + place) {
                    Some(Cell::Blank | Cell::Ring | Cell::Middle) => true,
                    Some(_) => false,
                    None => place == -1 || place == length,
                })
            });
        // where even that is full, the number that stands there stays
        let Some((row, column)) = free else { return };
        for (place, character) in (column..).zip(label.chars()) {
            let cell = if reading.trusted && !beyond {
                Cell::Reading(character)
            } else {
                Cell::Stray(character)
            };
            self.set(row, place, cell);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn reading(number: usize, hour: f64, dec: f64) -> Plotted {
        Plotted {
            number,
            hour,
            dec,
            trusted: hour.abs().max(dec.abs()) < 6.0,
        }
    }

    fn drawn(readings: &[Plotted]) -> Vec<String> {
        ResidualPlot::new(readings).lines().collect()
    }

    fn found(lines: &[String], label: &str) -> Option<(usize, usize)> {
        lines.iter().enumerate().find_map(|(row, line)| {
            let column = line.find(label).map(|at| line[..at].chars().count())?;
            Some((row, column))
        })
    }

    #[test]
    fn west_is_to_the_right_and_north_is_up_and_a_sigma_is_as_far_either_way() {
        let lines = drawn(&[
            reading(1, 2.0, 0.0),
            reading(2, 0.0, 2.0),
            reading(3, -2.0, -2.0),
        ]);
        let middle = found(&lines, "+").unwrap();
        assert_eq!(middle, (8, 16));
        assert_eq!(found(&lines, "1"), Some((8, 24)));
        assert_eq!(found(&lines, "2"), Some((4, 16)));
        assert_eq!(found(&lines, "3"), Some((12, 8)));
    }

    #[test]
    fn good_readings_are_drawn_nearer_and_all_numbers_can_be_told_apart() {
        let many: Vec<Plotted> = (1..=20)
            .map(|number| {
                let turn = number as f64 * 2.399_963;
                let far = 0.25 * (number as f64).sqrt();
                reading(number, far * turn.cos(), far * turn.sin())
            })
            .collect();
        let lines = drawn(&many);
        assert_eq!(ResidualPlot::new(&many).rings().count(), 1);
        let mut numbers: Vec<usize> = lines
            .iter()
            .flat_map(|line| line.split(|c: char| !c.is_ascii_digit()))
            .filter_map(|number| number.parse().ok())
            .collect();
        numbers.sort_unstable();
        assert_eq!(numbers, (1..=20).collect::<Vec<usize>>(), "{lines:#?}");
    }

    #[test]
    fn one_far_off_stands_at_the_edge_in_brackets() {
        let lines = drawn(&[reading(1, 0.5, 0.5), reading(12, -30.0, 0.0)]);
        assert_eq!(found(&lines, "(12)"), Some((8, 0)), "{lines:#?}");
        assert_eq!(
            ResidualPlot::new(&[reading(12, -30.0, 0.0)])
                .rings()
                .count(),
            2
        );
    }

    #[test]
    fn it_always_has_its_size() {
        for readings in [
            vec![],
            vec![reading(100, 1e9, -1e9)],
            vec![reading(1, 0.0, 0.0); 400],
        ] {
            let plot = ResidualPlot::new(&readings);
            assert_eq!(plot.rows().len(), ResidualPlot::HEIGHT);
            assert!(
                plot.rows()
                    .iter()
                    .all(|row| row.len() == ResidualPlot::WIDTH)
            );
        }
    }
}
