"""What a pin that holds each entry gives, and what frames that were played hold of it. JSON in, JSON out.

Written from §5 of the engine specification. Two ways to the lines of a loop: the Fourier integral of its treads, and
the FFT of a staircase held 256 times as finely. An accumulator is run in whole numbers for a round, index
acc >> (M−p), and its samples are transformed; each line and its images at k·fs ± f stand under |sin(πx)/(πx)|, x = f/fs.

Frames are measured by an FFT over one second, in which all lines stand on whole hertz.
"""

import json
import sys

import numpy as np

RATE = 48_000
TOP = 20_000


def by_treads(values, count):
    size = len(values)
    m = np.arange(1, count + 1)[:, None]
    k = np.arange(size)[None, :]
    start = np.exp(-2j * np.pi * ((m * k) % size) / size)
    end = np.exp(-2j * np.pi * ((m * (k + 1)) % size) / size)
    return 2 * (values[None, :] * (start - end)).sum(1) / (2j * np.pi * m[:, 0])


def by_fine_steps(values, count):
    finer = 256
    return 2 * np.fft.fft(np.repeat(values, finer))[1 : count + 1] / (len(values) * finer)


def pairs(lines):
    return [[line.real, line.imag] for line in lines]


def staircase(values, count):
    values = np.array(values)
    return {"treads": pairs(by_treads(values, count)), "fine": np.abs(by_fine_steps(values, count)).tolist()}


def loop_lines(values, roundHz):
    """Amplitude on each whole hertz below half the rate; the round goes round a whole number of times a second."""
    wanted = np.zeros(RATE // 2)
    lines = by_treads(np.array(values), (RATE // 2 - 1) // roundHz)
    wanted[roundHz :: roundHz][: len(lines)] = np.abs(lines)
    return wanted


def accumulator_lines(values, sampleRateHz, accumulatorBits, stepWord):
    values = np.array(values)
    shift = accumulatorBits - (len(values).bit_length() - 1)
    period = sampleRateHz
    acc, output = 0, np.empty(period)
    for n in range(period):
        output[n] = values[acc >> shift]
        acc = (acc + stepWord) % 2**accumulatorBits
    assert acc == 0, "a round is a second"
    sampled = np.fft.fft(output - output.mean()) / period
    hz = np.arange(1, RATE // 2)
    # On hertz f stands sample line f mod fs, held: that is f itself, or the image of one below fs.
    wanted = np.zeros(RATE // 2)
    wanted[1:] = 2 * np.abs(sampled[hz % period]) * np.abs(np.sinc(hz / period))
    return wanted


def stage_gain(hz, ohms, farads, gainBandwidthHz, kind, cutoffHz):
    gain = 1 / np.hypot(1, 2 * np.pi * hz * ohms * farads) / np.hypot(1, hz / gainBandwidthHz)
    return gain / (np.hypot(1, hz / cutoffHz) if kind == "rc" else np.sqrt(1 + (hz / cutoffHz) ** 4))


def played(frames, wanted, stage=None):
    found = 2 * np.abs(np.fft.rfft(np.array(frames))[: RATE // 2]) / RATE
    found[0] = 0
    if stage is not None:
        wanted = wanted * stage_gain(np.arange(RATE // 2), **stage)
    inside = slice(1, TOP + 1)
    strong = wanted[inside] > 10 ** (-80 / 20)
    decibels = 20 * np.log10(found[inside][strong] / wanted[inside][strong])
    # Beside the lines themselves: bins where nothing is wanted, and what weak lines are off.
    weak = np.abs(found[inside] - wanted[inside])[~strong]
    return {
        "lines": int(strong.sum()),
        "worstDb": float(np.abs(decibels).max()),
        "spuriousDb": float(20 * np.log10(max(weak.max(initial=0), 1e-12))),
    }


def spurs(frames, wanted, carrierHz, spurHz, sampleRateHz):
    """Level of a spur beside the carrier as the samples have it: what the hold takes of each is put back."""
    found = 2 * np.abs(np.fft.rfft(np.array(frames))[: RATE // 2]) / RATE
    sampled = [found[hz] / np.sinc(hz / sampleRateHz) for hz in (carrierHz, spurHz)]
    theirs = [wanted[hz] / np.sinc(hz / sampleRateHz) for hz in (carrierHz, spurHz)]
    return {
        "measuredDbc": 20 * np.log10(sampled[1] / sampled[0]),
        "computedDbc": 20 * np.log10(theirs[1] / theirs[0]),
    }


def answer(question):
    kind = question.pop("kind")
    if kind == "staircase":
        return staircase(**question)
    frames, stage = question.pop("frames"), question.pop("stage", None)
    if kind == "loop":
        return played(frames, loop_lines(**question), stage)
    bins = {name: question.pop(name, None) for name in ("carrierHz", "spurHz")}
    wanted = accumulator_lines(**question)
    result = played(frames, wanted, stage)
    if bins["spurHz"] is not None:
        result |= spurs(frames, wanted, **bins, sampleRateHz=question["sampleRateHz"])
    return result


json.dump([answer(each) for each in json.load(sys.stdin)], sys.stdout)
