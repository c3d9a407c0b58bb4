//! Sun, Moon and planets: where they are in space.
//!
//! Sun and Earth by `epv00`, Moon by `moon98` (Meeus's abridged ELP 2000), planets by `plan94` (Simon
//! and others 1994), all of IAU SOFA: on the sky within a few seconds of arc for Sun and Moon, within
//! a minute or so for the outer planets, far below what a circle shows. Places in au, in the axes of the ICRS.

use crate::angle::Angle;
use crate::sky::earth::Earth;
use crate::sky::vector::{Vector, plus};
use crate::time::Tt;

/// Sun, Moon or planet.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Body {
    /// The Sun. Never to be looked at.
    Sun,
    /// The Moon.
    Moon,
    /// Mercury.
    Mercury,
    /// Venus.
    Venus,
    /// Mars.
    Mars,
    /// Jupiter.
    Jupiter,
    /// Saturn.
    Saturn,
    /// Uranus.
    Uranus,
    /// Neptune.
    Neptune,
}

impl Body {
    /// All of them, from the Sun outward, the Moon second.
    pub const ALL: [Self; 9] = [
        Self::Sun,
        Self::Moon,
        Self::Mercury,
        Self::Venus,
        Self::Mars,
        Self::Jupiter,
        Self::Saturn,
        Self::Uranus,
        Self::Neptune,
    ];

    /// Its English name.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Self::Sun => "Sun",
            Self::Moon => "Moon",
            Self::Mercury => "Mercury",
            Self::Venus => "Venus",
            Self::Mars => "Mars",
            Self::Jupiter => "Jupiter",
            Self::Saturn => "Saturn",
            Self::Uranus => "Uranus",
            Self::Neptune => "Neptune",
        }
    }

    /// The body of that name, in any case of letters.
    #[must_use]
    pub fn named(name: &str) -> Option<Self> {
        Self::ALL
            .into_iter()
            .find(|body| body.name().eq_ignore_ascii_case(name.trim()))
    }

    /// Its number in `plan94`, if it is a planet.
    const fn planet(self) -> Option<i32> {
        match self {
            Self::Sun | Self::Moon => None,
            Self::Mercury => Some(1),
            Self::Venus => Some(2),
            Self::Mars => Some(4),
            Self::Jupiter => Some(5),
            Self::Saturn => Some(6),
            Self::Uranus => Some(7),
            Self::Neptune => Some(8),
        }
    }

    /// True for what lies behind or beside the Sun's field of gravity often enough to matter.
    pub(crate) const fn is_deflected(self) -> bool {
        self.planet().is_some()
    }

    /// Half the angle its disc spans at a distance, for the Sun and the Moon.
    #[must_use]
    pub fn semidiameter(self, distance_au: f64) -> Option<Angle> {
        /// IAU 2015 Resolution B3, and the IAU's mean radius of the Moon (2015 report on cartographic coordinates).
        const SUN_KM: f64 = 695_700.0;
        const MOON_KM: f64 = 1737.4;
        const KM_PER_AU: f64 = sofars::consts::DAU / 1000.0;
        let radius = match self {
            Self::Sun => SUN_KM,
            Self::Moon => MOON_KM,
            _ => return None,
        };
        Some(Angle::from_radians(
            (radius / KM_PER_AU / distance_au).clamp(0.0, 1.0).asin(),
        ))
    }

    /// Its place from the barycentre of the solar system, so many days after an instant at which
    /// the Earth is as given.
    pub(crate) fn barycentric(self, earth: &Earth, tt: Tt, days: f64) -> Vector {
        match (self, self.planet()) {
            (Self::Moon, _) => {
                let from_earth = sofars::eph::moon98(tt.0, tt.1 + days)[0];
                plus(&earth.later(days).barycentric[0], 1.0, &from_earth)
            }
            (_, Some(number)) => {
                // the number is one of the model's, so that there is always an answer
                let from_sun = sofars::eph::plan94(tt.0, tt.1 + days, number)
                    .map_or([0.0; 3], |(motion, _)| motion[0]);
                plus(&earth.sun(days), 1.0, &from_sun)
            }
            (_, None) => earth.sun(days),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_body_is_found_by_its_name() {
        for body in Body::ALL {
            assert_eq!(Body::named(&body.name().to_lowercase()), Some(body));
        }
        assert_eq!(Body::named("Pluto"), None);
    }

    #[test]
    fn sun_and_moon_are_half_a_degree_wide() {
        let sun = Body::Sun.semidiameter(1.0).unwrap();
        assert!((sun.arcminutes() - 16.0).abs() < 0.1);
        let moon = Body::Moon.semidiameter(384_400.0 / 149_597_870.7).unwrap();
        assert!((moon.arcminutes() - 15.5).abs() < 0.1);
        assert_eq!(Body::Mars.semidiameter(1.0), None);
    }
}
