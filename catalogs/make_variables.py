#!/usr/bin/env python3
"""Make variables.csv: remembered variable stars, each looked up and checked in stars.csv.

No package is needed.

Run:  python3 make_variables.py    reads stars.csv, star-names.csv and variables-remembered.csv beside this file,
      writes variables.csv there, and prints every row it dropped and every epoch it left out, with the reason.
"""

import csv
import io
from pathlib import Path

HERE = Path(__file__).parent
MAGNITUDE_MARGIN = 0.6  # mag: Hp, a middle of the mission's years, may lie so far outside the range remembered in V
PREDICTED_TO = 2469807.5  # JD of 2050 January 1: until then a prediction should hold
LARGEST_SHARE = 0.1     # of the period: an epoch that would be off by more by then is left out


def data_rows(path):
    """The rows of a commented CSV file, as dictionaries."""
    with open(path, encoding="utf-8", newline="") as lines:
        yield from csv.DictReader(line for line in lines if not line.startswith("#"))


def main():
    stars = {row["hip"]: row for row in data_rows(HERE / "stars.csv")}
    by_name = {}
    named = sorted(data_rows(HERE / "star-names.csv"), key=lambda row: float(stars[row["hip"]]["hp"]))
    for row in named:
        # a letter without its component number means the brightest that carries it
        letters = (row["bayer"], row["bayer"].split(" ")[0], row["flamsteed"])
        names = [f"{name} {row['constellation']}" for name in letters if name]
        for name in names + row["names"].split(";"):
            by_name.setdefault(name, row)
    rows, epochs, remembered = [], 0, list(data_rows(HERE / "variables-remembered.csv"))
    for row in remembered:
        known = by_name.get(row["star"])
        if known is None:
            print(f"dropped {row['star']}: no such star in star-names.csv")
            continue
        star = stars[known["hip"]]
        low, high, hp = float(row["brightest"]), float(row["faintest"]), float(star["hp"])
        if not low - MAGNITUDE_MARGIN <= hp <= high + MAGNITUDE_MARGIN:
            print(f"dropped {row['star']}: Hp {hp} of HIP {known['hip']} is outside {low} to {high}")
            continue
        if star["constellation"] != known["constellation"]:
            print(f"dropped {row['star']}: HIP {known['hip']} lies in {star['constellation']}")
            continue
        period, epoch, event = row["period_days"], row["epoch_jd"], row["event"]
        if epoch:
            cycles = (PREDICTED_TO - float(epoch)) / float(period)
            off = cycles * float(row["period_error_days"])
            if off > LARGEST_SHARE * float(period):
                print(f"left out the epoch of {row['star']}: off by {off:.2f} days in {cycles:.0f} cycles")
                epoch = event = ""
            else:
                epochs += 1
                print(f"{row['star']}: off by up to {off:.2f} days of {period} after {cycles:.0f} cycles")
        rows.append([int(known["hip"]), row["type"], row["brightest"], row["faintest"], period, epoch, event,
                     row["period_error_days"] if epoch else ""])
    rows.sort()
    assert len({row[0] for row in rows}) == len(rows)

    head = f"""\
Bright variable stars: {len(rows)}
FROM MEMORY, all of it (variables-remembered.csv), since no package carries variable stars. Licence: MIT, as the project.
Made by make_variables.py beside this file, which keeps a row only if star-names.csv has the star, in the constellation it
is named for, and its Hp lies within {MAGNITUDE_MARGIN} of the range of V. Of {len(remembered)} remembered rows {len(rows)} are kept.
An old epoch costs the error of the period times the cycles since. Epochs ({epochs} of them) are given only where that stays
within {LARGEST_SHARE:.0%} of the period until 2050; nothing outside memory checks them. Periods of Mira and semiregular stars are a
mean; cycles wander from it by weeks.
Columns: hip = Hipparcos number; type; brightest, faintest = V, magnitudes; period_days (empty: none that lasts);
epoch_jd = heliocentric Julian date of the event named (empty: no prediction); event = minimum or maximum;
period_error_days = what the period may be off by, its known changes included."""
    out = io.StringIO()
    for text in head.splitlines():
        out.write(f"# {text}\n")
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow("hip,type,brightest,faintest,period_days,epoch_jd,event,period_error_days".split(","))
    writer.writerows(rows)
    (HERE / "variables.csv").write_text(out.getvalue(), encoding="utf-8", newline="\n")
    print(f"variables.csv: {len(rows)} stars")


if __name__ == "__main__":
    main()
