//! Adding targets to a list: every line that is there stays as it is, with its comments; the new ones stand at the end.

use std::fs;
use std::io;
use std::path::PathBuf;

use crate::site::fault::{Faults, FileText};
use crate::site::folders::{Folders, Shelf};
use crate::site::list_file::{self, ListFile};
use crate::site::new::{Cannot, is_a_name, replace, write_new};

/// What came of adding to a list.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Added {
    /// The list's file.
    pub path: PathBuf,
    /// How many are new in it.
    pub new: usize,
    /// How many were in it already.
    pub there: usize,
}

/// Why nothing was added.
#[derive(Debug, thiserror::Error)]
pub enum NotAdded {
    /// The list has faults of its own.
    #[error(transparent)]
    Faults(#[from] Faults),
    /// Writing failed, or the name will not do.
    #[error(transparent)]
    Cannot(#[from] Cannot),
}

/// Adds names to the user's list of a name. A list that is not there is begun; one that is built in is copied first.
pub fn add(folders: &Folders, list: &str, names: &[&str]) -> Result<Added, NotAdded> {
    let own = own_path(folders, list);
    let known = folders.names(Shelf::Lists)?;
    let text = if own.is_some() || known.iter().any(|name| name == list) {
        let path = own
            .clone()
            .map_or_else(|| list.to_owned(), |path| path.display().to_string());
        folders.list(&path)?.file.text
    } else if is_a_name(list) {
        format!("# {list}: one target a line; what follows two spaces is your note.\n")
    } else {
        return Err(Cannot::Name(list.to_owned()).into());
    };
    let (longer, new) = added(list, &text, names)?;
    let path = own.unwrap_or_else(|| folders.folder(Shelf::Lists).join(format!("{list}.txt")));
    if new > 0 {
        let written = if path.exists() {
            replace(&path, &longer)
        } else {
            write_new(&path, &longer)
        };
        written.map_err(|error: io::Error| {
            let path = path.clone();
            Cannot::Write { path, error }
        })?;
    }
    let there = names.len() - new;
    Ok(Added { path, new, there })
}

/// The user's file of a list, if there is one.
fn own_path(folders: &Folders, list: &str) -> Option<PathBuf> {
    if crate::site::folders::is_file(list) {
        return Some(PathBuf::from(list)).filter(|path| fs::exists(path).unwrap_or(false));
    }
    let endings = Shelf::Lists.endings().iter();
    let mut paths = endings.map(|ending| {
        folders
            .folder(Shelf::Lists)
            .join(format!("{list}.{ending}"))
    });
    paths.find(|path| path.exists())
}

/// A list's text with the names that are not in it added at its end, and how many those are.
fn added(list: &str, text: &str, names: &[&str]) -> Result<(String, usize), Faults> {
    let file = FileText {
        name: list.to_owned(),
        text: text.to_owned(),
    };
    // a list that holds nothing yet is no fault here
    let there: Vec<String> = match ListFile::read(list, file) {
        Ok(read) => read
            .lines
            .into_iter()
            .map(|line| line.written.name)
            .collect(),
        Err(_)
            if text
                .lines()
                .all(|line| line.trim().is_empty() || line.starts_with('#')) =>
        {
            Vec::new()
        }
        Err(faults) => return Err(faults),
    };
    let columns = list_file::columns(text);
    let mut longer = text.to_owned();
    let mut new: Vec<&str> = Vec::new();
    for name in names {
        let same = |known: &str| known.eq_ignore_ascii_case(name);
        if there.iter().any(|known| same(known)) || new.iter().any(|known| same(known)) {
            continue;
        }
        if !longer.is_empty() && !longer.ends_with('\n') {
            longer.push('\n');
        }
        match columns {
            // in a table the place is left empty: it is looked up by the name
            Some(columns) => {
                longer.push_str(&quoted(name));
                longer.extend(std::iter::repeat_n(',', columns.saturating_sub(1)));
            }
            None => longer.push_str(name),
        }
        longer.push('\n');
        new.push(name);
    }
    Ok((longer, new.len()))
}

/// A name as a cell of a table.
fn quoted(name: &str) -> String {
    if name.contains([',', '"']) {
        format!("\"{}\"", name.replace('"', "\"\""))
    } else {
        name.to_owned()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_is_there_stays_as_it_is_and_new_names_follow() {
        let text = "# my comment\nM 37  low power # keep\n\n  m 31\r\n# end";
        let (longer, new) = added("mine", text, &["M 31", "NGC 457", "M 37", "NGC 457"]).unwrap();
        assert_eq!(longer, format!("{text}\nNGC 457\n"));
        assert_eq!(new, 1);
    }

    #[test]
    fn a_table_gets_rows_with_all_its_cells() {
        let text = "# a table\nname,ra,dec,note\nField,1h,+3,\n";
        let (longer, new) = added("mine", text, &["M 31", "Odd, name"]).unwrap();
        assert_eq!(longer, format!("{text}M 31,,,\n\"Odd, name\",,,\n"));
        assert_eq!(new, 2);
        let file = FileText {
            name: "mine".to_owned(),
            text: longer,
        };
        let lines = ListFile::read("mine", file).unwrap().lines;
        let names: Vec<&str> = lines
            .iter()
            .map(|line| line.written.name.as_str())
            .collect();
        assert_eq!(names, ["Field", "M 31", "Odd, name"]);
    }

    #[test]
    fn a_list_is_begun_and_a_built_in_one_is_copied() {
        let home = tempfile::tempdir().unwrap();
        let folders = Folders::at(home.path(), home.path(), home.path());
        let begun = add(&folders, "spring", &["M 3"]).unwrap();
        assert_eq!((begun.new, begun.there), (1, 0));
        assert_eq!(folders.list("spring").unwrap().lines.len(), 1);
        let copied = add(&folders, "tarn-hollow", &["M 3", "M 37"]).unwrap();
        assert_eq!((copied.new, copied.there), (1, 1));
        let text = fs::read_to_string(&copied.path).unwrap();
        assert!(text.contains("# An early December evening") && text.ends_with("\nM 3\n"));
        let again = add(&folders, "tarn-hollow", &["M 3"]).unwrap();
        assert_eq!((again.new, again.there), (0, 1));
        assert!(matches!(
            add(&folders, "a b", &["M 3"]),
            Err(NotAdded::Cannot(Cannot::Name(_)))
        ));
    }
}
