"""Makes mount_map_readings.csv, mount_map_expected.csv and mount_map_predictions.csv: an estimate of a mount's errors from readings.

requires: numpy==2.4.6, scipy==1.17.1
"""

import math
import random

import numpy as np
from scipy.optimize import least_squares

import mount_model
import table

ABOUT = """
Maximum a posteriori estimate of a mount's seven errors from circle readings of stars, {cases} made-up mounts, in three files that go together:
  mount_map_readings.csv, the readings; mount_map_expected.csv, prior and estimate; mount_map_predictions.csv, predictions from it.
Source: own computation apart from the program, made by make_mount_map.py with a fixed seed: exact geometry of mount_model.py, scipy 1.17.1
  optimize.least_squares with derivatives by finite differences on [(shown - model) / sigma, error / prior sigma]; prior means are zero;
  covariance = inverse of J'WJ + prior precision at the estimate, J by central differences of fourth order.
Signs and error names as in mount_geometry.csv.
"""
READINGS_HEAD = """
Columns: case; latitude_deg; hour_angle_deg and declination_deg of the observed place; side; the shown axis angles hour_axis_deg and dec_axis_deg, made from the
  mount's true errors with noise cut off at two sigma (no reading lies beyond three sigma of the fit, where robust weights are 1);
  sigma_hour_arcmin and sigma_dec_arcmin of the two readings.
"""
EXPECTED_HEAD = """
Columns: case; prior_*_arcmin, one sigma of each error; the estimated error in arcminutes; covariance_arcmin2, 49 numbers by rows, parted by spaces, in the
  order hour_index dec_index polar_high polar_east cone skew sag; largest_residual_sigma, over hour and declination of the readings.
Tolerance: 0.001' on each error (the fit is converged to some 1e-6', a thousandth of the smallest sigma is {sigma:.4f}'), a relative 1e-5 of
  sqrt(C_ii C_jj) on each covariance (finite differences are good to 1e-8; a Gauss-Newton matrix taken one step before the end moves it by less).
"""
PREDICTIONS_HEAD = """
Columns: case; hour_angle_deg and declination_deg of an observed place, side; the axis angles to be shown there by the estimate; covariance of that prediction in
  arcmin^2 (hour axis variance, covariance, declination axis variance), without the error of setting: J C J'.
Tolerance: 1e-5 degree on the angles; relative 1e-5 on the covariances, and on their covariance 1e-5 of the product of the sigmas.
"""
ERRORS = mount_model.ERRORS
DEFAULT_PRIOR = (3600.0, 3600.0, 60.0, 60.0, 30.0, 12.0, 3.0)
STANDING_PRIOR = (3600.0, 3600.0, 6.0, 8.0, 5.0, 4.0, 2.0)
# Number of readings, sides, prior, (sigma hour, sigma dec) in arcminutes.
CASES = (
    (1, ("tube-west",), DEFAULT_PRIOR, (2.5, 9.0)),
    (1, ("single",), DEFAULT_PRIOR, (22.5, 18.0)),
    (2, ("tube-west", "tube-east"), DEFAULT_PRIOR, (2.5, 2.5)),
    (2, ("tube-east",), DEFAULT_PRIOR, (11.25, 9.0)),
    (3, ("tube-west", "tube-east"), DEFAULT_PRIOR, (2.5, 9.0)),
    (3, ("tube-west", "tube-east"), STANDING_PRIOR, (0.5, 0.5)),
    (4, ("single",), DEFAULT_PRIOR, (22.5, 18.0)),
    (4, ("tube-west", "tube-east"), DEFAULT_PRIOR, (11.25, 9.0)),
    (6, ("tube-west", "tube-east"), DEFAULT_PRIOR, (2.5, 9.0)),
    (6, ("tube-west", "tube-east"), DEFAULT_PRIOR, (0.5, 0.2)),
    (6, ("single",), DEFAULT_PRIOR, (2.5, 2.5)),
    (8, ("tube-west", "tube-east"), STANDING_PRIOR, (1.0, 1.0)),
    (12, ("tube-west", "tube-east"), DEFAULT_PRIOR, (2.5, 9.0)),
    (12, ("tube-west", "tube-east"), DEFAULT_PRIOR, (11.25, 9.0)),
)


def star_up(chance, latitude):
    """A place at least 15 degrees high and 10 from the poles, rounded as it is written."""
    while True:
        hour_angle, declination = round(chance.uniform(-110, 110), 6), round(math.degrees(math.asin(chance.uniform(-0.985, 0.985))), 6)
        if mount_model.sky_in_horizon(*np.radians([latitude, hour_angle, declination]))[2] > math.sin(math.radians(15)):
            return hour_angle, declination


def noise(chance, sigma):
    while True:
        drawn = chance.gauss(0, 1)
        if abs(drawn) < 2.0:
            return drawn * sigma


def axes_arcmin(latitude, place, side, errors):
    return np.array(mount_model.axes(latitude, *place, errors, side)) * 60.0


def jacobian(latitude, place, side, errors, step=4.0):
    """Derivative of the axis angles by the errors, central differences of fourth order, steps in arcminutes."""
    columns = []
    for index in range(7):
        values = []
        for times in (-2, -1, 1, 2):
            moved = np.array(errors, dtype=float)
            moved[index] += times * step
            values.append(axes_arcmin(latitude, place, side, moved))
        here = [(v - values[0] + 10800.0) % 21600.0 - 10800.0 for v in values]
        columns.append((here[0] - 8 * here[1] + 8 * here[2] - here[3]) / (12 * step))
    return np.array(columns).T


def fit(latitude, readings, prior):
    """Estimate and covariance. A reading is (place, side, shown [arcmin], sigma [arcmin])."""

    def residuals(errors):
        parts = []
        for place, side, shown, sigma in readings:
            off = (shown - axes_arcmin(latitude, place, side, errors) + 10800.0) % 21600.0 - 10800.0
            parts.append(off / sigma)
        return np.concatenate([*parts, np.asarray(errors) / prior])

    solved = least_squares(residuals, np.zeros(7), jac="3-point", x_scale=np.asarray(prior), xtol=1e-15, ftol=1e-15, gtol=1e-15, max_nfev=500)
    information = np.diag(1.0 / np.square(prior))
    gradient = solved.x / np.square(prior)
    for place, side, shown, sigma in readings:
        slope = jacobian(latitude, place, side, solved.x)
        weight = np.diag(1.0 / np.square(sigma))
        information += slope.T @ weight @ slope
        off = (shown - axes_arcmin(latitude, place, side, solved.x) + 10800.0) % 21600.0 - 10800.0
        gradient = gradient - slope.T @ weight @ off
    covariance = np.linalg.inv(information)
    left = np.abs(covariance @ gradient) / np.sqrt(np.diag(covariance))
    assert left.max() < 1e-6, left
    return solved.x, covariance, float(np.abs(residuals(solved.x)[:-7]).max())


def main():
    chance = random.Random(18090430)
    readings_rows, expected_rows, prediction_rows, smallest = [], [], [], np.inf
    for number, (count, sides, prior, sigma) in enumerate(CASES, start=1):
        latitude = round((1 if number % 2 else -1) * chance.uniform(8, 62), 6)
        true = [chance.uniform(-900, 900), chance.uniform(-900, 900)] + [chance.gauss(0, 0.8 * s) for s in prior[2:]]
        readings = []
        for index in range(count):
            place, side = star_up(chance, latitude), sides[index % len(sides)]
            clean = axes_arcmin(latitude, place, side, true) / 60.0
            shown = [round(float(clean[axis]) + noise(chance, sigma[axis]) / 60.0, 6) for axis in (0, 1)]
            readings.append((place, side, np.array(shown) * 60.0, np.array(sigma)))
            readings_rows.append([number, f"{latitude:.6f}", *(f"{p:.6f}" for p in place), side, *(f"{s:.6f}" for s in shown), *sigma])
        errors, covariance, largest = fit(latitude, readings, prior)
        assert largest < 2.1, (number, largest)
        smallest = min(smallest, float(np.sqrt(np.diag(covariance)).min()))
        flat = " ".join(f"{c:.12e}" for c in covariance.ravel())
        expected_rows.append([number, *prior, *(f"{e:.9f}" for e in errors), flat, f"{largest:.6f}"])
        for _ in range(3):
            place, side = star_up(chance, latitude), chance.choice(sides if sides == ("single",) else ("tube-west", "tube-east"))
            shown = axes_arcmin(latitude, place, side, errors) / 60.0
            slope = jacobian(latitude, place, side, errors)
            spread = slope @ covariance @ slope.T
            cells = [f"{spread[0, 0]:.12e}", f"{spread[0, 1]:.12e}", f"{spread[1, 1]:.12e}"]
            prediction_rows.append([number, f"{latitude:.6f}", *(f"{p:.6f}" for p in place), side, *(table.degrees(s) for s in shown), *cells])
    about = ABOUT.format(cases=len(CASES)).strip("\n")
    place = ["case", "latitude_deg", "hour_angle_deg", "declination_deg", "side", "hour_axis_deg", "dec_axis_deg"]
    table.write("mount_map_readings.csv", about + READINGS_HEAD, [*place, "sigma_hour_arcmin", "sigma_dec_arcmin"], readings_rows)
    table.write(
        "mount_map_expected.csv",
        about + EXPECTED_HEAD.format(sigma=smallest / 1000),
        ["case", *(f"prior_{e}_arcmin" for e in ERRORS), *(f"{e}_arcmin" for e in ERRORS), "covariance_arcmin2", "largest_residual_sigma"],
        expected_rows,
    )
    table.write("mount_map_predictions.csv", about + PREDICTIONS_HEAD, [*place, "hour_variance_arcmin2", "covariance_arcmin2", "dec_variance_arcmin2"], prediction_rows)


main()
