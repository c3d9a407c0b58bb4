//! One value of a TOML file with its key and its place: its getters note what is wrong with it and
//! then give nothing.

use std::ops::Range;

use toml::de::DeValue;

use crate::bounds::Bound;
use crate::site::document::Noted;
use crate::site::fault::{Fault, without_control_characters};

/// What to say of a number outside its range.
pub fn out_of_range_hint(bound: &Bound) -> String {
    if bound.unit.is_empty() {
        "look at the number again".to_owned()
    } else {
        format!("look at the number again, and at its unit: {}", bound.unit)
    }
}

/// One value of the file, with its key.
#[derive(Clone, Copy)]
pub struct Value<'d> {
    pub(super) key: &'static str,
    pub(super) start: usize,
    pub(super) end: usize,
    pub(super) held: &'d DeValue<'d>,
    pub(super) noted: &'d Noted,
}

impl<'d> Value<'d> {
    /// Where it stands.
    pub const fn span(&self) -> Range<usize> {
        self.start..self.end
    }

    /// Its key.
    pub const fn key(&self) -> &'static str {
        self.key
    }

    pub(super) fn inside(&self, item: &'d toml::Spanned<DeValue<'d>>) -> Self {
        let span = item.span();
        Self {
            start: span.start,
            end: span.end,
            held: item.get_ref(),
            ..*self
        }
    }

    /// Notes a fault of this value.
    pub fn fault(&self, message: impl Into<String>, hint: impl Into<String>) {
        self.noted.note(Fault::new(self.span(), message).hint(hint));
    }

    /// Notes a fault of a part of this value's text, where the text stands in the file as it is.
    pub fn fault_at(
        &self,
        part: &Range<usize>,
        message: impl Into<String>,
        hint: impl Into<String>,
    ) {
        let written = self.end.saturating_sub(self.start);
        let text = self.held.as_str().map_or(0, str::len);
        // one quote on each side and nothing escaped: the text stands there letter for letter
        let span = if written == text + 2 {
            let start = (self.start + 1 + part.start).min(self.end);
            let end = (self.start + 1 + part.end).min(self.end);
            start..end
        } else {
            self.span()
        };
        self.noted.note(Fault::new(span, message).hint(hint));
    }

    pub(super) fn wrong_type(&self, wanted: &str) {
        let found = match self.held {
            DeValue::String(_) => "text",
            DeValue::Integer(_) | DeValue::Float(_) if self.plain_number().is_none() => {
                "no ordinary number"
            }
            DeValue::Integer(_) | DeValue::Float(_) => "a number",
            DeValue::Boolean(_) => "true or false",
            DeValue::Datetime(_) => "a date or time",
            DeValue::Array(_) => "a list",
            DeValue::Table(_) => "a table",
        };
        self.fault(
            format!("{} is {found}", self.key),
            format!("write {wanted}"),
        );
    }

    /// A text, which has something in it and no control characters.
    pub fn text(&self, wanted: &str) -> Option<&'d str> {
        let DeValue::String(text) = self.held else {
            self.wrong_type(wanted);
            return None;
        };
        if text.trim().is_empty() {
            self.fault(format!("{} is empty", self.key), format!("write {wanted}"));
            return None;
        }
        if without_control_characters(text) != text.as_ref() {
            self.fault(
                format!("{} holds characters that cannot be shown", self.key),
                "write it with letters, digits and spaces",
            );
            return None;
        }
        Some(text)
    }

    /// True or false.
    pub fn flag(&self) -> Option<bool> {
        if let DeValue::Boolean(flag) = self.held {
            Some(*flag)
        } else {
            self.wrong_type("true or false");
            None
        }
    }

    /// A number, without looking at its range.
    pub fn plain_number(&self) -> Option<f64> {
        let number = match self.held {
            DeValue::Integer(integer) if integer.radix() == 10 => integer.as_str().parse().ok(),
            DeValue::Float(float) => float.as_str().parse().ok(),
            _ => None,
        };
        number.filter(|number: &f64| number.is_finite())
    }

    /// A number within a range.
    pub fn number(&self, bound: &Bound) -> Option<f64> {
        let Some(number) = self.plain_number() else {
            let unit = if bound.unit.is_empty() {
                String::new()
            } else {
                format!(" of {}", bound.unit)
            };
            self.wrong_type(&format!("a number{unit}"));
            return None;
        };
        self.within(bound, number)
    }

    /// A number already read, if it is within its range.
    pub fn within(&self, bound: &Bound, number: f64) -> Option<f64> {
        match bound.check(number) {
            Ok(number) => Some(number),
            Err(out) => {
                self.fault(out.to_string(), out_of_range_hint(bound));
                None
            }
        }
    }

    /// One of the words of a table.
    pub fn word<T: Copy>(&self, words: &[(&str, T)]) -> Option<T> {
        self.word_or(words, |_| None)
    }

    /// One of the words of a table; `otherwise` may know what is wrong with another word.
    pub fn word_or<T: Copy>(
        &self,
        words: &[(&str, T)],
        otherwise: impl Fn(&str) -> Option<String>,
    ) -> Option<T> {
        let known: Vec<&str> = words.iter().map(|(word, _)| *word).collect();
        let DeValue::String(text) = self.held else {
            self.wrong_type(&format!("one of the words {}", known.join(", ")));
            return None;
        };
        let found = words.iter().find(|(word, _)| *word == text.as_ref());
        if found.is_none() {
            self.fault(
                otherwise(text).unwrap_or_else(|| format!("{} cannot be \"{text}\"", self.key)),
                format!("write one of {}", known.join(", ")),
            );
        }
        found.map(|(_, value)| *value)
    }

    /// The items of a list.
    pub fn items(&self, wanted: &str) -> Option<Vec<Self>> {
        if let DeValue::Array(array) = self.held {
            Some(array.iter().map(|item| self.inside(item)).collect())
        } else {
            self.wrong_type(wanted);
            None
        }
    }
}
