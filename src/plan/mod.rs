//! The night ahead: what the Sun and the Moon do in it, when each object can be had and from which side of the pier, and in
//! which order to take them.
//!
//! [`Plan`] is all of it for one list: the table, JSON, paper and screen print the same value.

use crate::catalog::Target;
use crate::dial::Swing;
use crate::metal::SideRequest;
use crate::time::Utc;

pub mod json;
pub mod needs;
pub mod night;
pub mod order;
#[cfg(test)]
mod samples;
pub mod sides;
pub mod stand;
pub mod why_not;
pub mod window;

pub use needs::Needs;
pub use night::{Almanac, MoonTimes, Span, SunTimes};
pub use order::Tally;
pub use sides::{End, Reach, Site, fewest_turns, reaches};
pub use stand::Stand;
pub use why_not::{Floor, WhyNot};
pub use window::{Prospect, Watch, Window};

/// What is asked of a plan beside the night and the list.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Wishes {
    /// How long each object takes, in seconds.
    pub each_s: f64,
    /// The order is to be left as given.
    pub keep_order: bool,
    /// The sides of the pier to use.
    pub side: SideRequest,
}

/// A night's plan for a list.
#[derive(Clone, Debug)]
pub struct Plan {
    /// The night.
    pub almanac: Almanac,
    /// What was asked for.
    pub wishes: Wishes,
    /// The objects in the order of the list, each with what the night has for it and its turn, if it has one.
    pub objects: Vec<Planned>,
    /// What the order comes to.
    pub tally: Tally,
    /// What the order given would come to.
    pub given: Tally,
}

/// An object of a plan.
#[derive(Clone, Debug)]
pub struct Planned {
    /// Its name, as the list has it.
    pub name: String,
    /// What it is; nothing if no catalogue knows the name.
    pub target: Option<Target>,
    /// When it can be had; why not, if it cannot, or has no turn.
    pub prospect: Prospect,
    /// Its turn.
    pub visit: Option<Visit>,
}

/// An object's turn.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Visit {
    /// Its number in the order, from 1.
    pub place: usize,
    /// When to begin it.
    pub at: Utc,
    /// The window it is taken in.
    pub window: Window,
    /// From the object before it, at the moment of the swing; nothing for the first.
    pub swing: Option<Swing>,
    /// The tube is turned over the pier on the way.
    pub turns_over: bool,
}

impl Plan {
    /// Plans a list, of names and what they are, for a night at a site.
    #[must_use]
    pub fn new(
        site: Site<'_>,
        almanac: Almanac,
        list: Vec<(String, Option<Target>)>,
        wishes: Wishes,
    ) -> Self {
        let watch = Watch::new(site, &almanac);
        let mut objects: Vec<Planned> = list
            .into_iter()
            .map(|(name, target)| {
                let prospect = target.as_ref().map_or_else(
                    || Prospect::none(WhyNot::Unknown),
                    |target| only(watch.prospect(target), wishes.side),
                );
                Planned {
                    name,
                    target,
                    prospect,
                    visit: None,
                }
            })
            .collect();
        let noon = almanac.whole.from;
        let windows = objects
            .iter()
            .map(|object| object.prospect.windows.as_slice());
        let to_order = order::List::new(windows, noon, wishes.each_s);
        let given = to_order.as_given();
        let given_tally = to_order.tally(&given);
        let (stops, tally) = if wishes.keep_order {
            (given, given_tally)
        } else {
            let best = to_order.in_order();
            let tally = to_order.tally(&best);
            (best, tally)
        };
        let mut before: Option<Window> = None;
        for (place, stop) in stops.iter().enumerate() {
            let Some(object) = objects.get_mut(stop.object) else {
                continue;
            };
            let Some(&window) = object.prospect.windows.get(stop.window) else {
                continue;
            };
            object.visit = Some(Visit {
                place: place + 1,
                at: noon.plus_seconds(stop.at_s),
                window,
                swing: before.map(|before| before.stand.swing_to(&window.stand)),
                turns_over: before.is_some_and(|before| before.side != window.side),
            });
            before = Some(window);
        }
        for object in &mut objects {
            if object.visit.is_none() && object.prospect.why_not.is_none() {
                object.prospect.why_not = Some(WhyNot::NoTime);
            }
        }
        Self {
            almanac,
            wishes,
            objects,
            tally,
            given: given_tally,
        }
    }

    /// The objects that have a turn, in their order.
    #[must_use]
    pub fn in_order(&self) -> Vec<(&Planned, Visit)> {
        let have_turns = self.objects.iter();
        let mut order: Vec<(&Planned, Visit)> = have_turns
            .filter_map(|object| Some((object, object.visit?)))
            .collect();
        order.sort_by_key(|(_, visit)| visit.place);
        order
    }

    /// The objects that have no turn, in the order of the list, and why.
    pub fn left_out(&self) -> impl Iterator<Item = (&Planned, WhyNot)> {
        let without = self.objects.iter().filter(|object| object.visit.is_none());
        without.filter_map(|object| Some((object, object.prospect.why_not?)))
    }
}

/// A prospect with the sides asked for alone.
fn only(mut prospect: Prospect, side: SideRequest) -> Prospect {
    if let SideRequest::Only(side) = side {
        // on a fork or yoke the one side is meant by whatever name
        let is_other = |window: &Window| Some(window.side) == side.other();
        prospect.windows.retain(|window| !is_other(window));
        if prospect.windows.is_empty() && prospect.why_not.is_none() {
            prospect.why_not = Some(WhyNot::OtherSide);
        }
    }
    prospect
}
