//! `nonius plan`: the list for the night. Windows, order, swing; what cannot be had, and why.

use std::io::{self, Write};

use chrono::NaiveTime;
use clap::Args;

use crate::angle::Angle;
use crate::catalog::clean;
use crate::command::columns;
use crate::command::exit::Refused;
use crate::command::options::{Common, seconds};
use crate::command::station::Station;
use crate::plan::json::Sheet;
use crate::plan::{Almanac, Plan, Planned, Site, Visit, Wishes};
use crate::time::{Night, Utc};

/// Which night, and how.
#[derive(Args, Clone, Debug)]
pub struct PlanArgs {
    /// The night that begins on this civil date, as in 2026-12-01; otherwise tonight.
    #[arg(long, value_name = "DATE", value_parser = night)]
    pub date: Option<Night>,
    /// Not before: a civil clock time of that night, as in 21:30, or an instant (RFC 3339).
    #[arg(long, value_name = "TIME", value_parser = clock_or_instant)]
    pub from: Option<Asked>,
    /// Not after: a civil clock time of that night, or an instant.
    #[arg(long, value_name = "TIME", value_parser = clock_or_instant)]
    pub to: Option<Asked>,
    /// How long each object takes.
    #[arg(long, value_name = "DURATION", default_value = "5m", value_parser = each)]
    pub each: f64,
    /// Leave the order as the list has it.
    #[arg(long)]
    pub keep_order: bool,
}

/// A time as asked for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Asked {
    /// What civil clocks show that night.
    Clock(NaiveTime),
    /// An instant.
    Instant(Utc),
}

fn night(text: &str) -> Result<Night, String> {
    let date = text.parse();
    date.map_err(|_| format!("\"{text}\" is no date; write it as in 2026-12-01"))
}

fn clock_or_instant(text: &str) -> Result<Asked, String> {
    let clock = NaiveTime::parse_from_str(text, "%H:%M");
    let asked = clock.map(Asked::Clock).ok();
    asked
        .or_else(|| Utc::parse(text).map(Asked::Instant).ok())
        .ok_or_else(|| {
            format!("\"{text}\" is no time; write 21:30, or 2026-12-01T21:30:00Z (RFC 3339)")
        })
}

/// Nobody finds an object and looks at it in less than a minute; with more than a night each there is nothing to plan.
fn each(text: &str) -> Result<f64, String> {
    let each_s = seconds(text)?;
    if (60.0..=86_400.0).contains(&each_s) {
        Ok(each_s)
    } else {
        Err("an object takes from 1m to 24h".to_owned())
    }
}

/// Plans and prints.
pub fn run(args: &PlanArgs, common: &Common, out: &mut dyn Write) -> anyhow::Result<()> {
    let station = Station::open(common)?;
    let (list, targets) = station.targets()?;
    let Some(list) = list else {
        let message = format!("there is no list to plan for {}", station.site.id);
        return Err(Refused::new(message, "name one with --list").into());
    };
    let zone = station.site.zone;
    let night = match args.date {
        Some(night) => night,
        None => zone.night(station.first_moment()?.utc()),
    };
    let plan = Plan::new(
        Site {
            horizon: &station.site.horizon,
            mount: &station.mount,
        },
        asked_for(args, &station, night)?,
        targets
            .into_iter()
            .map(|listed| {
                let target = listed.target();
                (listed.name, target)
            })
            .collect(),
        Wishes {
            each_s: args.each,
            keep_order: args.keep_order,
            side: station.side,
        },
    );
    if common.json {
        serde_json::to_writer(&mut *out, &Sheet::new(&plan, &station.site.id))?;
        return Ok(writeln!(out)?);
    }
    let page = Page {
        station: &station,
        plan: &plan,
    };
    Ok(page.print(&list, out)?)
}

/// The part of a night that is asked for.
fn asked_for(args: &PlanArgs, station: &Station, night: Night) -> Result<Almanac, Refused> {
    let zone = station.site.zone;
    let whole = Almanac::of(&station.site.observer(), zone, night).ok_or_else(|| Refused {
        message: format!("the night {night} is outside the years of the program"),
        hint: None,
    })?;
    let instant = |option: &str, asked: Option<Asked>| match asked {
        None => Ok(None),
        Some(Asked::Instant(utc)) => Ok(Some(utc)),
        Some(Asked::Clock(clock)) => zone.at_clock(night, clock).map(Some).ok_or_else(|| {
            let message = format!("{option}: clocks skip {} that night", clock.format("%H:%M"));
            Refused::new(message, "give the instant (RFC 3339)")
        }),
    };
    let (from, to) = (instant("--from", args.from)?, instant("--to", args.to)?);
    whole.narrowed(from, to).ok_or_else(|| {
        Refused::new(
            format!("nothing of the night {night} lies between --from and --to"),
            "a night runs from noon to noon, civil time",
        )
    })
}

/// The plan as a page a person reads; times are civil.
struct Page<'a> {
    station: &'a Station,
    plan: &'a Plan,
}

const HEADINGS: [&str; 6] = ["", "target", "can be had", "side", "begin", "swing"];

impl Page<'_> {
    fn print(&self, list: &str, out: &mut dyn Write) -> io::Result<()> {
        let (station, plan) = (self.station, self.plan);
        let evening = plan.almanac.night.evening().format("%a %-d %B %Y");
        writeln!(
            out,
            "{} · {} · list {list} · night of {evening}",
            station.site.name, station.mount.name
        )?;
        self.header(out)?;
        let order = plan.in_order();
        if !order.is_empty() {
            writeln!(out)?;
            self.table(&order, out)?;
            writeln!(out)?;
            self.sums(out)?;
        }
        let mut left_out = plan.left_out().peekable();
        if left_out.peek().is_some() {
            writeln!(out, "\nnot to be had:")?;
        }
        for (object, why) in left_out {
            writeln!(out, "  {}: {why}", clean(&object.name))?;
        }
        if plan.tally.turns_over > 0 {
            writeln!(
                out,
                "\nAt a turn over the pier keep people, hands and cables clear of tube and counterweight; the rules of the house come first."
            )?;
        }
        Ok(())
    }

    fn clock(&self, utc: Utc) -> String {
        // the nearest minute
        let civil = self.station.site.zone.civil(utc.plus_seconds(30.0));
        civil.format("%H:%M").to_string()
    }

    fn header(&self, out: &mut dyn Write) -> io::Result<()> {
        let almanac = &self.plan.almanac;
        let (sun, moon) = (&almanac.sun, &almanac.moon);
        let at = |time: Option<Utc>| time.map_or_else(|| "never".to_owned(), |utc| self.clock(utc));
        writeln!(out, "Sun sets {}, rises {}", at(sun.set), at(sun.rise))?;
        writeln!(
            out,
            "twilight ends, begins: civil {}, {} · nautical {}, {} · astronomical {}, {}",
            at(sun.civil_dusk),
            at(sun.civil_dawn),
            at(sun.nautical_dusk),
            at(sun.nautical_dawn),
            at(sun.astronomical_dusk),
            at(sun.astronomical_dawn)
        )?;
        writeln!(
            out,
            "Moon rises {}, sets {}, lit to {:.0} %",
            at(moon.rise),
            at(moon.set),
            moon.illuminated * 100.0
        )?;
        let zone = self.station.site.zone.name();
        if almanac.asked == almanac.whole {
            writeln!(out, "civil times, {zone}")
        } else {
            let (from, until) = (
                self.clock(almanac.asked.from),
                self.clock(almanac.asked.until),
            );
            writeln!(out, "civil times, {zone}; asked for: {from} to {until}")
        }
    }

    fn table(&self, order: &[(&Planned, Visit)], out: &mut dyn Write) -> io::Result<()> {
        let row = |(object, visit): &(&Planned, Visit)| {
            let span = visit.window.span;
            let swing = visit.swing.map_or_else(String::new, |swing| {
                let degrees = degrees(swing.hour.abs() + swing.dec.abs());
                let over = if visit.turns_over {
                    ", over the pier"
                } else {
                    ""
                };
                format!("{degrees}{over}")
            });
            [
                visit.place.to_string(),
                clean(&object.name),
                format!("{} to {}", self.clock(span.from), self.clock(span.until)),
                visit.window.side.in_words().to_owned(),
                self.clock(visit.at),
                swing,
            ]
        };
        let head = HEADINGS.map(str::to_owned);
        let rows: Vec<[String; 6]> = std::iter::once(head).chain(order.iter().map(row)).collect();
        columns::print(&rows, |column| column == 0, out)
    }

    fn sums(&self, out: &mut dyn Write) -> io::Result<()> {
        let (tally, given) = (&self.plan.tally, &self.plan.given);
        let sum = |swing: Angle, turns: usize| {
            let turns = match turns {
                0 => "no turn".to_owned(),
                1 => "1 turn".to_owned(),
                several => format!("{several} turns"),
            };
            format!("{}, {turns} over the pier", degrees(swing))
        };
        write!(out, "swing in all: {}", sum(tally.swing, tally.turns_over))?;
        if self.plan.wishes.keep_order {
            writeln!(out, " (the order given)")
        } else {
            let lost = match given.lost - tally.lost.min(given.lost) {
                0 => String::new(),
                lost => format!(", and {lost} more not to be had"),
            };
            let given = sum(given.swing, given.turns_over);
            writeln!(out, "; in the order given: {given}{lost}")
        }
    }
}

fn degrees(angle: Angle) -> String {
    format!("{:.0}°", angle.degrees())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_time_is_a_clocks_or_an_instant() {
        let clock = NaiveTime::from_hms_opt(21, 30, 0).unwrap();
        assert_eq!(clock_or_instant("21:30"), Ok(Asked::Clock(clock)));
        let utc = Utc::parse("2026-12-01T21:30:00Z").unwrap();
        assert_eq!(
            clock_or_instant("2026-12-01T21:30:00Z"),
            Ok(Asked::Instant(utc))
        );
        for wrong in ["25:00", "soon", "21h"] {
            assert!(clock_or_instant(wrong).is_err(), "{wrong}");
        }
    }

    #[test]
    fn an_object_takes_a_minute_at_least_and_a_date_is_a_date() {
        assert_eq!(each("5m").map(f64::round), Ok(300.0));
        assert!(each("20s").is_err() && each("5").is_err());
        assert!(night("2026-12-01").is_ok() && night("1 December").is_err());
    }
}
