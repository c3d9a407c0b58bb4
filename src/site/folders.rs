//! Where files live: the user's own folders, which win, and what is compiled into the program.
//!
//! On Linux the user's files are in `$XDG_CONFIG_HOME/nonius/{sites,mounts,lists,catalogs}` and the
//! journals in `$XDG_STATE_HOME/nonius/nights`; elsewhere in the platform's own folders. What is
//! asked for is a name, or a file if it holds a path separator or ends as such files do.

use std::fs;
use std::path::{Path, PathBuf, is_separator};

use etcetera::BaseStrategy;

use crate::site::builtin;
use crate::site::fault::{Fault, Faults, FileText};
use crate::site::likely::nearest;
use crate::site::list_file::ListFile;
use crate::site::mount_file::MountFile;
use crate::site::own;
use crate::site::readings_file::ReadingsFile;
use crate::site::site_file::SiteFile;

/// How the names of files begin that are compiled into the program.
const BUILT_IN: &str = "built-in/";

/// The name of the program's folder among the user's.
const PROGRAM: &str = "nonius";

/// What is kept together in one folder.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Shelf {
    /// Site files.
    Sites,
    /// Mount files.
    Mounts,
    /// Target lists.
    Lists,
    /// The user's own catalogues: a place in every row.
    Catalogs,
}

impl Shelf {
    /// All of them.
    pub const ALL: [Self; 4] = [Self::Sites, Self::Mounts, Self::Lists, Self::Catalogs];

    /// The name of the folder.
    #[must_use]
    pub const fn folder(self) -> &'static str {
        match self {
            Self::Sites => "sites",
            Self::Mounts => "mounts",
            Self::Lists => "lists",
            Self::Catalogs => "catalogs",
        }
    }

    /// What one file of it is.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Sites => "site",
            Self::Mounts => "mount",
            Self::Lists => "list",
            Self::Catalogs => "catalogue",
        }
    }

    /// The endings of its files, the one tried first in front.
    #[must_use]
    pub const fn endings(self) -> &'static [&'static str] {
        match self {
            Self::Sites | Self::Mounts => &["toml"],
            Self::Lists => &["txt", "csv"],
            Self::Catalogs => &["csv", "txt", "vot", "xml", "dat", "mpc"],
        }
    }
}

/// The user's folders.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Folders {
    config: PathBuf,
    nights: PathBuf,
    indexes: PathBuf,
}

/// The user's own folder cannot be told.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error("the home folder cannot be found: set HOME")]
pub struct NoHome;

impl Folders {
    /// The folders of the user who runs the program.
    pub fn of_the_user() -> Result<Self, NoHome> {
        let strategy = etcetera::base_strategy::choose_native_strategy().map_err(|_| NoHome)?;
        let state = strategy.state_dir().unwrap_or_else(|| strategy.data_dir());
        Ok(Self::at(
            &strategy.config_dir().join(PROGRAM),
            &state.join(PROGRAM),
            &strategy.cache_dir().join(PROGRAM),
        ))
    }

    /// With the program's own folders for configuration, for state, and for what can be made again.
    #[must_use]
    pub fn at(config: &Path, state: &Path, cache: &Path) -> Self {
        Self {
            config: config.to_owned(),
            nights: state.join("nights"),
            indexes: cache.join("catalogs"),
        }
    }

    /// Where the journals are.
    #[must_use]
    pub fn nights(&self) -> &Path {
        &self.nights
    }

    /// The user's folder of a shelf.
    #[must_use]
    pub fn folder(&self, shelf: Shelf) -> PathBuf {
        self.config.join(shelf.folder())
    }

    /// The site of a name or file.
    pub fn site(&self, name_or_file: &str) -> Result<SiteFile, Faults> {
        let (id, file) = self.find(Shelf::Sites, name_or_file)?;
        SiteFile::read(&id, file)
    }

    /// The mount of a name or file.
    pub fn mount(&self, name_or_file: &str) -> Result<MountFile, Faults> {
        let (id, file) = self.find(Shelf::Mounts, name_or_file)?;
        MountFile::read(&id, file)
    }

    /// The mount a site names; an unknown name is a fault of the site file. A path in it starts from
    /// the folder the site file is in.
    pub fn mount_of(&self, site: &SiteFile) -> Result<MountFile, Faults> {
        let named = &site.site.mount;
        let (id, file) = if is_file(named) {
            let folder = Path::new(&site.file.name).parent().unwrap_or(Path::new(""));
            Self::open(&folder.join(named))?
        } else {
            self.named(Shelf::Mounts, named)?.ok_or_else(|| {
                let at = Some(site.mount_at.clone());
                let fault = self.unknown(Shelf::Mounts, named, at);
                Faults::new(site.file.clone(), vec![fault])
            })?
        };
        MountFile::read(&id, file)
    }

    /// The list of a name or file.
    pub fn list(&self, name_or_file: &str) -> Result<ListFile, Faults> {
        let (id, file) = self.find(Shelf::Lists, name_or_file)?;
        ListFile::read(&id, file)
    }

    /// The readings of a file.
    pub fn readings(path: &Path) -> Result<ReadingsFile, Faults> {
        ReadingsFile::read(FileText::read(path)?)
    }

    /// The user's own catalogues, in alphabetical order, each opened or with what is wrong with it as a whole.
    pub fn catalogues(&self, progress: &mut own::Progress<'_>) -> Result<Vec<own::Tried>, Faults> {
        let opened = self.paths(Shelf::Catalogs)?.into_iter().map(|path| {
            let opened = own::open(&path, &self.indexes, progress);
            (path, opened)
        });
        Ok(opened.collect())
    }

    /// The names on a shelf, the user's and the built-in ones, in alphabetical order.
    pub fn names(&self, shelf: Shelf) -> Result<Vec<String>, Faults> {
        let mut names: Vec<String> = self.paths(shelf)?.iter().map(|path| stem(path)).collect();
        let built_in = builtin::files(shelf).iter().map(|file| file.id.to_owned());
        names.extend(built_in);
        names.sort();
        names.dedup();
        Ok(names)
    }

    /// The user's files on a shelf, in alphabetical order; none if there is no such folder.
    pub fn paths(&self, shelf: Shelf) -> Result<Vec<PathBuf>, Faults> {
        let folder = self.folder(shelf);
        let entries = match fs::read_dir(&folder) {
            Ok(entries) => entries,
            Err(error) if error.kind() == std::io::ErrorKind::NotFound => return Ok(Vec::new()),
            Err(error) => {
                let message = format!("this folder cannot be read: {error}");
                let hint = Some("look whether you may read it".to_owned());
                return Err(Faults::of_the_file(
                    &folder.display().to_string(),
                    message,
                    hint,
                ));
            }
        };
        let mut paths: Vec<PathBuf> = entries
            .filter_map(|entry| Some(entry.ok()?.path()))
            .filter(|path| {
                let ending = path.extension().and_then(|ending| ending.to_str());
                ending.is_some_and(|ending| shelf.endings().contains(&ending))
                    && !stem(path).starts_with('.')
            })
            .collect();
        paths.sort();
        Ok(paths)
    }

    /// The file of a name or path, and its name without folder and ending.
    fn find(&self, shelf: Shelf, name_or_file: &str) -> Result<(String, FileText), Faults> {
        if is_file(name_or_file) {
            return Self::open(Path::new(name_or_file));
        }
        self.named(shelf, name_or_file)?.ok_or_else(|| {
            let fault = self.unknown(shelf, name_or_file, None);
            Faults::of_the_file("", fault.message, fault.hint)
        })
    }

    fn open(path: &Path) -> Result<(String, FileText), Faults> {
        Ok((stem(path), FileText::read(path)?))
    }

    /// The user's file of a name, else the built-in one.
    fn named(&self, shelf: Shelf, name: &str) -> Result<Option<(String, FileText)>, Faults> {
        for ending in shelf.endings() {
            let path = self.folder(shelf).join(format!("{name}.{ending}"));
            if path.exists() {
                return Self::open(&path).map(Some);
            }
        }
        let built_in = builtin::files(shelf).iter().find(|file| file.id == name);
        Ok(built_in.map(|file| (file.id.to_owned(), FileText::built_in(shelf, file))))
    }

    fn unknown(&self, shelf: Shelf, name: &str, span: Option<std::ops::Range<usize>>) -> Fault {
        let known = self.names(shelf).unwrap_or_default();
        let hint = match nearest(name, known.iter().map(String::as_str)) {
            Some(nearest) => format!("did you mean {nearest}? Known are {}", known.join(", ")),
            None => format!("known are {}", known.join(", ")),
        };
        Fault {
            span,
            message: format!("no {} is named \"{name}\"", shelf.word()),
            hint: Some(hint),
        }
    }
}

impl FileText {
    /// True if it is compiled into the program.
    #[must_use]
    pub fn is_built_in(&self) -> bool {
        self.name.starts_with(BUILT_IN)
    }

    /// The text of a built-in file.
    #[must_use]
    pub fn built_in(shelf: Shelf, file: &builtin::BuiltIn) -> Self {
        Self {
            name: format!("{BUILT_IN}{}/{}.{}", shelf.folder(), file.id, file.ending),
            text: file.text.to_owned(),
        }
    }
}

/// True if what was asked for is a file rather than a name.
#[must_use]
pub fn is_file(name_or_file: &str) -> bool {
    let ending = Path::new(name_or_file)
        .extension()
        .and_then(|ending| ending.to_str());
    name_or_file.contains(is_separator)
        || ending.is_some_and(|ending| {
            Shelf::ALL
                .iter()
                .any(|shelf| shelf.endings().contains(&ending))
        })
}

/// A file's name without folder and ending.
pub(super) fn stem(path: &Path) -> String {
    path.file_stem()
        .map(|stem| stem.to_string_lossy().into_owned())
        .unwrap_or_default()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn with_user_files(files: &[(&str, &str)]) -> (tempfile::TempDir, Folders) {
        let home = tempfile::tempdir().unwrap();
        for (name, text) in files {
            let path = home.path().join(name);
            fs::create_dir_all(path.parent().unwrap()).unwrap();
            fs::write(path, text).unwrap();
        }
        let folders = Folders::at(home.path(), home.path(), home.path());
        (home, folders)
    }

    #[test]
    fn every_built_in_file_is_read_and_every_site_finds_its_mount() {
        let (_home, folders) = with_user_files(&[]);
        for name in folders.names(Shelf::Sites).unwrap() {
            let site = folders.site(&name).unwrap();
            assert_eq!(site.site.id, name);
            assert_eq!(folders.mount_of(&site).unwrap().id, site.site.mount);
        }
        for name in folders.names(Shelf::Mounts).unwrap() {
            folders.mount(&name).unwrap();
        }
        for name in folders.names(Shelf::Lists).unwrap() {
            let list = folders.list(&name).unwrap();
            for entry in list.resolve(&crate::catalog::Catalogue::builtin()) {
                entry.unwrap();
            }
        }
        assert!(folders.site(builtin::DEMONSTRATION_SITE).is_ok());
        assert!(folders.list(builtin::DEMONSTRATION_LIST).is_ok());
    }

    #[test]
    fn the_users_file_wins_over_the_built_in_one() {
        let (_home, folders) = with_user_files(&[("lists/tarn-hollow.txt", "Vega\n")]);
        let list = folders.list("tarn-hollow").unwrap();
        assert_eq!((list.lines.len(), list.id.as_str()), (1, "tarn-hollow"));
        let names = folders.names(Shelf::Lists).unwrap();
        assert_eq!(
            names.iter().filter(|name| *name == "tarn-hollow").count(),
            1
        );
    }

    #[test]
    fn an_unknown_name_brings_the_nearest_and_all_known_ones() {
        let (_home, folders) = with_user_files(&[]);
        let message = folders.site("tarn-holow").unwrap_err().to_string();
        assert_eq!(
            message,
            "error: no site is named \"tarn-holow\"\n |\n = hint: did you mean tarn-hollow? Known are saltpan-ridge, tarn-hollow"
        );
    }

    #[test]
    fn a_site_that_names_no_mount_is_at_fault_where_it_names_it() {
        let text = builtin::files(Shelf::Sites)[1]
            .text
            .replace("\"six-inch\"", "\"sixinch\"");
        let (home, folders) = with_user_files(&[("sites/mine.toml", &text)]);
        let site = folders.site("mine").unwrap();
        let message = folders.mount_of(&site).unwrap_err().to_string();
        assert!(message.contains("mine.toml:8:9\n"), "{message}");
        assert!(message.contains("did you mean six-inch?"), "{message}");
        drop(home);
    }

    #[test]
    fn a_site_may_name_its_mount_by_a_path_from_its_own_folder() {
        let text = builtin::files(Shelf::Sites)[1]
            .text
            .replace("\"six-inch\"", "\"../m/own.toml\"");
        let mount = builtin::files(Shelf::Mounts)[0].text;
        let (_home, folders) =
            with_user_files(&[("sites/mine.toml", &text), ("m/own.toml", mount)]);
        let site = folders.site("mine").unwrap();
        assert_eq!(folders.mount_of(&site).unwrap().id, "own");
    }

    #[test]
    fn a_path_or_an_ending_makes_a_file_of_a_name() {
        assert!(is_file("./here") && is_file("here.toml") && is_file("a.csv") && is_file("x/y"));
        assert!(!is_file("tarn-hollow") && !is_file("v1.2"));
    }
}
