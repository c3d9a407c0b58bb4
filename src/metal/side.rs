//! The sides of the pier a tube can be on.

use std::fmt;

/// Which side of the pier the tube is on.
///
/// A mount whose tube swings between the arms of a fork or a yoke has the one side `Single`, with the
/// geometry of `TubeWest`.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, serde::Serialize, serde::Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Side {
    /// The tube west of the pier: its end of the declination axis points to hour angle H + 6h.
    TubeWest,
    /// The tube east of the pier: the same direction is reached at (H ± 12h, 180° - D).
    TubeEast,
    /// The one side of a fork or a yoke.
    Single,
}

impl Side {
    /// The other side of the pier; a fork or yoke has none.
    #[must_use]
    pub const fn other(self) -> Option<Self> {
        match self {
            Self::TubeWest => Some(Self::TubeEast),
            Self::TubeEast => Some(Self::TubeWest),
            Self::Single => None,
        }
    }

    /// As an observer says it.
    #[must_use]
    pub const fn in_words(self) -> &'static str {
        match self {
            Self::TubeWest => "tube west",
            Self::TubeEast => "tube east",
            Self::Single => "one side",
        }
    }

    /// The word used in files and options.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::TubeWest => "tube-west",
            Self::TubeEast => "tube-east",
            Self::Single => "single",
        }
    }
}

impl fmt::Display for Side {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.word())
    }
}
