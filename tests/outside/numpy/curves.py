"""Periodic curves and transforms by SciPy and NumPy, as a JSON answer to a JSON question."""

import json
import sys

import numpy as np
from scipy.interpolate import CubicSpline, PchipInterpolator


def spline(points, at):
    """CubicSpline with bc_type="periodic", the first point again one cycle later."""
    x, y = (np.array([p[axis] for p in points]) for axis in "xy")
    curve = CubicSpline(np.append(x, x[0] + 1), np.append(y, y[0]), bc_type="periodic")
    return curve(at).tolist()


def pchip(points, at):
    """PchipInterpolator over three cycles of the points: no end is near the middle one."""
    x, y = (np.array([p[axis] for p in points]) for axis in "xy")
    curve = PchipInterpolator(np.concatenate([x - 1, x, x + 1]), np.concatenate([y, y, y]))
    return curve(at).tolist()


def transform(re, im):
    lines = np.fft.fft(np.array(re) + 1j * np.array(im))
    return {"re": lines.real.tolist(), "im": lines.imag.tolist()}


question = json.load(sys.stdin)
json.dump(
    {
        "splines": [spline(**each) for each in question["splines"]],
        "pchips": [pchip(**each) for each in question["pchips"]],
        "transforms": [transform(**each) for each in question["transforms"]],
    },
    sys.stdout,
)
