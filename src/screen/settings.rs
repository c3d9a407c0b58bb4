//! What there is to set, or what stands in its place.

use crate::dial::{CautionCode, Dial};

/// What there is to set.
#[derive(Clone, Debug, PartialEq)]
pub enum Settings {
    /// These are the settings.
    Dialled(Box<Dial>),
    /// Following them could hurt: the words stand in their place.
    Stopped {
        /// What it is about, in a word or two.
        heading: &'static str,
        /// The words.
        words: String,
        /// The observer may answer for it.
        answerable: bool,
    },
    /// There is nothing to set.
    Nothing {
        /// Why.
        words: String,
        /// What else is worth knowing; may be empty.
        after: &'static str,
    },
}

/// The heading over an object below the horizon.
const NOT_UP: &str = "not up";

impl Settings {
    /// True if what they are for is below the horizon.
    #[must_use]
    pub fn are_of_what_is_not_up(&self) -> bool {
        matches!(self, Self::Stopped { heading, .. } if *heading == NOT_UP)
    }
}

/// What stops settings that could be followed to someone's harm.
#[must_use]
pub fn stopped(
    dial: &Dial,
    sun_risk_accepted: bool,
    rises: &str,
    side_is_forced: bool,
) -> Option<Settings> {
    let caution = dial.cautions.iter().find(|caution| match caution.code {
        CautionCode::NearSun => !sun_risk_accepted,
        CautionCode::BelowHorizon | CautionCode::BeyondLimit => true,
        _ => false,
    })?;
    Some(match caution.code {
        CautionCode::NearSun => near_the_sun(&caution.text),
        CautionCode::BelowHorizon => Settings::Stopped {
            heading: NOT_UP,
            words: caution.text.clone() + rises,
            answerable: false,
        },
        _ => Settings::Stopped {
            heading: "out of reach",
            words: if side_is_forced {
                format!("{}. t goes back to the usual side", caution.text)
            } else {
                caution.text.clone()
            },
            answerable: false,
        },
    })
}

/// What stands in place of the settings of what is near the Sun.
#[must_use]
pub fn near_the_sun(why: &str) -> Settings {
    Settings::Stopped {
        heading: "THE SUN",
        words: format!(
            "{why}. Sunlight in a telescope or a finder blinds at once and sets things on fire. \
             The settings are withheld. The rules of the house and the person in charge come first."
        ),
        answerable: true,
    }
}
