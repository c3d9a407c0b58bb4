//! What a file is, told by its text: a mount has circles, a site a latitude, a table of readings its
//! header; everything else is a list. Where the text says nothing, the folder and the ending do.

use std::path::Path;

use crate::site::folders::Shelf;
use crate::site::own;
use crate::site::readings_file;

/// What a file is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum FileKind {
    /// A site.
    Site,
    /// A mount.
    Mount,
    /// A target list.
    List,
    /// The user's own catalogue: a place in every row.
    Catalogue,
    /// Readings of the circles.
    Readings,
}

impl FileKind {
    /// In a word, for messages.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Site => "site",
            Self::Mount => "mount",
            Self::List => "list",
            Self::Catalogue => "catalogue",
            Self::Readings => "readings",
        }
    }

    /// True of a file that is a catalogue of the user's own by its folder or by what it begins with; it may be of any size.
    #[must_use]
    pub fn is_catalogue(path: &Path) -> bool {
        let folder = path.parent().and_then(Path::file_name);
        let among = folder.is_some_and(|folder| folder == Shelf::Catalogs.folder());
        path.is_file() && (among || own::is_told_by_beginning(path))
    }

    /// What a file is, by its text, else by its folder and ending.
    #[must_use]
    pub fn of(path: &Path, text: &str) -> Self {
        let folder = path
            .parent()
            .and_then(Path::file_name)
            .and_then(|name| name.to_str());
        let is_toml = path.extension().is_some_and(|ending| ending == "toml");
        let (table, errors) = toml::de::DeTable::parse_recoverable(text);
        if is_toml || (errors.is_empty() && !table.get_ref().is_empty()) {
            let any = |keys: &[&str]| keys.iter().any(|key| table.get_ref().contains_key(*key));
            let of_a_mount = any(&["hour-circle", "declination-circle", "kind"]);
            let of_a_site = any(&["latitude", "longitude", "time-zone"]);
            let among_mounts = folder == Some(Shelf::Mounts.folder());
            if of_a_mount || (among_mounts && !of_a_site) {
                Self::Mount
            } else {
                Self::Site
            }
        } else if readings_file::is_header(text) {
            Self::Readings
        } else if folder == Some(Shelf::Catalogs.folder()) {
            Self::Catalogue
        } else {
            Self::List
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_text_tells_before_the_folder_does() {
        for (path, text, kind) in [
            ("x.toml", "latitude = 5\n", FileKind::Site),
            ("mounts/x.toml", "latitude = 5\n", FileKind::Site),
            ("mounts/x.toml", "", FileKind::Mount),
            ("sites/x.toml", "[hour-circle]\n", FileKind::Mount),
            (
                "x.toml",
                "kind = \"fork\"\nlatitude = = 1\n",
                FileKind::Mount,
            ),
            ("x", "latitude = 5\n", FileKind::Site),
            ("x.csv", "utc,star,hour,dec,side\n", FileKind::Readings),
            ("x.csv", "UTC;Star;hour\n", FileKind::Readings),
            ("x.csv", "name,ra,dec\n", FileKind::List),
            ("catalogs/x.csv", "name,ra,dec\n", FileKind::Catalogue),
            ("x.txt", "M 37\n", FileKind::List),
            ("x.txt", "", FileKind::List),
        ] {
            assert_eq!(FileKind::of(Path::new(path), text), kind, "{path} {text}");
        }
    }
}
