//! The commands, one file each, and the words of the command line.

use std::io::{self, Write};
use std::process::ExitCode;

use clap::{Parser, Subcommand};

pub mod calibrate;
mod catalogues;
pub mod check;
mod columns;
pub mod completions;
mod demonstration;
pub mod dial;
pub mod exit;
pub mod find;
mod interrupt;
pub mod log;
pub mod manual;
pub mod new;
pub mod options;
pub mod plan;
mod readings;
mod screen;
mod station;
mod up;

use options::Common;

use crate::site::Folders;

/// The setting-circle dial-in assistant for manual equatorial mounts.
///
/// Without a command it opens the screen.
#[derive(Debug, Parser)]
#[command(name = "nonius", version, about, propagate_version = true)]
pub struct Line {
    /// The options every command shares.
    #[command(flatten)]
    pub common: Common,
    /// What to do.
    #[command(subcommand)]
    pub command: Option<Command>,
}

/// What to do.
#[derive(Debug, Subcommand)]
pub enum Command {
    /// What to set on the circles for one or more targets.
    Dial(dial::DialArgs),
    /// Fit the mount's errors from a file of readings.
    Calibrate(calibrate::CalibrateArgs),
    /// The list for the night: windows, order, swing.
    Plan(plan::PlanArgs),
    /// Search the catalogues.
    Find(find::FindArgs),
    /// Report every fault of site, mount, list and readings files.
    Check(check::CheckArgs),
    /// Write a commented starting file into your folder.
    New(new::NewArgs),
    /// A night's record as a table.
    Log(log::LogArgs),
    /// Print the completions for a shell.
    Completions(completions::CompletionsArgs),
    /// Print the manual page.
    Manual,
}

/// Parses the command line, does the work, says what went wrong.
#[must_use]
pub fn main() -> ExitCode {
    let line = Line::parse();
    let color = line.common.color.for_messages();
    let mut out = io::BufWriter::new(io::stdout().lock());
    let done = run(&line, &mut out).and_then(|()| Ok(out.flush()?));
    match done {
        Ok(()) => ExitCode::SUCCESS,
        Err(error) => exit::report(&error, color),
    }
}

fn run(line: &Line, out: &mut dyn Write) -> anyhow::Result<()> {
    let common = &line.common;
    match &line.command {
        Some(Command::Dial(args)) => dial::run(args, common, out),
        Some(Command::Calibrate(args)) => calibrate::run(args, common, out),
        Some(Command::Plan(args)) => plan::run(args, common, out),
        Some(Command::Find(args)) => find::run(args, common, out),
        Some(Command::Check(args)) => check::run(args, common, out),
        Some(Command::New(args)) => new::run(args, out),
        Some(Command::Log(args)) => {
            let folders = Folders::of_the_user()?;
            let options = log::LogOptions {
                folder: folders.nights(),
                site: common.site.as_deref(),
                journal: common.night.as_deref(),
                json: common.json,
            };
            log::run(args, options, out)
        }
        Some(Command::Completions(args)) => completions::run(args, out),
        Some(Command::Manual) => manual::run(out),
        None => screen::run(common),
    }
}
