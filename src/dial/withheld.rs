//! Why a target is not dialled.

use crate::angle::Angle;
use crate::metal::{NoSuchSide, TooNearPole};

/// Why a target was not dialled.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
pub enum NotDialled {
    /// Nearer the mount's pole than cone and skew let the tube come.
    #[error("nearer the mount's pole than the tube can come")]
    TooNearPole,
    /// The Sun rule withholds it.
    #[error(
        "withheld: the Sun is up and {:.0}° away; looking at or near it blinds at once. \
         Only with a full-aperture filter and by the rules of the house: --accept-sun-risk",
        .apart.degrees()
    )]
    SunNear {
        /// Its distance from the Sun.
        apart: Angle,
    },
    /// The mount has no such side.
    #[error(transparent)]
    NoSuchSide(NoSuchSide),
    /// The Sun itself, while it is up.
    #[error(
        "withheld: the Sun is up; looking at it blinds at once. \
         Only with a full-aperture filter and by the rules of the house: --accept-sun-risk"
    )]
    TheSun,
}

impl From<NoSuchSide> for NotDialled {
    fn from(side: NoSuchSide) -> Self {
        Self::NoSuchSide(side)
    }
}

impl From<TooNearPole> for NotDialled {
    fn from(_: TooNearPole) -> Self {
        Self::TooNearPole
    }
}
