"""Edges of patterns of pulses and pauses, from what a pattern means alone.

A pattern is steps of a pulse of onMs and a pause of offMs, repeats times each, one step after the other; endless ones
begin again where the last pause ends. In: {"cases": [{"pattern", "ticks"}]}. Out: for each case the millisecond k of
each change of what sounds from the millisecond before it, k below ticks; before the first one it is silent.
"""

import itertools
import json
import sys


def pulses_of_a_pass(pattern):
    """(beginning, end) of each pulse, and the length of the pass."""
    at = 0
    pulses = []
    for step in pattern["steps"]:
        for _ in range(step["repeats"]):
            pulses.append((at, at + step["onMs"]))
            at += step["onMs"] + step["offMs"]
    return pulses, at


def edges(pattern, ticks):
    pulses, length = pulses_of_a_pass(pattern)
    passes = itertools.count() if pattern["endless"] else range(1)
    found = []
    for turn in passes:
        start = turn * length
        if start >= ticks:
            break
        for begin, end in pulses:
            # Two edges in the same place are none: the tone goes on.
            for edge in (start + begin, start + end):
                if found and found[-1] == edge:
                    found.pop()
                else:
                    found.append(edge)
    return [edge for edge in found if edge < ticks]


question = json.load(sys.stdin)
json.dump([edges(case["pattern"], case["ticks"]) for case in question["cases"]], sys.stdout)
