//! The pretended mount of a demonstration: what its circles show, its rings having been set by hand or not.

use crate::angle::Angle;
use crate::catalog::Target;
use crate::metal::{self, MountErrors, Side};
use crate::night::{NightReading, State};
use crate::screen::observatory::Observatory;
use crate::sky::Moment;

/// What the circles show with a star in the middle, as engraved; nothing where no mount is pretended.
#[must_use]
pub fn circles(
    observatory: &Observatory,
    state: &State,
    moment: &Moment,
    (star, side): (&Target, Side),
) -> Option<(String, String)> {
    let errors = errors(observatory, state)?;
    let place = moment.observed(&moment.apparent(&star.source));
    let latitude = moment.observer().latitude;
    let axes = metal::to_axes(place.hour_angle, place.declination, latitude, &errors, side).ok()?;
    let mount = &observatory.mount;
    let (hour, dec) = (&mount.hour_circle, &mount.declination_circle);
    let read = hour.reading(axes.hour, moment.apparent_sidereal(), side);
    Some((
        hour.scale().text(read),
        dec.scale().text(dec.reading(axes.dec)),
    ))
}

/// The errors of the pretended mount as its rings stand now. A ring set by hand shows what the observer set it to: its index
/// is that of the first star read since.
fn errors(observatory: &Observatory, state: &State) -> Option<MountErrors> {
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
