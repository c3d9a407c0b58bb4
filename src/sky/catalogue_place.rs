//! A catalogue place: right ascension and declination at an equinox, where the target was at an
//! epoch, and how it moves. Brought to the axes of the ICRS, whatever the equinox.

use std::f64::consts::FRAC_PI_2;

use sofars::cal::{epb, epj2jd};

use crate::angle::{Angle, Declination, RightAscension};
use crate::sky::fk4;
use crate::sky::vector::{Matrix, Vector, plus, spherical, turned, turned_back, unit};

/// The equator and equinox a place is referred to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Equinox {
    /// The International Celestial Reference System, the axes of today's catalogues.
    Icrs,
    /// Mean equator and equinox of J2000.0, those of the FK5; 0.02" from the ICRS.
    J2000,
    /// Mean equator and equinox of B1950.0, those of the FK4, E-terms of aberration included.
    B1950,
    /// Mean equator and equinox of a Julian year (IAU 2006 precession).
    Julian(f64),
    /// Mean equator and equinox of a Besselian year: before 1984 in the manner of the FK4, with
    /// Newcomb's precession and E-terms; from 1984 on by IAU 2006 precession.
    Besselian(f64),
    /// True equator and equinox of date: an apparent place, seen from the site, used as it is.
    OfDate,
}

/// A place as a catalogue or an observer gives it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CataloguePlace {
    /// From the equinox.
    pub right_ascension: RightAscension,
    /// From the equator.
    pub declination: Declination,
    /// Which equator and equinox.
    pub equinox: Equinox,
    /// The Julian year in which the target stood there.
    pub epoch: f64,
    /// Proper motion eastward on the sky, cos(declination) included, in mas a year.
    pub pm_ra_mas: f64,
    /// Proper motion northward, in mas a year.
    pub pm_dec_mas: f64,
    /// Parallax in mas; zero if unknown.
    pub parallax_mas: f64,
    /// Velocity away from the Sun in km/s; zero if unknown.
    pub radial_velocity_km_s: f64,
}

/// A star in the axes of the ICRS.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Star {
    /// Direction from the barycentre at the epoch.
    pub direction: Vector,
    /// Motion of that direction in a Julian year, the change of distance included as a share of
    /// the distance.
    pub motion: Vector,
    /// Julian year.
    pub epoch: f64,
    /// Parallax in radians.
    pub parallax: f64,
}

impl CataloguePlace {
    /// A place in the ICRS at epoch J2000.0 that does not move.
    #[must_use]
    pub const fn icrs(right_ascension: RightAscension, declination: Declination) -> Self {
        Self {
            right_ascension,
            declination,
            equinox: Equinox::Icrs,
            epoch: 2000.0,
            pm_ra_mas: 0.0,
            pm_dec_mas: 0.0,
            parallax_mas: 0.0,
            radial_velocity_km_s: 0.0,
        }
    }

    /// Where the target stands in the ICRS at epoch J2000.0; nothing for a place of date, which is
    /// past that stage.
    #[must_use]
    pub fn at_icrs_j2000(&self) -> Option<(RightAscension, Declination)> {
        let star = self.star()?;
        let (ra, dec) = spherical(&plus(&star.direction, 2000.0 - star.epoch, &star.motion));
        Some((RightAscension::new(ra), Declination::new(dec)))
    }

    /// The star in the axes of the ICRS; nothing for a place of date, which is past that stage.
    pub(crate) fn star(&self) -> Option<Star> {
        match self.equinox {
            Equinox::Icrs => Some(self.moving(&self.direction(), &self.proper_motion())),
            Equinox::J2000 => Some(self.on_julian_equinox(2000.0)),
            Equinox::Julian(year) => Some(self.on_julian_equinox(year)),
            Equinox::B1950 => Some(self.on_fk4_equinox(1950.0)),
            Equinox::Besselian(year) if year < FK4_ENDS => Some(self.on_fk4_equinox(year)),
            Equinox::Besselian(year) => {
                let (day, part) = sofars::cal::epb2jd(year);
                Some(self.on_julian_equinox(sofars::cal::epj(day, part)))
            }
            Equinox::OfDate => None,
        }
    }

    /// Towards the place, in the axes of its equinox.
    fn direction(&self) -> Vector {
        unit(self.right_ascension.angle(), self.declination.angle())
    }

    /// Radians a year across the sky, in the axes of the equinox.
    fn proper_motion(&self) -> Vector {
        let (east, north) = compass(self.right_ascension, self.declination);
        let per_year = |mas: f64| Angle::from_arcseconds(mas / 1000.0).radians();
        plus(
            &east.map(|part| part * per_year(self.pm_ra_mas)),
            per_year(self.pm_dec_mas),
            &north,
        )
    }

    /// With a direction and proper motion already in the axes of the ICRS.
    fn moving(&self, direction: &Vector, proper_motion: &Vector) -> Star {
        /// Kilometres a second in au a Julian year.
        const AU_PER_YEAR: f64 =
            sofars::consts::DAYSEC * sofars::consts::DJY * 1000.0 / sofars::consts::DAU;
        let parallax = Angle::from_arcseconds(self.parallax_mas / 1000.0).radians();
        let receding = AU_PER_YEAR * self.radial_velocity_km_s * parallax;
        Star {
            direction: *direction,
            motion: plus(proper_motion, receding, direction),
            epoch: self.epoch,
            parallax,
        }
    }

    /// From the mean equator and equinox of a Julian year.
    fn on_julian_equinox(&self, year: f64) -> Star {
        let (day, part) = epj2jd(year);
        let of_year: Matrix = sofars::pnp::pmat06(day, part);
        self.moving(
            &turned_back(&of_year, &self.direction()),
            &turned_back(&of_year, &self.proper_motion()),
        )
    }

    /// From the FK4 at the equinox of a Besselian year.
    ///
    /// A target without proper motion is taken to stand still among the galaxies (`fk45z`); one
    /// with it moves as the FK4 says, from its epoch to 1950 in a straight line, and on with `fk425`.
    fn on_fk4_equinox(&self, year: f64) -> Star {
        let to_1950 = fk4::precession(year, 1950.0);
        let freed = fk4::without_e_terms(&self.direction(), year);
        let mut direction = fk4::with_e_terms(&turned(&to_1950, &freed), 1950.0);
        let motion = turned(&to_1950, &self.proper_motion());
        let (day, part) = epj2jd(self.epoch);
        let epoch = epb(day, part);
        let still = self.pm_ra_mas == 0.0 && self.pm_dec_mas == 0.0;
        let fk5 = if still {
            let (ra, dec) = spherical(&direction);
            let (ra, dec) = sofars::star::fk45z(ra.radians(), dec.radians(), epoch);
            Self::at_j2000(*self, (ra, dec), (0.0, 0.0))
        } else {
            direction = plus(&direction, 1950.0 - epoch, &motion);
            let (ra, dec) = spherical(&direction);
            let (right_ascension, declination) = (RightAscension::new(ra), Declination::new(dec));
            let (east, north) = compass(right_ascension, declination);
            // the cosine of 90° is not quite nothing in double precision, nor made so here
            let along = sofars::vm::pdp(&east, &motion) / dec.cos();
            let (ra, dec, pm_ra, pm_dec, _, _) = sofars::star::fk425(
                ra.radians(),
                dec.radians(),
                along,
                sofars::vm::pdp(&north, &motion),
                self.parallax_mas / 1000.0,
                self.radial_velocity_km_s,
            );
            Self::at_j2000(*self, (ra, dec), (pm_ra * dec.cos(), pm_dec))
        };
        fk5.on_julian_equinox(2000.0)
    }

    /// The same target at equinox and epoch J2000.0; radians and radians a year.
    fn at_j2000(self, place: (f64, f64), motion: (f64, f64)) -> Self {
        let mas = |radians: f64| Angle::from_radians(radians).arcseconds() * 1000.0;
        Self {
            right_ascension: RightAscension::new(Angle::from_radians(place.0)),
            declination: Declination::new(Angle::from_radians(
                place.1.clamp(-FRAC_PI_2, FRAC_PI_2),
            )),
            equinox: Equinox::J2000,
            epoch: 2000.0,
            pm_ra_mas: mas(motion.0),
            pm_dec_mas: mas(motion.1),
            ..self
        }
    }
}

/// The year from which the IAU (1976) system replaced the FK4's.
const FK4_ENDS: f64 = 1984.0;

/// Unit vectors to the east and to the north of a place on the sky.
fn compass(right_ascension: RightAscension, declination: Declination) -> (Vector, Vector) {
    let (sin_ra, cos_ra) = right_ascension.angle().radians().sin_cos();
    let (sin_dec, cos_dec) = declination.angle().radians().sin_cos();
    (
        [-sin_ra, cos_ra, 0.0],
        [-cos_ra * sin_dec, -sin_ra * sin_dec, cos_dec],
    )
}
