//! Catalogues and target lists: what they hold, the names things go by, the search.
//!
//! [`Catalogue`] is the door: [`Catalogue::resolve`] from a name or coordinates to a [`Target`],
//! [`Catalogue::search`] from a few typed words to many, [`Catalogue::resolve_entry`] from an entry
//! of a list, [`Catalogue::bright_stars`] for calibration. The built-in tables stay text and are
//! read in place, so that a run that wants one target pays for one.

mod asked;
mod best;
mod builtin_index;
mod catalogue;
pub mod constellation;
mod deep_sky;
pub mod facts;
mod faint_stars;
mod filter;
mod fold;
pub mod given;
pub mod greek;
pub mod index;
pub mod kind;
mod likeness;
pub mod list;
pub mod orbit_line;
mod own;
pub mod report;
mod rows;
mod scorer;
pub mod search;
mod sieve;
mod solar_system;
mod star_field;
mod stars;
mod surroundings;
pub mod target;

pub use catalogue::{Catalogue, Unresolved};
pub use constellation::Constellation;
pub use facts::{Extreme, Facts, Pair, Variable};
pub use filter::{Filter, Near};
pub use greek::Greek;
pub use kind::{Kind, UnknownKind};
pub use list::{TargetList, clean};
pub use own::{OwnCatalogue, Rows};
pub use report::FindReport;
pub use search::Found;
pub use sieve::kept_direction;
pub use star_field::StarPlace;
pub use target::{Origin, Target};
