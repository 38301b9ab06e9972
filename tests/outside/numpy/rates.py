"""Timer settings and two-tone loops by trying them all, as JSON: the least error in cents of each question."""

import json
import sys

import numpy as np


def timer(clockHz, prescalers, compareBits, wantedHz, lengths, cycles):
    """Every compare value of every prescaler, with every table."""
    dividers = np.outer(prescalers, np.arange(1, 2**compareBits + 1)).ravel()
    least = np.inf
    for length in lengths:
        for held in cycles:
            if held > 1 and 2 * held >= length:
                continue
            cents = 1200 * np.log2(clockHz * held / (dividers * length) / wantedHz)
            least = min(least, np.abs(cents).min())
    return least


def two_tones(sampleRateHz, tonesHz, largestLength, withinCents):
    """Every length, every pair of different whole numbers of cycles."""
    best, shortest = (np.inf, None), None
    for length in range(2, largestLength + 1):
        k = np.arange(1, (length + 1) // 2)
        if len(k) < 2:
            continue
        off = [np.abs(1200 * np.log2(k * sampleRateHz / length / tone)) for tone in tonesHz]
        worst = np.maximum.outer(*off)
        np.fill_diagonal(worst, np.inf)
        least = worst.min()
        if least < best[0] - 1e-9:
            best = (least, length)
        if shortest is None and least <= withinCents:
            shortest = length
    return {"worstCents": best[0], "tableLength": best[1], "shortest": shortest}


question = json.load(sys.stdin)
json.dump(
    {
        "timers": [timer(**each) for each in question["timers"]],
        "twoTones": [two_tones(**each) for each in question["twoTones"]],
        "semitones": (440 * 2 ** ((np.arange(128) - 69) / 12)).tolist(),
    },
    sys.stdout,
)
