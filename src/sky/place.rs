//! The places a target has on the way from the catalogue to the tube, and what a target can be.

use crate::angle::{Altitude, Angle, Azimuth, Declination, HourAngle, RightAscension};
use crate::sky::body::Body;
use crate::sky::catalogue_place::CataloguePlace;
use crate::sky::orbit::Orbit;

/// Where the place of a target comes from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Source {
    /// A catalogue or coordinates as given.
    Catalogue(CataloguePlace),
    /// The motion of a body of the solar system.
    Body(Body),
    /// The elements of an orbit about the Sun.
    Orbit(Orbit),
}

/// A place seen from the site, on the true equator and equinox of date, without air.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Apparent {
    /// Local apparent sidereal time less the right ascension.
    pub hour_angle: HourAngle,
    /// From the true equinox of date.
    pub right_ascension: RightAscension,
    /// From the true equator of date.
    pub declination: Declination,
}

/// A place lifted by refraction: where the tube must point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Observed {
    /// Refraction included, west positive.
    pub hour_angle: HourAngle,
    /// Refraction included.
    pub declination: Declination,
    /// From north through east; refraction does not change it.
    pub azimuth: Azimuth,
    /// Above the level horizon, refraction included.
    pub altitude: Altitude,
    /// How far refraction has lifted the place.
    pub refraction: Angle,
}

impl Apparent {
    /// How far it is from another place on the sky.
    #[must_use]
    pub fn separation(&self, other: &Self) -> Angle {
        separation(
            (self.right_ascension.angle(), self.declination),
            (other.right_ascension.angle(), other.declination),
        )
    }
}

impl Observed {
    /// The position angle in which another place is seen from here, from north through east, by spherical
    /// trigonometry.
    #[must_use]
    pub fn position_angle_of(&self, other: &Self) -> Angle {
        let (here, there) = (self.declination.angle(), other.declination.angle());
        // hour angles run westward
        let east = self.hour_angle.angle() - other.hour_angle.angle();
        Angle::from_radians(f64::atan2(
            there.cos() * east.sin(),
            here.cos() * there.sin() - here.sin() * there.cos() * east.cos(),
        ))
    }

    /// How far it is from another place on the sky.
    #[must_use]
    pub fn separation(&self, other: &Self) -> Angle {
        separation(
            (self.hour_angle.angle(), self.declination),
            (other.hour_angle.angle(), other.declination),
        )
    }
}

/// The angle on the sky between two places, each an angle along the equator (hour angle or right
/// ascension, the same for both) and a declination; in [0°, 180°], good at any distance.
#[must_use]
pub fn separation(a: (Angle, Declination), b: (Angle, Declination)) -> Angle {
    Angle::from_radians(sofars::vm::seps(
        a.0.radians(),
        a.1.angle().radians(),
        b.0.radians(),
        b.1.angle().radians(),
    ))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn opposite_places_are_half_a_turn_apart_and_a_place_is_nowhere_from_itself() {
        let place = |along, dec| (Angle::from_degrees(along), Declination::from_degrees(dec));
        let apart = separation(place(10.0, 20.0), place(190.0, -20.0));
        assert!((apart.degrees() - 180.0).abs() < 1e-9);
        assert!(separation(place(10.0, 90.0), place(77.0, 90.0)).degrees() < 1e-9);
        assert!(separation(place(-1.0, 0.0), place(359.0, 0.0)).degrees() < 1e-9);
    }
}
