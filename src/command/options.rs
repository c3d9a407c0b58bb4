//! The options every command shares.

use std::io::IsTerminal as _;
use std::path::PathBuf;

use clap::{Args, ValueEnum};

use crate::metal::SideRequest;
use crate::sexagesimal::{self, Unit};
use crate::time::Utc;

/// The options every command shares.
#[derive(Args, Clone, Debug, Default)]
pub struct Common {
    /// The site: a name from your folder or built in, or a file.
    #[arg(long, global = true, value_name = "NAME|FILE")]
    pub site: Option<String>,
    /// The mount: a name or a file; otherwise the one the site names.
    #[arg(long, global = true, value_name = "NAME|FILE")]
    pub mount: Option<String>,
    /// The list of targets: a name or a file; otherwise the one named like the site.
    #[arg(long, global = true, value_name = "NAME|FILE")]
    pub list: Option<String>,
    /// The instant (RFC 3339), instead of the machine's clock; the screen starts there and runs on.
    #[arg(long, global = true, value_name = "TIME", value_parser = Utc::parse)]
    pub at: Option<Utc>,
    /// The side of the pier: tube-west, tube-east, or auto; a fork or yoke has the one side, single.
    #[arg(long, global = true, value_name = "SIDE", default_value = "auto")]
    pub side: SideRequest,
    /// Calibrate from this file of readings first.
    #[arg(long, global = true, value_name = "FILE")]
    pub readings: Option<PathBuf>,
    /// The journal to use, instead of tonight's in your state folder.
    #[arg(long, global = true, value_name = "FILE")]
    pub night: Option<PathBuf>,
    /// Settings for that much later, for the time the hand needs.
    #[arg(long, global = true, value_name = "DURATION", value_parser = seconds)]
    pub lead: Option<f64>,
    /// Dial what lies near the Sun while it is up. Only with a filter over the full aperture, and
    /// by the rules of the house: sunlight in a telescope blinds at once.
    #[arg(long, global = true)]
    pub accept_sun_risk: bool,
    /// For programs: one JSON value on standard output.
    #[arg(long, global = true)]
    pub json: bool,
    /// Colour in messages; `NO_COLOR` in the environment switches it off.
    #[arg(long, global = true, value_name = "WHEN", default_value = "auto")]
    pub color: ColorOption,
}

/// When messages are coloured.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, ValueEnum)]
pub enum ColorOption {
    /// On a terminal, unless `NO_COLOR` is set.
    #[default]
    Auto,
    /// Always.
    Always,
    /// Never.
    Never,
}

impl ColorOption {
    /// Whether to colour what goes to standard error.
    #[must_use]
    pub fn for_messages(self) -> bool {
        match self {
            Self::Always => true,
            Self::Never => false,
            Self::Auto => {
                std::env::var_os("NO_COLOR").is_none_or(|value| value.is_empty())
                    && std::io::stderr().is_terminal()
            }
        }
    }
}

/// A duration with its unit, as in `20s`, `1m 30s`, `2h`, in seconds.
pub fn seconds(text: &str) -> Result<f64, String> {
    const HINT: &str = "write a duration with its unit, as in 20s or 1m 30s";
    let written =
        sexagesimal::read(text, Unit::Hours).map_err(|fault| format!("{fault}; {HINT}"))?;
    if !written.unit_was_named || written.unit != Unit::Hours || written.half.is_some() {
        return Err(HINT.to_owned());
    }
    if written.negative == Some(true) {
        return Err(format!("a duration is not negative; {HINT}"));
    }
    Ok(written.size.time_seconds())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_duration_needs_its_unit() {
        assert_eq!(seconds("20s").map(f64::round), Ok(20.0));
        assert_eq!(seconds("1m 30s").map(f64::round), Ok(90.0));
        for wrong in ["20", "-20s", "20d", "soon", "5'"] {
            assert!(seconds(wrong).is_err(), "{wrong}");
        }
    }
}
