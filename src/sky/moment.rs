//! The sky at one instant for one observer.
//!
//! Everything that does not depend on the target is worked out once: precession and nutation (IAU
//! 2006/2000A), sidereal time, the Earth's place and motion, the site's place and motion. The chain
//! for a target is SOFA's: space motion and parallax, light bent by the Sun, aberration, equator of
//! date, hour angle, refraction. Polar motion is taken for nothing (at most 0.3").

use sofars::astro::{IauAstrom, ab, apcs, ld, ldsun, pvtob};

use crate::angle::{Altitude, Angle, Declination, HourAngle, RightAscension};
use crate::sky::body::Body;
use crate::sky::catalogue_place::{CataloguePlace, Star};
use crate::sky::earth::Earth;
use crate::sky::observer::Observer;
use crate::sky::place::{Apparent, Observed, Source};
use crate::sky::refraction;
use crate::sky::vector::{
    Matrix, Vector, equatorial, horizontal, length_and_direction, plus, spherical, turned,
};
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

/// What changes little in a day and takes long to work out.
#[derive(Clone, Copy, Debug)]
struct Season {
    /// When it was worked out.
    tt: Tt,
    /// From the ICRS to the true equator and equinox of date.
    equator: Matrix,
    earth: Earth,
}

impl Season {
    fn at(tt: Tt) -> Self {
        Self {
            tt,
            equator: sofars::pnp::pnm06a(tt.0, tt.1),
            earth: Earth::at(tt),
        }
    }

    /// Days from when it was worked out to an instant.
    fn age(&self, tt: Tt) -> f64 {
        (tt.0 - self.tt.0) + (tt.1 - self.tt.1)
    }
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
        /// Light covers one au in this many days.
        const DAYS_PER_AU: f64 = sofars::consts::AULT / sofars::consts::DAYSEC;
        let mut path = [0.0; 3];
        let mut light_days = 0.0;
        // each round is nearer by the body's speed over that of light, 2e-4 at most
        for _ in 0..3 {
            let place = body.barycentric(&self.earth, self.tt, -light_days);
            path = plus(&place, -1.0, &self.astrometry.eb);
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
    fn of_date(&self, natural: &Vector) -> Apparent {
        let sky = &self.astrometry;
        let proper = ab(natural, &sky.v, sky.em, sky.bm1);
        let (ra, dec) = spherical(&turned(&self.season.equator, &proper));
        self.at_right_ascension(RightAscension::new(ra), Declination::new(dec))
    }

    fn at_right_ascension(&self, ra: RightAscension, dec: Declination) -> Apparent {
        Apparent {
            hour_angle: HourAngle::new(self.apparent_sidereal.angle() - ra.angle()),
            right_ascension: ra,
            declination: dec,
        }
    }

    /// The observed place: the apparent one lifted by refraction.
    #[must_use]
    pub fn observed(&self, apparent: &Apparent) -> Observed {
        let latitude = self.observer.latitude;
        let (azimuth, airless) = horizontal(apparent.hour_angle, apparent.declination, latitude);
        let refraction = refraction::at_true(airless, self.observer.air);
        let altitude = Altitude::new(airless.angle() + refraction);
        let (hour_angle, declination) = equatorial(azimuth, altitude, latitude);
        Observed {
            hour_angle,
            declination,
            azimuth,
            altitude,
            refraction,
        }
    }

    /// The observed place at an hour angle and declination the tube points to.
    #[must_use]
    pub fn observed_at(&self, hour_angle: HourAngle, declination: Declination) -> Observed {
        let (azimuth, altitude) = horizontal(hour_angle, declination, self.observer.latitude);
        Observed {
            hour_angle,
            declination,
            azimuth,
            altitude,
            refraction: refraction::at_observed(altitude, self.observer.air),
        }
    }

    /// The apparent place of what is seen at an observed place: the inverse of [`Self::observed`].
    #[must_use]
    pub fn airless(&self, observed: &Observed) -> Apparent {
        let airless = Altitude::new(observed.altitude.angle() - observed.refraction);
        let (hour_angle, declination) =
            equatorial(observed.azimuth, airless, self.observer.latitude);
        Apparent {
            hour_angle,
            right_ascension: RightAscension::new(
                self.apparent_sidereal.angle() - hour_angle.angle(),
            ),
            declination,
        }
    }

    /// Altitude of an apparent place, without air.
    #[must_use]
    pub fn airless_altitude(&self, apparent: &Apparent) -> Altitude {
        horizontal(
            apparent.hour_angle,
            apparent.declination,
            self.observer.latitude,
        )
        .1
    }

    /// The Sun's observed place.
    #[must_use]
    pub fn sun(&self) -> Observed {
        self.observed(&self.apparent_body(Body::Sun))
    }

    /// The Moon's observed place.
    #[must_use]
    pub fn moon(&self) -> Observed {
        self.observed(&self.apparent_body(Body::Moon))
    }

    /// True while the Sun's upper limb is above the level horizon: its centre, without air, higher
    /// than its semidiameter and the 34' of horizontal refraction below it (the almanacs' sunrise).
    /// That refraction is allowed for in any air, also where refraction is switched off.
    #[must_use]
    pub fn sun_is_up(&self) -> bool {
        const HORIZONTAL_REFRACTION: Angle = Angle::from_arcminutes(34.0);
        let semidiameter = Body::Sun
            .semidiameter(self.distance_au(Body::Sun))
            .unwrap_or(Angle::ZERO);
        let centre = self.airless_altitude(&self.apparent_body(Body::Sun));
        (centre.angle() + semidiameter + HORIZONTAL_REFRACTION).radians() > 0.0
    }
}
