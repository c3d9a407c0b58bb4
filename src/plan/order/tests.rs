//! The order against an exhaustive search that shares nothing with it but the stated price.

use proptest::prelude::*;

use super::route::Route;
use super::*;
use crate::angle::{Altitude, Azimuth, Declination, HourAngle, Latitude};
use crate::metal::{Kind, Limits, Side};
use crate::plan::night::Span;
use crate::plan::samples::{mount, span};
use crate::plan::sides::Site;
use crate::sky::{HorizonMask, Observed};

const HOUR_S: f64 = 3600.0;
const DEGREES_PER_HOUR: f64 = 15.041_068_6;
/// An object is up so long on either side of its transit, and either side of the pier reaches so far past the meridian.
const UP_H: f64 = 5.0;
const PAST_H: f64 = 40.0 / 60.0;

/// An object that crosses the meridian so many hours after noon at a declination, in a night from one hour to another.
fn windows(transit_h: f64, dec_deg: f64, night_h: (f64, f64)) -> Vec<Window> {
    let limits = Limits {
        lowest_altitude: None,
        tube_west: Some(span(-7.0, PAST_H)),
        tube_east: Some(span(-PAST_H, 7.0)),
    };
    let (horizon, mount) = (HorizonMask::default(), mount(Kind::German, limits));
    let site = Site {
        horizon: &horizon,
        mount: &mount,
    };
    let mut windows = Vec::new();
    for (side, from, until) in [
        (Side::TubeWest, transit_h - UP_H, transit_h + PAST_H),
        (Side::TubeEast, transit_h - PAST_H, transit_h + UP_H),
    ] {
        let (from, until) = (from.max(night_h.0), until.min(night_h.1));
        if from >= until {
            continue;
        }
        let middle = f64::midpoint(from, until);
        let place = Observed {
            hour_angle: HourAngle::from_degrees((middle - transit_h) * DEGREES_PER_HOUR),
            declination: Declination::from_degrees(dec_deg),
            azimuth: Azimuth::default(),
            altitude: Altitude::default(),
            refraction: Angle::ZERO,
        };
        let latitude = Latitude::from_degrees(50.0);
        windows.push(Window {
            side,
            span: Span {
                from: noon().plus_seconds(from * HOUR_S),
                until: noon().plus_seconds(until * HOUR_S),
            },
            stand: Stand::new(&site, latitude, side, &place, middle * HOUR_S),
        });
    }
    windows
}

fn noon() -> Utc {
    Utc::parse("2026-12-01T12:00:00Z").unwrap()
}

fn list(objects: &[Vec<Window>], each_s: f64) -> List {
    List::new(objects.iter().map(Vec::as_slice), noon(), each_s)
}

fn any_objects(most: usize) -> impl Strategy<Value = (Vec<Vec<Window>>, f64)> {
    let places = prop::collection::vec((0.0..24.0, -25.0..80.0), 1..=most);
    (places, 0.2..12.0, 5.0..60.0).prop_map(
        |(places, long_h, each_min): (Vec<(f64, f64)>, f64, f64)| {
            let night = (6.0, 6.0 + long_h);
            let objects = places
                .iter()
                .map(|&(transit, dec)| windows(transit, dec, night));
            (objects.collect(), each_min * 60.0)
        },
    )
}

/// The best that any order of any of the objects comes to: how many are lost, and the price; by trying them all.
struct Exhaustive<'w> {
    objects: Vec<&'w [Window]>,
    each_s: f64,
    begins: Utc,
    best: (usize, f64),
}

impl<'w> Exhaustive<'w> {
    fn search(objects: &'w [Vec<Window>], each_s: f64) -> (usize, f64) {
        let objects: Vec<&[Window]> = objects
            .iter()
            .filter(|w| !w.is_empty())
            .map(Vec::as_slice)
            .collect();
        let begins = objects
            .iter()
            .copied()
            .flatten()
            .map(|window| window.span.from)
            .min();
        let mut search = Self {
            best: (objects.len(), 0.0),
            objects,
            each_s,
            begins: begins.unwrap_or(noon()),
        };
        let mut left: Vec<usize> = (0..search.objects.len()).collect();
        search.go(&mut left, None, 0.0, 0);
        search.best
    }

    fn go(
        &mut self,
        left: &mut Vec<usize>,
        last: Option<(Window, Utc)>,
        price_deg: f64,
        taken: usize,
    ) {
        if let Some((_, begun)) = last {
            let waited = begun.seconds_since(self.begins) - self.each_s * (taken - 1) as f64;
            let here = (left.len(), price_deg + 3.0 * waited / 60.0);
            if here.0 < self.best.0 || (here.0 == self.best.0 && here.1 < self.best.1) {
                self.best = here;
            }
        }
        // no price grows less on the way
        if self.best.0 == 0 && price_deg >= self.best.1 {
            return;
        }
        for place in 0..left.len() {
            let object = left.remove(place);
            for &window in self.objects[object] {
                let least = self.begins.plus_seconds(self.each_s * taken as f64);
                let free = last.map_or(window.span.from, |(_, begun)| {
                    begun.plus_seconds(self.each_s)
                });
                let begun = free.max(window.span.from);
                if begun > window.span.until {
                    continue;
                }
                let way = last.map_or(0.0, |(before, _)| {
                    let swing = before.stand.swing_to(&window.stand);
                    let turn = if before.side == window.side {
                        0.0
                    } else {
                        90.0
                    };
                    swing.hour.degrees().abs() + swing.dec.degrees().abs() + turn
                });
                let delay = 0.2 * begun.seconds_since(least) / 60.0;
                self.go(
                    left,
                    Some((window, begun)),
                    price_deg + way + delay,
                    taken + 1,
                );
            }
            left.insert(place, object);
        }
    }
}

fn assert_can_be_taken(objects: &[Vec<Window>], each_s: f64, stops: &[Stop]) {
    /// Instants are kept to the nanosecond.
    const ROUNDING_S: f64 = 1e-6;
    let mut free = f64::NEG_INFINITY;
    let mut seen = std::collections::HashSet::new();
    for stop in stops {
        let window = &objects[stop.object][stop.window];
        let (from, until) = (window.span.from, window.span.until);
        assert!(seen.insert(stop.object), "{stops:?}");
        assert!(
            stop.at_s >= from.seconds_since(noon()) - ROUNDING_S,
            "{stop:?}"
        );
        assert!(
            stop.at_s <= until.seconds_since(noon()) + ROUNDING_S,
            "{stop:?}"
        );
        assert!(stop.at_s >= free - ROUNDING_S, "{stops:?}");
        free = stop.at_s + each_s;
    }
}

fn is(tally: Tally, best: (usize, f64)) -> bool {
    /// Sums in another order, and instants to the nanosecond.
    const ROUNDING_DEG: f64 = 1e-5;
    tally.lost == best.0 && (tally.price_deg() - best.1).abs() < ROUNDING_DEG
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(60))]

    #[test]
    fn a_short_list_gets_the_best_order_there_is((objects, each_s) in any_objects(6)) {
        let list = list(&objects, each_s);
        let stops = list.in_order();
        assert_can_be_taken(&objects, each_s, &stops);
        let best = Exhaustive::search(&objects, each_s);
        prop_assert!(is(list.tally(&stops), best), "{:?} {:?}", list.tally(&stops), best);
    }

    #[test]
    fn no_order_is_worse_than_the_one_given((objects, each_s) in any_objects(45)) {
        let list = list(&objects, each_s);
        let (given, best) = (list.as_given(), list.in_order());
        assert_can_be_taken(&objects, each_s, &given);
        assert_can_be_taken(&objects, each_s, &best);
        prop_assert!(given.windows(2).all(|pair| pair[0].object < pair[1].object));
        let (given, best) = (list.tally(&given), list.tally(&best));
        prop_assert!(!given.is_better_than(&best), "{given:?} {best:?}");
        prop_assert_eq!(list.in_order(), list.in_order());
    }

    #[test]
    fn in_the_order_given_no_more_can_be_taken_and_from_no_cheaper_sides((objects, each_s) in any_objects(6)) {
        let list = list(&objects, each_s);
        let given = list.as_given();
        // every subset in its order, every choice of windows
        let with: Vec<usize> = (0..objects.len()).filter(|&object| !objects[object].is_empty()).collect();
        let mut most = 0;
        let mut least = f64::INFINITY;
        let same: Vec<usize> = given.iter().map(|stop| stop.object).collect();
        for set in 0..1_usize << with.len() {
            let chosen: Vec<usize> = with.iter().enumerate().filter(|(bit, _)| set >> bit & 1 == 1).map(|(_, &o)| o).collect();
            for choice in 0..1_usize << chosen.len() {
                let mut free = f64::NEG_INFINITY;
                let stops: Option<Vec<Stop>> = chosen.iter().enumerate().map(|(bit, &object)| {
                    let window = choice >> bit & 1;
                    let opening = list.opening(object, window)?;
                    let at_s = free.max(opening.from);
                    free = at_s + each_s;
                    (at_s <= opening.until).then_some(Stop { object, window, at_s })
                }).collect();
                let Some(stops) = stops else { continue };
                most = most.max(stops.len());
                if chosen == same {
                    least = least.min(list.tally(&stops).price_deg());
                }
            }
        }
        prop_assert_eq!(given.len(), most);
        prop_assert!(given.is_empty() || (list.tally(&given).price_deg() - least).abs() < 1e-6);
    }

    #[test]
    fn every_change_of_a_route_makes_it_better((objects, each_s) in any_objects(25)) {
        let list = list(&objects, each_s);
        let mut route = Route::new(&list, given::route(&list));
        let mut out: Vec<usize> = search::left_out(&route);
        for _ in 0..3 {
            let changes: [&mut dyn FnMut(&mut Route<'_>) -> bool; 5] = [
                &mut |route| route.put_in(&mut out),
                &mut |route| route.move_few(),
                &mut |route| route.turn_round(),
                &mut |route| route.take_from_elsewhere(),
                &mut |route| route.take_others(&mut search::left_out(route)),
            ];
            for (number, change) in changes.into_iter().enumerate() {
                let before = route.clone();
                let did = change(&mut route);
                // what is kept of the route is what it is worked out to be from its stops
                let stops = list.stops(&route.nodes);
                assert_can_be_taken(&objects, each_s, &stops);
                prop_assert!((route.price() - list.tally(&stops).price_deg()).abs() < 1e-6);
                prop_assert_eq!(did, route.is_better_than(&before), "{} {} {}", number, before.price(), route.price());
            }
            out = search::left_out(&route);
        }
    }

    #[test]
    fn a_route_a_search_ends_on_can_be_taken((objects, each_s) in any_objects(25)) {
        let list = list(&objects, each_s);
        let stops = list.stops(&search::route(&list));
        assert_can_be_taken(&objects, each_s, &stops);
    }
}

/// Lists that are the same in every run.
fn some_list(number: usize, length: usize, night_h: (f64, f64)) -> Vec<Vec<Window>> {
    let spread = |seed: f64| (seed * 0.618_033_988_749_895).fract();
    let object = |place: usize| {
        let seed = (number * 1009 + place * 31 + 7) as f64;
        windows(
            24.0 * spread(seed),
            -25.0 + 105.0 * spread(seed * 7.31),
            night_h,
        )
    };
    (0..length).map(object).collect()
}

#[test]
fn nine_objects_get_the_best_order_there_is() {
    for number in 0..3 {
        let objects = some_list(number, 9, (6.0, 16.0));
        let (list, best) = (list(&objects, 600.0), Exhaustive::search(&objects, 600.0));
        let tally = list.tally(&list.in_order());
        assert!(is(tally, best), "{number}: {tally:?} {best:?}");
    }
}

#[test]
fn the_search_alone_finds_the_best_order_of_nearly_every_short_list() {
    /// Of the lists.
    const ENOUGH: f64 = 0.95;
    const LISTS: usize = 150;
    let mut found = 0;
    for number in 0..LISTS {
        let night = (6.0, 8.0 + (number % 10) as f64);
        let list = list(&some_list(number, 4 + number % 6, night), 900.0);
        let price = |route: &[Node]| list.tally(&list.stops(route));
        let (exact, search) = (price(&exact::route(&list)), price(&search::route(&list)));
        assert!(
            !search.is_better_than(&exact),
            "{number}: {search:?} {exact:?}"
        );
        found += usize::from(!exact.is_better_than(&search));
    }
    assert!(found as f64 >= ENOUGH * LISTS as f64, "{found} of {LISTS}");
}

#[test]
fn what_sets_early_is_taken_first_and_what_comes_late_is_waited_for() {
    let early = windows(2.0, 10.0, (6.0, 18.0));
    let late = windows(20.0, 40.0, (6.0, 18.0));
    let objects = [late, early];
    let list = list(&objects, 300.0);
    let stops = list.in_order();
    assert_eq!(
        stops.iter().map(|stop| stop.object).collect::<Vec<_>>(),
        [1, 0]
    );
    assert!((stops[1].at_s - 15.0 * HOUR_S).abs() < 1.0, "{stops:?}");
    // in the order given the late one is not waited for in vain: the early one is gone by then
    assert_eq!(list.tally(&list.as_given()).lost, 1);
}

#[test]
fn nothing_to_be_had_is_an_empty_order() {
    let list = list(&[Vec::new(), Vec::new()], 300.0);
    assert!(list.in_order().is_empty() && list.as_given().is_empty());
    assert_eq!(list.tally(&[]), Tally::default());
}
