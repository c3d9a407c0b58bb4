"""Makes erfa_stages.csv: arguments and results of single ERFA routines.

requires: pyerfa==2.0.1.5, numpy==2.4.6
"""

import math
import random

import erfa
import numpy as np

import erfa_place  # noqa: F401  (quiets ERFA's "dubious year" beyond its table, which is meant here)
import table

HEAD = """
Arguments and results of single routines of the IAU SOFA models, for checking a port stage by stage.
Source: PyPI pyerfa 2.0.1.5 (ERFA, BSD licence), the routine of the same name, made by make_erfa_stages.py with a fixed seed.
Columns: stage, the routine; arguments and expected, numbers parted by one space, in ERFA's own order and units:
  dat      year month day fraction                              -> TAI-UTC s
  utctai   utc1 utc2 (quasi-JD)                                 -> tai1 tai2 (JD; compare the sum of the parts)
  taitt    tai1 tai2                                            -> tt1 tt2
  utcut1   utc1 utc2 dut1 s                                     -> ut11 ut12
  gmst06, gst06a   ut11 ut12 tt1 tt2                            -> rad
  nut06a   tt1 tt2                                              -> dpsi deps rad
  obl06    tt1 tt2                                              -> rad
  epv00    tdb1 tdb2                                            -> Earth heliocentric position (3) velocity (3), barycentric position (3) velocity (3); au, au/day
  fk425    B1950 ra dec rad, pm ra dec rad/tropical year (not times cos dec), parallax arcsec, rv km/s -> the same at J2000.0 FK5, rad/Julian year
  fk45z    B1950 ra dec rad, Besselian epoch                    -> J2000.0 ra dec rad
  pmsafe   ra dec rad, pm ra dec rad/yr (not times cos dec), parallax arcsec, rv km/s, ep1a ep1b ep2a ep2b JD -> ra dec pm pm parallax rv
  moon98   tt1 tt2                                              -> geocentric position (3) au, velocity (3) au/day, GCRS
  plan94   tdb1 tdb2 planet (1 Mercury .. 8 Neptune, 3 Earth-Moon barycentre) -> heliocentric position (3) au, velocity (3) au/day
  refco    pressure hPa, temperature C, humidity 0..1, wavelength micrometre  -> A B rad
  apco13-eo  utc1 utc2 dut1 longitude latitude rad height m xp yp pressure temperature humidity wavelength -> equation of the origins rad
Tolerance: 1e-9 (rad, au, au/day; for Julian Dates 1e-9 day on the sum). The same formulas in double precision agree to some 1e-12, time to 1e-10 day;
  1e-9 rad is 0.0002". Relative 1e-9 where the value is above 1 (radial velocity, seconds).
"""


def flat(value):
    """Every number of an ERFA result, in order, velocities after positions."""
    if isinstance(value, (tuple, list)):
        return [number for part in value for number in flat(part)]
    array = np.asarray(value)
    if array.dtype.names:
        return [number for name in ("p", "v") for number in flat(array[name])]
    return [float(number) for number in array.ravel()]


def text(numbers):
    return " ".join(repr(int(n)) if isinstance(n, int) else repr(float(n)) for n in numbers)


def main():
    chance = random.Random(20000101)
    rows = []

    def add(stage, arguments, result):
        rows.append([stage, text(arguments), text(flat(result))])

    dates = [(1972, 1, 1, 0.0), (1972, 6, 30, 0.5), (1974, 12, 31, 0.99), (1975, 1, 1, 0.0), (1979, 12, 31, 0.999), (1985, 7, 1, 0.0), (1990, 12, 31, 0.5),
             (1998, 12, 31, 0.9), (1999, 1, 1, 0.0), (2008, 12, 31, 0.5), (2009, 1, 1, 0.0), (2016, 12, 31, 0.9), (2017, 1, 1, 0.0), (2026, 12, 1, 0.25), (2048, 3, 3, 0.0)]  # fmt: skip
    for date in dates:
        add("dat", date, erfa.dat(*date))
    for _ in range(14):
        # A quasi-JD of UTC between 1975 and 2048, split at midnight.
        utc = (math.floor(chance.uniform(2442413, 2469441)) + 0.5, chance.random())
        dut1 = round(chance.uniform(-0.9, 0.9), 6)
        tai = erfa.utctai(*utc)
        tt = erfa.taitt(*tai)
        ut1 = erfa.utcut1(*utc, dut1)
        add("utctai", utc, tai)
        add("taitt", tai, tt)
        add("utcut1", (*utc, dut1), ut1)
        add("gmst06", (*ut1, *tt), erfa.gmst06(*ut1, *tt))
        add("gst06a", (*ut1, *tt), erfa.gst06a(*ut1, *tt))
        add("nut06a", tt, erfa.nut06a(*tt))
        add("obl06", tt, erfa.obl06(*tt))
        add("epv00", tt, erfa.epv00(*tt))
        add("moon98", tt, erfa.moon98(*tt))
        site = (chance.uniform(-math.pi, math.pi), chance.uniform(-1.1, 1.1), round(chance.uniform(0, 3000), 1))
        whole = (*utc, dut1, *site, 0.0, 0.0, 0.0, 0.0, 0.0, 0.55)
        add("apco13-eo", whole, erfa.apco13(*whole)[1])
        planet = chance.randrange(1, 9)
        add("plan94", (*tt, planet), erfa.plan94(*tt, planet))
    for planet in range(1, 9):
        tt = (2451545.0, chance.uniform(-9000, 17000))
        add("plan94", (*tt, planet), erfa.plan94(*tt, planet))
    for _ in range(14):
        ra, dec = chance.uniform(0, 2 * math.pi), math.asin(chance.uniform(-0.99, 0.99))
        pm = [chance.gauss(0, 1e-6) / math.cos(dec), chance.gauss(0, 1e-6)]
        rest = [round(chance.uniform(0.001, 0.4), 4), round(chance.gauss(0, 40), 1)]
        add("fk425", (ra, dec, *pm, *rest), erfa.fk425(ra, dec, *pm, *rest))
        epoch = round(chance.uniform(1950, 2030), 3)
        add("fk45z", (ra, dec, epoch), erfa.fk45z(ra, dec, epoch))
        epochs = (2448349.0625, 0.0, 2451545.0, round(chance.uniform(-9000, 17000), 2))
        add("pmsafe", (ra, dec, *pm, *rest, *epochs), erfa.pmsafe(ra, dec, *pm, *rest, *epochs))
    for pressure, temperature in ((0.0, 10.0), (700.0, -20.0), (700.0, 15.0), (850.0, 0.0), (972.0, 4.0), (1010.0, 10.0), (1013.25, 15.0), (1030.0, -20.0), (1030.0, 35.0)):
        for humidity in (0.0, 0.5):
            weather = (pressure, temperature, humidity, 0.55)
            add("refco", weather, erfa.refco(*weather))
    rows.sort(key=lambda row: row[0])
    table.write("erfa_stages.csv", HEAD, ["stage", "arguments", "expected"], rows)


main()
