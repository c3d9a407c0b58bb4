//! The index of the tables compiled into the program, made when something is searched for the first time.

use crate::catalog::asked::Asked;
use crate::catalog::deep_sky::{DeepSky, DeepSkyObject};
use crate::catalog::facts::FactTables;
use crate::catalog::index::{Builder, Facts, Index, Stamp};
use crate::catalog::stars::{Star, StarNames, Stars};
use crate::catalog::{Constellation, Kind};
use crate::sky::CataloguePlace;

/// A row of one of the tables.
#[derive(Clone, Copy, Debug)]
pub enum Entry {
    /// A cluster, nebula or galaxy.
    DeepSky(DeepSkyObject),
    /// A star.
    Star(Star),
}

impl Entry {
    /// In the ICRS at J2000.0.
    #[must_use]
    pub fn place(self) -> Option<CataloguePlace> {
        match self {
            Self::DeepSky(object) => object.place(),
            Self::Star(star) => star.place(),
        }
    }
}

/// The index, and the rows it speaks of. It knows no directions: a place is read from the row when it is asked about.
#[derive(Debug)]
pub struct BuiltInIndex {
    /// The index; nothing could be made of tables too large for it.
    pub index: Option<Index>,
    entries: Vec<Entry>,
}

impl BuiltInIndex {
    /// Of the stars and the tables of clusters, nebulae and galaxies.
    #[must_use]
    pub fn new(stars: &Stars, deep_sky: &[DeepSky], facts: &FactTables) -> Self {
        let mut builder = Builder::default();
        let mut entries = Vec::new();
        for object in deep_sky.iter().flat_map(|table| table.all()) {
            builder.row(Facts {
                reference: entries.len() as u64,
                magnitude: object.magnitude().map(single),
                direction: None,
                kinds: object.kind().bit(),
                constellation: position(object.constellation_position()),
            });
            for name in object.names() {
                builder.name(name);
            }
            entries.push(Entry::DeepSky(object));
        }
        let doubles: Vec<&str> = facts.doubles().collect();
        let variables: Vec<&str> = facts.variables().collect();
        let mut named = stars.named().peekable();
        for star in stars.all() {
            builder.row(Facts {
                reference: entries.len() as u64,
                magnitude: star.magnitude().map(single),
                direction: None,
                kinds: Kind::Star.bit()
                    | bit_if(Kind::DoubleStar, doubles.contains(&star.hip_text()))
                    | bit_if(Kind::VariableStar, variables.contains(&star.hip_text())),
                constellation: position(star.constellation_position()),
            });
            // both tables are in order of the number
            let number = |hip: &str| hip.parse::<u32>().ok();
            let passed = |names: &StarNames| number(names.hip) < star.hip();
            while named.next_if(passed).is_some() {}
            if let Some(names) = named.next_if(|names| names.hip == star.hip_text()) {
                for name in names.proper() {
                    builder.name(name);
                }
                let of = Constellation::abbreviated(names.constellation);
                let spellings = of.map(Constellation::spellings).unwrap_or_default();
                for before in [names.bayer, names.flamsteed] {
                    if !before.is_empty() {
                        builder.designation(before, spellings);
                    }
                }
            }
            entries.push(Entry::Star(star));
        }
        Self {
            index: builder.index(&Stamp::default()),
            entries,
        }
    }

    /// The cluster, nebula or galaxy that goes by exactly this name; of several the first of its table.
    #[must_use]
    pub fn object_named(&self, asked: &Asked) -> Option<DeepSkyObject> {
        let index = self.index.as_ref()?;
        let rows = asked
            .spellings()
            .flat_map(|spelling| index.rows_named(spelling));
        // the rows of the tables go by their order
        let mut references: Vec<u64> = rows.filter_map(|row| index.reference(row)).collect();
        references.sort_unstable();
        let entries = references
            .into_iter()
            .filter_map(|reference| self.entries.get(usize::try_from(reference).ok()?));
        let mut objects = entries.filter_map(|entry| match entry {
            Entry::DeepSky(object) => Some(*object),
            Entry::Star(_) => None,
        });
        objects.find(|object| object.names().any(|name| asked.is(name)))
    }

    /// The table's row of a row of the index.
    #[must_use]
    pub fn entry(&self, row: usize) -> Option<Entry> {
        let reference = self.index.as_ref()?.reference(row)?;
        self.entries.get(usize::try_from(reference).ok()?).copied()
    }
}

const fn bit_if(kind: Kind, it_is: bool) -> u32 {
    if it_is { kind.bit() } else { 0 }
}

/// A magnitude as an index keeps it.
#[allow(clippy::cast_possible_truncation)] // to a millionth of a magnitude
const fn single(magnitude: f64) -> f32 {
    magnitude as f32
}

fn position(of_constellation: Option<usize>) -> Option<u8> {
    u8::try_from(of_constellation?).ok()
}
