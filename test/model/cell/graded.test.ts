import { expect, test } from 'vitest';
import { advanceCell, compileCell, createCell, gateSourceV, settle } from '../../../model/cell/cell.ts';
import { deviation } from '../../../model/cell/kernels/graded.ts';
import { shuntCircuit } from '../../../model/cell/shunt.ts';
import { CELL_A, CELL_A_DEVICE } from '../../support/designs.ts';

const BARRIER_V = 0.8;

test.each([1 / 3, 0.5])('exponent %s: charge is the integral of C0/(1 − V/φ)^m − C0, and runs along its tangent beyond φ/2', (m) => {
  const out = new Float64Array(2);
  const at = (v: number) => {
    deviation(m, BARRIER_V, v, out, 0);
    return [out[0], out[1]];
  };
  for (const v of [-10, -2, -0.3, 0, 0.2, 0.39]) {
    expect(at(v)[1]).toBeCloseTo((1 - v / BARRIER_V) ** -m - 1, 12);
    const h = 1e-5;
    expect((at(v + h)[0] - at(v - h)[0]) / (2 * h)).toBeCloseTo(at(v)[1], 7);
  }
  expect(at(0)[0]).toBeCloseTo(0, 12);
  const slope = (at(0.4)[1] - at(0.4 - 1e-6)[1]) / 1e-6;
  expect(at(0.6)[1]).toBeCloseTo(at(0.4)[1] + 0.2 * slope, 4);
});

test('a gate charged through 10 MΩ follows R·C(v)·dv/dt = VC − v, by Runge and Kutta with steps a hundred times finer', () => {
  const device = { ...CELL_A_DEVICE, gateSourceF: 8e-12, gateDrainF: 4e-12, barrierV: BARRIER_V, grading: 0.5 };
  const cell = { ...CELL_A, seriesOhm: 1, controlOhm: 1e7 };
  const step = 1 / 384000;
  const running = createCell(compileCell(shuntCircuit(cell, device), device, 25), step);
  settle(running, 0, -2);
  const control = (t: number) => -2 - 3 * (1 - Math.cos(Math.PI * Math.min(1, t / 0.001)));
  const slope = (x: number, t: number) => (control(t) - x) / (1e7 * 12e-12 * (1 - x / BARRIER_V) ** -0.5);
  const fine = step / 100;
  let v = -2;
  let t = 0;
  let worst = 0;
  for (let n = 1; n <= 600; n++) {
    advanceCell(running, new Float64Array(1), Float64Array.of(control(n * step)), 0, 1);
    for (let k = 0; k < 100; k++) {
      const k1 = slope(v, t);
      const k2 = slope(v + (fine * k1) / 2, t + fine / 2);
      const k3 = slope(v + (fine * k2) / 2, t + fine / 2);
      const k4 = slope(v + fine * k3, t + fine);
      v += (fine * (k1 + 2 * k2 + 2 * k3 + k4)) / 6;
      t += fine;
    }
    worst = Math.max(worst, Math.abs(gateSourceV(running) - v));
  }
  // Third order: (h/τ)³ of 6 V, h/τ = 1/40, is 1e-4 V at the corners of the move's third derivative.
  expect(worst).toBeLessThan(1e-4);
});
