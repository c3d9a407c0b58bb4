//! What follows from what happens: pure, with the record and the clock read only.
//!
//! A key acts on what the observer saw when striking it. What changes the record is handed to the loop
//! as a [`Doing`]; the screen goes on only once the record is safe.

use crossterm::event::KeyCode;

use crate::night::{Event, Night, NightTarget, Outcome};
use crate::screen::calibrating::calibrating;
use crate::screen::happening::{Happening, Stroke};
use crate::screen::keys::{self, Act, DOUBLE_STRIKE, Mode};
use crate::screen::panel::{Centred, Doing, Panel};
use crate::screen::scene::{Scene, record};
use crate::screen::shown::Settings;
use crate::screen::{doubt, looking, objects, sweeping, typing};
use crate::time::Utc;

/// Takes in what happened.
pub fn update(panel: &mut Panel, scene: &Scene<'_>, happening: &Happening) -> Vec<Doing> {
    match happening {
        Happening::Key(stroke) => struck(panel, scene, *stroke),
        Happening::Pasted(text) => {
            if panel.mode.types() {
                panel.typed.paste(text);
                changed(panel);
            }
            Vec::new()
        }
        _ => Vec::new(),
    }
}

fn struck(panel: &mut Panel, scene: &Scene<'_>, stroke: Stroke) -> Vec<Doing> {
    let mode = panel.mode;
    let doubled = panel
        .struck_at
        .is_some_and(|before| stroke.at.saturating_sub(before) < DOUBLE_STRIKE);
    if mode == Mode::Stepping && doubled {
        return Vec::new();
    }
    let Some(act) = keys::act(mode, stroke.key) else {
        if mode.types() && panel.typed.edit(stroke.key) {
            changed(panel);
        } else if mode == Mode::Help {
            panel.mode = panel.help_from;
        } else if stroke.key != KeyCode::Null {
            panel.say("no such key here: ? shows the keys");
        }
        return Vec::new();
    };
    panel.said = None;
    let doings = match mode {
        Mode::Stepping | Mode::Centring => acted(panel, scene, act),
        Mode::Help => {
            match act {
                Act::Light => panel.light = panel.light.next(),
                Act::Next => panel.help_page += 1,
                _ => panel.mode = panel.help_from,
            }
            Vec::new()
        }
        Mode::Calibration => calibrating(panel, scene, act),
        Mode::Objects => objects::looking(panel, scene, act),
        Mode::Field => looking::looking(panel, scene, act),
        Mode::Doubting => doubt::doubting(panel, act),
        Mode::Sweeping => sweeping::sweeping(panel, scene, act),
        _ => typing::typing(panel, scene, act),
    };
    if doings
        .iter()
        .any(|doing| matches!(doing, Doing::Record { .. }))
    {
        panel.struck_at = Some(stroke.at);
    }
    doings
}

/// What was typed has changed: nothing is chosen any more.
fn changed(panel: &mut Panel) {
    panel.chosen = 0;
    panel.said = None;
}

/// A key struck while stepping, or while centring a star.
fn acted(panel: &mut Panel, scene: &Scene<'_>, act: Act) -> Vec<Doing> {
    if let Some(doings) = recorded(panel, scene, act) {
        return doings;
    }
    let mode = panel.mode;
    match act {
        Act::Read => read_here(panel, scene, false),
        Act::Timed => timed(panel, scene),
        Act::Accept => centred(panel, scene.utc, false),
        Act::Light => {
            panel.light = panel.light.next();
            panel.say(format!("light: {}", panel.light.word()));
        }
        Act::Help => {
            panel.help_from = mode;
            panel.help_page = 0;
            panel.mode = Mode::Help;
        }
        Act::Leave => return vec![Doing::Leave],
        Act::Sun => match scene.shown.settings {
            Settings::Stopped {
                answerable: true, ..
            } => panel.enter(Mode::SunRisk),
            _ => panel.say("nothing is withheld here"),
        },
        Act::Cancel => {
            panel.enter(Mode::ChoosingStar);
            panel.star = None;
        }
        Act::Star => panel.enter(Mode::ChoosingStar),
        Act::Calibration => panel.enter(Mode::Calibration),
        Act::Sweep => sweeping::begin(panel, scene),
        Act::Objects => objects::open(panel, scene.from.night.state()),
        Act::Field => looking::open(panel, scene),
        Act::Search => panel.enter(Mode::Searching),
        Act::Note => panel.enter(Mode::Noting),
        Act::Clock => panel.enter(Mode::Clock),
        Act::Ring if mode == Mode::Centring => set_rings(panel, scene),
        Act::Ring => panel.enter(Mode::Ring),
        _ => {}
    }
    Vec::new()
}

/// What a key that changes the record comes to; nothing for one that does not.
fn recorded(panel: &mut Panel, scene: &Scene<'_>, act: Act) -> Option<Vec<Doing>> {
    let night = scene.from.night;
    let setting = || scene.shown.setting();
    let (event, said, why_not) = match act {
        Act::Next => (night.next(), String::new(), "this is the end of the list"),
        Act::Back => (night.back(), String::new(), "this is the head of the list"),
        Act::Found if was_found(night) => {
            let why_not = "found already: u takes it back, r reads the circles on it";
            (None, String::new(), why_not)
        }
        Act::Found if scene.shown.is_not_up() => {
            let why_not = "it is not up: what is in the eyepiece is something else";
            (None, String::new(), why_not)
        }
        Act::Found => {
            let said = format!("found: {}", current(night));
            (night.found(setting(), None), said, NO_OBJECT)
        }
        Act::Missed => {
            let said = format!("missed: {}", current(night));
            (night.missed(setting()), said, NO_OBJECT)
        }
        Act::Undo => (night.undo(), String::new(), "there is nothing to take back"),
        Act::Side => return Some(side(panel, scene)),
        _ => return None,
    };
    let Some(event) = event else {
        panel.say(why_not);
        return Some(Vec::new());
    };
    Some(record(event, said, panel.mode))
}

/// The star or the object drifts across the middle, with the hour circle set on a mark.
fn timed(panel: &mut Panel, scene: &Scene<'_>) {
    if !scene.from.observatory.mount.hour_circle.stands_still() {
        panel.say("a ring that rides with the drive shows the same mark all along: press r");
    } else if panel.mode == Mode::Centring {
        centred(panel, scene.utc, true);
    } else {
        read_here(panel, scene, true);
    }
}

const NO_OBJECT: &str = "no object is being dialled: press space for the first";

fn was_found(night: &Night) -> bool {
    let current = night.state().current_target();
    current.is_some_and(|entry| matches!(entry.outcome, Some(Outcome::Found(_))))
}

fn current(night: &Night) -> &str {
    let entry: Option<&NightTarget> = night.state().current_target();
    entry.map_or("", |entry| entry.target.name.as_str())
}

fn side(panel: &mut Panel, scene: &Scene<'_>) -> Vec<Doing> {
    let state = scene.from.night.state();
    if !scene.from.observatory.mount.kind.has_two_sides() {
        panel.say("this mount has one side");
        return Vec::new();
    }
    let shown = scene.shown.target.as_ref();
    let present = shown.and_then(|target| scene.from.reading_side(&scene.shown.moment, target));
    let (side, said) = match (state.side, present) {
        (Some(_), _) => (None, "the usual side of each object".to_owned()),
        (None, Some(side)) => {
            let other = side.other();
            let words = other.map_or("", |side| side.in_words());
            (other, format!("{words}, for every object"))
        }
        (None, None) => {
            panel.say(NO_OBJECT);
            return Vec::new();
        }
    };
    record(Event::SideChanged { side }, said, panel.mode)
}

/// The star stands in the middle at this moment, or drifts across it with the hour circle set on a
/// mark: what the circles show is typed next.
fn centred(panel: &mut Panel, utc: Utc, timed: bool) {
    if let Some(star) = panel.star.take() {
        panel.enter(Mode::Reading);
        panel.star = Some(Centred {
            at: Some(utc),
            timed,
            ..star
        });
    }
}

/// The star stands in the middle at this moment, and the rings that slip are turned to what was told: that is what they
/// show, and only a circle that is fixed is left to be read.
fn set_rings(panel: &mut Panel, scene: &Scene<'_>) {
    let told = &scene.shown.rings;
    if told.in_words().is_none() {
        panel.say("the circles of this mount are fixed: strike enter, and read them");
        return;
    }
    centred(panel, scene.utc, false);
    if let Some(star) = &mut panel.star {
        star.rings_set = true;
    }
    panel.typed.paste(told.hour.as_deref().unwrap_or_default());
    panel.typed.at_second = true;
    panel.typed.paste(told.dec.as_deref().unwrap_or_default());
    panel.typed.at_second = told.hour.is_some();
}

/// The object being dialled stands in the middle at this moment.
fn read_here(panel: &mut Panel, scene: &Scene<'_>, timed: bool) {
    match &scene.shown.target {
        Some(target) if matches!(scene.shown.settings, Settings::Dialled(_)) => {
            panel.star = Some(Centred {
                star: target.clone(),
                found: true,
                at: None,
                timed,
                rings_set: false,
            });
            centred(panel, scene.utc, timed);
        }
        _ => panel.say(NO_OBJECT),
    }
}
