"""The engine specification, §1 to §4, on NumPy and SciPy.

Written from the specification's text alone and in its order, to be held against the product's engine. Reads a
JSON list of definitions from standard input and writes a JSON list of their tables; a definition that the
specification refuses for its signal or its fold gives {"refused": path}. Dither is left out: its generator is
the product's own choice.
"""

import json
import math
import sys

import numpy as np
from scipy.interpolate import CubicSpline, PchipInterpolator

UNITS = 2**24  # code positions are multiples of 1/UNITS


class Refused(Exception):
    """A signal or a fold that the specification does not take; the message is the field's path."""


# §1 The definition


def filled(definition):
    """The definition with the defaults of §1."""
    level = {"removeMean": False, "normalise": "peak", "level": 1, "transfer": "none"}
    table = {
        "length": 256,
        "bits": 8,
        "cycles": 1,
        "startPhaseDeg": 0,
        "sampleAt": "start",
        "range": "bipolar",
        "scale": "full-span",
        "rounding": "half-up",
        "shaping": 0,
        "coding": "offset-binary",
        "complement": False,
        "fold": "none",
        "levels": None,
    }
    return {**definition, "level": {**level, **definition.get("level", {})}, "table": {**table, **definition.get("table", {})}}


def delta_of(table):
    return 0.5 if table["sampleAt"] == "centre" else 0.0


def phases(table):
    k = np.arange(table["length"])
    return np.mod((k + delta_of(table)) * table["cycles"] / table["length"] + table["startPhaseDeg"] / 360, 1)


# §2 Sources


def sines(table, harmonics, amplitudes, phases_rad):
    """Sum of a·sin(2π·n·t + φ) at the table's phases. The turns n·(k+δ)·K/N are reduced in whole numbers."""
    length = table["length"]
    twice_k = 2 * np.arange(length, dtype=np.int64) + (1 if table["sampleAt"] == "centre" else 0)
    out = np.zeros(length)
    for n, a, phi in zip(harmonics, amplitudes, phases_rad):
        turns = (n * table["cycles"] * twice_k % (2 * length)) / (2 * length)
        out += a * np.sin(2 * np.pi * (turns + np.mod(n * table["startPhaseDeg"] / 360, 1)) + phi)
    return out


def harmonics_cycle(source, table, warnings):
    kept = [p for p in source["partials"] if 2 * p["harmonic"] * table["cycles"] < table["length"]]
    if len(kept) < len(source["partials"]):
        warnings.add("partial-above-nyquist")
    return source.get("offset", 0) + sines(
        table,
        [p["harmonic"] for p in kept],
        [p["amplitude"] for p in kept],
        [math.radians(p["phaseDeg"] % 360) for p in kept],
    )


def curve_through(points, interpolation):
    """The closed curve as a function of phases 0 ≤ t < 1."""
    x = np.array([p["x"] for p in points], dtype=float)
    y = np.array([p["y"] for p in points], dtype=float)

    def unrolled(t):
        return np.where(t < x[0], t + 1, t)

    if interpolation == "step":
        return lambda t: y[np.searchsorted(x, t, side="right") - 1]  # −1, before the first point, is the last
    if interpolation == "linear":
        return lambda t: np.interp(unrolled(t), np.append(x, x[0] + 1), np.append(y, y[0]))
    if interpolation == "monotone":
        around = np.concatenate([x - 1, x, x + 1]), np.concatenate([y, y, y])
        curve = PchipInterpolator(*around)
        return lambda t: curve(t)
    curve = CubicSpline(np.append(x, x[0] + 1), np.append(y, y[0]), bc_type="periodic")
    return lambda t: curve(unrolled(t))


def bandlimited(values, limit, table):
    """The trigonometric polynomial through one cycle of values, harmonics 1 ≤ m < limit, at the table's phases."""
    count = len(values)
    lines = np.fft.rfft(values) / count
    kept = np.arange(1, math.ceil(limit))
    # 2·Re(X·e^(iα)) = 2|X|·sin(α + arg X + 90°)
    return lines[0].real + sines(table, kept, 2 * np.abs(lines[kept]), np.angle(lines[kept]) + np.pi / 2)


def points_cycle(source, table):
    curve = curve_through(source["points"], source["interpolation"])
    if not source.get("bandlimit", False):
        return curve(phases(table))
    count = 16 * table["length"]
    return bandlimited(curve(np.arange(count) / count), table["length"] / (2 * table["cycles"]), table)


def samples_cycle(source, table):
    values = np.array(source["values"], dtype=float)
    count, length = len(values), table["length"]
    if source["resampling"] == "bandlimited":
        return bandlimited(values, min(count / 2, length / (2 * table["cycles"])), table)
    t = phases(table)
    if source["resampling"] == "linear":
        return np.interp(t * count, np.arange(count + 1), np.append(values, values[0]))
    if table["cycles"] == 1 and table["startPhaseDeg"] == 0:
        twice_delta = 1 if table["sampleAt"] == "centre" else 0
        return values[[(2 * k + twice_delta) * count // (2 * length) for k in range(length)]]
    return values[np.floor(t * count).astype(int)]


def source_cycle(source, table, warnings):
    if source["kind"] == "harmonics":
        return harmonics_cycle(source, table, warnings)
    if source["kind"] == "points":
        return points_cycle(source, table)
    if source["kind"] == "samples":
        return samples_cycle(source, table)
    parts = [part["gain"] * source_cycle(part["source"], table, warnings) for part in source["parts"]]
    return np.sum(parts, axis=0) if source["operation"] == "sum" else np.prod(parts, axis=0)


def largest_input(source):
    if source["kind"] == "harmonics":
        return max(abs(source.get("offset", 0)), *(abs(p["amplitude"]) for p in source["partials"]))
    if source["kind"] == "points":
        return max(abs(p["y"]) for p in source["points"])
    if source["kind"] == "samples":
        return max(abs(value) for value in source["values"])
    return max(largest_input(part["source"]) for part in source["parts"])


# §3 Level and quantiser


def levelled(x, definition, warnings):
    level, table = definition["level"], definition["table"]
    bipolar = table["range"] == "bipolar"
    zero = 1e-12 * largest_input(definition["source"])
    if level["removeMean"]:
        x = x - np.mean(x)
    middle = 0.0
    if level["normalise"] == "peak":
        peak = np.max(np.abs(x))
        if peak <= zero:
            raise Refused("source")
        x = x / peak
    elif level["normalise"] == "span":
        low, high = np.min(x), np.max(x)
        if high - low <= zero:
            raise Refused("source")
        x = (x - low) / (high - low)
        if bipolar:
            x = 2 * x - 1
        else:
            middle = 0.5
    x = middle + level["level"] * (x - middle)
    if level["transfer"] == "cie-lightness":
        lightness = 100 * x
        x = np.where(lightness > 8, ((lightness + 16) / 116) ** 3, lightness / 903.3)
    elif level["transfer"] != "none":
        x = np.where(x > 0, np.abs(x) ** level["transfer"]["gamma"], x)
    low = -1.0 if bipolar else 0.0
    clipped = int(np.sum((x > 1 + 1e-12) | (x < low - 1e-12)))
    if clipped:
        warnings.add("clipped")
    return np.clip(x, low, 1), clipped


def positions(x, table):
    levels = 2 ** table["bits"]
    if table["range"] == "unipolar":
        v = x * (levels - 1)
    elif table["scale"] == "mid-tread":
        v = x * levels / 2 + levels / 2
    else:
        v = (x + 1) / 2 * (levels - 1)
    return np.floor(v * UNITS + 0.5).astype(np.int64)  # in units of 2⁻²⁴: the snap


def rounded(u, rounding):
    """A position in units of 2⁻²⁴, rounded to a whole code. Whole-number arithmetic throughout."""
    below, rest = u // UNITS, u % UNITS
    if rounding == "down":
        return below
    half = UNITS // 2
    if rounding == "half-up":
        return below + (rest >= half)
    return below + ((rest > half) | ((rest == half) & (below % 2 == 1)))


def shaped(v, table, warnings):
    order, count, top = table["shaping"], len(v), 2 ** table["bits"] - 1
    v = [int(position) for position in v]
    total = sum(v)
    change = UNITS * ((total + UNITS // 2) // UNITS) - total
    each, more = divmod(change, count)
    v = [position + each + (1 if k < more else 0) for k, position in enumerate(v)]
    e1 = e2 = 0
    for _ in range(8):
        started, codes, clipped = (e1, e2), [], 0
        for position in v:
            u = position + (-e1 if order == 1 else -2 * e1 + e2)
            p = int(rounded(u, table["rounding"]))
            code = min(max(p, 0), top)
            clipped += code != p
            codes.append(code)
            e1, e2 = p * UNITS - u, e1
        if e1 == started[0] and (order == 1 or e2 == started[1]):
            return np.array(codes), clipped
    if order == 1:
        warnings.add("shaping-seam")
    return np.array(codes), clipped


def nearest_levels(x, table):
    volts = np.array(table["levels"], dtype=float)
    low, span = volts.min(), volts.max() - volts.min()
    wanted = low + ((x + 1) / 2 if table["range"] == "bipolar" else x) * span
    grain = span / (len(volts) - 1) / UNITS
    distance = np.floor(np.abs(volts[None, :] - wanted[:, None]) / grain + 0.5)
    # Nearest first, then the higher voltage, then the lower code.
    order = np.lexsort((np.arange(len(volts)), -volts))
    return order[np.argmin(distance[:, order], axis=1)]


def quantised(x, table, warnings):
    if table["levels"] is not None:
        return nearest_levels(x, table), 0
    v = positions(x, table)
    if table["shaping"]:
        return shaped(v, table, warnings)
    p = rounded(v, table["rounding"])
    codes = np.clip(p, 0, 2 ** table["bits"] - 1)
    return codes, int(np.sum(codes != p))


def lsb_of(table):
    levels = 2 ** table["bits"]
    if table["range"] == "unipolar":
        return 1 / (levels - 1)
    return 2 / levels if table["scale"] == "mid-tread" else 2 / (levels - 1)


def values_of(codes, table):
    levels = 2 ** table["bits"]
    if table["levels"] is not None:
        volts = np.array(table["levels"], dtype=float)
        share = (volts[codes] - volts.min()) / (volts.max() - volts.min())
        return 2 * share - 1 if table["range"] == "bipolar" else share
    if table["range"] == "unipolar":
        return codes / (levels - 1)
    if table["scale"] == "mid-tread":
        return (codes - levels / 2) / (levels / 2)
    return 2 * codes / (levels - 1) - 1


def stored_words(codes, table):
    levels, count = 2 ** table["bits"], len(codes)
    if table["fold"] == "quarter":
        half = codes[: count // 2]
        if not (np.array_equal(half, half[::-1]) and np.array_equal(codes[count // 2 :], levels - 1 - half)):
            raise Refused("table.fold")
    words = levels - 1 - codes if table["complement"] else codes
    if table["coding"] == "twos-complement":
        words = words - levels // 2
    return words[: count // 4] if table["fold"] == "quarter" else words


# §4 Report


def amplitudes(signal):
    count = len(signal)
    a = 2 * np.abs(np.fft.rfft(signal)) / count
    a[0] /= 2
    if count % 2 == 0:
        a[-1] /= 2
    return a


def db(ratio):
    return 20 * math.log10(ratio)


def carrier_figures(a, table):
    none = dict.fromkeys(["sinadDb", "enobBits", "thdDb", "thdPercent", "sfdrDb"])
    count = table["length"]
    power = a**2 / 2
    if count % 2 == 0:
        power[-1] *= 2
    power[0] = 0
    if np.max(a[1:]) ** 2 / 2 <= 1e-22:
        return none  # no line at all
    carrier = 1 + int(np.argmax(a[1:] >= np.max(a[1:]) - 1e-9))
    at_nyquist = 2 * carrier == count
    others = np.delete(np.arange(1, len(a)), carrier - 1)
    rest = float(np.sum(power[others]))
    thd = math.sqrt(sum(a[n * carrier] ** 2 for n in range(2, 11) if 2 * n * carrier < count)) / a[carrier]
    figures = {**none}
    if thd > 1e-12:
        figures.update(thdDb=db(thd), thdPercent=100 * thd)
    if rest > 1e-22:
        figures["sfdrDb"] = db(a[carrier] / np.max(a[others]))
        if not at_nyquist:
            sinad = 10 * math.log10(power[carrier] / rest)
            full = 1 if table["range"] == "bipolar" else 0.5
            figures.update(sinadDb=sinad, enobBits=(sinad - 1.76 + db(full / a[carrier])) / 6.02)
    return figures


def toggles(codes):
    changed = [bin(int(a) ^ int(b)).count("1") for a, b in zip(codes, np.roll(codes, -1))]
    index = int(np.argmax(changed))
    worst = {"bits": changed[index], "index": index, "from": int(codes[index]), "to": int(codes[(index + 1) % len(codes)])}
    return {"meanToggles": sum(changed) / len(changed), "worstToggle": worst}


def report_of(r, q, codes, stored, clipped_samples, clipped_codes, table):
    e, lsb, bits = q - r, lsb_of(table), table["bits"]
    exact = bool(np.var(e) <= 1e-24)
    still = np.ptp(r) == 0
    rms = math.sqrt(np.mean(q**2))
    return {
        "snrDb": None if exact or still else 10 * math.log10(np.var(r) / np.var(e)),
        "idealSnrDb": 6.02 * bits + 1.76,
        "exact": exact,
        "meanErrorLsb": np.mean(e) / lsb,
        "rmsErrorLsb": math.sqrt(np.mean(e**2)) / lsb,
        "peakErrorLsb": np.max(np.abs(e)) / lsb,
        "mean": np.mean(q),
        "rms": rms,
        "crestFactor": None if rms == 0 else np.max(np.abs(q)) / rms,
        "minCode": int(codes.min()),
        "maxCode": int(codes.max()),
        "usedCodes": len(np.unique(codes)),
        "clippedSamples": clipped_samples,
        "clippedCodes": clipped_codes,
        **carrier_figures(amplitudes(q), table),
        "unwantedDb": None if exact or still else db(np.max(amplitudes(e)[1:]) / np.max(amplitudes(r)[1:])),
        "tableBytes": len(stored) * (1 if bits <= 8 else 2),
        **toggles(codes),
    }


def table_of(definition):
    definition = filled(definition)
    table, warnings = definition["table"], set()
    x = source_cycle(definition["source"], table, warnings)
    r, clipped_samples = levelled(x, definition, warnings)
    codes, clipped_codes = quantised(r, table, warnings)
    stored = stored_words(codes, table)
    q = values_of(codes, table)
    return {
        "cycle": r.tolist(),
        "codes": codes.tolist(),
        "stored": stored.tolist(),
        "report": report_of(r, q, codes, stored, clipped_samples, clipped_codes, table),
        "spectrum": amplitudes(q).tolist(),
        "added": amplitudes(q - r).tolist(),
        "warnings": sorted(warnings),
    }


def answer(definition):
    try:
        return table_of(definition)
    except Refused as refused:
        return {"refused": str(refused)}


if __name__ == "__main__":
    json.dump([answer(definition) for definition in json.load(sys.stdin)], sys.stdout)
