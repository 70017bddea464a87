"""Reference values for the tests of fit/simulate, with SciPy.

Written apart from the Go code: every species has its own term, the balance is
solved by scipy.optimize.brentq, steepest places by minimising -|dy/dV| of that
solution along the volume. Writes reference.csv beside itself.

    /usr/bin/python3 reference.py
"""
import csv
import math
import os
import sys

import scipy
from scipy.optimize import brentq, minimize_scalar

KW = 10 ** -13.995


def phosphate_charge(h, c):
    k1, k2, k3 = 10 ** -2.16, 10 ** -7.21, 10 ** -12.32
    d = h**3 + k1 * h**2 + k1 * k2 * h + k1 * k2 * k3
    return -c * (k1 * h**2 + 2 * k1 * k2 * h + 3 * k1 * k2 * k3) / d


def carbonate_charge(h, c):
    k1, k2 = 10 ** -6.35, 10 ** -10.33
    d = h**2 + k1 * h + k1 * k2
    return -c * (k1 * h + 2 * k1 * k2) / d


def acetate_charge(h, c):
    k = 10 ** -4.756
    return -c * k / (k + h)


def ammonium_charge(h, c):
    k = 10 ** -9.25
    return c * h / (k + h)


def solve(balance):
    return brentq(lambda ph: balance(10**-ph), -1, 16, xtol=1e-14, rtol=8.9e-16)


def water(h):
    return h - KW / h


# Each curve: pH at a volume, from 60 mL titrated with 0.1 mol/L.
V0 = 60.0


def phosphoric(v):  # 0.015 mol/L H3PO4 with NaOH
    t = V0 + v
    return solve(lambda h: 0.1 * v / t + phosphate_charge(h, 0.015 * V0 / t) + water(h))


def alkalinity(v):  # 0.007 mol/L Na2CO3 with 0.005 mol/L NaHCO3 with HCl
    t = V0 + v
    return solve(lambda h: (0.019 * V0 - 0.1 * v) / t + carbonate_charge(h, 0.012 * V0 / t) + water(h))


def carbonated(v):  # 0.02 mol/L acetic acid with NaOH that took up 0.002 mol/L CO2
    t = V0 + v
    return solve(lambda h: 0.1 * v / t + acetate_charge(h, 0.02 * V0 / t) + carbonate_charge(h, 0.002 * v / t) + water(h))


def ammonia(v):  # 0.02 mol/L ammonia with HCl
    t = V0 + v
    return solve(lambda h: -0.1 * v / t + ammonium_charge(h, 0.02 * V0 / t) + water(h))


def silver(halides):
    def log_ag(v):
        t = V0 + v

        def balance(u):
            a = 10**u
            return a + sum(max(0.0, c * V0 / t - k / a) for c, k in halides) - 0.1 * v / t

        return brentq(balance, -25, 1, xtol=1e-14, rtol=8.9e-16)

    return log_ag


chloride = silver([(0.02, 10**-9.75)])
mixed = silver([(0.01, 10**-12.3), (0.01, 10**-9.75)])  # bromide, chloride


def steepest(curve, guess, half):
    def slope(v):
        d = 2e-4  # five-point difference; the error is of order d^4
        return -abs(curve(v - 2 * d) - 8 * curve(v - d) + 8 * curve(v + d) - curve(v + 2 * d)) / (12 * d)

    r = minimize_scalar(slope, bounds=(guess - half, guess + half), method="bounded", options={"xatol": 1e-9})
    return r.x


def main():
    here = os.path.dirname(os.path.abspath(__file__))
    with open(os.path.join(here, "reference.csv"), "w", newline="") as f:
        w = csv.writer(f, lineterminator="\n")
        w.writerow(["curve", "what", "volume_mL", "value"])
        for name, curve, volumes in [
            ("phosphoric", phosphoric, [0, 2, 4.5, 8.9, 9, 9.1, 13.5, 18, 18.2, 25]),
            ("alkalinity", alkalinity, [0, 2.1, 4.2, 4.3, 7.8, 11.3, 11.4, 11.5, 15]),
            ("carbonated", carbonated, [0, 1, 6, 11.5, 12, 12.1, 12.5, 16]),
            ("ammonia", ammonia, [0, 1, 6, 11.9, 12, 12.1, 16]),
            ("chloride", chloride, [0.5, 6, 11.9, 12, 12.1, 16]),
            ("mixed", mixed, [0.5, 3, 5.9, 6, 6.1, 9, 12, 12.1, 16]),
        ]:
            for v in volumes:
                w.writerow([name, "reading", v, repr(curve(v))])
        for name, curve, guess, half in [
            ("phosphoric", phosphoric, 9, 0.3),
            ("phosphoric", phosphoric, 18, 0.3),
            ("alkalinity", alkalinity, 4.2, 0.3),
            ("alkalinity", alkalinity, 11.4, 0.3),
            ("ammonia", ammonia, 12, 0.05),
            ("chloride", chloride, 12, 0.05),
        ]:
            w.writerow([name, "steepest", guess, repr(steepest(curve, guess, half))])
    print("SciPy", scipy.__version__, "Python", sys.version.split()[0])


main()
