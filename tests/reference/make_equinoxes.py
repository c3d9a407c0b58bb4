"""Makes equinoxes.csv: places at old and new equinoxes brought to the ICRS.

requires: palpy==1.8.4, pyerfa==2.0.1.5, numpy==2.4.6
"""

import math
import random

import erfa
import numpy as np
import palpy

import table

HEAD = """
Places at the mean equator and equinox of a year, brought to the axes of the ICRS; no proper motion, no parallax.
Source: made by make_equinoxes.py with a fixed seed.
  Besselian years before 1984: PyPI palpy 1.8.4 (the PAL library, GPL-2; only its numbers are here): subet, prebn to 1950, addet, fk45z at the epoch of the row;
    then from J2000.0 to the ICRS by the frame bias in PyPI pyerfa 2.0.1.5 (ERFA, BSD licence) pmat06.
  Julian years, and Besselian years from 1984 on: pyerfa pmat06 of the year, its transpose.
Columns: equinox, B or J and the year; epoch, Julian year in which the target stood there; ra_deg, dec_deg at the equinox; icrs_ra_deg, icrs_dec_deg.
Tolerance: 0.0001" on the sky: the same formulas, but E-terms (0.34") taken out and put in to first order may differ by their square, 0.000001".
"""

YEARS = ["B1855", "B1875", "B1900", "B1925.5", "B1950", "B1975", "B2000", "J1990", "J2000", "J2026.9", "J2050"]


def from_julian(jd, direction):
    return erfa.trxp(erfa.pmat06(*jd), direction)


def icrs(equinox, epoch, ra, dec):
    """Radians in the ICRS."""
    year = float(equinox[1:])
    if equinox[0] == "B" and year < 1984:
        ra, dec = palpy.subet(ra, dec, year)
        turned = np.array(palpy.prebn(year, 1950.0)) @ erfa.s2c(ra, dec)
        ra, dec = erfa.c2s(turned)
        ra, dec = palpy.addet(float(ra), float(dec), 1950.0)
        ra, dec = palpy.fk45z(ra, dec, float(erfa.epb(*erfa.epj2jd(epoch))))
        direction = from_julian((2451545.0, 0.0), erfa.s2c(ra, dec))
    else:
        jd = erfa.epb2jd(year) if equinox[0] == "B" else erfa.epj2jd(year)
        direction = from_julian(jd, erfa.s2c(ra, dec))
    ra, dec = erfa.c2s(direction)
    return erfa.anp(ra), dec


def main():
    chance = random.Random(19)
    rows = []
    for equinox in YEARS:
        for n in range(6):
            epoch = 1950.0 if n < 3 else round(chance.uniform(1890.0, 2030.0), 2)
            ra = round(chance.uniform(0.0, 360.0), 6)
            dec = round(math.degrees(math.asin(chance.uniform(-1.0, 1.0))), 6) if n else 89.5
            ra_icrs, dec_icrs = icrs(equinox, epoch, math.radians(ra), math.radians(dec))
            rows.append([equinox, epoch, f"{ra:.6f}", f"{dec:.6f}", table.degrees(math.degrees(ra_icrs)), table.degrees(math.degrees(dec_icrs))])
    table.write("equinoxes.csv", HEAD, ["equinox", "epoch", "ra_deg", "dec_deg", "icrs_ra_deg", "icrs_dec_deg"], rows)


if __name__ == "__main__":
    main()
