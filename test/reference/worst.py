"""Worst THD over all gate voltages of Cell A (3 mA, -1.5 V, square law, 10 kΩ), apart from the model: the drain voltage by Brent's method, an FFT of
one period, a bounded search over the gate voltage. Printed once with harmonics 2 to 9 and once with all to 2000."""
import numpy as np
from scipy.optimize import brentq, minimize_scalar

BETA, VP, R, SIZE = 3e-3 / 2.25, -1.5, 1e4, 4096


def drain(u, vg, k):
    def excess(v):
        s, d = vg + k * v - VP, vg + k * v - v - VP
        return (u - v) / R - BETA * (max(s, 0) ** 2 - max(d, 0) ** 2)
    return brentq(excess, -abs(u) - 1e-12, abs(u) + 1e-12, xtol=1e-15, rtol=1e-14)


def read(vg, peak, k, count):
    quarter = np.cos(2 * np.pi * np.arange(SIZE // 2 + 1) / SIZE) * peak
    half = np.array([drain(u, vg, k) for u in quarter])
    y = np.concatenate([half, half[-2:0:-1]])
    lines = np.abs(np.fft.rfft(y))
    return np.sqrt(np.sum(lines[2:count + 1] ** 2)) / lines[1], 20 * np.log10(2 * lines[1] / SIZE / peak)


for k in (0, 0.5):
    for peak in (0.05, 0.1, 0.3):
        for count in (9, 2000):
            grid = np.linspace(-1.3, -1.55 - peak, 24)
            top = grid[np.argmax([read(v, peak, k, count)[0] for v in grid])]
            step = grid[0] - grid[1]
            best = minimize_scalar(lambda v: -read(v, peak, k, count)[0], bounds=(top - step, top + step), method="bounded",
                                   options={"xatol": 1e-6})
            thd, gain = read(best.x, peak, k, count)
            print(f"k {k}  {peak * 1e3:.0f} mV  to harmonic {count}: {thd * 100:.3f} % at {gain:.3f} dB, VGS {best.x:.5f} V")
