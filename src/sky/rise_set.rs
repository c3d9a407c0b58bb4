//! Rising, transit, setting and twilight, by the conventions of the almanacs: a level horizon with 34' of refraction; of
//! the Sun's and the Moon's upper limb, of every other centre (source: U.S. Naval Observatory, *Rise, Set, and Twilight
//! Definitions*, from memory; checked against its printed tables in `tests/outside/rise_set.rs`).
//!
//! Altitudes are the airless ones of the centre as seen from the site: -50' for the Sun, whose semidiameter is taken for
//! 16'; -(34' + semidiameter) for the Moon; -34' for the rest.

use crate::angle::{Angle, HourAngle};
use crate::sky::body::Body;
use crate::sky::crossing::{Crossing, crossings};
use crate::sky::moment::Moment;
use crate::sky::place::Source;
use crate::time::Utc;

/// Refraction at the horizon.
const REFRACTION: Angle = Angle::from_arcminutes(34.0);

/// The Sun's semidiameter as the almanacs take it.
const SUN_SEMIDIAMETER: Angle = Angle::from_arcminutes(16.0);

/// The Moon's radius in km (IAU 2015 nominal value is the mean radius 1737.4 km).
const MOON_RADIUS_KM: f64 = 1_737.4;

/// An astronomical unit in km (IAU 2012 Resolution B2).
const AU_KM: f64 = 149_597_870.7;

/// How dark it is: the Sun's centre so far below the horizon.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Twilight {
    /// 6°: the horizon can be seen.
    Civil,
    /// 12°: the horizon is gone.
    Nautical,
    /// 18°: no sunlight is left.
    Astronomical,
}

impl Twilight {
    /// The Sun's altitude then.
    #[must_use]
    pub const fn altitude(self) -> Angle {
        match self {
            Self::Civil => Angle::from_degrees(-6.0),
            Self::Nautical => Angle::from_degrees(-12.0),
            Self::Astronomical => Angle::from_degrees(-18.0),
        }
    }
}

/// Something that comes up or goes down.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Passage {
    /// When.
    pub utc: Utc,
    /// It comes up.
    pub rising: bool,
}

/// An object's crossing of the meridian.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Transit {
    /// When.
    pub utc: Utc,
    /// At hour angle 0; else at 12 h.
    pub upper: bool,
}

impl Moment {
    /// The airless altitude of a source's centre at which it rises or sets.
    #[must_use]
    pub fn rising_altitude(&self, source: &Source) -> Angle {
        match source {
            Source::Body(Body::Sun) => -(REFRACTION + SUN_SEMIDIAMETER),
            Source::Body(Body::Moon) => {
                let distance_km = self.distance_au(Body::Moon) * AU_KM;
                -(REFRACTION + Angle::from_radians((MOON_RADIUS_KM / distance_km).asin()))
            }
            _ => -REFRACTION,
        }
    }

    /// Every rising and setting of a source from this moment on, within so many seconds, in order.
    #[must_use]
    pub fn rises_and_sets(&self, source: &Source, span_s: f64) -> Vec<Passage> {
        self.passages(span_s, |then| {
            let altitude = then.airless_altitude(&then.apparent(source));
            altitude.angle() - then.rising_altitude(source)
        })
    }

    /// Every beginning (the Sun rising) and end of daylight brighter than a twilight.
    #[must_use]
    pub fn twilights(&self, twilight: Twilight, span_s: f64) -> Vec<Passage> {
        self.passages(span_s, |then| {
            let sun = then.apparent_body(Body::Sun);
            then.airless_altitude(&sun).angle() - twilight.altitude()
        })
    }

    /// Every crossing of the meridian, above and below the pole.
    #[must_use]
    pub fn transits(&self, source: &Source, span_s: f64) -> Vec<Transit> {
        let hour_angle = |after_s: f64| -> HourAngle {
            let then = self.later(after_s);
            then.apparent(source).hour_angle
        };
        // the sine of the hour angle goes through nothing at both
        let found = crossings(span_s, |after_s| {
            hour_angle(after_s).angle().radians().sin()
        });
        let transit = |crossing: Crossing| Transit {
            utc: self.utc().plus_seconds(crossing.after_s),
            upper: crossing.upward,
        };
        found.into_iter().map(transit).collect()
    }

    /// When a height goes through nothing from this moment on, within so many seconds, in order.
    #[must_use]
    pub fn passages(&self, span_s: f64, height: impl Fn(&Self) -> Angle) -> Vec<Passage> {
        let found = crossings(span_s, |after_s| height(&self.later(after_s)).radians());
        let passage = |crossing: Crossing| Passage {
            utc: self.utc().plus_seconds(crossing.after_s),
            rising: crossing.upward,
        };
        found.into_iter().map(passage).collect()
    }
}
