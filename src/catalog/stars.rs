//! The built-in stars: places by Hipparcos number, and the names that go with the numbers.
//!
//! Two tables, both in order of the Hipparcos number, both read in place: `stars.csv` has a row for
//! every star to Hp 6.5, `star-names.csv` one for each star with a Bayer letter, a Flamsteed number
//! or a proper name. Sources and licences stand at their heads.

use crate::angle::{Declination, RightAscension};
use crate::catalog::rows::{Row, Table, several};
use crate::catalog::target::Origin;
use crate::catalog::{Constellation, Kind, Target};
use crate::sky::{CataloguePlace, Source};

/// The two tables.
#[derive(Clone, Copy, Debug)]
pub struct Stars {
    places: Table<'static>,
    names: Table<'static>,
}

/// A star's row in the table of places.
#[derive(Clone, Copy, Debug)]
pub struct Star {
    row: Row<'static>,
}

/// A star's row in the table of names.
#[derive(Clone, Copy, Debug)]
pub struct StarNames {
    /// Hipparcos number as written.
    pub hip: &'static str,
    /// Abbreviation of the constellation the letter or number belongs to.
    pub constellation: &'static str,
    /// The letter's English name, a component number after a space; may be empty.
    pub bayer: &'static str,
    /// The number as written; may be empty.
    pub flamsteed: &'static str,
    names: &'static str,
}

impl Stars {
    /// From the texts of the two tables.
    #[must_use]
    pub fn new(places: &'static str, names: &'static str) -> Self {
        Self {
            places: Table::new(places),
            names: Table::new(names),
        }
    }

    /// The star of a Hipparcos number.
    #[must_use]
    pub fn numbered(&self, hip: u32) -> Option<Star> {
        self.places.numbered(hip).map(|row| Star { row })
    }

    /// Every star, in order of the Hipparcos number.
    pub fn all(&self) -> impl Iterator<Item = Star> + use<> {
        self.places.rows().map(|row| Star { row })
    }

    /// Every star with a name, in order of the Hipparcos number.
    pub fn named(&self) -> impl Iterator<Item = StarNames> + use<> {
        self.names.rows().map(StarNames::read)
    }

    /// The names of a star, if it has any but its number.
    #[must_use]
    pub fn names_of(&self, star: Star) -> Option<StarNames> {
        self.names.numbered(star.hip()?).map(StarNames::read)
    }

    /// A star with its names as a target; nothing if its row has no place.
    ///
    /// It goes by its proper name, else its Bayer letter, its Flamsteed number, its Hipparcos number.
    #[must_use]
    pub fn target(&self, star: Star) -> Option<Target> {
        let mut names: Vec<String> = Vec::new();
        if let Some(known) = self.names_of(star) {
            names.extend(known.proper().map(str::to_owned));
            names.extend(known.bayer_name());
            names.extend(known.flamsteed_name());
        }
        names.push(format!("HIP {}", star.hip()?));
        let name = names.remove(0);
        Some(Target {
            name,
            also: names,
            kind: Kind::Star,
            source: Source::Catalogue(star.place()?),
            magnitude: star.magnitude(),
            size_arcmin: None,
            constellation: star.constellation(),
            catalogue: Origin::Stars,
            note: String::new(),
        })
    }
}

impl Star {
    /// Hipparcos number as written.
    #[must_use]
    pub fn hip_text(self) -> &'static str {
        self.row.first()
    }

    /// Hipparcos number.
    #[must_use]
    pub fn hip(self) -> Option<u32> {
        self.hip_text().parse().ok()
    }

    /// Hp.
    #[must_use]
    pub fn magnitude(self) -> Option<f64> {
        // the last but two: nearer from the end
        self.row.field_from_end(2).parse().ok()
    }

    /// Its declination in the ICRS at J2000.0.
    #[must_use]
    pub fn declination(self) -> Option<Declination> {
        let [_, _, dec] = self.row.all();
        Some(Declination::from_degrees(dec.parse().ok()?))
    }

    /// The constellation it stands in by the boundaries.
    #[must_use]
    pub fn constellation(self) -> Option<&'static Constellation> {
        Constellation::abbreviated(self.row.field_from_end(0))
    }

    /// The same by its place in the table of constellations.
    #[must_use]
    pub fn constellation_position(self) -> Option<usize> {
        Constellation::position(self.row.field_from_end(0))
    }

    /// Its place in the ICRS at J2000.0, with its motion; radial velocity unknown, taken as zero.
    #[must_use]
    pub fn place(self) -> Option<CataloguePlace> {
        let [_, ra, dec, pm_ra, pm_dec, parallax] = self.row.all();
        Some(CataloguePlace {
            pm_ra_mas: pm_ra.parse().ok()?,
            pm_dec_mas: pm_dec.parse().ok()?,
            parallax_mas: parallax.parse().ok()?,
            ..CataloguePlace::icrs(
                RightAscension::from_degrees(ra.parse().ok()?),
                Declination::from_degrees(dec.parse().ok()?),
            )
        })
    }
}

impl StarNames {
    fn read(row: Row<'static>) -> Self {
        let [hip, constellation, bayer, flamsteed, names] = row.all();
        Self {
            hip,
            constellation,
            bayer,
            flamsteed,
            names,
        }
    }

    /// Proper names, the usual one first.
    pub fn proper(&self) -> impl Iterator<Item = &'static str> + use<> {
        several(self.names)
    }

    /// As in "gamma Cas" or "beta 1 Cyg".
    #[must_use]
    pub fn bayer_name(&self) -> Option<String> {
        let Self {
            constellation,
            bayer,
            ..
        } = self;
        (!bayer.is_empty()).then(|| format!("{bayer} {constellation}"))
    }

    /// As in "61 Cyg".
    #[must_use]
    pub fn flamsteed_name(&self) -> Option<String> {
        let Self {
            constellation,
            flamsteed,
            ..
        } = self;
        (!flamsteed.is_empty()).then(|| format!("{flamsteed} {constellation}"))
    }
}
