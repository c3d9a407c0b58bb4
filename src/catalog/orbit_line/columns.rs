//! One line by its columns, which the published formats count from 1.

use std::ops::Range;

use crate::bounds::Bound;
use crate::sexagesimal::TextFault;

const HINT_NUMBER: &str = "copy the line again as the Minor Planet Center gives it";
const HINT_SLIPPED: &str = "the columns of this line have slipped: copy it again as it was";

/// A line whose fields stand in fixed columns.
#[derive(Clone, Copy, Debug)]
pub struct Columns<'a>(pub &'a str);

impl<'a> Columns<'a> {
    /// What stands in columns `first` to `last`, counted from 1, as it is; empty beyond the end of the line.
    pub fn raw(self, first: usize, last: usize) -> Result<&'a str, TextFault> {
        let span = self.span(first, last);
        self.0
            .get(span.clone())
            .ok_or_else(|| self.fault(span, "this is not plain ASCII", HINT_SLIPPED))
    }

    /// The same without the space around it; nothing if it is blank.
    pub fn text(self, first: usize, last: usize) -> Result<Option<&'a str>, TextFault> {
        let text = self.raw(first, last)?.trim();
        Ok((!text.is_empty()).then_some(text))
    }

    /// Refuses anything but blanks in these columns.
    pub fn blank(self, columns: &[usize]) -> Result<(), TextFault> {
        for &column in columns {
            if self.raw(column, column)?.trim() != "" {
                let message = format!("column {column} should be blank");
                return Err(self.fault(self.span(column, column), &message, HINT_SLIPPED));
            }
        }
        Ok(())
    }

    /// A number in its bounds; nothing if it is blank.
    pub fn number(self, first: usize, last: usize, bound: Bound) -> Result<Option<f64>, TextFault> {
        let Some(text) = self.text(first, last)? else {
            return Ok(None);
        };
        if self.0.len() < last {
            // what is left of a number is another number
            let message = format!("the line ends within the {}", bound.name);
            return Err(self.fault(self.trimmed(first, last), &message, HINT_NUMBER));
        }
        let plain = text
            .bytes()
            .all(|b| b.is_ascii_digit() || matches!(b, b'.' | b'+' | b'-'));
        let number = text.parse::<f64>().ok().filter(|_| plain).ok_or_else(|| {
            let message = format!("\"{text}\" is no number: the {} is wanted", bound.name);
            self.fault(self.trimmed(first, last), &message, HINT_NUMBER)
        })?;
        bound
            .check(number)
            .map(Some)
            .map_err(|out| self.fault(self.trimmed(first, last), &out.to_string(), HINT_NUMBER))
    }

    /// A number in its bounds that must be there.
    pub fn needed(self, first: usize, last: usize, bound: Bound) -> Result<f64, TextFault> {
        self.number(first, last, bound)?.ok_or_else(|| {
            let message = format!(
                "the {} is missing from columns {first} to {last}",
                bound.name
            );
            self.fault(self.span(first, last), &message, HINT_NUMBER)
        })
    }

    /// A fault at columns `first` to `last`.
    pub fn wrong(self, first: usize, last: usize, message: &str, hint: &'static str) -> TextFault {
        self.fault(self.trimmed(first, last), message, hint)
    }

    fn fault(self, at: Range<usize>, message: &str, hint: &'static str) -> TextFault {
        // never within a character
        let start = (0..=at.start.min(self.0.len()))
            .rev()
            .find(|&place| self.0.is_char_boundary(place));
        let end =
            (at.end.min(self.0.len())..=self.0.len()).find(|&place| self.0.is_char_boundary(place));
        TextFault {
            at: start.unwrap_or(0)..end.unwrap_or(self.0.len()),
            message: message.to_owned(),
            hint,
        }
    }

    /// The bytes of columns `first` to `last`, as far as the line reaches.
    fn span(self, first: usize, last: usize) -> Range<usize> {
        let end = last.min(self.0.len());
        first.saturating_sub(1).min(end)..end
    }

    /// The same without the space around.
    fn trimmed(self, first: usize, last: usize) -> Range<usize> {
        let span = self.span(first, last);
        let text = self.0.get(span.clone()).unwrap_or("");
        if text.trim().is_empty() {
            return span;
        }
        let start = span.start + text.len() - text.trim_start().len();
        start..start + text.trim().len()
    }
}
