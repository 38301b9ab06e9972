"""Ladders solved by NumPy's general solver: the whole nodal matrix of each build and code, no use made of its shape.

Written from the engine specification, §6. Reads {"bits", "vHigh", "vLow", "rHigh", "rLow", "load" or null, "builds":
[{"rungs", "series", "terminator"}], "codes", "cycle"} from standard input and writes the figures of each build.
"""

import json
import sys

import numpy as np


def volts_of(given, build):
    bits, low, high = given["bits"], given["vLow"], given["vHigh"]
    codes = np.arange(2**bits)
    matrix, right = np.zeros((len(codes), bits, bits)), np.zeros((len(codes), bits))

    def to_source(node, volts, ohms):
        matrix[:, node, node] += 1 / ohms
        right[:, node] += volts / ohms

    to_source(0, low, build["terminator"])
    for i in range(bits):
        is_high = codes >> i & 1
        to_source(i, np.where(is_high, high, low), build["rungs"][i] + np.where(is_high, given["rHigh"], given["rLow"]))
    for i, ohms in enumerate(build["series"]):
        matrix[:, i, i] += 1 / ohms
        matrix[:, i + 1, i + 1] += 1 / ohms
        matrix[:, i, i + 1] -= 1 / ohms
        matrix[:, i + 1, i] -= 1 / ohms
    if given["load"] is not None:
        to_source(bits - 1, low, given["load"])
    return np.linalg.solve(matrix, right[..., None])[:, -1, 0]


def figures(given, build):
    v = volts_of(given, build)
    lsb = (v[-1] - v[0]) / (len(v) - 1)
    steps = np.diff(v)
    q = 2 * (v[given["codes"]] - v.min()) / (v.max() - v.min()) - 1
    r, n = np.array(given["cycle"]), len(given["cycle"])

    def amplitudes(signal):
        a = 2 * abs(np.fft.rfft(signal)) / n
        if n % 2 == 0:
            a[-1] /= 2
        return a[1:]

    a = amplitudes(q)
    power = a**2 / 2
    if n % 2 == 0:
        power[-1] *= 2
    carrier = a.argmax()
    return {
        "maxInl": abs((v - v[0]) / lsb - np.arange(len(v))).max(),
        "maxDnl": abs(steps / lsb - 1).max(),
        "monotonic": bool((steps > 0).all()),
        "sinadDb": 10 * np.log10(power[carrier] / np.delete(power, carrier).sum()),
        "unwantedDb": 20 * np.log10(amplitudes(q - r).max() / amplitudes(r).max()),
    }


given = json.load(sys.stdin)
print(json.dumps([figures(given, build) for build in given["builds"]]))
