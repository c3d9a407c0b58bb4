//! The Earth's place and motion (IAU SOFA `epv00`: VSOP2000 fitted to DE405), in au and au/day, in the
//! axes of the ICRS.

use crate::sky::vector::{Vector, length_and_direction, plus};
use crate::time::Tt;

/// Place and velocity, au and au/day.
pub type Motion = [Vector; 2];

/// The Earth seen from the Sun and from the barycentre of the solar system.
#[derive(Clone, Copy, Debug)]
pub struct Earth {
    /// From the Sun.
    pub heliocentric: Motion,
    /// From the barycentre.
    pub barycentric: Motion,
}

impl Earth {
    /// At an instant.
    ///
    /// The model holds for a century on either side of J2000. Beyond (the year 2100) the Earth is
    /// put where it was a sidereal year before: the Sun is then out by some 10".
    #[must_use]
    pub fn at(tt: Tt) -> Self {
        /// Days of a sidereal year.
        const SIDEREAL_YEAR_D: f64 = 365.256_363;
        sofars::eph::epv00(tt.0, tt.1)
            .or_else(|| sofars::eph::epv00(tt.0, tt.1 - SIDEREAL_YEAR_D))
            .map_or(
                Self {
                    heliocentric: [[0.0; 3]; 2],
                    barycentric: [[0.0; 3]; 2],
                },
                |(heliocentric, barycentric)| Self {
                    heliocentric,
                    barycentric,
                },
            )
    }

    /// So many days later, less than about one: the path curved by the Sun alone. In a day this
    /// leaves the true path by 1e-6 au.
    #[must_use]
    pub fn later(&self, days: f64) -> Self {
        /// The Sun's attraction, au^3/day^2: Gauss's constant squared.
        const SUN: f64 = 0.017_202_098_95 * 0.017_202_098_95;
        let (distance, from_sun) = length_and_direction(&self.heliocentric[0]);
        let pull = -SUN / (distance * distance);
        let moved = |[place, velocity]: &Motion| {
            let straight = plus(place, days, velocity);
            [
                plus(&straight, 0.5 * days * days * pull, &from_sun),
                plus(velocity, days * pull, &from_sun),
            ]
        };
        Self {
            heliocentric: moved(&self.heliocentric),
            barycentric: moved(&self.barycentric),
        }
    }

    /// The Sun's place from the barycentre, so many days later.
    #[must_use]
    pub fn sun(&self, days: f64) -> Vector {
        let place = plus(&self.barycentric[0], -1.0, &self.heliocentric[0]);
        let velocity = plus(&self.barycentric[1], -1.0, &self.heliocentric[1]);
        plus(&place, days, &velocity)
    }
}
