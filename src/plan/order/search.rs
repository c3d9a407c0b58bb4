//! A good order of a long list: from two beginnings, and from the order given where that is better than what comes of
//! both, changes are tried as long as one makes the route better; then parts are torn out of the best route and put back,
//! over and over, and kept where that is better.

use crate::plan::order::given;
use crate::plan::order::route::{Node, Route, link};
use crate::plan::order::{List, WAITING_DEG_PER_MINUTE};

/// More rounds of changes than a route ever takes.
const MOST_ROUNDS: usize = 60;

/// How often parts are torn out of a short route, at most.
const MOST_TEARS: usize = 300;

/// Trying all changes of a route takes time as the square of its length: torn so often that this many are tried.
const LOOKS: usize = 25_000;

/// Objects left out are tried so many times over, on all the places of a route, each time it is made better.
const LOOKS_AT_OTHERS: usize = 1_000_000;

/// A good order.
pub(super) fn route(list: &List) -> Vec<Node> {
    let [mut best, other] = [by_end(list), by_way(list)].map(|nodes| improved(list, nodes));
    if other.is_better_than(&best) {
        best = other;
    }
    // seldom a good beginning, and worked on only where it is
    let given = Route::new(list, given::route(list));
    if given.is_better_than(&best) {
        best = improved(list, given.nodes);
    }
    tear(&mut best);
    let objects: Vec<usize> = best.nodes.iter().map(|node| node.object).collect();
    let again = Route::new(list, given::best_windows(list, &objects));
    if again.is_better_than(&best) {
        best = again;
    }
    best.nodes
}

/// The objects that can be had and are not in a route.
pub(super) fn left_out(route: &Route<'_>) -> Vec<usize> {
    let mut taken = vec![false; route.list.objects.len()];
    for node in &route.nodes {
        if let Some(taken) = taken.get_mut(node.object) {
            *taken = true;
        }
    }
    let objects = route.list.objects.iter().zip(taken).enumerate();
    objects
        .filter(|(_, (openings, taken))| !taken && !openings.is_empty())
        .map(|(object, _)| object)
        .collect()
}

fn improved(list: &List, nodes: Vec<Node>) -> Route<'_> {
    let mut route = Route::new(list, nodes);
    improve(&mut route);
    route
}

fn improve(route: &mut Route<'_>) {
    let mut out = left_out(route);
    let mut looks = 0;
    for _ in 0..MOST_ROUNDS {
        let others = !out.is_empty() && looks < LOOKS_AT_OTHERS;
        looks += out.len() * route.nodes.len();
        let mut did = others && route.put_in(&mut out);
        did |= route.move_few();
        did |= route.turn_round();
        did |= route.take_from_elsewhere();
        did |= others && route.take_others(&mut out);
        if !did {
            break;
        }
    }
}

/// Whatever can be begun now and is gone first; waiting only where nothing can be begun.
fn by_end(list: &List) -> Vec<Node> {
    step_by_step(list, |at, _, node| {
        let end = list.nodes(node.object).map(|node| node.until);
        (at, end.fold(f64::NEG_INFINITY, f64::max))
    })
}

/// Whatever is nearest.
fn by_way(list: &List) -> Vec<Node> {
    step_by_step(list, |at, last, node| {
        let waiting = WAITING_DEG_PER_MINUTE * at / 60.0;
        (link(last, Some(node)) + waiting, node.until)
    })
}

/// One object after another, each time that with the least rank by when it could be begun, the one before, and itself.
fn step_by_step(list: &List, rank: impl Fn(f64, Option<&Node>, &Node) -> (f64, f64)) -> Vec<Node> {
    let mut route: Vec<Node> = Vec::new();
    let mut free = list.begins;
    let mut left: Vec<usize> = (0..list.objects.len()).collect();
    loop {
        let mut best: Option<((f64, f64), f64, Node)> = None;
        left.retain(|&object| {
            let mut can_be = false;
            for node in list.nodes(object) {
                let at = free.max(node.from);
                if at > node.until {
                    continue;
                }
                can_be = true;
                let rank = rank(at, route.last(), &node);
                if best.as_ref().is_none_or(|(least, ..)| rank < *least) {
                    best = Some((rank, at, node));
                }
            }
            can_be
        });
        let Some((_, at, node)) = best else {
            return route;
        };
        free = at + list.each_s;
        left.retain(|&object| object != node.object);
        route.push(node);
    }
}

/// Numbers without pattern, the same in every run (a linear congruence, Knuth's multiplier for 64 bits).
struct Numbers(u64);

impl Numbers {
    /// One below `end`.
    fn below(&mut self, end: usize) -> usize {
        const MULTIPLIER: u64 = 6_364_136_223_846_793_005;
        self.0 = self.0.wrapping_mul(MULTIPLIER).wrapping_add(1);
        let high = self.0 >> 33;
        usize::try_from(high).unwrap_or(0) % end.max(1)
    }
}

/// Tears stretches and single objects out of a route and puts them back where they cost least, as long as the looks last.
fn tear(best: &mut Route<'_>) {
    let length = best.nodes.len();
    if length < 4 {
        return;
    }
    let mut numbers = Numbers(1);
    let tears = (LOOKS / (length * length)).min(MOST_TEARS);
    for _ in 0..tears {
        let mut route = best.clone();
        let mut torn = Vec::new();
        for _ in 0..2 {
            let count = 1 + numbers.below((length / 6).clamp(2, 8));
            let start = numbers.below(route.nodes.len() - count.min(route.nodes.len()) + 1);
            let end = (start + count).min(route.nodes.len());
            torn.extend(route.nodes.drain(start..end).map(|node| node.object));
        }
        route.refresh();
        // put back in another order than they were
        let turn = numbers.below(torn.len());
        torn.rotate_left(turn);
        route.put_in(&mut torn);
        improve(&mut route);
        if route.is_better_than(best) {
            *best = route;
        }
    }
}
