//! Clusters, nebulae and galaxies: a table with a row for each, read in place.
//!
//! Columns: `name,kind,ra_deg,dec_deg,magnitude,major_arcmin,minor_arcmin,constellation,also`; ICRS,
//! degrees; `also` holds further names, `;` between them. Sources and licences stand at the head.

use crate::angle::{Declination, RightAscension};
use crate::catalog::rows::{Row, Table, several};
use crate::catalog::target::Origin;
use crate::catalog::{Constellation, Kind, Target};
use crate::sky::{CataloguePlace, Source};

/// One catalogue of such objects.
#[derive(Clone, Copy, Debug)]
pub struct DeepSky {
    origin: Origin,
    table: Table<'static>,
}

/// One object's row.
#[derive(Clone, Copy, Debug)]
pub struct DeepSkyObject {
    origin: Origin,
    row: Row<'static>,
}

impl DeepSky {
    /// From the text of the table.
    #[must_use]
    pub fn new(origin: Origin, text: &'static str) -> Self {
        Self {
            origin,
            table: Table::new(text),
        }
    }

    /// Every object.
    pub fn all(self) -> impl Iterator<Item = DeepSkyObject> {
        let Self { origin, table } = self;
        table.rows().map(move |row| DeepSkyObject { origin, row })
    }
}

impl DeepSkyObject {
    /// The name it goes by.
    #[must_use]
    pub fn name(self) -> &'static str {
        self.row.field(0)
    }

    /// The name it goes by and all others.
    pub fn names(self) -> impl Iterator<Item = &'static str> {
        std::iter::once(self.name()).chain(several(self.row.field(8)))
    }

    /// What it is; [`Kind::Other`] where the words are not known.
    #[must_use]
    pub fn kind(self) -> Kind {
        self.row.field(1).parse().unwrap_or(Kind::Other)
    }

    /// V, or B where only that is known.
    #[must_use]
    pub fn magnitude(self) -> Option<f64> {
        self.row.field(4).parse().ok()
    }

    /// The constellation it stands in.
    #[must_use]
    pub fn constellation(self) -> Option<&'static Constellation> {
        Constellation::abbreviated(self.row.field(7))
    }

    /// Its place in the ICRS.
    #[must_use]
    pub fn place(self) -> Option<CataloguePlace> {
        let [_, _, ra, dec] = self.row.all();
        Some(CataloguePlace::icrs(
            RightAscension::from_degrees(ra.parse().ok()?),
            Declination::from_degrees(dec.parse().ok()?),
        ))
    }

    /// Length and width in minutes of arc; round where only one is known.
    #[must_use]
    pub fn size_arcmin(self) -> Option<(f64, f64)> {
        let [_, _, _, _, _, major, minor] = self.row.all();
        let major = major.parse().ok()?;
        Some((major, minor.parse().unwrap_or(major)))
    }

    /// As a target; nothing if its row has no place.
    #[must_use]
    pub fn target(self) -> Option<Target> {
        Some(Target {
            name: self.name().to_owned(),
            also: self.names().skip(1).map(str::to_owned).collect(),
            kind: self.kind(),
            source: Source::Catalogue(self.place()?),
            magnitude: self.magnitude(),
            size_arcmin: self.size_arcmin(),
            constellation: self.constellation(),
            catalogue: self.origin,
            note: String::new(),
        })
    }
}
