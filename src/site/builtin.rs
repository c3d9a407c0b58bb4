//! The sites, mounts and lists compiled into the program, to try it with.
//!
//! They are read by the same readers as the user's own files.

use crate::site::folders::Shelf;

/// A file compiled into the program: its name without ending, its ending, its text.
#[derive(Clone, Copy, Debug)]
pub struct BuiltIn {
    /// The name it is asked for by.
    pub id: &'static str,
    /// The ending of the file in the repository.
    pub ending: &'static str,
    /// Its text.
    pub text: &'static str,
}

/// The site used where nothing else is asked for.
pub const DEMONSTRATION_SITE: &str = "tarn-hollow";
/// The list used where nothing else is asked for.
pub const DEMONSTRATION_LIST: &str = "tarn-hollow";

const SITES: &[BuiltIn] = &[
    toml(
        "saltpan-ridge",
        include_str!("../../sites/saltpan-ridge.toml"),
    ),
    toml("tarn-hollow", include_str!("../../sites/tarn-hollow.toml")),
];

const MOUNTS: &[BuiltIn] = &[
    toml("fork", include_str!("../../sites/mounts/fork.toml")),
    toml("portable", include_str!("../../sites/mounts/portable.toml")),
    toml("six-inch", include_str!("../../sites/mounts/six-inch.toml")),
];

const LISTS: &[BuiltIn] = &[
    list(
        "saltpan-ridge",
        include_str!("../../catalogs/lists/saltpan-ridge.txt"),
    ),
    list(
        "tarn-hollow",
        include_str!("../../catalogs/lists/tarn-hollow.txt"),
    ),
];

const fn toml(id: &'static str, text: &'static str) -> BuiltIn {
    BuiltIn {
        id,
        ending: "toml",
        text,
    }
}

const fn list(id: &'static str, text: &'static str) -> BuiltIn {
    BuiltIn {
        id,
        ending: "txt",
        text,
    }
}

/// The built-in files of a shelf, by name.
#[must_use]
pub const fn files(shelf: Shelf) -> &'static [BuiltIn] {
    match shelf {
        Shelf::Sites => SITES,
        Shelf::Mounts => MOUNTS,
        Shelf::Lists => LISTS,
        // the built-in catalogues are read in place by the catalogue itself
        Shelf::Catalogs => &[],
    }
}
