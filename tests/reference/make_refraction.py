"""Makes refraction.csv: the Nautical Almanac's refraction and a numerical integral through an atmosphere.

requires: palpy==1.8.4, pyerfa==2.0.1.5, numpy==2.4.6
"""

import math

import erfa
import palpy

import table

HEAD = """
Atmospheric refraction in visible light, by observed (apparent) altitude: observed altitude minus true altitude, arcminutes, positive.
Sources, made by make_refraction.py:
  almanac-printed  The Nautical Almanac, refraction at 10 C and 1010 hPa as printed: 33.8' at 0 deg 00', 30.9' at 0 deg 15'.
  almanac-formula  The Nautical Almanac's formula R' = 1/tan(H + 7.32/(H + 4.32)), H in degrees, at 10 C and 1010 hPa: computed from the formula, not printed.
  integral         PyPI palpy 1.8.4 (the PAL library, GPL-2; only its numbers are here): refro(90 deg - altitude, height, temperature, pressure,
                   humidity 0.5, 0.55 micrometre, latitude 50 deg, lapse rate 0.0065 K/m, 1e-10), the numerical integral of Hohenkerk and Sinclair
                   (NAO Technical Notes 59 and 63; Explanatory Supplement 1992, 3.281); height of the pressure in the standard atmosphere.
  integral-dry     the same with humidity 0, at 10 C and 1010 hPa only, the Almanac's weather.
Columns: source; altitude_observed_deg; pressure_hpa, at the observer; temperature_c; refraction_arcmin, the reference; for comparison only
  bennett_arcmin   1/tan(H + 7.31/(H + 4.4)) * pressure/1010 * 283/(273 + temperature)  (G. G. Bennett 1982, Journal of Navigation 35)
  almanac_arcmin   the Almanac's formula * 0.28 * pressure/(temperature + 273)
  sofa_arcmin      A tan z + B tan^3 z with refco (PyPI pyerfa 2.0.1.5) at humidity 0.5, 0.55 micrometre, z the observed zenith distance; blank below 3 deg.
Tolerance: 0.1', what a circle read to the minute can show. Largest difference between formula and integral at 10 C, 1010 hPa:
{agree}
Largest difference of each comparison column from the integral, arcminutes, by band of altitude, at 10 C, 1010 hPa / over every weather below:
{bands}
  In other weather than 10 C and 1010 hPa the air below 5 deg does not bend light in proportion to pressure over temperature, and the two Almanac-like columns
  part from the integral; the real lower air departs from any model by more than that near the horizon.
"""
COLUMNS = "source altitude_observed_deg pressure_hpa temperature_c refraction_arcmin bennett_arcmin almanac_arcmin sofa_arcmin".split()
ALTITUDES = [0, 0.1, 0.25, 0.5, 0.75, 1, 1.5, 2, 2.5, 3, 3.5, 4, 4.5, 5, 6, 7, 8, 9, 10, 11, 12, 13.5, 15, 17.5, 20, 25, 30, 40, 50, 60, 70, 80, 90]
BANDS = ((0, 1), (1, 3), (3, 5), (5, 10), (10, 15), (15, 20), (20, 90.1))


def almanac(altitude, pressure=None, temperature=None):
    refraction = 1 / math.tan(math.radians(altitude + 7.32 / (altitude + 4.32)))
    return refraction if pressure is None else refraction * 0.28 * pressure / (temperature + 273)


def bennett(altitude, pressure, temperature):
    return 1 / math.tan(math.radians(altitude + 7.31 / (altitude + 4.4))) * pressure / 1010 * 283 / (273 + temperature)


def sofa(altitude, pressure, temperature):
    a, b = erfa.refco(pressure, temperature, 0.5, 0.55)
    tangent = math.tan(math.radians(90 - altitude))
    return math.degrees(a * tangent + b * tangent**3) * 60


def integral(altitude, pressure, temperature, humidity=0.5):
    height = 44330.77 * (1 - (pressure / 1013.25) ** 0.190263)
    angle = palpy.refro(math.radians(90 - altitude), height, temperature + 273.15, pressure, humidity, 0.55, math.radians(50), 0.0065, 1e-10)
    return math.degrees(angle) * 60


def row(source, altitude, pressure, temperature, refraction):
    compared = [bennett(altitude, pressure, temperature), almanac(altitude, pressure, temperature)]
    compared.append(sofa(altitude, pressure, temperature) if altitude >= 3 else None)
    cells = [f"{max(c, 0.0):.6f}" if c is not None else "" for c in compared]
    return [source, f"{altitude:g}", f"{pressure:g}", f"{temperature:g}", refraction, *cells]


def main():
    rows = [row("almanac-printed", 0, 1010, 10, "33.8"), row("almanac-printed", 0.25, 1010, 10, "30.9")]
    steps = [a / 4 for a in range(80)] + list(range(20, 91))
    rows += [row("almanac-formula", a, 1010, 10, f"{max(almanac(a), 0.0):.6f}") for a in steps]
    rows += [row("integral-dry", a, 1010, 10, f"{integral(a, 1010, 10, 0.0):.6f}") for a in ALTITUDES]
    for pressure in (700, 850, 972, 1010, 1030):
        for temperature in (-20, 0, 10, 20, 35):
            rows += [row("integral", a, pressure, temperature, f"{integral(a, pressure, temperature):.6f}") for a in ALTITUDES]
    fine = [a / 20 for a in range(1800)]
    agree = []
    for words, humidity in (("dry air", 0.0), ("humidity 0.5", 0.5)):
        worst = max((abs(almanac(a) - integral(a, 1010, 10, humidity)), a) for a in fine)
        agree.append(f"  {words}: {worst[0]:.3f}' at {worst[1]:g} deg (horizon: formula {almanac(0):.3f}', integral {integral(0, 1010, 10, humidity):.3f}')")
    bands = []
    for low, high in BANDS:
        cells = []
        for name, column in (("bennett", 5), ("almanac", 6), ("sofa", 7)):
            found = []
            for standard in (True, False):
                inside = [r for r in rows if r[0] == "integral" and low <= float(r[1]) < high and r[column] and (not standard or r[2:4] == ["1010", "10"])]
                found.append(f"{max(abs(float(r[4]) - float(r[column])) for r in inside):.3f}" if inside else "-")
            cells.append(f"{name} {found[0]} / {found[1]}")
        bands.append(f"  {low:g} to {min(high, 90):g} deg: " + "; ".join(cells))
    table.write("refraction.csv", HEAD.format(agree="\n".join(agree), bands="\n".join(bands)), COLUMNS, rows)


main()
