//! Windows against the slow way, and what is said where there are none.

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

fn prospect(almanac: &Almanac, horizon: &HorizonMask, mount: &Mount, target: &Target) -> Prospect {
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
