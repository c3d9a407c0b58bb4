"""Makes mount_geometry.csv, mount_worked.csv and mount_two_sides.csv: the exact geometry of a mount, from sky to axes.

requires: numpy==2.4.6
"""

import math
import random

import mount_model
import table

SIGNS = """
Columns: latitude_deg north +; hour_angle_deg west + and declination_deg north +, of the observed place (refraction included); errors in arcminutes, shown minus
  true: hour_index (hour axis shown too far west +), dec_index (declination axis angle shown too far north +), polar_high (raised end of the polar axis above its
  pole +), polar_east (raised end to the east +, an angle of azimuth), cone (line of sight leaning toward the tube end of the declination axis +),
  skew (tube end leaning toward the north celestial pole +), sag (tube droops by sag * cos(altitude)); side; then hour_axis_deg and dec_axis_deg, the
  shown axis angles with index errors, in (-180, 180] (compare modulo 360).
"""
GEOMETRY_HEAD = (
    """
Exact geometry of an equatorial mount, from an observed place to the shown axis angles: 300 random rows, and 24 about the mount's pole.
Source: own derivation by rotation matrices (mount_model.py, numpy 2.4.6), a second writing that shares no code and no order of formulas with the program;
  made by make_mount_geometry.py with a fixed seed. It reproduces mount_worked.csv.
"""
    + SIGNS.strip("\n")
    + """
  Both blank: out of reach, the place is nearer the mount's pole than cone and skew let the tube come.
Tolerance: 1e-8 degree on both axes: double precision, made worse by 1/cos(declination); rows within 1 percent of being out of reach are left out.
"""
)
WORKED_HEAD = (
    """
Worked checks of the exact geometry of an equatorial mount: six places worked before and apart from the program, to 0.00001 degree as rounded.
Source: own derivation; the expected values are those first worked, each repeated by mount_model.py in make_mount_geometry.py within the tolerance.
"""
    + SIGNS.strip("\n")
    + """
Tolerance: 0.00001 degree, twice the rounding of the printed values.
"""
)
TWO_SIDES_HEAD = """
A published pair of readings of one star on both sides of the pier.
Source: J. N. Lockyer, Stargazing, ch. XXI: a star near the upper meridian read on a quartered declination
  circle with the tube on either side; half the difference of the readings is the index error, their mean is free of it; less refraction the mean is the
  declination the instrument gives, and what it lacks of the star's is how low the instrument's pole lies.
Columns: quantity; as_printed, degrees minutes seconds (arc); value_deg, the same in degrees.
Tolerance: 0.5" on each derived value, the printed rounding being 1".
"""
COLUMNS = ["latitude_deg", "hour_angle_deg", "declination_deg", *(f"{e}_arcmin" for e in mount_model.ERRORS), "side", "hour_axis_deg", "dec_axis_deg"]
SIDES = ("tube-west", "tube-east", "single")
WORKED = (
    (50, -45, 60, (0, 0, -12, -31.1144765372, 8, -5, 0), "tube-west", "-45.17339", "59.62333"),
    (50, -45, 60, (0, 0, -12, -31.1144765372, 8, -5, 0), "tube-east", "135.63828", "120.37667"),
    (54.52, 35, 10, (31, -42, 40, -25, 18, -7, 2.5), "tube-west", "35.55029", "10.01388"),
    (54.52, 35, 10, (31, -42, 40, -25, 18, -7, 2.5), "tube-east", "-143.79492", "168.58612"),
    (-31.4, -62.5, -48, (-75, 12, -30, 55, -20, 9, 1.5), "tube-west", "-62.95812", "-48.26297"),
    (-31.4, -62.5, -48, (-75, 12, -30, 55, -20, 9, 1.5), "tube-east", "116.37516", "-131.33703"),
)


def worked():
    rows = []
    for latitude, hour_angle, declination, errors, side, hour, dec in WORKED:
        found = mount_model.axes(latitude, hour_angle, declination, errors, side)
        assert abs(found[0] - float(hour)) < 1e-5 and abs(found[1] - float(dec)) < 1e-5, (found, hour, dec)
        rows.append([latitude, hour_angle, declination, *errors, side, hour, dec])
    table.write("mount_worked.csv", WORKED_HEAD, COLUMNS, rows)


def draw(chance, near_pole):
    """A latitude, an hour angle, a declination and seven errors, as text."""
    latitude = chance.choice((-1, 1)) * chance.uniform(1, 75)
    if near_pole:
        declination = chance.choice((-1, 1)) * chance.uniform(88.8, 89.97)
    else:
        declination = math.degrees(math.asin(chance.uniform(-0.998, 0.998)))
    widest = chance.choice((120, 120, 1800))
    spans = (widest, widest, 120, 120, 60, 30)
    errors = [f"{chance.uniform(-span, span):.4f}" for span in spans] + [f"{chance.uniform(-2, 10):.4f}"]
    return [f"{latitude:.6f}", f"{chance.uniform(-180, 180):.6f}", f"{declination:.6f}"], errors


def geometry():
    chance = random.Random(18770424)
    rows, wanted = [], {False: 300, True: 24}
    for near_pole, count in wanted.items():
        made = 0
        while made < count:
            place, errors = draw(chance, near_pole)
            side = chance.choice(SIDES)
            arguments = (*map(float, place), [float(e) for e in errors], side)
            try:
                if mount_model.asked(*arguments) > 0.99:
                    continue
                shown = [table.degrees(angle) for angle in mount_model.axes(*arguments)]
            except mount_model.OutOfReach as beyond:
                if beyond.args[0] < 1.01:
                    continue
                shown = ["", ""]
            rows.append([*place, *errors, side, *shown])
            made += 1
    print(sum(row[-1] == "" for row in rows), "out of reach")
    table.write("mount_geometry.csv", GEOMETRY_HEAD, COLUMNS, rows)


def two_sides():
    printed = (
        ("reading tube on one side", "43 50 30"),
        ("reading tube on the other side", "47 00 00"),
        ("index error", "1 34 45"),
        ("mean of the readings", "45 25 15"),
        ("refraction", "0 0 07"),
        ("declination by the instrument", "45 25 08"),
        ("declination of the star", "45 52 00"),
        ("pole of the instrument too low by", "0 26 52"),
    )
    value = {name: sum(float(part) / 60**n for n, part in enumerate(text.split())) for name, text in printed}
    low, high = value["reading tube on one side"], value["reading tube on the other side"]
    derived = ((high - low) / 2, (high + low) / 2, (high + low) / 2 - value["refraction"], value["declination of the star"] - value["declination by the instrument"])
    stated = ("index error", "mean of the readings", "declination by the instrument", "pole of the instrument too low by")
    for name, found in zip(stated, derived, strict=True):
        assert abs(found - value[name]) < 0.5 / 3600, name
    table.write("mount_two_sides.csv", TWO_SIDES_HEAD, ["quantity", "as_printed", "value_deg"], [[n, t, table.degrees(value[n])] for n, t in printed])


worked()
geometry()
two_sides()
