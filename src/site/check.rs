//! Checks files of every kind, and says all that is wrong with each.
//!
//! A site is held against the mounts there are, a list against the catalogues, readings against the
//! catalogues and, if a mount was named, against its circles and sides.

use std::path::Path;

use crate::catalog::Catalogue;
use crate::metal::Mount;
use crate::site::builtin;
use crate::site::fault::{Fault, Faults, FileText};
use crate::site::file_kind::FileKind;
use crate::site::folders::{Folders, Shelf, stem};
use crate::site::list_file::{self, ListFile};
use crate::site::mount_file::MountFile;
use crate::site::own;
use crate::site::readings_file::{RawReading, ReadingsFile};
use crate::site::site_file::SiteFile;

/// What was found of one file.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Checked {
    /// The file.
    pub name: String,
    /// What it is; nothing if it could not be read at all.
    pub kind: Option<FileKind>,
    /// All that is wrong with it.
    pub faults: Option<Faults>,
}

/// What a file may be held against.
#[derive(Clone, Copy, Debug)]
pub struct Checker<'a> {
    /// Where mounts are looked up by name.
    pub folders: &'a Folders,
    /// Where targets are looked up by name.
    pub catalogue: &'a Catalogue,
    /// The mount whose circles the readings are of, if it was named.
    pub mount: Option<&'a Mount>,
}

impl Checker<'_> {
    /// Checks one file.
    #[must_use]
    pub fn file(&self, path: &Path) -> Checked {
        if FileKind::is_catalogue(path) {
            return Checked {
                name: path.display().to_string(),
                kind: Some(FileKind::Catalogue),
                faults: own::check(path).err(),
            };
        }
        match FileText::read(path) {
            Ok(file) => self.text(path, file),
            Err(faults) => Checked {
                name: path.display().to_string(),
                kind: None,
                faults: Some(faults),
            },
        }
    }

    /// Checks all of the user's files and the built-in ones.
    pub fn all(&self) -> Result<Vec<Checked>, Faults> {
        let mut checked = Vec::new();
        for shelf in Shelf::ALL {
            for path in self.folders.paths(shelf)? {
                checked.push(self.file(&path));
            }
            for built_in in builtin::files(shelf) {
                let file = FileText::built_in(shelf, built_in);
                checked.push(self.text(Path::new(&file.name.clone()), file));
            }
        }
        Ok(checked)
    }

    fn text(&self, path: &Path, file: FileText) -> Checked {
        let (name, id) = (file.name.clone(), stem(path));
        let kind = FileKind::of(path, &file.text);
        let faults = match kind {
            FileKind::Site => SiteFile::read(&id, file).and_then(|site| self.mount_of(&site)),
            FileKind::Mount => MountFile::read(&id, file).map(|_| ()),
            FileKind::List => ListFile::read(&id, file).and_then(|list| self.names_of(&list)),
            FileKind::Catalogue => own::check(path),
            FileKind::Readings => ReadingsFile::read(file).and_then(|file| self.readings(file)),
        };
        Checked {
            name,
            kind: Some(kind),
            faults: faults.err(),
        }
    }

    /// A mount with faults of its own is said where the site names it; its faults are its own file's.
    fn mount_of(&self, site: &SiteFile) -> Result<(), Faults> {
        self.folders.mount_of(site).map(|_| ()).map_err(|faults| {
            if faults.file().name == site.file.name {
                return faults;
            }
            let fault = Fault::new(site.mount_at.clone(), "this mount's file has faults")
                .hint(format!("see nonius check {}", faults.file().name));
            Faults::new(site.file.clone(), vec![fault])
        })
    }

    fn names_of(&self, list: &ListFile) -> Result<(), Faults> {
        let faults = list
            .resolve(self.catalogue)
            .into_iter()
            .filter_map(Result::err);
        all_of(list.file.clone(), faults.collect())
    }

    fn readings(&self, file: ReadingsFile) -> Result<(), Faults> {
        let faults = file
            .readings
            .iter()
            .flat_map(|reading| self.reading(reading))
            .collect();
        all_of(file.file, faults)
    }

    fn reading(&self, reading: &RawReading) -> Vec<Fault> {
        let star = self.catalogue.resolve(&reading.star.text);
        let star = star
            .err()
            .map(|unresolved| list_file::unknown(reading.star.span.clone(), &unresolved));
        let circles = match self.mount {
            Some(mount) => reading.on_mount(mount).err().unwrap_or_default(),
            None => reading.faults_on_any_mount(),
        };
        star.into_iter().chain(circles).collect()
    }
}

fn all_of(file: FileText, faults: Vec<Fault>) -> Result<(), Faults> {
    if faults.is_empty() {
        Ok(())
    } else {
        Err(Faults::new(file, faults))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn checked(files: &[(&str, &str)], mount: Option<&Mount>) -> Vec<Checked> {
        let home = tempfile::tempdir().unwrap();
        for (name, text) in files {
            let path = home.path().join(name);
            std::fs::create_dir_all(path.parent().unwrap()).unwrap();
            std::fs::write(path, text).unwrap();
        }
        let checker = Checker {
            folders: &Folders::at(home.path(), home.path(), home.path()),
            catalogue: &Catalogue::builtin(),
            mount,
        };
        files
            .iter()
            .map(|(name, _)| checker.file(&home.path().join(name)))
            .chain(checker.all().unwrap())
            .collect()
    }

    #[test]
    fn everything_built_in_is_without_fault() {
        let all = checked(&[], None);
        assert!(all.len() >= 7, "{all:?}");
        for one in all {
            assert!(one.faults.is_none(), "{}", one.faults.unwrap());
        }
    }

    #[test]
    fn the_users_files_are_checked_too() {
        let all = checked(&[("lists/mine.txt", "M 37\nXyzzy 9\n")], None);
        let mine: Vec<_> = all.iter().filter(|one| one.faults.is_some()).collect();
        assert_eq!(mine.len(), 2, "once by name, once among all");
        let message = mine[0].faults.as_ref().unwrap().to_string();
        assert!(message.contains("mine.txt:2:1\n"), "{message}");
    }

    #[test]
    fn readings_are_held_against_the_circles_of_the_mount() {
        let text = "utc,star,hour,dec,side\n2026-12-01T21:30:00Z,Vega,20h 61m,38 47,single\n\
            2026-12-01T21:30:00Z,Vgea,20h 51m,98,tube-west\n";
        let home = tempfile::tempdir().unwrap();
        let six_inch = Folders::at(home.path(), home.path(), home.path())
            .mount("six-inch")
            .unwrap()
            .mount;
        let places = |mount: Option<&Mount>| -> Vec<(usize, usize)> {
            let one = checked(&[("r.csv", text)], mount).swap_remove(0);
            assert_eq!(one.kind, Some(FileKind::Readings));
            let faults = one.faults.unwrap();
            let at = |fault: &Fault| {
                faults
                    .file()
                    .line_and_column(fault.span.clone().unwrap().start)
            };
            faults.list().iter().map(at).collect()
        };
        assert_eq!(places(None), [(2, 31), (3, 22)]);
        assert_eq!(
            places(Some(&six_inch)),
            [(2, 31), (2, 41), (3, 22), (3, 35)]
        );
    }
}
