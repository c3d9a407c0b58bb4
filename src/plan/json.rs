//! The JSON form of a plan, `nonius.plan/1`. Times are UTC (RFC 3339); what does not come that night is null.

use serde::Serialize;

use crate::plan::{MoonTimes, Plan, Planned, SunTimes, Tally, Window};
use crate::time::Utc;

/// A plan, ready to be written.
#[derive(Debug, Serialize)]
pub struct Sheet<'a> {
    format: &'static str,
    site: &'a str,
    night: String,
    sun: Sun,
    moon: Moon,
    objects: Vec<Object<'a>>,
    swing_deg: f64,
    turns_over: usize,
    given_order: Order,
}

type Time = Option<String>;

#[derive(Debug, Serialize)]
struct Sun {
    set: Time,
    civil_dusk: Time,
    nautical_dusk: Time,
    astronomical_dusk: Time,
    astronomical_dawn: Time,
    nautical_dawn: Time,
    civil_dawn: Time,
    rise: Time,
}

#[derive(Debug, Serialize)]
struct Moon {
    rise: Time,
    set: Time,
    illuminated: f64,
}

#[derive(Debug, Serialize)]
struct Object<'a> {
    target: &'a str,
    place_in_order: Option<usize>,
    rise: Time,
    transit: Time,
    set: Time,
    windows: Vec<OneWindow>,
    why_not: Option<String>,
}

#[derive(Debug, Serialize)]
struct OneWindow {
    from: String,
    to: String,
    side: &'static str,
}

#[derive(Debug, Serialize)]
struct Order {
    swing_deg: f64,
    turns_over: usize,
}

fn text(time: Option<Utc>) -> Time {
    time.map(Utc::rfc3339)
}

impl<'a> Sheet<'a> {
    /// A plan for the site of that name.
    #[must_use]
    pub fn new(plan: &'a Plan, site: &'a str) -> Self {
        let order = Order::from(&plan.tally);
        Self {
            format: "nonius.plan/1",
            site,
            night: plan.almanac.night.to_string(),
            sun: Sun::from(&plan.almanac.sun),
            moon: Moon::from(&plan.almanac.moon),
            objects: plan.objects.iter().map(Object::from).collect(),
            swing_deg: order.swing_deg,
            turns_over: order.turns_over,
            given_order: Order::from(&plan.given),
        }
    }
}

impl From<&SunTimes> for Sun {
    fn from(sun: &SunTimes) -> Self {
        Self {
            set: text(sun.set),
            civil_dusk: text(sun.civil_dusk),
            nautical_dusk: text(sun.nautical_dusk),
            astronomical_dusk: text(sun.astronomical_dusk),
            astronomical_dawn: text(sun.astronomical_dawn),
            nautical_dawn: text(sun.nautical_dawn),
            civil_dawn: text(sun.civil_dawn),
            rise: text(sun.rise),
        }
    }
}

impl From<&MoonTimes> for Moon {
    fn from(moon: &MoonTimes) -> Self {
        Self {
            rise: text(moon.rise),
            set: text(moon.set),
            illuminated: moon.illuminated,
        }
    }
}

impl<'a> From<&'a Planned> for Object<'a> {
    fn from(object: &'a Planned) -> Self {
        let prospect = &object.prospect;
        Self {
            target: &object.name,
            place_in_order: object.visit.map(|visit| visit.place),
            rise: text(prospect.rise),
            transit: text(prospect.transit),
            set: text(prospect.set),
            windows: prospect.windows.iter().map(OneWindow::from).collect(),
            why_not: prospect.why_not.map(|why| why.to_string()),
        }
    }
}

impl From<&Window> for OneWindow {
    fn from(window: &Window) -> Self {
        Self {
            from: window.span.from.rfc3339(),
            to: window.span.until.rfc3339(),
            side: window.side.word(),
        }
    }
}

impl From<&Tally> for Order {
    fn from(tally: &Tally) -> Self {
        Self {
            swing_deg: tally.swing.degrees(),
            turns_over: tally.turns_over,
        }
    }
}
