//! Where a reading lies among the engraved marks, and how the eye finds it.

use crate::metal::scale::Reading;

/// Where a reading lies among the marks.
#[derive(Clone, Debug, PartialEq)]
pub struct Graduation {
    /// The mark passed last as the numbers grow.
    pub mark: Reading,
    /// That mark as numbered, without a letter.
    pub mark_text: String,
    /// How far past it, in divisions, from 0 to below 1.
    pub past: f64,
    /// The same in words: "two fifths of a division past 3h 12m", "on the mark 3h 12m".
    pub words: String,
    /// The vernier line that meets a mark, where there is a vernier.
    pub vernier: Option<VernierLine>,
}

impl Graduation {
    /// How to find the place by eye: the vernier line that meets a mark where there is one, else the
    /// part of a division.
    #[must_use]
    pub fn by_eye(&self) -> String {
        match &self.vernier {
            Some(line) if line.number > 0 => {
                format!("vernier line {} past {}", line.number, self.mark_text)
            }
            _ => self.words.clone(),
        }
    }
}

/// A line of a vernier.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct VernierLine {
    /// Its number; 0 is the index line itself.
    pub number: u32,
    /// What it adds to the mark passed last.
    pub text: String,
}
