//! The picture of what the fit leaves of the readings, for a plain terminal of 60 columns or more.

use std::io::Write;

use crate::command::readings::Readings;
use crate::dial::residual_plot::{Plotted, ResidualPlot};
use crate::estimate::Fit;

/// Fewer readings are told by their lines alone.
const FEWEST: usize = 2;

/// Draws the target under a line that says how to read it.
pub fn draw(readings: &Readings, fit: &Fit, out: &mut dyn Write) -> anyhow::Result<()> {
    let plotted: Vec<Plotted> = readings
        .rows
        .iter()
        .zip(&fit.residuals)
        .enumerate()
        .filter_map(|(index, (row, residual))| {
            Plotted::new(index + 1, &row.sight, residual.as_ref())
        })
        .collect();
    if plotted.len() < FEWEST {
        return Ok(());
    }
    let plot = ResidualPlot::new(&plotted);
    let rings: Vec<String> = plot.rings().map(|ring| format!("{ring:.0}")).collect();
    let plural = if rings.len() > 1 { "rings" } else { "ring" };
    writeln!(out)?;
    writeln!(
        out,
        "what is left of each row, in sigmas of its reading ({plural} at {} sigma)",
        rings.join(" and ")
    )?;
    writeln!(out)?;
    let width = ResidualPlot::WIDTH;
    let above = format!("{:^width$}", "dec: too far north");
    writeln!(out, "  {}", above.trim_end())?;
    let lines: Vec<String> = plot.lines().collect();
    let inked = |line: &String| !line.is_empty();
    let first = lines.iter().position(inked).unwrap_or(0);
    let last = lines.iter().rposition(inked).unwrap_or(0);
    for (row, line) in lines.iter().enumerate().skip(first).take(last + 1 - first) {
        if row == ResidualPlot::HEIGHT / 2 {
            writeln!(out, "  {line:<width$}  hour: too far west")?;
        } else {
            writeln!(out, "{}", format!("  {line}").trim_end())?;
        }
    }
    Ok(())
}
