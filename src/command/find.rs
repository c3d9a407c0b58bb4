//! `nonius find TEXT`: search the catalogues.

use std::io::Write;

use clap::Args;

use crate::angle::Angle;
use crate::catalog::report::stated_place;
use crate::catalog::{
    Catalogue, Constellation, Filter, FindReport, Found, Kind, Near, Target, Unresolved, clean,
};
use crate::command::catalogues;
use crate::command::columns;
use crate::command::new;
use crate::command::options::Common;
use crate::command::station::Station;
use crate::command::up::{Overhead, Up};
use crate::sexagesimal::{self, Notation, Unit};
use crate::site::Folders;
use crate::site::list_edit::{self, Added, NotAdded};

/// What to search for.
#[derive(Args, Clone, Debug)]
pub struct FindArgs {
    /// Words of the name, or their beginnings, in any order; one slip a word is forgiven.
    #[arg(value_name = "TEXT", required_unless_present_any = ["kind", "constellation", "brighter_than", "near", "up"])]
    pub text: Vec<String>,
    /// Only this kind, as in "open cluster", galaxy, star.
    #[arg(long)]
    pub kind: Option<Kind>,
    /// Only in this constellation: its name, genitive or abbreviation.
    #[arg(long, value_parser = constellation)]
    pub constellation: Option<&'static Constellation>,
    /// Only what is brighter than this magnitude.
    #[arg(long, value_name = "MAGNITUDE", allow_negative_numbers = true)]
    pub brighter_than: Option<f64>,
    /// Only what stands near this target or place.
    #[arg(long, value_name = "TARGET", allow_hyphen_values = true)]
    pub near: Option<String>,
    /// How near, as in 5d or 30'.
    #[arg(long, value_name = "DISTANCE", requires = "near", default_value = "5d", value_parser = distance)]
    pub within: Angle,
    /// Only what can be seen from the site: above its horizon now, or at some time tonight as `nonius plan` has it.
    #[arg(long, value_name = "WHEN")]
    pub up: Option<Up>,
    /// No more than so many.
    #[arg(long, value_name = "N", default_value_t = 20, value_parser = clap::value_parser!(u16).range(1..))]
    pub limit: u16,
}

/// Why nothing can be searched for near a target.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum NearFault {
    /// It is no target.
    #[error(transparent)]
    Unresolved(#[from] Unresolved),
    /// It has no place that stays.
    #[error("\"{0}\" has no fixed place among the stars to search near")]
    NoFixedPlace(String),
}

impl NearFault {
    /// What to write instead.
    #[must_use]
    pub fn hint(&self) -> String {
        match self {
            Self::Unresolved(unresolved) => unresolved.hint(),
            Self::NoFixedPlace(_) => {
                "name a star, a cluster, a nebula or a galaxy, or give coordinates".to_owned()
            }
        }
    }
}

/// Searches and prints: a table for people, or one JSON value; with `--list`, what is found is added to that list.
///
/// Fails with [`NearFault`] if `--near` names nothing that can be searched near.
pub fn run(args: &FindArgs, common: &Common, out: &mut dyn Write) -> anyhow::Result<()> {
    let query = args.text.join(" ");
    let folders = Folders::of_the_user()?;
    let found = match args.up {
        None => searched(args, &query, &catalogues::open(&folders)?, &|_| true)?,
        Some(up) => {
            // the list is where what is found goes, not what is looked through
            let station = Station::open(&Common {
                list: None,
                ..common.clone()
            })?;
            let overhead = Overhead::of(up, &station)?;
            searched(args, &query, &station.catalogue, &overhead.test())?
        }
    };
    print(&query, &found, common.json, out)?;
    if let Some(list) = &common.list {
        let names: Vec<&str> = found
            .iter()
            .map(|found| found.target.name.as_str())
            .collect();
        let added = list_edit::add(&folders, list, &names).map_err(|why| match why {
            NotAdded::Faults(faults) => anyhow::Error::from(faults),
            NotAdded::Cannot(cannot) => new::refused(cannot),
        })?;
        if !common.json {
            writeln!(out, "\n{}", said_of(&added))?;
        }
    }
    Ok(())
}

fn print(query: &str, found: &[Found], json: bool, out: &mut dyn Write) -> anyhow::Result<()> {
    if json {
        serde_json::to_writer(&mut *out, &FindReport::new(query, found))?;
        return Ok(writeln!(out)?);
    }
    if found.is_empty() {
        return Ok(writeln!(out, "nothing in the catalogues fits")?);
    }
    table(found, out)
}

fn searched(
    args: &FindArgs,
    query: &str,
    catalogue: &Catalogue,
    passes: &dyn Fn(&Target) -> bool,
) -> Result<Vec<Found>, NearFault> {
    let filter = filter(args, catalogue)?;
    Ok(catalogue.search_among(query, &filter, passes))
}

fn said_of(added: &Added) -> String {
    let path = added.path.display();
    match (added.new, added.there) {
        (new, 0) => format!("{new} added to {path}"),
        (new, there) => format!("{new} added to {path}, {there} in it already"),
    }
}

fn filter(args: &FindArgs, catalogue: &Catalogue) -> Result<Filter, NearFault> {
    let near = match &args.near {
        None => None,
        Some(text) => {
            let target = catalogue.resolve(text)?;
            let place = Catalogue::fixed_place(&target)
                .ok_or_else(|| NearFault::NoFixedPlace(target.name.clone()))?;
            let within = args.within;
            Some(Near { place, within })
        }
    };
    Ok(Filter {
        kind: args.kind,
        constellation: args.constellation,
        brighter_than: args.brighter_than,
        near,
        limit: args.limit.into(),
    })
}

/// The columns; places are in the ICRS at epoch J2000.0.
const HEADINGS: [&str; 8] = [
    "name",
    "kind",
    "in",
    "right ascension",
    "declination",
    "magnitude",
    "size",
    "also",
];

fn table(found: &[Found], out: &mut dyn Write) -> anyhow::Result<()> {
    let rows: Vec<[String; HEADINGS.len()]> = std::iter::once(HEADINGS.map(str::to_owned))
        .chain(found.iter().map(row))
        .collect();
    columns::print(&rows, |column| (3..=5).contains(&column), out)?;
    Ok(writeln!(out, "\nplaces: ICRS, epoch J2000.0")?)
}

fn row(found: &Found) -> [String; HEADINGS.len()] {
    let target = &found.target;
    let place = stated_place(&target.source);
    let hours = Notation::new(Unit::Hours, Angle::from_time_seconds(1.0));
    let degrees = Notation::new(Unit::Degrees, Angle::from_arcseconds(1.0));
    [
        target.name.clone(),
        target.kind.to_string(),
        target
            .constellation
            .map_or_else(String::new, |c| c.abbreviation.to_owned()),
        place.map_or_else(String::new, |p| hours.write(p.right_ascension.angle())),
        place.map_or_else(String::new, |p| {
            let written = degrees.write(p.declination.angle());
            if written.starts_with('-') {
                written
            } else {
                format!("+{written}")
            }
        }),
        target
            .magnitude
            .map_or_else(String::new, |m| format!("{m:.1}")),
        target.size_arcmin.map_or_else(String::new, size),
        target.also.join(", "),
    ]
    .map(|cell| clean(&cell))
}

#[allow(clippy::float_cmp)] // a round object has its one size twice
fn size((length, width): (f64, f64)) -> String {
    if length == width {
        format!("{length}'")
    } else {
        format!("{length}' x {width}'")
    }
}

fn constellation(text: &str) -> Result<&'static Constellation, String> {
    Constellation::called(text).ok_or_else(|| {
        format!(
            "\"{text}\" is not a constellation; write its name or abbreviation, as in Lyra or Lyr"
        )
    })
}

fn distance(text: &str) -> Result<Angle, String> {
    const HINT: &str = "write a distance of no more than 180 degrees, as in 5d or 30'";
    let written =
        sexagesimal::read(text, Unit::Degrees).map_err(|fault| format!("{fault}; {HINT}"))?;
    let plain =
        written.negative.is_none() && written.half.is_none() && written.unit == Unit::Degrees;
    if plain && written.size.degrees() <= 180.0 {
        Ok(written.size)
    } else {
        Err(HINT.to_owned())
    }
}

#[cfg(test)]
mod tests {
    use clap::Parser;

    use super::*;

    #[derive(Parser)]
    struct Line {
        #[command(flatten)]
        find: FindArgs,
    }

    fn parsed(words: &[&str]) -> Result<FindArgs, clap::Error> {
        let line = std::iter::once("find").chain(words.iter().copied());
        Line::try_parse_from(line).map(|line| line.find)
    }

    fn printed(words: &[&str], json: bool) -> anyhow::Result<String> {
        let args = parsed(words).unwrap();
        let query = args.text.join(" ");
        let found = searched(&args, &query, &Catalogue::builtin(), &|_| true)?;
        let mut out = Vec::new();
        print(&query, &found, json, &mut out)?;
        Ok(String::from_utf8(out).unwrap())
    }

    #[test]
    fn the_table_has_a_row_for_each_and_says_its_equinox() {
        let text = printed(&["owl", "clus"], false).unwrap();
        let expected = "\
name     kind          in   right ascension   declination  magnitude  size  also
NGC 457  open cluster  Cas       1h 19m 33s  +58° 17' 27\"        6.4  13'   Owl Cluster, ET Cluster, Dragonfly Cluster

places: ICRS, epoch J2000.0
";
        assert_eq!(text, expected);
    }

    #[test]
    fn programs_get_one_json_value() {
        let text = printed(&["owl", "clus"], true).unwrap();
        let value: serde_json::Value = serde_json::from_str(&text).unwrap();
        assert_eq!(value["format"], "nonius.find/1");
        assert_eq!(value["query"], "owl clus");
        let owl = &value["found"][0];
        assert_eq!(owl["name"], "NGC 457");
        assert_eq!(
            (&owl["kind"], &owl["constellation"]),
            (&"open cluster".into(), &"Cas".into())
        );
        assert_eq!(
            (&owl["equinox"], &owl["catalogue"]),
            (&"ICRS".into(), &"ngc".into())
        );
        assert_eq!(owl["size_arcmin"], serde_json::json!([13.0, 13.0]));
        assert!(owl["score"].as_f64().unwrap() > 0.9);
        let moon: serde_json::Value =
            serde_json::from_str(&printed(&["moon"], true).unwrap()).unwrap();
        assert_eq!(moon["found"][0]["ra_deg"], serde_json::Value::Null);
    }

    #[test]
    fn nothing_found_is_said_and_is_an_empty_list_for_programs() {
        assert_eq!(
            printed(&["xyzzy"], false).unwrap(),
            "nothing in the catalogues fits\n"
        );
        assert!(printed(&["xyzzy"], true).unwrap().contains("\"found\":[]"));
    }

    #[test]
    fn filters_work_without_words() {
        let text = printed(
            &[
                "--near",
                "M 57",
                "--within",
                "7d",
                "--kind",
                "star",
                "--brighter-than",
                "1",
            ],
            false,
        );
        let text = text.unwrap();
        assert_eq!(text.lines().count(), 4, "{text}");
        assert!(text.contains("Vega"));
        let galaxies = printed(
            &[
                "--constellation",
                "virginis",
                "--kind",
                "galaxy",
                "--limit",
                "3",
            ],
            true,
        )
        .unwrap();
        let value: serde_json::Value = serde_json::from_str(&galaxies).unwrap();
        let found = value["found"].as_array().unwrap();
        assert_eq!(found.len(), 3);
        assert!(found.iter().all(|one| one["constellation"] == "Vir"));
    }

    #[test]
    fn what_cannot_be_searched_near_is_refused_with_a_hint() {
        let fault = |near| {
            let error = printed(&["--near", near], false).unwrap_err();
            error.downcast::<NearFault>().unwrap()
        };
        assert_eq!(fault("Moon"), NearFault::NoFixedPlace("Moon".to_owned()));
        assert!(fault("wega").hint().contains("Vega"));
    }

    #[test]
    fn a_wrong_option_is_refused_by_its_words() {
        for (words, said) in [
            (
                &["x", "--kind", "blob"][..],
                "\"blob\" is not a kind of target",
            ),
            (
                &["x", "--constellation", "Lyx"],
                "\"Lyx\" is not a constellation",
            ),
            (
                &["x", "--near", "Vega", "--within", "200d"],
                "no more than 180 degrees",
            ),
            (
                &["x", "--near", "Vega", "--within", "5h"],
                "no more than 180 degrees",
            ),
            (&["x", "--limit", "0"], "0 is not in 1.."),
            (&[], "required"),
        ] {
            let error = parsed(words).unwrap_err().to_string();
            assert!(error.contains(said), "{words:?}: {error}");
        }
    }
}
