"""Makes moon_lit.csv: the lit share of the Moon's disc as seen from the ground, by Skyfield.

requires: skyfield==1.55, skyfield-data==7.0.0, jplephem==2.24, pyerfa==2.0.1.5, numpy==2.4.6
"""

import random

import sample
import skyfield_place
import table

HEAD = """
The share of the Moon's disc that the Sun lights, as seen from a site: 60 random sites and instants.
Source: PyPI skyfield 1.55 (MIT) with JPL DE421 from PyPI skyfield-data 7.0.0, made by make_moon_lit.py with a fixed seed:
  (earth + wgs84.latlon).at(t).observe(moon).apparent().fraction_illuminated(sun); Timescale with the constant
  TT - UT1 = 32.184 s + (TAI-UTC) - ut1_minus_utc_s of each row. TAI-UTC is 37 s after 2017; ut1_minus_utc_s is random within 0.9 s, not the Earth's.
Columns: latitude north +, longitude east +, elevation above the WGS84 ellipsoid; utc RFC 3339; illuminated, 0 to 1.
Tolerance: 0.0001. The share moves by at most half the sine of the phase angle times a change of it: the aberration of light, 20" at most, makes 0.00005;
  the Moon's place by moon98 another 0.00002.
"""
COLUMNS = "latitude_deg longitude_deg elevation_m utc ut1_minus_utc_s illuminated".split()


def main():
    chance = random.Random(48)
    earth, moon, sun = (skyfield_place.KERNEL[name] for name in ("earth", "moon", "sun"))
    rows = []
    for _ in range(60):
        cells, utc, dut1 = sample.site(chance), sample.utc(chance), sample.dut1(chance)
        latitude, longitude, elevation = (float(cell) for cell in cells)
        here = earth + skyfield_place.site(longitude, latitude, elevation)
        seen = here.at(skyfield_place.instant(utc, float(dut1))).observe(moon).apparent()
        rows.append([*cells, utc, dut1, f"{seen.fraction_illuminated(sun):.6f}"])
    table.write("moon_lit.csv", HEAD, COLUMNS, rows)


main()
