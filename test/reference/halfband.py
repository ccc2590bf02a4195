"""Coefficients of the half-band filters in model/chain/halfband.ts; prints them as TypeScript. Needs numpy and scipy.

All-pass pairs: poles of the elliptic half-band filter (Valenzuela & Constantinides, IEE Proc. G 130 (1983) 225, from memory).
Linear phase: equiripple by the half-band trick, a full-band Remez design of half the length (Vaidyanathan & Nguyen, IEEE TCAS 34 (1987) 297, from memory).
The first stage passes 20 kHz at 44.1 kHz; the later ones have the wider transition that the first leaves them.
"""
import numpy as np
from scipy.signal import remez

EDGES = [20 / 44.1 / 2 / 2**stage for stage in range(4)]
ALLPASS = [9, 4, 3, 2]
TAPS = [39, 7, 4, 3]  # non-zero taps on one side of the centre


def allpass(count, edge):
    k = np.tan(np.pi * edge) ** 2
    root = np.sqrt(np.sqrt(1 - k * k))
    e = 0.5 * (1 - root) / (1 + root)
    q = e * (1 + e**4 * (2 + e**4 * (15 + 150 * e**4)))
    order = 2 * count + 1
    result = []
    for c in range(1, count + 1):
        num = sum((-1) ** i * q ** (i * (i + 1)) * np.sin((2 * i + 1) * c * np.pi / order) for i in range(12)) * q**0.25
        den = 0.5 + sum((-1) ** i * q ** (i * i) * np.cos(2 * i * c * np.pi / order) for i in range(1, 12))
        w = (num / den) ** 2
        x = np.sqrt((1 - w * k) * (1 - w / k)) / (1 + w)
        result.append((1 - x) / (1 + x))
    return result


def linear_phase(side, edge):
    half = remez(2 * side, [0, 2 * edge], [1], fs=1, maxiter=200)
    return half[side:] / 2


def worst(taps, edge):
    n = np.arange(1, 2 * len(taps), 2)
    f = np.linspace(0, edge, 4001)
    response = 0.5 + 2 * np.cos(2 * np.pi * np.outer(f, n)) @ taps
    stop = 0.5 + 2 * np.cos(2 * np.pi * np.outer(0.5 - f, n)) @ taps
    return 20 * np.log10(np.abs(response)).min(), 20 * np.log10(np.abs(stop)).max()


for stage in range(4):
    print('// stage', stage, [repr(v) for v in allpass(ALLPASS[stage], EDGES[stage])])
for stage in range(4):
    taps = linear_phase(TAPS[stage], EDGES[stage])
    print('// stage', stage, worst(taps, EDGES[stage]), [repr(float(v)) for v in taps])
