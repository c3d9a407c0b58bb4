"""A second, independent writing of an equatorial mount's exact geometry, from sky to axes, for the reference tables. Plain scalars and rotations.

Angles in degrees at the edges; errors in arcminutes in the order hour-circle index, declination-circle index, polar axis high, polar axis east,
cone, skew, sag. Hour angle west +, declination north +. requires: numpy==2.4.6
"""

import numpy as np

ERRORS = ("hour_index", "dec_index", "polar_high", "polar_east", "cone", "skew", "sag")


class OutOfReach(ValueError):
    """Too near the mount's own pole for the line of sight to get there; holds the sine asked for, above 1."""


def about(axis, angle):
    """Rotation of a vector about a unit axis (right-handed)."""
    x, y, z = axis
    cross = np.array([[0, -z, y], [z, 0, -x], [-y, x, 0]])
    return np.eye(3) + np.sin(angle) * cross + (1 - np.cos(angle)) * cross @ cross


def sky_in_horizon(latitude, hour_angle, declination):
    """East, north, up of a place on the sky."""
    west = np.cos(declination) * np.sin(hour_angle)
    to_meridian, to_pole = np.cos(declination) * np.cos(hour_angle), np.sin(declination)
    return np.array(
        [
            -west,
            to_pole * np.cos(latitude) - to_meridian * np.sin(latitude),
            to_pole * np.sin(latitude) + to_meridian * np.cos(latitude),
        ]
    )


def in_mount(latitude_deg, hour_angle_deg, declination_deg, errors_arcmin):
    """The observed place in the mount's own frame (x to its equator on the meridian, y west, z its north end), with cone and skew in radians."""
    latitude, hour_angle, declination = np.radians([latitude_deg, hour_angle_deg, declination_deg])
    _, _, high, east, cone, skew, sag = np.radians(np.asarray(errors_arcmin, dtype=float) / 60.0)
    w = sky_in_horizon(latitude, hour_angle, declination)
    # The tube droops, so the axes point higher by sag * cos(altitude).
    across = np.hypot(w[0], w[1])
    altitude = np.arctan2(w[2], across)
    lifted = altitude + sag * np.cos(altitude)
    w = np.array([w[0] / across * np.cos(lifted), w[1] / across * np.cos(lifted), np.sin(lifted)])
    # The raised end of the polar axis lies `high` above its pole and `east` east of it: undo both. Seen from above, "toward the east" turns
    # the north end clockwise and the south end anticlockwise; raising the north end is a turn about the west, the south end about the east.
    hemisphere = 1.0 if latitude_deg >= 0 else -1.0
    w = about((0.0, 0.0, 1.0), hemisphere * east) @ w
    w = about((1.0, 0.0, 0.0), -hemisphere * high) @ w
    v = np.array([w[2] * np.cos(latitude) - w[1] * np.sin(latitude), -w[0], w[1] * np.cos(latitude) + w[2] * np.sin(latitude)])
    return v, cone, skew


def asked(latitude_deg, hour_angle_deg, declination_deg, errors_arcmin, _side):
    """The sine the hour axis must make up for cone and skew, without sign; above 1 the place is out of reach."""
    v, cone, skew = in_mount(latitude_deg, hour_angle_deg, declination_deg, errors_arcmin)
    need = abs(sine_asked(v, cone, skew))
    if need > 1.0:
        raise OutOfReach(need)
    return need


def sine_asked(v, cone, skew):
    """Where v . t = sin(cone) leaves the tube end of the declination axis, t = (cos skew cos A, cos skew sin A, sin skew): the cosine of A from the star."""
    return (np.sin(cone) - v[2] * np.sin(skew)) / (np.cos(skew) * np.hypot(v[0], v[1]))


def axes(latitude_deg, hour_angle_deg, declination_deg, errors_arcmin, side):
    """Shown angles of the hour and declination axes, degrees in (-180, 180]. Side: tube-west, tube-east or single (as tube-west)."""
    v, cone, skew = in_mount(latitude_deg, hour_angle_deg, declination_deg, errors_arcmin)
    # The line of sight makes 90 deg - cone with the tube end of the declination axis, which stands at the hour axis angle + 90 deg and leans by
    # `skew` to the north end.
    need = sine_asked(v, cone, skew)
    if abs(need) > 1.0:
        raise OutOfReach(abs(need))
    spread = np.arccos(need)
    place = np.arctan2(v[1], v[0])
    end = place - spread if side == "tube-east" else place + spread
    hour = end - np.pi / 2
    # The declination axis angle: how far the line of sight has turned about the declination axis from the mount's equator.
    from_equator = np.array([np.cos(hour), np.sin(hour), 0.0])
    t = np.array([np.cos(skew) * np.cos(end), np.cos(skew) * np.sin(end), np.sin(skew)])
    dec = np.arctan2(v @ np.cross(from_equator, t), v @ from_equator)
    return wrap(np.degrees(hour) + errors_arcmin[0] / 60.0), wrap(np.degrees(dec) + errors_arcmin[1] / 60.0)


def wrap(angle_deg):
    """To (-180, 180]."""
    return 180.0 - (180.0 - angle_deg) % 360.0
