"""Tolerance trials of a resistor ladder, vectorised on NumPy: what `npm run speed` measures against.

Given the resistors of every build, what the engine does after drawing them: the output of every code, largest INL
and DNL, whether it is monotonic, SINAD and the strongest unwanted line of a table through it. Builds are taken some
hundreds at a time, which keeps them in the processor's cache and is faster than all at once. Where high and low pins
are alike, voltages are sums over bits, one matrix product. Speaks JSON lines as pipeline.py does.
"""

import json
import sys
import time

import numpy as np

AT_ONCE = 250


def source_behind(vector, node, rungs, series, terminator, pins, span):
    """Thevenin source behind node 0 up to `node`, low codes along the last axis where `vector` names no one code."""
    r_low, r_high = pins
    low, high = 1 / (rungs + r_low), 1 / (rungs + r_high)
    if vector is not None:
        siemens = np.where(vector, high, low)
        g = 1 / terminator + siemens[:, 0]
        r, u = 1 / g, span * vector[0] * siemens[:, 0] / g
        for i in range(1, node + 1):
            up = 1 / (r + series[:, i - 1])
            g = up + siemens[:, i]
            r, u = 1 / g, (u * up + span * vector[i] * siemens[:, i]) / g
        return u
    g = 1 / terminator[:, None] + np.stack([low[:, 0], high[:, 0]], axis=1)
    r = 1 / g
    u = np.stack([np.zeros(len(r)), span * high[:, 0]], axis=1) * r
    for i in range(1, node + 1):
        up = 1 / (r + series[:, i - 1 : i])
        amps = u * up
        r_low_next, r_high_next = 1 / (up + low[:, i : i + 1]), 1 / (up + high[:, i : i + 1])
        u = np.concatenate([amps * r_low_next, (amps + span * high[:, i : i + 1]) * r_high_next], axis=1)
        r = np.concatenate([r_low_next, r_high_next], axis=1)
    return u


class Job:
    def __init__(self, given):
        self.bits, self.span = given["bits"], given["span"]
        self.pins = given["rLow"], given["rHigh"]
        self.rungs, self.series = np.array(given["rungs"]), np.array(given["series"])
        self.terminator = np.array(given["terminator"])
        self.codes = np.array(given["codes"])
        wanted = np.fft.rfft(np.array(given["cycle"]))
        self.wanted, self.n = wanted, len(self.codes)
        self.power = np.full(len(wanted), 2.0)
        if self.n % 2 == 0:
            self.power[-1] = 1
        self.strongest = (abs(wanted[1:]) * self.power[1:]).max()
        self.ones = (np.arange(2**self.bits) >> np.arange(self.bits)[:, None] & 1).astype(float)
        self.count = np.arange(2**self.bits, dtype=float)

    def volts(self, part):
        args = self.rungs[part], self.series[part], self.terminator[part], self.pins, self.span
        if self.pins[0] != self.pins[1]:
            return source_behind(None, self.bits - 1, *args)
        weights = [source_behind(one, self.bits - 1, *args) for one in np.eye(self.bits)]
        return np.stack(weights, axis=1) @ self.ones

    def figures(self):
        builds = len(self.terminator)
        inl, dnl, sinad, unwanted = (np.empty(builds) for _ in range(4))
        rising = np.empty(builds, dtype=bool)
        for start in range(0, builds, AT_ONCE):
            part = slice(start, start + AT_ONCE)
            v = self.volts(part)
            first = v[:, :1]
            per_lsb = (len(self.count) - 1) / (v[:, -1:] - first)
            steps = np.diff(v, axis=1)
            least, most = steps.min(axis=1), steps.max(axis=1)
            rising[part] = least > 0
            dnl[part] = np.maximum(most * per_lsb[:, 0] - 1, 1 - least * per_lsb[:, 0])
            off = (v - first) * per_lsb
            off -= self.count
            inl[part] = np.maximum(off.max(axis=1), -off.min(axis=1))
            lowest = v.min(axis=1, keepdims=True)
            q = v[:, self.codes]
            q -= lowest
            q *= 2 / (v.max(axis=1, keepdims=True) - lowest)
            q -= 1
            lines = np.fft.rfft(q, axis=1)
            p = abs(lines[:, 1:]) ** 2
            p *= self.power[1:] ** 2 / 2
            if self.n % 2 == 0:
                p[:, -1] *= 2
            carrier = p.max(axis=1)
            sinad[part] = 10 * np.log10(carrier / (p.sum(axis=1) - carrier))
            lines -= self.wanted
            added = abs(lines[:, 1:])
            added *= self.power[1:]
            unwanted[part] = 20 * np.log10(added.max(axis=1) / self.strongest)
        return inl, dnl, rising, sinad, unwanted


job = None
for line in sys.stdin:
    request = json.loads(line)
    if "open" in request:
        job = Job(request["open"])
        names = ("maxInl", "maxDnl", "monotonic", "sinadDb", "unwantedDb")
        answer = {name: values.tolist() for name, values in zip(names, job.figures())}
    else:
        answer = []
        for _ in range(request["run"]):
            start = time.perf_counter()
            job.figures()
            answer.append(1000 * (time.perf_counter() - start))
    print(json.dumps(answer), flush=True)
