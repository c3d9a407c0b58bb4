"""Makes meeus.csv: worked examples of J. Meeus, Astronomical Algorithms, re-run through PyMeeus and compared with the models of today.

requires: PyMeeus==0.5.12, pyerfa==2.0.1.5, palpy==1.8.4, numpy==2.4.6
"""

import math

import erfa
import numpy as np
import palpy
from pymeeus import Coordinates, Epoch
from pymeeus.Angle import Angle

import erfa_place  # noqa: F401  (quiets ERFA beyond its table of leap seconds)
import table

HEAD = """
Worked examples of J. Meeus, Astronomical Algorithms, 2nd edition (Willmann-Bell 1998).
Source: the numbers as PyPI PyMeeus 0.5.12 (LGPL-3; only its numbers are here) carries them in its documentation, each re-run through its routines by make_meeus.py to the
  digits printed; the labels of the examples (chapter and letter) are from memory.
Columns: example; label, "label from memory" in every row; quantity; given, the data of the example in words; as_printed and its unit (h m s, d m s, or deg);
  value_deg, the same in degrees; today_minus_printed_arcsec, what the models of 2006 (PyPI pyerfa 2.0.1.5; refraction: the numerical
  integral of PyPI palpy 1.8.4) give for the same data less the printed value: blank where it is mere geometry; tolerance_arcsec, for a test.
  Meeus counts longitude positive west and azimuth from south through west; here longitude is east positive and the row of azimuth says from where.
Tolerance: half the last printed digit where it is mere geometry, else the difference of the models in the column before it, rounded up, and half a digit. Example 16.a is
  Bennett's formula, which lies half a minute of arc above the integral and the Nautical Almanac there (refraction.csv): it is no standard to better than that.
"""
COLUMNS = "example label quantity given as_printed unit value_deg today_minus_printed_arcsec tolerance_arcsec".split()


def degrees(text):
    sign = -1.0 if text.startswith("-") else 1.0
    return sign * sum(float(part) / 60**n for n, part in enumerate(text.lstrip("+-").split()))


def rows():
    apr10 = (2446895.5, 0.0)
    evening = (2446895.5, (19 * 60 + 21) / 1440)
    gmst = [np.degrees(erfa.gmst06(*ut, ut[0], ut[1] + 55.3 / 86400)) for ut in (apr10, evening)]
    gast = [np.degrees(erfa.gst06a(*ut, ut[0], ut[1] + 55.3 / 86400)) for ut in (apr10, evening)]
    dpsi, deps = (np.degrees(a) for a in erfa.nut06a(*apr10))
    obliquity = np.degrees(erfa.obl06(*apr10))

    epoch = Epoch.Epoch(1987, 4, 10)
    later = Epoch.Epoch(1987, 4, 10, 19, 21, 0)
    psi, eps = Coordinates.nutation_longitude(1987, 4, 10), Coordinates.true_obliquity(1987, 4, 10)
    day = 360.0
    apparent_pymeeus = epoch.apparent_sidereal_time(eps, psi) * day
    yield "12.a", "mean sidereal time at Greenwich", "1987 April 10, 0h UT", "13 10 46.3668", "h", epoch.mean_sidereal_time() * day, gmst[0], 0.00005 * 15
    yield "12.a", "apparent sidereal time at Greenwich", "1987 April 10, 0h UT", "13 10 46.1351", "h", apparent_pymeeus, gast[0], 0.00005 * 15
    yield "12.b", "mean sidereal time at Greenwich", "1987 April 10, 19h21m00s UT", "8 34 57.0896", "h", later.mean_sidereal_time() * day, gmst[1], 0.00005 * 15

    td = "1987 April 10, 0h TD"
    yield "22.a", "nutation in longitude", td, "-0 0 3.788", "deg", float(psi), dpsi, 0.0005
    yield "22.a", "nutation in obliquity", td, "0 0 9.443", "deg", float(Coordinates.nutation_obliquity(1987, 4, 10)), deps, 0.0005
    yield "22.a", "mean obliquity", td, "23 26 27.407", "deg", float(Coordinates.mean_obliquity(1987, 4, 10)), obliquity, 0.0005

    # theta Persei, FK5 at J2000.0, carried to 2028 November 13.19 TD.
    target = Epoch.Epoch(2028, 11, 13.19)
    jd = (2462088.5, 0.19)
    years = (jd[0] + jd[1] - 2451545.0) / 365.25
    ra0, dec0 = np.radians(degrees("2 44 11.986") * 15), np.radians(degrees("49 13 42.48"))
    pm_ra, pm_dec = np.radians(0.03425 * 15 / 3600), np.radians(-0.0895 / 3600)
    moved = erfa.s2c(ra0 + pm_ra * years, dec0 + pm_dec * years)
    mean = [np.degrees(a) for a in erfa.c2s(erfa.rxp(erfa.pmat06(*jd), moved))]
    ri, di, eo = erfa.atci13(ra0, dec0, pm_ra, pm_dec, 0.0, 0.0, *jd)
    today = [float(np.degrees(erfa.anp(ri - eo))), float(np.degrees(di))]
    alpha, delta = Coordinates.precession_equatorial(
        Epoch.JDE2000, target, Angle(2, 44, 11.986, ra=True), Angle(49, 13, 42.48), Angle(0, 0, 0.03425, ra=True), Angle(0, 0, -0.0895)
    )
    star = "theta Persei, J2000.0 2h44m11.986s +49d13'42.48\", proper motion +0.03425 s/yr -0.0895\"/yr, to 2028 November 13.19 TD"
    yield "21.b", "mean right ascension of date", star, "2 46 11.331", "h", float(alpha), mean[0], 0.0005 * 15
    yield "21.b", "mean declination of date", star, "49 20 54.54", "deg", float(delta), mean[1], 0.005
    alpha, delta = Coordinates.apparent_position(target, alpha, delta, Angle(231.328))
    yield "23.a", "apparent right ascension (geocentric)", star, "2 46 14.39", "h", float(alpha), today[0], 0.005 * 15
    yield "23.a", "apparent declination (geocentric)", star, "49 21 07.45", "deg", float(delta), today[1], 0.005

    # Venus at the US Naval Observatory, Washington.
    ra, dec, latitude, west = degrees("23 09 16.641") * 15, degrees("-6 43 11.61"), degrees("38 55 17"), degrees("77 03 56")
    theta = Angle(8, 34, 57.0896, ra=True) + Angle(0, 0, -3.868 * math.cos(math.radians(degrees("23 26 36.87"))) / 15.0, ra=True)
    hour = theta - Angle(77, 3, 56) - Angle(23, 9, 16.641, ra=True)
    azimuth, elevation = Coordinates.equatorial2horizontal(hour, Angle(-6, 43, 11.61), Angle(38, 55, 17))
    hour_today = (gast[1] - west - ra + 180) % 360 - 180
    az, el = erfa.hd2ae(np.radians(hour_today), np.radians(dec), np.radians(latitude))
    venus = "Venus, apparent 23h09m16.641s -6d43'11.61\", Washington 38d55'17\" N 77d03'56\" W, 1987 April 10, 19h21m00s UT"
    yield "13.b", "hour angle, west +", venus, "64.352", "deg", float(hour) % 360, hour_today, 0.0005 * 3600
    yield "13.b", "altitude, airless", venus, "15.125", "deg", float(elevation), float(np.degrees(el)), 0.0005 * 3600
    yield "13.b", "azimuth from south through west", venus, "68.034", "deg", float(azimuth), float(np.degrees(az)) - 180, 0.0005 * 3600

    def integral(apparent):
        return math.degrees(palpy.refro(math.radians(90 - apparent), 0.0, 283.15, 1010.0, 0.5, 0.55, math.radians(50), 0.0065, 1e-10))

    weather = "at 1010 hPa, 10 C"
    true = 0.5 - integral(0.5)
    yield "16.a", "true altitude", f"apparent altitude 0d30' {weather}", "0 1 14.7", "deg", float(Coordinates.refraction_apparent2true(Angle(0.5))), true, 0.05
    low, apparent = degrees("0 33 14.76"), 0.9
    for _ in range(60):
        apparent = low + integral(apparent)
    yield "16.a", "apparent altitude", f"true altitude 0d33'14.76\" {weather}", "0 57 51.96", "deg", float(Coordinates.refraction_true2apparent(Angle(low))), apparent, 0.005

    both = (Angle(14, 15, 39.7, ra=True), Angle(19, 10, 57.0), Angle(13, 25, 11.6, ra=True), Angle(-11, 9, 41.0))
    stars = "Arcturus 14h15m39.7s +19d10'57\", Spica 13h25m11.6s -11d09'41\" (J2000.0)"
    yield "17.a", "angular separation", stars, "32.793", "deg", float(Coordinates.angular_separation(*both)), None, 0.0005 * 3600


def main():
    table_rows = []
    for example, quantity, given, printed, unit, rerun, today, half_digit in rows():
        value = degrees(printed) * (15 if unit == "h" else 1)
        assert abs(rerun - value) * 3600 < 1.02 * half_digit, (example, quantity, (rerun - value) * 3600)
        difference = None if today is None else (float(today) - value) * 3600
        tolerance = half_digit if difference is None else math.ceil(abs(difference) * 1000 + 1) / 1000 + half_digit
        cells = "" if difference is None else f"{difference:.4f}"
        table_rows.append([example, "label from memory", quantity, given, printed, "h m s" if unit == "h" else "d m s" if " " in printed else "deg", table.degrees(value), cells, f"{tolerance:.4f}"])
    table.write("meeus.csv", HEAD, COLUMNS, table_rows)


main()
