//! A night being worked: the night and its journal, which never differ.

use std::path::Path;

use crate::night::effect::Effect;
use crate::night::event::{Event, Opening};
use crate::night::journal::{Journal, JournalFault, Notice};
use crate::night::night::{Night, Refusal, update};
use crate::time::Utc;

/// A night being worked.
pub struct Session {
    night: Night,
    journal: Journal,
}

/// How a session began.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Begun {
    /// The night had been opened before and goes on where it stopped.
    pub resumed: bool,
    /// What was found amiss in its journal.
    pub notices: Vec<Notice>,
    /// What is to be done.
    pub effects: Vec<Effect>,
}

/// Why an act is not done.
#[derive(Debug, thiserror::Error)]
pub enum SessionFault {
    /// It cannot be done as the night stands.
    #[error(transparent)]
    Refused(#[from] Refusal),
    /// It could not be recorded.
    #[error(transparent)]
    Journal(#[from] JournalFault),
    /// The journal is that of another site or mount.
    #[error(
        "this journal was opened for {what} \"{recorded}\", not \"{given}\": name another with --night"
    )]
    OtherNight {
        /// "the site" or "the mount".
        what: &'static str,
        /// The journal's.
        recorded: String,
        /// The one asked for.
        given: String,
    },
}

impl Session {
    /// Opens a night, or goes on with it where it stopped. Objects of the list that the night does
    /// not have yet are added to it.
    pub fn begin(path: &Path, utc: Utc, opening: Opening) -> Result<(Self, Begun), SessionFault> {
        let (journal, contents) = Journal::open(path)?;
        let mut session = Self {
            night: Night::replay(contents.events),
            journal,
        };
        let mut begun = Begun {
            resumed: false,
            notices: contents.notices,
            effects: Vec::new(),
        };
        let Some(recorded) = &session.night.state().opening else {
            begun.effects = session.act(utc, &Event::NightOpened(Box::new(opening)))?;
            return Ok((session, begun));
        };
        whose(recorded, (&opening.site, &opening.mount))?;
        begun.resumed = true;
        begun.effects = session.act(utc, &Event::SessionResumed)?;
        for target in opening.targets {
            if session.night.state().index_of(&target.name).is_none() {
                let target = Box::new(target);
                session.act(utc, &Event::TargetAdded { target })?;
            }
        }
        Ok((session, begun))
    }

    /// Does an act: recorded first, then done. On an error nothing has changed.
    pub fn act(&mut self, utc: Utc, event: &Event) -> Result<Vec<Effect>, SessionFault> {
        self.night.check(event)?;
        let stamped = self.journal.append(utc, event)?;
        Ok(update(&mut self.night, &stamped))
    }

    /// The night.
    #[must_use]
    pub const fn night(&self) -> &Night {
        &self.night
    }

    /// The journal's file.
    #[must_use]
    pub fn path(&self) -> &Path {
        self.journal.path()
    }
}

/// Refuses the journal of another site or mount, each by the name of its file.
pub fn whose(recorded: &Opening, (site, mount): (&str, &str)) -> Result<(), SessionFault> {
    same("the site", &recorded.site, site)?;
    same("the mount", &recorded.mount, mount)
}

fn same(what: &'static str, recorded: &str, given: &str) -> Result<(), SessionFault> {
    if recorded == given {
        Ok(())
    } else {
        Err(SessionFault::OtherNight {
            what,
            recorded: recorded.to_owned(),
            given: given.to_owned(),
        })
    }
}
