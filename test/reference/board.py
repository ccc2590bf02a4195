"""Small signals and noise of one whole board, and a tone over an LFO's cycle, computed apart from the model: nodal equations written out by
hand for this board, scipy for the resting point, closed form and numpy's FFT for the cycle. Writes board.json.

Board   stage feed (1 kΩ, 2.2 µF, 470 kΩ) - pad 22 kΩ / 4.7 kΩ - 470 nF with 10 MΩ leakage - 6.8 kΩ - drain
        drain: 100 kΩ return, 100 nF to load 220 kΩ with 220 pF, stray 0.5 pF from the control's smoothed node
        control: 600 Ω + 10 kΩ with 47 nF - 470 kΩ - gate; feedback 100 nF and 430 kΩ; gate 6 pF to source, 4 pF to drain
        FET gradual channel, 4 mA, -2 V, barrier 0.75 V, IS 50 fA, n 1.1, leakage 20 pS, 25 °C; make-up 20 dB, GBW 3 MHz
"""
import json
import os

import numpy as np
from scipy.optimize import fsolve

K, Q, T = 1.380649e-23, 1.602176634e-19, 298.15
IDSS, VP, PHI, IS, NVT, LEAK = 4e-3, -2.0, 0.75, 5e-14, 1.1 * K * T / Q, 2e-11
W = PHI - VP


def term(v, g0=1.0):
    u = np.clip(W - np.where(v > 0, v, 0.0), 0, None)
    return -g0 * u * (1 - (2 / 3) * np.sqrt(u / W))


G0 = IDSS / (term(-VP) - term(0.0))


def slope(v):
    return G0 * (1 - np.sqrt((W - v) / W)) if v > 0 else 0.0


NODES = ["stage", "staged", "pad", "coupled", "drain", "output", "smoothed", "blocked", "gate"]
N = {name: i for i, name in enumerate(NODES)}
# (name, a, b, ohm); None is ground, "signal" and "control" are driven
RESISTORS = [("source", "signal", "stage", 1e3), ("bleed", "staged", None, 470e3), ("padUpper", "staged", "pad", 22e3),
             ("padLower", "pad", None, 4.7e3), ("couplingLeak", "pad", "coupled", 1e7), ("series", "coupled", "drain", 6.8e3),
             ("return", "drain", None, 1e5), ("load", "output", None, 220e3), ("smoothing", "control", "smoothed", 10.6e3),
             ("control", "smoothed", "gate", 470e3), ("feedback", "blocked", "gate", 430e3)]
CAPACITORS = [("stage", "staged", 2.2e-6), ("pad", "coupled", 470e-9), ("drain", "output", 100e-9), ("output", None, 220e-12),
              ("smoothed", None, 47e-9), ("drain", "blocked", 100e-9), ("gate", None, 6e-12), ("gate", "drain", 4e-12),
              ("smoothed", "drain", 0.5e-12)]


def system(freq, extra):
    """Matrix, and the columns of audio and control, for admittances at freq plus `extra` (a, b, S)."""
    a = np.zeros((len(NODES), len(NODES)), complex)
    right = np.zeros((len(NODES), 2), complex)
    parts = [(x, y, 1 / ohm) for _, x, y, ohm in RESISTORS]
    parts += [(x, y, 2j * np.pi * freq * farad) for x, y, farad in CAPACITORS] + extra
    for x, y, s in parts:
        for here, there in ((x, y), (y, x)):
            if here not in N:
                continue
            a[N[here], N[here]] += s
            if there in N:
                a[N[here], N[there]] -= s
            elif there == "signal":
                right[N[here], 0] += s
            elif there == "control":
                right[N[here], 1] += s
    return a, right


def rest(control_v):
    leak = [("gate", None, LEAK), ("gate", "drain", LEAK)]
    a, right = system(0.0, leak)
    a, right = a.real, right.real

    def miss(v):
        vg, vd = v[N["gate"]], v[N["drain"]]
        channel = G0 * (term(vg - VP) - term(vg - vd - VP))
        js, jd = IS * np.expm1(vg / NVT), IS * np.expm1((vg - vd) / NVT)
        out = a @ v - right[:, 1] * control_v
        out[N["drain"]] += channel - jd
        out[N["gate"]] += js + jd
        return out / np.maximum(np.abs(a).sum(axis=1), 1e-9)

    v = np.full(len(NODES), 0.0)
    v[[N["smoothed"], N["gate"], N["blocked"]]] = control_v
    for _ in range(3):
        v = fsolve(miss, v, xtol=1e-14)
    return v


def board(control_v):
    v = rest(control_v)
    vg, vd = v[N["gate"]], v[N["drain"]]
    gs, gd = slope(vg - VP), slope(vg - vd - VP)
    js, jd = IS * np.exp(vg / NVT), IS * np.exp((vg - vd) / NVT)
    points = []
    for freq in (5.0, 50.0, 1e3, 2e4, 2e5):
        a, right = system(freq, [("gate", None, LEAK + js / NVT), ("gate", "drain", LEAK + jd / NVT)])
        a[N["drain"], N["gate"]] += gs - gd
        a[N["drain"], N["drain"]] += gd
        x = np.linalg.solve(a, right)
        inverse = np.linalg.inv(a)
        made = 10 / (1 + 1j * freq * 10 / 3e6)
        squares = {}
        listed = [(n, p, q, 4 * K * T / ohm) for n, p, q, ohm in RESISTORS]
        listed += [("channel", "drain", None, 4 * K * T * (gs + gd) / 2), ("gateSource", "gate", None, 2 * Q * (js + IS + LEAK * abs(vg))),
                   ("gateDrain", "gate", "drain", 2 * Q * (jd + IS + LEAK * abs(vg - vd)))]
        for name, p, q, density in listed:
            z = (inverse[N["output"], N[p]] if p in N else 0) - (inverse[N["output"], N[q]] if q in N else 0)
            squares[name] = abs(made * z) ** 2 * density
        current = (1 - x[N["stage"], 0]) / 1e3
        z_in = 1 / current - 1e3
        points.append({"frequencyHz": freq, "audio": cut(made * x[N["output"], 0]), "control": cut(made * x[N["output"], 1]),
                       "gate": cut(x[N["gate"], 1]), "inputOhm": cut(z_in), "noiseV": float(np.sqrt(sum(squares.values()))),
                       "channelV": float(np.sqrt(squares["channel"])), "seriesV": float(np.sqrt(squares["series"]))})
    return {"controlV": control_v, "gateV": float(vg), "drainV": float(vd), "drainA": float(G0 * (term(vg - VP) - term(vg - vd - VP))),
            "points": points}


def cut(z):
    return [float(z.real), float(z.imag)]


def cycle():
    """Cell A (3 mA, -1.5 V, 10 kΩ, square law, k 0), 1 kHz of 0.1 V, a 4 Hz sine from -0.3 to -1.3 V: the drain from its quadratic."""
    size, tone, peak = 1 << 16, 250, 0.1
    t = np.arange(size) / size
    beta, r = 3e-3 / 2.25, 1e4
    vov = -0.8 - 0.5 * np.sin(2 * np.pi * t) + 1.5
    u = peak * np.cos(2 * np.pi * tone * t)
    b = 1 + 2 * beta * r * vov
    y = 2 * u / (b + np.sqrt(b * b - 4 * beta * r * u))
    lines = 2 * np.abs(np.fft.rfft(y)) / size
    energy = [np.sum(lines[int((n - 0.5) * tone): int((n + 0.5) * tone)] ** 2) for n in range(1, 10)]
    return {"lines": [float(v) for v in lines[tone - 4: tone + 5]], "thd": float(np.sqrt(sum(energy[1:]) / energy[0]))}


here = os.path.dirname(os.path.abspath(__file__))
data = {"about": "see board.py", "boards": [board(v) for v in (-1.9, -1.2, 0.9)], "cycle": cycle()}
with open(os.path.join(here, "board.json"), "w") as file:
    json.dump(data, file, indent=1)
    file.write("\n")
