//! The best order of a short list: by sets of objects taken, the ways of having taken them that are neither later nor dearer
//! than another ending on the same object and side.

use crate::plan::order::route::Node;
use crate::plan::order::way::{Way, keep};
use crate::plan::order::{List, delay_price, price_between, waiting_price};

/// The best order.
pub(super) fn route(list: &List) -> Vec<Node> {
    // of each object that has windows, every way of taking it
    let objects: Vec<Vec<Node>> = (0..list.objects.len())
        .map(|object| list.nodes(object).collect::<Vec<Node>>())
        .filter(|nodes| !nodes.is_empty())
        .collect();
    let mut ways: Vec<Vec<Way>> = vec![Vec::new(); 1 << objects.len()];
    for (number, nodes) in objects.iter().enumerate() {
        let first = nodes.iter().map(|&node| Way {
            node,
            ends: node.from + list.each_s,
            price: delay_price(list.delay(node.from, 0)),
            before: 0,
        });
        if let Some(alone) = ways.get_mut(1 << number) {
            alone.extend(first);
        }
    }
    for set in 1..ways.len() {
        // a set with one more object has a greater number
        let (done, to_come) = ways.split_at_mut(set + 1);
        let Some(here) = done.last() else { continue };
        let taken = set.count_ones() as usize;
        for (number, nodes) in objects.iter().enumerate() {
            let bit = 1_usize << number;
            if set & bit != 0 {
                continue;
            }
            let Some(there) = to_come.get_mut(bit - 1) else {
                continue;
            };
            for node in nodes {
                for (before, way) in here.iter().enumerate() {
                    let at = way.ends.max(node.from);
                    if at <= node.until {
                        let way = Way {
                            node: *node,
                            ends: at + list.each_s,
                            price: way.price
                                + price_between(&way.node.stand, &node.stand)
                                + delay_price(list.delay(at, taken)),
                            before,
                        };
                        keep(there, way);
                    }
                }
            }
        }
    }
    back(list, &objects, &ways)
}

/// The cheapest way of having taken the most objects, from its end back to its beginning.
fn back(list: &List, objects: &[Vec<Node>], ways: &[Vec<Way>]) -> Vec<Node> {
    let mut best: Option<(usize, usize, f64)> = None;
    for (set, ways) in ways.iter().enumerate() {
        let taken = set.count_ones() as usize;
        for (place, way) in ways.iter().enumerate() {
            let price = way.price + waiting_price(list.delay(way.ends, taken));
            let better = best.is_none_or(|(set, _, least)| {
                let most = set.count_ones() as usize;
                taken > most || (taken == most && price < least)
            });
            if better {
                best = Some((set, place, price));
            }
        }
    }
    let mut route = Vec::new();
    let Some((mut set, mut place, _)) = best else {
        return route;
    };
    while let Some(way) = ways.get(set).and_then(|ways| ways.get(place)) {
        route.push(way.node);
        let of_last = |nodes: &Vec<Node>| {
            let object = nodes.first().map(|node| node.object);
            object == Some(way.node.object)
        };
        let Some(number) = objects.iter().position(of_last) else {
            break;
        };
        set &= !(1 << number);
        place = way.before;
    }
    route.reverse();
    route
}
