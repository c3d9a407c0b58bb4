//! `nonius` alone: the screen at the eyepiece.

use std::env;
use std::io::{self, IsTerminal as _, Write as _};
use std::path::PathBuf;

use anyhow::Context as _;

use crate::command::demonstration;
use crate::command::exit::{Refused, Signalled};
use crate::command::options::{ColorOption, Common};
use crate::command::station::Station;
use crate::metal::SideRequest;
use crate::night::{EarlierNight, Known, ListedTarget, Opening, Session, journal, last_before};
use crate::screen::figures::Glyphs;
use crate::screen::light::{Depth, Light};
use crate::screen::observatory::Observatory;
use crate::screen::run::{Ending, Options, run as open};
use crate::time::{Clock, Utc};

/// Opens the screen on tonight's journal, until the observer leaves.
pub fn run(common: &Common) -> anyhow::Result<()> {
    if !(io::stdin().is_terminal() && io::stdout().is_terminal()) {
        let message = "the screen needs a terminal; without one, `nonius dial TARGET --every 10s` says the settings in plain lines";
        return Err(Refused {
            message: message.to_owned(),
            hint: None,
        }
        .into());
    }
    let station = Station::open(common)?;
    let (list, targets) = station.targets()?;
    let (path, clock) = journal_and_clock(&station, common)?;
    let opening = opening(&station, list, targets);
    let (mut session, begun) = Session::begin(&path, clock.now()?, opening)?;
    let earlier_night = earlier_night(&station, clock.now()?);
    let observatory = observatory(station, common, earlier_night);
    let ending = open(
        &observatory,
        &mut session,
        &begun,
        clock,
        options(common.color),
    )?;
    match ending {
        Ending::Left | Ending::TerminalGone => {
            // for the morning; nobody reads it if the terminal has gone
            let _ = writeln!(io::stderr(), "the night is recorded in {}", path.display());
            Ok(())
        }
        Ending::Asked(signal) => Err(Signalled(u8::try_from(signal).unwrap_or_default()).into()),
    }
}

/// Tonight's journal, and the clock: the machine's; or one that starts at the instant asked for, or
/// at the demonstration's evening at a site of the program's own, and then goes on where that night
/// stopped rather than before its last act.
fn journal_and_clock(station: &Station, common: &Common) -> anyhow::Result<(PathBuf, Clock)> {
    let start = match common.at {
        Some(at) => Some(at),
        None if station.built_in => Some(Utc::parse(demonstration::EVENING)?),
        None => None,
    };
    let clock = start.map_or_else(Clock::of_the_machine, Clock::starting_at);
    let night = station.site.zone.night(clock.now()?);
    let tonight = journal::file_name(night, &station.site.id);
    let tonight = station.folders.nights().join(tonight);
    let path = common.night.clone().unwrap_or(tonight);
    if let Some(folder) = path
        .parent()
        .filter(|folder| !folder.as_os_str().is_empty())
    {
        std::fs::create_dir_all(folder)
            .with_context(|| format!("cannot make the folder {}", folder.display()))?;
    }
    let last_act = journal::read(&path)
        .ok()
        .and_then(|contents| contents.events.last().map(|last| last.utc));
    let clock = match (start, last_act) {
        (Some(start), Some(last)) if last > start => Clock::starting_at(last.plus_seconds(1.0)),
        _ => clock,
    };
    Ok((path, clock))
}

fn opening(station: &Station, list: Option<String>, targets: Vec<ListedTarget>) -> Opening {
    let site = &station.site;
    Opening {
        program: env!("CARGO_PKG_VERSION").to_owned(),
        site: site.id.clone(),
        site_name: site.name.clone(),
        latitude_deg: site.latitude.degrees(),
        longitude_deg: site.longitude.degrees(),
        elevation_m: site.elevation_m,
        time_zone: site.zone.name().to_owned(),
        mount: station.mount_id.clone(),
        list,
        side: match station.side {
            SideRequest::Auto => None,
            SideRequest::Only(side) => Some(side),
        },
        clock_correction_s: 0.0,
        targets,
    }
}

/// What the last night before this one taught of the mount, if one is recorded in the user's folder.
fn earlier_night(station: &Station, now: Utc) -> Option<EarlierNight> {
    let evening = station.site.zone.night(now).to_string();
    let whose = (station.site.id.as_str(), station.mount_id.as_str());
    let (date, night) = last_before(station.folders.nights(), &evening, whose)?;
    let known = Known::of(&station.grounds(), night.state());
    Some(EarlierNight::of(&date, &known.estimate))
}

fn observatory(
    station: Station,
    common: &Common,
    earlier_night: Option<EarlierNight>,
) -> Observatory {
    Observatory {
        earlier_night,
        observer: station.site.observer(),
        zone: station.site.zone,
        horizon: station.site.horizon,
        site: station.site.name,
        mount: station.mount,
        catalogue: station.catalogue,
        prior: station.prior,
        earlier_sights: station.sights,
        earlier_read_at: station.calibrated_at,
        lead_s: common.lead.unwrap_or(0.0),
        sun_risk_accepted: common.accept_sun_risk,
        demonstration: station.built_in.then(demonstration::errors),
    }
}

fn options(color: ColorOption) -> Options {
    let variable = |name: &str| env::var(name).ok().filter(|value| !value.is_empty());
    let plain = match color {
        ColorOption::Never => true,
        ColorOption::Always => false,
        ColorOption::Auto => variable("NO_COLOR").is_some(),
    };
    let depth = Depth::of_terminal(
        variable("COLORTERM").as_deref(),
        variable("TERM").as_deref(),
    );
    let locale = variable("LC_ALL")
        .or_else(|| variable("LC_CTYPE"))
        .or_else(|| variable("LANG"));
    Options {
        light: Light::default(),
        depth: if plain { Depth::Monochrome } else { depth },
        glyphs: Glyphs::of_locale(locale.as_deref()),
    }
}
