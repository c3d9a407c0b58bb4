//! The keys, in one table: what a key is called, in which modes it holds, what it does.
//!
//! The table drives the dispatch, the hint line, the help view and the manual. Keys are single,
//! unmodified and lower case; arrows and the space bar do the common things.
//!
//! A glove strikes two keys at once: while stepping, a second key within [`DOUBLE_STRIKE`] of one that
//! changed the record is ignored. While typing, every key counts.

use std::time::Duration;

use crossterm::event::KeyCode;

mod table;

use table::KEYS;

/// Two keys this close were struck by one finger: fast typists leave some 100 ms between keys,
/// neighbouring keys hit together follow within a few tens (common practice in debouncing, no source).
pub const DOUBLE_STRIKE: Duration = Duration::from_millis(80);

/// What the screen is being used for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mode {
    /// Stepping through the list.
    Stepping,
    /// Choosing a star to read.
    ChoosingStar,
    /// Going to the star chosen and centring it.
    Centring,
    /// Typing what the circles show.
    Reading,
    /// Looking for an object to add.
    Searching,
    /// Writing a note.
    Noting,
    /// Answering for an object near the Sun.
    SunRisk,
    /// Correcting the clock.
    Clock,
    /// Saying which circle has another zero.
    Ring,
    /// Looking at what is known of the mount.
    Calibration,
    /// Saying what an improbable reading is to be taken for.
    Doubting,
    /// Sweeping for an object that is not in the field.
    Sweeping,
    /// Looking at the list.
    Objects,
    /// Looking at the field as an optic shows it.
    Field,
    /// Looking at the keys.
    Help,
}

impl Mode {
    /// True if letters are text here.
    #[must_use]
    pub const fn types(self) -> bool {
        matches!(
            self,
            Self::ChoosingStar
                | Self::Reading
                | Self::Searching
                | Self::Noting
                | Self::SunRisk
                | Self::Clock
                | Self::Ring
        )
    }

    /// What the observer does in it, as a heading.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Stepping => "stepping through the list",
            Self::ChoosingStar => "choosing a star",
            Self::Centring => "centring a star",
            Self::Reading => "reading the circles",
            Self::Searching => "adding an object",
            Self::Noting => "writing a note",
            Self::SunRisk => "an object near the Sun",
            Self::Clock => "correcting the clock",
            Self::Ring => "forgetting a zero",
            Self::Calibration => "looking at the mount",
            Self::Doubting => "doubting a reading",
            Self::Sweeping => "sweeping for an object",
            Self::Objects => "looking at the list",
            Self::Field => "looking at the field",
            Self::Help => "these keys",
        }
    }
}

/// What a key does.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Act {
    /// The next object of the list.
    Next,
    /// The one before.
    Back,
    /// The object is in the eyepiece.
    Found,
    /// It is not.
    Missed,
    /// It is, and in the middle: read the circles on it.
    Read,
    /// It drifts across the middle now, with the hour circle set on a mark.
    Timed,
    /// Sweep for it.
    Sweep,
    /// What is known of the mount.
    Calibration,
    /// The list.
    Objects,
    /// The field as an optic shows it.
    Field,
    /// A reading set aside, or used again.
    SetAside,
    /// What an earlier night taught: as the mount stood, moved since, or not at all.
    EarlierNight,
    /// The axis was turned by its adjusters.
    AxisAdjusted,
    /// Stars or their picture.
    Picture,
    /// Read a star.
    Star,
    /// Look for an object to add.
    Search,
    /// Write a note.
    Note,
    /// The other side of the pier.
    Side,
    /// Take the last act back.
    Undo,
    /// Correct the clock.
    Clock,
    /// A ring was knocked or set.
    Ring,
    /// Answer for an object near the Sun.
    Sun,
    /// The next light.
    Light,
    /// The keys.
    Help,
    /// Leave.
    Leave,
    /// The other line.
    Other,
    /// One line up.
    Up,
    /// One line down.
    Down,
    /// Take what is chosen or typed.
    Accept,
    /// Back to where one came from.
    Cancel,
}

/// A line of the table.
#[derive(Clone, Copy, Debug)]
pub struct Key {
    /// The keys that do it.
    pub codes: &'static [KeyCode],
    /// What they are called.
    pub name: &'static str,
    /// A word or two for the hint line.
    pub words: &'static str,
    /// A sentence for the help view and the manual.
    pub sentence: &'static str,
    /// The modes it holds in.
    pub modes: &'static [Mode],
    /// What it does.
    pub act: Act,
    /// The rank on the hint line, the lowest kept longest when room is short; none to leave it out.
    pub hint: Option<u8>,
}

/// The table of keys, in the order the help view and the manual show it.
#[must_use]
pub const fn table() -> &'static [Key] {
    KEYS
}

/// The keys of a mode, but for the one that lists them.
pub fn held(mode: Mode) -> impl Iterator<Item = &'static Key> {
    let held = move |key: &&Key| key.modes.contains(&mode) && key.act != Act::Help;
    KEYS.iter().filter(held)
}

/// What a key does in a mode, if anything.
#[must_use]
pub fn act(mode: Mode, code: KeyCode) -> Option<Act> {
    KEYS.iter()
        .find(|key| key.modes.contains(&mode) && key.codes.contains(&code))
        .map(|key| key.act)
}

/// The hint line of a mode: as many keys, by rank, as `width` columns hold, in the table's order.
#[must_use]
pub fn hints(mode: Mode, width: usize) -> String {
    let mut shown: Vec<(usize, &Key)> = KEYS
        .iter()
        .enumerate()
        .filter(|(_, key)| key.hint.is_some() && key.modes.contains(&mode))
        .collect();
    shown.sort_by_key(|(_, key)| key.hint);
    let line = |keys: &[(usize, &Key)]| {
        let mut keys = keys.to_vec();
        keys.sort_by_key(|(place, _)| *place);
        keys.iter()
            .map(|(_, key)| format!("{} {}", key.name, key.words))
            .collect::<Vec<_>>()
            .join("  ")
    };
    while !shown.is_empty() && line(&shown).chars().count() > width {
        shown.pop();
    }
    line(&shown)
}

#[cfg(test)]
mod tests {
    use super::*;

    const MODES: [Mode; 15] = [
        Mode::Stepping,
        Mode::ChoosingStar,
        Mode::Centring,
        Mode::Reading,
        Mode::Searching,
        Mode::Noting,
        Mode::SunRisk,
        Mode::Clock,
        Mode::Ring,
        Mode::Calibration,
        Mode::Doubting,
        Mode::Sweeping,
        Mode::Objects,
        Mode::Field,
        Mode::Help,
    ];

    #[test]
    fn no_key_means_two_things_in_one_mode() {
        for mode in MODES {
            let mut seen = Vec::new();
            for key in table().iter().filter(|key| key.modes.contains(&mode)) {
                for code in key.codes {
                    assert!(!seen.contains(code), "{code:?} twice in {mode:?}");
                    seen.push(*code);
                }
            }
            assert!(!seen.is_empty(), "{mode:?} has no keys");
        }
    }

    #[test]
    fn keys_are_single_and_lower_case() {
        for key in table() {
            for code in key.codes {
                if let KeyCode::Char(letter) = code {
                    assert!(!letter.is_uppercase(), "{letter}");
                }
            }
        }
    }

    #[test]
    fn where_letters_are_text_no_letter_is_a_key() {
        for mode in MODES.into_iter().filter(|mode| mode.types()) {
            for key in table().iter().filter(|key| key.modes.contains(&mode)) {
                let letters = key
                    .codes
                    .iter()
                    .any(|code| matches!(code, KeyCode::Char(_)));
                assert!(!letters, "{} in {mode:?}", key.name);
            }
        }
    }

    #[test]
    fn every_mode_can_be_left() {
        for mode in MODES {
            let out = if mode == Mode::Stepping {
                act(mode, KeyCode::Char('q')) == Some(Act::Leave)
            } else {
                act(mode, KeyCode::Esc) == Some(Act::Cancel)
            };
            assert!(out, "{mode:?}");
        }
    }

    #[test]
    fn every_sentence_fits_the_help_view_of_the_smallest_screen() {
        // 60 columns, 7 of them for the key
        for key in table() {
            assert!(key.sentence.chars().count() <= 53, "{}", key.sentence);
            assert!(key.name.chars().count() < 7, "{}", key.name);
        }
    }

    #[test]
    fn the_hint_line_keeps_what_matters_most() {
        assert_eq!(
            hints(Mode::Stepping, 78),
            "space next  b back  f found  m missed  s star  / search  ? keys  q leave"
        );
        assert_eq!(
            hints(Mode::Stepping, 58),
            "space next  f found  m missed  s star  ? keys  q leave"
        );
        for mode in MODES {
            for width in 0..100 {
                assert!(hints(mode, width).chars().count() <= width);
            }
        }
    }
}
