//! The nights in a folder.

use std::fs;
use std::io;
use std::path::{Path, PathBuf};

use serde::Serialize;

use crate::night::journal::{self, EXTENSION};
use crate::night::log::zone;
use crate::night::night::Night;

/// The nights in a folder, in the shape of `log --all --json`.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Nights {
    /// The name and version of the shape.
    pub format: &'static str,
    /// The nights, the earliest first.
    pub nights: Vec<NightSummary>,
}

/// One night in few words.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct NightSummary {
    /// The civil date of its evening.
    pub night: String,
    /// The site, by the name of its file.
    pub site: String,
    /// The mount, by the name of its file.
    pub mount: String,
    /// How many objects were found.
    pub found: usize,
    /// How many were missed.
    pub missed: usize,
    /// How many readings of stars there are.
    pub readings: usize,
    /// Its journal.
    pub file: PathBuf,
}

impl Nights {
    /// The shape's name.
    pub const FORMAT: &'static str = "nonius.nights/1";

    /// The nights whose journals stand in this folder; none if there is no such folder. Files that
    /// are no journals, or cannot be read, are passed over.
    pub fn in_folder(folder: &Path) -> io::Result<Self> {
        let entries = match fs::read_dir(folder) {
            Err(why) if why.kind() == io::ErrorKind::NotFound => Vec::new(),
            entries => entries?.collect::<io::Result<Vec<_>>>()?,
        };
        let mut nights: Vec<_> = entries
            .into_iter()
            .map(|entry| entry.path())
            .filter(|path| path.extension().is_some_and(|found| found == EXTENSION))
            .filter_map(summary)
            .collect();
        nights.sort_by(|a, b| (&a.night, &a.site).cmp(&(&b.night, &b.site)));
        Ok(Self {
            format: Self::FORMAT,
            nights,
        })
    }

    /// The journals of a night and a site, of any where nothing is named.
    pub fn matching(
        &self,
        night: Option<&str>,
        site: Option<&str>,
    ) -> impl Iterator<Item = &NightSummary> {
        self.nights.iter().filter(move |found| {
            night.is_none_or(|night| found.night == night)
                && site.is_none_or(|site| found.site == site)
        })
    }
}

/// The last night before that of `evening` (a civil date) in which a star was read with this mount at
/// this site, with its own date. Journals that cannot be read are passed over.
#[must_use]
pub fn last_before(
    folder: &Path,
    evening: &str,
    (site, mount): (&str, &str),
) -> Option<(String, Night)> {
    let mut names: Vec<(String, PathBuf)> = fs::read_dir(folder)
        .ok()?
        .filter_map(|entry| {
            let path = entry.ok()?.path();
            let (stem, extension) = (path.file_stem()?, path.extension()?);
            let date: String = stem.to_str()?.chars().take(evening.len()).collect();
            (extension == EXTENSION && date.as_str() < evening).then_some((date, path))
        })
        .collect();
    // as journals are named for their night, the last is found without reading them all
    names.sort();
    names.into_iter().rev().find_map(|(date, path)| {
        let night = Night::replay(journal::read(&path).ok()?.events);
        let opening = night.state().opening.as_ref()?;
        let same = opening.site == site && opening.mount == mount;
        (same && night.state().readings_in_use().next().is_some()).then_some((date, night))
    })
}

fn summary(file: PathBuf) -> Option<NightSummary> {
    let night = Night::replay(journal::read(&file).ok()?.events);
    let first = night.history().first()?;
    let state = night.state();
    let opening = state.opening.as_ref();
    let (found, missed) = state.tally();
    Some(NightSummary {
        night: zone(opening).night(first.utc).to_string(),
        site: opening.map_or_else(String::new, |opening| opening.site.clone()),
        mount: opening.map_or_else(String::new, |opening| opening.mount.clone()),
        found,
        missed,
        readings: state.readings.len(),
        file,
    })
}
