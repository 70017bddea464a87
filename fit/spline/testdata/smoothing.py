#!/usr/bin/env python3
"""Reference values of weighted cubic smoothing splines, written to smoothing.json.

    minimise  sum w_i (y_i - g(x_i))^2 + lambda * integral g''^2

g is a natural cubic spline with knots at the x_i. Values come from dense
algebra in 60-digit decimals [green]; SciPy's make_smoothing_spline and
CubicSpline and R's smooth.spline, which solve the same problem in other bases,
must agree, and how well they do is kept in the file. Needs Rscript.

[green] P. J. Green, B. W. Silverman, Nonparametric Regression and Generalized
        Linear Models (1994), ch. 2 (from memory)

Run in this folder.
"""
import io
import json
import pathlib
import platform
import re
import subprocess
from decimal import Decimal

import numpy as np
import scipy
from scipy.interpolate import BSpline, CubicSpline, make_smoothing_spline

from datasets import CASES
from exactlinear import dec, product, solve, transpose

HERE = pathlib.Path(__file__).parent
FRACTION = 0.37  # where between two knots the "between" places stand
ZERO = Decimal(0)


class Spline:
    """The minimiser for one lambda, with everything the tests ask of it."""

    def __init__(self, x, y, w, lam):
        self.x, n, k = x, len(x), len(x) - 2
        h = [b - a for a, b in zip(x, x[1:])]
        q = [[ZERO] * k for _ in range(n)]
        r = [[ZERO] * k for _ in range(k)]
        for j in range(k):
            q[j][j], q[j + 1][j], q[j + 2][j] = 1 / h[j], -1 / h[j] - 1 / h[j + 1], 1 / h[j + 1]
            r[j][j] = (h[j] + h[j + 1]) / 3
            if j + 1 < k:
                r[j][j + 1] = r[j + 1][j] = h[j + 1] / 6
        qt = transpose(q)
        wq = [[v / w[i] for v in row] for i, row in enumerate(q)]  # W^-1 Q
        a = [[u + lam * v for u, v in zip(ru, rv)] for ru, rv in zip(r, product(qt, wq))]
        inner = solve(a, qt)  # d(second derivative at inner knots) / dy
        self.dm = [[ZERO] * n] + inner + [[ZERO] * n]
        shift = product(wq, inner)
        self.hat = [[(1 if i == j else 0) - lam * shift[i][j] for j in range(n)] for i in range(n)]
        self.g = [sum(u * v for u, v in zip(row, y)) for row in self.hat]
        self.m = [sum(u * v for u, v in zip(row, y)) for row in self.dm]
        self.chi2 = sum(wi * (yi - gi) ** 2 for wi, yi, gi in zip(w, y, self.g))

    def at(self, t):
        """g, g', g'' at t."""
        i = max(j for j in range(len(self.x) - 1) if self.x[j] <= t)
        h, g, m = self.x[i + 1] - self.x[i], self.g, self.m
        s = t - self.x[i]
        first = (g[i + 1] - g[i]) / h - h * (2 * m[i] + m[i + 1]) / 6
        third = (m[i + 1] - m[i]) / h
        return (g[i] + s * (first + s * (m[i] / 2 + s * third / 6)), first + s * (m[i] + s * third / 2), m[i] + s * third)

    def influence(self, t):
        """d g(t) / dy_j and d g''(t) / dy_j for every j."""
        unit = object.__new__(Spline)
        unit.x, value, second = self.x, [], []
        for j in range(len(self.x)):
            unit.g, unit.m = [row[j] for row in self.hat], [row[j] for row in self.dm]
            v, _, s = unit.at(t)
            value.append(v)
            second.append(s)
        return value, second


def places(x):
    return [a + (b - a) * Decimal(FRACTION) for a, b in zip(x, x[1:])]


def floats(values):
    return [float(v) for v in values]


def triple(spline, xs):
    g, g1, g2 = zip(*(spline.at(t) for t in xs))
    return {"g": floats(g), "g1": floats(g1), "g2": floats(g2)}


def apart(a, b):
    """Largest difference, relative to the largest value."""
    a, b = np.asarray(a), np.asarray(b)
    return float(np.max(np.abs(a - b)) / np.max(np.abs(b)))


def scipy_says(case, lam):
    x, y, w = (np.array(case[k]) for k in "xyw")
    if lam == 0:
        return CubicSpline(x, y, bc_type="natural")
    return make_smoothing_spline(x, y, w=w, lam=lam) if len(x) >= 5 else None


def against_scipy(case, lam, knots, between, xb):
    s = scipy_says(case, lam)
    if s is None:
        return None
    out = {}
    for d, key in enumerate(("g", "g1", "g2")):
        got = np.concatenate([s(np.array(case["x"]), d), s(np.array(xb), d)])
        out[key] = apart(got, knots[key] + between[key])
    return out


def in_r_form(case, lam, third):
    """Fitted values in R's B-spline basis with its constant for 1/3."""
    x, y, w = (np.array(case[k]) for k in "xyw")
    t = np.r_[[x[0]] * 3, x, [x[-1]] * 3]
    n = len(t) - 4
    basis = [BSpline(t, e, 3) for e in np.eye(n)]
    b = np.array([f(x) for f in basis]).T
    gram = np.zeros((n, n))
    for lo, hi in zip(x, x[1:]):
        h = hi - lo
        left, right = (np.array([f.derivative(2)(p) for f in basis]) for p in (lo + h / 4, hi - h / 4))
        low, rise = left - (right - left) / 2, (right - left) * 2
        gram += h * (np.outer(low, low) + (np.outer(low, rise) + np.outer(rise, low)) / 2 + third * np.outer(rise, rise))
    return b @ np.linalg.solve(b.T @ (w[:, None] * b) + lam * gram, b.T @ (w * y))


def ask_r():
    """{(case, lambda): (g, df)} by smoothing.R, whose answer is kept beside it."""
    rows = ["case,lambda,x,y,w"]
    for name, case in CASES.items():
        for lam in case["lambda"] if len(case["x"]) >= 5 else []:
            rows += [f"{name},{lam!r},{x!r},{y!r},{w!r}" for x, y, w in zip(case["x"], case["y"], case["w"])]
    text = subprocess.run(["Rscript", "smoothing.R"], input="\n".join(rows) + "\n", capture_output=True, text=True,
                          check=True, cwd=HERE).stdout
    (HERE / "smoothing_r.csv").write_text(text)
    table = {}
    for line in text.splitlines()[2:]:
        name, lam, _, g, df = line.split(",")
        table.setdefault((name, lam), ([], float(df)))[0].append(float(g))
    return text.splitlines()[0].lstrip("# "), table


def fit(name, case, lam, r):
    x, y, w = (dec(case[k]) for k in "xyw")
    s = Spline(x, y, w, Decimal(lam))
    xb = places(x)
    knots, between = triple(s, x), triple(s, xb)
    mid = xb[len(xb) // 2]
    value, second = s.influence(mid)
    out = {"lambda": lam, "chi2": float(s.chi2), "edf": float(sum(s.hat[i][i] for i in range(len(x)))),
           "leverage": floats(s.hat[i][i] for i in range(len(x))), "at_knots": knots, "between": between,
           "influence": {"x": float(mid), "g": floats(value), "g2": floats(second)},
           "scipy_apart": against_scipy(case, lam, knots, between, floats(xb))}
    if (name, repr(lam)) in r:
        g, df = r[name, repr(lam)]
        out["r_apart"] = {"g": apart(g, in_r_form(case, lam, 0.3330)), "g_exact_third": apart(g, knots["g"]),
                          "edf": abs(df - out["edf"])}
    return out


def line(case):
    """lambda -> infinity: the weighted line."""
    x, y, w = (dec(case[k]) for k in "xyw")
    sw, sx, sy = sum(w), sum(a * b for a, b in zip(w, x)), sum(a * b for a, b in zip(w, y))
    sxx, sxy = (sum(c * a * b for c, a, b in zip(w, x, z)) for z in (x, y))
    slope = (sw * sxy - sx * sy) / (sw * sxx - sx * sx)
    intercept = (sy - slope * sx) / sw
    numpy_line = np.polyfit(case["x"], case["y"], 1, w=np.sqrt(case["w"]))
    return {"intercept": float(intercept), "slope": float(slope), "edf": 2.0, "g": floats(intercept + slope * t for t in x),
            "chi2": float(sum(c * (b - intercept - slope * a) ** 2 for a, b, c in zip(x, y, w))),
            "numpy_apart": apart(numpy_line, [float(slope), float(intercept)])}


def chi2_lambda(case, target):
    """lambda at which chi2 is the target, by bisection on logarithms."""
    x, y, w = (dec(case[k]) for k in "xyw")
    low, high = -12.0, 12.0
    for _ in range(50):
        mid = (low + high) / 2
        low, high = (mid, high) if Spline(x, y, w, Decimal(10.0 ** mid)).chi2 < target else (low, mid)
    return 10.0 ** low


def dump(value):
    """Indented JSON with each array of numbers on one line."""
    text = json.dumps(value, indent=1)
    return re.sub(r"\[[^\[\]{}\"]*\]", lambda m: re.sub(r"\s+", " ", m.group()).replace("[ ", "[").replace(" ]", "]"), text)


def main():
    version, r = ask_r()
    out = {"made_by": "smoothing.py, datasets.py, exactlinear.py, smoothing.R",
           "versions": {"python": platform.python_version(), "numpy": np.__version__, "scipy": scipy.__version__, "r": version},
           "objective": "sum w (y - g(x))^2 + lambda * integral g''^2, natural cubic spline", "cases": []}
    for name, case in CASES.items():
        x = dec(case["x"])
        entry = {"name": name, "x": case["x"], "y": case["y"], "w": case["w"], "between_x": floats(places(x)),
                 "fits": [fit(name, case, lam, r) for lam in [0.0] + case["lambda"]], "line": line(case)}
        n = len(x)
        if entry["line"]["chi2"] > n:
            entry["chi2_is_n_lambda"] = chi2_lambda(case, n)
        out["cases"].append(entry)
    (HERE / "smoothing.json").write_text(dump(out) + "\n")


if __name__ == "__main__":
    main()
