//! A name as asked for, made ready to be held against the names of the catalogues.
//!
//! One name has many right spellings: "Messier 37" is "M 37", "α Lyr" is "alpha Lyrae", "R Leo" is
//! "R Leonis". All of them are laid out once, and each catalogue name is then only compared.

use crate::catalog::constellation::CONSTELLATIONS;
use crate::catalog::deep_sky::Number;
use crate::catalog::fold::{folded, is_same};
use crate::catalog::stars::StarNames;
use crate::catalog::{Constellation, Greek};

/// Names of catalogues written out and as abbreviated, both folded (common practice, no source).
const CATALOGUES: [(&str, &str); 7] = [
    ("messier", "m"),
    ("barnard", "b"),
    ("collinder", "cr"),
    ("melotte", "mel"),
    ("struve", "stf"),
    ("winnecke", "wnc"),
    ("hipparcos", "hip"),
];

/// A name as asked for.
#[derive(Clone, Debug)]
pub struct Asked {
    /// Every spelling of it, folded; the one as written first.
    spellings: Vec<String>,
    /// If it ends in a constellation: what stands before, and which constellation.
    designations: Vec<(Front, &'static Constellation)>,
}

/// What stands before the constellation in a star's designation.
#[derive(Clone, Debug, PartialEq, Eq)]
enum Front {
    /// A letter, and the number of the component if one is named.
    Letter(Greek, Option<u32>),
    /// A Flamsteed number.
    Number(u32),
    /// Other letters, as of a variable star.
    Other(String),
}

/// How well a designation fits a star.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Fit {
    /// It is the star's.
    Whole,
    /// It is the star's but for the number of the component, which was not asked for.
    WithoutComponent,
}

impl Asked {
    /// Lays out the spellings of a name.
    #[must_use]
    pub fn new(text: &str) -> Self {
        let text = text.trim();
        let mut asked = Self {
            spellings: Vec::new(),
            designations: Vec::new(),
        };
        asked.add(folded(text).collect());
        let article = text
            .get(..4)
            .filter(|start| start.eq_ignore_ascii_case("the "));
        if let Some(bare) = article.and_then(|_| text.get(4..)) {
            asked.add(folded(bare).collect());
        }
        asked
    }

    fn add(&mut self, written: String) {
        if written.is_empty() {
            return;
        }
        for (long, short) in CATALOGUES {
            for (from, to) in [(long, short), (short, long)] {
                let number = written.strip_prefix(from).filter(|rest| is_number(rest));
                self.spellings
                    .extend(number.map(|number| format!("{to}{number}")));
            }
        }
        for constellation in &CONSTELLATIONS {
            for spelling in constellation.spellings() {
                let spelling: String = folded(spelling).collect();
                if let Some(before) = written.strip_suffix(&spelling) {
                    self.designate(before.trim_end(), constellation);
                    break;
                }
            }
        }
        self.spellings.insert(0, written);
    }

    fn designate(&mut self, before: &str, constellation: &'static Constellation) {
        for front in Front::read(before) {
            for spelling in constellation.spellings() {
                let spelling = folded(spelling);
                self.spellings
                    .push(front.folded().chars().chain(spelling).collect());
            }
            self.designations.push((front, constellation));
        }
    }

    /// Every spelling of it, folded.
    pub fn spellings(&self) -> impl Iterator<Item = &str> {
        self.spellings.iter().map(String::as_str)
    }

    /// True if nothing was asked for.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.spellings.is_empty()
    }

    /// True if this is a spelling of that name.
    #[must_use]
    pub fn is(&self, name: &str) -> bool {
        self.spellings
            .iter()
            .any(|spelling| is_same(name, spelling))
    }

    /// The Hipparcos number, if it is one.
    #[must_use]
    pub fn hip(&self) -> Option<u32> {
        self.spellings
            .iter()
            .find_map(|spelling| spelling.strip_prefix("hip")?.parse().ok())
    }

    /// The number in the NGC or the IC, if it is one.
    #[must_use]
    pub fn number(&self) -> Option<Number> {
        self.spellings.iter().find_map(|spelling| {
            let ngc = spelling
                .strip_prefix("ngc")
                .and_then(|rest| rest.parse().ok());
            let ic = || {
                spelling
                    .strip_prefix("ic")
                    .and_then(|rest| rest.parse().ok())
            };
            ngc.map(Number::Ngc).or_else(|| ic().map(Number::Ic))
        })
    }

    /// How well a designation asked for fits a star's.
    #[must_use]
    pub fn fits(&self, star: &StarNames) -> Option<Fit> {
        self.designations
            .iter()
            .filter(|(_, constellation)| constellation.abbreviation == star.constellation)
            .find_map(|(front, _)| front.fits(star))
    }
}

fn is_number(text: &str) -> bool {
    !text.is_empty() && text.bytes().all(|b| b.is_ascii_digit())
}

impl Front {
    /// Every way to read a folded text that stood before a constellation.
    fn read(text: &str) -> Vec<Self> {
        if text.is_empty() {
            return Vec::new();
        }
        if is_number(text) {
            return text.parse().map(Self::Number).into_iter().collect();
        }
        let letters = Greek::leading(text).filter_map(|(letter, rest)| {
            if rest.is_empty() {
                Some(Self::Letter(letter, None))
            } else {
                is_number(rest).then(|| Self::Letter(letter, rest.parse().ok()))
            }
        });
        let mut read: Vec<Self> = letters.collect();
        if read.is_empty() {
            read.push(Self::Other(text.to_owned()));
        }
        read
    }

    /// Folded, the Greek letter by its name.
    fn folded(&self) -> String {
        match self {
            Self::Letter(letter, None) => letter.name().to_owned(),
            Self::Letter(letter, Some(component)) => format!("{letter}{component}"),
            Self::Number(number) => number.to_string(),
            Self::Other(text) => text.clone(),
        }
    }

    fn fits(&self, star: &StarNames) -> Option<Fit> {
        match self {
            Self::Number(number) => (star.flamsteed.parse() == Ok(*number)).then_some(Fit::Whole),
            Self::Letter(letter, component) => {
                let mut parts = star.bayer.split_whitespace();
                if parts.next() != Some(letter.name()) {
                    return None;
                }
                let of_star = parts.next().and_then(|number| number.parse::<u32>().ok());
                if of_star == *component {
                    Some(Fit::Whole)
                } else {
                    component.is_none().then_some(Fit::WithoutComponent)
                }
            }
            Self::Other(text) => {
                (!star.bayer.is_empty() && is_same(star.bayer, text)).then_some(Fit::Whole)
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn one_name_in_many_spellings() {
        for (asked, name) in [
            ("messier 37", "M 37"),
            ("M37", "M 37"),
            ("Mel 22", "Melotte 22"),
            ("Melotte 22", "Mel 22"),
            ("R Leo", "R Leonis"),
            ("κ Cru", "Kappa Crucis"),
            ("the Moon", "Moon"),
            ("THE OWL cluster", "Owl Cluster"),
            ("barnards star", "Barnard's Star"),
        ] {
            assert!(Asked::new(asked).is(name), "{asked} is {name}");
        }
        assert!(!Asked::new("M 3 7").is("M 37"));
        assert!(!Asked::new("M 3").is("M 37"));
        assert!(Asked::new(" - ").is_empty());
    }

    #[test]
    fn a_hipparcos_number_is_seen() {
        assert_eq!(Asked::new("HIP 91262").hip(), Some(91262));
        assert_eq!(Asked::new("hipparcos 091262").hip(), Some(91262));
        assert_eq!(Asked::new("hip").hip(), None);
        assert_eq!(Asked::new("hip 9 1").hip(), None);
    }
}
