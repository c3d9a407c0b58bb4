//! Clusters, nebulae and galaxies: a table with a row for each, read in place.
//!
//! Columns: `name,kind,ra_deg,dec_deg,magnitude,major_arcmin,minor_arcmin,constellation,also`; ICRS,
//! degrees; `also` holds further names, `;` between them; no field is in quotes. Sources and licences stand at the head.

use std::cmp::Ordering;

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

/// A number in the New General Catalogue or the Index Catalogue, in the order of the table.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Number {
    /// In the New General Catalogue.
    Ngc(u32),
    /// In the Index Catalogue.
    Ic(u32),
}

impl Number {
    /// The number a name begins with, and what follows it, as the A of "NGC 61A".
    fn leading(name: &str) -> Option<(Self, &str)> {
        let (letters, rest) = name.split_once(' ')?;
        let of: fn(u32) -> Self = match letters {
            "NGC" => Self::Ngc,
            "IC" => Self::Ic,
            _ => return None,
        };
        let after = rest.trim_start_matches(|c: char| c.is_ascii_digit());
        let digits = rest.strip_suffix(after)?;
        Some((of(digits.parse().ok()?), after))
    }

    /// Where a row of this name stands from the number: parts of an object follow it, and what has
    /// no such number stands last.
    fn order(self, name: &str) -> Ordering {
        Self::leading(name).map_or(Ordering::Greater, |(number, after)| {
            number.cmp(&self).then(after.len().cmp(&0))
        })
    }
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

    /// Every object, but those of another catalogue that are Messier's too.
    pub fn all(self) -> impl Iterator<Item = DeepSkyObject> {
        let Self { origin, table } = self;
        let objects = table.rows().map(move |row| DeepSkyObject { origin, row });
        objects.filter(|object| !object.is_left_to_messier())
    }

    /// The object of a number in the NGC or the IC, by halving; nothing for a second number of an
    /// object that goes by another.
    #[must_use]
    pub fn numbered(self, wanted: Number) -> Option<DeepSkyObject> {
        let Self { origin, table } = self;
        let row = table.halved(|row| Some(wanted.order(row.first())))?;
        Some(DeepSkyObject { origin, row })
    }
}

impl DeepSkyObject {
    /// The name it goes by.
    #[must_use]
    pub fn name(self) -> &'static str {
        self.row.first()
    }

    /// The name it goes by and all others.
    pub fn names(self) -> impl Iterator<Item = &'static str> {
        std::iter::once(self.name()).chain(several(self.row.field_from_end(0)))
    }

    /// What it is; [`Kind::Other`] where the words are not known.
    #[must_use]
    pub fn kind(self) -> Kind {
        self.row.field(1).parse().unwrap_or(Kind::Other)
    }

    /// V, or B where only that is known.
    #[must_use]
    pub fn magnitude(self) -> Option<f64> {
        // nearer from the end
        self.row.field_from_end(4).parse().ok()
    }

    /// Catalogue and number, folded, if that is the only name it goes by.
    #[must_use]
    pub fn only_number(self) -> Option<[&'static str; 2]> {
        if !self.row.ends_empty() {
            return None;
        }
        let name = self.name();
        let (letters, number) = match name.split_at_checked(4)? {
            ("NGC ", number) => ("ngc", number),
            _ => ("ic", name.strip_prefix("IC ")?),
        };
        number
            .bytes()
            .all(|b| b.is_ascii_digit())
            .then_some([letters, number])
    }

    /// True in another catalogue than Messier's for what has a number of his.
    fn is_left_to_messier(self) -> bool {
        let messier = |name: &str| {
            let number = name.strip_prefix("M ");
            number.is_some_and(|number| number.starts_with(|c: char| c.is_ascii_digit()))
        };
        self.origin != Origin::Messier
            && !self.row.ends_empty()
            && several(self.row.field_from_end(0)).any(messier)
    }

    /// The constellation it stands in.
    #[must_use]
    pub fn constellation(self) -> Option<&'static Constellation> {
        Constellation::abbreviated(self.row.field_from_end(1))
    }

    /// The same by its place in the table of constellations.
    #[must_use]
    pub fn constellation_position(self) -> Option<usize> {
        Constellation::position(self.row.field_from_end(1))
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

#[cfg(test)]
mod tests {
    use super::*;

    const TEXT: &str = "name,kind,ra_deg,dec_deg,magnitude,major_arcmin,minor_arcmin,constellation,also\n\
        NGC 1,galaxy,1.8160,27.7081,12.9,1.6,1.1,Peg,\n\
        NGC 6,galaxy,2.3862,33.3087,14.4,1.7,1.3,And,NGC 20\n\
        NGC 6A,galaxy,2.4,33.3,,,,And,\n\
        NGC 2099,open cluster,88.0765,32.5530,5.6,11.4,,Aur,M 37\n\
        IC 1,double star,2.1,27.7,,,,Peg,\n\
        Coalsack,dark nebula,192.5000,-62.7000,,400.0,300.0,Cru,\n";

    fn table() -> DeepSky {
        DeepSky::new(Origin::Ngc, TEXT)
    }

    #[test]
    fn a_number_is_found_by_halving_and_a_missing_one_is_not() {
        for (number, name) in [
            (Number::Ngc(1), "NGC 1"),
            (Number::Ngc(6), "NGC 6"),
            (Number::Ngc(2099), "NGC 2099"),
            (Number::Ic(1), "IC 1"),
        ] {
            assert_eq!(
                table().numbered(number).map(DeepSkyObject::name),
                Some(name)
            );
        }
        for missing in [
            Number::Ngc(0),
            Number::Ngc(7),
            Number::Ngc(9999),
            Number::Ic(0),
            Number::Ic(2),
        ] {
            assert!(table().numbered(missing).is_none(), "{missing:?}");
        }
    }

    #[test]
    fn what_messier_numbered_is_left_to_his_table() {
        let names: Vec<_> = table().all().map(DeepSkyObject::name).collect();
        assert_eq!(names, ["NGC 1", "NGC 6", "NGC 6A", "IC 1", "Coalsack"]);
        let only: Vec<_> = table()
            .all()
            .filter(|o| o.only_number().is_some())
            .map(DeepSkyObject::name)
            .collect();
        assert_eq!(only, ["NGC 1", "IC 1"]);
    }

    #[test]
    fn a_round_object_is_as_wide_as_long_and_an_unknown_size_is_none() {
        let cluster = table().numbered(Number::Ngc(2099)).unwrap();
        assert_eq!(cluster.size_arcmin(), Some((11.4, 11.4)));
        assert_eq!(table().numbered(Number::Ic(1)).unwrap().size_arcmin(), None);
    }
}
