//! A route through objects, its price, and how a part of it takes time: what every change of it is tried on.

use crate::plan::order::{List, SAME_DEG, delay_price, price_between, waiting_price};
use crate::plan::stand::Stand;

/// An object taken in one of its windows.
#[derive(Clone, Copy, Debug)]
pub(super) struct Node {
    /// Which object.
    pub(super) object: usize,
    /// Which of its windows.
    pub(super) window: usize,
    /// It can be begun from then on,
    pub(super) from: f64,
    /// until then.
    pub(super) until: f64,
    /// How the axes stand.
    pub(super) stand: Stand,
}

/// A part of a route as it takes time: come to at any moment up to `latest`, it is left `takes` later, but not before `ends`.
/// Two parts one after the other are such a part again, so that a change of a long route is tried in a few steps.
#[derive(Clone, Copy, Debug)]
pub(super) struct Part {
    takes: f64,
    pub(super) ends: f64,
    latest: f64,
}

impl Part {
    /// No object.
    pub(super) const NONE: Self = Self {
        takes: 0.0,
        ends: f64::NEG_INFINITY,
        latest: f64::INFINITY,
    };

    /// One object.
    pub(super) fn of(node: &Node, each_s: f64) -> Self {
        Self {
            takes: each_s,
            ends: node.from + each_s,
            latest: node.until,
        }
    }

    /// This part and then another.
    pub(super) fn then(self, next: Self) -> Self {
        let latest = if self.ends > next.latest {
            f64::NEG_INFINITY
        } else {
            self.latest.min(next.latest - self.takes)
        };
        Self {
            takes: self.takes + next.takes,
            ends: (self.ends + next.takes).max(next.ends),
            latest,
        }
    }

    /// False if an object of it comes too late however early it is come to.
    pub(super) fn can_be(&self) -> bool {
        self.latest > f64::NEG_INFINITY
    }
}

/// The price from one object to the next; nothing before the first and after the last.
pub(super) fn link(from: Option<&Node>, to: Option<&Node>) -> f64 {
    from.zip(to)
        .map_or(0.0, |(from, to)| price_between(&from.stand, &to.stand))
}

/// A route that can be taken.
#[derive(Clone, Debug)]
pub(super) struct Route<'l> {
    pub(super) list: &'l List,
    pub(super) nodes: Vec<Node>,
    /// The route up to each object.
    before: Vec<Part>,
    /// The route from each object on.
    after: Vec<Part>,
    /// The delays up to each object, together.
    delays: Vec<f64>,
    /// Of its swings and turns.
    links: f64,
}

/// A stretch of a changed route, and whether it is turned round.
pub(super) type Stretch<'n> = (&'n [Node], bool);

/// A change of a route: from `start` up to `rest` it goes by these stretches instead.
pub(super) struct Change<'n> {
    pub(super) start: usize,
    pub(super) rest: usize,
    pub(super) stretches: [Stretch<'n>; 2],
    /// What it costs in swings and turns.
    pub(super) links: f64,
    /// The whole of the changed route.
    pub(super) whole: Part,
}

impl<'l> Route<'l> {
    /// A route that is known to be one that can be taken.
    pub(super) fn new(list: &'l List, nodes: Vec<Node>) -> Self {
        let mut route = Self {
            list,
            nodes,
            before: Vec::new(),
            after: Vec::new(),
            delays: Vec::new(),
            links: 0.0,
        };
        route.refresh();
        route
    }

    /// Works out anew what is kept of the route.
    pub(super) fn refresh(&mut self) {
        let each_s = self.list.each_s;
        self.before.clear();
        self.delays.clear();
        let (mut part, mut delays) = (Part::NONE, 0.0);
        self.before.push(part);
        self.delays.push(delays);
        for (place, node) in self.nodes.iter().enumerate() {
            delays += self.list.delay(part.ends.max(node.from), place);
            part = part.then(Part::of(node, each_s));
            self.before.push(part);
            self.delays.push(delays);
        }
        self.after.clear();
        part = Part::NONE;
        self.after.push(part);
        for node in self.nodes.iter().rev() {
            part = Part::of(node, each_s).then(part);
            self.after.push(part);
        }
        self.after.reverse();
        let pairs = self.nodes.iter().zip(self.nodes.iter().skip(1));
        self.links = pairs.map(|(from, to)| link(Some(from), Some(to))).sum();
    }

    pub(super) fn node(&self, place: usize) -> Option<&Node> {
        self.nodes.get(place)
    }

    /// The one before a place.
    pub(super) fn previous(&self, place: usize) -> Option<&Node> {
        place
            .checked_sub(1)
            .and_then(|before| self.nodes.get(before))
    }

    /// The first `place` objects.
    pub(super) fn up_to(&self, place: usize) -> Part {
        self.before.get(place).copied().unwrap_or(Part::NONE)
    }

    /// From a place on.
    pub(super) fn from(&self, place: usize) -> Part {
        self.after.get(place).copied().unwrap_or(Part::NONE)
    }

    pub(super) fn part(&self, place: usize) -> Part {
        self.node(place)
            .map_or(Part::NONE, |node| Part::of(node, self.list.each_s))
    }

    /// When its last object is done.
    pub(super) fn ends(&self) -> f64 {
        self.up_to(self.nodes.len()).ends
    }

    /// Its price.
    pub(super) fn price(&self) -> f64 {
        self.links + self.most_saved(0)
    }

    /// The delays of the objects from a place on, together.
    fn delays_from(&self, place: usize) -> f64 {
        let at = |place: usize| self.delays.get(place).copied().unwrap_or_default();
        at(self.nodes.len()) - at(place)
    }

    /// The most that can be saved by waiting less from a place on: the price of all waiting, and of the delays there.
    pub(super) fn most_saved(&self, place: usize) -> f64 {
        let waiting = self.list.delay(self.ends(), self.nodes.len());
        waiting_price(waiting.max(0.0)) + delay_price(self.delays_from(place))
    }

    /// How much dearer a change makes the route; nothing if it cannot be taken or is sure to be no less than `bound`, as far
    /// as it takes as many objects. Where it takes more, how it compares with other such changes.
    pub(super) fn change(&self, change: &Change<'_>, bound: f64) -> Option<f64> {
        /// From the same moment on the rest is as it was.
        const SAME_S: f64 = 1e-6;
        let waiting = waiting_price(change.whole.ends - self.ends());
        let sure = change.links + waiting;
        let old = self.delays_from(change.start);
        if !change.whole.can_be() || sure - delay_price(old) >= bound {
            return None;
        }
        let (mut free, mut place) = (self.up_to(change.start).ends, change.start);
        let mut delays = 0.0;
        let mut take = |node: &Node, free: &mut f64| {
            let at = free.max(node.from);
            delays += self.list.delay(at, place);
            *free = at + self.list.each_s;
            place += 1;
        };
        for (nodes, turned) in change.stretches {
            if turned {
                for node in nodes.iter().rev() {
                    take(node, &mut free);
                }
            } else {
                for node in nodes {
                    take(node, &mut free);
                }
            }
        }
        let rest = self.nodes.get(change.rest..).unwrap_or_default();
        let mut unchanged = change.rest;
        for node in rest {
            if (free - self.up_to(unchanged).ends).abs() < SAME_S {
                break;
            }
            take(node, &mut free);
            unchanged += 1;
        }
        delays += self.delays_from(unchanged);
        Some(sure + delay_price(delays - old))
    }

    /// True if it takes more objects than another, or as many at a lower price.
    pub(super) fn is_better_than(&self, other: &Self) -> bool {
        let (taken, theirs) = (self.nodes.len(), other.nodes.len());
        taken > theirs || (taken == theirs && self.price() < other.price() - SAME_DEG)
    }
}
