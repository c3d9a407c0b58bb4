//! What kind of thing a target is, in plain words.

use std::fmt;
use std::str::FromStr;

use crate::catalog::fold::{folded, is_same};

/// The kinds with their words, the words of a catalogue's file, of the screen and of `--kind`.
macro_rules! kinds {
    ($($(#[$doc:meta])* $name:ident = $words:literal,)*) => {
        /// What kind of thing a target is.
        #[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
        pub enum Kind {
            $($(#[$doc])* $name,)*
        }

        impl Kind {
            /// Every kind.
            pub const ALL: &[Self] = &[$(Self::$name),*];

            /// The kind in plain words.
            #[must_use]
            pub const fn words(self) -> &'static str {
                match self {
                    $(Self::$name => $words,)*
                }
            }
        }
    };
}

kinds! {
    /// A star, or stars too close to be told apart on the circles.
    Star = "star",
    /// Two or more stars close together.
    DoubleStar = "double star",
    /// A star that changes its brightness.
    VariableStar = "variable star",
    /// A star that flared up once.
    Nova = "nova",
    /// Young stars loosely spread.
    StellarAssociation = "stellar association",
    /// A loose cluster of stars.
    OpenCluster = "open cluster",
    /// A dense round cluster of stars.
    GlobularCluster = "globular cluster",
    /// A cluster within a nebula.
    ClusterWithNebula = "cluster with nebula",
    /// Stars that stand together by chance or loosely.
    Asterism = "asterism",
    /// A bright patch of the Milky Way.
    StarCloud = "star cloud",
    /// A nebula of no stated nature.
    Nebula = "nebula",
    /// A nebula that shines by itself.
    EmissionNebula = "emission nebula",
    /// A nebula that shines by a star's light.
    ReflectionNebula = "reflection nebula",
    /// The shell cast off by a star.
    PlanetaryNebula = "planetary nebula",
    /// What is left of an exploded star.
    SupernovaRemnant = "supernova remnant",
    /// A nebula seen as a dark patch.
    DarkNebula = "dark nebula",
    /// A galaxy.
    Galaxy = "galaxy",
    /// Two galaxies close together.
    GalaxyPair = "galaxy pair",
    /// Three galaxies close together.
    GalaxyTriplet = "galaxy triplet",
    /// Galaxies close together.
    GalaxyGroup = "galaxy group",
    /// A planet of the Sun.
    Planet = "planet",
    /// A minor planet of the Sun.
    MinorPlanet = "minor planet",
    /// A comet.
    Comet = "comet",
    /// The Moon.
    Moon = "moon",
    /// The Sun.
    Sun = "sun",
    /// A place given by its coordinates.
    Place = "place",
    /// Anything else.
    Other = "other",
}

/// Words that name no kind.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[error("\"{text}\" is not a kind of target; kinds are {}", listed())]
pub struct UnknownKind {
    /// The words as given.
    pub text: String,
}

/// All kinds in one line.
fn listed() -> String {
    let words: Vec<_> = Kind::ALL.iter().map(|kind| kind.words()).collect();
    words.join(", ")
}

// a row of an index has a bit for each kind
const _: () = assert!(Kind::ALL.len() <= 32);

impl Kind {
    /// A bit of its own among those of all kinds.
    #[must_use]
    pub const fn bit(self) -> u32 {
        1 << self as u32
    }

    /// The bits of all kinds that someone asking for this one wants.
    #[must_use]
    pub fn bits_asked(self) -> u32 {
        let wanted = Self::ALL.iter().filter(|kind| kind.is_a(self));
        wanted.fold(0, |bits, kind| bits | kind.bit())
    }

    /// True if `self` is what someone asking for `asked` wants: an asked "nebula" is any nebula, a
    /// "cluster" in a nebula is an open cluster, a double star is a star.
    #[must_use]
    pub const fn is_a(self, asked: Self) -> bool {
        match asked {
            Self::Star => matches!(self, Self::Star | Self::DoubleStar | Self::VariableStar),
            Self::OpenCluster => matches!(self, Self::OpenCluster | Self::ClusterWithNebula),
            Self::Nebula => matches!(
                self,
                Self::Nebula
                    | Self::EmissionNebula
                    | Self::ReflectionNebula
                    | Self::PlanetaryNebula
                    | Self::SupernovaRemnant
                    | Self::DarkNebula
                    | Self::ClusterWithNebula
            ),
            Self::Galaxy => matches!(
                self,
                Self::Galaxy | Self::GalaxyPair | Self::GalaxyTriplet | Self::GalaxyGroup
            ),
            _ => self as u8 == asked as u8,
        }
    }
}

impl FromStr for Kind {
    type Err = UnknownKind;

    fn from_str(text: &str) -> Result<Self, UnknownKind> {
        // the words of a catalogue's file, thousands of times over
        if let Some(&kind) = Self::ALL.iter().find(|kind| kind.words() == text) {
            return Ok(kind);
        }
        let asked: String = folded(text).collect();
        Self::ALL
            .iter()
            .copied()
            .find(|kind| is_same(kind.words(), &asked))
            .ok_or_else(|| UnknownKind {
                text: text.to_owned(),
            })
    }
}

impl fmt::Display for Kind {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.pad(self.words())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_kind_is_read_back_from_its_words_and_is_itself() {
        for &kind in Kind::ALL {
            assert_eq!(kind.words().parse(), Ok(kind));
            assert!(kind.is_a(kind));
        }
        assert_eq!("Open-Cluster".parse(), Ok(Kind::OpenCluster));
    }

    #[test]
    fn an_unknown_kind_is_told_the_known_ones() {
        let said = "blob".parse::<Kind>().unwrap_err().to_string();
        assert!(said.starts_with("\"blob\" is not a kind of target; kinds are star, double star"));
    }

    #[test]
    fn whoever_asks_for_nebulae_gets_planetary_ones_too() {
        assert!(Kind::PlanetaryNebula.is_a(Kind::Nebula));
        assert!(!Kind::Nebula.is_a(Kind::PlanetaryNebula));
        assert!(!Kind::Galaxy.is_a(Kind::Nebula));
    }
}
