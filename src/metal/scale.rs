//! A graduated scale: which number stands at which position of a circle, and back.
//!
//! A *position* is an angle along the ring, counted from the scale's zero in the direction its numbers
//! first grow; any magnitude, 360° apart is the same place. A [`Reading`] is the number engraved there.
//! The circles turn axis angles into positions (see [`crate::metal::reading`]).

use crate::angle::Angle;
use crate::sexagesimal::{Half, Unit};

/// Closer than this, in radians, two positions are one: far below any engraving, far above rounding.
pub(super) const SAME_POSITION_RAD: f64 = 1e-11;

/// The number under an index.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Reading {
    /// The number, on the circle's own scale: signed only where the numbering is.
    pub value: Angle,
    /// The letter beside it on an unsigned scale, if there is one and it is known.
    pub half: Option<Half>,
}

/// How the numbers run round a ring.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Face {
    /// Once round, 0° to 360°.
    Turn,
    /// Up to 180° on either side of zero, unsigned.
    Halves,
    /// Up to 180° on either side of zero, signed.
    SignedHalves,
    /// Up to 90° on either side of zero and back to nothing opposite, unsigned.
    Quarters,
    /// Up to 90° on either side of zero and back to nothing opposite, signed.
    SignedQuarters,
}

impl Face {
    /// True where a sign stands before the numbers.
    pub(super) const fn is_signed(self) -> bool {
        matches!(self, Self::SignedHalves | Self::SignedQuarters)
    }

    /// The greatest number, in degrees.
    pub(super) const fn greatest_deg(self) -> f64 {
        match self {
            Self::Turn => 360.0,
            Self::Halves | Self::SignedHalves => 180.0,
            Self::Quarters | Self::SignedQuarters => 90.0,
        }
    }

    /// The greatest number.
    pub(super) const fn greatest(self) -> Angle {
        Angle::from_degrees(self.greatest_deg())
    }
}

/// The letters of the two halves of a scale.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Letters {
    /// Of positions from 0° to 180°.
    pub(super) growing: Half,
    /// Of positions from 0° to -180°.
    pub(super) falling: Half,
}

/// A graduated scale.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Scale {
    pub(super) face: Face,
    pub(super) unit: Unit,
    pub(super) division: Angle,
    pub(super) vernier: Option<Angle>,
    /// None where no letter could tell the halves apart.
    pub(super) letters: Option<Letters>,
}

impl Scale {
    /// The unit engraved.
    #[must_use]
    pub const fn unit(&self) -> Unit {
        self.unit
    }

    /// The smallest engraved division.
    #[must_use]
    pub const fn division(&self) -> Angle {
        self.division
    }

    /// The number at a position.
    #[must_use]
    pub fn reading_at(&self, position: Angle) -> Reading {
        let from_zero = position.wrapped_signed();
        let plain = |value| Reading { value, half: None };
        match self.face {
            Face::Turn => plain(position.wrapped_positive()),
            Face::SignedHalves => plain(from_zero),
            Face::SignedQuarters => plain(counted_back(from_zero)),
            Face::Halves => Reading {
                value: from_zero.abs(),
                half: self.letter_at(from_zero),
            },
            Face::Quarters => Reading {
                value: counted_back(from_zero).abs(),
                half: self.letter_at(from_zero),
            },
        }
    }

    /// Every position at which that number stands, in (-180°, 180°]: one to four, none for a number or a
    /// letter that is not on this scale.
    #[must_use]
    pub fn positions_of(&self, reading: Reading) -> Vec<Angle> {
        let value = reading.value;
        let opposite = Angle::HALF_TURN - value;
        let possible: &[Angle] = match self.face {
            Face::Turn | Face::SignedHalves => &[value],
            Face::Halves => &[value, -value],
            Face::SignedQuarters => &[value, opposite],
            Face::Quarters => &[value, opposite, -value, -opposite],
        };
        let mut found: Vec<Angle> = Vec::with_capacity(possible.len());
        if !self.holds(value) {
            return found;
        }
        for position in possible.iter().map(|position| position.wrapped_signed()) {
            let seen = found.iter().any(|other| same_position(*other, position));
            if !seen && self.letter_agrees(reading.half, position) {
                found.push(position);
            }
        }
        found
    }

    /// True if the number lies between the ends of the scale.
    pub(super) fn holds(&self, value: Angle) -> bool {
        let greatest = self.face.greatest().radians() + SAME_POSITION_RAD;
        let least = if self.face.is_signed() {
            -greatest
        } else {
            -SAME_POSITION_RAD
        };
        (least..=greatest).contains(&value.radians())
    }

    /// The letter of the half a position lies in; none where the halves meet.
    fn letter_at(&self, from_zero: Angle) -> Option<Half> {
        let letters = self.letters?;
        if at_a_joint(from_zero) {
            None
        } else if from_zero > Angle::ZERO {
            Some(letters.growing)
        } else {
            Some(letters.falling)
        }
    }

    /// True if a reading with that letter, or without one, can be the number at a position.
    fn letter_agrees(&self, letter: Option<Half>, position: Angle) -> bool {
        let Some(letter) = letter else {
            return true;
        };
        // a sign has said already which half it is
        let Some(letters) = self.letters.filter(|_| !self.face.is_signed()) else {
            return false;
        };
        match self.letter_at(position) {
            Some(here) => here == letter,
            None => letter == letters.growing || letter == letters.falling,
        }
    }
}

/// The numbers from 90° on count back to nothing at 180°, on both sides of zero.
fn counted_back(from_zero: Angle) -> Angle {
    let quarter = Angle::HALF_TURN / 2.0;
    if from_zero > quarter {
        Angle::HALF_TURN - from_zero
    } else if from_zero < -quarter {
        -Angle::HALF_TURN - from_zero
    } else {
        from_zero
    }
}

fn same_position(a: Angle, b: Angle) -> bool {
    (a - b).wrapped_signed().abs().radians() < SAME_POSITION_RAD
}

/// True at 0° and at 180°, where the two halves meet.
fn at_a_joint(from_zero: Angle) -> bool {
    same_position(from_zero, Angle::ZERO) || same_position(from_zero, Angle::HALF_TURN)
}
