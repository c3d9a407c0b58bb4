//! What keys do while the observer looks at what is known of the mount.

use crate::night::{Event, NightReading, StartedFrom};
use crate::screen::keys::{Act, Mode};
use crate::screen::panel::{Doing, Panel};
use crate::screen::scene::{Scene, entered, record};

/// A key struck in the calibration view.
pub(super) fn calibrating(panel: &mut Panel, scene: &Scene<'_>, act: Act) -> Vec<Doing> {
    let state = scene.from.night.state();
    match act {
        Act::Up => panel.chosen = panel.chosen.saturating_sub(1),
        Act::Down => {
            panel.chosen = (panel.chosen + 1).min(state.readings.len().saturating_sub(1));
        }
        Act::Picture => panel.picture = !panel.picture,
        Act::Cancel => panel.enter(Mode::Stepping),
        Act::Star => return entered(panel, Mode::ChoosingStar),
        Act::SetAside => match state.readings.get(panel.chosen) {
            Some(read) => return set_aside(read),
            None => panel.say("no star has been read yet"),
        },
        Act::EarlierNight => return earlier_night(panel, scene),
        Act::AxisAdjusted => {
            let said = "the axis is unsure again: read two or three stars far apart";
            return record(Event::AxisAdjusted, said, Mode::Calibration);
        }
        _ => {}
    }
    Vec::new()
}

fn set_aside(read: &NightReading) -> Vec<Doing> {
    let NightReading { line, reading, .. } = read;
    let used = !reading.used;
    let said = if used {
        format!("{} is used again", reading.star)
    } else {
        format!("{} is set aside", reading.star)
    };
    record(
        Event::ReadingUsed { line: *line, used },
        said,
        Mode::Calibration,
    )
}

/// From the mount file alone to the earlier night with the mount as it stood, moved since, and back.
fn earlier_night(panel: &mut Panel, scene: &Scene<'_>) -> Vec<Doing> {
    let observatory = scene.from.observatory;
    let started = scene.from.night.state().started_from.as_ref();
    let Some(earlier) = &observatory.earlier_night else {
        panel.say("no earlier night with this mount is recorded");
        return Vec::new();
    };
    let moved = match started {
        None => Some(false),
        Some(started) if !started.moved => Some(true),
        Some(_) => None,
    };
    let mount = &observatory.mount;
    let next = moved.map(|moved| Box::new(StartedFrom::new(earlier.clone(), moved, mount)));
    let said = match (&next, moved) {
        (Some(_), Some(true)) => format!(
            "{}, but moved since: only what is built into the mount is kept",
            earlier.night
        ),
        (Some(_), _) => format!(
            "starting from {}, the mount as it stood: a few minutes are allowed for since",
            earlier.night
        ),
        _ => "starting from the mount file alone".to_owned(),
    };
    record(
        Event::StartedFrom { earlier: next },
        said,
        Mode::Calibration,
    )
}
