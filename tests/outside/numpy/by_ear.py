"""Bits that are off, and loudness by RMS, on NumPy.

Written from the engine specification: figures of §4 over codes with some bits cleared; and the effective value of what
is heard of a staircase, by drawing the staircase itself on a fine grid and adding up its FFT below a frequency (§5's
lines, without their formula).
"""

import json
import sys

import numpy as np
from model import amplitudes, carrier_figures, db, filled, levelled, quantised, source_cycle, values_of

GRID = 512  # points a tread


def bits_off(definition, masks):
    definition = filled(definition)
    table, warnings = definition["table"], set()
    r, _ = levelled(source_cycle(definition["source"], table, warnings), definition, warnings)
    codes, _ = quantised(r, table, warnings)
    out = []
    for mask in masks:
        q = values_of(codes & ~mask, table)
        added = np.max(amplitudes(q - r)[1:]) / np.max(amplitudes(r)[1:])
        out.append({"sinadDb": carrier_figures(amplitudes(q), table)["sinadDb"], "unwantedDb": db(added)})
    return out


def staircase_rms(values, round_hz, below_hz):
    drawn = np.repeat(np.array(values), GRID)
    lines = np.fft.rfft(drawn) / len(drawn)
    heard = np.arange(len(lines)) * round_hz < below_hz
    heard[0] = False
    return float(np.sqrt(2 * np.sum(np.abs(lines[heard]) ** 2)))


if __name__ == "__main__":
    question = json.load(sys.stdin)
    json.dump(
        {
            "bits": [bits_off(**one) for one in question["bits"]],
            "rms": [staircase_rms(**one) for one in question["rms"]],
        },
        sys.stdout,
    )
