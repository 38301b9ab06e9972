"""CIE 1976 lightness of relative luminances and back, as CIE 15:2004, 8.2.1, prints it, in JSON."""

import json
import sys

import numpy as np


def lightness(y):
    return 116 * np.where(y > (24 / 116) ** 3, np.cbrt(y), 841 / 108 * y + 16 / 116) - 16


def luminance(lightness):
    f = (lightness + 16) / 116
    return np.where(f > 24 / 116, f**3, (f - 16 / 116) * 108 / 841)


question = {name: np.array(values) for name, values in json.load(sys.stdin).items()}
json.dump(
    {
        "lightness": lightness(question["luminance"]).tolist(),
        "luminance": luminance(question["lightness"]).tolist(),
    },
    sys.stdout,
)
