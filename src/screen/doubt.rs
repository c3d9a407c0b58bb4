//! A reading too far from what was expected: what may have happened, the likeliest first, each with what it would be taken
//! for. Nothing is taken or dropped before the observer has chosen.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::dial::Sighting;
use crate::dial::doubt::{self, Circumstances, Correction, Explanation};
use crate::metal::{Reading, Side};
use crate::night::{Circle, Event, State};
use crate::screen::keys::{Act, Mode};
use crate::screen::light::Strength;
use crate::screen::look::{Look, wrapped};
use crate::screen::panel::{Centred, Choice, Doing, Panel};
use crate::screen::reading::{Sitting, Whole};
use crate::screen::scene::{Scene, reading_event};
use crate::screen::shown::From;
use crate::screen::words::{chance, rough};

/// More explanations than this are no help.
const MOST: usize = 4;

/// What a reading may be taken for; nothing if there is nothing to say against it.
pub(super) fn choices(scene: &Scene<'_>, star: &Centred, whole: &Whole) -> Vec<Choice> {
    let Some(moment) = scene.from.centred_moment() else {
        return Vec::new();
    };
    let Some(sitting) = scene.from.sitting(&moment) else {
        return Vec::new();
    };
    let state = scene.from.night.state();
    let Some(suspicion) = sitting.suspicion(&whole.sighting, circumstances(state)) else {
        return Vec::new();
    };
    let offered = Offered {
        scene,
        star,
        sitting: &sitting,
        whole,
    };
    let explained = suspicion.explanations.iter().take(MOST);
    let mut choices: Vec<Choice> = explained
        .filter_map(|explanation| offered.choice(explanation))
        .collect();
    let far = format!(
        "{} and {} from expected",
        rough(suspicion.hour_off),
        rough(suspicion.dec_off)
    );
    choices.push(Choice {
        share: suspicion.sound,
        words: format!("sound for all that, {far}: keep it as read"),
        events: reading_event(scene, star, whole.reading.clone())
            .into_iter()
            .collect(),
        said: format!("kept as read: {}", star.star.name),
    });
    choices.push(Choice {
        share: suspicion.unexplained,
        words: "another mistake: discard it, nothing is recorded".to_owned(),
        events: Vec::new(),
        said: "discarded".to_owned(),
    });
    choices
}

/// What the record says of the clock.
fn circumstances(state: &State) -> Circumstances {
    let last = state.readings_in_use().last();
    Circumstances {
        clock_agreed: last.is_some_and(|read| read.clock_jumps == state.clock_jumps),
        clock_leapt_s: state
            .clock_leapt_s
            .filter(|_| last.is_some_and(|read| read.clock_jumps != state.clock_jumps)),
    }
}

/// What choices are made of.
struct Offered<'o> {
    scene: &'o Scene<'o>,
    star: &'o Centred,
    sitting: &'o Sitting<'o>,
    whole: &'o Whole,
}

impl Offered<'_> {
    /// What an explanation comes to; nothing if it cannot be taken for anything.
    fn choice(&self, explanation: &Explanation) -> Option<Choice> {
        let typed = &self.whole.reading;
        let doubted = format!(
            "typed {} and {}; {}",
            typed.hour, typed.dec, explanation.text
        );
        let sighting = &self.whole.sighting;
        let read = |sitting: &Sitting<'_>, sighting: &Sighting| {
            let reading = sitting.recorded(sighting, &doubted)?;
            reading_event(self.scene, self.star, reading)
        };
        let events = match &explanation.correction {
            Correction::Reading {
                circle, reading, ..
            } => vec![read(self.sitting, &with(sighting, *circle, *reading))?],
            Correction::Star(star) => {
                let sitting = Sitting {
                    star,
                    ..*self.sitting
                };
                let reading = sitting.recorded(sighting, &doubted)?;
                // an object found is not found where another stood
                vec![Event::StarRead(Box::new(reading))]
            }
            Correction::Side(side) => {
                vec![read(
                    &self.on(*side),
                    &Sighting {
                        side: *side,
                        ..*sighting
                    },
                )?]
            }
            Correction::Slipped { hour, dec } => self.slipped(hour.is_some(), dec.is_some())?,
            Correction::Clock { seconds } => self.clock(*seconds, &doubted)?,
        };
        Some(Choice {
            share: explanation.share,
            words: explanation.text.clone(),
            events,
            said: format!("read: {}: {}", self.star.star.name, explanation.text),
        })
    }

    const fn on(&self, side: Side) -> Sitting<'_> {
        Sitting {
            side,
            ..*self.sitting
        }
    }

    /// The rings named have new zeros, and this is the first reading under them.
    fn slipped(&self, hour: bool, dec: bool) -> Option<Vec<Event>> {
        let set = |circle| Event::RingSet {
            circle,
            reading: None,
        };
        let mut events = Vec::new();
        if hour {
            events.push(set(Circle::Hour));
        }
        if dec {
            events.push(set(Circle::Declination));
        }
        events.push(reading_event(
            self.scene,
            self.star,
            self.whole.reading.clone(),
        )?);
        Some(events)
    }

    /// The clock is put right, and the star read by it.
    fn clock(&self, seconds: f64, doubted: &str) -> Option<Vec<Event>> {
        let corrected = self.scene.from.night.state().clock_correction_s + seconds;
        let moment = self.sitting.moment.later(seconds);
        let sitting = Sitting {
            moment: &moment,
            ..*self.sitting
        };
        let reading = sitting.recorded(&self.whole.sighting, doubted)?;
        Some(vec![
            Event::ClockCorrected { seconds: corrected },
            reading_event(self.scene, self.star, reading)?,
        ])
    }
}

/// The sighting with another number under one index.
const fn with(sighting: &Sighting, circle: doubt::Circle, reading: Reading) -> Sighting {
    let mut corrected = *sighting;
    match circle {
        doubt::Circle::Hour => corrected.hour = reading,
        doubt::Circle::HourOpposite => corrected.hour_opposite = Some(reading),
        doubt::Circle::Dec => corrected.dec = reading,
        doubt::Circle::DecOpposite => corrected.dec_opposite = Some(reading),
    }
    corrected
}

/// A key struck while a reading is doubted.
pub(super) fn doubting(panel: &mut Panel, act: Act) -> Vec<Doing> {
    match act {
        Act::Up => panel.chosen = panel.chosen.saturating_sub(1),
        Act::Down => panel.chosen = (panel.chosen + 1).min(panel.choices.len().saturating_sub(1)),
        // what was typed is still there, to be looked at again
        Act::Cancel => panel.mode = Mode::Reading,
        Act::Accept => {
            let Some(choice) = panel.choices.get(panel.chosen).cloned() else {
                return Vec::new();
            };
            if choice.events.is_empty() {
                panel.enter(Mode::Stepping);
                panel.say(choice.said.as_str());
            }
            let record = |event| Doing::Record {
                event: Box::new(event),
                said: choice.said.clone(),
                then: Mode::Stepping,
            };
            return choice.events.into_iter().map(record).collect();
        }
        _ => {}
    }
    Vec::new()
}

/// Draws what the reading may be taken for.
pub fn draw(look: Look, buffer: &mut Buffer, area: Rect, from: &From<'_>) {
    let panel = from.panel;
    let mut rows = area.rows();
    let mut put = |text: &str, strength| {
        if let Some(row) = rows.next() {
            look.left(buffer, row, text, strength);
        }
    };
    if let Some(star) = &panel.star {
        let (hour, dec) = (panel.typed.first.value(), panel.typed.second.value());
        let heading = format!("{}: {hour} and {dec} cannot well be", star.star.name);
        put(&heading, Strength::Strong);
    }
    put(
        "what happened? what is chosen is what is taken",
        Strength::Plain,
    );
    put("", Strength::Plain);
    let width = usize::from(area.width).saturating_sub(LEAD);
    for (place, choice) in panel.choices.iter().enumerate() {
        let (mark, strength) = if place == panel.chosen {
            (">", Strength::Strong)
        } else {
            (" ", Strength::Plain)
        };
        let share = chance_briefly(choice.share);
        for (line, text) in wrapped(&choice.words, width).iter().enumerate() {
            let lead = if line == 0 {
                format!("{mark} {share:>5}  ")
            } else {
                " ".repeat(LEAD)
            };
            put(&format!("{lead}{text}"), strength);
        }
    }
}

/// The columns before the words: the mark, the share.
const LEAD: usize = 9;

fn chance_briefly(share: f64) -> String {
    chance(share).replace("under 1 %", "< 1 %")
}
