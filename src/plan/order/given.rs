//! A list in the order it is given: which objects to leave out so that as few as can be are lost, and from which side to
//! take each.

use crate::plan::order::route::Node;
use crate::plan::order::way::{Way, keep};
use crate::plan::order::{List, delay_price, price_between, waiting_price};

/// So many ways of having come to an object are kept, the cheapest and the earliest; there are seldom more than a few that
/// are neither later nor dearer than another.
const MOST_WAYS: usize = 48;

/// As many objects as can be had in the order given, in the cheapest way found.
pub(super) fn route(list: &List) -> Vec<Node> {
    best_windows(list, &most(list))
}

/// As many objects as can be had in the order given.
///
/// To have taken so many as early as can be is never worse than to have taken them later: by the objects in turn, that
/// moment is kept for every number taken.
fn most(list: &List) -> Vec<usize> {
    let mut free = vec![f64::NEG_INFINITY];
    let mut took: Vec<Vec<bool>> = Vec::with_capacity(list.objects.len());
    for openings in &list.objects {
        let mut took_here = vec![false; free.len() + 1];
        free.push(f64::INFINITY);
        for taken in (1..free.len()).rev() {
            let Some(&before) = free.get(taken - 1) else {
                continue;
            };
            let begun = openings
                .iter()
                .map(|opening| (before.max(opening.from), opening.until));
            let earliest = begun
                .filter(|(at, until)| at <= until)
                .map(|(at, _)| at + list.each_s)
                .fold(f64::INFINITY, f64::min);
            if let (Some(free), Some(took)) = (free.get_mut(taken), took_here.get_mut(taken))
                && earliest < *free
            {
                (*free, *took) = (earliest, true);
            }
        }
        if free.last() == Some(&f64::INFINITY) {
            free.pop();
        }
        took.push(took_here);
    }
    let mut taken = free.len() - 1;
    let mut chosen = Vec::with_capacity(taken);
    for (object, took) in took.iter().enumerate().rev() {
        if took.get(taken) == Some(&true) {
            chosen.push(object);
            taken -= 1;
        }
    }
    chosen.reverse();
    chosen
}

/// The windows to take objects in, in this order, so that the price is least; nothing if they cannot all be taken in it.
pub(super) fn best_windows(list: &List, objects: &[usize]) -> Vec<Node> {
    let mut ways: Vec<Vec<Way>> = Vec::with_capacity(objects.len());
    for (taken, &object) in objects.iter().enumerate() {
        let mut here: Vec<Way> = Vec::new();
        for node in list.nodes(object) {
            let mut arrive = |free: f64, price: f64, before: usize| {
                let at = free.max(node.from);
                let way = Way {
                    node,
                    ends: at + list.each_s,
                    price: price + delay_price(list.delay(at, taken)),
                    before,
                };
                if at <= node.until {
                    keep(&mut here, way);
                }
            };
            match ways.last() {
                None => arrive(f64::NEG_INFINITY, 0.0, 0),
                Some(earlier) => {
                    for (before, way) in earlier.iter().enumerate() {
                        let price = way.price + price_between(&way.node.stand, &node.stand);
                        arrive(way.ends, price, before);
                    }
                }
            }
        }
        thin(&mut here);
        ways.push(here);
    }
    let total = |way: &Way| way.price + waiting_price(list.delay(way.ends, objects.len()));
    let last = ways.last().and_then(|ways| {
        let cheapest = ways
            .iter()
            .enumerate()
            .min_by(|(_, a), (_, b)| total(a).total_cmp(&total(b)));
        cheapest.map(|(place, _)| place)
    });
    let mut route = Vec::with_capacity(objects.len());
    let mut place = last;
    for ways in ways.iter().rev() {
        let Some(way) = place.and_then(|place| ways.get(place)) else {
            return Vec::new();
        };
        route.push(way.node);
        place = Some(way.before);
    }
    route.reverse();
    route
}

fn thin(ways: &mut Vec<Way>) {
    if ways.len() <= MOST_WAYS {
        return;
    }
    ways.sort_by(|a, b| a.price.total_cmp(&b.price));
    let earliest = ways
        .iter()
        .copied()
        .min_by(|a, b| a.ends.total_cmp(&b.ends));
    ways.truncate(MOST_WAYS - 1);
    ways.extend(earliest);
}
