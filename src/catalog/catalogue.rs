//! All catalogues together: from a name to a target.

use std::sync::{Arc, OnceLock};

use crate::catalog::asked::{Asked, Fit};
use crate::catalog::builtin_index::BuiltInIndex;
use crate::catalog::deep_sky::DeepSky;
use crate::catalog::facts::FactTables;
use crate::catalog::own::OwnCatalogue;
use crate::catalog::stars::{Star, StarNames, Stars};
use crate::catalog::target::Origin;
use crate::catalog::{Filter, Target, given, solar_system};
use crate::sexagesimal::TextFault;
use crate::sky::{Body, CataloguePlace, Source, separation};

/// The catalogues compiled into the program, and the observer's own targets.
///
/// The built-in tables stay the text they are; making one of these costs nothing to speak of, and
/// a name looks only at what it needs.
#[derive(Clone, Debug)]
pub struct Catalogue {
    pub(super) stars: Stars,
    pub(super) messier: DeepSky,
    pub(super) ngc: DeepSky,
    pub(super) own: Vec<Target>,
    pub(super) catalogues: Vec<Arc<OwnCatalogue>>,
    built_in: OnceLock<Arc<BuiltInIndex>>,
}

/// Why a text is no target.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum Unresolved {
    /// No catalogue knows the name.
    #[error(
        "no catalogue knows \"{text}\"{}",
        listed(", the nearest names are", nearest)
    )]
    Unknown {
        /// The name as given.
        text: String,
        /// Names much like it, the likest first; may be empty.
        nearest: Vec<String>,
    },
    /// The letter belongs to several stars too far apart to be taken for one.
    #[error("\"{text}\" is several stars{}", listed(":", choices))]
    Several {
        /// The name as given.
        text: String,
        /// The names of the stars.
        choices: Vec<String>,
    },
    /// It looks like coordinates, and something is wrong with them.
    #[error("\"{text}\" is not a place: {fault}")]
    Coordinates {
        /// The coordinates as given.
        text: String,
        /// What is wrong, and where in the text.
        fault: TextFault,
    },
}

fn listed(before: &str, names: &[String]) -> String {
    if names.is_empty() {
        String::new()
    } else {
        format!("{before} {}", names.join(", "))
    }
}

impl Unresolved {
    /// What to write instead.
    #[must_use]
    pub fn hint(&self) -> String {
        match self {
            Self::Unknown { nearest, .. } if nearest.is_empty() => {
                "search the catalogues with `nonius find`, or give coordinates as in \"05:52:18.3 +32:33:11\"".to_owned()
            }
            Self::Unknown { nearest: names, .. } | Self::Several { choices: names, .. } => {
                format!("did you mean {}?", names.join(" or "))
            }
            Self::Coordinates { fault, .. } => fault.hint.to_owned(),
        }
    }
}

/// How many near names are offered.
const SUGGESTIONS: usize = 5;

/// Stars that share a letter within this count as one target, in degrees: they share a field of low power.
const ONE_TARGET_DEG: f64 = 0.25;

impl Catalogue {
    /// The catalogues compiled into the program.
    #[must_use]
    pub fn builtin() -> Self {
        Self::new(
            include_str!("../../catalogs/stars.csv"),
            include_str!("../../catalogs/star-names.csv"),
            include_str!("../../catalogs/messier.csv"),
            include_str!("../../catalogs/ngc.csv"),
        )
    }

    /// From the texts of the tables of stars, of their names, of the Messier objects, and of the NGC.
    #[must_use]
    pub fn new(
        stars: &'static str,
        names: &'static str,
        messier: &'static str,
        ngc: &'static str,
    ) -> Self {
        Self {
            stars: Stars::new(stars, names),
            messier: DeepSky::new(Origin::Messier, messier),
            ngc: DeepSky::new(Origin::Ngc, ngc),
            own: Vec::new(),
            catalogues: Vec::new(),
            built_in: OnceLock::new(),
        }
    }

    /// With the observer's own targets, which win over built-in ones of the same name.
    #[must_use]
    pub fn with_own(mut self, own: Vec<Target>) -> Self {
        self.own.extend(own);
        self
    }

    /// With the observer's own catalogues, which win over built-in ones, and the earlier over the later.
    #[must_use]
    pub fn with_catalogues(mut self, own: impl IntoIterator<Item = Arc<OwnCatalogue>>) -> Self {
        self.catalogues.extend(own);
        self
    }

    /// Makes ready for a search that will follow: the first one would else take a few milliseconds longer.
    pub fn prepare_search(&self) {
        let _ = self.built_in();
    }

    /// The index of the built-in tables, made when it is first asked for.
    pub(super) fn built_in(&self) -> &BuiltInIndex {
        self.built_in.get_or_init(|| {
            Arc::new(BuiltInIndex::new(
                &self.stars,
                &[self.messier, self.ngc],
                &FactTables::builtin(),
            ))
        })
    }

    /// The target of a name, or of coordinates, forgiving of case, gaps and usual spellings.
    pub fn resolve(&self, text: &str) -> Result<Target, Unresolved> {
        self.named(text)?.ok_or_else(|| self.unknown(text))
    }

    /// The same where its being unknown, or wrong, is nothing to explain: no search for names like it.
    #[must_use]
    pub fn known(&self, text: &str) -> Option<Target> {
        self.named(text).ok().flatten()
    }

    /// The same, with what is wrong with a text that could be a target.
    fn named(&self, text: &str) -> Result<Option<Target>, Unresolved> {
        if given::looks_like(text) {
            return match (given::read(text), self.own_named(&Asked::new(text))) {
                (Ok(place), _) => Ok(Some(place)),
                // a provisional designation, "2004 MN4", is made of nothing but figures and marks of angles
                (Err(_), Some(own)) => Ok(Some(own)),
                (Err(fault), None) => Err(Unresolved::Coordinates {
                    text: text.to_owned(),
                    fault,
                }),
            };
        }
        let asked = Asked::new(text);
        if asked.is_empty() {
            return Err(Unresolved::Unknown {
                text: text.to_owned(),
                nearest: Vec::new(),
            });
        }
        match self.exact(&asked) {
            None => self.by_letter(&asked, text),
            found => Ok(found),
        }
    }

    fn unknown(&self, text: &str) -> Unresolved {
        let filter = Filter {
            limit: SUGGESTIONS,
            ..Filter::default()
        };
        let near = self.search(text, &filter).into_iter();
        Unresolved::Unknown {
            text: text.to_owned(),
            nearest: near.map(|found| found.target.name).collect(),
        }
    }

    /// The observer's own target that goes by exactly this name.
    fn own_named(&self, asked: &Asked) -> Option<Target> {
        let mut own = self.own.iter();
        own.find(|target| target.names().any(|name| asked.is(name)))
            .cloned()
            .or_else(|| self.catalogues.iter().find_map(|own| own.named(asked)))
    }

    /// What goes by exactly this name.
    fn exact(&self, asked: &Asked) -> Option<Target> {
        if let Some(own) = self.own_named(asked) {
            return Some(own);
        }
        if let Some(body) = Body::ALL.into_iter().find(|body| asked.is(body.name())) {
            return Some(solar_system::target(body));
        }
        if let Some(star) = asked.hip().and_then(|hip| self.stars.numbered(hip)) {
            return self.stars.target(star);
        }
        let of_name = |table: DeepSky| {
            let mut objects = table.all().filter(|object| object.only_number().is_none());
            objects.find(|object| object.names().any(|name| asked.is(name)))
        };
        if let Some(number) = asked.number()
            && let Some(object) = of_name(self.messier).or_else(|| self.ngc.numbered(number))
        {
            return object.target();
        }
        let named = self.stars.named().find(|names| {
            names.proper().any(|name| asked.is(name)) || asked.fits(names) == Some(Fit::Whole)
        });
        if let Some(star) = named.and_then(|names| self.star(&names)) {
            return self.stars.target(star);
        }
        // by far the longest table last, by its index if there is one
        match self.built_in.get() {
            Some(built_in) => built_in.object_named(asked),
            None => of_name(self.messier).or_else(|| of_name(self.ngc)),
        }?
        .target()
    }

    /// The star of a letter asked for without the number of its component.
    fn by_letter(&self, asked: &Asked, text: &str) -> Result<Option<Target>, Unresolved> {
        let mut stars: Vec<Star> = self
            .stars
            .named()
            .filter(|names| asked.fits(names).is_some())
            .filter_map(|names| self.star(&names))
            .collect();
        let magnitude = |star: &Star| star.magnitude().unwrap_or(f64::INFINITY);
        stars.sort_by(|a, b| magnitude(a).total_cmp(&magnitude(b)));
        let Some((&brightest, others)) = stars.split_first() else {
            return Ok(None);
        };
        let apart = |other: &Star| Some(distance_deg(&brightest.place()?, &other.place()?));
        if others
            .iter()
            .all(|other| apart(other).is_some_and(|deg| deg < ONE_TARGET_DEG))
        {
            return Ok(self.stars.target(brightest));
        }
        let names = stars
            .iter()
            .filter_map(|&star| Some(self.stars.target(star)?.name));
        Err(Unresolved::Several {
            text: text.to_owned(),
            choices: names.collect(),
        })
    }

    /// The star a row of names belongs to.
    pub(super) fn star(&self, names: &StarNames) -> Option<Star> {
        self.stars.numbered(names.hip.parse().ok()?)
    }

    /// Stars no fainter than this Hp, the brightest first.
    #[must_use]
    pub fn bright_stars(&self, faintest_hp: f64) -> Vec<Target> {
        let mut bright: Vec<(f64, Star)> = self
            .stars
            .all()
            .filter_map(|star| Some((star.magnitude()?, star)))
            .filter(|(hp, _)| *hp <= faintest_hp)
            .collect();
        bright.sort_by(|a, b| a.0.total_cmp(&b.0));
        bright
            .into_iter()
            .filter_map(|(_, star)| self.stars.target(star))
            .collect()
    }

    /// The place in the ICRS at J2000.0 of a target with a fixed place; nothing for a body of the
    /// solar system and for a place of date.
    #[must_use]
    pub fn fixed_place(target: &Target) -> Option<CataloguePlace> {
        match &target.source {
            Source::Catalogue(place) => {
                let (ra, dec) = place.at_icrs_j2000()?;
                Some(CataloguePlace::icrs(ra, dec))
            }
            Source::Body(_) | Source::Orbit(_) => None,
        }
    }
}

/// How far two places of the ICRS at J2000.0 are apart.
pub(super) fn distance_deg(a: &CataloguePlace, b: &CataloguePlace) -> f64 {
    separation(
        (a.right_ascension.angle(), a.declination),
        (b.right_ascension.angle(), b.declination),
    )
    .degrees()
}
