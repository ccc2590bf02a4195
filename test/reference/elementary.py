"""Writes elementary.json: arguments and correctly rounded values of the elementary functions, by 60-digit arithmetic. Needs mpmath."""
import json
import random

from mpmath import cos, exp, log, mp, mpf, pi, sin

mp.dps = 60
random.seed(20261201)
arguments = {
    'exp': [random.uniform(-745, 709) for _ in range(300)] + [random.uniform(-1, 1) for _ in range(300)] + [1e-300, -1e-17, 0.5, -0.5, 709.7, -708.5, -744.9],
    'log': [random.uniform(0, 4) for _ in range(300)] + [10 ** random.uniform(-300, 300) for _ in range(300)] + [5e-324, 1.7e308, 0.9999999999, 1.0000000001, 1.0],
    'sinTurns': [random.uniform(0, 1) for _ in range(300)] + [random.uniform(-1e6, 1e6) for _ in range(100)] + [1e-12, 0.125, 0.25 + 1e-12],
    'cosTurns': [random.uniform(0, 1) for _ in range(300)] + [random.uniform(-1e6, 1e6) for _ in range(100)] + [1e-12, 0.125, 0.5 + 1e-12],
}
laws = {'exp': exp, 'log': log, 'sinTurns': lambda x: sin(2 * pi * x), 'cosTurns': lambda x: cos(2 * pi * x)}
with open(__file__.replace('.py', '.json'), 'w') as out:
    table = {name: [[x, float(laws[name](mpf(x)))] for x in xs] for name, xs in arguments.items()}
    json.dump({'about': __doc__, **table}, out, indent=0)
