//! What happens in a night, as it is kept on disk.
//!
//! Each act is one [`Event`], complete in itself: a night is brought back from its events alone,
//! whatever has become of the catalogue, the site file or the mount file since. Angles are in the
//! unit their name states; hour angle positive west, declination positive north.
//!
//! The names here are written in journals that outlive the program: kinds and members are only ever
//! added, and a member added later has a default.

use serde::{Deserialize, Serialize};

use crate::metal::Side;
use crate::night::earlier::StartedFrom;
use crate::night::listed::ListedTarget;
use crate::night::reading::{Setting, StarReading};
use crate::time::Utc;

/// An event with its moment and its number in the journal.
#[derive(Clone, Debug, PartialEq)]
pub struct Stamped {
    /// Its number, from 1 and growing by one.
    pub number: u64,
    /// The corrected moment of the act, to the millisecond.
    pub utc: Utc,
    /// What happened.
    pub event: Event,
}

/// One act of the observer, or one thing noticed.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(tag = "kind", rename_all = "kebab-case")]
pub enum Event {
    /// The night's first line.
    NightOpened(Box<Opening>),
    /// The same night gone on with.
    SessionResumed,
    /// The session left in good order.
    SessionClosed,
    /// An object of the list is the one to dial.
    TargetTaken {
        /// Its place in the list, from 1.
        place: usize,
        /// The object itself.
        target: Box<ListedTarget>,
    },
    /// An object put at the end of the list.
    TargetAdded {
        /// The object.
        target: Box<ListedTarget>,
    },
    /// A star was centred and both circles read.
    StarRead(Box<StarReading>),
    /// A reading taken out of the estimate, or back into it.
    ReadingUsed {
        /// The number of the event that recorded the reading.
        line: u64,
        /// True if the estimate is to use it.
        used: bool,
    },
    /// The object is in the eyepiece.
    Found {
        /// Its name.
        target: String,
        /// What the circles were told to be set to, if the object was dialled.
        setting: Option<Setting>,
        /// The circles as read with the object centred, if they were.
        reading: Option<Box<StarReading>>,
    },
    /// The object could not be found.
    Missed {
        /// Its name.
        target: String,
        /// What the circles were told to be set to, if the object was dialled.
        setting: Option<Setting>,
    },
    /// The observer's words.
    Note {
        /// The object they are about, if any.
        target: Option<String>,
        /// The words.
        text: String,
    },
    /// A ring set by hand, or knocked: its index error starts anew.
    RingSet {
        /// Which circle's.
        circle: Circle,
        /// The star it was set on, with what both circles show since.
        reading: Option<Box<StarReading>>,
    },
    /// The polar axis turned by its adjusters: where it points is unsure again.
    AxisAdjusted,
    /// What an earlier night taught is where this one starts; or no longer.
    StartedFrom {
        /// The night, and how it is taken; nothing to start from the mount file alone.
        earlier: Option<Box<StartedFrom>>,
    },
    /// The clock compared with a time signal.
    ClockCorrected {
        /// The correction now in force, in seconds, positive if the clock is slow.
        seconds: f64,
    },
    /// The machine's clock was found to have jumped.
    ClockJumped {
        /// By so many seconds, positive if forward.
        seconds: f64,
    },
    /// The side of the pier to dial for.
    SideChanged {
        /// The side; nothing for the usual side of each object.
        side: Option<Side>,
    },
    /// The observer answers for dialling this object near the Sun.
    SunRiskAcknowledged {
        /// Its name.
        target: String,
    },
    /// An earlier act taken back.
    Undone {
        /// The number of the event taken back.
        line: u64,
    },
}

/// How a night began: all that is needed to understand the rest.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Opening {
    /// The version of the program that opened the night.
    pub program: String,
    /// The site, by the name of its file.
    pub site: String,
    /// The site's name for people.
    pub site_name: String,
    /// Latitude, positive north.
    pub latitude_deg: f64,
    /// Longitude, positive east.
    pub longitude_deg: f64,
    /// Height above sea level.
    pub elevation_m: f64,
    /// The civil time zone, by its IANA name.
    pub time_zone: String,
    /// The mount, by the name of its file.
    pub mount: String,
    /// The list, by the name of its file.
    pub list: Option<String>,
    /// The side of the pier to dial for; nothing for the usual side of each object.
    pub side: Option<Side>,
    /// The correction of the clock in force, in seconds, positive if the clock is slow.
    #[serde(default)]
    pub clock_correction_s: f64,
    /// The objects of the list, in its order.
    pub targets: Vec<ListedTarget>,
}

/// One of the two graduated circles.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, Serialize, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Circle {
    /// The hour circle.
    Hour,
    /// The declination circle.
    Declination,
}

impl Circle {
    /// The word for it before "circle".
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Hour => "hour",
            Self::Declination => "declination",
        }
    }
}

impl Event {
    /// True if the observer can take it back.
    ///
    /// What merely happened (the opening and closing of a session, a jump of the clock) cannot be,
    /// nor can the taking back.
    #[must_use]
    pub const fn can_be_undone(&self) -> bool {
        !matches!(
            self,
            Self::NightOpened(_)
                | Self::SessionResumed
                | Self::SessionClosed
                | Self::ClockJumped { .. }
                | Self::Undone { .. }
        )
    }

    /// The reading of a star it records, if any.
    #[must_use]
    pub fn reading(&self) -> Option<&StarReading> {
        match self {
            Self::StarRead(reading) => Some(reading),
            Self::Found { reading, .. } | Self::RingSet { reading, .. } => reading.as_deref(),
            _ => None,
        }
    }

    /// The object or star it is about, if any.
    #[must_use]
    pub fn about(&self) -> Option<&str> {
        match self {
            Self::TargetTaken { target, .. } | Self::TargetAdded { target } => Some(&target.name),
            Self::StarRead(reading) => Some(&reading.star),
            Self::Found { target, .. }
            | Self::Missed { target, .. }
            | Self::SunRiskAcknowledged { target } => Some(target),
            Self::Note { target, .. } => target.as_deref(),
            Self::RingSet { reading, .. } => reading.as_ref().map(|reading| reading.star.as_str()),
            _ => None,
        }
    }

    /// The word for it in the log.
    #[must_use]
    pub const fn word(&self) -> &'static str {
        match self {
            Self::NightOpened(_) => "opened",
            Self::SessionResumed => "resumed",
            Self::SessionClosed => "closed",
            Self::TargetTaken { .. } => "target",
            Self::TargetAdded { .. } => "added",
            Self::StarRead(_) => "star",
            Self::ReadingUsed { used: true, .. } => "reading used",
            Self::ReadingUsed { used: false, .. } => "reading set aside",
            Self::Found { .. } => "found",
            Self::Missed { .. } => "missed",
            Self::Note { .. } => "note",
            Self::RingSet { .. } => "ring set",
            Self::AxisAdjusted => "axis adjusted",
            Self::StartedFrom { .. } => "started from",
            Self::ClockCorrected { .. } => "clock corrected",
            Self::ClockJumped { .. } => "clock jumped",
            Self::SideChanged { .. } => "side",
            Self::SunRiskAcknowledged { .. } => "sun risk acknowledged",
            Self::Undone { .. } => "undone",
        }
    }
}
