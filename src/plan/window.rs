//! When each object of a list can be had in a night, and from which side of the pier.
//!
//! A window is a time in which all of this holds: the object stands above the horizon mask and the mount's lowest altitude,
//! within the side's hour angles (its usual half of the sky, where the mount file states none), it is dark enough for its
//! kind, and a Moon that is up is far enough away ([`Needs`]). The margins are those of [`super::reaches`], on the cheap way of
//! [`Course`]: looked at every quarter of an hour and closed in on, so that what opens or closes for less than that,
//! behind a post, may be missed; ends of windows are right to a second or two.

use crate::angle::{Angle, HourAngle};
use crate::catalog::Target;
use crate::metal::Side;
use crate::plan::needs::Needs;
use crate::plan::night::{Almanac, Span};
use crate::plan::sides::Site;
use crate::plan::stand::Stand;
use crate::plan::why_not::{Floor, WhyNot};
use crate::sky::{Body, Course, Observed, Passage, Source, Turning, crossings_between, look_times};
use crate::time::Utc;

/// A time in which an object can be had from one side of the pier.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Window {
    /// The side.
    pub side: Side,
    /// From when until when.
    pub span: Span,
    /// How the axes stand then.
    pub stand: Stand,
}

/// What a night has for one object.
#[derive(Clone, Debug, PartialEq)]
pub struct Prospect {
    /// It first rises (level horizon).
    pub rise: Option<Utc>,
    /// It first crosses the upper meridian.
    pub transit: Option<Utc>,
    /// It first sets (level horizon).
    pub set: Option<Utc>,
    /// When it can be had, in order; by day, beyond the hours asked for and so on there is none.
    pub windows: Vec<Window>,
    /// Why there is no window, if there is none.
    pub why_not: Option<WhyNot>,
}

impl Prospect {
    /// Of something that has no place.
    #[must_use]
    pub const fn none(why_not: WhyNot) -> Self {
        Self {
            rise: None,
            transit: None,
            set: None,
            windows: Vec::new(),
            why_not: Some(why_not),
        }
    }
}

/// A site looking at one night.
#[derive(Clone, Debug)]
pub struct Watch<'a> {
    site: Site<'a>,
    almanac: &'a Almanac,
    turning: &'a Turning,
    moon: Course<'a>,
}

/// An object as it stands at one time.
struct Look {
    utc: Utc,
    after_s: f64,
    place: Observed,
}

/// An object under way, and the Moon.
struct Sight<'t> {
    object: Course<'t>,
    moon: &'t Course<'t>,
    from_moon: Angle,
}

fn lesser(a: Angle, b: Angle) -> Angle {
    if b < a { b } else { a }
}

impl Sight<'_> {
    /// How much farther the Moon is than it must be, or how far below the horizon; negative if it is too near.
    fn clear_of_moon(&self, place: &Observed, after_s: f64) -> Angle {
        if self.from_moon <= Angle::ZERO {
            return Angle::TURN;
        }
        let moon = self.moon.observed(after_s);
        let beyond = moon.separation(place) - self.from_moon;
        let below = -moon.altitude.angle();
        // either will do
        if beyond < below { below } else { beyond }
    }
}

impl<'a> Watch<'a> {
    /// A site looking at a night.
    #[must_use]
    pub fn new(site: Site<'a>, almanac: &'a Almanac) -> Self {
        let turning = almanac.turning();
        Self {
            site,
            almanac,
            turning,
            moon: turning.course(&Source::Body(Body::Moon)),
        }
    }

    /// What the night has for a target.
    #[must_use]
    pub fn prospect(&self, target: &Target) -> Prospect {
        let object = self.turning.course(&target.source);
        let [rise, transit, set] = self.rise_transit_set(&target.source, &object);
        let mut prospect = Prospect {
            rise,
            transit,
            set,
            windows: Vec::new(),
            why_not: None,
        };
        // of a list's own name for the Sun the kind may not be known
        let needs = Needs::of(target.kind).filter(|_| target.source != Source::Body(Body::Sun));
        let Some(needs) = needs else {
            prospect.why_not = Some(WhyNot::TheSun);
            return prospect;
        };
        let from_moon = if target.source == Source::Body(Body::Moon) {
            Angle::ZERO
        } else {
            needs.from_moon(self.almanac.moon.illuminated)
        };
        let sight = Sight {
            object,
            moon: &self.moon,
            from_moon,
        };
        prospect.windows = self.windows(&sight, needs);
        if prospect.windows.is_empty() {
            prospect.why_not = Some(self.why_not(&sight, needs));
        }
        prospect
    }

    fn after_s(&self, utc: Utc) -> f64 {
        utc.seconds_since(self.almanac.whole.from)
    }

    fn utc(&self, after_s: f64) -> Utc {
        self.almanac.whole.from.plus_seconds(after_s)
    }

    fn windows(&self, sight: &Sight<'_>, needs: Needs) -> Vec<Window> {
        let mut windows = Vec::new();
        for dark in self.almanac.dark_as_asked(needs.light) {
            let (start, span_s) = (self.after_s(dark.from), dark.seconds());
            let seen: Vec<(f64, Observed)> = look_times(span_s)
                .into_iter()
                .map(|at| (at, sight.object.observed(start + at)))
                .collect();
            for &side in self.site.sides() {
                let margin_of = |at: f64, place: &Observed| {
                    let within = self.site.within(side, place.hour_angle);
                    let margin = lesser(self.site.above(place), within);
                    if margin < Angle::ZERO {
                        // the Moon makes it no better
                        margin
                    } else {
                        lesser(margin, sight.clear_of_moon(place, start + at))
                    }
                };
                let margin = |at: f64| margin_of(at, &sight.object.observed(start + at));
                let looks: Vec<(f64, f64)> = seen
                    .iter()
                    .map(|(at, place)| (*at, margin_of(*at, place).radians()))
                    .collect();
                let passages = crossings_between(&looks, |at| margin(at).radians());
                let mut from = (margin(0.0) >= Angle::ZERO).then_some(0.0);
                let mut open = |from: f64, until: f64| {
                    let middle = start + f64::midpoint(from, until);
                    let place = sight.object.observed(middle);
                    windows.push(Window {
                        side,
                        span: Span {
                            from: self.utc(start + from),
                            until: self.utc(start + until),
                        },
                        stand: Stand::new(
                            &self.site,
                            self.turning.start().observer().latitude,
                            side,
                            &place,
                            middle,
                        ),
                    });
                };
                for passage in passages {
                    if passage.upward {
                        from = Some(passage.after_s);
                    } else if let Some(from) = from.take() {
                        open(from, passage.after_s);
                    }
                }
                if let Some(from) = from {
                    open(from, span_s);
                }
            }
        }
        windows.sort_by_key(|window| window.span.from.chrono());
        windows
    }

    fn rise_transit_set(&self, source: &Source, course: &Course<'_>) -> [Option<Utc>; 3] {
        let (start, span_s) = (self.turning.start(), self.turning.span_s());
        if let Source::Body(_) | Source::Orbit(_) = source {
            let passages = start.rises_and_sets(source, span_s);
            let first = |rising| {
                let found = passages
                    .iter()
                    .find(|passage: &&Passage| passage.rising == rising);
                found.map(|passage| passage.utc)
            };
            let transits = start.transits(source, span_s);
            let transit = transits.iter().find(|transit| transit.upper);
            return [
                first(true),
                transit.map(|transit| transit.utc),
                first(false),
            ];
        }
        let west = course.western_hour_angle(start.rising_altitude(source));
        let at = |hour_angle| course.first_at(hour_angle).map(|after_s| self.utc(after_s));
        let rise = west.and_then(|west| at(HourAngle::new(-west.angle())));
        [rise, at(HourAngle::default()), west.and_then(at)]
    }

    /// Why there is no window, from looks at the whole night.
    fn why_not(&self, sight: &Sight<'_>, needs: Needs) -> WhyNot {
        /// As often as the windows are looked for.
        const LOOK_S: f64 = 900.0;
        let (almanac, light) = (self.almanac, needs.light);
        if almanac.dark(light).is_empty() {
            return WhyNot::NeverDark(light);
        }
        if almanac.dark_as_asked(light).next().is_none() {
            return WhyNot::NotDarkThen(light);
        }
        let looks = (self.turning.span_s() / LOOK_S).ceil();
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // a span of days
        let times = (0..=looks as u32).map(|look| f64::from(look) * LOOK_S);
        let looks: Vec<Look> = times
            .map(|at| Look {
                utc: self.utc(at),
                after_s: at,
                place: sight.object.observed(at),
            })
            .collect();
        let up = |look: &Look| self.site.above(&look.place) >= Angle::ZERO;
        let dark = |utc: Utc| almanac.dark(light).iter().any(|span| span.holds(utc));
        let reached = |look: &Look| {
            let within =
                |side: &Side| self.site.within(*side, look.place.hour_angle) >= Angle::ZERO;
            self.site.sides().iter().any(within)
        };
        let clear = |look: &Look| sight.clear_of_moon(&look.place, look.after_s);
        let mut left: Vec<&Look> = looks.iter().filter(|look| up(look)).collect();
        if left.is_empty() {
            return self.never_up(&looks);
        }
        left.retain(|look| dark(look.utc));
        if left.is_empty() {
            return WhyNot::UpInLight(light);
        }
        left.retain(|look| reached(look));
        if left.is_empty() {
            return WhyNot::Limits;
        }
        let farthest = left.iter().map(|look| sight.from_moon + clear(look)).fold(
            Angle::ZERO,
            |far, apart| if apart > far { apart } else { far },
        );
        left.retain(|look| clear(look) >= Angle::ZERO);
        if left.is_empty() {
            return WhyNot::NearMoon {
                apart: farthest,
                illuminated: almanac.moon.illuminated,
            };
        }
        left.retain(|look| almanac.asked.holds(look.utc));
        if left.is_empty() {
            WhyNot::OtherHours
        } else {
            WhyNot::Minutes
        }
    }

    /// What is in the way of something never above its floor: at the look where the least is missing.
    fn never_up(&self, looks: &[Look]) -> WhyNot {
        let above = |look: &Look| self.site.above(&look.place).radians();
        let best = looks.iter().max_by(|a, b| above(a).total_cmp(&above(b)));
        let Some(Look { place, .. }) = best else {
            return WhyNot::Minutes;
        };
        let mask = self.site.horizon.altitude_at(place.azimuth);
        let lowest = self.site.mount.limits.lowest_altitude;
        let floor = if place.altitude.degrees() < 0.0 {
            Floor::Level
        } else if let Some(lowest) = lowest.filter(|lowest| *lowest > mask) {
            Floor::Mount(lowest)
        } else {
            Floor::Mask(mask)
        };
        WhyNot::NeverUp {
            altitude: place.altitude,
            azimuth: place.azimuth,
            floor,
        }
    }
}

#[cfg(test)]
mod tests;
