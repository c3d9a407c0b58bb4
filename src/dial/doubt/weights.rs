//! How often what goes wrong at the eyepiece in the dark, before a reading is looked at.
//!
//! All of it is judgement (common practice, no source); only the proportions among the kinds matter for the ranking,
//! and they matter only where two explanations fit a reading equally well.

use crate::metal::{Mistake, Step};

/// Another star was centred.
pub(super) const OTHER_STAR: f64 = 0.010;
/// The hour circle was misread.
pub(super) const HOUR_MISREAD: f64 = 0.010;
/// The declination circle was misread.
pub(super) const DEC_MISREAD: f64 = 0.010;
/// A wrong sign, letter or quarter.
pub(super) const WRONG_SIGN: f64 = 0.006;
/// The other side of the pier.
pub(super) const OTHER_SIDE: f64 = 0.004;
/// A ring that turns by hand or rides with the drive has slipped since the last reading.
pub(super) const LOOSE_RING_SLIPPED: f64 = 0.012;
/// A ring made fast has slipped: its screw worked loose.
pub(super) const FAST_RING_SLIPPED: f64 = 0.0003;
/// Both circles have slipped, of one.
pub(super) const OF_BOTH: f64 = 0.1;
/// The clock was an hour out.
pub(super) const CLOCK_AN_HOUR_OUT: f64 = 0.002;
/// The same where readings before by this clock agree.
pub(super) const CLOCK_HAD_AGREED: f64 = 0.0002;
/// The clock leapt and this reading was taken by the wrong time.
pub(super) const CLOCK_LEAPT: f64 = 0.5;
/// One of the circles was wrong by anything, in a way not listed.
pub(super) const UNEXPLAINED: f64 = 0.001;
/// Nothing went wrong.
pub(super) const SOUND: f64 = 0.95;

/// How often a circle is misread so, of all mistakes made with it.
pub(super) const fn of(mistake: Mistake) -> f64 {
    match mistake {
        Mistake::Step(Step::Hour | Step::TenDegrees)
        | Mistake::Letter
        | Mistake::Sign
        | Mistake::OppositeMark => 4.0,
        Mistake::Step(Step::Degree) => 3.0,
        Mistake::Step(Step::TenMinutes | Step::FiveDegrees | Step::Number | Step::Division) => 2.0,
        Mistake::Step(Step::HalfDivision)
        | Mistake::CountedBack
        | Mistake::FromTheMarkAhead
        | Mistake::OtherEnd
        | Mistake::Complement => 1.0,
    }
}
