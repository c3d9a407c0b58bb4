//! From the shown angle of an axis to the number under the index, and back.
//!
//! Angles are shown axis angles, index errors included; the zero of a ring is part of its index error.
//!
//! Hour circle: `position = sense · θ`, where θ is the shown hour axis angle H on a ring that stands
//! still and `H - LST` (apparent local sidereal time) on one that rides with the clock drive, and sense
//! is +1 for numbers that grow westward, -1 eastward. So a driven ring numbered eastward reads right
//! ascension once set, and keeps it. A second mark 12 h away adds 180° to θ when the tube is east.
//! The letters follow θ: W from 0° to 180°, E from 0° to -180°.
//!
//! Declination circle: the axis angle D itself, or the distance from a pole, `90° - D` or `90° + D`.

use crate::angle::{Angle, AxisAngle};
use crate::metal::circle::{
    DeclinationCircle, DeclinationNumbering, HourCircle, HourNumbering, Increases, Ring,
};
use crate::metal::scale::{Face, Letters, Reading, Scale};
use crate::metal::side::Side;
use crate::sexagesimal::{Half, Unit};
use crate::time::SiderealTime;

impl HourCircle {
    /// Its scale.
    #[must_use]
    pub const fn scale(&self) -> Scale {
        let face = match self.numbering {
            HourNumbering::Full => Face::Turn,
            HourNumbering::Halves => Face::Halves,
            HourNumbering::PlusMinus => Face::SignedHalves,
        };
        let letters = match (self.numbering, self.increases) {
            (HourNumbering::Full, _) => None,
            (_, Increases::West) => Some(Letters {
                growing: Half::West,
                falling: Half::East,
            }),
            (_, Increases::East) => Some(Letters {
                growing: Half::East,
                falling: Half::West,
            }),
        };
        Scale {
            face,
            unit: self.unit,
            division: self.division,
            vernier: self.vernier,
            letters,
        }
    }

    /// The position under the index that is read on this side of the pier, for a shown hour axis angle
    /// at an apparent local sidereal time (which only a driven ring asks for).
    #[must_use]
    pub fn position(&self, shown: AxisAngle, sidereal: SiderealTime, side: Side) -> Angle {
        (shown.angle() + self.offset(sidereal, side)) * self.sense()
    }

    /// The number under the index, as for [`Self::position`].
    #[must_use]
    pub fn reading(&self, shown: AxisAngle, sidereal: SiderealTime, side: Side) -> Reading {
        self.scale()
            .reading_at(self.position(shown, sidereal, side))
    }

    /// Every shown hour axis angle that gives this reading: one or two, none for a number or a letter
    /// that is not on the circle.
    #[must_use]
    pub fn candidates(
        &self,
        reading: Reading,
        sidereal: SiderealTime,
        side: Side,
    ) -> Vec<AxisAngle> {
        let positions = self.scale().positions_of(reading);
        positions
            .into_iter()
            .map(|position| self.shown_at(position, sidereal, side))
            .collect()
    }

    /// The shown hour axis angle that brings a position under the index.
    pub(super) fn shown_at(
        &self,
        position: Angle,
        sidereal: SiderealTime,
        side: Side,
    ) -> AxisAngle {
        AxisAngle::new(position * self.sense() - self.offset(sidereal, side))
    }

    /// +1 where the numbers grow with the hour axis angle, -1 where they grow against it.
    pub(super) const fn sense(&self) -> f64 {
        match self.increases {
            Increases::West => 1.0,
            Increases::East => -1.0,
        }
    }

    /// What θ is beyond the shown hour axis angle.
    fn offset(&self, sidereal: SiderealTime, side: Side) -> Angle {
        let ring = match self.ring {
            Ring::Fixed | Ring::Slips => Angle::ZERO,
            Ring::Driven => -sidereal.angle(),
        };
        if self.second_fiducial && side == Side::TubeEast {
            ring + Angle::HALF_TURN
        } else {
            ring
        }
    }
}

impl DeclinationCircle {
    /// Its scale.
    #[must_use]
    pub const fn scale(&self) -> Scale {
        let face = match self.numbering {
            DeclinationNumbering::Signed => Face::SignedQuarters,
            DeclinationNumbering::Quarters => Face::Quarters,
            DeclinationNumbering::PolarDistance | DeclinationNumbering::SouthPolarDistance => {
                Face::Halves
            }
            DeclinationNumbering::Full => Face::Turn,
        };
        let letters = match self.numbering {
            DeclinationNumbering::Signed | DeclinationNumbering::Quarters => Some(Letters {
                growing: Half::North,
                falling: Half::South,
            }),
            _ => None,
        };
        Scale {
            face,
            unit: Unit::Degrees,
            division: self.division,
            vernier: self.vernier,
            letters,
        }
    }

    /// The position under the index, for a shown declination axis angle.
    #[must_use]
    pub fn position(&self, shown: AxisAngle) -> Angle {
        self.zero() + shown.angle() * self.sense()
    }

    /// The number under the index, for a shown declination axis angle.
    #[must_use]
    pub fn reading(&self, shown: AxisAngle) -> Reading {
        self.scale().reading_at(self.position(shown))
    }

    /// Every shown declination axis angle that gives this reading: one to four, none for a number or a
    /// letter that is not on the circle.
    #[must_use]
    pub fn candidates(&self, reading: Reading) -> Vec<AxisAngle> {
        let positions = self.scale().positions_of(reading);
        positions
            .into_iter()
            .map(|position| AxisAngle::new((position - self.zero()) * self.sense()))
            .collect()
    }

    /// +1 where positions grow with the declination axis angle, -1 where they grow against it.
    pub(super) const fn sense(&self) -> f64 {
        match self.numbering {
            DeclinationNumbering::PolarDistance => -1.0,
            _ => 1.0,
        }
    }

    /// The position under the index when the shown declination axis angle is nothing.
    const fn zero(&self) -> Angle {
        match self.numbering {
            DeclinationNumbering::PolarDistance | DeclinationNumbering::SouthPolarDistance => {
                Angle::from_degrees(90.0)
            }
            _ => Angle::ZERO,
        }
    }
}
