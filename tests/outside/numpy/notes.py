"""Notes 0..127 to fifty digits, what registers make of them by trying, and glides by powers of a ratio, as JSON."""

import json
import sys
from decimal import Decimal, getcontext

import numpy as np

getcontext().prec = 50
LETTERS = "C C# D D# E F F# G G# A A# B".split()


def note_hz(note, a4):
    return Decimal(a4) * (Decimal(2) ** (Decimal(note - 69) / 12))


def name(note):
    octave, letter = divmod(note, 12)
    return f"{LETTERS[letter]}{octave - 1}"


def step_words(accumulatorBits, sampleRateHz, a4):
    """Nearest by exact arithmetic, and its error in cents."""
    found = []
    for note in range(128):
        wanted = note_hz(note, a4)
        word = int((wanted * 2**accumulatorBits / Decimal(sampleRateHz)).to_integral_value())
        actual = Decimal(word) * Decimal(sampleRateHz) / 2**accumulatorBits
        found.append([word, float(1200 * (actual / wanted).ln() / Decimal(2).ln()) if word > 0 else None])
    return found


def compares(clockHz, prescaler, compareBits, tableLength, a4):
    """Every compare value tried."""
    tones = clockHz / (prescaler * np.arange(1, 2**compareBits + 1) * tableLength)
    found = []
    for note in range(128):
        cents = 1200 * np.log2(tones / float(note_hz(note, a4)))
        best = int(np.abs(cents).argmin())
        found.append([best, float(cents[best])])
    return found


def glide(accumulatorBits, sampleRateHz, fromHz, toHz, updates, path):
    """Step words of every update."""
    share = np.arange(updates + 1) / updates
    hz = fromHz * (toHz / fromHz) ** share if path == "exponential" else fromHz * (1 - share) + toHz * share
    exact = hz * 2.0**accumulatorBits / sampleRateHz
    return {"words": np.rint(exact).tolist(), "sure": (np.abs(exact - np.floor(exact) - 0.5) > 1e-6).tolist()}


question = json.load(sys.stdin)
json.dump(
    {
        "notes": [[[name(n), float(note_hz(n, a4))] for n in range(128)] for a4 in question["tunings"]],
        "stepWords": [step_words(**each) for each in question["stepWords"]],
        "compares": [compares(**each) for each in question["compares"]],
        "glides": [glide(**each) for each in question["glides"]],
    },
    sys.stdout,
)
