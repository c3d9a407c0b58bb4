//! What was found amiss on reading a journal, in words for the observer. Nothing of it stops a night.

use std::fmt;

/// Something amiss in a journal. Lines are counted from 1 in the file; numbers are those the lines bear.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Notice {
    /// The last line was cut short, as when the power goes: it was never confirmed as done.
    Torn {
        /// Its line in the file.
        line: usize,
        /// What there was of it.
        text: String,
    },
    /// The last line is whole and lacks only its end.
    EndLost {
        /// Its line in the file.
        line: usize,
    },
    /// A line is damaged; it stays in the file and is left out of the night.
    Damaged {
        /// Its line in the file.
        line: usize,
    },
    /// A line is of a kind only a newer program knows; it stays in the file.
    UnknownKind {
        /// Its line in the file.
        line: usize,
        /// What it calls itself.
        kind: String,
    },
    /// Lines are missing.
    Gap {
        /// The first number missing.
        first: u64,
        /// The last number missing.
        last: u64,
    },
    /// A line stands there a second time; it counts once.
    Repeated {
        /// Its line in the file.
        line: usize,
        /// Its number.
        number: u64,
    },
    /// A line is not numbered in order; it counts where it stands.
    OutOfOrder {
        /// Its line in the file.
        line: usize,
        /// Its number.
        number: u64,
    },
}

impl fmt::Display for Notice {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Torn { line, text } => write!(
                f,
                "line {line}, the last, was cut short before it counted as done: {text}"
            ),
            Self::EndLost { line } => write!(f, "line {line}, the last, had lost its end mark"),
            Self::Damaged { line } => write!(
                f,
                "line {line} is damaged: it is left out, all else is kept"
            ),
            Self::UnknownKind { line, kind } => write!(
                f,
                "line {line} holds \"{kind}\", which this version does not know: it stays in the file"
            ),
            Self::Gap { first, last } if first == last => write!(f, "number {first} is missing"),
            Self::Gap { first, last } => write!(f, "numbers {first} to {last} are missing"),
            Self::Repeated { line, number } => {
                write!(f, "line {line} repeats number {number}: it counts once")
            }
            Self::OutOfOrder { line, number } => write!(
                f,
                "line {line} bears number {number}, out of order: it counts where it stands"
            ),
        }
    }
}
