#!/usr/bin/env python3
"""Make messier.csv and ngc.csv from OpenNGC and a table of remembered corrections.

Packages, exactly these versions:
    PyOngc==1.2.2    (ongc.db: OpenNGC, CC BY-SA 4.0)
    skyfield==1.55   (constellation boundaries)

Run:  python3 make_deep_sky.py     writes messier.csv and ngc.csv beside this file.
"""

import csv
import io
import math
import re
import sqlite3
import sys
from collections import Counter
from importlib.metadata import version
from pathlib import Path

PINNED = {"PyOngc": "1.2.2", "skyfield": "1.55"}
for package, wanted in PINNED.items():
    if version(package) != wanted:
        sys.exit(f"{package} {version(package)} is installed, {wanted} is wanted")

import pyongc  # noqa: E402
from skyfield.api import load_constellation_map, position_of_radec  # noqa: E402

HERE = Path(__file__).parent
COLUMNS = "name,kind,ra_deg,dec_deg,magnitude,major_arcmin,minor_arcmin,constellation,also".split(",")

KINDS = {
    "*": "star", "**": "double star", "*Ass": "stellar association", "OCl": "open cluster",
    "GCl": "globular cluster", "Cl+N": "cluster with nebula", "G": "galaxy", "GPair": "galaxy pair",
    "GTrpl": "galaxy triplet", "GGroup": "galaxy group", "PN": "planetary nebula", "HII": "emission nebula",
    "DrkN": "dark nebula", "EmN": "emission nebula", "Neb": "nebula", "RfN": "reflection nebula",
    "SNR": "supernova remnant", "Nova": "nova", "Other": "other",
}

# Filed under one number in the source, known to observers under the other.
BETTER_KNOWN_AS = {"NGC 2239": "NGC 2244"}

# Objects without an NGC or IC number that observers ask for, by the source's name for them.
WITHOUT_NUMBER = {
    "Mel022": "M 45", "M040": "M 40", "Mel111": "Mel 111", "C041": "Mel 25", "Cl399": "Cr 399",
    "B033": "B 33", "C099": "Coalsack", "ESO056-115": "LMC",
}


def plain_name(text):
    """'NGC0224' -> 'NGC 224', 'IC0298A' -> 'IC 298A'; None for a name of another form."""
    if text in WITHOUT_NUMBER:
        return WITHOUT_NUMBER[text]
    match = re.fullmatch(r"(NGC|IC)(\d{4})([A-Z]{0,2})", text)
    return f"{match[1]} {int(match[2])}{match[3]}" if match else None


def number_key(name):
    """Sort key: NGC, then IC, then the rest; numbers in their order."""
    match = re.fullmatch(r"(\D+) (\d+)(.*)", name)
    head, number, tail = (match[1], int(match[2]), match[3]) if match else (name, 0, "")
    return ({"M": 0, "NGC": 1, "IC": 2}.get(head, 3), head, number, tail)


def data_rows(path):
    """The rows of a commented CSV file, as dictionaries."""
    with open(path, encoding="utf-8", newline="") as lines:
        yield from csv.DictReader(line for line in lines if not line.startswith("#"))


def number(value, decimals):
    """Decimal text without a negative zero; empty for None."""
    if value is None:
        return ""
    text = f"{value:.{decimals}f}"
    return text[1:] if text.startswith("-") and not text.strip("-0.") else text


def read_source():
    """The rows of OpenNGC by plain name, and for each the other numbers it goes by."""
    database = sqlite3.connect(Path(pyongc.__file__).with_name("ongc.db"))
    query = "SELECT name, type, ra, dec, majax, minax, vmag, bmag, messier, ngc, ic, commonnames FROM objects"
    rows = list(database.execute(query))
    objects, others, skipped = {}, {}, 0
    for name, kind, ra, dec, major, minor, v, b, messier, ngc, ic, common in rows:
        plain = plain_name(name)
        numbers = [f"NGC {int(n)}" for n in ngc.split(",") if n.isdigit()]
        numbers += [f"IC {int(n)}" for n in ic.split(",") if n.isdigit()]
        if kind == "Dup" and plain and numbers:
            others.setdefault(numbers[0], set()).add(plain)
        if plain is None or kind in ("Dup", "NonEx") or ra is None:
            skipped += 1
            continue
        if numbers:
            others.setdefault(plain, set()).update(numbers)
        objects[plain] = {
            "kind": KINDS[kind], "ra": math.degrees(ra), "dec": math.degrees(dec), "major": major, "minor": minor,
            "v": v, "b": b, "messier": f"M {int(messier)}" if messier else None,
            "names": [n for n in common.split(",") if n],
        }
    for old, new in BETTER_KNOWN_AS.items():
        objects[new] = objects.pop(old)
        others[new] = (others.pop(old, set()) | {old}) - {new}
    owners = {}
    for name in sorted(others, key=number_key):
        if name not in objects:
            print(f"no object {name} for its other numbers {sorted(others[name])}")
        for other in sorted(others[name]):
            owner = owners.setdefault(other, name)
            if other in objects or owner != name:  # its own record, or the first that claims it, wins
                others[name].discard(other)
                print(f"{other} is not {name}: {'it has a record' if other in objects else 'it is ' + owner}")
    return objects, others, len(rows), skipped


def put_right(objects):
    """Apply deep-sky-remembered.csv; returns how many objects it touched."""
    touched = 0
    for row in data_rows(HERE / "deep-sky-remembered.csv"):
        thing = objects[row["object"]]  # an unknown number stops the run
        for field, key in (("magnitude", "v"), ("major_arcmin", "major"), ("minor_arcmin", "minor"),
                           ("ra_deg", "ra"), ("dec_deg", "dec")):
            if row[field]:
                thing[key] = None if row[field] == "-" else float(row[field])
                thing["b"] = None if key == "v" else thing["b"]
        thing["kind"] = row["kind"] or thing["kind"]
        if row["names"]:
            thing["names"] = [] if row["names"] == "-" else row["names"].split(";")
        touched += 1
    return touched


def magnitude(thing):
    """V; or B, for an object of stars without V or a galaxy whose V is fainter than its B, which cannot be."""
    v, b, kind = thing["v"], thing["b"], thing["kind"]
    if v is None:
        cloud = ("nebula" in kind and kind != "planetary nebula") or kind == "supernova remnant"
        return None if cloud else b
    return b if kind == "galaxy" and b is not None and v >= b else v


def line(name, thing, also, constellation_at):
    place = constellation_at(position_of_radec(thing["ra"] / 15, thing["dec"]))
    minor = None if thing["minor"] == thing["major"] else thing["minor"]
    return [name, thing["kind"], number(thing["ra"], 4), number(thing["dec"], 4), number(magnitude(thing), 1),
            number(thing["major"], 1), number(minor, 1), place, ";".join(also)]


def write(path, head, rows):
    keys = [row[0] for row in rows]
    assert len(keys) == len(set(keys)), "a name comes twice"
    answers = Counter(a.casefold() for row in rows for a in [row[0], *row[8].split(";")] if a)
    twice = [a for a, times in answers.items() if times > 1]
    assert not twice, f"{path.name}: stands for two objects: {sorted(twice)}"
    out = io.StringIO()
    for text in head.splitlines():
        out.write(f"# {text}\n")
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(COLUMNS)
    writer.writerows(rows)
    path.write_text(out.getvalue(), encoding="utf-8", newline="\n")
    print(f"{path.name}: {len(rows)} objects, {path.stat().st_size} bytes")


CREDIT = """\
Source: OpenNGC by Mattia Verga and contributors (github.com/mattiaverga/OpenNGC), as packed in PyOngc 1.2.2 (PyPI).
Licence: Creative Commons Attribution-ShareAlike 4.0 International (CC BY-SA 4.0,
creativecommons.org/licenses/by-sa/4.0), for this derived file too. OpenNGC acknowledges the NASA/IPAC Extragalactic
Database (NED), HyperLEDA, SIMBAD (CDS, Strasbourg), the HEASARC, and the notes of Harold G. Corwin.
Made by make_deep_sky.py beside this file."""

COLUMN_TEXT = """\
Columns: name; kind in words; ra_deg, dec_deg = ICRS (J2000), degrees, to 0.0001 degree; magnitude = V (where the source
has no V, or a galaxy's V that is fainter than its B, then B: a galaxy looks up to a magnitude brighter than that; no B
for nebulae, where it is mostly that of a star in them); major_arcmin, minor_arcmin = size in minutes of arc (minor
empty: round or not known); constellation = IAU abbreviation; also = other names, separated by semicolons. An empty
field is not known."""


def main():
    objects, others, total, skipped = read_source()
    touched = put_right(objects)
    constellation_at = load_constellation_map()

    messier = []
    for name, thing in objects.items():
        label = thing["messier"] or (name if name.startswith("M ") else None)
        if label is None:
            continue
        numbers = [] if name == label else [name]
        numbers += sorted(others.get(name, set()), key=number_key)
        numbers += ["M 102"] if label == "M 101" else []
        messier.append(line(label, thing, numbers + thing["names"], constellation_at))
    messier.sort(key=lambda row: number_key(row[0]))
    assert [row[0] for row in messier] == [f"M {n}" for n in range(1, 111) if n != 102]
    write(HERE / "messier.csv", f"""\
The Messier objects: 110 numbers, 109 objects
{CREDIT} Changes made: radians turned into degrees; kinds put into words;
constellations by the IAU boundaries (skyfield 1.55); magnitudes, sizes and popular names put right or added FROM MEMORY
as listed in deep-sky-remembered.csv; M 102 taken as a second name of M 101 (some observers give that number to
NGC 5866); M 40 and M 73 given sizes. Sizes of open clusters are the source's: often half of what an eye takes in.
{COLUMN_TEXT}
""", messier)

    ngc = []
    for name, thing in objects.items():
        if name.startswith("M "):
            continue
        also = [thing["messier"]] if thing["messier"] else []
        also += ["M 102"] if thing["messier"] == "M 101" else []
        also += sorted(others.get(name, set()), key=number_key)
        ngc.append(line(name, thing, also + thing["names"], constellation_at))
    ngc.sort(key=lambda row: number_key(row[0]))
    extra = [row[0] for row in ngc if not row[0].startswith(("NGC ", "IC "))]
    write(HERE / "ngc.csv", f"""\
The NGC and IC, existing objects once each, and {len(extra)} without such a number
{CREDIT} Changes made: of the source's {total} rows {skipped} are left out (second
records of an object, things that do not exist, parts of pairs, other catalogues); second numbers given as other names;
radians turned into degrees; kinds put into words; constellations by the IAU boundaries (skyfield 1.55); {touched} objects,
here and in messier.csv, put right or named FROM MEMORY as listed in deep-sky-remembered.csv, among them: the Flame is
NGC 2024, not IC 434; the Rosette's cluster is NGC 2244 (the source has it as NGC 2239); IC 1396 is 170' across; NGC 7000
is given by its middle. Sizes of clusters not listed there are the source's: often half of what an eye takes in.
{COLUMN_TEXT}
""", ngc)


if __name__ == "__main__":
    main()
