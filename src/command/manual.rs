//! `nonius manual`: the manual page, in the format of `man`, on standard output.

use std::io::Write;

use clap::CommandFactory as _;
use clap_mangen::Man;

use crate::command::Line;

/// Prints the manual page.
pub fn run(out: &mut dyn Write) -> anyhow::Result<()> {
    let mut page = Vec::new();
    Man::new(Line::command()).render(&mut page)?;
    Ok(out.write_all(&page)?)
}
