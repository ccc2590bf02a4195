import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { advanceCell, compileCell, createCell, overdriveV, settle } from '../../../model/cell/cell.ts';
import { loadValues } from '../../../model/cell/values.ts';
import { kernelModule } from '../../../model/cell/kernels/source.ts';
import { shuntCircuit } from '../../../model/cell/shunt.ts';
import type { Cell, Device } from '../../../model/design/types.ts';
import { CELL_A, REAL_CELL, REAL_DEVICE } from '../../support/designs.ts';

const LAWS = ['square', 'gradual', 'smooth'] as const;

test.each(LAWS)('the written kernels of the %s law are what their source writes', (law) => {
  const written = readFileSync(new URL(`../../../model/cell/kernels/${law}.ts`, import.meta.url), 'utf8');
  expect(written).toBe(kernelModule(law));
});

/** Channel current, A, written out by hand from the laws' definitions, at the overdrives of both ends. */
function channelA({ law, idssA, gateOffV, barrierV, tailV, exponent, lambdaPerV }: Device, s: number, d: number): number {
  const w = barrierV - gateOffV;
  const shapes = {
    square: (v: number) => Math.max(0, v) ** 2,
    gradual: (v: number) => {
      const u = Math.min(w, w - v);
      return w / 3 - (u < 0 ? u : u - ((2 / 3) * u ** 1.5) / Math.sqrt(w));
    },
    smooth: (v: number) => (v / tailV > 30 ? v / tailV + Math.log1p(Math.exp(-v / tailV)) : Math.log1p(Math.exp(v / tailV))) ** exponent,
  };
  const shape = shapes[law];
  const scale = idssA / shape(-gateOffV);
  return scale * (shape(s) * (1 + lambdaPerV * Math.max(0, -d)) - shape(d) * (1 + lambdaPerV * Math.max(0, -s)));
}

/** Drain and gate currents that do not add up to zero, A, for the cell without capacitors: Kirchhoff's law written out by hand. */
function residualA(device: Device, cell: Cell, vgs: number, vgd: number, audioV: number, controlV: number): number {
  const { reverseA, leakageS } = device.junction;
  const vt = (1.380649e-23 / 1.602176634e-19) * 298.15;
  const junction = (v: number) => reverseA * Math.expm1(v / vt) + leakageS * v;
  const drainV = vgs - vgd;
  const feedbackS = cell.feedback.kind === 'resistor' ? 1 / cell.feedback.drainOhm : 0;
  const toGate = (controlV - vgs) / cell.controlOhm + (drainV - vgs) * feedbackS;
  const gate = toGate - junction(vgs) - junction(vgd);
  const id = channelA(device, vgs - device.gateOffV, vgd - device.gateOffV);
  const drain = (audioV - drainV) / cell.seriesOhm - drainV / cell.loadOhm - (drainV - vgs) * feedbackS - id + junction(vgd);
  const largest = Math.max(Math.abs(id), Math.abs(junction(vgs)), Math.abs(junction(vgd)), Math.abs((audioV - drainV) / cell.seriesOhm));
  return Math.max(Math.abs(gate), Math.abs(drain)) - 1e-9 * largest;
}

test.each(LAWS)(
  '%s law: every solved sample obeys Kirchhoff to 1 pA + 1e-9 of the currents, for steps of up to 1 kV, junctions conducting and λ',
  (law) => {
    const volts = fc.oneof(fc.double({ min: -3, max: 3, noNaN: true }), fc.double({ min: -1000, max: 1000, noNaN: true }));
    const resistance = fc.double({ min: 2, max: 7, noNaN: true }).map((decades) => 10 ** decades);
    const samples = fc.array(fc.tuple(volts, volts), { minLength: 5, maxLength: 20 });
    const lambda = fc.constantFrom(0, 0.02, 0.2);
    fc.assert(
      fc.property(samples, resistance, resistance, fc.boolean(), lambda, (steps, ohm, controlOhm, fed, lambdaPerV) => {
        const device: Device = { ...REAL_DEVICE, law, lambdaPerV, exponent: 2.1, gateSourceF: 0, gateDrainF: 0 };
        const feedback: Cell['feedback'] = fed ? { kind: 'resistor', drainOhm: controlOhm, blockingF: null } : { kind: 'none' };
        const design: Cell = { ...CELL_A, seriesOhm: ohm, loadOhm: 1e6, controlOhm, feedback };
        const cell = createCell(compileCell(shuntCircuit(design, device), device, 25), 1 / 384000);
        for (const [audioV, controlV] of steps) {
          const signal = Float64Array.of(audioV);
          advanceCell(cell, signal, Float64Array.of(controlV), 0, 1);
          const vgs = overdriveV(cell, 'source') + device.gateOffV;
          const vgd = overdriveV(cell, 'drain') + device.gateOffV;
          expect(residualA(device, design, vgs, vgd, audioV, controlV)).toBeLessThan(1e-12);
          expect(Math.abs(signal[0] - (vgs - vgd))).toBeLessThan(1e-6);
        }
      }),
      { numRuns: 1000, seed: 20261201 },
    );
  },
);

test('at rest nothing moves but rounding: an ulp of the 1.2 V at the gate is 2e-16 V', () => {
  const cell = createCell(compileCell(shuntCircuit(REAL_CELL, REAL_DEVICE), REAL_DEVICE, 25), 1 / 384000);
  const restV = settle(cell, 0, -1.2);
  const signal = new Float64Array(4000);
  advanceCell(cell, signal, new Float64Array(4000).fill(-1.2), 0, 4000);
  expect(Math.max(...signal.map((v) => Math.abs(v - restV)))).toBeLessThan(1e-14);
});

test('loading the values in force changes no bit of what follows', () => {
  const run = (reload: boolean) => {
    const cell = createCell(compileCell(shuntCircuit(REAL_CELL, REAL_DEVICE), REAL_DEVICE, 25), 1 / 384000);
    settle(cell, 0, -1.2);
    const signal = Float64Array.from({ length: 2000 }, (_, i) => 0.5 * Math.sin(i / 60));
    const control = new Float64Array(2000).fill(-1.2);
    advanceCell(cell, signal, control, 0, 1000);
    if (reload) expect(loadValues(cell, Float64Array.from(cell.values))).toBe(true);
    advanceCell(cell, signal, control, 1000, 2000);
    return signal;
  };
  expect(run(true)).toEqual(run(false));
});

test('a p-channel part with every voltage reversed is the same cell', () => {
  const run = (channel: 'n' | 'p') => {
    const sign = channel === 'n' ? 1 : -1;
    const device = { ...REAL_DEVICE, channel, gateOffV: sign * REAL_DEVICE.gateOffV };
    const cell = createCell(compileCell(shuntCircuit(REAL_CELL, device), device, 25), 1 / 384000);
    settle(cell, 0, sign * -0.4);
    const signal = Float64Array.from({ length: 3000 }, (_, i) => sign * 2 * Math.sin(i / 60));
    advanceCell(cell, signal, new Float64Array(3000).fill(sign * -0.4), 0, 3000);
    return signal.map((v) => sign * v);
  };
  const n = run('n');
  const p = run('p');
  expect(Math.max(...n.map((v, i) => Math.abs(v - p[i])))).toBeLessThan(1e-12);
});
