//! Where things are, for an observer at a place: catalogue place, apparent place, observed place.
//!
//! | place | type | what it is |
//! |---|---|---|
//! | catalogue | [`CataloguePlace`] | right ascension and declination at an equinox and an epoch |
//! | apparent | [`Apparent`] | from the site, on the true equator and equinox of date, without air |
//! | observed | [`Observed`] | the apparent place lifted by refraction: where the tube must point |
//!
//! [`Moment`] is the sky at one instant for one observer: made once, it gives the place of any
//! number of targets. The models are those of IAU SOFA as carried by `sofars`; polar motion
//! (0.3" at most, on the sky) is left out.

mod air;
mod body;
mod brightness;
mod catalogue_place;
mod compass;
mod course;
mod crossing;
mod earth;
mod equinox;
mod fk4;
mod horizon;
mod moment;
mod observer;
mod orbit;
mod orbit_seen;
mod place;
pub mod refraction;
mod rise_set;
#[cfg(test)]
mod samples;
mod season;
mod through_air;
mod vector;

pub use air::Air;
pub use body::Body;
pub use brightness::Brightness;
pub use catalogue_place::{CataloguePlace, Equinox};
pub use compass::compass_point;
pub use course::{Course, Turning};
pub use crossing::{Crossing, crossings, crossings_between, look_times};
pub use equinox::EquinoxFault;
pub use horizon::HorizonMask;
pub use moment::Moment;
pub use observer::Observer;
pub use orbit::Orbit;
pub use place::{Apparent, Observed, Source, separation};
pub use rise_set::{Passage, Transit, Twilight};
