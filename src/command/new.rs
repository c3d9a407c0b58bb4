//! `nonius new site|mount|list NAME`: a commented starting file in the user's folder.

use std::io::Write;

use clap::{Args, ValueEnum};

use crate::command::exit::Refused;
use crate::site::{Cannot, Folders, Shelf, create};

/// What to write, and its name.
#[derive(Args, Debug)]
pub struct NewArgs {
    /// What kind of file.
    pub what: What,
    /// Its name: letters, digits and dashes.
    #[arg(value_name = "NAME")]
    pub name: String,
}

/// What can be begun.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub enum What {
    /// A place: coordinates, air, horizon, its mount.
    Site,
    /// A mount: circles, limits, expected errors, optics.
    Mount,
    /// A list of targets.
    List,
}

/// Writes the file and says where it is and what to do with it.
pub fn run(args: &NewArgs, out: &mut dyn Write) -> anyhow::Result<()> {
    let shelf = match args.what {
        What::Site => Shelf::Sites,
        What::Mount => Shelf::Mounts,
        What::List => Shelf::Lists,
    };
    let path = create(&Folders::of_the_user()?, shelf, &args.name).map_err(refused)?;
    writeln!(out, "written: {}", path.display())?;
    if args.what == What::Site {
        writeln!(out, "its coordinates are 0°, 0° until you write your own")?;
    }
    Ok(writeln!(
        out,
        "edit it, then see: nonius check {}",
        path.display()
    )?)
}

/// A name that cannot be used is the request's fault, a disk that cannot be written is not.
pub(super) fn refused(cannot: Cannot) -> anyhow::Error {
    match cannot {
        Cannot::Write { .. } => cannot.into(),
        other => Refused {
            message: other.to_string(),
            hint: None,
        }
        .into(),
    }
}
