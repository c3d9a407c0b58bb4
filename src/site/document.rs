//! A TOML file read strictly: each key is asked for by name, every fault is kept with its place, and
//! what nobody asked for is a fault too.
//!
//! A getter gives nothing where it has noted a fault, so that one run finds every fault of a file.

use std::cell::RefCell;
use std::ops::Range;

use toml::de::{DeTable, DeValue};

use crate::site::fault::{Fault, FileText};
use crate::site::likely::did_you_mean;
use crate::site::value::Value;

/// More syntax faults than this are the echo of the first ones.
const MOST_SYNTAX_FAULTS: usize = 20;

/// The faults found so far.
#[derive(Default)]
pub struct Noted {
    list: RefCell<Vec<Fault>>,
    /// Where the text is no TOML: what follows from that there is not said again.
    broken: Vec<Range<usize>>,
}

impl Noted {
    pub(super) fn note(&self, fault: Fault) {
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

    /// The table a value is; a value that is none is a fault.
    fn of(value: &Value<'d>) -> Option<Self> {
        if let DeValue::Table(table) = value.held {
            Some(Self::new(value.key, value.span(), table, value.noted))
        } else {
            value.wrong_type(&format!("a table, headed [{}]", value.key));
            None
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
        let value = self.optional(key)?;
        Self::of(&value).and_then(|mut section| {
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
            if let Some(mut section) = Self::of(&value) {
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
}
