//! The changes a search tries on a route: an object put in, another taken in its stead or from the other side, a few moved
//! elsewhere, a stretch turned round. Each makes the best change of its kind for one object after another, while there is any.

use crate::plan::order::SAME_DEG;
use crate::plan::order::route::{Change, Node, Part, Route, link};

/// Up to so many neighbours are moved together.
const MOST_MOVED: usize = 3;

/// The least of what was tried, and how to do it.
struct Least<M> {
    change: f64,
    how: Option<M>,
}

impl<M> Least<M> {
    /// Only what is cheaper than doing nothing.
    const fn below_nothing() -> Self {
        Self {
            change: -SAME_DEG,
            how: None,
        }
    }

    const fn any() -> Self {
        Self {
            change: f64::INFINITY,
            how: None,
        }
    }

    fn weigh(&mut self, route: &Route<'_>, change: &Change<'_>, how: M) {
        let change = route.change(change, self.change);
        if let Some(change) = change.filter(|change| *change < self.change) {
            *self = Self {
                change,
                how: Some(how),
            };
        }
    }
}

/// A few neighbours moved to another gap: between which objects, and whether turned round.
struct Move {
    gap: usize,
    turned: bool,
}

impl Route<'_> {
    /// Puts objects in that are left out, wherever one has room, where it is cheapest; true if it did.
    pub(super) fn put_in(&mut self, left_out: &mut Vec<usize>) -> bool {
        let before = left_out.len();
        let mut still_out = Vec::with_capacity(before);
        for object in left_out.drain(..) {
            let mut least = Least::any();
            for node in self.list.nodes(object) {
                let part = Part::of(&node, self.list.each_s);
                for gap in 0..=self.nodes.len() {
                    let early = self.up_to(gap).then(part);
                    if !early.can_be() {
                        // later gaps are come to later still
                        break;
                    }
                    let change = Change {
                        start: gap,
                        rest: gap,
                        stretches: [(std::slice::from_ref(&node), false), (&[], false)],
                        links: self.link_in(gap, &node),
                        whole: early.then(self.from(gap)),
                    };
                    // what is sure of a route as long is not of one with an object more
                    if let Some(dearer) = self.change(&change, f64::INFINITY)
                        && dearer < least.change
                    {
                        least = Least {
                            change: dearer,
                            how: Some((gap, node)),
                        };
                    }
                }
            }
            if let Some((gap, node)) = least.how {
                self.nodes.insert(gap, node);
                self.refresh();
            } else {
                still_out.push(object);
            }
        }
        *left_out = still_out;
        left_out.len() < before
    }

    /// What a new node in a gap costs in links.
    fn link_in(&self, gap: usize, node: &Node) -> f64 {
        let (from, to) = (self.previous(gap), self.node(gap));
        link(from, Some(node)) + link(Some(node), to) - link(from, to)
    }

    /// What another node at a place costs in links.
    fn link_instead(&self, place: usize, node: &Node) -> f64 {
        let (from, to) = (self.previous(place), self.node(place + 1));
        let old = self.node(place);
        link(from, Some(node)) + link(Some(node), to) - link(from, old) - link(old, to)
    }

    fn weigh_instead(&self, place: usize, node: Node, least: &mut Least<Node>) {
        let links = self.link_instead(place, &node);
        if links - self.most_saved(place) < least.change {
            let part = Part::of(&node, self.list.each_s);
            let change = Change {
                start: place,
                rest: place + 1,
                stretches: [(std::slice::from_ref(&node), false), (&[], false)],
                links,
                whole: self.up_to(place).then(part).then(self.from(place + 1)),
            };
            least.weigh(self, &change, node);
        }
    }

    /// Takes objects in other windows; true if it did.
    pub(super) fn take_from_elsewhere(&mut self) -> bool {
        let mut did = false;
        for place in 0..self.nodes.len() {
            let Some(&old) = self.node(place) else {
                continue;
            };
            let mut least = Least::below_nothing();
            for node in self.list.nodes(old.object) {
                self.weigh_instead(place, node, &mut least);
            }
            did |= self.take_instead(place, least.how);
        }
        did
    }

    /// Takes objects that are left out instead of some that are not; true if it did.
    pub(super) fn take_others(&mut self, left_out: &mut [usize]) -> bool {
        let mut did = false;
        for place in 0..self.nodes.len() {
            let Some(&old) = self.node(place) else {
                continue;
            };
            let mut least = Least::below_nothing();
            for &object in left_out.iter() {
                for node in self.list.nodes(object) {
                    self.weigh_instead(place, node, &mut least);
                }
            }
            let Some(new) = least.how else { continue };
            if let Some(out) = left_out.iter_mut().find(|object| **object == new.object) {
                *out = old.object;
                did |= self.take_instead(place, Some(new));
            }
        }
        did
    }

    fn take_instead(&mut self, place: usize, node: Option<Node>) -> bool {
        let (Some(old), Some(node)) = (self.nodes.get_mut(place), node) else {
            return false;
        };
        *old = node;
        self.refresh();
        true
    }

    /// Moves one to a few neighbours elsewhere; true if it did.
    pub(super) fn move_few(&mut self) -> bool {
        let mut did = false;
        for count in 1..=MOST_MOVED {
            for start in 0..(self.nodes.len() + 1).saturating_sub(count) {
                let Some(Move { gap, turned }) = self.best_move(start, count) else {
                    continue;
                };
                let few: Vec<Node> = self.nodes.drain(start..start + count).collect();
                let gap = if gap > start { gap - count } else { gap };
                if turned {
                    self.nodes.splice(gap..gap, few.into_iter().rev());
                } else {
                    self.nodes.splice(gap..gap, few);
                }
                self.refresh();
                did = true;
            }
        }
        did
    }

    /// The best place for `count` objects from `start` on.
    fn best_move(&self, start: usize, count: usize) -> Option<Move> {
        let end = start + count;
        let (first, last) = (self.node(start), self.node(end - 1));
        let (from, to) = (self.previous(start), self.node(end));
        let saved = link(from, first) + link(last, to) - link(from, to);
        let few = (start..end).fold(Part::NONE, |part, place| part.then(self.part(place)));
        let round = (start..end)
            .rev()
            .fold(Part::NONE, |part, place| part.then(self.part(place)));
        let mut least = Least::below_nothing();
        let nodes = |from: usize, to: usize| self.nodes.get(from..to).unwrap_or_default();
        let moved = nodes(start, end);
        let most_saved = self.most_saved(0);
        let mut weigh = |gap: usize, whole: &dyn Fn(Part) -> Part| {
            let (from, to) = (self.previous(gap), self.node(gap));
            // one alone is the same turned round
            for turned in [false, true].into_iter().take(count.min(2)) {
                let (few, first, last) = if turned {
                    (round, last, first)
                } else {
                    (few, first, last)
                };
                let links = link(from, first) + link(last, to) - link(from, to) - saved;
                if links - most_saved >= least.change {
                    continue;
                }
                let moved = (moved, turned);
                let later = gap > start;
                let change = Change {
                    start: start.min(gap),
                    rest: end.max(gap),
                    stretches: if later {
                        [(nodes(end, gap), false), moved]
                    } else {
                        [moved, (nodes(gap, start), false)]
                    },
                    links,
                    whole: whole(few),
                };
                least.weigh(self, &change, Move { gap, turned });
            }
        };
        // later: what lies between comes first
        let mut early = self.up_to(start);
        for gap in end + 1..=self.nodes.len() {
            early = early.then(self.part(gap - 1));
            weigh(gap, &|few| early.then(few).then(self.from(gap)));
        }
        // earlier: what lies between comes after
        let mut late = self.from(end);
        for gap in (0..start).rev() {
            late = self.part(gap).then(late);
            if !late.can_be() {
                break;
            }
            weigh(gap, &|few| self.up_to(gap).then(few).then(late));
        }
        least.how
    }

    /// Turns stretches round; true if it did.
    pub(super) fn turn_round(&mut self) -> bool {
        let mut did = false;
        for start in 0..self.nodes.len() {
            let mut least = Least::below_nothing();
            let mut round = self.part(start);
            for end in start + 1..self.nodes.len() {
                round = self.part(end).then(round);
                if !round.can_be() {
                    break;
                }
                let (from, to) = (self.previous(start), self.node(end + 1));
                let (first, last) = (self.node(start), self.node(end));
                let links = link(from, last) + link(first, to) - link(from, first) - link(last, to);
                if links - self.most_saved(start) < least.change {
                    let change = Change {
                        start,
                        rest: end + 1,
                        stretches: [
                            (self.nodes.get(start..=end).unwrap_or_default(), true),
                            (&[], false),
                        ],
                        links,
                        whole: self.up_to(start).then(round).then(self.from(end + 1)),
                    };
                    least.weigh(self, &change, end);
                }
            }
            if let Some(stretch) = least.how.and_then(|end| self.nodes.get_mut(start..=end)) {
                stretch.reverse();
                self.refresh();
                did = true;
            }
        }
        did
    }
}
