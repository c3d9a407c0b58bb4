//! What `calibrate` prints for people: the errors, and what they leave unexplained of each reading.

use std::io::Write;

use crate::angle::Angle;
use crate::command::calibrate::terms;
use crate::command::readings::Readings;
use crate::command::station::Station;
use crate::estimate::Fit;

/// The heading's own width.
const LEAST_NAME_WIDTH: usize = 26;

/// Minutes of arc with their sign, and nothing without one.
fn minutes(off: Angle) -> String {
    let tenths = (off.arcminutes() * 10.0).round();
    if tenths == 0.0 {
        "0.0'".to_owned()
    } else {
        format!("{:+.1}'", tenths / 10.0)
    }
}

/// An error or its spread in degrees and minutes of arc, the degrees left out where there are none.
fn in_minutes(size: Angle) -> String {
    let tenths = (size.abs().arcminutes() * 10.0).round();
    let degrees = (tenths / 600.0).floor();
    let minutes = (tenths - degrees * 600.0) / 10.0;
    if degrees > 0.0 {
        format!("{degrees:.0}° {minutes:04.1}'")
    } else {
        format!("{minutes:.1}'")
    }
}

/// The same with its sign, and nothing without one.
fn signed(size: Angle) -> String {
    let written = in_minutes(size);
    if written == "0.0'" {
        written
    } else if size < Angle::ZERO {
        format!("-{written}")
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
    writeln!(
        out,
        "{} at {}: {} of {} readings used",
        station.mount.name,
        station.site.name,
        fit.sights_used(),
        readings.rows.len()
    )?;
    writeln!(out)?;
    let terms = terms(station, fit);
    let longest = terms.iter().map(|(name, ..)| name.len()).max();
    let width = longest.unwrap_or(0).max(LEAST_NAME_WIDTH);
    writeln!(
        out,
        "{:<width$}{:>14}{:>14}",
        "error (reading minus true)", "value", "1 sigma"
    )?;
    for (name, value, sigma) in terms {
        writeln!(
            out,
            "{name:<width$}{:>14}{:>14}",
            signed(value),
            in_minutes(sigma)
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

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn an_error_is_in_degrees_only_where_it_has_some() {
        for (arcminutes, expected) in [
            (206.9, "+3° 26.9'"),
            (-94.84, "-1° 34.8'"),
            (-59.96, "-1° 00.0'"),
            (13.1, "+13.1'"),
            (-0.04, "0.0'"),
        ] {
            assert_eq!(signed(Angle::from_arcminutes(arcminutes)), expected);
        }
        assert_eq!(in_minutes(Angle::from_degrees(60.0)), "60° 00.0'");
    }
}
