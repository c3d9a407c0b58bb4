//! How the axes of a mount without errors stand on an object, and how far it is from one object to another.
//!
//! The hour axis turns with the sky while the tube follows an object: its angle is kept without that turning, as it would be
//! at the night's noon, so that the swing from one object to another does not depend on when it is made. Both angles run on
//! past half a turn, the way the metal goes:
//!
//! * the hour axis stays within the side's span of hour angles; tube east, it stands 12 h back, so that the way over is by
//!   way of -6 h, with the tube on top and the counterweight below;
//! * the declination axis turns over through the raised pole: a swing to the other side is the two polar distances together.

use crate::angle::{Angle, Latitude};
use crate::dial::Swing;
use crate::metal::{MountErrors, Side, to_axes};
use crate::plan::sides::Site;
use crate::sky::{Observed, Turning};

/// How the axes stand.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stand {
    /// The side of the pier.
    pub side: Side,
    /// Of the hour axis, less the sky's turning since noon; positive west.
    hour: Angle,
    /// Of the declination axis.
    dec: Angle,
    /// The hour axis may be turned all the way round.
    free: bool,
}

impl Stand {
    /// On a place observed so many seconds after the night's noon.
    pub(super) fn new(
        site: &Site<'_>,
        latitude: Latitude,
        side: Side,
        place: &Observed,
        after_s: f64,
    ) -> Self {
        let perfect = MountErrors::default();
        let declination = place.declination;
        let dec = to_axes(place.hour_angle, declination, latitude, &perfect, side)
            .map_or(declination.angle(), |axes| axes.dec.angle());
        let span = site.span(side);
        let hour = span.map_or(place.hour_angle.angle(), |span| {
            let middle = (span.from.angle() + span.width() / 2.0).wrapped_signed();
            middle + (place.hour_angle.angle() - middle).wrapped_signed()
        });
        let north = latitude.angle() >= Angle::ZERO;
        let (over, dec) = match side {
            Side::TubeEast if north => (Angle::HALF_TURN, dec.wrapped_positive()),
            Side::TubeEast => (Angle::HALF_TURN, -(-dec).wrapped_positive()),
            Side::TubeWest | Side::Single => (Angle::ZERO, dec),
        };
        Self {
            side,
            hour: hour - over - Turning::turned(after_s),
            dec,
            free: span.is_none(),
        }
    }
}

impl Stand {
    /// The swing from here to another stand: about the hour axis positive west, about the declination axis in its angle.
    #[must_use]
    pub fn swing_to(&self, to: &Self) -> Swing {
        let hour = to.hour - self.hour;
        Swing {
            hour: if self.free {
                hour.wrapped_signed()
            } else {
                hour
            },
            dec: to.dec - self.dec,
        }
    }

    /// Both swings together, whichever way.
    #[must_use]
    pub fn way_to(&self, to: &Self) -> Angle {
        let swing = self.swing_to(to);
        swing.hour.abs() + swing.dec.abs()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{Altitude, Azimuth, Declination, HourAngle};
    use crate::metal::Kind;
    use crate::plan::samples::mount;
    use crate::sky::HorizonMask;

    fn stand(
        kind: Kind,
        latitude: f64,
        side: Side,
        hour_deg: f64,
        dec_deg: f64,
        after_s: f64,
    ) -> Stand {
        let (horizon, mount) = (
            HorizonMask::default(),
            mount(kind, crate::metal::Limits::default()),
        );
        let site = Site {
            horizon: &horizon,
            mount: &mount,
        };
        let place = Observed {
            hour_angle: HourAngle::from_degrees(hour_deg),
            declination: Declination::from_degrees(dec_deg),
            azimuth: Azimuth::default(),
            altitude: Altitude::default(),
            refraction: Angle::ZERO,
        };
        Stand::new(
            &site,
            Latitude::from_degrees(latitude),
            side,
            &place,
            after_s,
        )
    }

    fn swing_deg(from: &Stand, to: &Stand) -> (f64, f64) {
        let swing = from.swing_to(to);
        let round = |angle: Angle| (angle.degrees() * 1e6).round() / 1e6;
        (round(swing.hour), round(swing.dec))
    }

    #[test]
    fn on_one_side_the_swing_is_the_difference_on_the_sky_whenever_it_is_made() {
        let west =
            |hour, dec, after_s| stand(Kind::German, 50.0, Side::TubeWest, hour, dec, after_s);
        assert_eq!(
            swing_deg(&west(-60.0, 10.0, 0.0), &west(-20.0, 45.0, 0.0)),
            (40.0, 35.0)
        );
        // two hours of sidereal time later the first stands where the sky has carried it
        let later = 7200.0 / 1.002_737_909_350_795;
        assert_eq!(
            swing_deg(&west(-60.0, 10.0, 0.0), &west(-30.0, 10.0, later)),
            (0.0, 0.0)
        );
    }

    #[test]
    fn a_turn_over_the_pier_goes_by_the_raised_pole_with_the_tube_on_top() {
        for (latitude, dec, way) in [
            (50.0, 30.0, 120.0),
            (50.0, -20.0, 220.0),
            (-31.0, -48.0, -84.0),
            (-31.0, 20.0, -220.0),
        ] {
            let west = stand(Kind::German, latitude, Side::TubeWest, -15.0, dec, 0.0);
            let east = stand(Kind::German, latitude, Side::TubeEast, 15.0, dec, 0.0);
            assert_eq!(swing_deg(&west, &east), (-150.0, way), "{latitude} {dec}");
            assert_eq!(swing_deg(&east, &west), (150.0, -way), "{latitude} {dec}");
        }
    }

    #[test]
    fn a_fork_without_limits_goes_the_short_way_round() {
        let fork = |hour| stand(Kind::Fork, 50.0, Side::Single, hour, 80.0, 0.0);
        assert_eq!(swing_deg(&fork(170.0), &fork(-170.0)), (20.0, 0.0));
    }
}
