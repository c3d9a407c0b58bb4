//! `nonius dial TARGET...`: what to set on the circles, once, or again and again as plain lines.

use std::io::Write;
use std::sync::mpsc::RecvTimeoutError;
use std::time::Duration;

use clap::Args;

use crate::catalog::{self, Target, Unresolved};
use crate::command::exit::{Refused, Signalled};
use crate::command::interrupt;
use crate::command::options::{Common, seconds};
use crate::command::station::Station;
use crate::dial::json::Sheet;
use crate::dial::{Dial, NotDialled, dial};
use crate::sky::Moment;

mod lines;
mod page;
mod words;

use lines::Lines;

/// Which targets, and how often.
#[derive(Args, Debug)]
pub struct DialArgs {
    /// Catalogue names ("M 37", "Vega", "alpha Lyrae", "Moon") or coordinates
    /// ("05:52:18.3 +32:33:11", with an optional "@J2000", "@B1950", "@J2026.9" or "@date").
    #[arg(required = true, value_name = "TARGET")]
    pub targets: Vec<String>,
    /// Repeat as plain lines, one a target, until interrupted.
    #[arg(long, value_name = "DURATION", value_parser = interval)]
    pub every: Option<f64>,
}

/// The shortest interval: the settings change once a second.
fn interval(text: &str) -> Result<f64, String> {
    let every = seconds(text)?;
    if every >= 1.0 {
        Ok(every)
    } else {
        Err("the shortest interval is 1s".to_owned())
    }
}

/// Dials and prints.
pub fn run(args: &DialArgs, common: &Common, out: &mut dyn Write) -> anyhow::Result<()> {
    let mut station = Station::open(common)?;
    if let Some(journal) = &common.night {
        station.follow(journal)?;
    }
    let asked: Vec<Asked> = args
        .targets
        .iter()
        .map(|text| Asked {
            text,
            target: station.catalogue.resolve(text),
        })
        .collect();
    let nothing_known = asked.iter().all(|asked| asked.target.is_err());
    let mut lines = Lines::default();
    if nothing_known && !(common.json && args.every.is_none()) {
        return Err(refusal(&asked).into());
    }
    let Some(every) = args.every else {
        let moment = station.first_moment()?;
        let answers = answers(&station, &moment, &asked);
        if !common.json {
            return Ok(page::print(&station, &moment, &answers, out)?);
        }
        json(&station, &moment, &answers, out)?;
        return if nothing_known {
            Err(refusal(&asked).into())
        } else {
            Ok(())
        };
    };
    let interrupts = interrupt::listen()?;
    let mut moment = station.first_moment()?;
    loop {
        let answers = answers(&station, &moment, &asked);
        if common.json {
            json(&station, &moment, &answers, out)?;
        } else {
            lines.print(&station, &moment, &answers, out)?;
        }
        out.flush()?;
        match interrupts.recv_timeout(Duration::from_secs_f64(every)) {
            Err(RecvTimeoutError::Timeout) => moment = station.moment()?,
            Ok(()) | Err(RecvTimeoutError::Disconnected) => return Err(Signalled::INTERRUPT.into()),
        }
    }
}

/// A target as asked for.
struct Asked<'a> {
    text: &'a str,
    target: Result<Target, Unresolved>,
}

/// A target as asked for, and what came of it.
struct Answer<'a> {
    asked: &'a Asked<'a>,
    outcome: Outcome<'a>,
}

/// What came of a target.
enum Outcome<'a> {
    Dialled(&'a Target, Box<Dial>),
    NotDialled(&'a Target, NotDialled),
    Unknown(&'a Unresolved),
}

fn answers<'a>(station: &Station, moment: &Moment, asked: &'a [Asked<'a>]) -> Vec<Answer<'a>> {
    let setup = station.setup();
    let outcome = |asked: &'a Asked<'a>| match &asked.target {
        Err(unknown) => Outcome::Unknown(unknown),
        Ok(target) => match dial(&setup, moment, target) {
            Ok(dial) => Outcome::Dialled(target, Box::new(dial)),
            Err(why) => Outcome::NotDialled(target, why),
        },
    };
    asked
        .iter()
        .map(|asked| Answer {
            asked,
            outcome: outcome(asked),
        })
        .collect()
}

fn json(
    station: &Station,
    moment: &Moment,
    answers: &[Answer<'_>],
    out: &mut dyn Write,
) -> anyhow::Result<()> {
    let mut sheet = Sheet::new(moment, &station.site.id, &station.mount_id);
    for answer in answers {
        match &answer.outcome {
            Outcome::Dialled(_, dial) => sheet.add(dial),
            Outcome::NotDialled(target, why) => sheet.add_withheld(&target.name, &why.to_string()),
            Outcome::Unknown(why) => sheet.add_withheld(answer.asked.text, &why.to_string()),
        }
    }
    serde_json::to_writer(&mut *out, &sheet)?;
    Ok(writeln!(out)?)
}

/// Nothing that was asked for is known: what to say of the first.
fn refusal(asked: &[Asked<'_>]) -> Refused {
    match asked
        .iter()
        .find_map(|asked| asked.target.as_ref().err().map(|why| (asked.text, why)))
    {
        Some((text, why)) => unresolved(text, why),
        None => Refused {
            message: "no target was asked for".to_owned(),
            hint: None,
        },
    }
}

/// A target of the command line that could not be resolved; coordinates show where they are wrong.
#[must_use]
pub fn unresolved(text: &str, why: &Unresolved) -> Refused {
    let message = match why {
        Unresolved::Coordinates { fault, .. } => {
            let column = text
                .get(..fault.at.start)
                .map_or(0, |before| before.chars().count());
            let width = text
                .get(fault.at.clone())
                .map_or(1, |wrong| wrong.chars().count().max(1));
            let shown = catalog::clean(text);
            format!(
                "{}\n  --> TARGET:1:{}\n  {shown}\n  {}{}",
                fault.message,
                column + 1,
                " ".repeat(column),
                "^".repeat(width)
            )
        }
        other => other.to_string(),
    };
    Refused::new(message, why.hint())
}
