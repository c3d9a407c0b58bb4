//! Sweeping for an object that is not in the field: a step at a time, each with its own settings, and what finding it at one
//! of them tells.

use crate::dial::aside::{found_there, sweep_for};
use crate::night::{Event, StarReading};
use crate::screen::keys::{Act, Mode};
use crate::screen::panel::{Doing, Panel};
use crate::screen::scene::{Scene, record};
use crate::screen::shown::Settings;
use crate::screen::sweep::Sweeping;

/// A sweep that covers less than this in as many steps as anyone takes is no use.
const HOPELESS: f64 = 0.5;

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
