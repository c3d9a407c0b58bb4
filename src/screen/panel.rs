//! What the screen holds and the record does not: the mode, what is being typed, what is chosen, the
//! last words said. Everything here may be lost without loss.

use std::time::Duration;

use crossterm::event::KeyCode;
use tui_input::{Input, InputRequest};

use crate::catalog::Target;
use crate::night::Event;
use crate::screen::keys::Mode;
use crate::screen::light::Light;
use crate::screen::sweep::Sweeping;
use crate::time::Utc;

/// What the screen holds and the record does not.
#[derive(Clone, Debug)]
pub struct Panel {
    /// What it is used for.
    pub mode: Mode,
    /// The light.
    pub light: Light,
    /// What is being typed.
    pub typed: Typed,
    /// The line chosen in a list, from 0.
    pub chosen: usize,
    /// The star being centred or read, and from which side.
    pub star: Option<Centred>,
    /// In the calibration view, the picture of what is left of the stars stands in place of their list.
    pub picture: bool,
    /// The sweep for the object being dialled.
    pub sweep: Sweeping,
    /// What a doubted reading may be taken for, the first as the program would.
    pub choices: Vec<Choice>,
    /// The mode the keys were looked up from.
    pub help_from: Mode,
    /// How often the keys were turned over.
    pub help_page: usize,
    /// The last words to the observer.
    pub said: Option<String>,
    /// When a key last changed the record.
    pub struck_at: Option<Duration>,
}

/// A star being centred or read.
#[derive(Clone, Debug, PartialEq)]
pub struct Centred {
    /// The star.
    pub star: Target,
    /// It is the object being dialled, found: the reading is recorded with the finding.
    pub found: bool,
    /// When it stood in the middle.
    pub at: Option<Utc>,
    /// It was timed across the middle, with the hour circle set on a mark.
    pub timed: bool,
    /// The rings that slip are turned to what the screen told.
    pub rings_set: bool,
}

/// What a doubted reading may be taken for.
#[derive(Clone, Debug, PartialEq)]
pub struct Choice {
    /// How likely it is, 0 to 1.
    pub share: f64,
    /// In words.
    pub words: String,
    /// The acts it comes to, in order.
    pub events: Vec<Event>,
    /// What is said once they are done.
    pub said: String,
}

/// What is being typed: a line, or one for each circle.
#[derive(Clone, Debug, Default)]
pub struct Typed {
    /// The line, or what the hour circle shows.
    pub first: Input,
    /// What the declination circle shows.
    pub second: Input,
    /// True while the second is being typed.
    pub at_second: bool,
}

/// Something for the loop to do, with its files and its clock.
#[derive(Clone, Debug, PartialEq)]
pub enum Doing {
    /// Record an act; once it is safe, say so, and go on in a mode.
    Record {
        /// The act.
        event: Box<Event>,
        /// The words.
        said: String,
        /// The mode.
        then: Mode,
    },
    /// Leave the screen.
    Leave,
}

/// Longer than any reading, name or note an observer writes in the dark.
const LONGEST: usize = 200;

impl Typed {
    /// The line in hand.
    #[must_use]
    pub const fn line(&self) -> &Input {
        if self.at_second {
            &self.second
        } else {
            &self.first
        }
    }

    const fn line_mut(&mut self) -> &mut Input {
        if self.at_second {
            &mut self.second
        } else {
            &mut self.first
        }
    }

    /// A key that edits the line; false if it does not.
    pub fn edit(&mut self, key: KeyCode) -> bool {
        let request = match key {
            KeyCode::Char(c) if !c.is_control() => {
                if self.line().value().chars().count() >= LONGEST {
                    return true;
                }
                InputRequest::InsertChar(c)
            }
            KeyCode::Backspace => InputRequest::DeletePrevChar,
            KeyCode::Delete => InputRequest::DeleteNextChar,
            KeyCode::Left => InputRequest::GoToPrevChar,
            KeyCode::Right => InputRequest::GoToNextChar,
            KeyCode::Home => InputRequest::GoToStart,
            KeyCode::End => InputRequest::GoToEnd,
            _ => return false,
        };
        self.line_mut().handle(request);
        true
    }

    /// Text pasted into the line, its control characters left out.
    pub fn paste(&mut self, text: &str) {
        for c in text.trim().chars() {
            self.edit(KeyCode::Char(if c.is_whitespace() { ' ' } else { c }));
        }
    }
}

impl Panel {
    /// As the screen opens.
    #[must_use]
    pub fn new(light: Light) -> Self {
        Self {
            mode: Mode::Stepping,
            light,
            typed: Typed::default(),
            chosen: 0,
            star: None,
            picture: false,
            sweep: Sweeping::default(),
            choices: Vec::new(),
            help_from: Mode::Stepping,
            help_page: 0,
            said: None,
            struck_at: None,
        }
    }

    /// Says something to the observer, in place of what was said before.
    pub fn say(&mut self, words: impl Into<String>) {
        self.said = Some(words.into());
    }

    /// Goes on in a mode with nothing typed and nothing chosen.
    pub fn enter(&mut self, mode: Mode) {
        self.mode = mode;
        self.typed = Typed::default();
        self.chosen = 0;
        if mode == Mode::Stepping {
            self.star = None;
            self.choices.clear();
            self.sweep = Sweeping::default();
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_is_pasted_brings_no_control_characters() {
        let mut typed = Typed::default();
        typed.paste(" 05:52:18\x1b[31m\t+32\n");
        assert_eq!(typed.line().value(), "05:52:18[31m +32");
    }

    #[test]
    fn a_line_has_an_end() {
        let mut typed = Typed::default();
        typed.paste(&"x".repeat(3 * LONGEST));
        assert_eq!(typed.line().value().len(), LONGEST);
    }
}
