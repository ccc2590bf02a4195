"""Coefficients of the kernels in model/chain/kinks.ts, one for each oversampling; prints them as TypeScript. Needs numpy and scipy.

h(u) = (1 - x)^2 * sum c_j x^j, x = (u/2)^2, |u| < 2 samples. Least squares, for a bend in curvature (spectrum 1/f^3): what h changes in the band to
20 kHz at 44.1 kHz, and what it leaves of the six images of that band on each side; unit area and no second moment, so that straight lines
and parabolas pass unchanged and a correction ends with the kernel.
"""
import numpy as np
from numpy.polynomial.legendre import leggauss
from scipy.linalg import null_space

TERMS = 6
HALF = 2
IMAGES = 6


def kernel(factor):
    edge = 20 / 44.1 / factor
    nodes, weights = leggauss(200)
    u, du = HALF * (nodes + 1) / 2, weights * HALF / 2
    basis = np.array([(1 - (u / HALF) ** 2) ** 2 * (u / HALF) ** (2 * j) for j in range(TERMS)])

    def response(f):
        return 2 * (basis * du) @ np.cos(2 * np.pi * np.outer(u, f))

    nodes, weights = leggauss(60)
    f, root = edge * (nodes + 1) / 2, np.sqrt(weights * edge / 2)
    left, right = [(response(f) * root / f**3).T], [root / f**3]
    for image in range(1, IMAGES + 1):
        for g in (image - f, image + f):
            left.append((response(g) * root / g**3).T)
            right.append(0 * f)
    left, right = np.vstack(left), np.concatenate(right)
    moments = np.array([2 * (basis * du).sum(1), 2 * (basis * du * u**2).sum(1)])
    start = np.linalg.lstsq(moments, np.array([1.0, 0.0]), rcond=None)[0]
    free = null_space(moments)
    return start + free @ np.linalg.lstsq(left @ free, right - left @ start, rcond=None)[0]


for factor in (2, 4, 8, 16):
    print("  [" + ", ".join(repr(float(c)) for c in kernel(factor)) + "],")
