//! The sky at one instant for one observer.
//!
//! Everything that does not depend on the target is worked out once: precession and nutation (IAU
//! 2006/2000A), sidereal time, the Earth's place and motion, the site's place and motion. The chain
//! for a target is SOFA's: space motion and parallax, light bent by the Sun, aberration, equator of
//! date, hour angle. Polar motion is taken for nothing (at most 0.3").

use sofars::astro::{IauAstrom, ab, apcs, ld, ldsun, pvtob};

use crate::angle::{Angle, Declination, HourAngle, RightAscension};
use crate::sky::body::Body;
use crate::sky::catalogue_place::{CataloguePlace, Star};
use crate::sky::earth::Earth;
use crate::sky::observer::Observer;
use crate::sky::place::{Apparent, Source};
use crate::sky::season::Season;
use crate::sky::vector::{Vector, length_and_direction, plus, spherical, turned};
use crate::time::{SiderealTime, Tt, Utc};

/// The state of the sky at one instant for one observer.
#[derive(Clone, Copy, Debug)]
pub struct Moment {
    observer: Observer,
    utc: Utc,
    tt: Tt,
    season: Season,
    /// The Earth at this instant.
    earth: Earth,
    /// The observer's place and motion.
    astrometry: IauAstrom,
    apparent_sidereal: SiderealTime,
    mean_sidereal: SiderealTime,
}

impl Moment {
    /// The sky at an instant for an observer.
    #[must_use]
    pub fn new(observer: &Observer, utc: Utc) -> Self {
        Self::within(Season::at(utc.tt()), observer, utc)
    }

    /// The sky so many seconds later (earlier, if negative), without working out anew what changes
    /// little: within a day it agrees with a new one to 0.5", at a fiftieth of the cost. Beyond a
    /// day from the last new one, it is a new one.
    #[must_use]
    pub fn later(&self, seconds: f64) -> Self {
        let utc = self.utc.plus_seconds(seconds);
        if self.season.age(utc.tt()).abs() <= 1.0 {
            Self::within(self.season, &self.observer, utc)
        } else {
            Self::new(&self.observer, utc)
        }
    }

    fn within(season: Season, observer: &Observer, utc: Utc) -> Self {
        let (tt, ut1) = (utc.tt(), utc.ut1(observer.dut1));
        let longitude = observer.longitude.angle();
        let apparent = sofars::erst::gst06(ut1.0, ut1.1, tt.0, tt.1, &season.equator);
        let mean = sofars::erst::gmst06(ut1.0, ut1.1, tt.0, tt.1);
        let earth = season.earth.later(season.age(tt));
        // the site about the Earth's centre, first on the equator of date, then in the axes of the ICRS
        let mut site = [[0.0; 3]; 2];
        pvtob(
            longitude.radians(),
            observer.latitude.angle().radians(),
            observer.elevation_m,
            0.0,
            0.0,
            0.0,
            apparent,
            &mut site,
        );
        let mut site_icrs = [[0.0; 3]; 2];
        sofars::vm::trxpv(&season.equator, &site, &mut site_icrs);
        let mut astrometry = IauAstrom::default();
        apcs(
            tt.0,
            tt.1,
            &site_icrs,
            &earth.barycentric,
            &earth.heliocentric[0],
            &mut astrometry,
        );
        Self {
            observer: *observer,
            utc,
            tt,
            season,
            earth,
            astrometry,
            apparent_sidereal: SiderealTime::new(Angle::from_radians(apparent) + longitude),
            mean_sidereal: SiderealTime::new(Angle::from_radians(mean) + longitude),
        }
    }

    /// The instant.
    #[must_use]
    pub const fn utc(&self) -> Utc {
        self.utc
    }

    /// The instant in the time that the planets keep.
    #[must_use]
    pub const fn tt(&self) -> Tt {
        self.tt
    }

    /// The Earth at this instant.
    pub(super) const fn earth(&self) -> &Earth {
        &self.earth
    }

    /// The observer.
    #[must_use]
    pub const fn observer(&self) -> &Observer {
        &self.observer
    }

    /// Local sidereal time from the true equinox.
    #[must_use]
    pub const fn apparent_sidereal(&self) -> SiderealTime {
        self.apparent_sidereal
    }

    /// Local sidereal time from the mean equinox.
    #[must_use]
    pub const fn mean_sidereal(&self) -> SiderealTime {
        self.mean_sidereal
    }

    /// The apparent place of a target.
    #[must_use]
    pub fn apparent(&self, source: &Source) -> Apparent {
        match source {
            Source::Catalogue(place) => self.apparent_catalogue(place),
            Source::Body(body) => self.apparent_body(*body),
            Source::Orbit(orbit) => self.apparent_orbit(orbit),
        }
    }

    fn apparent_catalogue(&self, place: &CataloguePlace) -> Apparent {
        match place.star() {
            Some(star) => self.of_date(&self.natural(&star)),
            None => self.at_right_ascension(place.right_ascension, place.declination),
        }
    }

    /// The apparent place of a body.
    #[must_use]
    pub fn apparent_body(&self, body: Body) -> Apparent {
        let path = self.path_to(body);
        let (_, mut direction) = length_and_direction(&path);
        let sky = &self.astrometry;
        if body.is_deflected() {
            /// How near the Sun's centre the bending of light stops growing, radians squared over two.
            const LIMIT: f64 = 1e-6;
            let sun_to_observer = sky.eh.map(|part| part * sky.em);
            let (_, from_sun) = length_and_direction(&plus(&path, 1.0, &sun_to_observer));
            direction = ld(1.0, direction, from_sun, sky.eh, sky.em, LIMIT);
        }
        self.of_date(&direction)
    }

    /// How far a body is from the observer, in au.
    #[must_use]
    pub fn distance_au(&self, body: Body) -> f64 {
        length_and_direction(&self.path_to(body)).0
    }

    /// The share of a body's disc that the Sun lights as the observer sees it, 0 to 1.
    #[must_use]
    pub fn illuminated(&self, body: Body) -> f64 {
        if body == Body::Sun {
            return 1.0;
        }
        let (_, seen) = length_and_direction(&self.path_to(body));
        let from_sun = plus(&self.path_to(body), -1.0, &self.path_to(Body::Sun));
        let (_, lit) = length_and_direction(&from_sun);
        (0.5 * (1.0 + sofars::vm::pdp(&seen, &lit))).clamp(0.0, 1.0)
    }

    /// From the observer now to the body when the light left it, in au.
    fn path_to(&self, body: Body) -> Vector {
        self.path_of_light(|days| body.barycentric(&self.earth, self.tt, days))
    }

    /// From the observer now to where something was when the light left it, in au; `place` is its way from the
    /// barycentre, so many days from now.
    pub(super) fn path_of_light(&self, place: impl Fn(f64) -> Vector) -> Vector {
        /// Light covers one au in this many days.
        const DAYS_PER_AU: f64 = sofars::consts::AULT / sofars::consts::DAYSEC;
        let mut path = [0.0; 3];
        let mut light_days = 0.0;
        // each round is nearer by the body's speed over that of light, 2e-4 at most
        for _ in 0..3 {
            path = plus(&place(-light_days), -1.0, &self.astrometry.eb);
            light_days = length_and_direction(&path).0 * DAYS_PER_AU;
        }
        path
    }

    /// Direction of a star from the observer, light bent by the Sun, before aberration.
    fn natural(&self, star: &Star) -> Vector {
        /// Light covers one au in this many Julian years.
        const YEARS_PER_AU: f64 =
            sofars::consts::AULT / sofars::consts::DAYSEC / sofars::consts::DJY;
        let sky = &self.astrometry;
        // light from a star reaches the observer before the barycentre if the observer is on that side
        let early = sofars::vm::pdp(&star.direction, &sky.eb) * YEARS_PER_AU;
        let years = sky.pmt - (star.epoch - 2000.0) + early;
        let moved = plus(&star.direction, years, &star.motion);
        let (_, seen) = length_and_direction(&plus(&moved, -star.parallax, &sky.eb));
        ldsun(seen, sky.eh, sky.em)
    }

    /// The apparent place of a direction in the axes of the ICRS before aberration.
    pub(super) fn of_date(&self, natural: &Vector) -> Apparent {
        let sky = &self.astrometry;
        let proper = ab(natural, &sky.v, sky.em, sky.bm1);
        let (ra, dec) = spherical(&turned(&self.season.equator, &proper));
        self.at_right_ascension(RightAscension::new(ra), Declination::new(dec))
    }

    /// With the hour angle that goes with a right ascension now.
    pub(crate) fn at_right_ascension(&self, ra: RightAscension, dec: Declination) -> Apparent {
        Apparent {
            hour_angle: HourAngle::new(self.apparent_sidereal.angle() - ra.angle()),
            right_ascension: ra,
            declination: dec,
        }
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::sky::catalogue_place::Equinox;
    use crate::sky::samples::{any_direction, any_moment, any_utc, at};

    fn any_equinox() -> impl Strategy<Value = Equinox> {
        prop_oneof![
            Just(Equinox::Icrs),
            Just(Equinox::J2000),
            Just(Equinox::B1950),
            Just(Equinox::OfDate),
            (1750.0..2200.0).prop_map(Equinox::Julian),
            (1750.0..2200.0).prop_map(Equinox::Besselian),
        ]
    }

    fn any_star() -> impl Strategy<Value = CataloguePlace> {
        (
            any_direction(),
            any_equinox(),
            1750.0..2200.0,
            (-1e4..1e4, -1e4..1e4),
            prop_oneof![Just(0.0), 0.0..800.0],
            -300.0..300.0,
        )
            .prop_map(
                |((ra, dec), equinox, epoch, motion, parallax, rv)| CataloguePlace {
                    equinox,
                    epoch,
                    pm_ra_mas: motion.0,
                    pm_dec_mas: motion.1,
                    parallax_mas: parallax,
                    radial_velocity_km_s: rv,
                    ..CataloguePlace::icrs(ra, dec)
                },
            )
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(300))]

        #[test]
        fn there_is_a_place_for_every_star_and_body_anywhere_at_any_time(
            moment in any_moment(), star in any_star(),
        ) {
            let bodies = Body::ALL.into_iter().map(Source::Body);
            for source in bodies.chain([Source::Catalogue(star)]) {
                let apparent = moment.apparent(&source);
                let observed = moment.observed(&apparent);
                for angle in [
                    apparent.hour_angle.angle(),
                    apparent.right_ascension.angle(),
                    apparent.declination.angle(),
                    observed.hour_angle.angle(),
                    observed.declination.angle(),
                    observed.azimuth.angle(),
                    observed.altitude.angle(),
                    observed.refraction,
                ] {
                    prop_assert!(angle.is_finite(), "{source:?}");
                }
                let hour = moment.apparent_sidereal().angle() - apparent.right_ascension.angle();
                let off = (hour - apparent.hour_angle.angle()).wrapped_signed();
                prop_assert!(off.abs().arcseconds() < 1e-6);
            }
        }

        #[test]
        fn a_moment_stepped_within_a_day_agrees_with_a_new_one(
            moment in any_moment(), (ra, dec) in any_direction(), seconds in -86_000.0..86_000.0,
        ) {
            /// What nutation, and the pull of all but the Sun on the Earth, do in a day.
            const STEP_ARCSEC: f64 = 0.5;
            let stepped = moment.later(seconds);
            let new = Moment::new(moment.observer(), stepped.utc());
            let star = Source::Catalogue(CataloguePlace::icrs(ra, dec));
            for source in [star, Source::Body(Body::Sun), Source::Body(Body::Moon)] {
                let (a, b) = (stepped.apparent(&source), new.apparent(&source));
                let off = crate::sky::separation(
                    (a.hour_angle.angle(), a.declination),
                    (b.hour_angle.angle(), b.declination),
                );
                prop_assert!(off.arcseconds() < STEP_ARCSEC, "{source:?} {off:?}");
            }
        }

        #[test]
        fn a_place_of_date_is_used_as_it_is(moment in any_moment(), (ra, dec) in any_direction()) {
            let place = CataloguePlace { equinox: Equinox::OfDate, ..CataloguePlace::icrs(ra, dec) };
            let apparent = moment.apparent(&Source::Catalogue(place));
            prop_assert_eq!(apparent.right_ascension, ra);
            prop_assert_eq!(apparent.declination, dec);
        }

        #[test]
        fn the_sun_is_nowhere_far_from_the_ecliptic(utc in any_utc()) {
            let moment = Moment::new(at("2000-01-01T00:00:00Z", 0.0, 0.0).observer(), utc);
            let dec = moment.apparent_body(Body::Sun).declination.degrees();
            prop_assert!(dec.abs() < 23.5);
            prop_assert!((0.98..1.02).contains(&moment.distance_au(Body::Sun)));
        }
    }

    #[test]
    fn a_chain_of_steps_never_grows_stale() {
        let mut moment = at("2026-12-01T12:00:00Z", 54.5, 1000.0);
        for _ in 0..40 {
            moment = moment.later(20_000.0);
        }
        let new = Moment::new(moment.observer(), moment.utc());
        assert!(moment.sun().separation(&new.sun()).arcseconds() < 0.5);
        assert!(moment.season.age(moment.tt).abs() <= 1.0);
    }

    #[test]
    fn beyond_the_earth_models_century_the_sun_keeps_its_way() {
        // the model ends at noon of 2100 January 1: a year shifted there is measured a year before
        const SHIFT_ARCSEC: f64 = 60.0;
        let day = |text: &str| at(text, 0.0, 0.0).apparent_body(Body::Sun);
        let (last, first) = (day("2100-01-01T11:00:00Z"), day("2100-01-01T13:00:00Z"));
        // two hours of the Sun's way at perihelion: 61' a day
        let way = last.separation(&first).arcseconds();
        assert!((way - 61.0 * 60.0 / 12.0).abs() < SHIFT_ARCSEC, "{way}");
    }

    #[test]
    fn the_sun_bends_saturns_light_outward_as_general_relativity_says() {
        // Source: Explanatory Supplement 1992, 3.26: 2GM/(c^2 au) = 0.00407", times cot(half the elongation);
        // Saturn, not at infinity, has a tenth less
        let moment = at("2027-04-07T12:00:00Z", 0.0, 0.0);
        let (_, straight) = length_and_direction(&moment.path_to(Body::Saturn));
        let (straight, bent) = (
            moment.of_date(&straight),
            moment.apparent_body(Body::Saturn),
        );
        let sun = moment.apparent_body(Body::Sun);
        let elongation = sun.separation(&straight);
        let outward = (sun.separation(&bent) - elongation).arcseconds();
        let expected = 0.004_07 / (elongation / 2.0).tan();
        assert!(
            expected > 0.1,
            "Saturn is near the Sun that day: {elongation:?}"
        );
        assert!(
            (outward / expected - 0.9).abs() < 0.05,
            "{outward} for {expected}"
        );
    }

    #[test]
    fn the_moon_is_lit_as_its_phase_says() {
        // Source: new Moon 2026 December 9 00:52 UT and full Moon December 24 01:28 UT (from memory)
        let lit = |text: &str| at(text, 0.0, 0.0).illuminated(Body::Moon);
        assert!(lit("2026-12-09T00:52:00Z") < 0.01);
        assert!(lit("2026-12-24T01:28:00Z") > 0.99);
    }
}
