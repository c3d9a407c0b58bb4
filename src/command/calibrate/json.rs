//! `calibrate --json`: the form `nonius.calibration/1`, angles in minutes of arc, covariances in their squares.

use serde::Serialize;

use crate::angle::Angle;
use crate::command::calibrate::suspicions::SuspicionRow;
use crate::command::calibrate::{in_question, terms};
use crate::command::readings::Readings;
use crate::command::station::Station;
use crate::dial::doubt::Suspected;
use crate::dial::next_star::NextStar;
use crate::estimate::{Fit, Residual};
use crate::metal::Side;

/// What `calibrate --json` prints.
#[derive(Debug, Serialize)]
pub struct Report<'a> {
    format: &'static str,
    site: &'a str,
    mount: &'a str,
    readings_used: usize,
    errors: Vec<ErrorTerm>,
    covariance_arcmin2: Vec<Vec<f64>>,
    residuals: Vec<ResidualRow<'a>>,
    spread_arcmin: f64,
    suspicions: Vec<SuspicionRow>,
    next_star: Option<NextStarRow<'a>>,
}

#[derive(Debug, Serialize)]
struct NextStarRow<'a> {
    star: &'a str,
    side: Side,
    /// By how much the mean chance of a first look grows, 0 to 1.
    gain: f64,
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
    /// Of a fit to a file of readings.
    pub fn new(
        station: &'a Station,
        readings: &'a Readings,
        fit: &Fit,
        suspected: &[Suspected],
        next: Option<&'a NextStar>,
    ) -> Self {
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
            suspicions: SuspicionRow::all(suspected),
            next_star: next.map(|next| NextStarRow {
                star: &next.placed.star.name,
                side: next.placed.side,
                gain: next.gain(),
            }),
        }
    }
}
