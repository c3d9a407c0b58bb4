//! A list of targets: plain lines, or a table with the header `name,ra,dec`.
//!
//! On a plain line the name ends at two spaces or a tab, and what follows is the observer's note;
//! `#` begins a comment. A row of a table may leave its place empty: then it is looked up by its name.

use std::ops::Range;

use crate::catalog::list::{Entry, Written};
use crate::catalog::{Catalogue, Unresolved, clean};
use crate::site::fault::{Fault, Faults, FileText};
use crate::site::list_row;
use crate::site::table;

/// A list and the file it came from.
#[derive(Clone, Debug, PartialEq)]
pub struct ListFile {
    /// The name of its file, without folder and ending.
    pub id: String,
    /// Its targets in order.
    pub lines: Vec<ListLine>,
    /// The file, untouched.
    pub file: FileText,
}

/// One target of a list.
#[derive(Clone, Debug, PartialEq)]
pub struct ListLine {
    /// What the line says, its name and note cleaned of control characters.
    pub written: Written,
    /// Where the name stands in the file.
    pub name_at: Range<usize>,
}

impl ListFile {
    /// Reads a list from the text of its file; `id` is the file's name without folder and ending.
    pub fn read(id: &str, file: FileText) -> Result<Self, Faults> {
        let mut faults = Vec::new();
        let lines = if is_table(&file.text) {
            table::read(&file.text, list_row::COLUMNS, &mut faults)
                .iter()
                .filter_map(|row| list_row::read(row, &mut faults))
                .collect()
        } else {
            plain(&file.text)
        };
        if lines.is_empty() && faults.is_empty() {
            faults.push(
                Fault::new(0..0, "this list holds no target")
                    .hint("write one name a line, as \"M 37\""),
            );
        }
        if faults.is_empty() {
            Ok(Self {
                id: id.to_owned(),
                lines,
                file,
            })
        } else {
            Err(Faults::new(file, faults))
        }
    }

    /// The targets of the list; a name no catalogue knows is a fault at its place.
    #[must_use]
    pub fn resolve(&self, catalogue: &Catalogue) -> Vec<Result<Entry, Fault>> {
        self.lines
            .iter()
            .map(|line| {
                catalogue
                    .resolve_entry(&line.written)
                    .map_err(|unresolved| unknown(line.name_at.clone(), &unresolved))
            })
            .collect()
    }
}

/// A name that is no target, as a fault of the file it stands in.
#[must_use]
pub fn unknown(at: Range<usize>, unresolved: &Unresolved) -> Fault {
    Fault::new(at, unresolved.to_string()).hint(unresolved.hint())
}

/// True if the first line that says anything is the header of a table.
fn is_table(text: &str) -> bool {
    text.trim_start_matches('\u{feff}')
        .lines()
        .find(|line| !line.trim().is_empty() && !line.starts_with('#'))
        .and_then(|line| {
            line.split([',', ';', '\t'])
                .next()
                .filter(|first| first.len() < line.len())
        })
        .is_some_and(|first| first.trim().trim_matches('"').eq_ignore_ascii_case("name"))
}

/// How many columns a list has that is a table; nothing for plain lines.
#[must_use]
pub fn columns(text: &str) -> Option<usize> {
    let header = is_table(text).then(|| table::header_line(text))?;
    let line = text.get(header)?.lines().last()?;
    Some(line.split(',').count())
}

fn plain(text: &str) -> Vec<ListLine> {
    let mut lines = Vec::new();
    let mut at = 0;
    for line in text.split_inclusive('\n') {
        let said = line.trim_start_matches(|c: char| c.is_whitespace() || c == '\u{feff}');
        let start = at + line.len() - said.len();
        at += line.len();
        let ends = [said.find("  "), said.find('\t')];
        let end = ends.into_iter().flatten().min().unwrap_or(said.len());
        let (name, note) = said.split_at(end);
        let (name, note) = match comment(name) {
            Some(comment) => (name.get(..comment).unwrap_or(""), ""),
            None => (name, note.trim()),
        };
        let note = if note.starts_with('#') { "" } else { note };
        let written = Written {
            name: clean(name),
            note: clean(note),
            ..Written::default()
        };
        if !written.name.is_empty() {
            lines.push(ListLine {
                written,
                name_at: start..start + name.trim_end().len(),
            });
        }
    }
    lines
}

/// Where a comment begins: a `#` at the start of the line or after a space.
fn comment(name: &str) -> Option<usize> {
    name.match_indices('#').map(|(at, _)| at).find(|at| {
        name.get(..*at)
            .is_none_or(|before| !before.ends_with(|c: char| !c.is_whitespace()))
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::sky::Equinox;

    fn read(text: &str) -> Result<ListFile, Faults> {
        let file = FileText {
            name: "list".to_owned(),
            text: text.to_owned(),
        };
        ListFile::read("list", file)
    }

    #[test]
    fn a_plain_line_is_a_name_and_a_note() {
        let text = "# autumn\r\n\r\nM 37  low # power\r\n  gamma Cas\tbright\n47 Tuc # far south\nM 31  # wide\n05:52:18.3 +32:33:11@J2000\n";
        let lines = read(text).unwrap().lines;
        let said: Vec<_> = lines
            .iter()
            .map(|line| {
                (
                    line.written.name.as_str(),
                    line.written.note.as_str(),
                    &text[line.name_at.clone()],
                )
            })
            .collect();
        assert_eq!(
            said,
            [
                ("M 37", "low # power", "M 37"),
                ("gamma Cas", "bright", "gamma Cas"),
                ("47 Tuc", "", "47 Tuc"),
                ("M 31", "", "M 31"),
                (
                    "05:52:18.3 +32:33:11@J2000",
                    "",
                    "05:52:18.3 +32:33:11@J2000"
                ),
            ]
        );
    }

    #[test]
    fn a_table_gives_places_in_hours_or_marked_degrees() {
        let text = "name,ra,dec,equinox,epoch,pm-ra-mas,size,magnitude\n\
            One,05:52:18.3,+32:33:11,,,,24,5.6\n\
            Two,88.07625d,32.5530556d,B1950,J1991.25,-12.5,1d x 30',\n\
            M 37,,,,,,,\n";
        let lines = read(text).unwrap().lines;
        let place = |at: usize| lines[at].written.place.unwrap();
        for at in [0, 1] {
            assert!((place(at).right_ascension.degrees() - 88.076_25).abs() < 1e-9);
            assert!((place(at).declination.degrees() - 32.553_055_6).abs() < 1e-7);
        }
        assert_eq!(
            (place(0).equinox, place(1).equinox),
            (Equinox::J2000, Equinox::B1950)
        );
        assert!(
            (place(1).epoch - 1991.25).abs() < 1e-9 && (place(1).pm_ra_mas + 12.5).abs() < 1e-9
        );
        let (length, width) = lines[1].written.size_arcmin.unwrap();
        assert!((length - 60.0).abs() < 1e-9 && (width - 30.0).abs() < 1e-9);
        assert_eq!(
            lines[0].written.size_arcmin.map(|size| size.0.round()),
            Some(24.0)
        );
        assert!(lines[2].written.place.is_none());
    }

    #[test]
    fn a_bare_decimal_right_ascension_is_not_guessed_at() {
        let message = read("name,ra,dec\nOne,88.1,32.5\n")
            .unwrap_err()
            .to_string();
        assert!(message.contains("hours or degrees"), "{message}");
        assert!(message.contains("list:2:5\n"), "{message}");
    }

    #[test]
    fn an_unknown_name_is_a_fault_at_its_place() {
        let list = read("M 37\n  Xyzzy 9\n").unwrap();
        let resolved = list.resolve(&Catalogue::builtin());
        assert!(resolved[0].is_ok());
        let fault = resolved[1].clone().unwrap_err();
        assert_eq!(fault.span, Some(7..14));
    }
}
