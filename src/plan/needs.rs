//! What an object needs of the night: how dark it must be, and how far away a Moon that is up.
//!
//! Common practice, no source. By kind:
//!
//! | kind | dark from | from a full Moon |
//! |---|---|---|
//! | stars, double and variable stars, novae, planets, the Moon | the end of civil twilight | at any distance |
//! | clusters, asterisms, planetary nebulae, minor planets, places of no stated kind | the end of nautical twilight | 15° |
//! | galaxies, other nebulae, supernova remnants, star clouds, comets | the end of astronomical twilight | 60° |
//!
//! A Moon partly lit counts by the share of its disc that is: half of it, half the distance. The Sun is never planned: it is
//! below the horizon whenever it is dark enough for anything here, so that nothing near a Sun that is up is ever planned either.

use crate::angle::Angle;
use crate::catalog::Kind;
use crate::sky::Twilight;

/// What an object needs.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Needs {
    /// It must be darker than this.
    pub light: Twilight,
    /// A full Moon that is up must be at least so far away.
    pub from_full_moon: Angle,
}

impl Needs {
    /// What a kind of object needs; nothing if it is never planned.
    #[must_use]
    pub const fn of(kind: Kind) -> Option<Self> {
        let (light, degrees) = match kind {
            Kind::Sun => return None,
            Kind::Star
            | Kind::DoubleStar
            | Kind::VariableStar
            | Kind::Nova
            | Kind::Planet
            | Kind::Moon => (Twilight::Civil, 0.0),
            Kind::StellarAssociation
            | Kind::OpenCluster
            | Kind::GlobularCluster
            | Kind::ClusterWithNebula
            | Kind::Asterism
            | Kind::PlanetaryNebula
            | Kind::MinorPlanet
            | Kind::Place
            | Kind::Other => (Twilight::Nautical, 15.0),
            Kind::StarCloud
            | Kind::Nebula
            | Kind::EmissionNebula
            | Kind::ReflectionNebula
            | Kind::SupernovaRemnant
            | Kind::DarkNebula
            | Kind::Comet
            | Kind::Galaxy
            | Kind::GalaxyPair
            | Kind::GalaxyTriplet
            | Kind::GalaxyGroup => (Twilight::Astronomical, 60.0),
        };
        Some(Self {
            light,
            from_full_moon: Angle::from_degrees(degrees),
        })
    }

    /// How far away a Moon that is up must be, lit to a share of its disc from 0 to 1.
    #[must_use]
    pub fn from_moon(&self, illuminated: f64) -> Angle {
        self.from_full_moon * illuminated
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_galaxy_needs_more_of_the_night_than_a_cluster_and_a_cluster_more_than_a_double() {
        let [double, cluster, galaxy] = [Kind::DoubleStar, Kind::OpenCluster, Kind::Galaxy]
            .map(|kind| Needs::of(kind).unwrap());
        assert!(galaxy.light.altitude() < cluster.light.altitude());
        assert!(cluster.light.altitude() < double.light.altitude());
        assert!(galaxy.from_moon(1.0) > cluster.from_moon(1.0));
        assert_eq!(double.from_moon(1.0), Angle::ZERO);
        assert!((galaxy.from_moon(0.25).degrees() - 15.0).abs() < 1e-9);
    }

    #[test]
    fn only_the_sun_is_never_planned() {
        let never: Vec<&Kind> = Kind::ALL
            .iter()
            .filter(|&&kind| Needs::of(kind).is_none())
            .collect();
        assert_eq!(never, [&Kind::Sun]);
    }
}
