//! What the record says of the side asked for, and of where the tube is.

use crate::dial::TubePlace;
use crate::metal::SideRequest;
use crate::night::State;

/// The side of the pier asked for.
#[must_use]
pub fn request(state: &State) -> SideRequest {
    state.side.map_or(SideRequest::Auto, SideRequest::Only)
}

/// Where the tube was last known to be.
#[must_use]
pub fn tube(state: &State) -> Option<TubePlace> {
    let shown = state.tube.as_ref()?;
    Some(TubePlace {
        axes: shown.axes.into(),
        utc: shown.utc,
        side: shown.side,
    })
}
