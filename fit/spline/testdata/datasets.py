"""Data sets of smoothing.py: short decimal numbers, written out or made by a formula without chance."""
import math

LAMBDAS = [1e-6, 1e-4, 1e-2, 1.0, 1e2, 1e4]


def scatter(i):
    """A repeatable number between -1 and 1."""
    return math.sin(12.9898 * i * i + 4.1414 * i)


def twenty():
    x = [round(0.45 * i + 0.3 * scatter(i) / 2, 3) for i in range(20)]
    y = [round(math.sin(0.8 * a) + 0.3 * a + 0.08 * scatter(3 * i + 1), 3) for i, a in enumerate(x)]
    w = [round(10 ** (2 + 0.4 * scatter(7 * i + 2)), 2) for i in range(20)]
    return {"x": x, "y": y, "w": w, "lambda": LAMBDAS}


def titration():
    """Volume (mL) against pH of a strong acid, 63 readings, as an inverse spline takes them.

    50 mL of 0.02 mol/L with 0.1 mol/L, doses 0.25 mL, readings with 0.01 pH of
    scatter; weights 1 / (0.0012^2 + (0.01 dV/dpH)^2), mL^-2.
    """
    kw, v0, ca, cb = 1e-14, 50.0, 0.02, 0.1
    x, y, w = [], [], []
    for i in range(63):
        v = 0.25 * i
        low, high = 0.0, 14.0
        for _ in range(60):
            p = (low + high) / 2
            h = 10.0 ** -p
            low, high = (p, high) if v0 * (ca - h + kw / h) / (cb + h - kw / h) < v else (low, p)
        h = 10.0 ** -low
        slope = math.log(10) * (h + kw / h) * (v0 + v) / (cb + h - kw / h)
        x.append(round(low + 0.01 * scatter(i), 4))
        y.append(v)
        w.append(float(f"{1 / (0.0012 ** 2 + (0.01 * slope) ** 2):.6g}"))
    order = sorted(range(63), key=lambda i: x[i])
    return {"x": [x[i] for i in order], "y": [y[i] for i in order], "w": [w[i] for i in order], "lambda": LAMBDAS}


CASES = {
    "three": {"x": [0.0, 1.0, 2.0], "y": [0.0, 1.0, 0.0], "w": [1.0, 1.0, 1.0], "lambda": [1.0]},
    "six": {"x": [0.0, 0.5, 1.3, 2.0, 3.7, 5.0], "y": [1.0, 2.0, 1.5, 3.0, 2.0, 4.0], "w": [1.0] * 6, "lambda": LAMBDAS},
    "six-weighted": {"x": [0.0, 0.5, 1.3, 2.0, 3.7, 5.0], "y": [1.0, 2.0, 1.5, 3.0, 2.0, 4.0],
                     "w": [1.0, 100.0, 1.0, 5.0, 10000.0, 2.0], "lambda": LAMBDAS},
    "twenty": twenty(),
    "titration": titration(),
}
