#!/usr/bin/env python3
"""Where two fitted lines cross, with Fieller's limits: fieller.json and student.json.

Two arms, each a line by least squares, no covariance between them. With
A = a2 - a1 and B = b1 - b2 the crossing is x = A / B, and Fieller's 95 % set is

    { z : (A - z B)^2 <= t^2 var(A - z B) },   t = t(0.975; n1 + n2 - 4)

an interval if g = t^2 var(B) / B^2 < 1, else unbounded. u is first order:
sqrt(var(A - x B)) / |B|. "pooled": one residual variance for both arms, from
n1 + n2 - 4 degrees of freedom; "separate": each arm's own, n - 2. Lines and
variances in exact fractions, square roots in 40-digit decimals. Student
quantiles are R's qt: scipy.stats.t.ppf 1.10.1 is off by 2e-11 at one degree of
freedom, where the closed form tells, but its cdf at R's quantiles must give the
probability. R's lm must give the same crossing, u and limits. Run in this
folder; needs Rscript.

[fieller] E. C. Fieller, J. R. Stat. Soc. B 16 (1954) 175
"""
import math
import subprocess
from decimal import Decimal, getcontext
from fractions import Fraction

from scipy.stats import t as student

from refjson import HERE, versions, write

getcontext().prec = 40
PATTERN = (0.8, -1.3, 0.4, 1.1, -0.6, -0.9, 1.2, -0.2, -0.7, 0.5, 0.9, -1.1, 0.3, -0.4)


def arm(start, step, n, intercept, slope, scatter, turn=0):
    x = [round(start + step * i, 6) for i in range(n)]
    return x, [round(intercept + slope * v + scatter * PATTERN[(i + turn) % len(PATTERN)], 6) for i, v in enumerate(x)]


CASES = {
    # By hand: residuals 0.1 (1, -1, -1, 1) are orthogonal to 1 and x, so the lines are 10 - 2x and x - 5.
    "hand": (([0.0, 1.0, 2.0, 3.0], [10.1, 7.9, 5.9, 4.1]), ([7.0, 8.0, 9.0, 10.0], [2.1, 2.9, 3.9, 5.1])),
    # a strong acid with a strong base, mS/cm against mL, 17 and 19 readings
    "conductance": (arm(0.5, 0.5, 17, 4.26, -0.311, 0.004), arm(11.0, 0.5, 19, -1.21, 0.237, 0.004, 3)),
    # arms of unequal length and scatter
    "unequal": (arm(0.0, 0.4, 12, 2.0, -0.15, 0.002), arm(6.0, 1.0, 4, 0.1, 0.21, 0.03, 5)),
    # shallow angle: limits far from symmetric
    "shallow": (arm(0.0, 1.0, 6, 1.0, 0.10, 0.05), arm(8.0, 1.0, 6, 0.2, 0.20, 0.05, 4)),
    # nearly parallel: the set is unbounded
    "parallel": (arm(0.0, 1.0, 5, 1.0, 0.20, 0.06), arm(6.0, 1.0, 5, 0.9, 0.21, 0.06, 6)),
}


def decimal(f):
    return Decimal(f.numerator) / Decimal(f.denominator)


class Line:
    """Least squares in exact fractions of the binary numbers."""

    def __init__(self, x, y):
        x, y, self.n = [Fraction(v) for v in x], [Fraction(v) for v in y], len(x)
        mean = sum(x) / self.n
        sxx = sum((v - mean) ** 2 for v in x)
        self.b = sum((v - mean) * w for v, w in zip(x, y)) / sxx
        self.a = sum(y) / self.n - self.b * mean
        self.rss = sum((w - self.a - self.b * v) ** 2 for v, w in zip(x, y))
        self.unit = (1 / Fraction(self.n) + mean ** 2 / sxx, -mean / sxx, 1 / sxx)  # cov(a,a), cov(a,b), cov(b,b) for s = 1

    def says(self, s2):
        aa, ab, bb = (v * s2 for v in self.unit)
        return {"readings": self.n, "intercept": float(self.a), "slope": float(self.b), "residual_sd": float(decimal(s2).sqrt()),
                "u_intercept": float(decimal(aa).sqrt()), "u_slope": float(decimal(bb).sqrt()), "cov_intercept_slope": float(ab)}


def crossing(lines, s2, quantile):
    a, b = lines[1].a - lines[0].a, lines[0].b - lines[1].b
    aa, ab, bb = (sum(l.unit[k] * s for l, s in zip(lines, s2)) for k in range(3))
    x, dof = a / b, sum(l.n for l in lines) - 4
    t = Fraction(quantile[dof])
    # With A = a2 - a1 and B = b1 - b2, cov(A, B) is minus the sum of the lines' covariances: ab enters with a minus.
    u = decimal(aa + 2 * x * ab + x * x * bb).sqrt() / decimal(abs(b))
    out = {"lines": [l.says(s) for l, s in zip(lines, s2)], "u_x": float(u), "dof": dof, "t975": float(t), "g": float(t * t * bb / b ** 2)}
    p, q, r = b * b - t * t * bb, a * b + t * t * ab, a * a - t * t * aa
    if p <= 0:
        return out | {"bounded": False, "low95_x": None, "high95_x": None}
    root = decimal(q * q - p * r).sqrt()
    return out | {"bounded": True, "low95_x": float((decimal(q) - root) / decimal(p)), "high95_x": float((decimal(q) + root) / decimal(p))}


def case(name, arms, r, quantile):
    lines = [Line(*xy) for xy in arms]
    pooled = sum(l.rss for l in lines) / (sum(l.n for l in lines) - 4)
    out = {"name": name, "arms": [{"x": x, "y": y} for x, y in arms], "x": float((lines[1].a - lines[0].a) / (lines[0].b - lines[1].b)),
           "pooled": crossing(lines, [pooled, pooled], quantile), "separate": crossing(lines, [l.rss / (l.n - 2) for l in lines], quantile)}
    for way in ("pooled", "separate"):
        mine = [out["x"], out[way]["u_x"], out[way]["t975"], out[way]["low95_x"], out[way]["high95_x"]]
        both = [(m, float(v)) for m, v in zip(mine, r[way, name]) if m is not None or v]
        out[way]["r_apart"] = max(abs(m - v) / max(1, abs(v)) for m, v in both)
    return out


def ask_r():
    rows = ["case,arm,x,y"]
    for name, arms in CASES.items():
        for k, (x, y) in enumerate(arms, 1):
            rows += [f"{name},{k},{v!r},{w!r}" for v, w in zip(x, y)]
    text = subprocess.run(["Rscript", "fieller.R"], input="\n".join(rows) + "\n", capture_output=True, text=True, check=True, cwd=HERE).stdout
    (HERE / "fieller_r.csv").write_text(text)
    cells = [line.split(",") for line in text.splitlines()]
    return cells[0][0].lstrip("# "), {(c[0], c[1]): c[2:] for c in cells[2:]}


def quantiles(r):
    rows = []
    for dof in range(1, 41):
        q = [float(v) for v in r["t", str(dof)][:3]]
        rows.append({"dof": dof, "t950": q[0], "t975": q[1], "t995": q[2],
                     "scipy_cdf_apart": max(abs(student.cdf(v, dof) - p) for v, p in zip(q, (0.95, 0.975, 0.995)))})
    # closed forms: tan(pi (p - 1/2)) for 1, (2p-1) sqrt(2 / (1 - (2p-1)^2)) for 2 degrees of freedom
    assert math.isclose(rows[0]["t975"], math.tan(math.pi * 0.475), rel_tol=1e-14)
    assert math.isclose(rows[1]["t975"], 0.95 * math.sqrt(2 / (1 - 0.95 ** 2)), rel_tol=1e-14)
    return rows


def main():
    version, r = ask_r()
    rows = quantiles(r)
    t975 = {row["dof"]: row["t975"] for row in rows}
    write("student.json", {"made_by": "fieller.py, fieller.R", "versions": versions(r=version), "quantiles": rows})
    write("fieller.json", {"made_by": "fieller.py, fieller.R", "versions": versions(r=version),
                           "cases": [case(n, arms, r, t975) for n, arms in CASES.items()]})


if __name__ == "__main__":
    main()
