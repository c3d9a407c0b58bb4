//! What an observer must know before following a setting.
//!
//! The cautions advise; the rules of the house, the person in charge and qualified practice come first.

use std::fmt;

/// What a caution is about.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, serde::Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum CautionCode {
    /// Below the level horizon.
    BelowHorizon,
    /// Behind a wall, a hill or a tree of the site's horizon mask.
    BehindHorizonMask,
    /// So low that the air spoils the view.
    Low,
    /// The Sun is up and within [`NEAR_SUN`](crate::dial::sun::NEAR_SUN) of the target or of the way there.
    NearSun,
    /// The Sun is up.
    SunUp,
    /// The Moon is up and near.
    NearMoon,
    /// Out of the mount's reach on this side of the pier.
    BeyondLimit,
    /// So near the pole that the hour circle tells little.
    NearPole,
    /// The tube must soon go to the other side of the pier.
    TurnOverSoon,
    /// No star has been read: the settings are those of a perfect mount.
    Uncalibrated,
    /// The last star was read long ago.
    StaleCalibration,
    /// The elements of the orbit hold for an instant far from now.
    OldElements,
}

/// A caution, in words for the observer.
#[derive(Clone, Debug, PartialEq, Eq, serde::Serialize)]
pub struct Caution {
    /// What it is about.
    pub code: CautionCode,
    /// The words.
    pub text: String,
}

impl Caution {
    pub(crate) fn new(code: CautionCode, text: impl Into<String>) -> Self {
        Self {
            code,
            text: text.into(),
        }
    }
}

impl fmt::Display for Caution {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.text)
    }
}
