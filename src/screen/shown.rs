//! Everything the screen shows at one instant, worked out once from the record and the clock.
//!
//! What the observer sees is what a key acts on: the same value goes to the view and to the update.

use std::rc::Rc;

use crate::catalog::{Filter, Target};
use crate::dial::bright::Placed;
use crate::dial::neighbour::{self, Neighbour};
use crate::dial::ring::RingSetting;
use crate::dial::{self, Field, NotDialled, Setup};
use crate::metal::Side;
use crate::night::{Known, Night, Setting};
use crate::screen::ahead::{self, Ahead};
use crate::screen::field::MOST_STARS;
use crate::screen::insight::Insight;
use crate::screen::keys::Mode;
use crate::screen::observatory::Observatory;
use crate::screen::outlook::{Foresight, Outlook};
use crate::screen::panel::Panel;
use crate::screen::pretence;
use crate::screen::reading::{Sitting, TypedReading};
use crate::screen::settings::{near_the_sun, stopped};
use crate::screen::standing::{request, tube};
use crate::sky::Moment;

pub use crate::screen::settings::Settings;

/// More matches than a screen has lines.
const MATCHES: usize = 30;

/// What the screen shows at one instant.
#[derive(Clone, Debug)]
pub struct Shown {
    /// The sky now.
    pub moment: Moment,
    /// The object or star being dialled.
    pub target: Option<Target>,
    /// Its settings.
    pub settings: Settings,
    /// A bright star to start from, where that is worth the detour.
    pub neighbour: Option<Neighbour>,
    /// Where it is going.
    pub outlook: Option<Outlook>,
    /// What follows from what is known of the mount, while the observer looks at that.
    pub insight: Option<Rc<Insight>>,
    /// What there is to expect of the objects of the list, while the observer looks at that.
    pub ahead: Rc<Vec<Option<Ahead>>>,
    /// The field of the optic chosen, while the observer looks at that and nothing withholds it.
    pub field: Option<Field>,
    /// The stars to choose from.
    pub stars: Vec<Placed>,
    /// The objects that match what is typed.
    pub matches: Vec<Target>,
    /// The circles as typed.
    pub reading: Option<TypedReading>,
    /// While a star is centred: what to turn rings to that are set by hand.
    pub rings: RingSetting,
    /// On the demonstration, what the circles of the pretended mount show with the star centred.
    pub pretended: Option<(String, String)>,
}

/// What it is worked out from.
#[derive(Clone, Copy)]
pub struct From<'f> {
    /// What stays the same.
    pub observatory: &'f Observatory,
    /// The bright stars, the brightest first.
    pub bright: &'f [Target],
    /// The record.
    pub night: &'f Night,
    /// What is known of the mount.
    pub known: &'f Known,
    /// The rest.
    pub panel: &'f Panel,
    /// The sky now.
    pub moment: &'f Moment,
}

/// Said where there is nothing to set yet, at a site of the program's own.
const DEMONSTRATION: &str = "This is the demonstration: neither the station nor its mount exists, so with a star centred the \
     screen also says what the circles show. For your own: nonius new mount NAME, then nonius new site NAME.";

impl From<'_> {
    /// Works it out.
    #[must_use]
    pub fn show(&self, foresight: &mut Foresight) -> Shown {
        let panel = self.panel;
        let state = self.night.state();
        let star = panel.star.as_ref().map(|centred| centred.star.clone());
        let listed = state
            .current_target()
            .and_then(|entry| entry.target.target());
        let target = star.or(listed);
        let nothing = |words: &str| Settings::Nothing {
            words: words.to_owned(),
            after: match self.observatory.demonstration {
                Some(_) => DEMONSTRATION,
                None => "",
            },
        };
        let outlook = target.as_ref().map(|target| {
            foresight.outlook(self.observatory, &target.name, &target.source, self.moment)
        });
        let settings = match (&target, state.current_target()) {
            (Some(target), _) => self.settings(target, outlook),
            (None, Some(entry)) => nothing(&format!("no catalogue knows {}", entry.target.name)),
            (None, None) if state.targets.is_empty() => {
                nothing("the list is empty: press / to look up an object")
            }
            (None, None) if self.known.estimate.is_calibrated() => {
                nothing("press space for the first object of the list, s to read another star")
            }
            (None, None) => {
                nothing("press s to read a star, or space for the first object of the list")
            }
        };
        let typed = panel.typed.line().value();
        let insight = matches!(panel.mode, Mode::Calibration | Mode::ChoosingStar).then(|| {
            let work_out = || {
                let setup = self.setup(false);
                Insight::of(&setup, self.moment, self.bright, self.known, state)
            };
            foresight.insight(self.moment.utc(), work_out)
        });
        let neighbour = self.neighbour(&settings, foresight);
        let field = self.field(&settings, target.as_ref());
        Shown {
            moment: *self.moment,
            settings,
            field,
            neighbour,
            ahead: match panel.mode {
                Mode::Objects => {
                    let work_out = || ahead::ahead(self.observatory, state, self.moment);
                    foresight.ahead(self.moment.utc(), work_out)
                }
                _ => Rc::default(),
            },
            outlook,
            stars: match (&insight, panel.mode) {
                (Some(insight), Mode::ChoosingStar) => Self::stars(insight, typed),
                _ => Vec::new(),
            },
            insight,
            matches: match panel.mode {
                Mode::Searching => self.matches(typed),
                _ => Vec::new(),
            },
            reading: self.reading(),
            rings: self.rings(),
            pretended: self.pretended(),
            target,
        }
    }

    /// The field of the optic chosen: of what is dialled, and of nothing that is withheld.
    fn field(&self, settings: &Settings, target: Option<&Target>) -> Option<Field> {
        let (Settings::Dialled(dial), Mode::Field) = (settings, self.panel.mode) else {
            return None;
        };
        let optic = self.observatory.mount.optics.get(self.panel.chosen)?;
        Some(Field::of(
            (&self.setup(false), &self.observatory.lead(self.moment)),
            (&self.observatory.catalogue, target?),
            (dial, optic),
            MOST_STARS,
        ))
    }

    /// A bright star to start from, where that is worth the detour.
    fn neighbour(&self, settings: &Settings, foresight: &mut Foresight) -> Option<Neighbour> {
        let Settings::Dialled(dial) = settings else {
            return None;
        };
        if self.panel.mode != Mode::Stepping {
            return None;
        }
        let work_out = || {
            let setup = self.setup(false);
            neighbour::neighbour(&setup, self.moment, dial, self.bright)
        };
        foresight
            .neighbour(&dial.target, self.moment.utc(), work_out)
            .filter(Neighbour::is_worth_it)
    }

    /// What settings are worked out from.
    #[must_use]
    pub fn setup(&self, sun_risk_accepted: bool) -> Setup<'_> {
        let observatory = self.observatory;
        let state = self.night.state();
        Setup {
            horizon: &observatory.horizon,
            mount: &observatory.mount,
            estimate: &self.known.estimate,
            side: request(state),
            tube: tube(state),
            aside: self.panel.sweep.aside(),
            lead_s: observatory.lead_s,
            calibrated_at: self.known.read_at,
            sun_risk_accepted,
        }
    }

    fn settings(&self, target: &Target, outlook: Option<Outlook>) -> Settings {
        let observatory = self.observatory;
        let state = self.night.state();
        let accepted =
            observatory.sun_risk_accepted || state.sun_risk_is_acknowledged(&target.name);
        let setup = self.setup(accepted);
        match dial::dial(&setup, &observatory.lead(self.moment), target) {
            Ok(dial) => {
                let forced = state.side.is_some();
                let stopped = stopped(&dial, accepted, &self.rises(outlook), forced);
                stopped.unwrap_or_else(|| Settings::Dialled(Box::new(dial)))
            }
            Err(NotDialled::TheSun | NotDialled::SunNear { .. }) => {
                near_the_sun("this lies near the Sun, and the Sun is up")
            }
            Err(other) => Settings::Stopped {
                heading: "out of reach",
                words: other.to_string(),
                answerable: false,
            },
        }
    }

    /// When an object that is not up comes clear of the horizon mask, in words.
    fn rises(&self, outlook: Option<Outlook>) -> String {
        let zone = self.observatory.zone;
        match outlook.and_then(|outlook| outlook.changes) {
            Some(at) => format!("; clear from {}", zone.civil(at).format("%H:%M")),
            None => "; it does not come clear of the horizon here".to_owned(),
        }
    }

    /// The stars to choose from whose names fit what is typed.
    fn stars(insight: &Insight, typed: &str) -> Vec<Placed> {
        let typed = typed.trim().to_lowercase();
        let fits = |placed: &&Placed| {
            let mut names = placed.star.names();
            names.any(|name| name.to_lowercase().contains(&typed))
        };
        insight.stars.iter().filter(fits).cloned().collect()
    }

    fn matches(&self, typed: &str) -> Vec<Target> {
        if typed.trim().is_empty() {
            // the search has just been opened: the first letter shall not wait for the index
            self.observatory.catalogue.prepare_search();
            return Vec::new();
        }
        // coordinates, and names typed to the end
        let resolved = self.observatory.catalogue.known(typed);
        let filter = Filter {
            limit: MATCHES,
            ..Filter::default()
        };
        let found = self.observatory.catalogue.search(typed, &filter);
        let others = found
            .into_iter()
            .map(|found| found.target)
            .filter(|target| {
                resolved
                    .as_ref()
                    .is_none_or(|first| first.name != target.name)
            });
        resolved.clone().into_iter().chain(others).collect()
    }

    /// The side of the pier the star is read from: the one it is dialled for.
    #[must_use]
    pub fn reading_side(&self, moment: &Moment, target: &Target) -> Option<Side> {
        let state = self.night.state();
        let place = moment.observed(&moment.apparent(&target.source));
        let present = state.tube.as_ref().map(|tube| tube.side);
        self.observatory
            .mount
            .choose_side(request(state), place.hour_angle, present)
            .ok()
    }

    fn reading(&self) -> Option<TypedReading> {
        let moment = self.centred_moment()?;
        Some(self.sitting(&moment)?.understand(&self.panel.typed))
    }

    /// The reading being typed: what is read, from where, and when.
    #[must_use]
    pub fn sitting<'s>(&'s self, moment: &'s Moment) -> Option<Sitting<'s>> {
        let centred = self.panel.star.as_ref()?;
        Some(Sitting {
            observatory: self.observatory,
            bright: self.bright,
            known: self.known,
            moment,
            star: &centred.star,
            side: self.reading_side(moment, &centred.star)?,
            timed: centred.timed,
        })
    }

    /// The sky as the star stood in the middle.
    #[must_use]
    pub fn centred_moment(&self) -> Option<Moment> {
        let at = self.panel.star.as_ref()?.at?;
        Some(self.moment.later(at.seconds_since(self.moment.utc())))
    }

    fn rings(&self) -> RingSetting {
        let Some(star) = &self.panel.star else {
            return RingSetting::default();
        };
        let setup = self.setup(false);
        let side = self.reading_side(self.moment, &star.star);
        side.and_then(|side| RingSetting::on(&setup, self.moment, &star.star.source, side).ok())
            .unwrap_or_default()
    }

    fn pretended(&self) -> Option<(String, String)> {
        let star = &self.panel.star.as_ref()?.star;
        let moment = self.centred_moment().unwrap_or(*self.moment);
        let side = self.reading_side(&moment, star)?;
        pretence::circles(self.observatory, self.night.state(), &moment, (star, side))
    }
}

impl Shown {
    /// True if the object being dialled is below the horizon.
    #[must_use]
    pub fn is_not_up(&self) -> bool {
        self.settings.are_of_what_is_not_up()
    }

    /// The settings shown, for the record.
    #[must_use]
    pub fn setting(&self) -> Option<Setting> {
        let Settings::Dialled(dial) = &self.settings else {
            return None;
        };
        Some(Setting {
            hour: dial.hour.text.clone(),
            dec: dial.dec.text.clone(),
            side: dial.side,
            axes: dial.axes.into(),
        })
    }
}
