//! Settings once, as a page a person reads.

use std::io::{self, Write};

use crate::catalog::Target;
use crate::command::dial::words;
use crate::command::dial::{Answer, Outcome};
use crate::command::station::Station;
use crate::dial::about;
use crate::dial::bright::FAINTEST_RIVAL_HP;
use crate::dial::neighbour::{Neighbour, neighbour};
use crate::dial::{Chance, Dial};
use crate::sky::Moment;

/// Prints the station, the clocks, and every answer.
pub(super) fn print(
    station: &Station,
    moment: &Moment,
    answers: &[Answer<'_>],
    out: &mut dyn Write,
) -> io::Result<()> {
    let civil = station.site.zone.civil(moment.utc());
    writeln!(
        out,
        "{} · {} · {}",
        station.site.name,
        station.mount.name,
        civil.format("%a %-d %B %Y")
    )?;
    let (utc, sidereal) = (
        moment.utc().chrono(),
        words::sidereal(moment.apparent_sidereal()),
    );
    writeln!(
        out,
        "sidereal {sidereal} · civil {} · UTC {}",
        civil.format("%H:%M:%S"),
        utc.format("%H:%M:%S")
    )?;
    for answer in answers {
        writeln!(out)?;
        match &answer.outcome {
            Outcome::Dialled(target, dial) => setting(station, moment, (target, dial), out)?,
            Outcome::NotDialled(target, why) => writeln!(out, "{}: {why}", target.name)?,
            Outcome::Unknown(why) => writeln!(out, "{}: {why}", answer.asked.text)?,
        }
    }
    Ok(())
}

fn setting(
    station: &Station,
    moment: &Moment,
    (target, dial): (&Target, &Dial),
    out: &mut dyn Write,
) -> io::Result<()> {
    writeln!(out, "{}", description(target))?;
    let mut row = |label: &str, text: &str| writeln!(out, "  {label:<20}{text}");
    for line in about::lines(moment, target) {
        row("star", &line)?;
    }
    row("side", dial.side.in_words())?;
    let mount = &station.mount;
    let hour_lies = mount
        .hour_circle
        .scale()
        .graduation(dial.hour.reading)
        .by_eye();
    row("hour circle", &format!("{:<16}{hour_lies}", dial.hour.text))?;
    let dec_lies = mount
        .declination_circle
        .scale()
        .graduation(dial.dec.reading)
        .by_eye();
    row(
        "declination circle",
        &format!("{:<16}{dec_lies}", dial.dec.text),
    )?;
    if let Some(mark) = &dial.hour.next_mark {
        let (at, wait) = (mark.utc.chrono().format("%H:%M:%S"), mark.wait_s.round());
        row(
            "next mark",
            &format!(
                "{} at {at} UTC, in {wait:.0} s, with the drive off",
                mark.text
            ),
        )?;
    }
    if let Some(swing) = dial.swing {
        row("swing", &words::swing(swing, dial.side))?;
    }
    row("stands", &words::stand(dial))?;
    if station.estimate.is_calibrated() {
        let (hour, dec) = (
            words::sigma(dial.uncertainty.hour),
            words::sigma(dial.uncertainty.dec),
        );
        row(
            "known to",
            &format!("{hour} on the hour circle, {dec} on the declination circle (1 sigma)"),
        )?;
    }
    if station.estimate.is_calibrated() && !dial.chances.is_empty() {
        row("first look", &chances(&dial.chances))?;
    }
    if let Some(neighbour) = neighbour_of(station, moment, dial) {
        let from = format!("from {}", neighbour.placed.star.name);
        let chances = chances(&neighbour.chances);
        let way = &neighbour.words;
        let separator = if chances.is_empty() { "" } else { ": " };
        row(&from, &format!("{way}{separator}{chances}"))?;
    }
    if let Some(slit) = dial.slit {
        row(
            "slit",
            &format!(
                "azimuth {:.0}°, altitude {:.0}°",
                slit.azimuth.degrees().round() % 360.0,
                slit.altitude.degrees()
            ),
        )?;
    }
    if let Some(eyepiece) = dial.eyepiece {
        let side = |value: f64, plus, minus| {
            format!(
                "{:.1} m {}",
                value.abs(),
                if value >= 0.0 { plus } else { minus }
            )
        };
        let (east, north) = (
            side(eyepiece.east_m, "east", "west"),
            side(eyepiece.north_m, "north", "south"),
        );
        row(
            "eyepiece",
            &format!(
                "{:.1} m above the floor, {east} and {north} of the axes",
                eyepiece.height_m
            ),
        )?;
    }
    for caution in &dial.cautions {
        row("caution", &caution.text)?;
    }
    Ok(())
}

fn chances(chances: &[Chance]) -> String {
    let said = |chance: &Chance| format!("{} {}", chance.optic, words::percent(chance.probability));
    chances.iter().map(said).collect::<Vec<_>>().join(", ")
}

/// A bright star to start from, where the circles alone may well miss and that is worth the detour.
fn neighbour_of(station: &Station, moment: &Moment, dial: &Dial) -> Option<Neighbour> {
    /// With a chance like this in every optic nobody makes a detour.
    const GOOD_ENOUGH: f64 = 0.9;
    let is_good = |chance: &Chance| chance.probability > GOOD_ENOUGH;
    let known = station.estimate.is_calibrated() && !dial.chances.is_empty();
    if (known && dial.chances.iter().all(is_good)) || dial.observed.altitude.degrees() < 0.0 {
        return None;
    }
    let stars = station.catalogue.bright_stars(FAINTEST_RIVAL_HP);
    neighbour(&station.setup(), moment, dial, &stars).filter(Neighbour::is_worth_it)
}

/// Name, kind, constellation, magnitude and size, as far as they are known.
fn description(target: &Target) -> String {
    let mut parts = vec![target.kind.words().to_owned()];
    parts.extend(
        target
            .constellation
            .map(|constellation| constellation.name.to_owned()),
    );
    parts.extend(
        target
            .magnitude
            .map(|magnitude| format!("magnitude {magnitude:.1}")),
    );
    parts.extend(target.size_arcmin.map(|(length, width)| {
        if (length - width).abs() < 0.05 {
            format!("{length:.0}'")
        } else {
            format!("{length:.0}' by {width:.0}'")
        }
    }));
    format!("{}   {}", target.name, parts.join(", "))
}
