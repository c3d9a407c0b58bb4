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
use crate::sky::{Body, Course, Observed, Passage, Source, Turning, crossings};
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

/// What is seen of an object at one time.
struct Look {
    place: Observed,
    /// How far the Moon is too far away to matter; negative if it is too near.
    clear_of_moon: Angle,
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
    fn look(&self, after_s: f64) -> Look {
        let place = self.object.observed(after_s);
        let clear_of_moon = if self.from_moon > Angle::ZERO {
            let moon = self.moon.observed(after_s);
            let beyond = moon.separation(&place) - self.from_moon;
            let below = -moon.altitude.angle();
            // either will do
            if beyond < below { below } else { beyond }
        } else {
            Angle::TURN
        };
        Look {
            place,
            clear_of_moon,
        }
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
            for &side in self.site.sides() {
                let margin = |at: f64| {
                    let look = sight.look(start + at);
                    let within = self.site.within(side, look.place.hour_angle);
                    lesser(
                        lesser(self.site.above(&look.place), within),
                        look.clear_of_moon,
                    )
                };
                let passages = crossings(span_s, |at| margin(at).radians());
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
        if let Source::Body(_) = source {
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
        let looks: Vec<(Utc, Look)> = times.map(|at| (self.utc(at), sight.look(at))).collect();
        let up = |look: &Look| self.site.above(&look.place) >= Angle::ZERO;
        let dark = |utc: Utc| almanac.dark(light).iter().any(|span| span.holds(utc));
        let reached = |look: &Look| {
            let within =
                |side: &Side| self.site.within(*side, look.place.hour_angle) >= Angle::ZERO;
            self.site.sides().iter().any(within)
        };
        let mut left: Vec<&(Utc, Look)> = looks.iter().filter(|(_, look)| up(look)).collect();
        if left.is_empty() {
            return self.never_up(&looks);
        }
        left.retain(|(utc, _)| dark(*utc));
        if left.is_empty() {
            return WhyNot::UpInLight(light);
        }
        left.retain(|(_, look)| reached(look));
        if left.is_empty() {
            return WhyNot::Limits;
        }
        let farthest = left
            .iter()
            .map(|(_, look)| sight.from_moon + look.clear_of_moon)
            .fold(
                Angle::ZERO,
                |far, apart| if apart > far { apart } else { far },
            );
        left.retain(|(_, look)| look.clear_of_moon >= Angle::ZERO);
        if left.is_empty() {
            return WhyNot::NearMoon {
                apart: farthest,
                illuminated: almanac.moon.illuminated,
            };
        }
        left.retain(|(utc, _)| almanac.asked.holds(*utc));
        if left.is_empty() {
            WhyNot::OtherHours
        } else {
            WhyNot::Minutes
        }
    }

    /// What is in the way of something never above its floor: at the look where the least is missing.
    fn never_up(&self, looks: &[(Utc, Look)]) -> WhyNot {
        let above = |look: &Look| self.site.above(&look.place).radians();
        let best = looks
            .iter()
            .max_by(|(_, a), (_, b)| above(a).total_cmp(&above(b)));
        let Some((_, Look { place, .. })) = best else {
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
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::angle::{Altitude, Azimuth, Declination, Latitude, Longitude, RightAscension};
    use crate::catalog::{Kind, Origin};
    use crate::metal::{Kind as MountKind, Limits, Mount};
    use crate::plan::reaches;
    use crate::plan::samples::{mount, span};
    use crate::sky::{Air, CataloguePlace, HorizonMask, Observer, Twilight, separation};
    use crate::time::{CivilZone, Dut1};

    fn observer(latitude: f64) -> Observer {
        Observer {
            latitude: Latitude::from_degrees(latitude),
            longitude: Longitude::default(),
            elevation_m: 0.0,
            dut1: Dut1::default(),
            air: Air::standard(0.0),
        }
    }

    fn almanac(latitude: f64, night: &str) -> Almanac {
        Almanac::of(&observer(latitude), CivilZone::UTC, night.parse().unwrap()).unwrap()
    }

    fn target(kind: Kind, source: Source) -> Target {
        Target {
            name: "trial".to_owned(),
            also: Vec::new(),
            kind,
            source,
            magnitude: None,
            size_arcmin: None,
            constellation: None,
            catalogue: Origin::Given,
            note: String::new(),
        }
    }

    fn star(kind: Kind, ra_deg: f64, dec_deg: f64) -> Target {
        let place = CataloguePlace::icrs(
            RightAscension::from_degrees(ra_deg),
            Declination::from_degrees(dec_deg),
        );
        target(kind, Source::Catalogue(place))
    }

    fn body(body: Body) -> Target {
        let kind = match body {
            Body::Sun => Kind::Sun,
            Body::Moon => Kind::Moon,
            _ => Kind::Planet,
        };
        target(kind, Source::Body(body))
    }

    fn german() -> Mount {
        let limits = Limits {
            lowest_altitude: Some(Altitude::from_degrees(12.0)),
            tube_west: Some(span(-7.0, 0.7)),
            tube_east: Some(span(-0.7, 7.0)),
        };
        mount(MountKind::German, limits)
    }

    fn prospect(
        almanac: &Almanac,
        horizon: &HorizonMask,
        mount: &Mount,
        target: &Target,
    ) -> Prospect {
        let site = Site { horizon, mount };
        Watch::new(site, almanac).prospect(target)
    }

    fn hills() -> HorizonMask {
        let points = [(0.0, 8.0), (90.0, 12.0), (180.0, 5.0), (270.0, 15.0)];
        let point = |(az, alt)| (Azimuth::from_degrees(az), Altitude::from_degrees(alt));
        HorizonMask::new(points.map(point).to_vec())
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(60))]

        #[test]
        fn windows_are_those_of_the_slow_way(
            latitude in -65.0..65.0,
            day in 0_i64..3000,
            (ra_deg, dec_deg) in (0.0..360.0, -85.0..85.0),
            which in 0_usize..4,
            kind in prop::sample::select(vec![MountKind::German, MountKind::Fork]),
            limited in any::<bool>(),
        ) {
            /// What half a day's nutation and aberration and the table of refraction do to a star that crosses a level
            /// at a slant, in seconds.
            const APART_S: f64 = 5.0;
            let date = chrono::NaiveDate::from_ymd_opt(2024, 1, 1).unwrap() + chrono::TimeDelta::days(day);
            let night = crate::time::Night::of_evening(date);
            let almanac = Almanac::of(&observer(latitude), CivilZone::UTC, night).unwrap();
            let target = match which {
                0 => body(Body::Moon),
                1 => body(Body::Venus),
                _ => star(Kind::Star, ra_deg, dec_deg),
            };
            let limits = if limited { german().limits } else { Limits::default() };
            let (horizon, mount) = (hills(), mount(kind, limits));
            let fast = prospect(&almanac, &horizon, &mount, &target).windows;
            let site = Site { horizon: &horizon, mount: &mount };
            let mut slow = Vec::new();
            for dark in almanac.dark_as_asked(Twilight::Civil) {
                let moment = almanac.noon().later(dark.from.seconds_since(almanac.whole.from));
                slow.extend(reaches(&site, &moment, dark.seconds(), &target.source));
            }
            // what touches a level for a minute may be seen by the one and not by the other
            let long = |from: Utc, until: Utc| until.seconds_since(from) > 120.0;
            let fast: Vec<&Window> = fast.iter().filter(|w| long(w.span.from, w.span.until)).collect();
            let slow: Vec<_> = slow.iter().filter(|r| long(r.from, r.until)).collect();
            prop_assert_eq!(fast.len(), slow.len(), "{:?} {:?}", fast, slow);
            for reach in slow {
                let near = |window: &&&Window| {
                    let off = |a: Utc, b: Utc| a.seconds_since(b).abs();
                    window.side == reach.side
                        && off(window.span.from, reach.from) < APART_S
                        && off(window.span.until, reach.until) < APART_S
                };
                prop_assert!(fast.iter().any(|window| near(&window)), "{:?} {:?}", reach, fast);
            }
        }

        #[test]
        fn in_every_window_all_holds_that_must(
            latitude in -65.0..65.0,
            day in 0_i64..3000,
            (ra_deg, dec_deg) in (0.0..360.0, -85.0..85.0),
            kind in prop::sample::select(vec![Kind::Galaxy, Kind::OpenCluster, Kind::DoubleStar]),
            part in 0.001..0.999,
        ) {
            /// A few seconds at the ends, in altitude and distance.
            const SLACK_DEG: f64 = 0.02;
            let date = chrono::NaiveDate::from_ymd_opt(2024, 1, 1).unwrap() + chrono::TimeDelta::days(day);
            let night = crate::time::Night::of_evening(date);
            let almanac = Almanac::of(&observer(latitude), CivilZone::UTC, night).unwrap();
            let (horizon, mount, target) = (hills(), german(), star(kind, ra_deg, dec_deg));
            let needs = Needs::of(kind).unwrap();
            for window in prospect(&almanac, &horizon, &mount, &target).windows {
                let at = window.span.from.seconds_since(almanac.whole.from) + part * window.span.seconds();
                let then = almanac.noon().later(at);
                let place = then.observed(&then.apparent(&target.source));
                let sun = then.airless_altitude(&then.apparent_body(Body::Sun));
                prop_assert!(sun.degrees() < needs.light.altitude().degrees() + SLACK_DEG);
                prop_assert!(!then.sun_is_up());
                prop_assert!(place.altitude.degrees() > 12.0 - SLACK_DEG);
                prop_assert!(place.altitude.degrees() > horizon.altitude_at(place.azimuth).degrees() - SLACK_DEG);
                prop_assert!(mount.limits.reachable(
                    HourAngle::new(place.hour_angle.angle() * (1.0 - SLACK_DEG / 90.0)), window.side));
                let moon = then.moon();
                let needed = needs.from_moon(almanac.moon.illuminated).degrees();
                prop_assert!(
                    moon.altitude.degrees() < SLACK_DEG
                        || moon.separation(&place).degrees() > needed - SLACK_DEG
                );
            }
        }

        #[test]
        fn rise_transit_and_set_are_those_of_the_slow_way(
            latitude in -80.0..80.0, day in 0_i64..3000, (ra_deg, dec_deg) in (0.0..360.0, -89.0..89.0),
        ) {
            /// As above; a star that just grazes the horizon moves along it.
            const APART_S: f64 = 20.0;
            let date = chrono::NaiveDate::from_ymd_opt(2024, 1, 1).unwrap() + chrono::TimeDelta::days(day);
            let night = crate::time::Night::of_evening(date);
            let almanac = Almanac::of(&observer(latitude), CivilZone::UTC, night).unwrap();
            let (horizon, mount, target) = (hills(), german(), star(Kind::Star, ra_deg, dec_deg));
            let found = prospect(&almanac, &horizon, &mount, &target);
            let (noon, span_s) = (almanac.noon(), almanac.whole.seconds());
            let passages = noon.rises_and_sets(&target.source, span_s);
            let first = |rising| passages.iter().find(|p| p.rising == rising).map(|p| p.utc);
            let transit = noon.transits(&target.source, span_s).into_iter().find(|t| t.upper).map(|t| t.utc);
            // at the very ends of the night the one may have it within and the other without
            let inner = |utc: Utc| {
                let at = utc.seconds_since(almanac.whole.from);
                (60.0..span_s - 300.0).contains(&at)
            };
            for (fast, slow) in [(found.rise, first(true)), (found.set, first(false)), (found.transit, transit)] {
                if fast.into_iter().chain(slow).all(inner) {
                    let off = fast.zip(slow).map(|(a, b)| a.seconds_since(b).abs());
                    prop_assert!(fast.is_none() == slow.is_none() && off.unwrap_or_default() < APART_S, "{fast:?} {slow:?}");
                }
            }
        }
    }

    fn said(almanac: &Almanac, target: &Target) -> String {
        let found = prospect(almanac, &hills(), &german(), target);
        assert!(found.windows.is_empty(), "{found:?}");
        found.why_not.unwrap().to_string()
    }

    #[test]
    fn why_there_is_no_window_is_said_in_plain_words() {
        let winter = almanac(54.5, "2026-12-01");
        let of = |dec| said(&winter, &star(Kind::Star, 80.0, dec));
        assert_eq!(
            of(-60.0),
            "never rises: at its highest 24° below the horizon in the south"
        );
        // culminates at 35.5° - 25° = 10.5°, where the mask stands to 5°, but the mount goes no lower than 12°
        assert_eq!(
            of(-25.0),
            "never high enough for the mount: at best at 11° in the south, and it goes no lower than 12°"
        );
        assert_eq!(
            said(&winter, &body(Body::Sun)),
            "the Sun is not for the night"
        );
        // Mercury is a morning star that winter; a star beside the Sun is up by day alone
        assert_eq!(
            said(&winter, &star(Kind::Star, 247.0, -8.0)),
            "not dark enough: up only by day or before civil twilight has ended"
        );
        let white = almanac(54.5, "2026-06-21");
        assert_eq!(
            said(&white, &star(Kind::Galaxy, 200.0, 50.0)),
            "not dark enough: the Sun stays less than 18° below the horizon all night"
        );
        let evening = winter
            .clone()
            .narrowed(
                None,
                Some(crate::time::Utc::parse("2026-12-01T19:00:00Z").unwrap()),
            )
            .unwrap();
        // Regulus rises about 22h
        assert_eq!(
            said(&evening, &star(Kind::Star, 152.1, 12.0)),
            "not to be had in the hours asked for"
        );
    }

    #[test]
    fn behind_trees_the_mask_is_named() {
        let almanac = almanac(54.5, "2026-12-01");
        let trees = [(0.0, 9.0), (359.0, 9.0)]
            .map(|(az, alt)| (Azimuth::from_degrees(az), Altitude::from_degrees(alt)));
        let (trees, fork) = (
            HorizonMask::new(trees.to_vec()),
            mount(MountKind::Fork, Limits::default()),
        );
        let found = prospect(&almanac, &trees, &fork, &star(Kind::Star, 80.0, -31.5));
        assert_eq!(
            found.why_not.unwrap().to_string(),
            "never above the mask: at best at 4° in the south, where it stands to 9°"
        );
    }

    #[test]
    fn a_galaxy_near_a_full_moon_is_not_to_be_had_and_a_double_is() {
        // full Moon 2026 December 24 01:28 UT (from memory)
        let almanac = almanac(54.5, "2026-12-23");
        assert!(almanac.moon.illuminated > 0.99);
        let moon = almanac.noon().later(43_200.0).apparent_body(Body::Moon);
        let beside = (
            moon.right_ascension.degrees() + 5.0,
            moon.declination.degrees(),
        );
        let galaxy = star(Kind::Galaxy, beside.0, beside.1);
        let text = said(&almanac, &galaxy);
        assert!(
            text.starts_with("within ") && text.contains("of a bright Moon, lit to 100 %"),
            "{text}"
        );
        let double = star(Kind::DoubleStar, beside.0, beside.1);
        assert!(
            !prospect(&almanac, &hills(), &german(), &double)
                .windows
                .is_empty()
        );
        let apart = separation(
            (
                Angle::from_degrees(beside.0),
                Declination::from_degrees(beside.1),
            ),
            (moon.right_ascension.angle(), moon.declination),
        );
        assert!(apart.degrees() < 6.0);
    }
}
