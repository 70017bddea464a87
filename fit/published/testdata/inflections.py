#!/usr/bin/env python3
"""Exact inflections of the two simulated tables, written to inflections.json.

seawater     Dickson (1981), Table 1: the acid mass w is an explicit function of
             pH, so the inflections of pH(w) are the zeros of d2w/dpH2.
dilute-acid  Schwartz (1992): how flat the curve of a 1e-4 mol/L acid of pKa 8.16
             is, that is why no derivative can find its endpoint.

Derivatives by truncated power series in pH, roots by scipy.optimize.brentq.
Run in this folder.
"""
import csv
import json
import math
import pathlib
import platform

import numpy as np
import scipy
from scipy.optimize import brentq

HERE = pathlib.Path(__file__).parent
LN10 = math.log(10)


class Series:
    """f, f', f'' at one pH."""

    def __init__(self, f, d=0.0, s=0.0):
        self.f, self.d, self.s = f, d, s

    def __add__(a, b):
        b = b if isinstance(b, Series) else Series(b)
        return Series(a.f + b.f, a.d + b.d, a.s + b.s)

    def __mul__(a, b):
        b = b if isinstance(b, Series) else Series(b)
        return Series(a.f * b.f, a.d * b.f + a.f * b.d, a.s * b.f + 2 * a.d * b.d + a.f * b.s)

    def inverse(a):
        return Series(1 / a.f, -a.d / a.f ** 2, 2 * a.d ** 2 / a.f ** 3 - a.s / a.f ** 2)

    def __sub__(a, b):
        return a + b * -1.0 if isinstance(b, Series) else a + -b

    def __truediv__(a, b):
        return a * b.inverse() if isinstance(b, Series) else a * (1 / b)

    __radd__, __rmul__ = __add__, __mul__

    def __rsub__(a, b):
        return a * -1.0 + b

    def __rtruediv__(a, b):
        return a.inverse() * b


def hydrogen(ph):
    h = 10.0 ** -ph
    return Series(h, -LN10 * h, LN10 ** 2 * h)


def seawater(ph):
    """Acid mass, g; [dickson] equation with f = W0/(W0+w) solved for w."""
    at, ct, bt, st, ft = 0.00245, 0.00220, 0.00042, 0.02824, 0.00007  # mol/kg
    k1, k2, kb, kw, ks, kf = 1e-6, 8.2e-10, 1.78e-9, 4.32e-14, 1 / 12.3, 1 / 408
    w0, c = 200.0, 0.3  # g, mol/kg
    h = hydrogen(ph)
    held = (ct * (k1 * h + 2 * k1 * k2) / (h * h + k1 * h + k1 * k2) + bt * kb / (kb + h)
            - st * h / (ks + h) - ft * h / (kf + h))
    water = kw / h - h
    return w0 * (at - held - water) / (c + water)


def dilute_acid(ph):
    """Titrant volume, mL, for the constants that fit the table (checked below)."""
    v0, ca, cb, ka, kw = 49.94, 1.02e-4, 1.004e-3, 10 ** -8.16, 10 ** -13.84
    h = hydrogen(ph)
    charge = kw / h - h
    return v0 * (ca * ka / (ka + h) + charge) / (cb - charge)


def extremes(curve, low, high, steps=4000):
    """Every zero of d2V/dpH2: place, pH and |dpH/dV|."""
    grid = np.linspace(low, high, steps)
    s = [curve(p).s for p in grid]
    out = []
    for i in range(steps - 1):
        if s[i] * s[i + 1] < 0:
            p = brentq(lambda q: curve(q).s, grid[i], grid[i + 1], xtol=1e-14, rtol=1e-15)
            v = curve(p)
            out.append({"volume_ml": v.f, "ph": p, "slope_per_ml": abs(1 / v.d)})
    return sorted(out, key=lambda e: e["volume_ml"])


def distance(name, curve):
    """Root mean square and largest distance between the table's pH and the curve's."""
    with open(HERE / "source" / f"{name}.csv", newline="") as f:
        rows = [(float(a), float(b)) for a, b in list(csv.reader(f))[1:]]
    d = [b - brentq(lambda p: curve(p).f - a, b - 0.5, b + 0.5, xtol=1e-14) for a, b in rows]
    return {"rms_ph": math.sqrt(sum(e * e for e in d) / len(d)), "largest_ph": max(map(abs, d))}


out = {
    "made_by": "inflections.py",
    "versions": {"python": platform.python_version(), "scipy": scipy.__version__, "numpy": np.__version__},
    "seawater": {"table_from_curve": distance("seawater", seawater), "slope_extremes": extremes(seawater, 3.05, 8.05)},
    "dilute_acid": {"table_from_curve": distance("dilute-acid", dilute_acid),
                    "slope_extremes": extremes(dilute_acid, 6.3, 9.7)},
}
(HERE / "inflections.json").write_text(json.dumps(out, indent=1) + "\n")
