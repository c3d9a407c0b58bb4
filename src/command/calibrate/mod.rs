//! `nonius calibrate READINGS.csv`: fit the mount's errors from a file of readings.

mod advice;
mod json;
mod next;
mod picture;
pub(super) mod suspicions;
mod table;

use std::io::Write;
use std::path::PathBuf;

use crate::angle::Angle;
use crate::command::exit::Refused;
use crate::command::options::Common;
use crate::command::readings;
use crate::command::station::Station;
use crate::estimate::Fit;
use crate::metal::errors::NAMES;
use crate::night::journal;
use clap::Args;

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
    if journal::read(&args.file).is_ok_and(|night| !night.events.is_empty()) {
        let message = format!(
            "{} is a night's journal, not a file of readings",
            args.file.display()
        );
        let hint = "nonius dial TARGET --night FILE goes by it; the screen shows what it taught by the key c";
        return Err(Refused::new(message, hint).into());
    }
    let readings = readings::load(&args.file, &station)?;
    let fit = readings.fit(&station);
    let suspected = suspicions::of(&readings, &station);
    let next = next::star(&station, common, &readings, &fit)?;
    if common.json {
        let report = json::Report::new(&station, &readings, &fit, &suspected, next.as_ref());
        serde_json::to_writer(&mut *out, &report)?;
        return Ok(writeln!(out)?);
    }
    table::write(&station, &readings, &fit, out)?;
    suspicions::paragraphs(&readings, &suspected, out)?;
    picture::draw(&readings, &fit, out)?;
    if let Some(next) = &next {
        next::write(next, out)?;
    }
    advice::write(&station, &readings, &fit, out)
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
