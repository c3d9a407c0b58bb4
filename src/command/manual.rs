//! `nonius manual`: the manual page, in the format of `man`, on standard output.
//!
//! The options come from the command line's own description, the keys from the screen's own table;
//! what neither says stands here.

use std::io::{self, IsTerminal as _, Write};

use clap::CommandFactory as _;
use clap_mangen::Man;
use clap_mangen::roff::{Roff, bold, roman};

use crate::command::Line;
use crate::screen::keys::{self, Mode};

/// What the page says beside options and keys: a heading, and its paragraphs.
const SECTIONS: &[(&str, &[&str])] = &[
    (
        "FILES",
        &[
            "Your own files, which win over built-in ones of the same name, are in $XDG_CONFIG_HOME/nonius \
             (~/.config/nonius): sites/*.toml, mounts/*.toml, lists/*.txt or *.csv, catalogs/*.csv. The nights' \
             journals are in $XDG_STATE_HOME/nonius/nights (~/.local/state/nonius/nights). Elsewhere than on \
             Linux they are in the platform's own folders.",
            "nonius new writes a commented starting file; nonius check says all that is wrong with a file.",
        ],
    ),
    (
        "LIGHT",
        &[
            "The screen opens in one deep red on black. A terminal cannot dim the light behind the screen: turn the \
           backlight down, or lay a red filter over it. NO_COLOR in the environment leaves bold and plain text.",
        ],
    ),
    (
        "SAFETY",
        &[
            "Never look at the Sun, or near it, through a telescope or its finder: it blinds at once. While the Sun is \
             up, nothing within 20 degrees of it is dialled unless the observer answers for it. Only a filter over the \
             full aperture makes it safe.",
            "Heavy mounts strike and pinch; people move in the dark. The program only advises: the rules of the house, \
             local codes, the person in charge and qualified practice come first.",
        ],
    ),
    (
        "EXIT STATUS",
        &["0 done; 1 the work failed; 2 the request or a file is wrong; 130 after an interrupt."],
    ),
];

/// Prints the manual page.
pub fn run(out: &mut dyn Write) -> anyhow::Result<()> {
    let mut page = Vec::new();
    let mut command = Line::command();
    command.build();
    let man = Man::new(command.clone());
    man.render_title(&mut page)?;
    man.render_name_section(&mut page)?;
    man.render_synopsis_section(&mut page)?;
    man.render_description_section(&mut page)?;
    man.render_options_section(&mut page)?;
    man.render_subcommands_section(&mut page)?;
    for subcommand in command
        .get_subcommands()
        .filter(|subcommand| subcommand.get_name() != "help")
    {
        of_command(subcommand, &mut page)?;
    }
    keys_of_the_screen().to_writer(&mut page)?;
    for (heading, paragraphs) in SECTIONS {
        let mut roff = Roff::new();
        roff.control("SH", [*heading]);
        for paragraph in *paragraphs {
            roff.control("PP", []).text([roman(*paragraph)]);
        }
        roff.to_writer(&mut page)?;
    }
    out.write_all(&page)?;
    if io::stdout().is_terminal() {
        // at a terminal the page is of no use as it is
        let hint = "this is the page as man reads it: nonius manual | man -l -";
        let _ = writeln!(io::stderr(), "{hint}");
    }
    Ok(())
}

/// A command with the options of its own; those that every command shares are said once.
fn of_command(command: &clap::Command, page: &mut Vec<u8>) -> io::Result<()> {
    let mut roff = Roff::new();
    let heading = format!("NONIUS {}", command.get_name().to_uppercase());
    roff.control("SH", [heading.as_str()]);
    if let Some(about) = command.get_about() {
        roff.control("PP", []).text([roman(about.to_string())]);
    }
    for argument in command
        .get_arguments()
        .filter(|argument| !argument.is_global_set())
    {
        let help = argument.get_long_help().or_else(|| argument.get_help());
        if argument.get_id() == "help" || argument.get_id() == "version" {
            continue;
        }
        roff.control("TP", []).text([bold(argument.to_string())]);
        roff.text([roman(help.map(ToString::to_string).unwrap_or_default())]);
    }
    roff.to_writer(page)
}

fn keys_of_the_screen() -> Roff {
    let mut roff = Roff::new();
    roff.control("SH", ["KEYS OF THE SCREEN"]);
    for key in keys::held(Mode::Stepping) {
        roff.control("TP", []).text([bold(key.name)]);
        roff.text([roman(key.sentence)]);
    }
    roff
}
