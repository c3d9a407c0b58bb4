//! Commented starting files for a site, a mount or a list, written into the user's folder.
//!
//! A file that is there is never overwritten. The file appears whole or not at all: it is written
//! under another name, synced to disk, then linked to its own.

use std::fs::{self, File, OpenOptions};
use std::io::{self, Write};
use std::path::{Path, PathBuf};

use crate::site::folders::{Folders, Shelf};

/// The longest name, far below what any file system allows.
const LONGEST_NAME: usize = 60;

/// The word each template has where the name goes.
const NAME: &str = "NAME";

/// Why a starting file was not written.
#[derive(Debug, thiserror::Error)]
pub enum Cannot {
    /// The name will not do.
    #[error(
        "\"{0}\" is no name for a file: use letters, digits and dashes, at most {LONGEST_NAME}"
    )]
    Name(String),
    /// The user has a file of that name.
    #[error("{} is there already, and is left as it is", .0.display())]
    IsThere(PathBuf),
    /// There is nothing to start from.
    #[error("a {} starts from nothing", .0.word())]
    NoTemplate(Shelf),
    /// Writing failed.
    #[error("{} cannot be written: {error}", path.display())]
    Write {
        /// The file.
        path: PathBuf,
        /// What the system said.
        error: io::Error,
    },
}

const fn template(shelf: Shelf) -> Option<&'static str> {
    match shelf {
        Shelf::Sites => Some(include_str!("templates/site.toml")),
        Shelf::Mounts => Some(include_str!("templates/mount.toml")),
        Shelf::Lists => Some(include_str!("templates/list.txt")),
        Shelf::Catalogs => None,
    }
}

/// True of what will do as the name of a file.
#[must_use]
pub fn is_a_name(name: &str) -> bool {
    let fits = |c: char| c.is_ascii_alphanumeric() || c == '-';
    let long = name.is_empty() || name.len() > LONGEST_NAME;
    !long && !name.starts_with('-') && name.chars().all(fits)
}

/// Writes a starting file and says where it is.
pub fn create(folders: &Folders, shelf: Shelf, name: &str) -> Result<PathBuf, Cannot> {
    if !is_a_name(name) {
        return Err(Cannot::Name(name.to_owned()));
    }
    let template = template(shelf).ok_or(Cannot::NoTemplate(shelf))?;
    let folder = folders.folder(shelf);
    for ending in shelf.endings() {
        let path = folder.join(format!("{name}.{ending}"));
        if path.exists() {
            return Err(Cannot::IsThere(path));
        }
    }
    let ending = shelf.endings().first().copied().unwrap_or("txt");
    let path = folder.join(format!("{name}.{ending}"));
    match write_new(&path, &template.replace(NAME, name)) {
        Ok(()) => Ok(path),
        Err(error) if error.kind() == io::ErrorKind::AlreadyExists => Err(Cannot::IsThere(path)),
        Err(error) => Err(Cannot::Write { path, error }),
    }
}

/// Writes a file that is not there yet, whole and on disk when this returns; its folder is made if
/// need be.
pub fn write_new(path: &Path, text: &str) -> io::Result<()> {
    let folder = path.parent().unwrap_or(Path::new("."));
    fs::create_dir_all(folder)?;
    let draft = draft_of(path);
    let written = write_draft(&draft, text).and_then(|()| place(&draft, path));
    // the draft has done its work, or must not be left behind
    let removed = fs::remove_file(&draft);
    written?;
    match removed {
        Err(error) if error.kind() != io::ErrorKind::NotFound => Err(error),
        _ => sync_folder(folder),
    }
}

/// Writes another text into a file that is there: at every moment the file is whole, the old one or the new.
pub fn replace(path: &Path, text: &str) -> io::Result<()> {
    // where the name is a link, what it points to is written
    let path = fs::canonicalize(path)?;
    let draft = draft_of(&path);
    let rights = fs::metadata(&path)?.permissions();
    let written = write_draft(&draft, text)
        .and_then(|()| fs::set_permissions(&draft, rights))
        .and_then(|()| fs::rename(&draft, &path));
    if written.is_err() {
        let _ = fs::remove_file(&draft);
    }
    written?;
    sync_folder(path.parent().unwrap_or(Path::new(".")))
}

/// A name beside a file's own for what is not whole yet.
fn draft_of(path: &Path) -> PathBuf {
    let mut name = std::ffi::OsString::from(".");
    name.push(path.file_name().unwrap_or_default());
    name.push(format!(".{}", std::process::id()));
    path.parent().unwrap_or(Path::new(".")).join(name)
}

fn write_draft(draft: &Path, text: &str) -> io::Result<()> {
    let mut file = OpenOptions::new()
        .write(true)
        .create(true)
        .truncate(true)
        .open(draft)?;
    file.write_all(text.as_bytes())?;
    file.sync_all()
}

/// Gives a draft its own name, unless that is taken.
fn place(draft: &Path, path: &Path) -> io::Result<()> {
    match fs::hard_link(draft, path) {
        Err(error) if error.kind() != io::ErrorKind::AlreadyExists && !path.exists() => {
            // a file system without links, as on memory cards
            fs::rename(draft, path)
        }
        linked => linked,
    }
}

/// Puts the folder's new entry on disk, where folders can be synced.
fn sync_folder(folder: &Path) -> io::Result<()> {
    if cfg!(unix) {
        File::open(folder)?.sync_all()
    } else {
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalog::Catalogue;

    fn home() -> (tempfile::TempDir, Folders) {
        let home = tempfile::tempdir().unwrap();
        let folders = Folders::at(&home.path().join("config"), home.path(), home.path());
        (home, folders)
    }

    #[test]
    fn a_new_file_is_read_without_fault() {
        let (_home, folders) = home();
        for shelf in [Shelf::Sites, Shelf::Mounts, Shelf::Lists] {
            let path = create(&folders, shelf, "back-garden").unwrap();
            assert_eq!(path.parent().unwrap(), folders.folder(shelf));
        }
        let site = folders.site("back-garden").unwrap();
        assert_eq!(site.site.name, "back-garden");
        folders.mount_of(&site).unwrap();
        folders.mount("back-garden").unwrap();
        let list = folders.list("back-garden").unwrap();
        for entry in list.resolve(&Catalogue::builtin()) {
            entry.unwrap();
        }
    }

    #[test]
    fn a_file_that_is_there_stays_as_it_is() {
        let (_home, folders) = home();
        let path = create(&folders, Shelf::Lists, "autumn").unwrap();
        fs::write(&path, "M 37\n").unwrap();
        assert!(matches!(
            create(&folders, Shelf::Lists, "autumn"),
            Err(Cannot::IsThere(_))
        ));
        assert_eq!(
            write_new(&path, "M 1\n").unwrap_err().kind(),
            io::ErrorKind::AlreadyExists
        );
        assert_eq!(fs::read_to_string(&path).unwrap(), "M 37\n");
        let left = fs::read_dir(path.parent().unwrap()).unwrap().count();
        assert_eq!(left, 1, "no draft is left behind");
    }

    #[test]
    fn a_name_that_is_no_name_is_refused() {
        let (_home, folders) = home();
        for name in ["", "../x", "a b", "a.toml", "-x", "ü", "a/b"] {
            assert!(
                matches!(create(&folders, Shelf::Sites, name), Err(Cannot::Name(_))),
                "{name}"
            );
        }
        assert!(!folders.folder(Shelf::Sites).exists());
    }
}
