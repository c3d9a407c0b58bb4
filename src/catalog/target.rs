//! A target: something with a name and a place, and what an observer wants to know of it.

use crate::catalog::{Constellation, Kind};
use crate::sky::Source;

/// Something to be put into the eyepiece.
#[derive(Clone, Debug, PartialEq)]
pub struct Target {
    /// The name it goes by: "M 37", "Vega", "gamma Cas", or the coordinates as given.
    pub name: String,
    /// Other names, the usual ones first.
    pub also: Vec<String>,
    /// What kind of thing it is.
    pub kind: Kind,
    /// Where its place comes from.
    pub source: Source,
    /// Magnitude: V, for stars Hipparcos' Hp (0.0 to 0.2 above V); nothing if unknown or changing.
    pub magnitude: Option<f64>,
    /// Length and width in minutes of arc.
    pub size_arcmin: Option<(f64, f64)>,
    /// The constellation it stands in; nothing for what wanders, or is given by a place alone.
    pub constellation: Option<&'static Constellation>,
    /// The catalogue it was found in.
    pub catalogue: Origin,
    /// What the catalogue or the list says of it.
    pub note: String,
}

/// Where a target was found.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Origin {
    /// The built-in stars.
    Stars,
    /// The Messier objects.
    Messier,
    /// The NGC and IC, and a few objects without such a number.
    Ngc,
    /// Sun, Moon and planets.
    SolarSystem,
    /// Elements of orbits among the observer's own catalogues.
    Orbits,
    /// A list of the observer's own, which gives the place too.
    List,
    /// Coordinates as given.
    Given,
}

impl Origin {
    /// The catalogue's name, as JSON and tables write it.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Self::Stars => "stars",
            Self::Messier => "messier",
            Self::Ngc => "ngc",
            Self::SolarSystem => "solar-system",
            Self::Orbits => "orbits",
            Self::List => "list",
            Self::Given => "given",
        }
    }
}

impl Target {
    /// Name and other names.
    pub fn names(&self) -> impl Iterator<Item = &str> {
        std::iter::once(self.name.as_str()).chain(self.also.iter().map(String::as_str))
    }
}
