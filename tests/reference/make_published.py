"""Makes published_usno_jpl.csv and published_rise_set.csv from tables the US Naval Observatory and JPL published.

requires: the source archive of ephem==4.2.1, unpacked: pip download --no-deps --no-binary ephem ephem==4.2.1; tar xzf ephem-4.2.1.tar.gz
usage: python make_published.py ephem-4.2.1
"""

import datetime
import pathlib
import re
import sys

import table

SOURCE = """
Source: outputs of the US Naval Observatory ({usno}){jpl}
  as kept in the source archive of PyPI ephem 4.2.1 (MIT licence; works of the US government, public domain), folder ephem/tests; transcribed by
  make_published.py, digit for digit.
"""
PLACES_HEAD = (
    """
Published apparent places of bodies on the true equator and equinox of date, and JPL's places on ICRF/J2000.0.
"""
    + SOURCE.strip("\n").format(usno="MICA / web, 2006 and 2008", jpl="\n  and of JPL's Horizons system (May 2008, DE405, airless)")
    + """
Columns: publisher; kind: topocentric-apparent, geocentric-apparent, geocentric-j2000; body; instant as printed with its scale (time_scale: UT1 in USNO tables, UT
  in Horizons, which is UTC after 1962); site: latitude north +, longitude east +, elevation (blank at the geocentre); ra_printed h m s and
  dec_printed d m s as printed; ra_deg, dec_deg the same in degrees; distance as printed and its unit (blank where not printed);
  ra_rounding_arcsec and dec_rounding_arcsec, one unit of the last printed place (right ascension not yet times cos dec).
  Horizons' apparent right ascension is on the equinox of date by the IAU 1976/1980 models with its corrections to the pole.
  USNO prints no catalogue place for Deneb: HIP 102098 of Hipparcos, the New Reduction, with radial velocity -4.5 km/s, is what the figures below were had with.
Tolerance: largest differences, right ascension times cos dec and declination, of PyPI skyfield 1.55 with DE421 at the same UT1 or UTC (Earth rotation as in its built-in
  table): USNO Deneb 0.03", Sun 0.04", Jupiter 0.06", Moon 0.34" (a steady 0.3" in right ascension; the cause is not known here); Horizons 0.21" (half the last place is 0.075" in
  right ascension, and Saturn is its centre, not the barycentre of its system). Allow those plus 0.02"; and what moon98 and plan94 are off by
  (places_bodies.csv) for a program without an ephemeris file.
"""
)
RISE_HEAD = (
    """
Published times of rising, transit and setting, and of the phases of the Moon.
"""
    + SOURCE.strip("\n").format(usno="Astronomical Applications Department, tables of 1984, 2006 and 2007", jpl="")
    + """
Columns: body; event: rise, transit, lower-transit, set, new-moon, first-quarter, full-moon, last-quarter; latitude north +, longitude east +, elevation of the site (blank for phases);
  local_date, local_time as printed and zone_hours (east +) it is printed in; utc, the same as RFC 3339 (UT); azimuth_deg or altitude_deg as printed, rounded to
  a degree, altitude with its bearing (S or N of the zenith) in altitude_from. An event the table marks as not happening (*****) has utc null.
  A day with no entry at all in a table of a year has no row.
  Rise and set are of the upper limb of Sun and Moon and a star's centre, with 34' of refraction and a level horizon.
Tolerance: 1 minute. Half of it is printing to the minute: PyPI skyfield 1.55 with DE421 (Sun at -50', Moon at -(34' + its semidiameter), star at -34') puts every printed
  rise, transit and set within 0.56 minute of its own, azimuths within 0.55 degree and altitudes at transit, airless against printed, within 0.69 degree.
"""
)
MONTHS = {name: number for number, name in enumerate("Jan Feb Mar Apr May Jun Jul Aug Sep Oct Nov Dec".split(), start=1)}
SITE = re.compile(r"Location:\s+([WE])\s*(\d+)°(\d+)'([\d.]+)\",\s+([NS])\s*(\d+)°(\d+)'([\d.]+)\",\s+(-?\d+)m")


def site(text):
    """Latitude, longitude [deg], elevation [m] as text; blanks at the geocentre."""
    found = SITE.search(text)
    if not found:
        return ["", "", ""]
    east, d, m, s, north, dd, mm, ss, elevation = found.groups()
    longitude = (int(d) + int(m) / 60 + float(s) / 3600) * (1 if east == "E" else -1)
    latitude = (int(dd) + int(mm) / 60 + float(ss) / 3600) * (1 if north == "N" else -1)
    return [table.degrees(latitude), table.degrees(longitude), elevation]


def sexagesimal(text):
    """Degrees (or hours) of printed text such as "- 05  4 33.70"."""
    sign = -1 if text.strip().startswith("-") else 1
    whole, minutes, seconds = text.replace("+", " ").replace("-", " ").split()
    return sign * (int(whole) + int(minutes) / 60 + float(seconds) / 3600)


def last_place(text):
    return 10.0 ** -len(text.rsplit(".", 1)[1])


def place_row(publisher, kind, body, instant, scale, where, ra, dec, distance, unit):
    ra, dec = " ".join(ra.split()), " ".join(dec.replace("+", "+ ").replace("-", "- ").split()).replace("+ ", "+").replace("- ", "-")
    return [publisher, kind, body, instant, scale, *where, ra, dec, table.degrees(sexagesimal(ra) * 15), table.degrees(sexagesimal(dec)), distance, unit,
            f"{15 * last_place(ra):g}", f"{last_place(dec):g}"]  # fmt: skip


def usno_places(folder):
    rows = []
    line_shape = re.compile(r"(\d{4}) (\w{3}) (\d\d) (\d\d:\d\d:\d\d\.\d)\s+(\d+\s+\d+\s+[\d.]+)\s+([+-]\s*\d+\s+\d+\s+[\d.]+)\s*([\d.]*)(\s+[+-].*)?$")
    for name, kind in (("apptopo", "topocentric-apparent"), ("appgeo", "geocentric-apparent")):
        for path in sorted((folder / "usno").glob(f"{name}_*.txt")):
            text = path.read_text(encoding="utf-8")
            body, where = text.split("\n")[0].strip(), site(text)
            unit_named = re.search(r"\s(AU|km)\s", text)
            for line in text.split("\n"):
                found = line_shape.match(line.rstrip())
                if found:
                    year, month, day, clock, ra, dec, distance, _ = found.groups()
                    unit = unit_named.group(1) if distance else ""
                    instant = f"{year}-{MONTHS[month]:02d}-{day}T{clock}"
                    rows.append(place_row("USNO", kind, body, instant, "UT1", where, ra, dec, distance, unit))
    return rows


def jpl_places(folder):
    rows = []
    for path in sorted((folder / "jpl").glob("*.txt")):
        text = path.read_text(encoding="utf-8")
        body = re.search(r"Target body name: (\w+)", text).group(1)
        if body not in ("Mars", "Jupiter", "Saturn", "Uranus", "Neptune"):
            continue
        for line in text.split("$$SOE")[1].split("$$EOE")[0].strip("\n").split("\n"):
            date, clock = line[1:12], line[13:18]
            year, month, day = date.split("-")
            instant = f"{year}-{MONTHS[month]:02d}-{day}T{clock}:00"
            for kind, start in (("geocentric-j2000", 23), ("geocentric-apparent", 47)):
                rows.append(place_row("JPL Horizons", kind, body, instant, "UT", ["", "", ""], line[start : start + 11], line[start + 12 : start + 23], "", ""))
    return rows


def event_row(body, event, where, date, clock, zone, azimuth="", altitude="", side=""):
    if clock is None:
        utc = "null"
    else:
        local = datetime.datetime.combine(date, datetime.time(int(clock[:2]), int(clock[-2:])))
        utc = (local - datetime.timedelta(hours=zone)).strftime("%Y-%m-%dT%H:%M:00Z")
    return [body, event, *where, date.isoformat(), f"{clock[:2]}:{clock[-2:]}" if clock else "null", zone, utc, azimuth, altitude, side]


def transits(folder):
    rows = []
    for path in sorted((folder / "usno").glob("risettran_*.txt")):
        text = path.read_text(encoding="utf-8")
        body, where = text.split("\n")[0].strip(), site(text)
        zone = -int(re.search(r"Time Zone:\s+(\d+)h 00m west", text).group(1))
        for line in text.split("\n"):
            if not re.match(r"\d{4} \w{3} \d\d ", line):
                continue
            year, month, day = line[:11].split()
            date = datetime.date(int(year), MONTHS[month], int(day))
            for event, start in (("rise", 25), ("transit", 42), ("set", 59), ("lower-transit", 76)):
                cell = line[start : start + 9].split()
                if not cell:
                    continue
                clock = None if cell[0] == "*****" else cell[0]
                angle = "" if clock is None else cell[1]
                assert clock is None or len(cell[0]) == 5 and len(cell) == 2, line
                if event in ("rise", "set"):
                    rows.append(event_row(body, event, where, date, clock, zone, azimuth=angle))
                else:
                    side = angle[-1]
                    rows.append(event_row(body, event, where, date, clock, zone, altitude=angle[:-1], side=side))
    return rows


def years(folder):
    rows = []
    for path in sorted((folder / "usno").glob("riset_*.txt")):
        text = path.read_text(encoding="utf-8")
        body, year = re.search(r"Rise and Set for the (\w+) for (\d+)", text).groups()
        east, d, m, north, dd, mm = re.search(r"Location: ([WE])(\d+) (\d+), ([NS])(\d+) (\d+)", text).groups()
        longitude = (int(d) + int(m) / 60) * (1 if east == "E" else -1)
        latitude = (int(dd) + int(mm) / 60) * (1 if north == "N" else -1)
        where = [table.degrees(latitude), table.degrees(longitude), "0"]
        assert "Eastern Standard Time" in text
        for line in text.split("\n"):
            if not re.match(r"\d\d  ", line):
                continue
            for month in range(1, 13):
                start = month * 11 - 7
                for event, cell in (("rise", line[start : start + 4]), ("set", line[start + 5 : start + 9])):
                    if cell.strip():
                        rows.append(event_row(body, event, where, datetime.date(int(year), month, int(line[:2])), cell, -5))
    return rows


def phases(folder):
    text = (folder / "usno" / "moon_phases.txt").read_text(encoding="utf-8")
    year = int(text.split()[0])
    rows = []
    for line in text.split("d  h  m\n", 1)[1].split("\n"):
        for event, start in (("new-moon", 4), ("first-quarter", 20), ("full-moon", 36), ("last-quarter", 52)):
            cell = line[start : start + 12].split()
            if cell:
                month, day, hour, minute = cell
                rows.append(event_row("Moon", event, ["", "", ""], datetime.date(year, MONTHS[month], int(day)), f"{int(hour):02d}:{minute}", 0))
    return rows


def main():
    folder = pathlib.Path(sys.argv[1]) / "ephem" / "tests"
    columns = "publisher kind body instant time_scale latitude_deg longitude_deg elevation_m ra_printed dec_printed ra_deg dec_deg distance distance_unit ra_rounding_arcsec dec_rounding_arcsec"
    table.write("published_usno_jpl.csv", PLACES_HEAD, columns.split(), usno_places(folder) + jpl_places(folder))
    columns = "body event latitude_deg longitude_deg elevation_m local_date local_time zone_hours utc azimuth_deg altitude_deg altitude_from"
    table.write("published_rise_set.csv", RISE_HEAD, columns.split(), years(folder) + transits(folder) + phases(folder))


main()
