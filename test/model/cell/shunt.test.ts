import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { advanceCell, compileCell, createCell, settle } from '../../../model/cell/cell.ts';
import { shuntCircuit } from '../../../model/cell/shunt.ts';
import type { Cell, Device } from '../../../model/design/types.ts';
import { harmonicsOf } from '../../../model/measure/harmonics.ts';
import { steadyPeriod } from '../../../model/study/steady.ts';
import { CELL_A, CELL_A_DEVICE } from '../../support/designs.ts';

const read = (name: string) => JSON.parse(readFileSync(new URL(`../../reference/${name}`, import.meta.url), 'utf8'));
const db = (ratio: number) => 20 * Math.log10(ratio);

interface StaticCase extends Record<string, unknown> {
  readonly id: string;
  readonly law: Device['law'];
  readonly temperatureK: number;
  readonly toneVpk: number;
  readonly controlV: number;
  readonly expect: Record<string, number>;
}

function deviceOf(values: Record<string, number>, law: Device['law']): Device {
  return {
    ...CELL_A_DEVICE,
    law,
    idssA: values.idssA,
    gateOffV: values.gateOffV,
    barrierV: values.barrierV,
    junction: { reverseA: values.junctionSaturationA, ideality: values.junctionIdeality, leakageS: values.junctionLeakageS },
    gateSourceF: values.gateSourceF ?? 0,
    gateDrainF: values.gateDrainF ?? 0,
  };
}

function cellOf(values: Record<string, number | null>): Cell {
  const { seriesOhm, loadOhm, controlOhm, drainOhm } = values as Record<string, number>;
  const blockingF = values.blockingF ?? null;
  const feedback: Cell['feedback'] = values.drainOhm ? { kind: 'resistor', drainOhm, blockingF } : { kind: 'none' };
  return { ...CELL_A, seriesOhm, loadOhm, loadF: values.loadF ?? 0, controlOhm, feedback };
}

describe('static.json: the memoryless cell, computed independently in 80-bit arithmetic', () => {
  const cases: StaticCase[] = read('static.json').cases;
  test('holds twenty-four cases of two laws', () => expect(cases).toHaveLength(24));

  test.each(cases)('case $id: fundamental to 1e-6, H2 and H3 to 0.001 dB, zero where zero', (entry) => {
    const tempC = entry.temperatureK - 273.15;
    const device = { ...deviceOf(entry as unknown as Record<string, number>, entry.law), readAtC: tempC };
    const size = 16384;
    const numbers = compileCell(shuntCircuit(cellOf(entry as unknown as Record<string, number | null>), device), device, tempC);
    const period = steadyPeriod(createCell(numbers, 1 / (1000 * size)), entry.toneVpk, entry.controlV, size);
    const { mean, real } = harmonicsOf(period.output, 5);
    const { expect: exact } = entry;
    expect(Math.abs(real[0] / exact.fundamental_V - 1)).toBeLessThan(1e-6);
    expect(Math.abs(mean - exact.dc_mean_V)).toBeLessThan(1e-6 * exact.fundamental_V);
    for (const n of [2, 3]) {
      const reading = db(Math.abs(real[n - 1]) / real[0]);
      const truth = exact[`H${n}_dB`];
      if (truth === null || truth < -300) expect(reading).toBeLessThan(-200);
      else expect(Math.abs(reading - truth)).toBeLessThan(0.001);
    }
  });
});

describe('transient.json: burst and control move, against an implicit Runge-Kutta solution', () => {
  const { params, records } = read('transient.json');
  const tone = (t: number) => (t > 0.002 && t < 0.018 ? 0.5 * Math.sin(2 * Math.PI * 1000 * (t - 0.002)) : 0);
  const control = (t: number) => {
    if (t <= 0.01) return -1.2;
    return t >= 0.011 ? -0.3 : -1.2 + 0.45 * (1 - Math.cos((Math.PI * (t - 0.01)) / 0.001));
  };

  test.each(['square', 'gradual'] as const)('%s law driven at 384 kHz: under −100 dB rms re rms, corners included', (law) => {
    const record = records.find((entry: { law: string }) => entry.law === law);
    const tempC = params.temperatureK - 273.15;
    const device = { ...deviceOf(params, law), readAtC: tempC };
    const step = 1 / 384000;
    const cell = createCell(compileCell(shuntCircuit(cellOf(params), device), device, tempC), step);
    settle(cell, 0, -1.2);
    const length = (record.drainV.length - 1) * 4;
    const signal = Float64Array.from({ length }, (_, i) => tone((i + 1) * step));
    const controlV = Float64Array.from({ length }, (_, i) => control((i + 1) * step));
    advanceCell(cell, signal, controlV, 0, length);
    let error = 0;
    let power = 0;
    record.drainV.forEach((truth: number, i: number) => {
      if (i === 0) return;
      error += (signal[4 * i - 1] - truth) ** 2;
      power += truth ** 2;
    });
    expect(10 * Math.log10(error / power)).toBeLessThan(-100);
  });
});
