#!/usr/bin/env python3
"""Reference values of the shape-keeping cubic, written to shape.json.

SciPy's PchipInterpolator: slope at an inner knot = weighted harmonic mean of
the two secants beside it, (w1 + w2) / (w1/m_left + w2/m_right) with
w1 = 2 h_right + h_left, w2 = h_right + 2 h_left, and 0 where the secants differ
in sign or one is 0 (Fritsch, Butland, SIAM J. Sci. Stat. Comput. 5 (1984) 300;
the weights are from memory). At the ends a one-sided three-point slope, set to
0 if its sign is not the secant's, and to 3 secants if the next secant turns and
it is larger. gonum v0.17.0 (interp.FritschButland) has the same inner slopes
and the same ends by its source; a program with other ends compares "inner",
which leaves out the first and last knot and interval. Run in this folder.
"""
import json
import pathlib
import platform

import numpy as np
import scipy
from scipy.interpolate import PchipInterpolator

from smoothing import dump

HERE = pathlib.Path(__file__).parent
FRACTION = 0.37

CASES = {
    # a jump of seven readings, volume in mL and pH
    "jump": ([9.0, 9.5, 9.8, 10.0, 10.1, 10.4, 11.0], [3.6, 3.95, 4.4, 7.1, 9.6, 10.2, 10.6]),
    # a falling curve
    "falling": ([0.0, 1.0, 1.5, 2.5, 3.0, 3.1, 3.2, 3.6, 5.0], [8.1, 7.6, 7.3, 6.4, 5.6, 5.1, 4.2, 3.4, 2.9]),
    # level stretches, turns and ends that the end rule bends back
    "turning": ([0.0, 1.0, 2.0, 2.5, 4.0, 5.0, 5.5, 6.0], [0.0, 0.2, 3.0, 3.0, 3.0, 1.0, 2.5, 2.4]),
    "end-limited": ([0.0, 1.0, 2.0, 3.0, 4.0], [0.0, 1.0, -9.0, -10.0, -9.9]),
    "three": ([0.0, 1.0, 3.0], [0.0, 1.0, 2.0]),
    "two": ([1.0, 3.0], [2.0, 7.0]),
}


def steepest(curve):
    """Place and size of the largest |slope| between the first and the last reading, knots included."""
    best = (0.0, 0.0)
    for i in range(len(curve.x) - 1):
        a, b, c, _ = curve.c[:, i]  # a s^3 + b s^2 + c s + d
        h = curve.x[i + 1] - curve.x[i]
        for s in [0.0, h] + ([-b / (3 * a)] if a and 0 < -b / (3 * a) < h else []):
            slope = abs(3 * a * s * s + 2 * b * s + c)
            best = max(best, (slope, curve.x[i] + s))
    return {"x": best[1], "slope": best[0]}


def case(name, x, y):
    curve = PchipInterpolator(x, y)
    x, between = np.array(x), np.array(x)[:-1] + FRACTION * np.diff(x)
    out = {"name": name, "x": x.tolist(), "y": y, "slope_at_knots": curve(x, 1).tolist(),
           "between": {"x": between.tolist(), "y": curve(between).tolist(), "y1": curve(between, 1).tolist(),
                       "y2": curve(between, 2).tolist()},
           "steepest": steepest(curve)}
    out["inner"] = {"knots_from": 1, "knots_to": len(x) - 2, "between_from": 1, "between_to": len(between) - 2}
    return out


(HERE / "shape.json").write_text(dump({
    "made_by": "shape.py",
    "versions": {"python": platform.python_version(), "numpy": np.__version__, "scipy": scipy.__version__},
    "cases": [case(name, *xy) for name, xy in CASES.items()]}) + "\n")
