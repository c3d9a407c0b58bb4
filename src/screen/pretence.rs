//! The pretended mount of a demonstration: what its circles show, its rings having been set by hand or not.

use crate::angle::Angle;
use crate::metal::{self, MountErrors};
use crate::night::{NightReading, State};
use crate::screen::observatory::Observatory;

/// The errors of the pretended mount as its rings stand now. A ring set by hand shows what the observer set it to: its index
/// is that of the first star read since.
#[must_use]
pub fn errors(observatory: &Observatory, state: &State) -> Option<MountErrors> {
    let mut errors = observatory.demonstration?;
    let first = |under: &dyn Fn(&NightReading) -> bool| {
        let mut readings = state.readings.iter();
        readings.find(|read| under(read))
    };
    if state.zeros.hour > 0
        && let Some(read) = first(&|read| read.zeros.hour == state.zeros.hour)
        && let Some((hour, _)) = indexes(observatory, &errors, read)
    {
        errors.hour_index = hour;
    }
    if state.zeros.dec > 0
        && let Some(read) = first(&|read| read.zeros.dec == state.zeros.dec)
        && let Some((_, dec)) = indexes(observatory, &errors, read)
    {
        errors.dec_index = dec;
    }
    Some(errors)
}

/// The two indexes with which such a mount shows what was read.
fn indexes(
    observatory: &Observatory,
    errors: &MountErrors,
    read: &NightReading,
) -> Option<(Angle, Angle)> {
    let shown: metal::Axes = read.reading.shown()?.into();
    let sight = read.reading.sight();
    let without = MountErrors {
        hour_index: Angle::ZERO,
        dec_index: Angle::ZERO,
        ..*errors
    };
    let axes = metal::to_axes(
        sight.hour_angle,
        sight.declination,
        observatory.observer.latitude,
        &without,
        sight.side,
    )
    .ok()?;
    let off = |shown: crate::angle::AxisAngle, axis: crate::angle::AxisAngle| {
        (shown.angle() - axis.angle()).wrapped_signed()
    };
    Some((off(shown.hour, axes.hour), off(shown.dec, axes.dec)))
}
