"""Writes the reference tables of this folder: comment lines, a header row, rows of CSV (UTF-8, LF)."""

import csv
import pathlib

FOLDER = pathlib.Path(__file__).resolve().parent


def degrees(value):
    """An angle in degrees to twelve decimals (4e-9 arcsecond)."""
    return f"{value:.12f}"


def write(name, head, columns, rows):
    """Write `rows` (lists of ready-made text) under `head`, a block of prose, to the file `name`."""
    rows = [[str(cell) for cell in row] for row in rows]
    for row in rows:
        if len(row) != len(columns):
            raise ValueError(f"{name}: {len(row)} cells for {len(columns)} columns: {row}")
    with open(FOLDER / name, "w", encoding="utf-8", newline="") as out:
        for line in head.strip("\n").split("\n"):
            out.write(("# " + line).rstrip() + "\n")
        table = csv.writer(out, lineterminator="\n")
        table.writerow(columns)
        table.writerows(rows)
    print(f"{name}: {len(rows)} rows")
