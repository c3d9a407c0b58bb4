//! A night: its events so far and what they add up to.
//!
//! Taking back is exact: the state after it is that of the same events without the one taken back,
//! found by going through them again.

use std::collections::BTreeSet;

use crate::night::effect::{self, Effect};
use crate::night::event::{Event, Stamped};
use crate::night::state::State;

/// A night so far.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Night {
    history: Vec<Stamped>,
    /// The numbers of the events taken back.
    taken_back: BTreeSet<u64>,
    state: State,
}

/// Why an act cannot be done as the night stands; it is not recorded.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum Refusal {
    /// Every act has been taken back already.
    #[error("there is nothing to take back")]
    NothingToTakeBack,
    /// The night has begun.
    #[error("the night is open already")]
    AlreadyOpen,
    /// The night has not begun.
    #[error("the night is not open yet")]
    NotOpen,
    /// Another object, or none, stands at that place of the list.
    #[error("{0} does not stand there in the list")]
    NotInTheList(String),
    /// No reading was recorded there.
    #[error("there is no such reading")]
    NoSuchReading,
}

/// Records an event and says what follows from it. Pure: no file, no clock, no chance.
pub fn update(night: &mut Night, stamped: &Stamped) -> Vec<Effect> {
    let before = night.state.clone();
    let taken_back = match &stamped.event {
        Event::Undone { line } => night.standing_act(*line).cloned(),
        _ => None,
    };
    night.record(stamped.clone());
    effect::of(&before, &night.state, stamped, taken_back.as_ref())
}

impl Night {
    /// The night these events add up to.
    #[must_use]
    pub fn replay(events: Vec<Stamped>) -> Self {
        let mut night = Self::default();
        for stamped in events {
            night.record(stamped);
        }
        night
    }

    /// Where it stands.
    #[must_use]
    pub const fn state(&self) -> &State {
        &self.state
    }

    /// Every event recorded, also those taken back.
    #[must_use]
    pub fn history(&self) -> &[Stamped] {
        &self.history
    }

    /// The events that stand: those not taken back, without the takings back themselves.
    #[must_use]
    pub fn standing(&self) -> impl DoubleEndedIterator<Item = &Stamped> {
        self.history.iter().filter(|stamped| {
            !matches!(stamped.event, Event::Undone { .. })
                && !self.taken_back.contains(&stamped.number)
        })
    }

    /// The last act that stands and can be taken back.
    #[must_use]
    pub fn last_act(&self) -> Option<&Stamped> {
        self.standing()
            .rev()
            .find(|stamped| stamped.event.can_be_undone())
    }

    /// Why this event cannot be done as the night stands.
    pub fn check(&self, event: &Event) -> Result<(), Refusal> {
        let listed = |name: &str| {
            let found = self.state.index_of(name);
            found.ok_or_else(|| Refusal::NotInTheList(name.to_owned()))
        };
        let is_open = self.state.opening.is_some();
        match event {
            Event::NightOpened(_) if is_open => Err(Refusal::AlreadyOpen),
            Event::NightOpened(_) => Ok(()),
            _ if !is_open => Err(Refusal::NotOpen),
            Event::Undone { line } => match self.last_act() {
                Some(last) if last.number == *line => Ok(()),
                _ => Err(Refusal::NothingToTakeBack),
            },
            Event::TargetTaken { place, target } => {
                let at = place.checked_sub(1);
                match at.and_then(|index| self.state.targets.get(index)) {
                    Some(entry) if entry.target.name == target.name => Ok(()),
                    _ => Err(Refusal::NotInTheList(target.name.clone())),
                }
            }
            Event::Found { target, .. }
            | Event::Missed { target, .. }
            | Event::Note {
                target: Some(target),
                ..
            } => listed(target).map(|_| ()),
            Event::ReadingUsed { line, .. } => {
                let mut readings = self.state.readings.iter();
                match readings.find(|read| read.line == *line) {
                    Some(_) => Ok(()),
                    None => Err(Refusal::NoSuchReading),
                }
            }
            _ => Ok(()),
        }
    }

    fn standing_act(&self, line: u64) -> Option<&Stamped> {
        self.standing()
            .find(|stamped| stamped.number == line && stamped.event.can_be_undone())
    }

    fn record(&mut self, stamped: Stamped) {
        if let Event::Undone { line } = stamped.event {
            // the act may be missing, where its line was damaged
            if self.standing_act(line).is_some() {
                self.taken_back.insert(line);
                self.state = self.again();
            }
        } else {
            self.state.apply(&stamped);
        }
        self.history.push(stamped);
    }

    fn again(&self) -> State {
        let mut state = State::default();
        for stamped in self.standing() {
            state.apply(stamped);
        }
        state
    }
}
