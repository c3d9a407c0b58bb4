//! A target list: what the observer means to look at, in order.
//!
//! How a list is written in a file is known one floor up; here an entry already read becomes a target.

use crate::catalog::target::Origin;
use crate::catalog::{Catalogue, Kind, Target, Unresolved};
use crate::sky::{CataloguePlace, Source};

/// A list of targets.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct TargetList {
    /// The list's name.
    pub name: String,
    /// Its targets in the order given.
    pub entries: Vec<Entry>,
}

/// One target of a list.
#[derive(Clone, Debug, PartialEq)]
pub struct Entry {
    /// The target.
    pub target: Target,
    /// What the observer wrote beside it; may be empty.
    pub note: String,
}

/// An entry as a list's file gives it.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Written {
    /// The name, or coordinates.
    pub name: String,
    /// The place if the list gives it; it wins over any catalogue.
    pub place: Option<CataloguePlace>,
    /// The magnitude if the list gives it.
    pub magnitude: Option<f64>,
    /// Length and width in minutes of arc if the list gives them.
    pub size_arcmin: Option<(f64, f64)>,
    /// What the observer wrote beside it; may be empty.
    pub note: String,
}

impl Catalogue {
    /// The target of one entry: the list's own place if it gives one, else what the name means.
    ///
    /// With a place of its own the entry needs no catalogue; what a catalogue of that exact name
    /// knows besides (kind, constellation, other names) is added.
    pub fn resolve_entry(&self, written: &Written) -> Result<Entry, Unresolved> {
        let name = clean(&written.name);
        let note = clean(&written.note);
        let mut target = match written.place {
            None => self.resolve(&name)?,
            Some(place) => Target {
                source: Source::Catalogue(place),
                catalogue: Origin::List,
                ..self.known(&name).unwrap_or_else(|| nameless(place))
            },
        };
        if written.place.is_some() {
            target.name = name;
        }
        target.magnitude = written.magnitude.or(target.magnitude);
        target.size_arcmin = written.size_arcmin.or(target.size_arcmin);
        target.note.clone_from(&note);
        Ok(Entry { target, note })
    }
}

/// A target of which nothing but the place is known.
const fn nameless(place: CataloguePlace) -> Target {
    Target {
        name: String::new(),
        also: Vec::new(),
        kind: Kind::Place,
        source: Source::Catalogue(place),
        magnitude: None,
        size_arcmin: None,
        constellation: None,
        catalogue: Origin::List,
        note: String::new(),
    }
}

/// A name or note without anything that could act on a terminal: no control characters, and none
/// that turn the direction of writing; other gaps become single spaces.
#[must_use]
pub fn clean(text: &str) -> String {
    fn acts(c: char) -> bool {
        c.is_control()
            || matches!(c, '\u{200b}'..='\u{200f}' | '\u{2028}'..='\u{202e}' | '\u{2060}'..='\u{206f}' | '\u{feff}')
    }
    let words = text
        .split(char::is_whitespace)
        .map(|word| word.chars().filter(|&c| !acts(c)).collect::<String>());
    let kept: Vec<String> = words.filter(|word| !word.is_empty()).collect();
    kept.join(" ")
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{Declination, RightAscension};

    fn written(name: &str) -> Written {
        Written {
            name: name.to_owned(),
            ..Written::default()
        }
    }

    fn somewhere() -> CataloguePlace {
        CataloguePlace::icrs(
            RightAscension::from_degrees(10.0),
            Declination::from_degrees(20.0),
        )
    }

    #[test]
    fn a_name_takes_its_place_from_the_catalogue_and_keeps_the_note() {
        let entry = Catalogue::builtin().resolve_entry(&Written {
            note: "low  power".to_owned(),
            ..written("m37")
        });
        let entry = entry.unwrap();
        assert_eq!(
            (entry.target.name.as_str(), entry.note.as_str()),
            ("M 37", "low power")
        );
        assert_eq!(entry.target.catalogue, Origin::Messier);
    }

    #[test]
    fn a_place_in_the_list_wins_and_needs_no_catalogue() {
        let entry = Catalogue::builtin().resolve_entry(&Written {
            place: Some(somewhere()),
            magnitude: Some(9.5),
            ..written("Field nine")
        });
        let target = entry.unwrap().target;
        assert_eq!(target.name, "Field nine");
        assert_eq!((target.kind, target.catalogue), (Kind::Place, Origin::List));
        assert_eq!(
            (target.source, target.magnitude),
            (Source::Catalogue(somewhere()), Some(9.5))
        );
    }

    #[test]
    fn an_unknown_name_without_a_place_is_refused() {
        assert!(
            Catalogue::builtin()
                .resolve_entry(&written("Field nine"))
                .is_err()
        );
    }

    #[test]
    fn nothing_that_acts_on_a_terminal_is_kept() {
        assert_eq!(
            clean("a\u{1b}[31mb\u{7}\tc\r\n d\u{202e}e\u{9b}f"),
            "a[31mb c def"
        );
        assert_eq!(clean(" Boötes α "), "Boötes α");
    }
}
