//! What follows from what is known of the mount: which star next, what to do about the axis, what the
//! stars cannot tell apart. Worked out when the observer looks, and again when something has changed.

use crate::night::Known;
use crate::screen::observatory::Observatory;
use crate::sky::Moment;

/// What follows from what is known of the mount.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Insight {
    /// In sentences, the most useful first.
    pub words: Vec<String>,
}

impl Insight {
    /// At a moment.
    #[must_use]
    pub fn of(_observatory: &Observatory, _known: &Known, _moment: &Moment) -> Self {
        Self::default()
    }
}
