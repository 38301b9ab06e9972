"""The size search for a sum of harmonics, vectorised on NumPy: what `npm run speed` measures the engine's against.

Each length's cycle and its lines are made once, by one inverse FFT; then all depths of a length at once, as the rows
of a matrix: codes, error, variance and one real FFT a row. From a parsed definition, peak-normalised, bipolar,
full-span, half-up. Speaks JSON lines: {"open": {definition, lengths, bits}} answers the figures, a row a length,
{"run": n} the milliseconds of n searches.
"""

import json
import math
import sys
import time

import numpy as np

UNITS = 2.0**24


def search(partials, lengths, bits):
    harmonics, amplitudes, phases_deg = partials
    phasors = amplitudes * np.exp(1j * np.radians(phases_deg))
    tops = (2.0**bits - 1)[:, None]
    snr, unwanted, sizes = (np.empty((len(lengths), len(bits))) for _ in range(3))
    for row, n in enumerate(lengths):
        fits = 2 * harmonics < n
        lines = np.zeros(n // 2 + 1, dtype=complex)
        np.add.at(lines, harmonics[fits], (-0.5j * n) * phasors[fits])
        r = np.fft.irfft(lines, n)
        r /= max(r.max(), -r.min())
        # (x+1)/2·(L−1), snapped to 2⁻²⁴, then half-up
        v = (r + 1) * (tops / 2 * UNITS)
        v += 0.5
        np.floor(v, out=v)
        v /= UNITS
        v += 0.5
        np.floor(v, out=v)
        v.clip(0, tops, out=v)
        v *= 2 / tops
        v -= 1
        v -= r
        snr[row] = 10 * np.log10(r.var() / v.var(axis=1))
        strongest = np.abs(np.fft.rfft(r))
        added = np.abs(np.fft.rfft(v, axis=1))
        if n % 2 == 0:
            strongest[-1] /= 2
            added[:, -1] /= 2
        unwanted[row] = 20 * np.log10(added[:, 1:].max(axis=1) / strongest[1:].max())
        sizes[row] = n * (1 + (bits > 8))
    return {"snrDb": snr, "unwantedDb": unwanted, "tableBytes": sizes}


question = None
for line in sys.stdin:
    request = json.loads(line)
    if "open" in request:
        asked = request["open"]
        partials = asked["definition"]["source"]["partials"]
        numbers = np.array([(p["harmonic"], p["amplitude"], p["phaseDeg"]) for p in partials], dtype=float).T
        question = ((numbers[0].astype(np.intp), numbers[1], numbers[2]), asked["lengths"], np.array(asked["bits"]))
        answer = {name: matrix.tolist() for name, matrix in search(*question).items()}
    else:
        answer = []
        for _ in range(request["run"]):
            start = time.perf_counter()
            search(*question)
            answer.append(1000 * (time.perf_counter() - start))
    print(json.dumps(answer), flush=True)
