//! What was found, as the value programs read (`nonius.find/1`).

use serde::Serialize;

use crate::catalog::Found;
use crate::sky::{CataloguePlace, Source};

/// The outcome of a search.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct FindReport {
    /// `nonius.find/1`.
    pub format: &'static str,
    /// The words typed.
    pub query: String,
    /// What was found, the best first.
    pub found: Vec<FoundReport>,
}

/// One target found.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct FoundReport {
    /// The name it goes by.
    pub name: String,
    /// Other names.
    pub also: Vec<String>,
    /// What it is, in plain words.
    pub kind: &'static str,
    /// Abbreviation; null for what wanders.
    pub constellation: Option<&'static str>,
    /// Right ascension at the equinox named and epoch J2000.0; null for what wanders.
    pub ra_deg: Option<f64>,
    /// Declination at the equinox named and epoch J2000.0; null for what wanders.
    pub dec_deg: Option<f64>,
    /// `ICRS`; `date` for a place of date, as the observer's list gives it; null for what wanders.
    pub equinox: Option<String>,
    /// V, for stars Hp.
    pub magnitude: Option<f64>,
    /// Length and width in minutes of arc.
    pub size_arcmin: Option<[f64; 2]>,
    /// The catalogue it is in.
    pub catalogue: &'static str,
    /// From 0 to 1: how well it fits the words typed.
    pub score: f64,
}

impl FindReport {
    /// The value for what a search found.
    #[must_use]
    pub fn new(query: &str, found: &[Found]) -> Self {
        Self {
            format: "nonius.find/1",
            query: query.to_owned(),
            found: found.iter().map(FoundReport::new).collect(),
        }
    }
}

impl FoundReport {
    fn new(found: &Found) -> Self {
        let target = &found.target;
        let place = stated_place(&target.source);
        Self {
            name: target.name.clone(),
            also: target.also.clone(),
            kind: target.kind.words(),
            constellation: target.constellation.map(|c| c.abbreviation),
            ra_deg: place.map(|place| place.right_ascension.degrees()),
            dec_deg: place.map(|place| place.declination.degrees()),
            equinox: place.map(|place| place.equinox.to_string()),
            magnitude: target.magnitude,
            size_arcmin: target.size_arcmin.map(|(length, width)| [length, width]),
            catalogue: target.catalogue.name(),
            score: found.score,
        }
    }
}

/// The place to state: in the ICRS at J2000.0 where it can be, a place of date as it is.
#[must_use]
pub fn stated_place(source: &Source) -> Option<CataloguePlace> {
    match source {
        Source::Catalogue(place) => Some(
            place
                .at_icrs_j2000()
                .map_or(*place, |(ra, dec)| CataloguePlace::icrs(ra, dec)),
        ),
        Source::Body(_) | Source::Orbit(_) => None,
    }
}
