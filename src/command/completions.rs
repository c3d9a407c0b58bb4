//! `nonius completions SHELL`: completions for a shell, on standard output.

use std::io::Write;

use clap::{Args, CommandFactory as _};
use clap_complete::Shell;

use crate::command::Line;

/// For which shell.
#[derive(Args, Debug)]
pub struct CompletionsArgs {
    /// The shell.
    pub shell: Shell,
}

/// Prints the completions.
pub fn run(args: &CompletionsArgs, out: &mut dyn Write) -> anyhow::Result<()> {
    let mut script = Vec::new();
    clap_complete::generate(args.shell, &mut Line::command(), "nonius", &mut script);
    Ok(out.write_all(&script)?)
}
