//! What the observer is told of a suspicious reading.

use crate::angle::Angle;
use crate::catalog::Target;
use crate::dial::doubt::account::What;
use crate::dial::doubt::{Questioned, words};
use crate::estimate::Held;
use crate::metal::{Reading, Side};

/// Explanations of a smaller share are not worth reading, beside the best.
pub(super) const LEAST_SHARE: f64 = 0.005;

/// A kind of explanation.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, serde::Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum Kind {
    /// Another star stood in the field.
    OtherStar,
    /// The hour circle was misread.
    HourMisread,
    /// The declination circle was misread.
    DecMisread,
    /// A wrong sign, letter or quarter, or a number counted the wrong way.
    WrongSign,
    /// The tube stood on the other side of the pier.
    OtherSide,
    /// A ring has slipped since the readings before.
    RingSlipped,
    /// The clock was wrong.
    Clock,
}

impl Kind {
    /// The word used in JSON.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::OtherStar => "other-star",
            Self::HourMisread => "hour-misread",
            Self::DecMisread => "dec-misread",
            Self::WrongSign => "wrong-sign",
            Self::OtherSide => "other-side",
            Self::RingSlipped => "ring-slipped",
            Self::Clock => "clock",
        }
    }
}

/// Which number of a reading is meant.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Circle {
    /// The hour circle's.
    Hour,
    /// The hour circle's opposite vernier's.
    HourOpposite,
    /// The declination circle's.
    Dec,
    /// The declination circle's opposite vernier's.
    DecOpposite,
}

/// What puts a wrong reading right.
#[derive(Clone, Debug, PartialEq)]
pub enum Correction {
    /// The circle showed another number.
    Reading {
        /// Which number of the reading.
        circle: Circle,
        /// What it was.
        reading: Reading,
        /// The same as the engraving has it.
        text: String,
    },
    /// It was another star.
    Star(Box<Target>),
    /// The tube stood on this side.
    Side(Side),
    /// The circles named show too much by these axis angles (west and north positive) from this reading on: their index
    /// errors are to be found anew.
    Slipped {
        /// The hour circle, if it has slipped.
        hour: Option<Angle>,
        /// The declination circle, if it has slipped.
        dec: Option<Angle>,
    },
    /// So many seconds are to be added to the moment.
    Clock {
        /// Seconds, positive: the star was centred later than the clock said.
        seconds: f64,
    },
}

/// One explanation of a suspicious reading.
#[derive(Clone, Debug, PartialEq)]
pub struct Explanation {
    /// Its kind.
    pub kind: Kind,
    /// In plain words, without a full stop.
    pub text: String,
    /// How likely it is among all accounts of the reading, 0 to 1.
    pub share: f64,
    /// What puts the reading right if it is true.
    pub correction: Correction,
}

/// A suspicious reading.
#[derive(Clone, Debug, PartialEq)]
pub struct Suspicion {
    /// The chance that a sound reading is as far off as this or farther.
    pub improbability: f64,
    /// Hour axis angle shown less expected.
    pub hour_off: Angle,
    /// Declination axis angle shown less expected.
    pub dec_off: Angle,
    /// How likely it is sound for all that, 0 to 1.
    pub sound: f64,
    /// How likely it is wrong in a way not listed, 0 to 1.
    pub unexplained: f64,
    /// What may have happened, the likeliest first, at least one where there is any account at all.
    pub explanations: Vec<Explanation>,
}

impl Suspicion {
    /// As it is if the reading is the wrong one only so often, 0 to 1.
    pub(super) fn scaled(mut self, share: f64) -> Self {
        self.sound = 1.0 - share * (1.0 - self.sound);
        self.unexplained *= share;
        for explanation in &mut self.explanations {
            explanation.share *= share;
        }
        self
    }
}

/// How far a reading is off, or an index has moved.
#[derive(Clone, Copy, Debug)]
pub(super) struct Off {
    /// On the hour axis, positive west.
    pub hour: Angle,
    /// On the declination axis, positive north.
    pub dec: Angle,
}

impl From<&Held> for Off {
    fn from(held: &Held) -> Self {
        Self {
            hour: held.hour_off,
            dec: held.dec_off,
        }
    }
}

impl Explanation {
    /// What may have gone wrong with a reading that is off by so much.
    pub(super) fn of(questioned: &Questioned<'_>, what: &What, off: Off, share: f64) -> Self {
        Self {
            kind: what.kind(),
            text: words::of(questioned, what, off),
            share,
            correction: correction(questioned, what, off),
        }
    }
}

fn correction(questioned: &Questioned<'_>, what: &What, off: Off) -> Correction {
    match what {
        What::Misread(circle, misreading) => Correction::Reading {
            circle: *circle,
            reading: misreading.reading,
            text: words::engraved(questioned.mount, *circle, misreading.reading),
        },
        What::Star(star) => Correction::Star(star.clone()),
        What::Side(side) => Correction::Side(*side),
        What::Slipped(slipped) => Correction::Slipped {
            hour: slipped.hour.then_some(off.hour),
            dec: slipped.dec.then_some(off.dec),
        },
        What::Clock(seconds) => Correction::Clock { seconds: *seconds },
    }
}
