//! The observer's desk: the record, what is known of the mount, and what lies on the screen. It is
//! handed what happens and when, and holds neither clock nor terminal.

use crate::catalog::Target;
use crate::dial::bright::FAINTEST_RIVAL_HP;
use crate::night::{Begun, Effect, Event, Known, Session};
use crate::screen::happening::Happening;
use crate::screen::insight::Insight;
use crate::screen::keys::Mode;
use crate::screen::light::Light;
use crate::screen::look::Look;
use crate::screen::observatory::Observatory;
use crate::screen::outlook::Foresight;
use crate::screen::panel::{Doing, Panel};
use crate::screen::scene::Scene;
use crate::screen::shown::{From, Shown};
use crate::screen::update::update;
use crate::screen::view::view;
use crate::sky::Moment;
use crate::time::Utc;

/// The observer's desk.
pub struct Desk<'d> {
    observatory: &'d Observatory,
    /// The bright stars, the brightest first.
    bright: Vec<Target>,
    session: &'d mut Session,
    known: Known,
    panel: Panel,
    /// The sky as the desk was opened, from which later moments are had cheaply.
    base: Moment,
    foresight: Foresight,
    shown: Shown,
}

impl<'d> Desk<'d> {
    /// Opens the desk on a night begun.
    #[must_use]
    pub fn open(
        observatory: &'d Observatory,
        session: &'d mut Session,
        begun: &Begun,
        light: Light,
        utc: Utc,
    ) -> Self {
        let state = session.night().state();
        let known = Known::of(&observatory.grounds(), state);
        let bright = observatory.catalogue.bright_stars(FAINTEST_RIVAL_HP);
        let mut panel = Panel::new(light);
        let resumed = begun.resumed.then(|| {
            let (found, missed) = state.tally();
            format!("the night goes on: {found} found, {missed} missed so far")
        });
        let notices = begun.notices.iter().map(ToString::to_string);
        let said: Vec<String> = notices.chain(resumed).collect();
        panel.said = Some(said.join("; ")).filter(|said| !said.is_empty());
        let base = Moment::new(&observatory.observer, utc);
        let mut foresight = Foresight::default();
        let from = From {
            observatory,
            bright: &bright,
            night: session.night(),
            known: &known,
            panel: &panel,
            moment: &base,
        };
        let shown = from.show(&mut foresight);
        let mut desk = Self {
            observatory,
            bright,
            session,
            known,
            panel,
            base,
            foresight,
            shown,
        };
        for effect in &begun.effects {
            desk.follow(effect);
        }
        desk.show(utc);
        desk
    }

    /// The light in force.
    #[must_use]
    pub const fn light(&self) -> Light {
        self.panel.light
    }

    /// The correction of the clock in force, in seconds, positive if the clock is slow.
    #[must_use]
    pub fn clock_correction_s(&self) -> f64 {
        self.session.night().state().clock_correction_s
    }

    /// Works out what there is to show at an instant.
    pub fn show(&mut self, utc: Utc) {
        let moment = self.base.later(utc.seconds_since(self.base.utc()));
        let from = From {
            observatory: self.observatory,
            bright: &self.bright,
            night: self.session.night(),
            known: &self.known,
            panel: &self.panel,
            moment: &moment,
        };
        self.shown = from.show(&mut self.foresight);
    }

    /// Draws it.
    pub fn draw(&self, look: Look, buffer: &mut ratatui::buffer::Buffer) {
        view(look, buffer, &self.from(), &self.shown);
    }

    fn from(&self) -> From<'_> {
        From {
            observatory: self.observatory,
            bright: &self.bright,
            night: self.session.night(),
            known: &self.known,
            panel: &self.panel,
            moment: &self.shown.moment,
        }
    }

    /// Lets what happened at an instant take effect. True if the observer leaves.
    pub fn take_in(&mut self, happening: &Happening, utc: Utc) -> bool {
        let mut panel = self.panel.clone();
        let scene = Scene {
            from: self.from(),
            shown: &self.shown,
            utc,
        };
        let doings = update(&mut panel, &scene, happening);
        self.panel = panel;
        for doing in doings {
            match doing {
                Doing::Leave => return true,
                Doing::Record { event, said, then } => self.record(utc, &event, said, then),
            }
        }
        // the next key of a burst acts on what this one has led to
        self.show(self.shown.moment.utc());
        false
    }

    /// Records that the clock jumped by so many seconds, forward if positive.
    pub fn clock_jumped(&mut self, seconds: f64, utc: Utc) {
        let mode = self.panel.mode;
        self.record(utc, &Event::ClockJumped { seconds }, String::new(), mode);
    }

    /// Closes the desk in good order.
    ///
    /// The record is whole already: if even this line cannot be written, nothing is lost.
    pub fn close(self, utc: Utc) {
        let _ = self.session.act(utc, &Event::SessionClosed);
    }

    /// Makes an act safe, and only then shows it done.
    fn record(&mut self, utc: Utc, event: &Event, said: String, then: Mode) {
        match self.session.act(utc, event) {
            Ok(effects) => {
                if self.panel.mode != then {
                    self.panel.enter(then);
                }
                self.panel.said = Some(said).filter(|said| !said.is_empty());
                self.foresight.forget();
                for effect in &effects {
                    self.follow(effect);
                }
                if event.reading().is_some() {
                    self.say_what_it_told();
                }
            }
            Err(fault) => self.panel.say(format!("NOT recorded: {fault}")),
        }
    }

    /// After a reading: what the next one would gain.
    fn say_what_it_told(&mut self) {
        let from = self.from();
        let setup = from.setup(false);
        let state = self.session.night().state();
        let insight = Insight::of(&setup, from.moment, &self.bright, &self.known, state);
        let said = self.panel.said.take().unwrap_or_default();
        self.panel
            .say(format!("{said}. {}", insight.next_in_words()));
    }

    fn follow(&mut self, effect: &Effect) {
        match effect {
            Effect::Refit => {
                self.known = Known::of(&self.observatory.grounds(), self.session.night().state());
            }
            Effect::Say(words) => self.panel.say(words.to_string()),
            // the loop asks for the correction, and ends by itself
            Effect::CorrectClock(_) | Effect::Quit => {}
        }
    }
}
