"""Lines of a WAV file that holds whole rounds of a staircase, against those that the staircase must have.

Input: JSON, a list of cases: `path` of the file, `fullScale` (what ±1 became in it: SciPy's reading of 8 bits is
unsigned, of 24 bits shifted to the top of 32), `middle`, `values`, `rounds` in the file, `upToHz`, `downToDb`, and
`curve`, null or points [Hz, dB] of the device that it is heard through.

A line of the staircase is the integral of each held entry, c_m = (2/N)·Σ v_k·∫ e^(−2πi·m·t/N) dt over k…k+1
(engine specification §5). A curve is straight over log f, its strongest point 0 dB, level beyond its ends. The file is
read by scipy.io.wavfile.
"""

import json
import sys
import warnings

import numpy as np
from scipy.io import wavfile


def staircase_lines(values, count):
    n = len(values)
    m = np.arange(1, count + 1)[:, None]
    k = np.arange(n)[None, :]
    w = -2j * np.pi * m / n
    held = (np.exp(w * (k + 1)) - np.exp(w * k)) / w
    return 2 / n * np.abs(held @ np.array(values))


def answer(case):
    with warnings.catch_warnings():
        warnings.simplefilter("error")
        rate, samples = wavfile.read(case["path"])
    frames = (samples.astype(float) - case["middle"]) / case["fullScale"]
    spectrum = 2 * np.abs(np.fft.rfft(frames)) / len(frames)
    rounds = case["rounds"]
    f0 = rounds * rate / len(frames)
    count = int(case["upToHz"] / f0)
    hz = f0 * np.arange(1, count + 1)
    wanted = staircase_lines(case["values"], count)
    if case["curve"] is not None:
        points = np.array(case["curve"])
        levels = np.interp(np.log(hz), np.log(points[:, 0]), points[:, 1]) - points[:, 1].max()
        wanted = wanted * 10 ** (levels / 20)
    found = spectrum[rounds * np.arange(1, count + 1)]
    strong = wanted > 10 ** (case["downToDb"] / 20)
    error = 20 * np.log10(found[strong] / wanted[strong])
    return {
        "rate": rate,
        "frames": len(frames),
        "kind": str(samples.dtype),
        "lines": int(strong.sum()),
        "worstDb": float(np.abs(error).max()),
        "highestHz": float(hz[strong].max()),
    }


json.dump([answer(case) for case in json.load(sys.stdin)], sys.stdout)
