//! A night's record as a table: what was done when, at which settings.
//!
//! What was taken back is left out. Moments are those of the record: in UTC, and in the civil time of
//! the site where its zone is known.

use serde::Serialize;

use crate::metal::Side;
use crate::night::event::{Event, Opening, Stamped};
use crate::night::night::Night;
use crate::night::reading::{Setting, StarReading};
use crate::time::{CivilZone, Utc};

/// A night's record, in the shape of `log --json`.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Log {
    /// The name and version of the shape.
    pub format: &'static str,
    /// The civil date of the night's evening.
    pub night: String,
    /// The site, by the name of its file.
    pub site: String,
    /// The mount, by the name of its file; not part of the shape.
    #[serde(skip)]
    pub mount: String,
    /// What was done, in order.
    pub entries: Vec<Entry>,
}

/// One act.
#[derive(Clone, Debug, Default, PartialEq, Serialize)]
pub struct Entry {
    /// When, in UTC.
    pub utc: String,
    /// When, in civil time with its offset.
    pub civil: String,
    /// What was done, in one word or hyphenated.
    pub act: String,
    /// The object or star it was done to.
    pub target: String,
    /// The hour circle: as read, else as told to be set.
    pub hour: String,
    /// The declination circle: as read, else as told to be set.
    pub dec: String,
    /// The side of the pier.
    pub side: String,
    /// How far on the sky the circles were from what was expected.
    pub off_arcmin: Option<f64>,
    /// The observer's words, and what else belongs to the act.
    pub note: String,
}

impl Log {
    /// The shape's name.
    pub const FORMAT: &'static str = "nonius.log/1";

    /// The record of a night; what the opening would have told is blank if its line was lost.
    #[must_use]
    pub fn of(night: &Night) -> Self {
        let opening = night.state().opening.as_ref();
        let zone = zone(opening);
        let first = night.history().first();
        let text = |of: fn(&Opening) -> &String| opening.map(of).cloned().unwrap_or_default();
        Self {
            format: Self::FORMAT,
            night: first.map_or_else(String::new, |first| zone.night(first.utc).to_string()),
            site: text(|opening| &opening.site),
            mount: text(|opening| &opening.mount),
            entries: night.standing().map(|act| entry(act, zone)).collect(),
        }
    }
}

/// The site's civil zone; UTC if it is not known.
pub(super) fn zone(opening: Option<&Opening>) -> CivilZone {
    let named = opening.and_then(|opening| opening.time_zone.parse().ok());
    named.unwrap_or(CivilZone::UTC)
}

fn entry(stamped: &Stamped, zone: CivilZone) -> Entry {
    let Stamped { utc, event, .. } = stamped;
    let blank = Entry {
        utc: utc.rfc3339(),
        civil: civil(*utc, zone),
        act: event.word().replace(' ', "-"),
        target: event.about().unwrap_or_default().to_owned(),
        note: note(event),
        ..Entry::default()
    };
    match (event.reading(), setting(event)) {
        (Some(reading), _) => as_read(blank, reading),
        (None, Some(setting)) => as_told(blank, setting),
        (None, None) => Entry {
            side: side(event),
            ..blank
        },
    }
}

fn civil(utc: Utc, zone: CivilZone) -> String {
    zone.civil(utc).format("%Y-%m-%dT%H:%M:%S%:z").to_string()
}

fn as_read(blank: Entry, reading: &StarReading) -> Entry {
    Entry {
        hour: reading.hour.clone(),
        dec: reading.dec.clone(),
        side: reading.side.to_string(),
        off_arcmin: reading.off_arcmin,
        ..blank
    }
}

fn as_told(blank: Entry, setting: &Setting) -> Entry {
    Entry {
        hour: setting.hour.clone(),
        dec: setting.dec.clone(),
        side: setting.side.to_string(),
        ..blank
    }
}

const fn setting(event: &Event) -> Option<&Setting> {
    match event {
        Event::Found { setting, .. } | Event::Missed { setting, .. } => setting.as_ref(),
        _ => None,
    }
}

fn side(event: &Event) -> String {
    match event {
        Event::SideChanged { side: Some(side) } => Side::to_string(side),
        Event::SideChanged { side: None } => "auto".to_owned(),
        _ => String::new(),
    }
}

fn note(event: &Event) -> String {
    match event {
        Event::Note { text, .. } => text.clone(),
        Event::NightOpened(opening) => format!("{}, {}", opening.site_name, opening.mount),
        Event::ClockCorrected { seconds } | Event::ClockJumped { seconds } => {
            format!("{seconds:+.1} s")
        }
        Event::RingSet { circle, .. } => format!("{} circle", circle.word()),
        Event::StartedFrom {
            earlier: Some(started),
        } => format!("{}, {}", started.earlier.night, started.words()),
        Event::StartedFrom { earlier: None } => "the mount file alone".to_owned(),
        Event::ReadingUsed { line, .. } => format!("the reading of line {line}"),
        Event::StarRead(reading)
        | Event::Found {
            reading: Some(reading),
            ..
        } if !reading.doubted.is_empty() => reading.doubted.clone(),
        Event::StarRead(reading) if !reading.used => "not used in the estimate".to_owned(),
        Event::StarRead(reading) if reading.timed => "timed".to_owned(),
        Event::TargetTaken { target, .. } | Event::TargetAdded { target } => target.note.clone(),
        _ => String::new(),
    }
}
