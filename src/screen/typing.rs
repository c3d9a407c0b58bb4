//! What keys do while something is typed or chosen, and what becomes of it when it is taken.

use crate::catalog::Target;
use crate::metal::Ring;
use crate::night::{Circle, Event, ListedTarget, StarReading};
use crate::screen::doubt;
use crate::screen::keys::{Act, Mode};
use crate::screen::panel::{Centred, Doing, Panel};
use crate::screen::scene::{SUN_WORD, Scene, entered, reading_event, record};

/// A clock further out than this is set wrong, not slow or fast, in seconds.
const MOST_CORRECTION_S: f64 = 3600.0;

/// A key that is no text, struck while typing.
pub(super) fn typing(panel: &mut Panel, scene: &Scene<'_>, act: Act) -> Vec<Doing> {
    let lines = match panel.mode {
        Mode::ChoosingStar => scene.shown.stars.len(),
        _ => scene.shown.matches.len(),
    };
    match act {
        Act::Up => panel.chosen = panel.chosen.saturating_sub(1),
        Act::Down => panel.chosen = (panel.chosen + 1).min(lines.saturating_sub(1)),
        Act::Other => panel.typed.at_second = !panel.typed.at_second,
        Act::Cancel => cancelled(panel),
        Act::Accept => return accepted(panel, scene),
        _ => {}
    }
    Vec::new()
}

fn cancelled(panel: &mut Panel) {
    let star = panel.star.take();
    match (panel.mode, star) {
        // back to the star, which has moved on meanwhile: it must be centred again
        (Mode::Reading, Some(star)) if !star.found => {
            panel.enter(Mode::Centring);
            panel.star = Some(Centred {
                at: None,
                timed: false,
                rings_set: false,
                ..star
            });
        }
        _ => panel.enter(Mode::Stepping),
    }
}

fn accepted(panel: &mut Panel, scene: &Scene<'_>) -> Vec<Doing> {
    let text = panel.typed.line().value().trim().to_owned();
    match panel.mode {
        Mode::ChoosingStar => {
            if let Some(placed) = scene.shown.stars.get(panel.chosen) {
                panel.enter(Mode::Centring);
                panel.star = Some(Centred {
                    star: placed.star.clone(),
                    found: false,
                    at: None,
                    timed: false,
                    rings_set: false,
                });
            } else {
                panel.say("no such star is well placed now");
            }
            Vec::new()
        }
        Mode::Searching => added(panel, scene),
        Mode::Noting if text.is_empty() => entered(panel, Mode::Stepping),
        Mode::Noting => record(scene.from.night.note(&text), "noted", Mode::Stepping),
        Mode::SunRisk => sun_risk(panel, scene, &text),
        Mode::Clock => clock(panel, scene, &text),
        Mode::Ring => ring(panel, &text),
        Mode::Reading => read(panel, scene),
        _ => Vec::new(),
    }
}

fn added(panel: &mut Panel, scene: &Scene<'_>) -> Vec<Doing> {
    let Some(target) = scene.shown.matches.get(panel.chosen) else {
        panel.say("nothing matches");
        return Vec::new();
    };
    let targets = &scene.from.night.state().targets;
    let listed = targets
        .iter()
        .position(|entry| entry.target.name == target.name);
    let taken = listed.and_then(|index| scene.from.night.take(index));
    if let Some(event) = taken {
        return record(event, "it was in the list already", Mode::Stepping);
    }
    let said = format!("{} stands at the end of the list now", target.name);
    let target = Box::new(ListedTarget::from(target));
    let place = targets.len() + 1;
    let added = Event::TargetAdded {
        target: target.clone(),
    };
    let mut doings = record(added, "", Mode::Stepping);
    // what is looked up is wanted now
    let taken = Event::TargetTaken { place, target };
    doings.extend(record(taken, said, Mode::Stepping));
    doings
}

fn sun_risk(panel: &mut Panel, scene: &Scene<'_>, text: &str) -> Vec<Doing> {
    let target: Option<&Target> = scene.shown.target.as_ref();
    match target {
        Some(target) if text.eq_ignore_ascii_case(SUN_WORD) => {
            let event = Event::SunRiskAcknowledged {
                target: target.name.clone(),
            };
            record(
                event,
                "you answer for it: filter first, finder capped",
                Mode::Stepping,
            )
        }
        _ => {
            panel.say(format!("type {SUN_WORD} to answer for it, or esc"));
            Vec::new()
        }
    }
}

/// What is typed is how far the clock on the screen is off, so it adds to the correction in force.
fn clock(panel: &mut Panel, scene: &Scene<'_>, text: &str) -> Vec<Doing> {
    match text.replace(',', ".").parse::<f64>() {
        Ok(slow) if slow.abs() <= MOST_CORRECTION_S => {
            let seconds = scene.from.night.state().clock_correction_s + slow;
            record(
                Event::ClockCorrected { seconds },
                format!("the machine's clock is now corrected by {seconds:+.1} s"),
                Mode::Stepping,
            )
        }
        _ => {
            panel.say("type seconds, as in 2.5 for a slow clock or -2.5 for a fast one");
            Vec::new()
        }
    }
}

fn ring(panel: &mut Panel, text: &str) -> Vec<Doing> {
    let (circle, said) = match text {
        "h" | "hour" => (
            Circle::Hour,
            "hour circle: zero not known now, read a star; the rest is kept",
        ),
        "d" | "declination" => (
            Circle::Declination,
            "declination circle: zero not known now, read a star; the rest is kept",
        ),
        _ => {
            panel.say("type h or d");
            return Vec::new();
        }
    };
    let reading = None;
    record(Event::RingSet { circle, reading }, said, Mode::Stepping)
}

fn read(panel: &mut Panel, scene: &Scene<'_>) -> Vec<Doing> {
    let typed = scene.shown.reading.as_ref();
    let Some(whole) = typed.and_then(|typed| typed.whole.clone()) else {
        // on to the other circle; what is wrong stands beside what was typed
        panel.typed.at_second = !panel.typed.at_second;
        return Vec::new();
    };
    if !panel.typed.at_second {
        panel.typed.at_second = true;
        return Vec::new();
    }
    let Some(star) = panel.star.clone() else {
        return Vec::new();
    };
    if star.rings_set {
        return rings_set(panel, scene, &star, whole.reading);
    }
    let choices = doubt::choices(scene, &star, &whole);
    if !choices.is_empty() {
        // what was typed stays, for a look at it and for coming back
        panel.mode = Mode::Doubting;
        panel.choices = choices;
        panel.chosen = 0;
        return Vec::new();
    }
    let said = format!("read: {}", star.star.name);
    let event = reading_event(scene, &star, whole.reading);
    event.map_or_else(Vec::new, |event| record(event, said, Mode::Stepping))
}

/// The rings that slip have new zeros, and this is the first reading under them.
fn rings_set(panel: &Panel, scene: &Scene<'_>, star: &Centred, reading: StarReading) -> Vec<Doing> {
    let mount = &scene.from.observatory.mount;
    let slips = [
        (Circle::Hour, mount.hour_circle.ring != Ring::Fixed),
        (Circle::Declination, mount.declination_circle.slips),
    ];
    let said = format!("rings set on {}", star.star.name);
    let mut doings = Vec::new();
    for (circle, _) in slips.into_iter().filter(|(_, slips)| *slips) {
        let reading = None;
        doings.extend(record(Event::RingSet { circle, reading }, "", panel.mode));
    }
    let event = Event::StarRead(Box::new(reading));
    doings.extend(record(event, said, Mode::Stepping));
    doings
}
