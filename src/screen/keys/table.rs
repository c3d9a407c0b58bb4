//! The table itself, in the order the help view and the manual show it.

use crossterm::event::KeyCode;

use crate::screen::keys::{Act, Key, Mode};

const CHOOSING: &[Mode] = &[Mode::ChoosingStar, Mode::Searching];
const STEPPING: &[Mode] = &[Mode::Stepping];
const AWAY: &[Mode] = &[
    Mode::ChoosingStar,
    Mode::Centring,
    Mode::Reading,
    Mode::Searching,
    Mode::Noting,
    Mode::SunRisk,
    Mode::Clock,
    Mode::Ring,
    Mode::Help,
];

const fn key(
    codes: &'static [KeyCode],
    (name, words): (&'static str, &'static str),
    sentence: &'static str,
    modes: &'static [Mode],
    act: Act,
    hint: Option<u8>,
) -> Key {
    Key {
        codes,
        name,
        words,
        sentence,
        modes,
        act,
        hint,
    }
}

use KeyCode::{Char, Down, Enter, Esc, Left, Right, Tab, Up};

/// The table.
pub(super) const KEYS: &[Key] = &[
    key(
        &[Char(' '), Right],
        ("space", "next"),
        "the next object; also the arrow to the right",
        STEPPING,
        Act::Next,
        Some(2),
    ),
    key(
        &[Char('b'), Left],
        ("b", "back"),
        "the object before; also the arrow to the left",
        STEPPING,
        Act::Back,
        Some(6),
    ),
    key(
        &[Char('f')],
        ("f", "found"),
        "found: in the eyepiece",
        STEPPING,
        Act::Found,
        Some(3),
    ),
    key(
        &[Char('m')],
        ("m", "missed"),
        "missed: not to be found",
        STEPPING,
        Act::Missed,
        Some(4),
    ),
    key(
        &[Char('s')],
        ("s", "star"),
        "read a bright star: it tells how the mount stands",
        STEPPING,
        Act::Star,
        Some(5),
    ),
    key(
        &[Char('r')],
        ("r", "read"),
        "found, in the middle now: read the circles on it",
        STEPPING,
        Act::Read,
        Some(8),
    ),
    key(
        &[Char('t')],
        ("t", "side"),
        "the other side of the pier; again: the usual side",
        &[Mode::Stepping, Mode::Centring],
        Act::Side,
        Some(9),
    ),
    key(
        &[Char('n')],
        ("n", "note"),
        "write a note about the object",
        STEPPING,
        Act::Note,
        Some(11),
    ),
    key(
        &[Char('/')],
        ("/", "search"),
        "look up an object, add it to the list",
        STEPPING,
        Act::Search,
        Some(7),
    ),
    key(
        &[Char('u')],
        ("u", "undo"),
        "take the last act back",
        &[Mode::Stepping, Mode::Centring],
        Act::Undo,
        Some(10),
    ),
    key(
        &[Char('c')],
        ("c", "clock"),
        "correct the clock by a time signal",
        STEPPING,
        Act::Clock,
        Some(12),
    ),
    key(
        &[Char('z')],
        ("z", "zero"),
        "a circle slipped, or was set by hand",
        STEPPING,
        Act::Ring,
        None,
    ),
    key(
        &[Char('a')],
        ("a", "answer"),
        "answer for an object near the Sun",
        STEPPING,
        Act::Sun,
        None,
    ),
    key(
        &[Char('l')],
        ("l", "light"),
        "night, dim and day in turn",
        &[Mode::Stepping, Mode::Centring, Mode::Help],
        Act::Light,
        Some(13),
    ),
    key(
        &[Char('?')],
        ("?", "keys"),
        "these keys",
        &[Mode::Stepping, Mode::Centring],
        Act::Help,
        Some(0),
    ),
    key(
        &[Char('q')],
        ("q", "leave"),
        "leave; all is recorded, and goes on from here",
        STEPPING,
        Act::Leave,
        Some(1),
    ),
    key(&[Up], ("up", ""), "the line above", CHOOSING, Act::Up, None),
    key(
        &[Down],
        ("down", "choose"),
        "the line below",
        CHOOSING,
        Act::Down,
        Some(2),
    ),
    key(
        &[Tab, Up, Down],
        ("tab", "other circle"),
        "from one circle to the other",
        &[Mode::Reading],
        Act::Other,
        Some(2),
    ),
    key(
        &[Enter],
        ("enter", "go to it"),
        "show what to set for the star chosen",
        &[Mode::ChoosingStar],
        Act::Accept,
        Some(1),
    ),
    key(
        &[Enter, Char(' ')],
        ("enter", "centred"),
        "strike it as the star stands in the middle",
        &[Mode::Centring],
        Act::Accept,
        Some(1),
    ),
    key(
        &[Enter],
        ("enter", "take it"),
        "take what is typed or chosen",
        &[
            Mode::Reading,
            Mode::Searching,
            Mode::Noting,
            Mode::SunRisk,
            Mode::Clock,
            Mode::Ring,
        ],
        Act::Accept,
        Some(1),
    ),
    key(
        &[Esc],
        ("esc", "back"),
        "back, with nothing recorded",
        AWAY,
        Act::Cancel,
        Some(0),
    ),
];
