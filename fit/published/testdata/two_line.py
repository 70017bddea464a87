#!/usr/bin/env python3
"""Two-line breaks of the conductometric tables, written to two_line.json.

Readings are corrected for dilution, kappa (V0+V)/V0 with V0 = 100 mL; a line
is fitted to each range by numpy.polyfit; the break is where they cross. Each
table is worked out for the ranges of the published comparison and for every
combination of other sensible ranges: the spread is what the choice of arms
alone is worth. Run in this folder.
"""
import itertools
import json
import pathlib
import platform

import numpy as np

HERE = pathlib.Path(__file__).parent
V0_ML = 100.0


def read(name):
    volume, raw = np.loadtxt(HERE / "source" / f"{name}.csv", delimiter=",", skiprows=1, unpack=True)
    return volume, raw


def crossing(volume, y, left, right):
    lines = []
    for low, high in (left, right):
        q = (volume >= low - 1e-9) & (volume <= high + 1e-9)
        lines.append(np.polyfit(volume[q], y[q], 1))
    (b1, a1), (b2, a2) = lines
    return float((a2 - a1) / (b1 - b2))


def ranges(lows, highs):
    return list(itertools.product(lows, highs))


def study(name, used, left, right):
    volume, raw = read(name)
    corrected = raw * (V0_ML + volume) / V0_ML
    spread = [crossing(volume, corrected, a, b) for a in left for b in right]
    return {"ranges_ml": used, "break_ml": crossing(volume, corrected, *used),
            "uncorrected_ml": crossing(volume, raw, *used),
            "least_ml": min(spread), "most_ml": max(spread), "combinations": len(spread)}


AFTER = ranges((10.5, 11, 11.5, 12), (14, 17, 20))
SHARP = ranges((0, 1, 2, 3, 4), (8, 8.5, 9, 9.5))
MIDDLE = ranges((5, 6, 7), (10, 11, 11.5))
out = {
    "made_by": "two_line.py",
    "versions": {"python": platform.python_version(), "numpy": np.__version__},
    "conductance-strong": [study("conductance-strong", [(0, 9), (11, 20)], SHARP, AFTER)],
    "conductance-weak": [study("conductance-weak", [(4, 9), (11, 20)], ranges((2, 3, 4, 5, 6), (8, 8.5, 9, 9.5)), AFTER)],
    "conductance-mixture": [
        study("conductance-mixture", [(0, 2.5), (6, 11)], ranges((0,), (1.5, 2, 2.5, 3)), MIDDLE),
        study("conductance-mixture", [(6, 11), (13, 20)], MIDDLE, ranges((12.5, 13, 14), (17, 20)))],
    "conductance-silver": [study("conductance-silver", [(0, 9), (11, 20)], SHARP, AFTER)],
}
(HERE / "two_line.json").write_text(json.dumps(out, indent=1) + "\n")
