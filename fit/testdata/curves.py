#!/usr/bin/env python3
"""Noise-free titration curves with exactly known inflections, written to curves.json.

tanh        mV, y = 180 + 160 tanh((V - 12.345)/0.06) + 1.5 (V - 12.345): odd
            about 12.345 mL apart from a constant, so that is the inflection
strong-acid pH, monoprotic strong acid with strong base
weak-acid   pH, pKa 4.76, with strong base
diprotic    pH, pKa 2.15 and 7.20, with strong base: two inflections
weak-base   pH falling, conjugate acid pKa 9.25, with strong acid
silver      mV, chloride with silver nitrate, pKsp 9.75, electrode 560 mV +
            59.16 mV per decade of silver

All but the first: charge or mass balance, solved for V as a function of the
reading; no activities, pKw 14. The inflections of the reading against V are the
zeros of d2V/dp2 (p = pH or pAg), by truncated power series and
scipy.optimize.brentq; the readings at given volumes by brentq. Full precision,
nothing rounded to a display. Run in this folder.
"""
import math

import numpy as np
from scipy.optimize import brentq

from refjson import versions, write

LN10 = math.log(10)


class Series:
    """f, f', f'' with respect to p."""

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
        return a + b * -1.0

    def __truediv__(a, b):
        return a * b.inverse()

    __radd__, __rmul__ = __add__, __mul__


def ten(p, k=-1.0):
    """10^(k p)."""
    f = 10.0 ** (k * p)
    return Series(f, k * LN10 * f, (k * LN10) ** 2 * f)


def acid(p, v0, ca, cb, pkas, kw=1e-14):
    """mL of strong base cb for v0 mL of ca mol/L of an acid; no pkas: a strong acid."""
    h = ten(p)
    bound = ca + 0.0 * h
    if pkas:  # charge per molecule = sum k beta_k h^-k / sum beta_k h^-k
        top, bottom, beta = Series(0.0), Series(1.0), 0.0
        for k, pk in enumerate(pkas, 1):
            beta -= pk
            term = ten(p, float(k)) * 10.0 ** beta
            top, bottom = top + k * term, bottom + term
        bound = ca * (top / bottom)
    excess = kw * ten(p, 1.0) - h  # [OH-] - [H+]
    return v0 * (bound + excess) / (cb + excess * -1.0)


def base(p, v0, cb, ca, pka, kw=1e-14):
    """mL of strong acid ca for v0 mL of cb mol/L of a weak base."""
    h = ten(p)
    excess = h - kw * ten(p, 1.0)
    return v0 * (cb * (h / (h + 10.0 ** -pka)) + excess) / (ca + excess * -1.0)


def silver(p, v0, ccl, cag, ksp=10 ** -9.75):
    """mL of silver nitrate for v0 mL of chloride; p = pAg."""
    excess = ten(p) - ksp * ten(p, 1.0)  # [Ag+] - [Cl-]
    return v0 * (ccl + excess) / (cag + excess * -1.0)


CASES = {
    "strong-acid": ("pH", lambda p: acid(p, 50.0, 0.021086, 0.1, ()), (1.8, 12.4), (1, 0), 18.0, [50 * 0.021086 / 0.1]),
    "weak-acid": ("pH", lambda p: acid(p, 50.0, 0.021708, 0.1, (4.76,)), (3.4, 12.4), (1, 0), 18.0, [50 * 0.021708 / 0.1]),
    "diprotic": ("pH", lambda p: acid(p, 50.0, 0.016309, 0.1, (2.15, 7.20)), (2.1, 12.3), (1, 0), 25.0,
                 [50 * 0.016309 / 0.1, 100 * 0.016309 / 0.1]),
    "weak-base": ("pH", lambda p: base(p, 50.0, 0.019294, 0.1, 9.25), (1.8, 10.7), (1, 0), 16.0, [50 * 0.019294 / 0.1]),
    "silver": ("mV", lambda p: silver(p, 60.0, 0.017089, 0.1), (2.0, 8.0), (-59.16, 560), 18.0, [60 * 0.017089 / 0.1]),
}


def volumes(places, last):
    """dense: 0.02 mL near each place, 0.25 mL elsewhere; sparse: 0.5 mL throughout; coarse: 1 mL."""
    near = [round(round(p, 1) + 0.02 * k, 2) for p in places for k in range(-40, 41)]
    far = [v for v in np.arange(0, last + 1e-9, 0.25).round(2) if all(abs(v - round(p, 1)) > 0.81 for p in places)]
    return {"dense": sorted(set(near) | set(map(float, far))), "sparse": np.arange(0, last + 1e-9, 0.5).round(2).tolist(),
            "coarse": np.arange(0, last + 1e-9, 1.0).round(2).tolist()}


def turns(curve, low, high, steps=6000):
    """Zeros of d2V/dp2 as (p, V, dp/dV), rising V."""
    grid = np.linspace(low, high, steps)
    s = [curve(p).s for p in grid]
    roots = [brentq(lambda q: curve(q).s, grid[i], grid[i + 1], xtol=1e-15, rtol=1e-15)
             for i in range(steps - 1) if s[i] * s[i + 1] < 0]
    return sorted(((p, curve(p).f, 1 / curve(p).d) for p in roots), key=lambda r: r[1])


def sampled(reading, places, last):
    out = []
    for name, v in volumes(places, last).items():
        brackets = [[max(a for a in v if a <= p), min(a for a in v if a > p)] for p in places]
        out.append({"name": name, "volume_ml": v, "reading": [reading(a) for a in v], "brackets_ml": brackets})
    return out


def equilibrium(name, unit, curve, ends, scale, last, equivalences):
    slope, offset = scale
    extremes = turns(curve, *ends)
    top = [e for i, e in enumerate(extremes)  # steeper than both neighbours, ends of the list left out unless alone
           if all(abs(e[2]) > abs(extremes[j][2]) for j in (i - 1, i + 1) if 0 <= j < len(extremes)) and e[1] < last and e[1] > 0]
    places = [e[1] for e in top]

    def reading(v):
        return offset + slope * brentq(lambda p: curve(p).f - v, ends[0] - 0.5, ends[1] + 0.5, xtol=1e-15, rtol=1e-15)

    return {"name": name, "unit": unit, "inflections_ml": places, "reading_at_inflection": [offset + slope * e[0] for e in top],
            "slope_at_inflection_per_ml": [slope * e[2] for e in top],
            "flattest_ml": [e[1] for e in extremes if e not in top], "slope_at_flattest_per_ml": [slope * e[2] for e in extremes if e not in top],
            "equivalences_ml": equivalences, "samplings": sampled(reading, places, last)}


def tanh():
    v0, w = 12.345, 0.06
    return {"name": "tanh", "unit": "mV", "inflections_ml": [v0], "reading_at_inflection": [180.0],
            "slope_at_inflection_per_ml": [160 / w + 1.5], "flattest_ml": [], "slope_at_flattest_per_ml": [], "equivalences_ml": [],
            "samplings": sampled(lambda v: 180 + 160 * math.tanh((v - v0) / w) + 1.5 * (v - v0), [v0], 20.0)}


write("curves.json", {"made_by": "curves.py", "versions": versions(),
                      "cases": [tanh()] + [equilibrium(n, *c) for n, c in CASES.items()]})
