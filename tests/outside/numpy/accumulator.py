"""Phase accumulators by running them: the samples of one round, their FFT and what it shows, as JSON.

Written from §5 of the engine specification: index acc >> (M−p); the carrier is the strongest bin, DC left out; SNR
is its power over the variance that is left, which by Parseval's theorem is the power of all other lines; taken as
their sum, as the difference would cancel.
"""

import json
import math
import sys

import numpy as np


def figures(values, accumulatorBits, stepWord):
    values = np.array(values)
    shift = accumulatorBits - int(math.log2(len(values)))
    period = 2**accumulatorBits // math.gcd(stepWord, 2**accumulatorBits)
    phase = np.arange(period, dtype=np.int64) * stepWord & (2**accumulatorBits - 1)
    output = values[phase >> shift]
    amplitudes = 2 * np.abs(np.fft.rfft(output)) / period
    amplitudes[-1] /= 2
    amplitudes[0] = 0
    carrier = int(np.argmax(amplitudes))
    own = amplitudes[carrier]
    powers = amplitudes**2 / 2
    powers[-1] *= 2
    amplitudes[carrier] = 0
    other = int(np.argmax(amplitudes))
    return {
        "period": period,
        "carrierBin": carrier,
        "worstOtherDbc": 20 * math.log10(amplitudes[other] / own),
        "worstOtherBin": other,
        "snrDb": 10 * math.log10(powers[carrier] / np.delete(powers, carrier).sum()),
    }


json.dump([figures(**each) for each in json.load(sys.stdin)], sys.stdout)
