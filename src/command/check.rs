//! `nonius check [FILE...]`: every fault of site, mount, list and readings files, with its place.

use std::io::{self, Write};
use std::path::PathBuf;

use anyhow::Context as _;
use clap::Args;
use serde::Serialize;

use crate::command::catalogues;
use crate::command::exit::FaultsFound;
use crate::command::options::Common;
use crate::site::{Checked, Checker, Faults, FileKind, Folders, Ink};

/// Which files.
#[derive(Args, Debug)]
pub struct CheckArgs {
    /// The files; otherwise all of yours and the built-in ones. Readings are held against the circles
    /// of the mount named with --mount.
    #[arg(value_name = "FILE")]
    pub files: Vec<PathBuf>,
}

/// Checks and reports; faults are the result asked for, and end with exit status 2.
pub fn run(args: &CheckArgs, common: &Common, out: &mut dyn Write) -> anyhow::Result<()> {
    let folders = Folders::of_the_user()?;
    let mount = common
        .mount
        .as_deref()
        .map(|name| folders.mount(name))
        .transpose()?;
    // what is wrong with the catalogues is said with the rest, if they are checked
    let (catalogue, _) = catalogues::opened(&folders)?;
    let checker = Checker {
        folders: &folders,
        catalogue: &catalogue,
        mount: mount.as_ref().map(|file| &file.mount),
    };
    let checked = if args.files.is_empty() {
        checker.all()?
    } else {
        args.files.iter().map(|path| checker.file(path)).collect()
    };
    if common.json {
        serde_json::to_writer(&mut *out, &Report::new(&checked))?;
        writeln!(out)?;
    } else {
        table(&checked, common, out)?;
    }
    let faults = checked
        .iter()
        .filter_map(|one| one.faults.as_ref())
        .map(|faults| faults.list().len())
        .sum();
    if faults == 0 {
        Ok(())
    } else {
        Err(FaultsFound(faults).into())
    }
}

fn table(checked: &[Checked], common: &Common, out: &mut dyn Write) -> anyhow::Result<()> {
    let ink = if common.color.for_messages() {
        Ink::Coloured
    } else {
        Ink::Plain
    };
    for one in checked {
        let kind = one.kind.map_or("file", FileKind::word);
        match &one.faults {
            None => writeln!(out, "{}: {kind}, no faults", one.name)?,
            Some(faults) => {
                out.flush()?;
                writeln!(io::stderr(), "{}", faults.render(ink).trim_end())
                    .context("writing the faults")?;
            }
        }
    }
    Ok(())
}

#[derive(Debug, Serialize)]
struct Report<'a> {
    format: &'static str,
    files: Vec<FileReport<'a>>,
}

#[derive(Debug, Serialize)]
struct FileReport<'a> {
    file: &'a str,
    kind: Option<&'static str>,
    faults: Vec<FaultReport<'a>>,
}

#[derive(Debug, Serialize)]
struct FaultReport<'a> {
    /// Null with the column where the fault has no place, as with a missing file.
    line: Option<usize>,
    column: Option<usize>,
    message: &'a str,
    hint: Option<&'a str>,
}

impl<'a> Report<'a> {
    fn new(checked: &'a [Checked]) -> Self {
        let files = checked.iter().map(|one| FileReport {
            file: &one.name,
            kind: one.kind.map(FileKind::word),
            faults: one.faults.iter().flat_map(faults).collect(),
        });
        Self {
            format: "nonius.check/1",
            files: files.collect(),
        }
    }
}

fn faults(faults: &Faults) -> impl Iterator<Item = FaultReport<'_>> {
    faults.list().iter().map(|fault| {
        let place = fault
            .span
            .as_ref()
            .map(|span| faults.file().line_and_column(span.start));
        FaultReport {
            line: place.map(|(line, _)| line),
            column: place.map(|(_, column)| column),
            message: &fault.message,
            hint: fault.hint.as_deref(),
        }
    })
}
