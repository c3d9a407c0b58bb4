//! The mount as built: graduated circles, axes and sides, the exact geometry between sky and axes.

pub mod circle;
mod dual;
pub mod errors;
pub mod geometry;
pub mod mount;
pub mod side;

pub use circle::{
    DeclinationCircle, DeclinationNumbering, HourCircle, HourNumbering, Increases, Ring,
};
pub use errors::MountErrors;
pub use geometry::{Axes, Slopes, TooNearPole, to_axes, to_axes_with_slopes, to_sky};
pub use mount::{Dome, ExpectedErrors, HourAngleSpan, Kind, Limits, Mount, Optic, Tube};
pub use side::Side;
