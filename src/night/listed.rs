//! An object of the list as the journal keeps it: its name, and a place that needs no catalogue.
//!
//! Right ascension and declination in degrees at the equinox named; proper motion in milliseconds of
//! arc a year, that in right ascension measured on the sky (times the cosine of the declination).

use serde::{Deserialize, Serialize};

use crate::angle::{Angle, Declination, RightAscension};
use crate::catalog::{Constellation, Kind, Origin, Target};
use crate::sky::{Body, Brightness, CataloguePlace, Orbit, Source};
use crate::time::Tt;

/// An object of a list.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct ListedTarget {
    /// The name it goes by.
    pub name: String,
    /// Where it is.
    pub place: ListedPlace,
    /// Other names, the usual ones first.
    #[serde(default)]
    pub also: Vec<String>,
    /// What it is, in words: "open cluster".
    #[serde(default)]
    pub kind: Option<String>,
    /// The catalogue it was found in.
    #[serde(default)]
    pub catalogue: Option<String>,
    /// The constellation's three letters.
    #[serde(default)]
    pub constellation: Option<String>,
    /// Visual magnitude.
    #[serde(default)]
    pub magnitude: Option<f64>,
    /// Greatest and least extent, in minutes of arc.
    #[serde(default)]
    pub size_arcmin: Option<[f64; 2]>,
    /// The observer's note in the list.
    #[serde(default)]
    pub note: String,
}

/// Where an object is.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(tag = "is", rename_all = "kebab-case")]
pub enum ListedPlace {
    /// A place among the stars.
    Fixed {
        /// Right ascension.
        ra_deg: f64,
        /// Declination, positive north.
        dec_deg: f64,
        /// The equinox: "ICRS", "J2000", "B1950", "J2026.9", "date".
        equinox: String,
        /// The Julian year of the place.
        epoch: f64,
        /// Proper motion in right ascension, on the sky, milliseconds of arc a year.
        #[serde(default)]
        pm_ra_mas: f64,
        /// Proper motion in declination, milliseconds of arc a year.
        #[serde(default)]
        pm_dec_mas: f64,
        /// Parallax, in milliseconds of arc.
        #[serde(default)]
        parallax_mas: f64,
        /// Velocity away from the Sun.
        #[serde(default)]
        radial_velocity_km_s: f64,
    },
    /// The Sun, the Moon or a planet.
    Body {
        /// Its name.
        body: String,
    },
    /// A minor planet or a comet, by the elements of its orbit about the Sun, on the ecliptic of J2000.0.
    Orbit {
        /// Least distance from the Sun, in au.
        perihelion_distance_au: f64,
        /// Eccentricity.
        eccentricity: f64,
        /// Inclination to the ecliptic.
        inclination_deg: f64,
        /// Longitude of the ascending node.
        node_deg: f64,
        /// Argument of perihelion.
        argument_of_perihelion_deg: f64,
        /// Julian date of the passage of perihelion, TT.
        perihelion_jd_tt: f64,
        /// Julian date for which the elements hold, TT.
        #[serde(default)]
        epoch_jd_tt: Option<f64>,
        /// Absolute magnitude, and the slope parameter G of a minor planet.
        #[serde(default)]
        h_g: Option<[f64; 2]>,
        /// Absolute total magnitude of a comet, and the power of its distance from the Sun.
        #[serde(default)]
        h_n: Option<[f64; 2]>,
    },
    /// A name no catalogue knew: kept in the list, never dialled.
    Unknown,
}

impl ListedTarget {
    /// A name no catalogue knew.
    #[must_use]
    pub fn unknown(name: &str, note: &str) -> Self {
        Self {
            name: name.to_owned(),
            place: ListedPlace::Unknown,
            also: Vec::new(),
            kind: None,
            catalogue: None,
            constellation: None,
            magnitude: None,
            size_arcmin: None,
            note: note.to_owned(),
        }
    }

    /// The target to dial; nothing if its place is not known, or stated in words of a newer program.
    #[must_use]
    pub fn target(&self) -> Option<Target> {
        let kind = self.kind.as_deref().and_then(|kind| kind.parse().ok());
        let constellation = self.constellation.as_deref();
        Some(Target {
            name: self.name.clone(),
            also: self.also.clone(),
            kind: kind.unwrap_or(Kind::Other),
            source: self.place.source()?,
            magnitude: self.magnitude,
            size_arcmin: self.size_arcmin.map(|[length, width]| (length, width)),
            constellation: constellation.and_then(Constellation::abbreviated),
            catalogue: origin(self.catalogue.as_deref()),
            note: self.note.clone(),
        })
    }
}

/// The catalogue of that name; a list, as the journal is one, if it is not known.
fn origin(name: Option<&str>) -> Origin {
    let known = [
        Origin::Stars,
        Origin::Messier,
        Origin::Ngc,
        Origin::SolarSystem,
        Origin::Orbits,
        Origin::Given,
    ];
    let named = known.into_iter().find(|origin| Some(origin.name()) == name);
    named.unwrap_or(Origin::List)
}

impl From<&Target> for ListedTarget {
    fn from(target: &Target) -> Self {
        Self {
            name: target.name.clone(),
            place: ListedPlace::from(&target.source),
            also: target.also.clone(),
            kind: Some(target.kind.words().to_owned()),
            catalogue: Some(target.catalogue.name().to_owned()),
            constellation: target.constellation.map(|c| c.abbreviation.to_owned()),
            magnitude: target.magnitude,
            size_arcmin: target.size_arcmin.map(|(length, width)| [length, width]),
            note: target.note.clone(),
        }
    }
}

impl ListedPlace {
    /// Where the place comes from; nothing if it is not known.
    #[must_use]
    pub fn source(&self) -> Option<Source> {
        match self {
            Self::Fixed {
                ra_deg,
                dec_deg,
                equinox,
                epoch,
                pm_ra_mas,
                pm_dec_mas,
                parallax_mas,
                radial_velocity_km_s,
            } => Some(Source::Catalogue(CataloguePlace {
                right_ascension: RightAscension::from_degrees(*ra_deg),
                declination: Declination::from_degrees(*dec_deg),
                equinox: equinox.parse().ok()?,
                epoch: *epoch,
                pm_ra_mas: *pm_ra_mas,
                pm_dec_mas: *pm_dec_mas,
                parallax_mas: *parallax_mas,
                radial_velocity_km_s: *radial_velocity_km_s,
            })),
            Self::Body { body } => Body::named(body).map(Source::Body),
            Self::Orbit {
                perihelion_distance_au,
                eccentricity,
                inclination_deg,
                node_deg,
                argument_of_perihelion_deg,
                perihelion_jd_tt,
                epoch_jd_tt,
                h_g,
                h_n,
            } => Some(Source::Orbit(Orbit {
                perihelion_distance_au: *perihelion_distance_au,
                eccentricity: *eccentricity,
                inclination: Angle::from_degrees(*inclination_deg),
                node: Angle::from_degrees(*node_deg),
                argument_of_perihelion: Angle::from_degrees(*argument_of_perihelion_deg),
                perihelion: Tt::at_julian_day(*perihelion_jd_tt),
                epoch: epoch_jd_tt.map(Tt::at_julian_day),
                brightness: match (*h_g, *h_n) {
                    (Some([absolute, slope]), _) => Brightness::MinorPlanet { absolute, slope },
                    (None, Some([absolute, power])) => Brightness::Comet { absolute, power },
                    (None, None) => Brightness::Unknown,
                },
            })),
            Self::Unknown => None,
        }
    }
}

impl From<&Source> for ListedPlace {
    fn from(source: &Source) -> Self {
        match source {
            Source::Catalogue(place) => Self::Fixed {
                ra_deg: place.right_ascension.degrees(),
                dec_deg: place.declination.degrees(),
                equinox: place.equinox.to_string(),
                epoch: place.epoch,
                pm_ra_mas: place.pm_ra_mas,
                pm_dec_mas: place.pm_dec_mas,
                parallax_mas: place.parallax_mas,
                radial_velocity_km_s: place.radial_velocity_km_s,
            },
            Source::Body(body) => Self::Body {
                body: body.name().to_owned(),
            },
            Source::Orbit(orbit) => Self::Orbit {
                perihelion_distance_au: orbit.perihelion_distance_au,
                eccentricity: orbit.eccentricity,
                inclination_deg: orbit.inclination.degrees(),
                node_deg: orbit.node.degrees(),
                argument_of_perihelion_deg: orbit.argument_of_perihelion.degrees(),
                perihelion_jd_tt: orbit.perihelion.julian_day(),
                epoch_jd_tt: orbit.epoch.map(Tt::julian_day),
                h_g: match orbit.brightness {
                    Brightness::MinorPlanet { absolute, slope } => Some([absolute, slope]),
                    _ => None,
                },
                h_n: match orbit.brightness {
                    Brightness::Comet { absolute, power } => Some([absolute, power]),
                    _ => None,
                },
            },
        }
    }
}

#[cfg(test)]
mod tests {
    use crate::catalog::Catalogue;

    use super::*;

    /// Radians to degrees and back, in degrees.
    const ROUNDING_DEG: f64 = 1e-12;

    #[test]
    fn a_target_comes_back_from_the_journal_as_it_was() {
        let catalogue = Catalogue::builtin();
        for name in [
            "M 37",
            "Vega",
            "NGC 457",
            "Moon",
            "05:52:18.3 +32:33:11 @J2026.9",
        ] {
            let target = catalogue.resolve(name).unwrap();
            let listed = ListedTarget::from(&target);
            let text = serde_json::to_string(&listed).unwrap();
            let back: ListedTarget = serde_json::from_str(&text).unwrap();
            let back = back.target().unwrap();
            if let (Source::Catalogue(was), Source::Catalogue(is)) = (target.source, back.source) {
                let off = was.right_ascension.degrees() - is.right_ascension.degrees();
                assert!(off.abs() < ROUNDING_DEG);
                let off = was.declination.degrees() - is.declination.degrees();
                assert!(off.abs() < ROUNDING_DEG);
                let (right_ascension, declination) = (was.right_ascension, was.declination);
                let is = CataloguePlace {
                    right_ascension,
                    declination,
                    ..is
                };
                assert_eq!(is, was, "{name}");
                let source = target.source;
                assert_eq!(Target { source, ..back }, target, "{name}");
            } else {
                assert_eq!(back, target, "{name}");
            }
        }
    }

    #[test]
    fn a_body_on_an_orbit_comes_back_from_the_journal_with_its_elements() {
        /// A Julian date in one number, in days.
        const ROUNDING_D: f64 = 1e-9;
        let lines = include_str!("../../tests/reference/orbit_elements.txt");
        let (targets, faults) = crate::catalog::orbit_line::read_all(lines);
        assert_eq!((targets.len(), faults.len()), (4, 0));
        for target in targets {
            let text = serde_json::to_string(&ListedTarget::from(&target)).unwrap();
            let back: ListedTarget = serde_json::from_str(&text).unwrap();
            let back = back.target().unwrap();
            let (Source::Orbit(was), Source::Orbit(is)) = (target.source, back.source) else {
                panic!("{text}");
            };
            for (was, is) in [
                (was.inclination, is.inclination),
                (was.node, is.node),
                (was.argument_of_perihelion, is.argument_of_perihelion),
            ] {
                assert!((was - is).abs().degrees() < ROUNDING_DEG, "{text}");
            }
            assert!(is.perihelion.days_since(was.perihelion).abs() < ROUNDING_D);
            assert_eq!(is.epoch.map(Tt::julian_day), was.epoch.map(Tt::julian_day));
            assert_eq!(is.brightness, was.brightness);
            let shape = |orbit: &Orbit| (orbit.perihelion_distance_au, orbit.eccentricity);
            assert_eq!(shape(&is), shape(&was));
            let source = target.source;
            assert_eq!(Target { source, ..back }, target);
        }
    }

    #[test]
    fn what_no_catalogue_knew_is_never_dialled() {
        assert_eq!(ListedTarget::unknown("M 370", "typing slip").target(), None);
    }
}
