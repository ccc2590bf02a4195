"""Writes loop.json: a compressor's loop solved continuously, for test/model/chain/loop.test.ts. Needs numpy and scipy.

Square-law FET behind a resistor, VGS the control voltage (no feedback, no junctions, no capacitors): the drain is a quadratic of input and control.
Follower of the output: C·de/dt = max(|y| − e, 0)/Ra − e/Rr; control = rest + gain·max(e − threshold, 0), at most the limit.
Solver: Radau (implicit Runge-Kutta of order 5), rtol 1e-11, steps of at most 1/384000 s, restarted where the input's level steps.
"""
import json
import os

import numpy as np
from scipy.integrate import solve_ivp

RATE = 384000
P = dict(seriesOhm=10000, idssA=0.003, gateOffV=-1.5, restV=-1.45, limitV=-0.2, thresholdV=0.01, gainVPerV=12, timingF=1e-6, releaseOhm=100e3)
EDGES = [0, 0.004, 0.016, 0.024]
LEVELS = [0.05, 0.5, 0.05]
BETA = P['idssA'] / P['gateOffV'] ** 2


def drain(x, vc):
    """Drain voltage of the square-law shunt, by region."""
    g = 1 / P['seriesOhm']
    ov = vc - P['gateOffV']
    # ohmic: beta (2 ov v - v^2) = (x - v) g, the root that tends to x g/(g + 2 beta ov)
    b = g + 2 * BETA * ov
    disc = b * b - 4 * BETA * x * g
    if disc >= 0:
        v = 2 * x * g / (b + np.sqrt(disc))
        if ov >= 0 and ov - v >= 0:
            return v
    if x > 0:
        v = x - P['seriesOhm'] * BETA * max(ov, 0) ** 2
        return v
    # source and drain swapped: beta (ov - v)^2 = (v - x) g while ov <= 0
    if ov - x <= 0:
        return x
    q = 2 * BETA * ov + g
    v = (q - np.sqrt(max(q * q - 4 * BETA * (BETA * ov * ov + x * g), 0))) / (2 * BETA)
    return v if ov < 0 else 2 * x * g / (b + np.sqrt(disc))


def control(e):
    return min(P['limitV'], P['restV'] + P['gainVPerV'] * max(e - P['thresholdV'], 0))


def solve(attack_sec):
    ra = attack_sec / P['timingF']
    count = round(EDGES[-1] * RATE)
    times = np.arange(count) / RATE
    envelope = np.zeros(count)
    e = 0.0
    for start, end, level in zip(EDGES, EDGES[1:], LEVELS):
        tone = lambda t: level * np.sin(2 * np.pi * 1000 * (t - start))

        def slope(t, y):
            r = abs(drain(tone(t), control(y[0])))
            return [(max(r - y[0], 0) / ra - y[0] / P['releaseOhm']) / P['timingF']]

        inside = np.arange(round(start * RATE), round(end * RATE))
        points = np.append(inside / RATE, end)
        solution = solve_ivp(slope, (start, end), [e], method='Radau', t_eval=points, rtol=1e-11, atol=1e-13, max_step=1 / RATE)
        envelope[inside] = solution.y[0][:-1]
        e = solution.y[0][-1]
    level_at = lambda t: LEVELS[np.searchsorted(EDGES, t + 1e-12, side='right') - 1]
    out = []
    for i in range(0, count, 8):
        t = times[i]
        start = EDGES[np.searchsorted(EDGES, t + 1e-12, side='right') - 1]
        x = level_at(t) * np.sin(2 * np.pi * 1000 * (t - start))
        out.append([round(float(envelope[i]), 12), round(float(drain(x, control(envelope[i]))), 12)])
    return out


if __name__ == '__main__':
    from concurrent.futures import ProcessPoolExecutor

    attacks = [1e-5, 1e-4, 1e-3, 1e-2, 1e-1]
    with ProcessPoolExecutor(2) as pool:
        records = list(pool.map(solve, attacks))
    data = {'about': __doc__, 'params': P, 'rateHz': RATE, 'edgesSec': EDGES, 'levelsV': LEVELS, 'every': 8}
    data['records'] = [{'attackSec': a, 'envelopeV': [r[0] for r in rec], 'drainV': [r[1] for r in rec]} for a, rec in zip(attacks, records)]
    with open(os.path.splitext(__file__)[0] + '.json', 'w') as f:
        json.dump(data, f)
