//! Sweeping for an object that is not in the field: a step at a time, each with its own settings, and what finding it at one
//! of them tells.

use crate::angle::Angle;
use crate::dial::Aside;
use crate::dial::aside::{found_there, sweep_for};
use crate::estimate::SweepStep;
use crate::night::{Event, StarReading};
use crate::screen::keys::{Act, Mode};
use crate::screen::panel::{Doing, Panel};
use crate::screen::shown::Settings;
use crate::screen::update::{Scene, record};
use crate::screen::words::chance;

/// A sweep that covers less than this in as many steps as anyone takes is no use.
const HOPELESS: f64 = 0.5;

/// A sweep under way.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Sweeping {
    steps: Vec<SweepStep>,
    at: usize,
    /// The field of the eyepiece swept with.
    field: Angle,
}

impl Sweeping {
    fn step(&self) -> Option<&SweepStep> {
        self.steps.get(self.at)
    }

    /// Where to look; at the object itself where there is no sweep.
    #[must_use]
    pub fn aside(&self) -> Aside {
        self.step().map_or_else(Aside::default, Aside::from)
    }

    /// Which step it is, and the chance that it will have been seen by then.
    #[must_use]
    pub fn place(&self) -> String {
        let covered = self.step().map_or(0.0, |step| step.covered);
        format!(
            "step {} of {}, {} by then",
            self.at + 1,
            self.steps.len(),
            chance(covered)
        )
    }

    /// Where the step lies from the one before, and from the first look, in fields; nothing where there is no sweep.
    #[must_use]
    pub fn words(&self) -> Option<String> {
        let to = Aside::from(self.step()?);
        let before = self.at.checked_sub(1).and_then(|at| self.steps.get(at));
        let from = before.map_or_else(Aside::default, Aside::from);
        let moved = Aside {
            west: to.west - from.west,
            north: to.north - from.north,
        };
        let (moved, whole) = (self.in_fields(moved), self.in_fields(to));
        Some(if before.is_some() {
            format!("sweep: {moved} ({whole} of the first look)")
        } else {
            format!("sweep: {moved} of the first look")
        })
    }

    /// An offset in fields of the eyepiece, to half a one: "a field and a half west, half a field north".
    fn in_fields(&self, aside: Aside) -> String {
        let halves = |angle: Angle| (angle.abs() / self.field * 2.0).round();
        let part = |angle: Angle, plus: &str, minus: &str| {
            let way = if angle < Angle::ZERO { minus } else { plus };
            match halves(angle) {
                0.0 => None,
                1.0 => Some(format!("half a field {way}")),
                2.0 => Some(format!("a field {way}")),
                more => Some(format!("{} fields {way}", more / 2.0)),
            }
        };
        let parts = [
            part(aside.west, "west", "east"),
            part(aside.north, "north", "south"),
        ];
        let said: Vec<String> = parts.into_iter().flatten().collect();
        if said.is_empty() {
            "the place".to_owned()
        } else {
            said.join(", ")
        }
    }
}

/// Begins the sweep for the object being dialled.
pub(super) fn begin(panel: &mut Panel, scene: &Scene<'_>) {
    let Settings::Dialled(dial) = &scene.shown.settings else {
        panel.say("nothing is dialled here");
        return;
    };
    let mount = &scene.from.observatory.mount;
    let steps = if scene.from.known.estimate.is_calibrated() {
        sweep_for(mount, dial)
    } else {
        Vec::new()
    };
    match steps.last() {
        Some(last) if last.covered >= HOPELESS => {
            panel.enter(Mode::Sweeping);
            panel.sweep = Sweeping {
                steps,
                at: 0,
                field: mount.field_looked_into(),
            };
        }
        Some(_) => panel.say("that is too wide a sky to sweep: read a star near it first"),
        None if scene.from.known.estimate.is_calibrated() => {
            panel.say("it should be in the field: look again, and check star and circles");
        }
        None => panel.say("read a star first: before that there is nothing to sweep by"),
    }
}

/// A key struck while sweeping.
pub(super) fn sweeping(panel: &mut Panel, scene: &Scene<'_>, act: Act) -> Vec<Doing> {
    match act {
        Act::Next if panel.sweep.at + 1 < panel.sweep.steps.len() => panel.sweep.at += 1,
        Act::Next => panel.say("that was the last step: m gives it up, esc goes back"),
        Act::Back => panel.sweep.at = panel.sweep.at.saturating_sub(1),
        Act::Cancel => panel.enter(Mode::Stepping),
        Act::Found => return found(scene),
        Act::Missed => {
            let event = scene.from.night.missed(scene.shown.setting());
            let said = "missed, swept for";
            return event.map_or_else(Vec::new, |event| record(event, said, Mode::Stepping));
        }
        _ => {}
    }
    Vec::new()
}

/// It was found where the circles were set for this step: that is as good as a reading of them, but for the field.
fn found(scene: &Scene<'_>) -> Vec<Doing> {
    let (Settings::Dialled(dial), Some(target)) = (&scene.shown.settings, &scene.shown.target)
    else {
        return Vec::new();
    };
    let moment = &scene.shown.moment;
    let sight = found_there(&scene.from.observatory.mount, moment, &target.source, dial);
    let aside = scene.from.panel.sweep.aside();
    let reading = StarReading {
        taken_as: Some(dial.axes.into()),
        off_arcmin: Some(aside.west.arcminutes().hypot(aside.north.arcminutes())),
        ..StarReading::of_sight(&target.name, &sight, (&dial.hour.text, &dial.dec.text))
    };
    let reading = StarReading {
        sidereal_deg: moment.apparent_sidereal().degrees(),
        driven: !scene.from.observatory.mount.hour_circle.stands_still(),
        ..reading
    };
    let event = scene.from.night.found(scene.shown.setting(), Some(reading));
    let said = format!("found there: {}", target.name);
    event.map_or_else(Vec::new, |event: Event| record(event, said, Mode::Stepping))
}
