//! Angles as people write them: hours or degrees with minutes and seconds.
//!
//! Read: `20h 56m 40.5s`, `20 56 40`, `314.2d`, `32 35 N`; written: `20h 56m 40s`, `32° 35'`.

mod read;
mod write;

use std::fmt;
use std::ops::Range;

use crate::angle::Angle;

pub use read::read;
pub use write::Notation;

/// The unit of the whole part of a written angle.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Unit {
    /// Hours of 15 degrees, with minutes and seconds of time.
    Hours,
    /// Degrees, with minutes and seconds of arc.
    Degrees,
}

impl Unit {
    /// An angle of so many of this unit.
    #[must_use]
    pub const fn of(self, value: f64) -> Angle {
        match self {
            Self::Hours => Angle::from_hours(value),
            Self::Degrees => Angle::from_degrees(value),
        }
    }

    /// An angle in this unit.
    #[must_use]
    pub const fn measure(self, angle: Angle) -> f64 {
        match self {
            Self::Hours => angle.hours(),
            Self::Degrees => angle.degrees(),
        }
    }
}

/// The letter that says in which half of a circle an unsigned reading lies.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Half {
    /// North of the equator.
    North,
    /// South of the equator.
    South,
    /// East of the meridian.
    East,
    /// West of the meridian.
    West,
}

impl fmt::Display for Half {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(match self {
            Self::North => "N",
            Self::South => "S",
            Self::East => "E",
            Self::West => "W",
        })
    }
}

/// An angle as it was written, before anything is made of its sign or letter.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Written {
    /// The sign if one was written: true for minus.
    pub negative: Option<bool>,
    /// Its size, never negative.
    pub size: Angle,
    /// The unit it was written in.
    pub unit: Unit,
    /// True if any mark named the unit, false if it was the caller's.
    pub unit_was_named: bool,
    /// The letter that followed, if any.
    pub half: Option<Half>,
}

impl Written {
    /// The angle with its written sign; a letter is not looked at.
    #[must_use]
    pub fn signed(&self) -> Angle {
        if self.negative == Some(true) {
            -self.size
        } else {
            self.size
        }
    }
}

/// Why a text is no angle, and where.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[error("{message}")]
pub struct TextFault {
    /// The bytes of the text that are wrong.
    pub at: Range<usize>,
    /// What is wrong.
    pub message: String,
    /// What to write instead.
    pub hint: &'static str,
}
