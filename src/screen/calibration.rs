//! What is known of the mount, and from what: the errors with their spread, the stars with what each
//! leaves unexplained, and what would help most.
//!
//! ```text
//!  | errors, 1 sigma      | stars, or the picture of what is left |
//!  | ...                  | ...                                   |
//!  | what follows from it: next star, axis, what is entangled     |
//! ```

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::angle::Angle;
use crate::dial::residual_plot::{Cell, Plotted, ResidualPlot};
use crate::estimate::{Entangled, PolarAxis};
use crate::metal::errors::NAMES;
use crate::night::{Known, NightReading, State};
use crate::screen::layout;
use crate::screen::light::Strength;
use crate::screen::look::{Look, wrapped};
use crate::screen::shown::{From, Shown};

/// The columns of the errors: name, value, spread; fewer where the screen is narrow.
const ERRORS_WIDTH: u16 = 36;
const NARROW_ERRORS_WIDTH: u16 = 28;

/// A body narrower than this has no room for the long names.
const NARROW: u16 = 70;

/// Draws the calibration view.
pub fn draw(look: Look, buffer: &mut Buffer, body: Rect, from: &From<'_>, shown: &Shown) {
    let state = from.night.state();
    let narrow = body.width < NARROW;
    let errors = error_lines(from.known, narrow);
    #[allow(clippy::cast_possible_truncation)] // a few lines
    let upper = layout::rows_of(body, 0, errors.len() as u16 + 1);
    let left = Rect {
        width: if narrow {
            NARROW_ERRORS_WIDTH
        } else {
            ERRORS_WIDTH
        },
        ..upper
    };
    lines(look, buffer, left, &errors, None);
    let right = Rect {
        x: left.right() + 1,
        width: upper.width.saturating_sub(left.width + 1),
        ..upper
    };
    if from.panel.picture {
        draw_picture(look, buffer, right, from.known);
    } else {
        draw_stars(look, buffer, right, from, state);
    }
    let lower = layout::rows_of(body, upper.height, body.height);
    let words = consequences(from, shown);
    let mut rows = lower.rows();
    for text in &words {
        for (place, line) in wrapped(text, usize::from(lower.width).saturating_sub(2))
            .iter()
            .enumerate()
        {
            let Some(row) = rows.next() else { return };
            let mark = if place == 0 { "·" } else { " " };
            look.left(buffer, row, &format!("{mark} {line}"), Strength::Plain);
        }
    }
}

fn error_lines(known: &Known, narrow: bool) -> Vec<String> {
    let width = if narrow { 10 } else { 18 };
    let heading = format!("{:<width$}{:>10}{:>8}", "error", "value", "1 sigma");
    let variances = known.estimate.covariance().diagonal();
    let errors = known.estimate.errors().to_array();
    let terms = NAMES.iter().zip(errors).zip(variances.iter().copied());
    let line = |((name, value), variance): ((&&str, Angle), f64)| {
        let sigma = Angle::from_radians(variance.max(0.0).sqrt());
        let name = shortened(name, narrow);
        // an error that is held at nothing is no news
        (sigma > Angle::ZERO)
            .then(|| format!("{name:<width$}{:>10}{:>8}", signed(value), spread(sigma)))
    };
    std::iter::once(heading)
        .chain(terms.filter_map(line))
        .collect()
}

/// The name in the room there is.
fn shortened(name: &str, narrow: bool) -> String {
    let short = name
        .replace("hour-circle", "hour")
        .replace("declination-circle", "declination")
        .replace("declination eccentricity", "dec eccentricity")
        .replace("eccentricity, sine", "eccentr. sin")
        .replace("eccentricity, cosine", "eccentr. cos");
    if narrow {
        short
            .replace("declination", "dec")
            .replace("polar ", "")
            .replace("eccentr.", "e")
    } else {
        short
    }
}

/// An error with its sign, in minutes of arc or degrees.
fn signed(value: Angle) -> String {
    if value.abs().degrees() < 10.0 {
        tenths(value)
    } else {
        format!("{:+.2}°", value.degrees())
    }
}

/// Minutes of arc to a tenth, with a sign; nothing has none.
fn tenths(angle: Angle) -> String {
    let tenths = (angle.arcminutes() * 10.0).round() / 10.0;
    if tenths == 0.0 {
        "0.0'".to_owned()
    } else {
        format!("{tenths:+.1}'")
    }
}

fn spread(sigma: Angle) -> String {
    if sigma.degrees() < 2.0 {
        format!("{:.1}'", sigma.arcminutes())
    } else if sigma.degrees() < 30.0 {
        format!("{:.1}°", sigma.degrees())
    } else {
        "free".to_owned()
    }
}

fn draw_stars(look: Look, buffer: &mut Buffer, area: Rect, from: &From<'_>, state: &State) {
    let heading = format!("{:<14}{:>8}{:>8}", "star", "hour", "dec");
    let stars = star_lines(from.known, state);
    if stars.is_empty() {
        let words = ["no star read yet".to_owned(), "press s".to_owned()];
        lines(look, buffer, area, &words, None);
        return;
    }
    let room = usize::from(area.height).saturating_sub(1);
    let chosen = from.panel.chosen.min(stars.len() - 1);
    let first = (chosen + 1).saturating_sub(room);
    let shown: Vec<String> = std::iter::once(format!("  {heading}"))
        .chain(stars.into_iter().skip(first).take(room))
        .collect();
    lines(look, buffer, area, &shown, Some(chosen - first + 1));
}

/// What is left of the stars in use, in sigmas of their readings, in the order read.
fn draw_picture(look: Look, buffer: &mut Buffer, area: Rect, known: &Known) {
    let readings = known.sights.iter().zip(&known.fit.residuals).zip(1..);
    let plotted: Vec<Plotted> = readings
        .filter_map(|((sight, residual), number)| Plotted::new(number, sight, residual.as_ref()))
        .collect();
    let plot = ResidualPlot::new(&plotted);
    let rows = plot.rows();
    // where there is less room than the picture needs, its middle is kept
    let skipped = rows.len().saturating_sub(usize::from(area.height)) / 2;
    for (cells, row) in rows.iter().skip(skipped).zip(area.rows()) {
        for (cell, x) in cells.iter().zip(row.x..row.right()) {
            let strength = match cell {
                Cell::Ring | Cell::Blank => Strength::Faint,
                Cell::Middle | Cell::Reading(_) => Strength::Plain,
                Cell::Stray(_) => Strength::Strong,
            };
            let text = cell.character().to_string();
            look.left(buffer, Rect { x, width: 1, ..row }, &text, strength);
        }
    }
}

/// A line for every reading of the night: what it leaves unexplained, or why it is not used.
fn star_lines(known: &Known, state: &State) -> Vec<String> {
    let in_use: Vec<&NightReading> = state.readings_in_use().collect();
    // the sights read before the night, from a file, come first
    let before = known.sights.len().saturating_sub(in_use.len());
    let line = |read: &NightReading| {
        let name: String = read.reading.star.chars().take(13).collect();
        let place = in_use.iter().position(|used| used.line == read.line);
        let residual = place.and_then(|place| known.fit.residuals.get(before + place));
        let after = match residual {
            Some(Some(left)) => {
                let let_go = left.weight() < LET_GO;
                let mark = if let_go { " not trusted" } else { "" };
                format!("{:>8}{:>8}{mark}", tenths(left.hour), tenths(left.dec))
            }
            Some(None) => "  too near the pole".to_owned(),
            None if read.reading.used => "  before a zero was set".to_owned(),
            None => "  set aside".to_owned(),
        };
        format!("{name:<14}{after}")
    };
    state.readings.iter().map(line).collect()
}

/// Trusted less than this, a reading is hardly used at all.
const LET_GO: f64 = 0.5;

fn consequences(from: &From<'_>, shown: &Shown) -> Vec<String> {
    let mut said = Vec::new();
    if let Some(insight) = &shown.insight {
        said.push(insight.next_in_words());
        said.extend(insight.timing_in_words());
    }
    let mount = &from.observatory.mount;
    let two_sides = mount.kind.has_two_sides();
    let covariance = from.known.estimate.covariance();
    let entangled = Entangled::all(covariance, &from.known.sights, two_sides);
    said.extend(entangled.iter().map(Entangled::in_words));
    let expected = (mount.expected.polar_high, mount.expected.polar_east);
    let latitude = from.observatory.observer.latitude;
    let axis = PolarAxis::of(&from.known.estimate, latitude, expected);
    said.extend(earlier_night(from));
    said.extend(axis.map(|axis| axis.in_words()).unwrap_or_default());
    said
}

fn earlier_night(from: &From<'_>) -> Option<String> {
    let started = from.night.state().started_from.as_ref();
    let earlier = from.observatory.earlier_night.as_ref();
    Some(match (started, earlier) {
        (Some(started), _) => format!(
            "started from {}, {} stars, {} (e to change)",
            started.earlier.night,
            started.earlier.stars,
            started.words()
        ),
        (None, Some(earlier)) => format!(
            "{} taught this mount from {} stars: e starts from there",
            earlier.night, earlier.stars
        ),
        (None, None) => return None,
    })
}

fn lines(look: Look, buffer: &mut Buffer, area: Rect, lines: &[String], chosen: Option<usize>) {
    for ((place, line), row) in lines.iter().enumerate().zip(area.rows()) {
        match chosen {
            Some(chosen) if place > 0 => {
                let (mark, strength) = if place == chosen {
                    (">", Strength::Strong)
                } else {
                    (" ", Strength::Plain)
                };
                look.left(buffer, row, &format!("{mark} {line}"), strength);
            }
            _ => look.left(buffer, row, line, Strength::Plain),
        }
    }
}
