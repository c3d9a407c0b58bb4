//! Turns rows of the reference tables into observers, stars and places, and measures how far off ours are.

use nonius::angle::{Angle, Declination, Latitude, Longitude, RightAscension};
use nonius::sky::{Air, CataloguePlace, Equinox, Moment, Observer, Source, separation};
use nonius::time::{Dut1, Utc};

use crate::table::{Row, rows};

/// The Julian year of the Hipparcos catalogue's places.
const HIPPARCOS_EPOCH: f64 = 1991.25;

/// The sky of a row's instant, for its site, without air.
pub fn moment(row: &Row) -> Moment {
    Moment::new(
        &Observer {
            latitude: Latitude::from_degrees(row.number("latitude_deg")),
            longitude: Longitude::from_degrees(row.number("longitude_deg")),
            elevation_m: row.number("elevation_m"),
            dut1: Dut1::from_seconds(row.number("ut1_minus_utc_s")).unwrap(),
            air: Air::NONE,
        },
        Utc::parse(row.text("utc")).unwrap(),
    )
}

/// An observer at the Earth's centre: one equatorial radius of WGS84 below the equator.
pub fn geocentre() -> Observer {
    Observer {
        latitude: Latitude::default(),
        longitude: Longitude::default(),
        elevation_m: -6_378_137.0,
        dut1: Dut1::default(),
        air: Air::NONE,
    }
}

/// A row's star, of Hipparcos, the New Reduction.
pub fn star(row: &Row) -> CataloguePlace {
    assert_eq!(row.text("epoch"), "J1991.25");
    CataloguePlace {
        right_ascension: RightAscension::from_degrees(row.number("ra_deg")),
        declination: Declination::from_degrees(row.number("dec_deg")),
        equinox: Equinox::Icrs,
        epoch: HIPPARCOS_EPOCH,
        pm_ra_mas: row.number("pm_ra_cosdec_mas"),
        pm_dec_mas: row.number("pm_dec_mas"),
        parallax_mas: row.number("parallax_mas"),
        radial_velocity_km_s: row.number("rv_km_s"),
    }
}

/// The star of a Hipparcos number among those of `places_stars.csv`.
pub fn hipparcos(number: &str) -> CataloguePlace {
    rows("places_stars.csv")
        .iter()
        .find(|row| row.text("hip") == number)
        .map(star)
        .unwrap()
}

/// The UTC of a Julian date in TT, by the leap seconds of the program's own scale.
pub fn utc_of_tt(jd: f64) -> Utc {
    let noon = Utc::parse("2000-01-01T12:00:00Z").unwrap();
    let mut utc = noon.plus_seconds((jd - 2_451_545.0) * 86_400.0);
    // the first guess is out by TT - UTC: the second puts that right
    for _ in 0..2 {
        let years = utc.tt().julian_years_since_j2000();
        utc = utc.plus_seconds(((jd - 2_451_545.0) / 365.25 - years) * 365.25 * 86_400.0);
    }
    utc
}

/// How far ours are from a row's, in seconds of arc.
#[derive(Clone, Copy, Debug, Default)]
pub struct Off {
    /// On the sky, by hour angle and declination.
    pub place: f64,
    /// Hour angle as an angle at the pole.
    pub hour_angle: f64,
    /// Right ascension as an angle at the pole.
    pub right_ascension: f64,
    /// Declination.
    pub declination: f64,
    /// On the sky, by azimuth and altitude.
    pub horizon: f64,
    /// Apparent sidereal time.
    pub sidereal: f64,
}

impl Off {
    /// The larger of each.
    pub fn or_worse(self, other: Self) -> Self {
        Self {
            place: self.place.max(other.place),
            hour_angle: self.hour_angle.max(other.hour_angle),
            right_ascension: self.right_ascension.max(other.right_ascension),
            declination: self.declination.max(other.declination),
            horizon: self.horizon.max(other.horizon),
            sidereal: self.sidereal.max(other.sidereal),
        }
    }
}

/// How far one direction is from another, the shorter way round, in seconds of arc.
pub fn apart(ours: Angle, degrees: f64) -> f64 {
    (ours - Angle::from_degrees(degrees))
        .wrapped_signed()
        .abs()
        .arcseconds()
}

/// How far the place of a target is from a row's topocentric apparent place.
pub fn off(moment: &Moment, source: &Source, row: &Row) -> Off {
    let ours = moment.apparent(source);
    let seen = moment.observed(&ours);
    assert_eq!(seen.refraction, Angle::ZERO);
    let on_the_sky = |a: (Angle, Declination), along: f64, above: f64| {
        separation(
            a,
            (Angle::from_degrees(along), Declination::from_degrees(above)),
        )
        .arcseconds()
    };
    Off {
        place: on_the_sky(
            (ours.hour_angle.angle(), ours.declination),
            row.number("hour_angle_deg"),
            row.number("declination_deg"),
        ),
        hour_angle: apart(ours.hour_angle.angle(), row.number("hour_angle_deg")),
        right_ascension: apart(ours.right_ascension.angle(), row.number("ra_of_date_deg")),
        declination: apart(ours.declination.angle(), row.number("declination_deg")),
        horizon: on_the_sky(
            (
                seen.azimuth.angle(),
                Declination::new(seen.altitude.angle()),
            ),
            row.number("azimuth_deg"),
            row.number("altitude_deg"),
        ),
        sidereal: apart(
            moment.apparent_sidereal().angle(),
            row.number("local_apparent_sidereal_deg"),
        ),
    }
}
