"""Makes dome.csv: where the slit of a dome must stand and where the eyepiece is, on mounts with errors, on either side.

requires: numpy==2.4.6, scipy==1.17.1
"""

import math
import random

import numpy as np
import table
from scipy.optimize import least_squares

HEAD = """
Where the slit must stand and where the eyepiece is: 120 random places on mounts with errors, on either side of the pier, both hemispheres.
Source: own derivation (make_dome.py, numpy 2.4.6, scipy 1.17.1), by vectors in the horizon frame: the axis angles are found by least squares from
  the pointing of a mount whose axes are built one upon the other, not by any formula of the program; the line of sight is halved until the
  point where it leaves the sphere is left.
Columns: latitude_deg north +; hour_angle_deg west + and declination_deg north + of the observed place; errors in arcminutes as in mount_geometry.csv;
  side; radius_m of the dome; axes_east_m, axes_north_m, axes_up_m, the crossing of the axes from the sphere's centre; offset_m from the crossing along the
  declination axis to the tube; eyepiece_m from there away from the sky; floor_m, the crossing above the floor; then slit_azimuth_deg from north through
  east and slit_altitude_deg from the sphere's centre; eyepiece_height_m above the floor, eyepiece_east_m and eyepiece_north_m from the crossing.
Tolerance: 0.02 degree and 0.002 m: the sag, 3' at the most, is left out here; it turns the axes by 0.05 degree, and the tube's end by 0.8 m times that.
"""
ERRORS = ("hour_index", "dec_index", "polar_high", "polar_east", "cone", "skew", "sag")
COLUMNS = [
    "latitude_deg", "hour_angle_deg", "declination_deg", *(f"{name}_arcmin" for name in ERRORS), "side",
    "radius_m", "axes_east_m", "axes_north_m", "axes_up_m", "offset_m", "eyepiece_m", "floor_m",
    "slit_azimuth_deg", "slit_altitude_deg", "eyepiece_height_m", "eyepiece_east_m", "eyepiece_north_m",
]  # fmt: skip


def toward(azimuth, altitude):
    """East, north, up."""
    return np.array([math.sin(azimuth) * math.cos(altitude), math.cos(azimuth) * math.cos(altitude), math.sin(altitude)])


def star(latitude, hour_angle, declination):
    """Where a place is, by the triangle of pole, zenith and star."""
    sine = math.sin(latitude) * math.sin(declination) + math.cos(latitude) * math.cos(declination) * math.cos(hour_angle)
    east = -math.cos(declination) * math.sin(hour_angle)
    north = math.cos(latitude) * math.sin(declination) - math.sin(latitude) * math.cos(declination) * math.cos(hour_angle)
    return np.array([east, north, sine])


def turned(vector, axis, angle):
    """A vector turned about an axis by the right hand."""
    return vector * math.cos(angle) + np.cross(axis, vector) * math.sin(angle) + axis * np.dot(axis, vector) * (1 - math.cos(angle))


def built(latitude, high, east, skew):
    """The mount as it is put together: the pole, and tube and declination axis at hour axis 0 and declination axis 0."""
    raised = abs(latitude) + high
    azimuth = east if latitude >= 0 else math.pi - east
    end = toward(azimuth, raised)
    pole = end if latitude >= 0 else -end
    # with the hour axis at 0 the equator's tube looks up the meridian of the mount
    up = toward(azimuth, raised + math.pi / 2)
    # the tube end of the declination axis, west of it, leaning toward the pole by the skew
    west = np.cross(up, pole)
    assert np.dot(west, toward(azimuth - math.pi / 2 if latitude >= 0 else azimuth + math.pi / 2, 0.0)) > 0.999
    tube_end = west * math.cos(skew) + pole * math.sin(skew)
    return pole, up, tube_end


def pointing(mount, hour, dec, cone):
    """Line of sight and tube end of the declination axis for two axis angles."""
    pole, up, tube_end = mount
    # westward is against the right hand about the north pole
    end = turned(tube_end, pole, -hour)
    sight = turned(up, pole, -hour)
    # turning about the declination axis from the equator northward
    north = np.cross(sight, end) if np.dot(np.cross(sight, end), pole) > 0 else np.cross(end, sight)
    across = sight * math.cos(dec) + north * math.sin(dec)
    return across * math.cos(cone) + end * math.sin(cone), end


def axes(mount, wanted, start, cone):
    def off(angles):
        return pointing(mount, *angles, cone)[0] - wanted

    found = least_squares(off, start, xtol=1e-15, ftol=1e-15, gtol=1e-15)
    assert np.linalg.norm(found.fun) < 1e-9, found
    return found.x


def leaves(start, direction, radius):
    """Where a line leaves the sphere, by halving."""
    low, high = 0.0, 4 * radius + np.linalg.norm(start)
    for _ in range(200):
        middle = (low + high) / 2
        if np.linalg.norm(start + middle * direction) < radius:
            low = middle
        else:
            high = middle
    return start + low * direction


def rows():
    chance = random.Random(20261201)
    made = []
    while len(made) < 120:
        latitude = chance.choice((-1, 1)) * chance.uniform(5, 70)
        hour_angle, declination = chance.uniform(-100, 100), math.degrees(math.asin(chance.uniform(-0.9, 0.9)))
        wanted = star(*map(math.radians, (latitude, hour_angle, declination)))
        if wanted[2] < math.sin(math.radians(10)):
            continue
        spans = (1800, 1800, 120, 120, 60, 30)
        errors = [round(chance.uniform(-span, span), 3) for span in spans] + [round(chance.uniform(0, 3), 3)]
        _, _, high, east, cone, skew, _ = (math.radians(error / 60) for error in errors)
        side = chance.choice(("tube-west", "tube-east"))
        radius = round(chance.uniform(2.5, 4), 3)
        crossing = [round(chance.uniform(-0.4, 0.4), 3) for _ in range(3)]
        offset, eyepiece, floor = (round(chance.uniform(*span), 3) for span in ((0.1, 0.8), (-1, 2), (1.2, 2.5)))
        mount = built(math.radians(latitude), high, east, skew)
        h, d = math.radians(hour_angle), math.radians(declination)
        start = (h, d) if side == "tube-west" else (h - math.pi, math.pi - d)
        hour, dec = axes(mount, wanted, start, cone)
        sight, end = pointing(mount, hour, dec, cone)
        foot = offset * end
        out = leaves(np.array(crossing) + foot, sight, radius)
        behind = foot - eyepiece * sight
        azimuth = math.degrees(math.atan2(out[0], out[1])) % 360
        altitude = math.degrees(math.asin(out[2] / radius))
        made.append([
            f"{latitude:.6f}", f"{hour_angle:.6f}", f"{declination:.6f}", *errors, side, radius, *crossing, offset, eyepiece, floor,
            f"{azimuth:.6f}", f"{altitude:.6f}", f"{floor + behind[2]:.6f}", f"{behind[0]:.6f}", f"{behind[1]:.6f}",
        ])  # fmt: skip
    return made


table.write("dome.csv", HEAD, COLUMNS, rows())
