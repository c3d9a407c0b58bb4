"""Makes chance.csv: the chance that a place uncertain by a bivariate normal distribution lies in a round field.

requires: scipy==1.17.1, numpy==2.4.6
"""

import math
import random

from scipy.integrate import quad
from scipy.special import erf

import table

HEAD = """
Chance that a place lies in a round field, its error a bivariate normal distribution about the middle of the field: {count} distributions.
Source: own computation apart from the program, made by make_chance.py with a fixed seed: slices across the long axis of the distribution,
  scipy 1.17.1 integrate.quad over R sin t of the normal density along it times special.erf across it. The program integrates over an angle instead.
Columns: covariance on the sky, west_variance_arcmin2, covariance_arcmin2, north_variance_arcmin2 (westward cos(declination) * hour angle; northward declination);
  field_arcmin, the diameter of the field; chance, 0 to 1.
Tolerance: 1e-6: the integral here is good to 1e-10, the covariances are rounded to twelve digits, and 0.1 percent is all an observer can use.
"""
COLUMNS = ["west_variance_arcmin2", "covariance_arcmin2", "north_variance_arcmin2", "field_arcmin", "chance"]


def chance(long, short, radius):
    """Slices across the long axis; long and short are the sigmas along the axes."""

    def slice_at(t):
        along, half_width = radius * math.sin(t), radius * math.cos(t)
        density = math.exp(-0.5 * (along / long) ** 2) / (math.sqrt(2 * math.pi) * long)
        return density * erf(half_width / (math.sqrt(2) * short)) * half_width

    # the density is narrow where the field is wide: break the range at one, three and nine sigma
    breaks = [math.asin(n * long / radius) for n in (1, 3, 9) if n * long < radius]
    edges = [0.0, *breaks, math.pi / 2]
    parts = [quad(slice_at, low, high, epsabs=1e-13, epsrel=1e-12, limit=500) for low, high in zip(edges, edges[1:])]
    assert sum(error for _, error in parts) < 1e-10, parts
    return 2 * sum(value for value, _ in parts)


def main():
    draw = random.Random(17770430)
    # the one with a closed form
    assert abs(chance(7.0, 7.0, 11.0) - (1 - math.exp(-0.5 * (11 / 7) ** 2))) < 1e-12
    rows = []
    for ratio in (1.0, 0.7, 0.3, 0.1, 0.03, 0.01, 0.001):
        for field_over_long in (0.05, 0.3, 1.0, 2.0, 4.0, 10.0):
            long = 10 ** draw.uniform(0.0, 2.3)
            short, radius, turn = long * ratio, long * field_over_long / 2, draw.uniform(0, math.pi)
            cos, sin = math.cos(turn), math.sin(turn)
            west = (long * cos) ** 2 + (short * sin) ** 2
            north = (long * sin) ** 2 + (short * cos) ** 2
            together = (long**2 - short**2) * cos * sin
            rows.append([f"{west:.12e}", f"{together:.12e}", f"{north:.12e}", f"{2 * radius:.12e}", f"{chance(long, short, radius):.10f}"])
    table.write("chance.csv", HEAD.format(count=len(rows)), COLUMNS, rows)


main()
