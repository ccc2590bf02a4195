"""Writes loop.json: compressors' loops solved continuously, for test/model/chain/loop.test.ts. Needs numpy and scipy.

Square-law FET behind a resistor; the gate sees the control and, in some cases, a fraction of the drain through a resistor with or without a
blocking capacitor (no junctions, no picofarads): the drain solves a quadratic for each region, the blocking capacitor is a state.
Follower of the output: C·de/dt = max(r − e, 0)/Ra − e/Rr, r = |y| or max(y, 0), of the larger channel where linked;
control = rest + gain·max(e − threshold, 0), at most the limit.
Solver: Radau (implicit Runge-Kutta of order 5), rtol 1e-11, steps of at most 1/384000 s, restarted where the input's level steps.
"""
import json
import os
import sys

import numpy as np
from scipy.integrate import solve_ivp

RATE = 384000
EVERY = 16
P = dict(seriesOhm=10000, idssA=0.003, gateOffV=-1.5, restV=-1.45, limitV=-0.2, timingF=1e-6)
CONTROL_OHM = 470e3
EDGES = [0, 0.004, 0.016, 0.024]
LEVELS = [0.05, 0.5, 0.05]
# Of each channel: share of the level, and frequency. Every stretch begins at a zero crossing.
CHANNELS = [(1, 1000), (0.8, 1500)]
BETA = P['idssA'] / P['gateOffV'] ** 2
FEEDBACKS = {'none': (0, None), 'resistor': (470e3, None), 'blocked': (470e3, 22e-9)}


def drain(x, vc, feedback_ohm, blocked):
    """Drain voltage: the root of a balance that falls with it, by region; `blocked` is the blocking capacitor's voltage."""
    g = 1 / P['seriesOhm']
    k, gf = (CONTROL_OHM / (CONTROL_OHM + feedback_ohm), 1 / (CONTROL_OHM + feedback_ohm)) if feedback_ohm else (0, 0)
    s = vc - k * (blocked + vc) - P['gateOffV']
    best, worst = 0.0, np.inf
    for on_s in (1, 0):
        for on_d in (1, 0):
            # beta·(on_s·(s + k v)² − on_d·(s − (1−k) v)²) + (v − blocked − vc)·gf + (v − x)·g = 0
            a = BETA * (on_s * k * k - on_d * (1 - k) ** 2)
            b = BETA * 2 * s * (on_s * k + on_d * (1 - k)) + gf + g
            c = BETA * s * s * (on_s - on_d) - (blocked + vc) * gf - x * g
            if abs(a) < 1e-18:
                roots = [-c / b] if b else []
            else:
                disc = b * b - 4 * a * c
                if disc < 0:
                    continue
                q = -0.5 * (b + np.copysign(np.sqrt(disc), b))
                roots = [q / a] + ([c / q] if q else [])
            for v in roots:
                vs, vd = s + k * v, s - (1 - k) * v
                miss = max(0, -vs if on_s else vs) + max(0, -vd if on_d else vd)
                if miss < worst:
                    best, worst = v, miss
    return best


def control(e, case):
    return min(P['limitV'], P['restV'] + case['gainVPerV'] * max(e - case['thresholdV'], 0))


def solve(case):
    channels = CHANNELS[: case['channels']]
    ra = case['attackSec'] / P['timingF']
    feedback_ohm, blocking = FEEDBACKS[case['feedback']]
    full, linked = case['rectifier'] == 'full', case['linked']
    followers = 1 if linked else len(channels)

    def inputs(t, start, level):
        return [level * share * np.sin(2 * np.pi * hz * (t - start)) for share, hz in channels]

    def drains(xs, y):
        vcs = [control(y[min(c, followers - 1)], case) for c in range(len(xs))]
        vs = [drain(x, vc, feedback_ohm, y[followers + c] if blocking else 0) for c, (x, vc) in enumerate(zip(xs, vcs))]
        return vs, vcs

    def slope(t, y, start, level):
        vs, vcs = drains(inputs(t, start, level), y)
        heard = [abs(v) if full else max(v, 0) for v in vs]
        if linked:
            heard = [max(heard)]
        rates = [(max(r - e, 0) / ra - e / case['releaseOhm']) / P['timingF'] for r, e in zip(heard, y)]
        if blocking:
            rates += [(v - y[followers + c] - vc) / ((CONTROL_OHM + feedback_ohm) * blocking) for c, (v, vc) in enumerate(zip(vs, vcs))]
        return rates

    y = np.array([0.0] * followers + ([-P['restV']] * len(channels) if blocking else []))
    out = []
    for start, end, level in zip(EDGES, EDGES[1:], LEVELS):
        at = np.arange(round(start * RATE), round(end * RATE), EVERY) / RATE
        solution = solve_ivp(
            slope, (start, end), y, method='Radau', t_eval=np.append(at, end), args=(start, level), rtol=1e-11, atol=1e-13, max_step=1 / RATE
        )
        for t, state in zip(at, solution.y.T):
            out.append(drains(inputs(t, start, level), state)[0])
        y = solution.y[:, -1]
    return {**case, 'drainV': [[round(float(v), 11) for v in channel] for channel in zip(*out)]}


def loop(gain, rectifier, attack, feedback='none', channels=1, linked=True, threshold=0.01, release=100e3):
    return dict(
        gainVPerV=gain, rectifier=rectifier, attackSec=attack, feedback=feedback, channels=channels, linked=linked, thresholdV=threshold, releaseOhm=release
    )


CASES = (
    [loop(12, 'full', attack) for attack in (1e-5, 1e-4, 1e-3, 1e-2, 1e-1)]
    + [loop(8, 'half', 1e-5), loop(30, 'full', 1e-5), loop(30, 'full', 1e-3)]
    + [loop(30, 'half', attack) for attack in (1e-5, 1e-4, 1e-2)]
    + [loop(gain, rectifier, 1e-5, release=1e3) for gain in (8, 30) for rectifier in ('full', 'half')]
    + [loop(gain, rectifier, 1e-5, threshold=0, release=1e3) for gain in (8, 30) for rectifier in ('full', 'half')]
    + [loop(30, 'half', 1e-3, threshold=0, release=1e3), loop(30, 'half', 1e-5, 'blocked', threshold=0, release=1e4)]
    + [loop(12, 'full', 1e-5, 'resistor'), loop(12, 'full', 1e-5, 'blocked'), loop(30, 'half', 1e-5, 'blocked')]
    + [loop(gain, rectifier, 1e-5, channels=2, linked=linked) for gain, rectifier in ((12, 'full'), (30, 'half')) for linked in (True, False)]
)

if __name__ == '__main__':
    from concurrent.futures import ProcessPoolExecutor

    path = sys.argv[1] if len(sys.argv) > 1 else os.path.splitext(__file__)[0] + '.json'
    with ProcessPoolExecutor(2) as pool:
        records = list(pool.map(solve, CASES))
    data = {'about': __doc__, 'params': P, 'controlOhm': CONTROL_OHM, 'feedbacks': FEEDBACKS, 'rateHz': RATE, 'every': EVERY}
    data.update({'edgesSec': EDGES, 'levelsV': LEVELS, 'channels': CHANNELS, 'records': records})
    with open(path, 'w') as f:
        json.dump(data, f)
