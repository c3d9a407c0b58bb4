//! What follows from a calibration: what the stars leave entangled, and what to do about the polar axis.

use std::io::Write;

use crate::command::readings::Readings;
use crate::command::station::Station;
use crate::estimate::{Entangled, Estimate, Fit, PolarAxis, Sight};
use crate::screen::look::wrapped;

/// As wide as the pages of a terminal are taken to be.
const WIDTH: usize = 78;

/// Writes it, a paragraph each, and nothing where nothing follows.
pub fn write(
    station: &Station,
    readings: &Readings,
    fit: &Fit,
    out: &mut dyn Write,
) -> anyhow::Result<()> {
    let used: Vec<Sight> = readings
        .rows
        .iter()
        .zip(&fit.residuals)
        .filter(|(_, residual)| residual.is_some())
        .map(|(row, _)| row.sight.clone())
        .collect();
    let two_sides = station.mount.kind.has_two_sides();
    let entangled = Entangled::all(&fit.covariance, &used, two_sides);
    let expected = &station.mount.expected;
    let axis = PolarAxis::of(
        &Estimate::from(fit),
        station.site.latitude,
        (expected.polar_high, expected.polar_east),
    );
    for said in [
        entangled.iter().map(Entangled::in_words).collect(),
        axis.map(|axis| axis.in_words()).unwrap_or_default(),
    ] {
        paragraph(&said, out)?;
    }
    Ok(())
}

/// Each saying on lines of its own.
fn paragraph(said: &[String], out: &mut dyn Write) -> anyhow::Result<()> {
    if !said.is_empty() {
        writeln!(out)?;
    }
    for saying in said {
        for line in wrapped(saying, WIDTH) {
            writeln!(out, "{line}")?;
        }
    }
    Ok(())
}
