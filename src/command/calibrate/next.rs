//! Which star to read next, of those up when the last one was read, for the rest of the night's list.

use std::io::Write;

use crate::catalog::Target;
use crate::command::options::Common;
use crate::command::readings::Readings;
use crate::command::station::Station;
use crate::dial::Setup;
use crate::dial::bright::FAINTEST_RIVAL_HP;
use crate::dial::next_star::{NextStar, next_stars};
use crate::estimate::{Estimate, Fit};
use crate::night::ListedTarget;
use crate::sky::Moment;

/// The star that helps most: at the moment asked for, else when the last star was read. Nothing if none helps.
pub fn star(
    station: &Station,
    common: &Common,
    readings: &Readings,
    fit: &Fit,
) -> anyhow::Result<Option<NextStar>> {
    let Some(utc) = common.at.or_else(|| readings.latest()) else {
        return Ok(None);
    };
    let estimate = Estimate::from(fit);
    let setup = Setup {
        estimate: &estimate,
        tube: readings.tube(fit),
        ..station.setup()
    };
    let (_, listed) = station.targets()?;
    let rest: Vec<Target> = listed.iter().filter_map(ListedTarget::target).collect();
    let stars = station.catalogue.bright_stars(FAINTEST_RIVAL_HP);
    let moment = Moment::new(&station.site.observer(), utc);
    let next = next_stars(&setup, &moment, &stars, &rest);
    Ok(next.into_iter().next())
}

/// Says it in a line.
pub fn write(next: &NextStar, out: &mut dyn Write) -> anyhow::Result<()> {
    let percent = |chance: f64| (chance * 100.0).clamp(1.0, 99.0);
    writeln!(out)?;
    writeln!(
        out,
        "next star: {}, {}: first look {:.0} % -> {:.0} %",
        next.placed.star.name,
        next.placed.side.in_words(),
        percent(next.first_look),
        percent(next.first_look_after)
    )?;
    Ok(())
}
