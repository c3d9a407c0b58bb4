"""Topocentric apparent places by Skyfield and JPL's DE421, airless, at exactly the UT1 a row states.

requires: skyfield==1.55, skyfield-data==7.0.0, jplephem==2.24, numpy==2.4.6
"""

import datetime
import pathlib

import numpy as np
from skyfield.api import Star, load, load_file, wgs84
import skyfield_data

import erfa_place

KERNEL = load_file(pathlib.Path(skyfield_data.__file__).parent / "data" / "de421.bsp")
NAMES = {
    "Sun": "sun",
    "Moon": "moon",
    "Mercury": "mercury",
    "Venus": "venus",
    "Mars": "mars",
    "Jupiter": "jupiter barycenter",
    "Saturn": "saturn barycenter",
    "Uranus": "uranus barycenter",
    "Neptune": "neptune barycenter",
}
J1991_25_TT = 2448349.0625


def instant(utc_text, dut1):
    """Skyfield's time for a UTC with TT-UT1 = 32.184 s + (TAI-UTC) - dut1."""
    delta_t = 32.184 + erfa_place.tai_minus_utc(utc_text) - dut1
    return load.timescale(delta_t=delta_t).from_datetime(datetime.datetime.fromisoformat(utc_text.replace("Z", "+00:00")))


def site(longitude_deg, latitude_deg, elevation_m):
    return wgs84.latlon(latitude_deg, longitude_deg, elevation_m=elevation_m)


def star(cells):
    """A Skyfield star from the cells of sample.stars."""
    ra, dec, pm_ra, pm_dec, parallax, rv = (float(cell) for cell in cells[4:10])
    return Star(
        ra_hours=ra / 15.0,
        dec_degrees=dec,
        ra_mas_per_year=pm_ra,
        dec_mas_per_year=pm_dec,
        parallax_mas=parallax,
        radial_km_per_s=rv,
        epoch=J1991_25_TT,
    )


def place(time, where, longitude_deg, target):
    """Degrees (and au): hour angle, declination, right ascension of date, apparent sidereal time, azimuth, altitude, distance."""
    apparent = (KERNEL["earth"] + where).at(time).observe(target).apparent()
    ra, dec, distance = apparent.radec("date")
    altitude, azimuth, _ = apparent.altaz()
    sidereal = (time.gast * 15.0 + longitude_deg) % 360.0
    ra_deg = ra._degrees % 360.0
    hour_angle = (sidereal - ra_deg + 180.0) % 360.0 - 180.0
    return hour_angle, dec.degrees, ra_deg, sidereal, azimuth.degrees, altitude.degrees, distance.au


def body_position(name):
    """Barycentric ICRS position [au] of a body at a two-part TDB Julian Date, straight from DE421."""
    target = KERNEL[NAMES[name]]
    scale = load.timescale(delta_t=0.0)

    def position(jd1, jd2):
        return target.at(scale.tdb_jd(jd1, jd2)).xyz.au

    return position


def earth(jd1, jd2):
    """DE421's Earth: heliocentric position, barycentric position [au] and velocity [au/day]."""
    time = load.timescale(delta_t=0.0).tdb_jd(jd1, jd2)
    here = KERNEL["earth"].at(time)
    return np.array(here.xyz.au - KERNEL["sun"].at(time).xyz.au), np.array(here.xyz.au), np.array(here.velocity.au_per_d)
