//! What stays the same while the screen is open: the place, the mount, the catalogues, and what was
//! believed of the mount before.

use crate::catalog::Catalogue;
use crate::estimate::{Prior, Sight};
use crate::metal::{Mount, MountErrors};
use crate::night::{EarlierNight, Grounds};
use crate::sky::{HorizonMask, Moment, Observer};
use crate::time::{CivilZone, Utc};

/// What stays the same while the screen is open.
#[derive(Clone, Debug)]
pub struct Observatory {
    /// The site's name for people.
    pub site: String,
    /// Its civil time.
    pub zone: CivilZone,
    /// The observer there.
    pub observer: Observer,
    /// What hides the sky.
    pub horizon: HorizonMask,
    /// The mount.
    pub mount: Mount,
    /// The catalogues.
    pub catalogue: Catalogue,
    /// What an earlier night taught of this mount, if one is recorded.
    pub earlier_night: Option<EarlierNight>,
    /// What is believed of the mount's errors before any star of the night.
    pub prior: Prior,
    /// Stars read before the night, from a file of readings.
    pub earlier_sights: Vec<Sight>,
    /// When the last of them was read.
    pub earlier_read_at: Option<Utc>,
    /// Settings are for so many seconds later, for the time the hand needs.
    pub lead_s: f64,
    /// The risk of the Sun was taken on the command line, for every object.
    pub sun_risk_accepted: bool,
    /// On the demonstration: the errors of the pretended mount, which nobody knows but the sky.
    pub demonstration: Option<MountErrors>,
}

impl Observatory {
    /// What was believed before any star of the night.
    #[must_use]
    pub fn grounds(&self) -> Grounds<'_> {
        Grounds {
            latitude: self.observer.latitude,
            expected: &self.mount.expected,
            prior: &self.prior,
            sights: &self.earlier_sights,
            read_at: self.earlier_read_at,
        }
    }

    /// The sky as it will stand when the hand has set the circles.
    #[must_use]
    pub fn lead(&self, moment: &Moment) -> Moment {
        if self.lead_s > 0.0 {
            moment.later(self.lead_s)
        } else {
            *moment
        }
    }
}
