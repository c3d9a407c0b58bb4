//! `nonius log [NIGHT]`: a night's record as a table; `nonius log --all`: which nights there are.

use std::io::{self, Write};
use std::path::{Path, PathBuf};

use clap::{Args, ValueEnum};

use crate::command::columns;
use crate::night::{Log, Night, NightSummary, Nights, journal};
use crate::time;

/// Which night, and how.
#[derive(Args, Clone, Debug, Default)]
pub struct LogArgs {
    /// The civil date of the night's evening, or a journal's file; otherwise the last night.
    // not "night": that is the shared option --night, and one identifier serves one argument
    #[arg(id = "which_night", value_name = "NIGHT")]
    pub night: Option<String>,
    /// List the nights there are.
    #[arg(long, conflicts_with = "which_night")]
    pub all: bool,
    /// How to print it.
    #[arg(long, value_name = "FORMAT", default_value = "text")]
    pub format: LogFormat,
}

/// How to print a log.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, ValueEnum)]
pub enum LogFormat {
    /// A table for people.
    #[default]
    Text,
    /// RFC 4180, with a header.
    Csv,
    /// One JSON value.
    Json,
}

/// What the options every command shares say of a log.
#[derive(Clone, Copy, Debug)]
pub struct LogOptions<'a> {
    /// The folder of the journals.
    pub folder: &'a Path,
    /// The site asked for, by the name of its file.
    pub site: Option<&'a str>,
    /// The journal asked for.
    pub journal: Option<&'a Path>,
    /// One JSON value, whatever the format.
    pub json: bool,
}

/// Why there is no log to print: the request names none, or not one.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum NoSuchLog {
    /// No journal there.
    #[error("no night is recorded in {}", folder.display())]
    NoneRecorded {
        /// The folder looked in.
        folder: PathBuf,
    },
    /// None of that night or site.
    #[error("no such night is recorded; nonius log --all lists the nights")]
    NoneSuch,
    /// More than one site has that night.
    #[error("that night is recorded at {}: name one with --site", sites.join(" and at "))]
    Several {
        /// The sites.
        sites: Vec<String>,
    },
}

/// Prints the log.
pub fn run(args: &LogArgs, options: LogOptions<'_>, out: &mut dyn Write) -> anyhow::Result<()> {
    let format = if options.json {
        LogFormat::Json
    } else {
        args.format
    };
    if args.all {
        let nights = Nights::in_folder(options.folder)?;
        return match format {
            LogFormat::Text => nights_as_text(&nights, out),
            LogFormat::Csv => as_csv(&nights.nights, out),
            LogFormat::Json => as_json(&nights, out),
        };
    }
    let contents = journal::read(&file(args, options)?)?;
    for notice in &contents.notices {
        // what is amiss is no part of the table
        let _ = writeln!(io::stderr(), "warning: {notice}");
    }
    let log = Log::of(&Night::replay(contents.events));
    match format {
        LogFormat::Text => log_as_text(&log, out),
        LogFormat::Csv => as_csv(&log.entries, out),
        LogFormat::Json => as_json(&log, out),
    }
}

/// The journal meant.
fn file(args: &LogArgs, options: LogOptions<'_>) -> anyhow::Result<PathBuf> {
    if let (None, Some(journal)) = (&args.night, options.journal) {
        return Ok(journal.to_owned());
    }
    let date = match &args.night {
        Some(text) => match text.parse::<time::Night>() {
            Ok(night) => Some(night.to_string()),
            Err(_) => return Ok(PathBuf::from(text)),
        },
        None => None,
    };
    let nights = Nights::in_folder(options.folder)?;
    if nights.nights.is_empty() {
        let folder = options.folder.to_owned();
        return Err(NoSuchLog::NoneRecorded { folder }.into());
    }
    let asked = |date: Option<&str>| -> Vec<&NightSummary> {
        let found = nights.matching(date, options.site);
        found.collect()
    };
    let found = match date {
        Some(date) => asked(Some(&date)),
        None => match asked(None).last() {
            Some(last) => asked(Some(&last.night)),
            None => Vec::new(),
        },
    };
    match found.as_slice() {
        [] => Err(NoSuchLog::NoneSuch.into()),
        [one] => Ok(one.file.clone()),
        several => {
            let sites = several.iter().map(|night| night.site.clone()).collect();
            Err(NoSuchLog::Several { sites }.into())
        }
    }
}

fn as_json(value: &impl serde::Serialize, out: &mut dyn Write) -> anyhow::Result<()> {
    serde_json::to_writer(&mut *out, value)?;
    Ok(writeln!(out)?)
}

fn as_csv(rows: &[impl serde::Serialize], out: &mut dyn Write) -> anyhow::Result<()> {
    let mut writer = csv::Writer::from_writer(out);
    for row in rows {
        writer.serialize(row)?;
    }
    Ok(writer.flush()?)
}

fn nights_as_text(nights: &Nights, out: &mut dyn Write) -> anyhow::Result<()> {
    let mut table =
        vec![["night", "site", "mount", "found", "missed", "readings"].map(str::to_owned)];
    table.extend(nights.nights.iter().map(|night| {
        [
            night.night.clone(),
            night.site.clone(),
            night.mount.clone(),
            night.found.to_string(),
            night.missed.to_string(),
            night.readings.to_string(),
        ]
    }));
    Ok(columns::print(&table, |_| false, out)?)
}

fn log_as_text(log: &Log, out: &mut dyn Write) -> anyhow::Result<()> {
    writeln!(out, "{}  {}  {}", log.night, log.site, log.mount)?;
    let mut table = vec![
        [
            "civil", "act", "object", "hour", "dec", "side", "off", "note",
        ]
        .map(str::to_owned),
    ];
    table.extend(log.entries.iter().map(|entry| {
        [
            // the date stands at the head
            entry.civil.get(11..19).unwrap_or_default().to_owned(),
            entry.act.clone(),
            entry.target.clone(),
            entry.hour.clone(),
            entry.dec.clone(),
            entry.side.clone(),
            entry
                .off_arcmin
                .map_or_else(String::new, |off| format!("{off:.0}'")),
            entry.note.clone(),
        ]
    }));
    Ok(columns::print(&table, |_| false, out)?)
}
