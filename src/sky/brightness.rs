//! How bright a minor planet or a comet is, by its distances from Sun and observer.
//!
//! Minor planets by the H, G system (E. Bowell and others 1989, *Asteroids II*, 524; adopted by the IAU in
//! 1985; constants from memory), comets by H + 5 log Δ + 2.5 n log r, the form of the published elements.
//! A comet may be two magnitudes from it.

use crate::angle::Angle;

/// What the magnitude follows from.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub enum Brightness {
    /// Not stated.
    #[default]
    Unknown,
    /// A minor planet's.
    MinorPlanet {
        /// V at one au from Sun and observer, fully lit.
        absolute: f64,
        /// The slope parameter G, by which it fades with the phase.
        slope: f64,
    },
    /// A comet's, of the whole head.
    Comet {
        /// Total magnitude at one au from Sun and observer.
        absolute: f64,
        /// The power n of the distance from the Sun.
        power: f64,
    },
}

impl Brightness {
    /// The magnitude from these distances in au, the body lit at this angle between Sun and observer.
    #[must_use]
    pub fn magnitude(self, from_sun_au: f64, from_observer_au: f64, phase: Angle) -> Option<f64> {
        match self {
            Self::Unknown => None,
            Self::MinorPlanet { absolute, slope } => {
                let half = (phase / 2.0).tan();
                let lit = |a: f64, b: f64| (-a * half.powf(b)).exp();
                let share = (1.0 - slope) * lit(3.33, 0.63) + slope * lit(1.87, 1.22);
                Some(
                    absolute + 5.0 * (from_sun_au * from_observer_au).log10() - 2.5 * share.log10(),
                )
            }
            Self::Comet { absolute, power } => {
                Some(absolute + 5.0 * from_observer_au.log10() + 2.5 * power * from_sun_au.log10())
            }
        }
        .filter(|magnitude| magnitude.is_finite())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn at_one_au_and_fully_lit_it_is_the_absolute_magnitude() {
        let planet = Brightness::MinorPlanet {
            absolute: 3.4,
            slope: 0.15,
        };
        assert!((planet.magnitude(1.0, 1.0, Angle::ZERO).unwrap() - 3.4).abs() < 1e-12);
        let comet = Brightness::Comet {
            absolute: -2.0,
            power: 4.0,
        };
        assert!(
            (comet
                .magnitude(1.0, 1.0, Angle::from_degrees(60.0))
                .unwrap()
                + 2.0)
                .abs()
                < 1e-12
        );
        assert_eq!(Brightness::Unknown.magnitude(1.0, 1.0, Angle::ZERO), None);
    }

    #[test]
    fn it_fades_with_distance_and_phase() {
        let planet = Brightness::MinorPlanet {
            absolute: 3.4,
            slope: 0.15,
        };
        let at = |sun, observer, degrees| {
            planet
                .magnitude(sun, observer, Angle::from_degrees(degrees))
                .unwrap()
        };
        assert!((at(10.0, 1.0, 0.0) - 8.4).abs() < 1e-12);
        assert!(at(2.8, 2.0, 20.0) > at(2.8, 2.0, 5.0));
        let comet = Brightness::Comet {
            absolute: 8.0,
            power: 4.0,
        };
        let m = comet.magnitude(10.0, 1.0, Angle::ZERO).unwrap();
        assert!((m - 18.0).abs() < 1e-12);
    }
}
