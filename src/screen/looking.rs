//! The keys while the observer looks at the field as the optics show it.

use crate::screen::keys::{Act, Mode};
use crate::screen::panel::{Doing, Panel};
use crate::screen::scene::Scene;
use crate::screen::settings::Settings;

/// Opens the field of the first optic, where something is dialled.
pub(super) fn open(panel: &mut Panel, scene: &Scene<'_>) {
    let optics = &scene.from.observatory.mount.optics;
    match &scene.shown.settings {
        _ if optics.is_empty() => panel.say("the mount file names no optic"),
        Settings::Dialled(_) => {
            panel.enter(Mode::Field);
        }
        _ => panel.say("nothing is dialled here"),
    }
}

/// A key struck while looking at the field.
pub(super) fn looking(panel: &mut Panel, scene: &Scene<'_>, act: Act) -> Vec<Doing> {
    let count = scene.from.observatory.mount.optics.len().max(1);
    match act {
        Act::Next => panel.chosen = (panel.chosen + 1) % count,
        Act::Back => panel.chosen = (panel.chosen + count - 1) % count,
        Act::Cancel => panel.enter(Mode::Stepping),
        Act::Light => panel.light = panel.light.next(),
        _ => {}
    }
    Vec::new()
}
