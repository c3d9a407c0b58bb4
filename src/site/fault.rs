//! What is wrong with a file, where it stands, and what to write instead.
//!
//! A place is a range of bytes of the file's text; lines and columns are counted from 1, columns in
//! characters. What is quoted from a file never carries a control character to the terminal.

use std::fmt;
use std::fs;
use std::ops::Range;
use std::path::Path;

use annotate_snippets::{AnnotationKind, Group, Level, Origin, Renderer, Snippet};

/// More than any list or table of readings written by hand; a larger file is refused unread.
const LARGEST_FILE_BYTES: u64 = 4 * 1024 * 1024;

/// More faults of one file than this are counted, not shown: nobody reads on.
const MOST_SHOWN: usize = 200;

/// The text of one file, kept as it was read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct FileText {
    /// The file as the observer named it.
    pub name: String,
    /// All of its text, untouched.
    pub text: String,
}

/// One thing wrong with a file.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Fault {
    /// The bytes of the text that are wrong; nothing where the fault is the file as a whole.
    pub span: Option<Range<usize>>,
    /// What is wrong.
    pub message: String,
    /// What to do about it.
    pub hint: Option<String>,
}

/// Everything wrong with one file, in the order of the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Faults {
    file: FileText,
    list: Vec<Fault>,
}

/// Whether a message may be coloured.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ink {
    /// Text alone.
    Plain,
    /// With the terminal's colours.
    Coloured,
}

/// Text fit for a terminal: every control character, and every one that turns the direction of
/// writing, becomes a replacement mark, and a tab a space. The number of characters stays.
#[must_use]
pub fn without_control_characters(text: &str) -> String {
    text.chars()
        .map(|c| match c {
            '\t' => ' ',
            '\u{200b}'..='\u{200f}'
            | '\u{2028}'..='\u{202e}'
            | '\u{2060}'..='\u{206f}'
            | '\u{feff}' => char::REPLACEMENT_CHARACTER,
            c if c.is_control() => char::REPLACEMENT_CHARACTER,
            c => c,
        })
        .collect()
}

impl FileText {
    /// Reads a file; one that is missing, too large or not UTF-8 is a fault.
    pub fn read(path: &Path) -> Result<Self, Faults> {
        let name = path.display().to_string();
        let whole = |message: String, hint| Faults::of_the_file(&name, message, hint);
        let cannot = |error: std::io::Error| {
            whole(
                format!("this file cannot be read: {error}"),
                Some("look at its name and folder, and whether you may read it".to_owned()),
            )
        };
        let details = fs::metadata(path).map_err(cannot)?;
        if details.is_dir() {
            let hint = Some("name a file in it".to_owned());
            return Err(whole("this is a folder".to_owned(), hint));
        }
        if details.len() > LARGEST_FILE_BYTES {
            let message = format!("this file is larger than {LARGEST_FILE_BYTES} bytes");
            let hint = Some("a list or table written for a night is far smaller".to_owned());
            return Err(whole(message, hint));
        }
        let bytes = fs::read(path).map_err(cannot)?;
        Self::from_bytes(name, bytes)
    }

    /// The text of bytes already read; a byte that is not UTF-8 is a fault at its place.
    pub fn from_bytes(name: String, bytes: Vec<u8>) -> Result<Self, Faults> {
        String::from_utf8(bytes)
            .map(|text| Self {
                name: name.clone(),
                text,
            })
            .map_err(|error| {
                // up to the first bad byte the shown text is the same as the file
                let start = error.utf8_error().valid_up_to();
                let text = String::from_utf8_lossy(error.as_bytes()).into_owned();
                let fault = Fault {
                    span: Some(start..start + char::REPLACEMENT_CHARACTER.len_utf8()),
                    message: "this is not UTF-8 text".to_owned(),
                    hint: Some("save the file as UTF-8".to_owned()),
                };
                Faults::new(Self { name, text }, vec![fault])
            })
    }

    /// The line and the column of a byte of the text, both from 1, the column in characters.
    #[must_use]
    pub fn line_and_column(&self, at: usize) -> (usize, usize) {
        let line = self.line_around(at);
        let before = self.text.get(line.start..self.floor(at)).unwrap_or("");
        let lines = self
            .text
            .get(..line.start)
            .unwrap_or("")
            .matches('\n')
            .count();
        (lines + 1, before.chars().count() + 1)
    }

    /// The nearest place at or before `at` where a character starts.
    fn floor(&self, at: usize) -> usize {
        let at = at.min(self.text.len());
        (0..=at)
            .rev()
            .find(|place| self.text.is_char_boundary(*place))
            .unwrap_or(0)
    }

    /// The bytes of the line a byte stands in, without its end.
    pub(crate) fn line_around(&self, at: usize) -> Range<usize> {
        let at = self.floor(at);
        let (before, after) = self.text.split_at(at);
        let start = before.rfind('\n').map_or(0, |end| end + 1);
        let end = after.find('\n').map_or(self.text.len(), |end| at + end);
        let line = self.text.get(start..end).unwrap_or("");
        start..start + line.strip_suffix('\r').unwrap_or(line).len()
    }
}

impl Fault {
    /// A fault at a place.
    #[must_use]
    pub fn new(span: Range<usize>, message: impl Into<String>) -> Self {
        Self {
            span: Some(span),
            message: message.into(),
            hint: None,
        }
    }

    /// A fault of the file as a whole.
    #[must_use]
    pub fn of_the_file(message: impl Into<String>, hint: Option<String>) -> Self {
        Self {
            span: None,
            message: message.into(),
            hint,
        }
    }

    /// The same fault with what to do about it.
    #[must_use]
    pub fn hint(mut self, hint: impl Into<String>) -> Self {
        self.hint = Some(hint.into());
        self
    }

    /// The fault as text, with the line it stands in and a caret under it.
    fn render(&self, file: &FileText, renderer: &Renderer) -> String {
        let name = without_control_characters(&file.name);
        let message = without_control_characters(&self.message);
        let hint = self.hint.as_deref().map(without_control_characters);
        let mut group = Group::with_title(Level::ERROR.primary_title(message));
        if let Some(span) = &self.span {
            let (line_number, _) = file.line_and_column(span.start);
            let line = file.line_around(span.start);
            let text = file.text.get(line.clone()).unwrap_or("");
            let cut = |at: usize| {
                let at = file.floor(at).clamp(line.start, line.end) - line.start;
                without_control_characters(text.get(..at).unwrap_or("")).len()
            };
            let (start, end) = (cut(span.start), cut(span.end));
            let mut shown = without_control_characters(text);
            if start == shown.len() {
                // something for the caret to stand under
                shown.push(' ');
            }
            // at least one whole character
            let first = shown.get(start..).and_then(|rest| rest.chars().next());
            let least = start + first.map_or(0, char::len_utf8);
            let caret = AnnotationKind::Primary.span(start..end.max(least));
            group = group.element(
                Snippet::source(shown)
                    .line_start(line_number)
                    .path(name)
                    .annotation(caret),
            );
        } else if !name.is_empty() {
            group = group.element(Origin::path(name));
        }
        if let Some(hint) = hint {
            group = group.element(Level::HELP.with_name("hint").message(hint));
        }
        renderer.render(&[group])
    }
}

impl Faults {
    /// The faults of a file, put in the order of its text.
    #[must_use]
    pub fn new(file: FileText, mut list: Vec<Fault>) -> Self {
        list.sort_by_key(|fault| fault.span.as_ref().map(|span| (span.start, span.end)));
        list.dedup();
        Self { file, list }
    }

    /// The one fault of a file as a whole, or of no file where the name is empty.
    #[must_use]
    pub fn of_the_file(name: &str, message: impl Into<String>, hint: Option<String>) -> Self {
        let file = FileText {
            name: name.to_owned(),
            text: String::new(),
        };
        Self::new(file, vec![Fault::of_the_file(message, hint)])
    }

    /// The file.
    #[must_use]
    pub const fn file(&self) -> &FileText {
        &self.file
    }

    /// Its faults in order.
    #[must_use]
    pub fn list(&self) -> &[Fault] {
        &self.list
    }

    /// All faults as text, each with `file:line:column`, the line, a caret and a hint.
    #[must_use]
    pub fn render(&self, ink: Ink) -> String {
        let renderer = match ink {
            Ink::Plain => Renderer::plain(),
            Ink::Coloured => Renderer::styled().hyperlink(false),
        };
        let mut shown: Vec<String> = self
            .list
            .iter()
            .take(MOST_SHOWN)
            .map(|fault| fault.render(&self.file, &renderer))
            .collect();
        if let Some(more) = self
            .list
            .len()
            .checked_sub(MOST_SHOWN)
            .filter(|more| *more > 0)
        {
            let name = without_control_characters(&self.file.name);
            shown.push(format!("and {more} more in {name}"));
        }
        shown.join("\n\n")
    }
}

impl fmt::Display for Faults {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.render(Ink::Plain))
    }
}

impl std::error::Error for Faults {}

#[cfg(test)]
mod tests {
    use super::*;

    fn shown(text: &str, span: Range<usize>) -> String {
        let file = FileText {
            name: "sites/here.toml".to_owned(),
            text: text.to_owned(),
        };
        Faults::new(file, vec![Fault::new(span, "wrong").hint("right")]).to_string()
    }

    #[test]
    fn the_message_holds_place_line_caret_and_hint() {
        assert_eq!(
            shown("a = 1\nlatitude = 95\n", 17..19),
            "error: wrong
 --> sites/here.toml:2:12
  |
2 | latitude = 95
  |            ^^
  |
  = hint: right"
        );
    }

    #[test]
    fn columns_count_characters_and_tabs_keep_the_caret_in_place() {
        let text = "é\t天 = x\r\nnext";
        let at = text.find('x').unwrap();
        let message = shown(text, at..at + 1);
        assert!(message.contains("sites/here.toml:1:7\n"), "{message}");
        assert!(
            message.contains("1 | é 天 = x\n  |        ^\n"),
            "{message}"
        );
    }

    #[test]
    fn no_control_character_reaches_the_terminal() {
        let message = shown("a\u{1b}[31m\u{7}\u{202e} = 1", 1..2);
        assert!(
            message.chars().all(|c| c == '\n' || !c.is_control()) && !message.contains('\u{202e}'),
            "{message}"
        );
    }

    #[test]
    fn a_fault_at_the_end_of_the_text_has_its_caret_there() {
        let message = shown("abc\n", 4..4);
        assert!(message.contains("here.toml:2:1\n"), "{message}");
        let message = shown("abc", 3..3);
        assert!(message.contains("here.toml:1:4\n"), "{message}");
        assert!(message.contains("  |    ^\n"), "{message}");
    }

    #[test]
    fn the_first_byte_that_is_not_utf_8_has_its_place() {
        let faults = FileText::from_bytes("list.txt".to_owned(), b"M 37\nM\xff 38".to_vec());
        let message = faults.unwrap_err().to_string();
        assert!(message.contains("list.txt:2:2\n"), "{message}");
    }

    #[test]
    fn a_file_that_is_wrong_throughout_does_not_flood_the_terminal() {
        let file = FileText {
            name: "x".to_owned(),
            text: "a".repeat(300),
        };
        let list = (0..300).map(|at| Fault::new(at..at + 1, "wrong")).collect();
        let message = Faults::new(file, list).to_string();
        assert_eq!(message.matches("error: wrong").count(), MOST_SHOWN);
        assert!(message.ends_with("and 100 more in x"), "{message}");
    }

    #[test]
    fn a_missing_file_is_named() {
        let message = FileText::read(Path::new("no/such.toml"))
            .unwrap_err()
            .to_string();
        assert!(message.contains("--> no/such.toml"), "{message}");
    }
}
