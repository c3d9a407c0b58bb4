//! What `calibrate` prints for people: the errors, and what they leave unexplained of each reading.

use std::io::Write;

use crate::angle::Angle;
use crate::command::calibrate::terms;
use crate::command::readings::Readings;
use crate::command::station::Station;
use crate::estimate::Fit;
use crate::sexagesimal::{Notation, Unit};

/// Minutes of arc with their sign, and nothing without one.
fn minutes(off: Angle) -> String {
    let tenths = (off.arcminutes() * 10.0).round();
    if tenths == 0.0 {
        "0.0'".to_owned()
    } else {
        format!("{:+.1}'", tenths / 10.0)
    }
}

/// With its sign, also where it is positive.
fn signed(notation: Notation, value: Angle) -> String {
    let written = notation.write(value);
    if written.starts_with('-') {
        written
    } else {
        format!("+{written}")
    }
}

/// Writes the errors with their spreads, then what is left of each reading.
pub fn write(
    station: &Station,
    readings: &Readings,
    fit: &Fit,
    out: &mut dyn Write,
) -> anyhow::Result<()> {
    let notation = Notation::new(Unit::Degrees, Angle::from_arcseconds(6.0));
    writeln!(
        out,
        "{} at {}: {} of {} readings used",
        station.mount.name,
        station.site.name,
        fit.sights_used(),
        readings.rows.len()
    )?;
    writeln!(out)?;
    writeln!(
        out,
        "{:<26}{:>14}{:>14}",
        "error (reading minus true)", "value", "1 sigma"
    )?;
    for (name, value, sigma) in terms(station, fit) {
        writeln!(
            out,
            "{name:<26}{:>14}{:>14}",
            signed(notation, value),
            notation.write(sigma)
        )?;
    }
    writeln!(out)?;
    writeln!(
        out,
        "{:>3}  {:<22}{:>10}{:>10}{:>9}",
        "row", "star", "hour off", "dec off", "weight"
    )?;
    for (index, (row, residual)) in readings.rows.iter().zip(&fit.residuals).enumerate() {
        match residual {
            Some(off) => writeln!(
                out,
                "{:>3}  {:<22}{:>10}{:>10}{:>9.2}",
                index + 1,
                row.star,
                minutes(off.hour),
                minutes(off.dec),
                off.weight()
            )?,
            None => writeln!(
                out,
                "{:>3}  {:<22}{:>29}",
                index + 1,
                row.star,
                "too near the pole to be used"
            )?,
        }
    }
    writeln!(out)?;
    writeln!(
        out,
        "spread of the residuals {:.1}'",
        fit.spread.arcminutes()
    )?;
    if !fit.converged {
        writeln!(out, "the fit did not settle: do not rely on these figures")?;
    }
    Ok(())
}
