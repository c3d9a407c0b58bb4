//! All accounts of a reading but that it is sound: what it would have been had this or that gone wrong.

use crate::catalog::Target;
use crate::dial::Sighting;
use crate::dial::doubt::explanation::{Circle, Kind};
use crate::dial::doubt::weights;
use crate::dial::doubt::{Circumstances, Questioned, circles, stars};
use crate::estimate::{Sight, Slipped};
use crate::metal::{Misreading, Mistake, Ring, Side};

/// A clock still on or already off daylight time, in seconds.
const AN_HOUR_S: f64 = 3600.0;

/// Clock errors nearer to each other than this are one.
const SAME_CLOCK_S: f64 = 1.0;

/// What may have gone wrong.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum What {
    /// A circle was misread, and showed this.
    Misread(Circle, Misreading),
    /// It was this star.
    Star(Box<Target>),
    /// The tube stood on this side.
    Side(Side),
    /// These circles have slipped.
    Slipped(Slipped),
    /// So many seconds are to be added to the clock.
    Clock(f64),
}

impl What {
    /// The kind of explanation it is.
    pub const fn kind(&self) -> Kind {
        match self {
            Self::Misread(circle, misreading) => match (misreading.mistake, circle) {
                (
                    Mistake::Letter
                    | Mistake::Sign
                    | Mistake::CountedBack
                    | Mistake::OtherEnd
                    | Mistake::Complement,
                    _,
                ) => Kind::WrongSign,
                (_, Circle::Hour | Circle::HourOpposite) => Kind::HourMisread,
                (_, Circle::Dec | Circle::DecOpposite) => Kind::DecMisread,
            },
            Self::Star(_) => Kind::OtherStar,
            Self::Side(_) => Kind::OtherSide,
            Self::Slipped(_) => Kind::RingSlipped,
            Self::Clock(_) => Kind::Clock,
        }
    }
}

/// What may have gone wrong, with what the reading then says.
#[derive(Clone, Debug)]
pub(super) struct Account {
    pub what: What,
    /// The reading put right; as it was, where a circle has slipped.
    pub sight: Sight,
    /// How often it happens.
    pub prior: f64,
}

impl Account {
    pub const fn slipped(&self) -> Slipped {
        match self.what {
            What::Slipped(slipped) => slipped,
            _ => Slipped {
                hour: false,
                dec: false,
            },
        }
    }
}

/// Every account of a reading that said this.
pub(super) fn all(questioned: &Questioned<'_>, said: &Sight) -> Vec<Account> {
    let mut accounts = circles::misread(questioned);
    accounts.extend(stars::others(questioned));
    accounts.extend(other_side(questioned));
    accounts.extend(slipped(questioned, said));
    accounts.extend(clock(questioned));
    accounts
}

fn other_side(questioned: &Questioned<'_>) -> Option<Account> {
    let side = questioned.sighting.side.other()?;
    let sighting = Sighting {
        side,
        ..*questioned.sighting
    };
    Some(Account {
        what: What::Side(side),
        sight: questioned.sight_of(&sighting, questioned.moment, questioned.target),
        prior: weights::OTHER_SIDE,
    })
}

fn slipped(questioned: &Questioned<'_>, said: &Sight) -> [Account; 3] {
    slips(questioned).map(|(slipped, prior)| Account {
        what: What::Slipped(slipped),
        sight: said.clone(),
        prior,
    })
}

/// The circles that may have slipped, and how often they do.
pub(super) fn slips(questioned: &Questioned<'_>) -> [(Slipped, f64); 3] {
    let often = |loose: bool| {
        if loose {
            weights::LOOSE_RING_SLIPPED
        } else {
            weights::FAST_RING_SLIPPED
        }
    };
    let mount = questioned.mount;
    let hour_slips = often(mount.hour_circle.ring != Ring::Fixed);
    let dec_slips = often(mount.declination_circle.slips);
    let both_slip = hour_slips.min(dec_slips) * weights::OF_BOTH;
    [
        (true, false, hour_slips),
        (false, true, dec_slips),
        (true, true, both_slip),
    ]
    .map(|(hour, dec, often)| (Slipped { hour, dec }, often))
}

/// The seconds that may be to be added to the clock, and how often they are.
pub(super) fn clock_errors(circumstances: &Circumstances) -> Vec<(f64, f64)> {
    let an_hour_out = if circumstances.clock_agreed {
        weights::CLOCK_HAD_AGREED
    } else {
        weights::CLOCK_AN_HOUR_OUT
    };
    let mut errors = vec![
        (AN_HOUR_S, an_hour_out / 2.0),
        (-AN_HOUR_S, an_hour_out / 2.0),
    ];
    if let Some(leapt) = circumstances.clock_leapt_s {
        errors.retain(|(seconds, _)| (seconds + leapt).abs() > SAME_CLOCK_S);
        errors.push((-leapt, weights::CLOCK_LEAPT));
    }
    errors
}

fn clock<'a>(questioned: &'a Questioned<'_>) -> impl Iterator<Item = Account> + 'a {
    clock_errors(&questioned.circumstances)
        .into_iter()
        .map(|(seconds, prior)| {
            let moment = questioned.moment.later(seconds);
            Account {
                what: What::Clock(seconds),
                sight: questioned.sight_of(questioned.sighting, &moment, questioned.target),
                prior,
            }
        })
}
