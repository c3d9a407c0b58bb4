#!/usr/bin/env python3
"""Make star-names.csv: remembered designations and names, each checked against stars.csv.

Packages, exactly these versions:
    skyfield==1.55    (named_stars: proper names by HIP number)
    ephem==4.2.1      (ephem.stars: proper names by place)
    pyerfa==2.0.1.5   (precession to 1690, the equinox of Flamsteed's numbers)

Run:  python3 make_star_names.py     reads stars.csv and star-names-remembered.csv beside this file,
      writes star-names.csv there, and prints every row, number and name it dropped, with the reason.
"""

import csv
import io
import math
import sys
from collections import Counter, defaultdict
from importlib.metadata import version
from pathlib import Path

PINNED = {"skyfield": "1.55", "ephem": "4.2.1", "pyerfa": "2.0.1.5"}
for package, wanted in PINNED.items():
    if version(package) != wanted:
        sys.exit(f"{package} {version(package)} is installed, {wanted} is wanted")

import erfa  # noqa: E402
import numpy as np  # noqa: E402
from ephem import stars as ephem_stars  # noqa: E402
from skyfield.named_stars import named_star_dict  # noqa: E402

HERE = Path(__file__).parent
LETTERS = ("alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi omicron pi rho sigma tau upsilon "
           "phi chi psi omega").split()

MAGNITUDE_TOLERANCE = 0.6  # mag: Hp against a remembered V
SEARCH_RADIUS = 0.25       # degrees: a star is looked for this close to the remembered place
PLACE_TOLERANCE = 1.0      # degrees: the same where the HIP number is given
CERTAIN_RADIUS = 1 / 60    # degrees: where several stars fit, one this close, with the next four times as far, is taken
LETTER_TOLERANCE = 3.0     # mag: an earlier letter is not fainter than a later one by more than this
ORDER_SLACK = 1.0          # degrees along the parallel: Flamsteed numbers may swap by this much
SAME_STAR = 5 / 3600       # degrees: an ephem place and its Hipparcos star

# Names by which skyfield 1.55 or ephem 4.2.1 mean another star than the IAU's list does.
# name: (HIP there, why it is not taken)
OTHER_USE = {
    "Algenib": (15863, "old name of Mirfak; the IAU's is gamma Pegasi"),
    "Gienah": (102488, "old name of epsilon Cygni, now Aljanah; the IAU's is gamma Corvi"),
    "Markab": (45941, "kappa Velorum is Markeb; the IAU's Markab is alpha Pegasi"),
    "Toliman": (71683, "the IAU's is alpha 2 Centauri"),
}


def data_rows(path):
    """The rows of a commented CSV file, as dictionaries."""
    with open(path, encoding="utf-8", newline="") as lines:
        yield from csv.DictReader(line for line in lines if not line.startswith("#"))


def sexagesimal(text):
    """'-0 19' -> -0.3166..."""
    whole, minutes = text.split()
    value = abs(int(whole)) + float(minutes) / 60
    return -value if whole.startswith("-") else value


def separation(ra1, dec1, ra2, dec2):
    """Angle between two places, degrees."""
    ra1, dec1, ra2, dec2 = map(math.radians, (ra1, dec1, ra2, dec2))
    s = math.sin((dec2 - dec1) / 2) ** 2 + math.cos(dec1) * math.cos(dec2) * math.sin((ra2 - ra1) / 2) ** 2
    return math.degrees(2 * math.asin(min(1.0, math.sqrt(s))))


class Dropped:
    """What was dropped, counted and printed."""

    def __init__(self):
        self.count = Counter()

    def __call__(self, what, label, why):
        self.count[what] += 1
        print(f"dropped {what} {label}: {why}")


def label(row):
    return f"{row['constellation']} {row['bayer'] or row['flamsteed'] or row['names']}".strip()


def find(row, stars):
    """The star of stars.csv that a remembered row means, or the reason why there is none."""
    low, _, high = row["v"].partition("-") if not row["v"].startswith("-") else (row["v"], "", "")
    low, high = float(low), float(high or low)
    ra, dec = sexagesimal(row["ra"]) * 15, sexagesimal(row["dec"])

    def bright_enough(star):
        return low - MAGNITUDE_TOLERANCE <= star["hp"] <= high + MAGNITUDE_TOLERANCE

    near = [(separation(ra, dec, s["ra"], s["dec"]), s) for s in stars.values()
            if abs(s["dec"] - dec) <= PLACE_TOLERANCE]
    near = sorted(((d, s) for d, s in near if d <= PLACE_TOLERANCE), key=lambda pair: pair[0])
    if row["hip"]:
        near = [(d, s) for d, s in near if s["hip"] == int(row["hip"])]
        if not near:
            return None, f"HIP {row['hip']} is not within {PLACE_TOLERANCE} degree"
        if not bright_enough(near[0][1]):
            return None, f"HIP {row['hip']} has Hp {near[0][1]['hp']}, V remembered as {row['v']}"
    else:
        close = [(d, s) for d, s in near if d <= SEARCH_RADIUS]
        seen = ", ".join(f"HIP {s['hip']} Hp {s['hp']} at {d * 60:.1f}'" for d, s in close)
        near = [(d, s) for d, s in close if bright_enough(s)]
        certain = len(near) > 1 and near[0][0] <= CERTAIN_RADIUS and near[1][0] >= 4 * CERTAIN_RADIUS
        if len(near) != 1 and not certain:
            return None, f"{len(near)} stars fit V {row['v']} within {SEARCH_RADIUS} degree ({seen})"
    distance, star = near[0]
    if star["constellation"] != row["constellation"]:
        return None, f"HIP {star['hip']} lies in {star['constellation']}"
    return (distance, star), None


def letter_order(rows, dropped):
    """Drop rows whose letter is implausibly early for the star's brightness."""
    by_constellation = defaultdict(list)
    for row in rows:
        if row["bayer"] and "-" not in row["v"][1:]:
            by_constellation[row["constellation"]].append(row)
    bad = set()
    for group in by_constellation.values():
        for row in group:
            sisters = [o for o in group if o["bayer"].split()[0] == row["bayer"].split()[0]]
            if row is not min(sisters, key=lambda o: o["star"]["hp"]):
                continue  # a letter is judged by its brightest star
            rank = LETTERS.index(row["bayer"].split()[0])
            later = [o for o in group if LETTERS.index(o["bayer"].split()[0]) > rank]
            brightest = min((o["star"]["hp"] for o in later), default=99.0)
            if row["star"]["hp"] - brightest > LETTER_TOLERANCE:
                bad.add(id(row))
                dropped("row", label(row), f"Hp {row['star']['hp']}, but a later letter has {brightest}")
    return [row for row in rows if id(row) not in bad]


def out_of_order(group):
    """How often each of (number, right ascension, declination, row) breaks the order with another."""
    broken = Counter()
    for i, (n1, ra1, dec1, _) in enumerate(group):
        for j, (n2, ra2, dec2, _) in enumerate(group):
            slack = math.radians(ORDER_SLACK) / max(0.02, math.cos(max(abs(dec1), abs(dec2))))
            if n1 < n2 and ra1 > ra2 + slack:
                broken[i] += 1
                broken[j] += 1
    return broken


def flamsteed_order(rows, dropped):
    """Flamsteed numbered the stars of a constellation by right ascension: take away numbers that break the order."""
    to_1690 = erfa.pmat06(*erfa.epb2jd(1690.0))
    by_constellation = defaultdict(list)
    for row in rows:
        if row["flamsteed"]:
            ra, dec = (math.radians(row["star"][k]) for k in ("ra", "dec"))
            ra, dec = erfa.c2s(to_1690 @ np.asarray(erfa.s2c(ra, dec)))
            by_constellation[row["constellation"]].append((int(row["flamsteed"]), float(ra), float(dec), row))
    for group in by_constellation.values():
        # the numbers begin at 0 h, or, where a constellation lies across it, at the constellation's western edge
        middle = math.atan2(sum(math.sin(g[1]) for g in group), sum(math.cos(g[1]) for g in group))
        cuts = [[(n, ra % math.tau, dec, row) for n, ra, dec, row in group],
                [(n, math.remainder(ra - middle, math.tau), dec, row) for n, ra, dec, row in group]]
        group = min(cuts, key=lambda cut: sum(out_of_order(cut).values()))
        while broken := out_of_order(group):
            worst, times = max(broken.items(), key=lambda item: (item[1], -item[0]))
            n, _, _, row = group.pop(worst)
            dropped("Flamsteed number", f"{n} of {label(row)}", f"out of order with {times} others")
            row["flamsteed"] = ""


def package_names(stars):
    """(name, HIP number, package) from skyfield and ephem; ephem's stars found by place."""
    for name, hip in sorted(named_star_dict.items()):
        yield name, hip, "skyfield"
    for name, body in sorted(ephem_stars.stars.items()):
        body.compute("2000/1/1 12:00", epoch="2000")
        ra, dec = math.degrees(body._ra), math.degrees(body._dec)
        d, hip = min((separation(ra, dec, s["ra"], s["dec"]), s["hip"]) for s in stars.values())
        if d < SAME_STAR:
            yield name, hip, "ephem"
        else:
            print(f"ephem's {name} is {d * 3600:.1f}\" from the nearest star")


def merge_names(rows, stars, dropped):
    """Check the remembered names against the packages' and add the packages' own spellings."""
    by_hip = {row["star"]["hip"]: row for row in rows}
    owner = {name.casefold(): row for row in rows for name in row["name_list"]}
    agreed = set()
    for name, hip, package in package_names(stars):
        if OTHER_USE.get(name, (None,))[0] == hip:
            continue
        row, holder = by_hip.get(hip), owner.get(name.casefold())
        if holder is not None and holder is not row:
            dropped("name", name, f"remembered for {label(holder)}, HIP {hip} in {package}")
            holder["name_list"].remove(next(n for n in holder["name_list"] if n.casefold() == name.casefold()))
            del owner[name.casefold()]
        elif row is None:
            dropped("name", name, f"HIP {hip} in {package} is not among the designations")
        elif holder is None:
            row["name_list"].append(name)
            owner[name.casefold()] = row
        else:
            agreed.add(name)
    return len(agreed)


def twice(values):
    return sorted(str(v) for v, times in Counter(values).items() if times > 1)


def main():
    stars = {}
    for s in data_rows(HERE / "stars.csv"):
        stars[int(s["hip"])] = {"hip": int(s["hip"]), "ra": float(s["ra_deg"]), "dec": float(s["dec_deg"]),
                                "hp": float(s["hp"]), "constellation": s["constellation"]}
    dropped, rows, distances = Dropped(), [], []
    remembered = list(data_rows(HERE / "star-names-remembered.csv"))
    for row in remembered:
        assert not row["bayer"] or row["bayer"].split()[0] in LETTERS, row
        found, why = find(row, stars)
        if found is None:
            dropped("row", label(row), why)
            continue
        row["star"] = found[1]
        row["name_list"] = [n for n in row["names"].split(";") if n]
        rows.append(row)
        distances.append(found[0] * 60)
    rows = letter_order(rows, dropped)
    flamsteed_order(rows, dropped)
    agreed = merge_names(rows, stars, dropped)
    rows = [row for row in rows if row["bayer"] or row["flamsteed"] or row["name_list"]]
    rows.sort(key=lambda row: row["star"]["hip"])

    distances.sort()
    assert not (t := twice(row["star"]["hip"] for row in rows)), t
    assert not (t := twice((row["constellation"], row["bayer"]) for row in rows if row["bayer"])), t
    assert not (t := twice((row["constellation"], row["flamsteed"]) for row in rows if row["flamsteed"])), t
    assert not (t := twice(name.casefold() for row in rows for name in row["name_list"])), t

    head = f"""\
Names of stars: Bayer letters, Flamsteed numbers, proper names
Bayer letters, Flamsteed numbers and most proper names are FROM MEMORY (star-names-remembered.csv), since no package
carries them; other proper names, and the HIP numbers of those both know, come from the named_stars of skyfield 1.55
(PyPI, MIT, Brandon Rhodes) and the stars of ephem 4.2.1 (PyPI, MIT, Brandon Rhodes). The IAU's spelling comes first.
Licence: MIT, as the project.
Made by make_star_names.py beside this file, which keeps a remembered row only if stars.csv has exactly one star that
fits within {SEARCH_RADIUS} degree of the remembered place, or one within 1' and the next beyond 4' (or the remembered HIP
number within {PLACE_TOLERANCE} degree), its Hp within {MAGNITUDE_TOLERANCE} of the remembered V, inside the boundaries of the constellation named, and no
later letter of the constellation brighter by more than {LETTER_TOLERANCE}; and a Flamsteed number only if it keeps the order of right
ascension at equinox 1690. Of {len(remembered)} rows {len(rows)} are kept; their remembered places are off by {distances[len(distances) // 2]:.1f}' in the middle,
{distances[-1]:.1f}' at most. {agreed} spellings agree with the packages.
Columns: hip = Hipparcos number; constellation = IAU abbreviation; bayer = letter in English, with a component number
after a space where it has one (a letter asked for without its number means the brightest of its rows if they stand
within a quarter of a degree; else it is not settled); flamsteed = number, may be empty; names = separated by
semicolons, may be empty."""
    out = io.StringIO()
    for text in head.splitlines():
        out.write(f"# {text}\n")
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow("hip,constellation,bayer,flamsteed,names".split(","))
    for row in rows:
        writer.writerow([row["star"]["hip"], row["constellation"], row["bayer"], row["flamsteed"],
                         ";".join(row["name_list"])])
    output = HERE / "star-names.csv"
    output.write_text(out.getvalue(), encoding="utf-8", newline="\n")
    print(f"dropped {dict(dropped.count)}")
    print(f"{output.name}: {len(rows)} stars of {len(remembered)} remembered, {output.stat().st_size} bytes")


if __name__ == "__main__":
    main()
