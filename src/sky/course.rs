//! The way of a place over the sky in one night, at little cost: its apparent place is worked out once (of what wanders
//! among the stars, every [`STEP_S`]), and from then on the sky only turns.
//!
//! Times are seconds from the moment the night is looked at from. Sidereal time runs evenly; precession, nutation and
//! aberration, which move a star by less than 0.5" in half a day, stand still. Refraction is that of [`refraction`], read
//! from a table.

use crate::angle::{Altitude, Angle, Declination, HourAngle, RightAscension};
use crate::sky::moment::Moment;
use crate::sky::place::{Apparent, Observed, Source};
use crate::sky::refraction;
use crate::sky::through_air::lifted;
use crate::sky::vector::{Vector, plus, spherical, unit};
use crate::time::sidereal;

/// What wanders is placed so often; between, it is taken to go straight: the Moon, whose place is bent most, by its
/// parallax, is within 1" of that.
const STEP_S: f64 = 600.0;

/// Refraction is tabulated from here up; below, nothing is seen and none is taken.
const LOWEST_DEG: f64 = -12.0;
/// So finely that a straight line between is within 0.5", near the horizon.
const TABLE_STEP_DEG: f64 = 0.1;

/// The sky as it turns over a site for a night.
#[derive(Clone, Debug)]
pub struct Turning {
    start: Moment,
    /// Half-way through.
    middle: Moment,
    span_s: f64,
    /// Refraction by true altitude.
    lifts: Vec<Angle>,
}

/// The way of one place.
#[derive(Clone, Debug)]
pub struct Course<'t> {
    turning: &'t Turning,
    way: Way,
}

#[derive(Clone, Debug)]
enum Way {
    /// It stays among the stars.
    Fixed(RightAscension, Declination),
    /// Directions in right ascension and declination, every [`STEP_S`].
    Moving(Vec<Vector>),
}

impl Turning {
    /// The sky from a moment on, for so many seconds (a day and a bit at most).
    #[must_use]
    pub fn new(start: &Moment, span_s: f64) -> Self {
        let air = start.observer().air;
        let steps = ((90.0 - LOWEST_DEG) / TABLE_STEP_DEG).round();
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // about a thousand
        let altitudes =
            (0..=steps as u32).map(|step| LOWEST_DEG + f64::from(step) * TABLE_STEP_DEG);
        let lift = |degrees| refraction::at_true(Altitude::from_degrees(degrees), air);
        Self {
            start: *start,
            middle: start.later(span_s / 2.0),
            span_s,
            lifts: altitudes.map(lift).collect(),
        }
    }

    /// The moment it begins.
    #[must_use]
    pub const fn start(&self) -> &Moment {
        &self.start
    }

    /// How long it is looked at, in seconds.
    #[must_use]
    pub const fn span_s(&self) -> f64 {
        self.span_s
    }

    /// How far the sky has turned.
    #[must_use]
    pub fn turned(after_s: f64) -> Angle {
        Angle::from_degrees(after_s * sidereal::DEGREES_PER_SECOND)
    }

    /// The way of a source.
    #[must_use]
    pub fn course(&self, source: &Source) -> Course<'_> {
        let way = match source {
            Source::Catalogue(_) => {
                let place = self.middle.apparent(source);
                Way::Fixed(place.right_ascension, place.declination)
            }
            Source::Body(_) | Source::Orbit(_) => {
                let steps = (self.span_s / STEP_S).ceil().max(1.0);
                #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // a span of days
                let times = (0..=steps as u32).map(|step| f64::from(step) * STEP_S);
                let direction = |after_s| {
                    let place = self.start.later(after_s).apparent(source);
                    unit(place.right_ascension.angle(), place.declination.angle())
                };
                Way::Moving(times.map(direction).collect())
            }
        };
        Course { turning: self, way }
    }

    fn lift(&self, airless: Altitude) -> Angle {
        let steps = (airless.degrees() - LOWEST_DEG) / TABLE_STEP_DEG;
        if steps < 0.0 {
            return Angle::ZERO;
        }
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // about a thousand
        let step = steps as usize;
        let at = |step| self.lifts.get(step).copied().unwrap_or_default();
        let (low, high) = (at(step), at(step + 1));
        low + (high - low) * steps.fract()
    }
}

impl Course<'_> {
    /// The apparent place after so many seconds.
    #[must_use]
    pub fn apparent(&self, after_s: f64) -> Apparent {
        let (right_ascension, declination) = match &self.way {
            Way::Fixed(ra, dec) => (*ra, *dec),
            Way::Moving(directions) => {
                let last = directions.len().saturating_sub(2) as f64;
                let step = (after_s / STEP_S).floor().clamp(0.0, last);
                #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // clamped
                let pair = directions.get(step as usize..).unwrap_or_default();
                let (from, to) = match pair {
                    [from, to, ..] => (*from, *to),
                    _ => ([1.0, 0.0, 0.0], [1.0, 0.0, 0.0]),
                };
                let way = plus(&to, -1.0, &from);
                let (ra, dec) = spherical(&plus(&from, after_s / STEP_S - step, &way));
                (RightAscension::new(ra), Declination::new(dec))
            }
        };
        let sidereal = self.turning.start.apparent_sidereal().angle() + Turning::turned(after_s);
        Apparent {
            hour_angle: HourAngle::new(sidereal - right_ascension.angle()),
            right_ascension,
            declination,
        }
    }

    /// The observed place after so many seconds.
    #[must_use]
    pub fn observed(&self, after_s: f64) -> Observed {
        let latitude = self.turning.start.observer().latitude;
        lifted(&self.apparent(after_s), latitude, |airless| {
            self.turning.lift(airless)
        })
    }

    /// When it first goes through an hour angle, if it stays among the stars and does so in the time looked at.
    #[must_use]
    pub fn first_at(&self, hour_angle: HourAngle) -> Option<f64> {
        if let Way::Moving(_) = self.way {
            return None;
        }
        let ahead = (hour_angle.angle() - self.apparent(0.0).hour_angle.angle()).wrapped_positive();
        let after_s = ahead.degrees() / sidereal::DEGREES_PER_SECOND;
        (after_s < self.turning.span_s).then_some(after_s)
    }

    /// The hour angle at which it stands at an airless altitude in the west, if it comes to stand there.
    #[must_use]
    pub fn western_hour_angle(&self, airless: Angle) -> Option<HourAngle> {
        let declination = self.apparent(self.turning.span_s / 2.0).declination.angle();
        let latitude = self.turning.start.observer().latitude.angle();
        let cosine = (airless.sin() - latitude.sin() * declination.sin())
            / (latitude.cos() * declination.cos());
        let stands = (-1.0..=1.0).contains(&cosine);
        stands.then(|| HourAngle::new(Angle::from_radians(cosine.acos())))
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::sky::samples::{any_direction, any_moment};
    use crate::sky::{Body, CataloguePlace};

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(100))]

        #[test]
        fn the_cheap_way_is_the_dear_one(
            moment in any_moment(), (ra, dec) in any_direction(), after_s in 0.0..86_400.0,
        ) {
            /// Nutation and aberration over half a day, the table, and the Moon's bent way.
            const APART_ARCSEC: f64 = 3.0;
            let turning = Turning::new(&moment, 86_400.0);
            let star = Source::Catalogue(CataloguePlace::icrs(ra, dec));
            for source in [star, Source::Body(Body::Moon), Source::Body(Body::Venus)] {
                let course = turning.course(&source);
                let then = moment.later(after_s);
                let (dear, cheap) = (then.observed(&then.apparent(&source)), course.observed(after_s));
                prop_assert!(dear.separation(&cheap).arcseconds() < APART_ARCSEC, "{source:?} {dear:?} {cheap:?}");
            }
        }
    }
}
