"""The engine's pipeline for a sum of harmonics, vectorised on NumPy: what `npm run speed` measures against.

Synthesis by one inverse FFT, level, quantiser and the whole report of the engine specification's §4 with its
spectra. It takes the definition as read from JSON and gives arrays of its own, as the engine does, but checks
nothing. What depends on the table's size alone is made beforehand, as the engine keeps its own.
Speaks JSON lines: {"open": definition} answers the table itself, {"run": n} the milliseconds of n runs.
"""

import json
import math
import sys
import time

import numpy as np

UNITS = 2.0**24
ONES = np.array([bin(word).count("1") for word in range(65536)], dtype=np.uint8)


class Pipeline:
    """Peak-normalised, bipolar, full-span, half-up: what the measured definitions ask for."""

    def __init__(self, table):
        """What a table's size alone decides, made once, as the engine keeps its plans and circles."""
        n, top = table["length"], 2 ** table["bits"] - 1
        self.value_of_code = np.arange(top + 1) * 2 / top - 1
        self.weights = np.full(n // 2 + 1, 0.5)
        self.scale = np.full(n // 2 + 1, 2 / n)
        self.weights[0], self.scale[0] = 0, 1 / n
        if n % 2 == 0:
            self.weights[-1], self.scale[-1] = 1, 1 / n

    def run(self, definition):
        table, source = definition["table"], definition["source"]
        n, bits = table["length"], table["bits"]
        self.length, top = n, 2**bits - 1

        # a·sin(α) has the line (a/2)·e^(i(φ−90°)) of a transform divided by N
        numbers = np.array([(p["harmonic"], p["amplitude"], p["phaseDeg"]) for p in source["partials"]]).T
        harmonics, amplitudes, phases = numbers[0].astype(np.intp), numbers[1], np.radians(numbers[2])
        fits = 2 * harmonics < n
        if not fits.all():
            harmonics, amplitudes, phases = harmonics[fits], amplitudes[fits], phases[fits]
        lines = np.zeros(n // 2 + 1, dtype=complex)
        lines[0] = source["offset"] * n
        np.add.at(lines, harmonics, (-0.5j * n) * amplitudes * np.exp(1j * phases))
        r = np.fft.irfft(lines, n)

        peak = max(r.max(), -r.min())
        if not 1e-12 * max(np.abs(amplitudes).max(), abs(source["offset"])) < peak < math.inf:
            raise ValueError("a zero signal, or one beyond a double")
        r /= peak
        clipped_samples = np.count_nonzero(np.abs(r) > 1 + 1e-12)
        r.clip(-1, 1, out=r)

        # (x+1)/2·(L−1), snapped to 2⁻²⁴, then half-up
        v = r + 1
        v *= top / 2
        v *= UNITS
        np.rint(v, out=v)
        v /= UNITS
        v += 0.5
        np.floor(v, out=v)
        clipped_codes = np.count_nonzero((v < 0) | (v > top))
        v.clip(0, top, out=v)
        codes = v.astype(np.uint16)
        stored = codes.astype(np.int32)
        q = self.value_of_code[codes]
        error = q - r

        lsb = 2 / top
        error_variance = error.var()
        error_mean, mean, square = error.mean(), q.mean(), q.dot(q) / n
        exact = error_variance <= 1e-24
        rms = math.sqrt(square)
        present = np.flatnonzero(np.bincount(codes, minlength=top + 1))

        # spectra: of the levelled cycle, of the error, and of their sum
        wanted, added = np.fft.rfft(r), np.fft.rfft(error)
        a, intended, unwanted = np.abs(wanted + added), np.abs(wanted), np.abs(added)
        for each in (a, intended, unwanted):
            each *= self.scale

        figures = self.against_carrier(a)
        changed = np.empty_like(codes)
        np.bitwise_xor(codes[:-1], codes[1:], out=changed[:-1])
        changed[-1] = codes[-1] ^ codes[0]
        ones = ONES[changed]
        worst = int(ones.argmax())
        report = {
            "snrDb": None if exact else 10 * math.log10(r.var() / error_variance),
            "idealSnrDb": 6.02 * bits + 1.76,
            "exact": bool(exact),
            "meanErrorLsb": error_mean / lsb,
            "rmsErrorLsb": math.sqrt(error_variance + error_mean**2) / lsb,
            "peakErrorLsb": max(error.max(), -error.min()) / lsb,
            "mean": mean,
            "rms": rms,
            "crestFactor": max(q.max(), -q.min()) / rms if rms else None,
            "minCode": int(present[0]),
            "maxCode": int(present[-1]),
            "usedCodes": len(present),
            "clippedSamples": clipped_samples,
            "clippedCodes": clipped_codes,
            **figures,
            "unwantedDb": None if exact else 20 * math.log10(unwanted[1:].max() / intended[1:].max()),
            "tableBytes": len(stored) * (1 if bits <= 8 else 2),
            "meanToggles": int(ones.sum(dtype=np.int64)) / n,
            "worstToggle": {
                "bits": int(ones[worst]),
                "index": worst,
                "from": int(codes[worst]),
                "to": int(codes[(worst + 1) % n]),
            },
        }
        return codes, report, a

    def against_carrier(self, a):
        strongest = a[1:].max()
        carrier = 1 + int((a[1:] >= strongest - 1e-9).argmax())
        own = a[carrier]
        power = a * a
        power *= self.weights
        power[carrier] = 0
        rest = power.sum()
        a[carrier] = 0
        other = a[1:].max()
        a[carrier] = own
        multiples = carrier * np.arange(2, 11)
        multiples = multiples[2 * multiples < self.length]
        thd = math.sqrt(float(np.square(a[multiples]).sum())) / own
        sinad = 10 * math.log10(own * own / 2 / rest)
        return {
            "sinadDb": sinad,
            "enobBits": (sinad - 1.76 - 20 * math.log10(own)) / 6.02,
            "thdDb": 20 * math.log10(thd),
            "thdPercent": 100 * thd,
            "sfdrDb": 20 * math.log10(own / other),
        }


pipeline = definition = None
for line in sys.stdin:
    request = json.loads(line)
    if "open" in request:
        definition = request["open"]
        pipeline = Pipeline(definition["table"])
        codes, report, amplitudes = pipeline.run(definition)
        answer = {"codes": codes.tolist(), "report": report, "spectrum": amplitudes.tolist()}
    else:
        times = []
        for _ in range(request["run"]):
            start = time.perf_counter()
            pipeline.run(definition)
            times.append(1000 * (time.perf_counter() - start))
        answer = times
    print(json.dumps(answer), flush=True)
