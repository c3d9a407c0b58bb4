"""Makes eyepiece.csv: how the picture in an eyepiece is turned, by rays traced through lenses and mirrors.

requires: numpy==2.4.6, pyerfa==2.0.1.5
"""

import math
import random

import erfa
import numpy as np
import table

HEAD = """
How north and east lie in the picture of an eyepiece: 150 random places on a mount without errors, on either side of the pier, both hemispheres.
Source: own computation apart from the program (make_eyepiece.py, numpy 2.4.6): the ray through the middle of the objective from a point
  0.0001 radian north, or east, of the middle of the field is traced through mirrors and a lens to the eye of an observer whose head is upright.
  Places on the horizon are from hd2ae, the parallactic angle from hd2pa, of pyerfa 2.0.1.5.
Columns: latitude_deg north +; hour_angle_deg west +, declination_deg north +; side of the tube; optic: straight (a refractor looked through along
  the tube), newtonian (an eyepiece at the side behind a flat mirror) or diagonal (a refractor with a star diagonal); turned_deg, where the eyepiece
  stands about the tube, from the tube end of the declination axis clockwise looking toward the sky, empty for straight; parallactic_deg, the
  position angle of the zenith; north_right, north_up, east_right, east_up, the direction of north and of east in the picture, as unit vectors.
Tolerance: 0.001 (0.06 degree): the steps of 0.0001 radian are straight only to a part in some thousands where the place is near the pole.
"""
COLUMNS = [
    "latitude_deg", "hour_angle_deg", "declination_deg", "side", "optic", "turned_deg", "parallactic_deg",
    "north_right", "north_up", "east_right", "east_up",
]  # fmt: skip
STEP = 1e-4
FOCAL, EYEPIECE = 1.2, 0.025
UP = np.array([0.0, 0.0, 1.0])


def unit(vector):
    return vector / np.linalg.norm(vector)


def star(latitude, hour_angle, declination):
    azimuth, altitude = erfa.hd2ae(hour_angle, declination, latitude)
    return np.array([math.sin(azimuth) * math.cos(altitude), math.cos(azimuth) * math.cos(altitude), math.sin(altitude)])


def reflected(ray, mirror):
    return ray - 2 * np.dot(ray, mirror) * mirror


def hits(point, ray, on_plane, normal):
    return point + ray * np.dot(on_plane - point, normal) / np.dot(ray, normal)


def seen(source, sight, optic, side):
    """Right and up, to the eye, of a source of light near the line of sight."""
    point, ray = np.zeros(3), -source
    if optic == "newtonian":
        # the middle of the main mirror, whose axis is the line of sight
        ray, axis = reflected(ray, sight), sight
    else:
        axis = -sight
    if optic == "straight":
        out = axis
        lens = axis * (FOCAL + EYEPIECE)
    else:
        out = side
        flat = axis * (FOCAL * 0.8)
        mirror = unit(axis - out)
        point, ray = hits(point, ray, flat, mirror), reflected(ray, mirror)
        lens = flat + out * (FOCAL * 0.2 + EYEPIECE)
    point = hits(point, ray, lens, out)
    ray = ray / np.dot(ray, out)
    # a thin lens bends a ray toward its axis by its height over the focal length
    ray = ray - (point - lens) / EYEPIECE
    look = -out
    up = unit(UP - np.dot(UP, look) * look)
    right = np.cross(look, up)
    toward = -ray
    return np.array([np.dot(toward, right), np.dot(toward, up)])


def rows():
    chance = random.Random(20261201)
    made = []
    while len(made) < 150:
        latitude, hour_angle = chance.choice((-1, 1)) * chance.uniform(5, 75), chance.uniform(-110, 110)
        declination = math.degrees(math.asin(chance.uniform(-0.97, 0.97)))
        # as the table writes them
        texts = f"{latitude:.6f}", f"{hour_angle:.6f}", f"{declination:.6f}"
        phi, h, d = (math.radians(float(text)) for text in texts)
        sight = star(phi, h, d)
        if not math.sin(math.radians(5)) < sight[2] < math.sin(math.radians(88)):
            continue
        side = chance.choice(("tube-west", "tube-east"))
        optic = chance.choice(("straight", "newtonian", "diagonal"))
        turned = chance.uniform(0, 360)
        end = star(phi, h + math.pi / 2 * (1 if side == "tube-west" else -1), 0.0)
        clockwise = np.cross(sight, end)
        eyepiece = end * math.cos(math.radians(turned)) + clockwise * math.sin(math.radians(turned))
        if optic != "straight" and abs(eyepiece[2]) > math.sin(math.radians(89)):
            continue
        north = star(phi, h, d + STEP)
        east = star(phi, h - STEP / math.cos(d), d)
        north, east = (unit(seen(source, sight, optic, eyepiece)) for source in (north, east))
        parallactic = math.degrees(erfa.hd2pa(h, d, phi))
        made.append([
            *texts, side, optic, "" if optic == "straight" else f"{turned:.6f}", f"{parallactic:.6f}",
            *(f"{part:.6f}" for part in (*north, *east)),
        ])  # fmt: skip
    return made


table.write("eyepiece.csv", HEAD, COLUMNS, rows())
