"""Dense linear algebra in 60-digit decimals, for reference values that no rounding reaches."""
from decimal import Decimal, getcontext

getcontext().prec = 60


def dec(values):
    """Floats as exactly the numbers that binary arithmetic sees."""
    return [Decimal(v) for v in values]


def solve(a, b):
    """X of A X = B by elimination with pivots; a is a list of rows, b a list of rows."""
    n = len(a)
    m = [list(a[i]) + list(b[i]) for i in range(n)]
    for k in range(n):
        p = max(range(k, n), key=lambda i: abs(m[i][k]))
        m[k], m[p] = m[p], m[k]
        pivot = m[k][k]
        for i in range(k + 1, n):
            if m[i][k]:
                f = m[i][k] / pivot
                m[i] = [u - f * v if v else u for u, v in zip(m[i], m[k])]
    for k in range(n - 1, -1, -1):
        m[k] = [u / m[k][k] for u in m[k]]
        for i in range(k):
            if m[i][k]:
                f = m[i][k]
                m[i] = [u - f * v if v else u for u, v in zip(m[i], m[k])]
    return [row[n:] for row in m]


def product(a, b):
    columns = list(zip(*b))
    return [[sum((u * v for u, v in zip(row, c) if u and v), Decimal(0)) for c in columns] for row in a]


def transpose(a):
    return [list(c) for c in zip(*a)]
