//! Where to look when an object is not in the field: steps of half a field along right ascension, rows half a field apart in
//! declination, ordered by what is left of the probability.
//!
//! Where the object is, about the place where the tube was set and did not show it, is a bivariate normal distribution less
//! the field already looked into. It is held as points of equal probability. The next step is the one that covers most of
//! what is left for the way the hand has to go there: how far the tube moves is part of the price, so that a sweep goes on
//! from where it is rather than leaping about. Offsets on the sky, positive west and north.

use std::collections::HashMap;
use std::f64::consts::TAU;

use nalgebra::Matrix2;

use crate::angle::Angle;

/// A sweep ends when so much of what could be found has been covered.
const ENOUGH: f64 = 0.95;

/// Nobody sweeps farther than this: rather a star is read.
const MOST_STEPS: usize = 150;

/// The rings of equal probability, and the points on each.
const RINGS: u32 = 50;
const POINTS: u32 = 96;

/// What a way of one step costs beside a look, which costs one (common practice, no source: with slow motions a look takes
/// about as long as half a field).
const WAY: f64 = 0.7;

/// A step of a sweep.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SweepStep {
    /// How far west of the place set at first, on the sky.
    pub west: Angle,
    /// How far north.
    pub north: Angle,
    /// The chance, 0 to 1, that the object has been seen by then, given that the first look missed it.
    pub covered: f64,
}

/// A sweep: its steps in order, without the first look. It covers 95 %, or as much as a hundred and fifty steps can.
///
/// `sky` is the covariance of where the tube looks about the object, in square radians, setting included, west first.
/// Empty where there is nothing to sweep for: no field, or a covariance that is none.
#[must_use]
pub fn sweep(sky: &Matrix2<f64>, field: Angle) -> Vec<SweepStep> {
    let step = field.radians() / 2.0;
    let Some(points) = points(sky).filter(|_| step > 0.0) else {
        return Vec::new();
    };
    let mut field_of_view = Looks::new(&points, step);
    // the first look has been taken, and missed
    field_of_view.look((0, 0));
    let left = points.len() - field_of_view.seen;
    if left == 0 {
        return Vec::new();
    }
    let missed = field_of_view.seen;
    let mut at = (0, 0);
    let mut steps = Vec::new();
    while steps.len() < MOST_STEPS {
        let Some(next) = field_of_view.best_from(at) else {
            break;
        };
        field_of_view.look(next);
        at = next;
        let covered = (field_of_view.seen - missed) as f64 / left as f64;
        steps.push(SweepStep {
            west: Angle::from_radians(f64::from(next.0) * step),
            north: Angle::from_radians(f64::from(next.1) * step),
            covered,
        });
        if covered >= ENOUGH {
            break;
        }
    }
    steps
}

/// A place of the sweep, in steps west and north.
type Cell = (i32, i32);

/// What is still unseen, and what a look at each place would show of it.
struct Looks {
    /// For each point, the places from which it is seen.
    from: Vec<Vec<Cell>>,
    unseen: Vec<bool>,
    seen: usize,
    /// For each place, the points in the field there.
    points: HashMap<Cell, Vec<usize>>,
    /// For each place, how many of them are unseen.
    gains: HashMap<Cell, usize>,
}

impl Looks {
    fn new(points: &[(f64, f64)], step: f64) -> Self {
        let mut looks = Self {
            from: Vec::with_capacity(points.len()),
            unseen: vec![true; points.len()],
            seen: 0,
            points: HashMap::new(),
            gains: HashMap::new(),
        };
        for (number, &(west, north)) in points.iter().enumerate() {
            let cells = cells_that_see(west / step, north / step);
            for &cell in &cells {
                looks.points.entry(cell).or_default().push(number);
                *looks.gains.entry(cell).or_default() += 1;
            }
            looks.from.push(cells);
        }
        looks
    }

    fn look(&mut self, at: Cell) {
        for number in self.points.remove(&at).unwrap_or_default() {
            let Some(unseen) = self.unseen.get_mut(number).filter(|unseen| **unseen) else {
                continue;
            };
            *unseen = false;
            self.seen += 1;
            for cell in self.from.get(number).into_iter().flatten() {
                if let Some(gain) = self.gains.get_mut(cell) {
                    *gain -= 1;
                }
            }
        }
        self.gains.remove(&at);
    }

    /// The place that shows most of what is unseen for the way there.
    fn best_from(&self, at: Cell) -> Option<Cell> {
        let worth = |cell: Cell, gain: usize| {
            let way = f64::from((cell.0 - at.0).abs() + (cell.1 - at.1).abs());
            gain as f64 / (1.0 + WAY * way)
        };
        let best = self
            .gains
            .iter()
            .filter(|(_, gain)| **gain > 0)
            .max_by(|a, b| {
                let order = worth(*a.0, *a.1).total_cmp(&worth(*b.0, *b.1));
                // where two are worth the same, always the same one
                order.then_with(|| a.0.cmp(b.0))
            });
        best.map(|(cell, _)| *cell)
    }
}

/// The places, in steps, from which a point is in the field, whose radius is one step.
fn cells_that_see(west: f64, north: f64) -> Vec<Cell> {
    /// Farther out than this no sweep goes.
    const FARTHEST: f64 = 1e6;
    let mut cells = Vec::with_capacity(4);
    if west.abs() > FARTHEST || north.abs() > FARTHEST {
        return cells;
    }
    #[allow(clippy::cast_possible_truncation)] // within FARTHEST
    let (column, row) = (west.floor() as i32, north.floor() as i32);
    for cell in [-1, 0, 1, 2].map(|more| column + more) {
        for other in [-1, 0, 1, 2].map(|more| row + more) {
            let (off_west, off_north) = (f64::from(cell) - west, f64::from(other) - north);
            if off_west.hypot(off_north) <= 1.0 {
                cells.push((cell, other));
            }
        }
    }
    cells
}

/// Points of equal probability: rings of equal probability, the points on each evenly spread. Nothing for a covariance
/// that is none.
fn points(sky: &Matrix2<f64>) -> Option<Vec<(f64, f64)>> {
    let west = sky.m11.sqrt();
    let both = f64::midpoint(sky.m12, sky.m21) / west;
    let north = (sky.m22 - both * both).max(0.0).sqrt();
    if !(west > 0.0 && west.is_finite() && both.is_finite() && north.is_finite()) {
        return None;
    }
    let mut points = Vec::new();
    for ring in 0..RINGS {
        let within = (f64::from(ring) + 0.5) / f64::from(RINGS);
        let radius = (-2.0 * (1.0 - within).ln()).sqrt();
        for point in 0..POINTS {
            // turned from ring to ring, so that no rays form
            let turn = (f64::from(point) + 0.618 * f64::from(ring)) / f64::from(POINTS);
            let (sin, cos) = (turn * TAU).sin_cos();
            let (a, b) = (radius * cos, radius * sin);
            points.push((west * a, both * a + north * b));
        }
    }
    Some(points)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn sky(west_deg: f64, north_deg: f64, correlation: f64) -> Matrix2<f64> {
        let (west, north) = (west_deg.to_radians(), north_deg.to_radians());
        let both = correlation * west * north;
        Matrix2::new(west * west, both, both, north * north)
    }

    const FIELD: Angle = Angle::from_degrees(1.0);

    /// A stream of normal numbers: a linear congruential generator (D. E. Knuth, *The Art of Computer Programming* 2,
    /// 3.3.4, from memory) through Box and Muller's transform.
    fn normals(count: usize) -> Vec<(f64, f64)> {
        let mut state = 1_u64;
        let mut uniform = || {
            state = state
                .wrapping_mul(6_364_136_223_846_793_005)
                .wrapping_add(1);
            ((state >> 11) as f64 + 0.5) / (1_u64 << 53) as f64
        };
        (0..count)
            .map(|_| {
                let radius = (-2.0 * uniform().ln()).sqrt();
                let (sin, cos) = (TAU * uniform()).sin_cos();
                (radius * cos, radius * sin)
            })
            .collect()
    }

    #[test]
    fn the_chance_that_it_has_been_covered_is_true() {
        /// Of 20,000 draws, three sigmas are 1.1 points; the points of equal probability have their share.
        const POINTS_OFF: f64 = 0.015;
        for (west, north, correlation) in [(0.5, 0.5, 0.0), (1.2, 0.3, 0.0), (0.8, 0.6, -0.8)] {
            let covariance = sky(west, north, correlation);
            let steps = sweep(&covariance, FIELD);
            let (across, along) = (
                correlation * north,
                north * (1.0 - correlation * correlation).sqrt(),
            );
            let mut missed = 0_u32;
            let mut found_by = vec![0_u32; steps.len()];
            for (a, b) in normals(20_000) {
                let (w, n) = (west * a, across * a + along * b);
                let sees = |at_west: f64, at_north: f64| (w - at_west).hypot(n - at_north) <= 0.5;
                if sees(0.0, 0.0) {
                    continue;
                }
                missed += 1;
                let found = steps
                    .iter()
                    .position(|step| sees(step.west.degrees(), step.north.degrees()));
                if let Some(found) = found {
                    found_by[found] += 1;
                }
            }
            let mut covered = 0;
            for (step, found) in steps.iter().zip(&found_by) {
                covered += found;
                let share = f64::from(covered) / f64::from(missed);
                assert!(
                    (share - step.covered).abs() < POINTS_OFF,
                    "{share} {step:?}"
                );
            }
            assert!(
                steps.last().unwrap().covered >= ENOUGH,
                "{} steps",
                steps.len()
            );
        }
    }

    #[test]
    fn the_hand_goes_on_from_where_it_is() {
        let steps = sweep(&sky(0.6, 0.4, 0.0), FIELD);
        let mut at = (0.0, 0.0);
        let mut way = 0.0;
        for step in &steps {
            let there = (step.west.degrees(), step.north.degrees());
            way += (there.0 - at.0).abs() + (there.1 - at.1).abs();
            at = there;
        }
        // half a field a step is the least; leaping from one side to the other would be several fields
        let mean = way / steps.len() as f64;
        assert!(mean < 1.3, "{mean}° a step in {} steps", steps.len());
    }

    #[test]
    fn the_first_steps_cover_most() {
        let steps = sweep(&sky(0.6, 0.4, 0.3), FIELD);
        assert!(steps[3].covered > 0.3, "{steps:?}");
        assert!(
            steps
                .windows(2)
                .all(|pair| pair[0].covered < pair[1].covered)
        );
    }

    #[test]
    fn what_cannot_be_swept_for_gives_no_steps() {
        assert!(sweep(&Matrix2::zeros(), FIELD).is_empty());
        assert!(sweep(&sky(1.0, 1.0, 0.0), Angle::ZERO).is_empty());
        assert!(sweep(&Matrix2::repeat(f64::NAN), FIELD).is_empty());
        // certain to be in the first field
        assert!(sweep(&sky(0.01, 0.01, 0.0), FIELD).is_empty());
        // more uncertain than anyone can sweep: an honest share, and an end
        let steps = sweep(&sky(20.0, 20.0, 0.0), FIELD);
        assert_eq!(steps.len(), MOST_STEPS);
        assert!(steps.last().unwrap().covered < 0.5);
    }
}
