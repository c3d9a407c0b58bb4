//! A route through objects, its price, and how a part of it takes time: what every change of it is tried on.

use crate::plan::order::{List, SAME_DEG, WAITING_DEG_PER_MINUTE, price_between};
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
    /// Of its swings and turns.
    links: f64,
}

impl<'l> Route<'l> {
    /// A route that is known to be one that can be taken.
    pub(super) fn new(list: &'l List, nodes: Vec<Node>) -> Self {
        let mut route = Self {
            list,
            nodes,
            before: Vec::new(),
            after: Vec::new(),
            links: 0.0,
        };
        route.refresh();
        route
    }

    /// Works out anew what is kept of the route.
    pub(super) fn refresh(&mut self) {
        let each_s = self.list.each_s;
        self.before.clear();
        let mut part = Part::NONE;
        self.before.push(part);
        for node in &self.nodes {
            part = part.then(Part::of(node, each_s));
            self.before.push(part);
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
        self.links + self.list.waiting_price(self.ends(), self.nodes.len())
    }

    /// The most that could be saved by waiting less.
    pub(super) fn waiting(&self) -> f64 {
        self.list.waiting_price(self.ends(), self.nodes.len())
    }

    /// How much dearer a changed route of as many objects is; nothing if it cannot be taken.
    pub(super) fn change(&self, links: f64, changed: Part) -> Option<f64> {
        let waiting = WAITING_DEG_PER_MINUTE * (changed.ends - self.ends()) / 60.0;
        changed.can_be().then_some(links + waiting)
    }

    /// True if it takes more objects than another, or as many at a lower price.
    pub(super) fn is_better_than(&self, other: &Self) -> bool {
        let (taken, theirs) = (self.nodes.len(), other.nodes.len());
        taken > theirs || (taken == theirs && self.price() < other.price() - SAME_DEG)
    }
}
