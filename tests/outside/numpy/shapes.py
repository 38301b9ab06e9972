"""Fourier coefficients of ideal shapes by numerical integration, as a JSON answer to a JSON question.

Each piece of a shape is a straight line over which it does not jump; quad integrates it against cos and sin.
"""

import json
import sys

import numpy as np
from scipy.integrate import quad


def pieces_of(shape, duty):
    """Pieces (from, to, value at from, value at to) of one cycle, full scale ±1."""
    if shape == "square":
        return [(0, 0.5, 1, 1), (0.5, 1, -1, -1)]
    if shape == "pulse":
        return [(0, duty, 1, 1), (duty, 1, -1, -1)]
    if shape == "sawtooth":
        return [(0, 0.5, 0, 1), (0.5, 1, -1, 0)]
    return [(0, 0.25, 0, 1), (0.25, 0.75, 1, -1), (0.75, 1, -1, 0)]


def coefficients(shape, harmonics, duty=None):
    """Mean, and the cosine and sine coefficient of each harmonic."""
    pieces = pieces_of(shape, duty)
    lines = [(a, b, lambda t, a=a, b=b, u=u, v=v: u + (v - u) * (t - a) / (b - a)) for a, b, u, v in pieces]
    mean = sum(quad(line, a, b)[0] for a, b, line in lines)

    def against(weight, n):
        return 2 * sum(quad(line, a, b, weight=weight, wvar=2 * np.pi * n)[0] for a, b, line in lines)

    return {
        "mean": mean,
        "cosines": [against("cos", n) for n in range(1, harmonics + 1)],
        "sines": [against("sin", n) for n in range(1, harmonics + 1)],
    }


json.dump([coefficients(**question) for question in json.load(sys.stdin)], sys.stdout)
