//! One line of a journal: `{"n":17,"utc":"...","event":{...},"crc":"1a2b3c4d"}`.
//!
//! The check is the CRC-32 (the one of Ethernet and zip) of the line's bytes without the member
//! `,"crc":"1a2b3c4d"`, as eight lower-case hexadecimal digits; `crc` is the last member. JSON
//! escapes every quote inside a text, so `{"n":` begins a line and stands nowhere else.

use serde::{Deserialize, Serialize};
use serde_json::Value;

use crate::catalog;
use crate::night::event::{Event, Stamped};
use crate::time::Utc;

/// How every line begins.
pub(super) const HEAD: &[u8] = b"{\"n\":";
const CRC_HEAD: &str = ",\"crc\":\"";
const CRC_DIGITS: usize = 8;
/// From the comma before the check to the end of the line.
const CRC_LENGTH: usize = CRC_HEAD.len() + CRC_DIGITS + "\"}".len();

#[derive(Serialize, Deserialize)]
struct Body {
    n: u64,
    utc: Utc,
    event: Value,
}

/// What a whole line holds.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Line {
    /// An event.
    Event(Stamped),
    /// An event of a kind, or in a form, this program does not know.
    Unknown {
        /// Its number.
        number: u64,
        /// Its kind, if it states one.
        kind: String,
    },
}

/// An act that cannot be written so that it is read back the same.
#[derive(Debug, thiserror::Error)]
#[error("this act cannot be written down: {0}")]
pub struct Unwritable(String);

/// The line for an event, with its newline, and the event as it will be read back from it: moments
/// to the millisecond, texts without control characters.
pub(super) fn write(number: u64, utc: Utc, event: &Event) -> Result<(String, Stamped), Unwritable> {
    let fault = |why: serde_json::Error| Unwritable(why.to_string());
    let mut value = serde_json::to_value(event).map_err(fault)?;
    clean(&mut value);
    let body = Body {
        n: number,
        utc,
        event: value,
    };
    let mut line = serde_json::to_string(&body).map_err(fault)?;
    let crc = crc32fast::hash(line.as_bytes());
    // the check goes before the closing brace
    line.pop();
    let line = format!("{line}{CRC_HEAD}{crc:08x}\"}}");
    match read(line.as_bytes()) {
        Some(Line::Event(stamped)) => Ok((line + "\n", stamped)),
        _ => Err(Unwritable("it holds what is not a number".to_owned())),
    }
}

/// The line in these bytes (without the newline), or nothing if they are damaged.
pub(super) fn read(bytes: &[u8]) -> Option<Line> {
    let (open, check) = bytes.split_at_checked(bytes.len().checked_sub(CRC_LENGTH)?)?;
    let digits = check
        .strip_prefix(CRC_HEAD.as_bytes())?
        .strip_suffix(b"\"}")?;
    let mut hash = crc32fast::Hasher::new();
    hash.update(open);
    hash.update(b"}");
    if digits != format!("{:08x}", hash.finalize()).as_bytes() {
        return None;
    }
    let body: Body = serde_json::from_slice(&[open, b"}"].concat()).ok()?;
    let mut value = body.event;
    clean(&mut value);
    let kind = value.get("kind").and_then(Value::as_str).map(str::to_owned);
    Some(match serde_json::from_value(value) {
        Ok(event) => Line::Event(Stamped {
            number: body.n,
            utc: body.utc,
            event,
        }),
        Err(_) => Line::Unknown {
            number: body.n,
            kind: kind.unwrap_or_default(),
        },
    })
}

/// Cleans every text, so that no control character ever reaches a terminal.
fn clean(value: &mut Value) {
    match value {
        Value::String(text) => *text = catalog::clean(text),
        Value::Array(values) => values.iter_mut().for_each(clean),
        Value::Object(members) => members.values_mut().for_each(clean),
        _ => {}
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn utc() -> Utc {
        Utc::parse("2026-12-01T21:30:00.25Z").unwrap()
    }

    fn note(text: &str) -> Event {
        Event::Note {
            target: None,
            text: text.to_owned(),
        }
    }

    #[test]
    fn a_line_is_written_as_agreed() {
        let (line, _) = write(17, utc(), &note("dew on the finder")).unwrap();
        // the check computed apart: Python 3 zlib.crc32 of the text up to ,"crc" and a closing brace
        assert_eq!(
            line,
            "{\"n\":17,\"utc\":\"2026-12-01T21:30:00.250Z\",\"event\":{\"kind\":\"note\",\
             \"target\":null,\"text\":\"dew on the finder\"},\"crc\":\"2fcd0ae0\"}\n"
        );
    }

    #[test]
    fn a_text_may_look_like_a_line() {
        let text = "{\"n\":1,\"crc\":\"00000000\"}\n\u{1b}[31m";
        let (line, stamped) = write(1, utc(), &note(text)).unwrap();
        assert_eq!(line.matches("{\"n\":").count(), 1);
        assert_eq!(
            stamped.event,
            note("{\"n\":1,\"crc\":\"00000000\"} [31m"),
            "control characters are gone"
        );
        assert_eq!(read(line.trim_end().as_bytes()), Some(Line::Event(stamped)));
    }

    #[test]
    fn what_is_not_a_number_is_refused() {
        let event = Event::ClockCorrected { seconds: f64::NAN };
        assert!(write(1, utc(), &event).is_err());
    }

    #[test]
    fn a_kind_from_a_newer_program_is_told_by_name() {
        let body =
            "{\"n\":3,\"utc\":\"2026-12-01T21:30:00Z\",\"event\":{\"kind\":\"slit-turned\"}}";
        let crc = crc32fast::hash(body.as_bytes());
        let line = format!(
            "{},\"crc\":\"{crc:08x}\"}}",
            body.strip_suffix('}').unwrap()
        );
        assert_eq!(
            read(line.as_bytes()),
            Some(Line::Unknown {
                number: 3,
                kind: "slit-turned".to_owned()
            })
        );
    }
}
