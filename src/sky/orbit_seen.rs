//! A minor planet or comet as it is seen at one moment: place, distances, magnitude.
//!
//! The chain is that of the planets: light time, aberration, the site's place on the Earth. The bending of its light by the
//! Sun is left out (0.5" at 1° from the Sun).

use crate::angle::Angle;
use crate::sky::moment::Moment;
use crate::sky::orbit::Orbit;
use crate::sky::place::Apparent;
use crate::sky::vector::{Vector, length_and_direction, plus};

impl Moment {
    /// The apparent place of a body on an orbit about the Sun.
    #[must_use]
    pub fn apparent_orbit(&self, orbit: &Orbit) -> Apparent {
        self.of_date(&length_and_direction(&self.path_to_orbit(orbit)).1)
    }

    /// How far a body on an orbit is from the observer, in au.
    #[must_use]
    pub fn orbit_distance_au(&self, orbit: &Orbit) -> f64 {
        length_and_direction(&self.path_to_orbit(orbit)).0
    }

    /// The magnitude of a body on an orbit now; nothing where the elements do not say how bright it is.
    #[must_use]
    pub fn orbit_magnitude(&self, orbit: &Orbit) -> Option<f64> {
        let path = self.path_to_orbit(orbit);
        let (from_observer, seen) = length_and_direction(&path);
        let to_observer = self.path_of_light(|days| self.earth().sun(days));
        let (from_sun, lit) = length_and_direction(&plus(&path, -1.0, &to_observer));
        let phase = Angle::from_radians(sofars::vm::sepp(&seen, &lit));
        orbit.brightness.magnitude(from_sun, from_observer, phase)
    }

    /// From the observer now to where the body was when the light left it, in au.
    fn path_to_orbit(&self, orbit: &Orbit) -> Vector {
        self.path_of_light(|days| {
            let from_sun = orbit.heliocentric(self.tt().plus_days(days));
            plus(&self.earth().sun(days), 1.0, &from_sun)
        })
    }
}
