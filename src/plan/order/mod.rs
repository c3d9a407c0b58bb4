//! The order in which to take a list's objects.
//!
//! Each object takes so long, is begun within one of its windows, and may be waited for. An order is better
//!
//! 1. if fewer of the objects that have a window are lost;
//! 2. if its price is less, in degrees: the swings of both axes from each object to the next (hour axis and declination axis
//!    added, [`Stand`]), [`TURN_OVER_DEG`] more for each turn over the pier, [`WAITING_DEG_PER_MINUTE`] for all waiting
//!    together, and [`DELAY_DEG_PER_MINUTE`] for every object that waiting delays: what is there is taken while it is there.
//!    Time runs from the first moment any of the objects can be had; an object is delayed by as much as it is begun
//!    later than if nothing had been waited for.
//!
//! Where the tube is before the first object is not known: the way there costs nothing. Lists of up to [`EXACT_UP_TO`]
//! objects get the best order there is (`exact.rs`); longer ones a good one (`search.rs`), which is never worse than the
//! order given: where nothing better is found, that is what is worked on. Nothing is left to chance or to the clock: the same
//! list gives the same order.
//!
//! Times are seconds from the night's noon.

mod exact;
mod given;
mod moves;
mod route;
mod search;
mod way;

use crate::angle::Angle;
use crate::plan::stand::Stand;
use crate::plan::window::Window;
use crate::time::Utc;

use route::Node;

/// What a turn over the pier costs beside its swing: the time and the care it takes with people about (our own; common
/// practice is to avoid it, no source).
pub const TURN_OVER_DEG: f64 = 90.0;

/// What a minute's waiting costs (our own): an hour and a half as much as a turn over with its swing.
pub const WAITING_DEG_PER_MINUTE: f64 = 3.0;

/// What a minute's delay of one object costs (our own): small, so that of two orders with as much waiting that one is
/// taken which waits late in the night and for few.
pub const DELAY_DEG_PER_MINUTE: f64 = 0.2;

/// So many objects are put in order exactly.
pub const EXACT_UP_TO: usize = 10;

/// Differences of price below this are rounding.
const SAME_DEG: f64 = 1e-6;

/// An object taken in its turn.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stop {
    /// Which object, by its place in the list given.
    pub object: usize,
    /// Which of its windows.
    pub window: usize,
    /// When it is begun, in seconds from noon.
    pub at_s: f64,
}

/// What an order comes to.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Tally {
    /// Objects that have a window and are not taken.
    pub lost: usize,
    /// Of both axes, all together.
    pub swing: Angle,
    /// Turns over the pier.
    pub turns_over: usize,
    /// All waiting together, in seconds.
    pub waiting_s: f64,
    /// The delays of all objects together, in seconds.
    pub delays_s: f64,
}

/// A time in which an object can be begun.
#[derive(Clone, Copy, Debug)]
struct Opening {
    from: f64,
    until: f64,
    stand: Stand,
}

/// What there is to put in order.
#[derive(Clone, Debug)]
pub struct List {
    /// Of each object, the times it can be begun.
    objects: Vec<Vec<Opening>>,
    each_s: f64,
    /// The first moment any of them can be had.
    begins: f64,
}

impl Tally {
    /// The price, as the head of this file states it.
    #[must_use]
    pub fn price_deg(&self) -> f64 {
        self.swing.degrees()
            + TURN_OVER_DEG * self.turns_over as f64
            + waiting_price(self.waiting_s)
            + delay_price(self.delays_s)
    }

    /// True if it is better than another beyond rounding.
    #[must_use]
    pub fn is_better_than(&self, other: &Self) -> bool {
        self.lost < other.lost
            || (self.lost == other.lost && self.price_deg() < other.price_deg() - SAME_DEG)
    }
}

/// The price of waiting so long in all.
fn waiting_price(seconds: f64) -> f64 {
    WAITING_DEG_PER_MINUTE * seconds / 60.0
}

/// The price of objects delayed by so much together.
fn delay_price(seconds: f64) -> f64 {
    DELAY_DEG_PER_MINUTE * seconds / 60.0
}

/// The price of going from one stand to another, waiting apart.
fn price_between(from: &Stand, to: &Stand) -> f64 {
    let turn = if from.side == to.side {
        0.0
    } else {
        TURN_OVER_DEG
    };
    from.way_to(to).degrees() + turn
}

impl List {
    /// The windows of each object of a night that begins at `noon`; each object takes `each_s`.
    #[must_use]
    pub fn new<'w>(
        objects: impl IntoIterator<Item = &'w [Window]>,
        noon: Utc,
        each_s: f64,
    ) -> Self {
        let opening = |window: &Window| Opening {
            from: window.span.from.seconds_since(noon),
            until: window.span.until.seconds_since(noon),
            stand: window.stand,
        };
        let openings = |windows: &[Window]| windows.iter().map(opening).collect();
        let objects: Vec<Vec<Opening>> = objects.into_iter().map(openings).collect();
        let begins = objects.iter().flatten().map(|opening| opening.from);
        Self {
            begins: begins.fold(f64::INFINITY, f64::min),
            objects,
            each_s: each_s.max(1.0),
        }
    }

    /// The order as given: as many as can be had in it, each from the side that serves the order best.
    #[must_use]
    pub fn as_given(&self) -> Vec<Stop> {
        self.stops(&given::route(self))
    }

    /// The best order, or a good one.
    #[must_use]
    pub fn in_order(&self) -> Vec<Stop> {
        let have_windows = self.objects.iter().filter(|openings| !openings.is_empty());
        let route = if have_windows.count() <= EXACT_UP_TO {
            exact::route(self)
        } else {
            search::route(self)
        };
        self.stops(&route)
    }

    /// What stops come to.
    #[must_use]
    pub fn tally(&self, stops: &[Stop]) -> Tally {
        let have_windows = self.objects.iter().filter(|openings| !openings.is_empty());
        let stand = |stop: &Stop| Some(self.opening(stop.object, stop.window)?.stand);
        let mut tally = Tally {
            lost: have_windows.count().saturating_sub(stops.len()),
            ..Tally::default()
        };
        for pair in stops.windows(2) {
            let [from, to] = pair else { continue };
            let Some((from, to)) = stand(from).zip(stand(to)) else {
                continue;
            };
            tally.swing += from.way_to(&to);
            tally.turns_over += usize::from(from.side != to.side);
        }
        for (place, stop) in stops.iter().enumerate() {
            let delay = self.delay(stop.at_s, place);
            tally.delays_s += delay;
            // the last is delayed by all of it
            tally.waiting_s = delay;
        }
        tally
    }

    fn opening(&self, object: usize, window: usize) -> Option<&Opening> {
        self.objects.get(object)?.get(window)
    }

    /// Every way of taking an object.
    fn nodes(&self, object: usize) -> impl Iterator<Item = Node> {
        let openings = self.objects.get(object).map_or(&[][..], Vec::as_slice);
        openings
            .iter()
            .enumerate()
            .map(move |(window, opening)| Node {
                object,
                window,
                from: opening.from,
                until: opening.until,
                stand: opening.stand,
            })
    }

    /// A route with its times, each object as early as can be.
    fn stops(&self, route: &[Node]) -> Vec<Stop> {
        let mut free = f64::NEG_INFINITY;
        let stop = |node: &Node| {
            let at_s = free.max(node.from);
            free = at_s + self.each_s;
            Stop {
                object: node.object,
                window: node.window,
                at_s,
            }
        };
        route.iter().map(stop).collect()
    }

    /// By how much an object is delayed that is begun then, with so many taken before it.
    fn delay(&self, at_s: f64, before: usize) -> f64 {
        at_s - self.begins - self.each_s * before as f64
    }
}

#[cfg(test)]
mod tests;
