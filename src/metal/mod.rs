//! The mount as built: graduated circles, axes and sides, the exact geometry between sky and axes.

pub mod circle;
pub mod dome;
mod dual;
pub mod eccentricity;
pub mod engraved;
pub mod errors;
mod frames;
pub mod geometry;
pub mod graduation;
pub mod limits;
pub mod look;
pub mod marks;
pub mod misread;
pub mod mount;
pub mod reading;
pub mod scale;
pub mod side;
pub mod side_choice;
pub mod strip;
pub mod typed;
pub mod view;

pub use circle::{
    DeclinationCircle, DeclinationNumbering, HourCircle, HourNumbering, Increases, Ring,
};
pub use dome::{EyepiecePlace, Slit, TubeDirections};
pub use eccentricity::OppositeVerniers;
pub use errors::MountErrors;
pub use geometry::{Axes, Slopes, TooNearPole, to_axes, to_axes_with_slopes, to_sky};
pub use graduation::{Graduation, VernierLine};
pub use marks::MarkAhead;
pub use misread::{Misreading, Mistake, Step};
pub use mount::{Dome, ExpectedErrors, HourAngleSpan, Kind, Limits, Mount, Optic, Tube};
pub use scale::{Reading, Scale};
pub use side::Side;
pub use side_choice::{NoSuchSide, SideRequest, UnknownSide};
pub use strip::StripMark;
pub use typed::{read_dec, read_hour};
pub use view::{Orientation, View};
