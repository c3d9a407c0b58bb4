//! What is known of the mount's errors: prior, sights, fit, prediction, chance.
//!
//! A [`Prior`] and the [`Sight`]s of a night make a [`Fit`]; the rest of the program carries the [`Estimate`] that
//! follows from it, and asks it for a [`Prediction`] of any place; [`chance()`] says how
//! likely that place is in a field.

pub mod chance;
mod descent;
pub mod entangled;
pub mod fit;
pub mod next_star;
pub mod polar_axis;
pub mod prediction;
pub mod prior;
mod resolve;
mod search;
pub mod sight;
pub mod suspicion;
pub mod sweep;
pub mod widening;

pub use chance::chance;
pub use descent::{GROSS_SIGMAS, TRUSTED_SIGMAS};
pub use entangled::Entangled;
pub use fit::{Fit, fit};
pub use next_star::{Offered, Station, Wanted};
pub use polar_axis::{Lean, PolarAxis};
pub use prediction::{Estimate, Prediction};
pub use prior::{Covariance, Prior};
pub use sight::{Residual, Sight, nearest};
pub use suspicion::{Held, SUSPICIOUS, Slipped, ln_sum};
pub use sweep::{SweepStep, sweep};
pub use widening::Touched;
