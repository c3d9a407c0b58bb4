//! All accounts of a reading but that it is sound: what it would have been had this or that gone wrong.

use crate::catalog::Target;
use crate::dial::Sighting;
use crate::dial::doubt::explanation::{Circle, Kind};
use crate::dial::doubt::weights;
use crate::dial::doubt::{Questioned, circles, stars};
use crate::estimate::{Sight, Slipped};
use crate::metal::{Misreading, Mistake, Ring, Side};

/// A clock still on or already off daylight time, in seconds.
const AN_HOUR_S: f64 = 3600.0;

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

/// What may have gone wrong, with what the reading then says.
pub(super) struct Account {
    pub what: What,
    /// The reading put right; as it was, where a circle has slipped.
    pub sight: Sight,
    /// How often it happens.
    pub prior: f64,
}

impl Account {
    pub fn slipped(&self) -> Slipped {
        match self.what {
            What::Slipped(slipped) => slipped,
            _ => Slipped::default(),
        }
    }

    pub const fn kind(&self) -> Kind {
        match &self.what {
            What::Misread(circle, misreading) => match (misreading.mistake, circle) {
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
            What::Star(_) => Kind::OtherStar,
            What::Side(_) => Kind::OtherSide,
            What::Slipped(_) => Kind::RingSlipped,
            What::Clock(_) => Kind::Clock,
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
    let prior = |loose: bool| {
        if loose {
            weights::LOOSE_RING_SLIPPED
        } else {
            weights::FAST_RING_SLIPPED
        }
    };
    let mount = questioned.mount;
    let hour_prior = prior(mount.hour_circle.ring != Ring::Fixed);
    let dec_prior = prior(mount.declination_circle.slips);
    let both_prior = hour_prior.min(dec_prior) * weights::OF_BOTH;
    [
        (true, false, hour_prior),
        (false, true, dec_prior),
        (true, true, both_prior),
    ]
    .map(|(hour, dec, prior)| Account {
        what: What::Slipped(Slipped { hour, dec }),
        sight: said.clone(),
        prior,
    })
}

fn clock(questioned: &Questioned<'_>) -> Vec<Account> {
    let circumstances = questioned.circumstances;
    let an_hour_out = if circumstances.clock_agreed {
        weights::CLOCK_HAD_AGREED
    } else {
        weights::CLOCK_AN_HOUR_OUT
    };
    let mut shifts = vec![
        (AN_HOUR_S, an_hour_out / 2.0),
        (-AN_HOUR_S, an_hour_out / 2.0),
    ];
    if let Some(leapt) = circumstances.clock_leapt_s {
        shifts.retain(|(shift, _)| (shift + leapt).abs() > 1.0);
        shifts.push((-leapt, weights::CLOCK_LEAPT));
    }
    shifts
        .into_iter()
        .map(|(seconds, prior)| Account {
            what: What::Clock(seconds),
            sight: at_clock(questioned, seconds),
            prior,
        })
        .collect()
}

/// What the reading says if so many seconds are added to its moment.
pub(super) fn at_clock(questioned: &Questioned<'_>, seconds: f64) -> Sight {
    let moment = questioned.moment.later(seconds);
    questioned.sight_of(questioned.sighting, &moment, questioned.target)
}
