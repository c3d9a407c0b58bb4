//! The suspicious readings of a file, for people and for programs.

use std::io::Write;

use serde::Serialize;

use crate::command::readings::Readings;
use crate::command::station::Station;
use crate::dial::doubt::{Kind, Suspected, suspicions};
use crate::dial::{Circumstances, Questioned, Suspicion};

/// Stars no fainter than this may have been taken for the one meant (common practice, no source).
const FAINTEST_TAKEN_FOR_ANOTHER_HP: f64 = 3.5;

/// So many readings by one clock speak for that clock.
const CLOCK_AGREED_READINGS: usize = 3;

/// Rarer than once in so many is not worth a figure.
const HARDLY_EVER: f64 = 1e9;

/// A suspicious row, as JSON has it.
#[derive(Debug, Serialize)]
pub struct SuspicionRow {
    /// Counted from 1.
    row: usize,
    improbability: f64,
    explanations: Vec<ExplanationRow>,
}

#[derive(Debug, Serialize)]
struct ExplanationRow {
    text: String,
    kind: Kind,
    share: f64,
}

impl SuspicionRow {
    /// The suspected readings of a file.
    pub fn all(suspected: &[Suspected]) -> Vec<Self> {
        let row = |one: &Suspected| Self {
            row: one.row + 1,
            improbability: one.suspicion.improbability,
            explanations: one
                .suspicion
                .explanations
                .iter()
                .map(|explanation| ExplanationRow {
                    text: explanation.text.clone(),
                    kind: explanation.kind,
                    share: explanation.share,
                })
                .collect(),
        };
        suspected.iter().map(row).collect()
    }
}

/// A suspicious reading in a line, with its likeliest explanation.
pub fn in_a_line(readings: &Readings, suspected: &Suspected) -> String {
    let star = readings.rows.get(suspected.row);
    let star = star.map_or("", |row| row.star.as_str());
    let why = suspected.suspicion.explanations.first();
    let why = why.map_or_else(String::new, |why| format!(": {}?", why.text));
    let row = suspected.row + 1;
    format!("reading {row}, {star}, cannot well be{why} nonius calibrate FILE says more")
}

/// The suspicious readings of a file; rows counted from 0 in the order of the file.
pub fn of(readings: &Readings, station: &Station) -> Vec<Suspected> {
    let stars = station
        .catalogue
        .bright_stars(FAINTEST_TAKEN_FOR_ANOTHER_HP);
    let mut by_time: Vec<usize> = (0..readings.rows.len()).collect();
    by_time.sort_by_key(|&row| readings.rows.get(row).map(|row| row.utc));
    let circumstances = Circumstances {
        clock_agreed: readings.rows.len() > CLOCK_AGREED_READINGS,
        clock_leapt_s: None,
    };
    let rows: Vec<Questioned<'_>> = by_time
        .iter()
        .filter_map(|&row| readings.rows.get(row))
        .map(|row| Questioned {
            mount: &station.mount,
            moment: &row.moment,
            target: &row.target,
            sighting: &row.sighting,
            stars: &stars,
            circumstances,
        })
        .collect();
    let mut suspected = suspicions(&station.prior, &rows);
    for one in &mut suspected {
        one.row = by_time.get(one.row).copied().unwrap_or(one.row);
    }
    suspected.sort_by_key(|one| one.row);
    suspected
}

/// A paragraph for each suspicious row.
pub fn paragraphs(
    readings: &Readings,
    suspected: &[Suspected],
    out: &mut dyn Write,
) -> anyhow::Result<()> {
    for one in suspected {
        let star = readings.rows.get(one.row).map_or("", |row| &row.star);
        writeln!(out)?;
        writeln!(
            out,
            "row {}, {star}, is {}:",
            one.row + 1,
            rarity(&one.suspicion)
        )?;
        let Suspicion {
            explanations,
            sound,
            unexplained,
            ..
        } = &one.suspicion;
        for explanation in explanations {
            writeln!(
                out,
                "  {}  {}",
                percent(explanation.share),
                explanation.text
            )?;
        }
        for (share, text) in [
            (*unexplained, "none of these"),
            (*sound, "sound all the same"),
        ] {
            if share >= LEAST_SHARE {
                writeln!(out, "  {}  {text}", percent(share))?;
            }
        }
    }
    if !suspected.is_empty() {
        writeln!(out)?;
        writeln!(
            out,
            "nothing was changed: put right in the file what you know to be wrong, or take the row out"
        )?;
    }
    Ok(())
}

/// A share below half a percent is not worth a line.
const LEAST_SHARE: f64 = 0.005;

fn percent(share: f64) -> String {
    format!("{:>3.0} %", share * 100.0)
}

/// How rarely a sound reading is as far off.
fn rarity(suspicion: &Suspicion) -> String {
    let once_in = 1.0 / suspicion.improbability;
    if once_in < HARDLY_EVER {
        format!("further off than one sound reading in {once_in:.0}")
    } else {
        "further off than any sound reading would be".to_owned()
    }
}
