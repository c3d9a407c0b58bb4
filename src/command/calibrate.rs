//! `nonius calibrate READINGS.csv`: fit the mount's errors from a file of readings.

use std::io::Write;
use std::path::PathBuf;

use clap::Args;
use serde::Serialize;

use crate::angle::Angle;
use crate::command::options::Common;
use crate::command::readings::{self, Readings};
use crate::command::station::Station;
use crate::estimate::{Fit, Residual};
use crate::metal::errors::NAMES;
use crate::sexagesimal::{Notation, Unit};

/// Which file.
#[derive(Args, Debug)]
pub struct CalibrateArgs {
    /// The file of readings: CSV with the header `utc,star,hour,dec,side`.
    #[arg(value_name = "READINGS.csv")]
    pub file: PathBuf,
}

/// Fits and prints.
pub fn run(args: &CalibrateArgs, common: &Common, out: &mut dyn Write) -> anyhow::Result<()> {
    let station = Station::open(common)?;
    let readings = readings::load(&args.file, &station)?;
    let fit = readings.fit(&station);
    if common.json {
        serde_json::to_writer(&mut *out, &Report::new(&station, &readings, &fit))?;
        return Ok(writeln!(out)?);
    }
    table(&station, &readings, &fit, out)
}

#[derive(Debug, Serialize)]
struct Report<'a> {
    format: &'static str,
    site: &'a str,
    mount: &'a str,
    readings_used: usize,
    errors: Vec<ErrorTerm>,
    covariance_arcmin2: Vec<Vec<f64>>,
    residuals: Vec<ResidualRow<'a>>,
    spread_arcmin: f64,
    suspicions: [(); 0],
    next_star: Option<()>,
}

#[derive(Debug, Serialize)]
struct ErrorTerm {
    name: &'static str,
    value_arcmin: f64,
    sigma_arcmin: f64,
}

#[derive(Debug, Serialize)]
struct ResidualRow<'a> {
    row: usize,
    star: &'a str,
    /// Null with `dec_arcmin` where the reading could not be used.
    hour_arcmin: Option<f64>,
    dec_arcmin: Option<f64>,
    weight: f64,
}

impl<'a> Report<'a> {
    fn new(station: &'a Station, readings: &'a Readings, fit: &Fit) -> Self {
        let minutes = |radians: f64| Angle::from_radians(radians).arcminutes();
        let residuals =
            readings
                .rows
                .iter()
                .zip(&fit.residuals)
                .enumerate()
                .map(|(index, (row, residual))| ResidualRow {
                    row: index + 1,
                    star: &row.star,
                    hour_arcmin: residual.as_ref().map(|off| off.hour.arcminutes()),
                    dec_arcmin: residual.as_ref().map(|off| off.dec.arcminutes()),
                    weight: residual.as_ref().map_or(0.0, Residual::weight),
                });
        Self {
            format: "nonius.calibration/1",
            site: &station.site.id,
            mount: &station.mount_id,
            readings_used: fit.sights_used(),
            errors: terms(station, fit)
                .into_iter()
                .map(|(name, value, sigma)| ErrorTerm {
                    name,
                    value_arcmin: value.arcminutes(),
                    sigma_arcmin: sigma.arcminutes(),
                })
                .collect(),
            covariance_arcmin2: in_question(station, fit.covariance.row_iter())
                .map(|row| {
                    in_question(station, row.iter())
                        .map(|&square| minutes(minutes(square)))
                        .collect()
                })
                .collect(),
            residuals: residuals.collect(),
            spread_arcmin: fit.spread.arcminutes(),
            suspicions: [],
            next_star: None,
        }
    }
}

/// Of something there is for each error, what there is for those in question on this mount.
fn in_question<T>(station: &Station, of_all: impl Iterator<Item = T>) -> impl Iterator<Item = T> {
    of_all
        .zip(station.mount.expected.in_question())
        .filter_map(|(one, in_question)| in_question.then_some(one))
}

/// Each error in question with its value and its spread.
fn terms(station: &Station, fit: &Fit) -> Vec<(&'static str, Angle, Angle)> {
    let sigmas = fit
        .covariance
        .diagonal()
        .map(|variance| Angle::from_radians(variance.max(0.0).sqrt()));
    let all = NAMES
        .into_iter()
        .zip(fit.errors.to_array())
        .zip(sigmas.iter().copied())
        .map(|((name, value), sigma)| (name, value, sigma));
    in_question(station, all).collect()
}

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

fn table(
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
