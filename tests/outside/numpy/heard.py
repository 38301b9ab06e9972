"""What a pin gives, by engine specification §5, beside what a player has rendered of it: lines, waveform, level.

Input: JSON, a list of cases: `values`, `sampleRateHz`, `gain`, `form` (staircase or curve), for an accumulator
`accumulatorBits` and `stepWord`, for what follows the pin `stage`, and `rateHz` and `frames` (float32, little-endian,
base64): the rendered frames, of which the last second is looked at.

- Loop: lines at m·f0, f0 = fs/N, of amplitude 2·|X_{m mod N}|/N·|sin(πm/N)/(πm/N)|, images and N/2 included. The curve
  has those up to N/2 without the hold, that at N/2 halved.
- Accumulator: with g = gcd(W, 2^M) and P = 2^M/g, lines k ≤ P/2 of amplitude
  2·|X_{k mod N}|/N·|sin(πk/N)| / ((P/N)·|sin(πk/P)|), halved at P/2, at (k·W/g mod P)·fs/P folded into 0…fs/2; where
  P ≤ N, those of the P visited entries. Each is held, so that it comes again at n·fs ± f under |sin(πf/fs)/(πf/fs)|.
- Stage: first-order poles 1/(1 + i·f/fc) and a second-order Butterworth 1/(1 + i·√2·x − x²), x = f/fc.

A rendered line is measured at its own frequency under a Kaiser window (β = 24, side lobes below −170 dB).
"""

import base64
import json
import math
import sys

import numpy as np

BETA = 24
# Half-width of that window's main lobe, in hertz for one second: √(1 + (β/π)²).
LOBE_HZ = 8


def stage_gain(stage, hz):
    gain = np.ones_like(hz)
    if stage is None:
        return gain
    for pole in stage["polesHz"]:
        gain = gain / np.sqrt(1 + (hz / pole) ** 2)
    if "butterworthHz" in stage:
        gain = gain / np.sqrt(1 + (hz / stage["butterworthHz"]) ** 4)
    return gain


def loop_lines(case, top):
    values = np.array(case["values"])
    n = len(values)
    f0 = case["sampleRateHz"] / n
    m = np.arange(1, math.ceil(top / f0))
    x = np.fft.fft(values)
    if case["form"] == "curve":
        m = m[m <= n // 2]
        amplitude = 2 * np.abs(x[m]) / n
        amplitude[m == n / 2] /= 2
    else:
        amplitude = 2 * np.abs(x[m % n]) / n * np.abs(np.sinc(m / n))
    return m * f0, amplitude


def accumulator_lines(case, top):
    values = np.array(case["values"])
    n = len(values)
    fs = case["sampleRateHz"]
    steps = 2 ** case["accumulatorBits"]
    g = math.gcd(case["stepWord"], steps)
    period = steps // g
    odd = case["stepWord"] // g
    if period <= n:
        visited = values[(np.arange(period) * odd) % period * (n // period)]
        amplitude = 2 * np.abs(np.fft.rfft(visited)) / period
        amplitude[-1] /= 2
        bins = np.arange(len(amplitude))[1:]
        amplitude = amplitude[1:]
    else:
        # Beyond a thousand times N all lines are far below what is looked at.
        k = np.arange(1, min(period // 2, 1024 * n) + 1, dtype=np.int64)
        x = np.abs(np.fft.fft(values))
        amplitude = 2 * x[k % n] / n * np.abs(np.sin(np.pi * (k % n) / n))
        amplitude = amplitude / (period / n * np.abs(np.sin(np.pi * k / period)))
        amplitude[k == period / 2] /= 2
        # Below 2⁶³ for accumulators of up to 40 bits over tables of up to 2¹² entries.
        bins = k * odd % period
        bins = np.minimum(bins, period - bins)
    hz = bins * (fs / period)
    all_hz, all_amplitudes = [], []
    for centre in np.arange(0, top + fs, fs):
        for sign in (-1, 1):
            at = centre + sign * hz
            keep = (at > 0) & (at < top)
            all_hz.append(at[keep])
            all_amplitudes.append(amplitude[keep] * np.abs(np.sinc(at[keep] / fs)))
    # The line at fs/2 meets its own image.
    hz, place = np.unique(np.concatenate(all_hz), return_inverse=True)
    return hz, np.bincount(place, np.concatenate(all_amplitudes))


def expected_lines(case, top):
    lines = accumulator_lines if "accumulatorBits" in case else loop_lines
    hz, amplitude = lines(case, top)
    return hz, amplitude * stage_gain(case["stage"], hz) * case["gain"]


def measured(frames, rate, hz):
    window = np.kaiser(len(frames), BETA)
    weighed = frames * window
    turn = -2j * np.pi * np.arange(len(frames)) / rate
    return 2 * np.array([abs(np.exp(turn * line) @ weighed) for line in hz]) / window.sum()


def is_alone(hz, amplitude, at, own):
    """Whether what stands within a lobe of a line is too weak beside it, as powers add, to matter: 0.2 dB."""
    near = (np.abs(hz - at) < 2 * LOBE_HZ) & (hz != at)
    return np.sqrt((amplitude[near] ** 2).sum()) < own / 40


def db(ratio):
    return 20 * np.log10(np.maximum(ratio, 1e-15))


def compare(case):
    rate = case["rateHz"]
    everything = np.frombuffer(base64.b64decode(case["frames"]), dtype="<f4").astype(float)
    frames = everything[-rate:]
    hz, amplitude = expected_lines(case, rate / 2)
    strong = (hz <= case.get("limitHz", 20_000)) & (amplitude > 10 ** (-90 / 20))
    looked_hz, looked = hz[strong], amplitude[strong]
    if "strongest" in case:
        # Those that no other comes near: a window cannot tell lines apart that lie within one lobe.
        order = [i for i in np.argsort(looked)[::-1] if is_alone(hz, amplitude, looked_hz[i], looked[i])]
        order = order[: case["strongest"]]
        looked_hz, looked = looked_hz[order], looked[order]
    errors = db(measured(frames, rate, looked_hz)) - db(looked)
    worst = int(np.argmax(np.abs(errors)))
    answer = {
        "lines": len(looked),
        "highestHz": float(looked_hz.max()),
        "weakestDbfs": float(db(looked.min())),
        "worstDb": float(errors[worst]),
        "worstHz": float(looked_hz[worst]),
        "strayDbfs": stray_level(frames, rate, hz[amplitude > 1e-7]),
        "meanDbfs": float(db(abs(frames.mean()))),
        "rmsDbfs": float(db(np.sqrt((frames**2).mean()))),
        "peakDbfs": float(db(np.abs(frames).max())),
    }
    if "delayFrames" in case and case["form"] == "staircase" and "accumulatorBits" not in case:
        if case["stage"] is None:
            answer["waveErrorDbfs"] = wave_error(case, frames, len(everything) - rate)
    return answer


def stray_level(frames, rate, lines_hz):
    """The strongest of all that is not an expected line, up to half of the rate."""
    window = np.kaiser(len(frames), BETA)
    spectrum = 2 * np.abs(np.fft.rfft(frames * window)) / window.sum()
    bins = np.arange(len(spectrum)) * (rate / len(frames))
    is_stray = np.ones(len(spectrum), dtype=bool)
    for line in lines_hz:
        low, high = np.searchsorted(bins, [line - LOBE_HZ - 1, line + LOBE_HZ + 1])
        is_stray[low:high] = False
    return float(db(spectrum[is_stray].max())) if is_stray.any() else -300.0


def wave_error(case, frames, first):
    """Partials added one by one in time, and how far the rendered frames are from their sum, in full scales."""
    values = np.array(case["values"])
    n = len(values)
    f0 = case["sampleRateHz"] / n
    m = np.arange(1, math.ceil(case["rateHz"] / 2 / f0))
    line = 2 * np.fft.fft(values)[m % n] / n * np.exp(-1j * np.pi * m / n) * np.sinc(m / n) * case["gain"]
    span = 2048
    t = (first + np.arange(span) - case["delayFrames"]) / case["rateHz"]
    wave = np.zeros(span)
    for each, c in zip(m, line):
        wave += (c * np.exp(2j * np.pi * each * f0 * t)).real
    return float(db(np.abs(wave - frames[:span]).max()))


json.dump([compare(case) for case in json.load(sys.stdin)], sys.stdout)
