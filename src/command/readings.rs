//! A file of readings made into what the estimate is told, with every fault at its cell.

use std::path::Path;

use crate::catalog::Target;
use crate::command::station::Station;
use crate::dial::{Sighting, TubePlace};
use crate::estimate::{Fit, Sight, fit};
use crate::site::list_file::unknown;
use crate::site::{Fault, Faults, Folders, RawReading, ReadingsFile};
use crate::sky::Moment;
use crate::time::Utc;

/// The readings of a file.
#[derive(Clone, Debug)]
pub struct Readings {
    /// One per row of the file, in its order.
    pub rows: Vec<Row>,
}

/// One row: a star, when it was centred, and what it tells the estimate.
#[derive(Clone, Debug)]
pub struct Row {
    /// The star's name.
    pub star: String,
    /// When it was centred.
    pub utc: Utc,
    /// The sky at that moment.
    pub moment: Moment,
    /// The star.
    pub target: Target,
    /// What was read.
    pub sighting: Sighting,
    /// What it tells the estimate.
    pub sight: Sight,
}

/// Reads a file of readings for the station's mount, catalogue and place; every fault of the file at
/// once.
pub fn load(path: &Path, station: &Station) -> Result<Readings, Faults> {
    let ReadingsFile { readings, file } = Folders::readings(path)?;
    let mut faults = Vec::new();
    let rows: Vec<Row> = readings
        .iter()
        .filter_map(|raw| row(raw, station, &mut faults))
        .collect();
    if faults.is_empty() {
        Ok(Readings { rows })
    } else {
        Err(Faults::new(file, faults))
    }
}

fn row(raw: &RawReading, station: &Station, faults: &mut Vec<Fault>) -> Option<Row> {
    let target = station
        .catalogue
        .resolve(&raw.star.text)
        .map_err(|why| faults.push(unknown(raw.star.span.clone(), &why)));
    let read = raw
        .on_mount(&station.mount)
        .map_err(|wrong| faults.extend(wrong));
    let (target, read) = (target.ok()?, read.ok()?);
    let sighting = Sighting {
        side: read.side,
        hour: read.hour,
        dec: read.dec,
        hour_opposite: read.hour_b,
        dec_opposite: read.dec_b,
        timed: raw.timed,
    };
    let moment = Moment::new(&station.site.observer(), raw.utc);
    Some(Row {
        star: target.name.clone(),
        utc: raw.utc,
        sight: sighting.sight(&station.mount, &moment, &target.source),
        moment,
        target,
        sighting,
    })
}

impl Readings {
    /// The errors of the mount as these readings tell them.
    #[must_use]
    pub fn fit(&self, station: &Station) -> Fit {
        let sights: Vec<Sight> = self.rows.iter().map(|row| row.sight.clone()).collect();
        fit(station.site.latitude, &station.prior, &sights)
    }

    /// When the last star was read.
    #[must_use]
    pub fn latest(&self) -> Option<Utc> {
        self.rows.iter().map(|row| row.utc).max()
    }

    /// Where the tube was at the last reading.
    #[must_use]
    pub fn tube(&self, fit: &Fit) -> Option<TubePlace> {
        let (row, residual) = self
            .rows
            .iter()
            .zip(&fit.residuals)
            .max_by_key(|(row, _)| row.utc)?;
        Some(TubePlace {
            axes: residual.as_ref()?.shown,
            utc: row.utc,
            side: row.sight.side,
        })
    }
}
