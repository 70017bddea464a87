#!/usr/bin/env python3
"""Write norris.json: the linear regression data set Norris with its certified values.

NIST Statistical Reference Datasets (StRD), linear regression, Norris (36
observations, lower level of difficulty), as certified: y = B0 + B1 x. The data
and the certified figures are typed in below; exact fractions must reproduce
them. Run in this folder.
"""
from decimal import Decimal, getcontext
from fractions import Fraction

from refjson import versions, write

getcontext().prec = 40
Y = """0.1 338.8 118.1 888.0 9.2 228.1 668.5 998.5 449.1 778.9 559.2 0.3 0.1 778.1 668.8 339.3 448.9 10.8
557.7 228.3 998.0 888.8 119.6 0.3 0.6 557.6 339.3 888.0 998.5 778.9 10.2 117.6 228.9 668.4 449.2 0.2""".split()
X = """0.2 337.4 118.2 884.6 10.1 226.5 666.3 996.3 448.6 777.0 558.2 0.4 0.6 775.5 666.9 338.0 447.5 11.6
556.0 228.1 995.8 887.6 120.2 0.3 0.3 556.8 339.1 887.2 999.0 779.0 11.1 118.3 229.2 669.1 448.9 0.5""".split()
CERTIFIED = {"intercept": -0.262323073774029, "slope": 1.00211681802045, "u_intercept": 0.232818234301152,
             "u_slope": 0.429796848199937e-03, "residual_sd": 0.884796396144373, "residual_sum_of_squares": 26.6173985294224,
             "r_squared": 0.999993745883712, "dof": 34}


def exact():
    x, y, n = [Fraction(v) for v in X], [Fraction(v) for v in Y], len(X)
    mx, my = sum(x) / n, sum(y) / n
    sxx, syy = sum((v - mx) ** 2 for v in x), sum((v - my) ** 2 for v in y)
    slope = sum((v - mx) * (w - my) for v, w in zip(x, y)) / sxx
    rss = sum((w - my - slope * (v - mx)) ** 2 for v, w in zip(x, y))
    s2 = rss / (n - 2)

    def root(f):
        return float((Decimal(f.numerator) / Decimal(f.denominator)).sqrt())

    return {"intercept": float(my - slope * mx), "slope": float(slope), "u_intercept": root(s2 * (Fraction(1, n) + mx ** 2 / sxx)),
            "u_slope": root(s2 / sxx), "residual_sd": root(s2), "residual_sum_of_squares": float(rss),
            "r_squared": float(1 - rss / syy), "dof": n - 2, "cov_intercept_slope": float(-mx / sxx * s2)}


found = exact()
assert len(X) == len(Y) == 36
for key, value in CERTIFIED.items():
    assert abs(found[key] - value) <= 2e-14 * abs(value), (key, found[key], value)
write("norris.json", {"made_by": "norris.py", "versions": versions(), "source": "NIST StRD Norris",
                      "x": [float(v) for v in X], "y": [float(v) for v in Y], "certified": CERTIFIED,
                      "computed_cov_intercept_slope": found["cov_intercept_slope"]})
