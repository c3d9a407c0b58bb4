//! A TOML file read strictly: each key is asked for by name, every fault is kept with its place, and
//! what nobody asked for is a fault too.
//!
//! A getter gives nothing where it has noted a fault, so that one run finds every fault of a file.

use std::cell::RefCell;
use std::ops::Range;

use toml::de::{DeTable, DeValue};

use crate::bounds::Bound;
use crate::site::fault::{Fault, FileText, without_control_characters};

/// More syntax faults than this are the echo of the first ones.
const MOST_SYNTAX_FAULTS: usize = 20;

/// Below this likeness (0 to 1, Jaro-Winkler) a suggestion would puzzle rather than help.
const MUCH_ALIKE: f64 = 0.75;

/// The known word most like another, if any is much alike.
pub fn nearest<'w>(word: &str, known: impl IntoIterator<Item = &'w str>) -> Option<&'w str> {
    let word = word.to_lowercase();
    known
        .into_iter()
        .map(|other| (strsim::jaro_winkler(&other.to_lowercase(), &word), other))
        .filter(|(likeness, _)| *likeness > MUCH_ALIKE)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, other)| other)
}

/// What to say after an unknown word: the nearest known one, else all of them.
pub fn did_you_mean(word: &str, known: &[&str]) -> String {
    nearest(word, known.iter().copied()).map_or_else(
        || format!("known are {}", known.join(", ")),
        |nearest| format!("did you mean {nearest}?"),
    )
}

/// What to say of a number outside its range.
pub fn out_of_range_hint(bound: &Bound) -> String {
    if bound.unit.is_empty() {
        "look at the number again".to_owned()
    } else {
        format!("look at the number again, and at its unit: {}", bound.unit)
    }
}

/// The faults found so far.
#[derive(Default)]
pub struct Noted {
    list: RefCell<Vec<Fault>>,
    /// Where the text is no TOML: what follows from that there is not said again.
    broken: Vec<Range<usize>>,
}

impl Noted {
    fn note(&self, fault: Fault) {
        self.list.borrow_mut().push(fault);
    }
}

/// Reads the TOML of a file with a reader of its top level. All faults come together.
pub fn read<T>(
    file: &FileText,
    reader: impl FnOnce(&mut Section<'_>) -> Option<T>,
) -> Result<T, Vec<Fault>> {
    let (table, errors) = DeTable::parse_recoverable(&file.text);
    let mut noted = Noted::default();
    for error in &errors {
        let span = error.span().unwrap_or(0..0);
        let line = file.line_around(span.start);
        // the first fault of a line, the others are mostly its echo
        if noted.broken.len() < MOST_SYNTAX_FAULTS && !noted.broken.contains(&line) {
            noted.broken.push(line);
            noted.note(Fault::new(span, error.message()).hint(syntax_hint(error.message())));
        }
    }
    let mut top = Section::new("", 0..0, table.get_ref(), &noted);
    let value = reader(&mut top);
    top.finish();
    let broken = noted.broken;
    let mut faults = noted.list.into_inner();
    let after_syntax = faults.split_off(broken.len());
    faults.extend(after_syntax.into_iter().filter(|fault| {
        let start = fault.span.as_ref().map_or(0, |span| span.start);
        !broken
            .iter()
            .any(|line| (line.start..=line.end).contains(&start))
    }));
    match value {
        Some(value) if faults.is_empty() => Ok(value),
        _ => Err(faults),
    }
}

/// What to do about a text that is no TOML.
fn syntax_hint(message: &str) -> &'static str {
    if message.contains("duplicate") {
        "leave one of them out"
    } else {
        "text stands in quotes, a comment after #; nonius new writes a file to start from"
    }
}

/// One table of the file, and the keys that were asked for.
pub struct Section<'d> {
    /// Its name as in the file; nothing for the top.
    name: &'static str,
    span: Range<usize>,
    table: &'d DeTable<'d>,
    asked: Vec<&'static str>,
    noted: &'d Noted,
}

/// One value of the file, with its key.
#[derive(Clone, Copy)]
pub struct Value<'d> {
    key: &'static str,
    start: usize,
    end: usize,
    held: &'d DeValue<'d>,
    noted: &'d Noted,
}

impl<'d> Section<'d> {
    fn new(
        name: &'static str,
        span: Range<usize>,
        table: &'d DeTable<'d>,
        noted: &'d Noted,
    ) -> Self {
        Self {
            name,
            span,
            table,
            asked: Vec::new(),
            noted,
        }
    }

    /// The value of a key, if it is there.
    pub fn optional(&mut self, key: &'static str) -> Option<Value<'d>> {
        self.asked.push(key);
        let value = self.table.get(key)?;
        let span = value.span();
        Some(Value {
            key,
            start: span.start,
            end: span.end,
            held: value.get_ref(),
            noted: self.noted,
        })
    }

    /// The value of a key that has to be there.
    pub fn required(&mut self, key: &'static str) -> Option<Value<'d>> {
        let value = self.optional(key);
        if value.is_none() {
            self.missing(key, format!("add a line {key} = ..."));
        }
        value
    }

    fn missing(&self, key: &str, hint: String) {
        // a line that could not be read may have held it
        if self.noted.broken.is_empty() {
            let message = if self.name.is_empty() {
                format!("{key} is missing")
            } else {
                format!("{key} is missing in {}", self.name)
            };
            self.fault(message, hint);
        }
    }

    /// The table of a key, if it is there; read by `reader`, then searched for unknown keys.
    pub fn table<T>(
        &mut self,
        key: &'static str,
        reader: impl FnOnce(&mut Section<'d>) -> Option<T>,
    ) -> Option<T> {
        self.optional(key)?.section().and_then(|mut section| {
            let value = reader(&mut section);
            section.finish();
            value
        })
    }

    /// The table of a key that has to be there.
    pub fn required_table<T>(
        &mut self,
        key: &'static str,
        reader: impl FnOnce(&mut Section<'d>) -> Option<T>,
    ) -> Option<T> {
        if self.table.get(key).is_none() {
            self.asked.push(key);
            self.missing(key, format!("add a table headed [{key}]"));
            return None;
        }
        self.table(key, reader)
    }

    /// The tables of a key written `[[key]]`, each read by `reader`.
    pub fn tables<T>(
        &mut self,
        key: &'static str,
        mut reader: impl FnMut(&mut Section<'d>) -> Option<T>,
    ) -> Vec<T> {
        let Some(value) = self.optional(key) else {
            return Vec::new();
        };
        let DeValue::Array(array) = value.held else {
            value.wrong_type(&format!("tables, each headed [[{key}]]"));
            return Vec::new();
        };
        let mut read = Vec::new();
        for item in array {
            let value = value.inside(item);
            if let Some(mut section) = value.section() {
                read.extend(reader(&mut section));
                section.finish();
            }
        }
        read
    }

    /// Notes a fault of this table as a whole.
    pub fn fault(&self, message: impl Into<String>, hint: impl Into<String>) {
        self.noted
            .note(Fault::new(self.span.clone(), message).hint(hint));
    }

    /// Notes every key that nobody asked for.
    fn finish(self) {
        for (key, _) in self.table {
            let name: &str = key.get_ref();
            if !self.asked.contains(&name) {
                let place = if self.name.is_empty() {
                    String::new()
                } else {
                    format!(" in {}", self.name)
                };
                self.noted.note(
                    Fault::new(key.span(), format!("unknown key {name}{place}"))
                        .hint(did_you_mean(name, &self.asked)),
                );
            }
        }
    }
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

    fn inside(&self, item: &'d toml::Spanned<DeValue<'d>>) -> Self {
        let span = item.span();
        Self {
            start: span.start,
            end: span.end,
            held: item.get_ref(),
            ..*self
        }
    }

    fn section(&self) -> Option<Section<'d>> {
        if let DeValue::Table(table) = self.held {
            Some(Section::new(self.key, self.span(), table, self.noted))
        } else {
            self.wrong_type(&format!("a table, headed [{}]", self.key));
            None
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

    fn wrong_type(&self, wanted: &str) {
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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::bounds::LATITUDE;

    fn faults(text: &str) -> Vec<String> {
        let file = FileText {
            name: "x.toml".to_owned(),
            text: text.to_owned(),
        };
        read(&file, |top| {
            let latitude = top.required("latitude").and_then(|v| v.number(&LATITUDE));
            let flag = top.optional("clear").and_then(|v| v.flag());
            let depth = top.table("well", |well| well.required("depth").and_then(|v| v.flag()));
            Some((latitude?, flag, depth))
        })
        .map_or_else(
            |faults| {
                faults
                    .iter()
                    .map(|fault| {
                        let start = fault.span.as_ref().map_or(0, |span| span.start);
                        let (line, column) = file.line_and_column(start);
                        format!("{line}:{column} {}", fault.message)
                    })
                    .collect()
            },
            |_| Vec::new(),
        )
    }

    #[test]
    fn all_faults_of_a_file_come_together() {
        assert_eq!(
            faults("latitude = 95\nclear = \"yes\"\nlatitud = 1\n[well]\nwater = true\n"),
            [
                "1:12 latitude 95 is outside -90 to 90 degrees",
                "2:9 clear is text",
                "4:1 depth is missing in well",
                "5:1 unknown key water in well",
                "3:1 unknown key latitud",
            ]
        );
    }

    #[test]
    fn what_is_no_toml_is_said_once() {
        assert_eq!(faults("latitude = = 5\nclear = 1\n").len(), 2);
        assert_eq!(faults("latitude = 5\nlatitude = 6\n").len(), 1);
        assert_eq!(faults("latitude = nan\n").len(), 1);
    }

    #[test]
    fn a_slip_of_the_hand_brings_the_nearest_word() {
        assert_eq!(
            nearest("elevaton-m", ["name", "elevation-m"]),
            Some("elevation-m")
        );
        assert_eq!(
            nearest("elevation_m", ["name", "elevation-m"]),
            Some("elevation-m")
        );
        assert_eq!(nearest("xyz", ["name", "elevation-m"]), None);
    }
}
