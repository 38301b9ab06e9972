"""The engine's pipeline for a sum of harmonics, vectorised on NumPy: what `npm run speed` measures against.

From a definition as read from JSON to codes, stored words, report and spectra of their own, as the engine does:
the same checks of what goes in, synthesis by one inverse FFT, level, quantiser and the whole of the engine
specification's §4. Kept from run to run is what NumPy keeps by itself, its FFT's tables, and a table of bit
counts. Speaks JSON lines: {"open": definition} answers the table itself, {"run": n} the milliseconds of n runs.
"""

import json
import math
import sys
import time

import numpy as np

UNITS = 2.0**24
ONES = np.array([bin(word).count("1") for word in range(65536)], dtype=np.uint8)


def parsed(definition):
    """Partials as arrays and the table's size, refused where the specification's §1 refuses them."""
    source, table = definition["source"], definition["table"]
    partials = source["partials"]
    known = (
        definition.keys() <= {"schema", "name", "source", "level", "table"}
        and source.keys() <= {"kind", "offset", "partials"}
        and table.keys() <= {"length", "bits"}
        and all(p.keys() == {"harmonic", "amplitude", "phaseDeg"} for p in partials)
    )
    n, bits = table["length"], table["bits"]
    numbers = np.array([(p["harmonic"], p["amplitude"], p["phaseDeg"]) for p in partials], dtype=float).T
    harmonics = numbers[0].astype(np.intp)
    if not (
        known
        and 2 <= n <= 65536
        and 1 <= bits <= 16
        and 1 <= len(partials) <= 4096
        and math.isfinite(source["offset"])
        and np.isfinite(numbers).all()
        and np.array_equal(harmonics, numbers[0])
        and harmonics.min() >= 1
        and harmonics.max() <= 32768
    ):
        raise ValueError("not a definition")
    return n, bits, source["offset"], harmonics, numbers[1], numbers[2]


def table_of(definition):
    """Peak-normalised, bipolar, full-span, half-up: what the measured definitions ask for."""
    n, bits, offset, harmonics, amplitudes, phases_deg = parsed(definition)
    top = 2**bits - 1
    largest = max(np.abs(amplitudes).max(), abs(offset))
    fits = 2 * harmonics < n
    if not fits.all():
        harmonics, amplitudes, phases_deg = harmonics[fits], amplitudes[fits], phases_deg[fits]

    # a·sin(α) has the line (a/2)·e^(i(φ−90°)) of a transform divided by N
    lines = np.zeros(n // 2 + 1, dtype=complex)
    lines[0] = offset * n
    np.add.at(lines, harmonics, (-0.5j * n) * amplitudes * np.exp(1j * np.radians(phases_deg)))
    r = np.fft.irfft(lines, n)

    peak = max(r.max(), -r.min())
    if not 1e-12 * largest < peak < math.inf:
        raise ValueError("a zero signal, or one beyond a double")
    r /= peak
    clipped_samples = np.count_nonzero(np.abs(r) > 1 + 1e-12)
    r.clip(-1, 1, out=r)

    # (x+1)/2·(L−1), snapped to 2⁻²⁴, then half-up
    v = r + 1
    v *= top / 2 * UNITS
    v += 0.5
    np.floor(v, out=v)
    v /= UNITS
    v += 0.5
    np.floor(v, out=v)
    clipped_codes = np.count_nonzero((v < 0) | (v > top))
    v.clip(0, top, out=v)
    codes = v.astype(np.uint16)
    stored = codes.astype(np.int32)
    q = v
    q *= 2 / top
    q -= 1
    e = q - r

    # of the levelled cycle, of the error, and of their sum
    wanted, added = np.fft.rfft(r), np.fft.rfft(e)
    spectrum = amplitudes_of(wanted + added, n)
    intended, unwanted = amplitudes_of(wanted, n), amplitudes_of(added, n)

    lsb = 2 / top
    error_mean, error_variance = e.mean(), e.var()
    mean, rms = q.mean(), math.sqrt(q.dot(q) / n)
    exact = bool(error_variance <= 1e-24)
    present = np.flatnonzero(np.bincount(codes, minlength=top + 1))
    ones = ONES[codes ^ np.roll(codes, -1)]
    worst = int(ones.argmax())
    report = {
        "snrDb": None if exact else 10 * math.log10(r.var() / error_variance),
        "idealSnrDb": 6.02 * bits + 1.76,
        "exact": exact,
        "meanErrorLsb": error_mean / lsb,
        "rmsErrorLsb": math.sqrt(error_variance + error_mean**2) / lsb,
        "peakErrorLsb": max(e.max(), -e.min()) / lsb,
        "mean": mean,
        "rms": rms,
        "crestFactor": max(q.max(), -q.min()) / rms if rms else None,
        "minCode": int(present[0]),
        "maxCode": int(present[-1]),
        "usedCodes": len(present),
        "clippedSamples": clipped_samples,
        "clippedCodes": clipped_codes,
        **against_carrier(spectrum, n),
        "unwantedDb": None if exact else 20 * math.log10(unwanted[1:].max() / intended[1:].max()),
        "tableBytes": n * (1 if bits <= 8 else 2),
        "meanToggles": ones.mean(),
        "worstToggle": {
            "bits": int(ones[worst]),
            "index": worst,
            "from": int(codes[worst]),
            "to": int(codes[(worst + 1) % n]),
        },
    }
    return codes, stored, report, spectrum, intended, unwanted


def amplitudes_of(lines, n):
    a = np.abs(lines)
    a *= 2 / n
    a[0] /= 2
    if n % 2 == 0:
        a[-1] /= 2
    return a


def against_carrier(a, n):
    carrier = 1 + int((a[1:] >= a[1:].max() - 1e-9).argmax())
    own = a[carrier]
    power = a * a
    power /= 2
    if n % 2 == 0:
        power[-1] *= 2
    power[0] = power[carrier] = 0
    others = a[1:].copy()
    others[carrier - 1] = 0
    multiples = carrier * np.arange(2, 11)
    thd = np.linalg.norm(a[multiples[2 * multiples < n]]) / own
    sinad = 10 * math.log10(own * own / 2 / power.sum())
    return {
        "sinadDb": sinad,
        "enobBits": (sinad - 1.76 - 20 * math.log10(own)) / 6.02,
        "thdDb": 20 * math.log10(thd),
        "thdPercent": 100 * thd,
        "sfdrDb": 20 * math.log10(own / others.max()),
    }


definition = None
for line in sys.stdin:
    request = json.loads(line)
    if "open" in request:
        definition = request["open"]
        codes, stored, report, spectrum, _, added = table_of(definition)
        answer = {"codes": codes.tolist(), "stored": stored.tolist(), "report": report, "spectrum": spectrum.tolist()}
    else:
        answer = []
        for _ in range(request["run"]):
            start = time.perf_counter()
            table_of(definition)
            answer.append(1000 * (time.perf_counter() - start))
    print(json.dumps(answer, default=float), flush=True)
