import { expect, test } from 'vitest';
import { defaultVariant } from '../../../model/design/defaults.ts';
import type { Cell } from '../../../model/design/types.ts';
import { gatePeriod, plotGate, regionAt, turnOf } from '../../../web/draw/gatePlot.ts';

const cell: Cell = {
  ...defaultVariant().cell,
  controlOhm: 1e6,
  feedback: { kind: 'resistor', drainOhm: 1e6, blockingF: 100e-9 },
};
const lfo = (rateHz: number) => ({ source: 'lfo', shape: 'sine', rateHz, fromV: -0.6, toV: -1.8, edgeSec: 0.005 }) as const;

const half = (values: Float64Array) => (Math.max(...values) - Math.min(...values)) / 2;
const mean = (values: Float64Array) => values.subarray(1).reduce((sum, v) => sum + v, 0) / (values.length - 1);

test.each([
  [0.2, 0.98],
  [1, 0.74],
  [5, 0.52],
])('with 1 MΩ, 1 MΩ and 100 nF the gate swings at %f Hz by %f of the control, while its bias stays', (rateHz, ratio) => {
  // Source: the divider |(1 + jωR2·C)/(1 + jω(R2 + R3)·C)|, computed apart from this project, to two digits.
  const period = gatePeriod(lfo(rateHz), cell);
  if (period === null) throw new Error('an LFO has a period');
  expect(half(period.gate) / half(period.control)).toBeCloseTo(ratio, 2);
  expect(mean(period.gate)).toBeCloseTo(-1.2, 3);
});

test('without a blocking capacitor the gate is the rest fraction of the control; buffered, all of it', () => {
  const plain = gatePeriod(lfo(4), { ...cell, feedback: { kind: 'resistor', drainOhm: 1e6, blockingF: null } });
  const buffered = gatePeriod(lfo(4), { ...cell, feedback: { kind: 'buffered', fraction: 0.5 } });
  expect(Math.min(...(plain?.gate ?? []))).toBeCloseTo(-0.9, 9);
  expect(Math.min(...(buffered?.gate ?? []))).toBeCloseTo(-1.8, 9);
});

test('the square takes its edges from one end to the other, and starts midway', () => {
  const period = gatePeriod({ ...lfo(5), shape: 'square', edgeSec: 0.02 }, { ...cell, feedback: { kind: 'none' } });
  if (period === null) throw new Error('an LFO has a period');
  expect(period.control[0]).toBeCloseTo(-1.2, 9);
  // An edge of 10 % of the period: half of it, 12 of 240 steps, leads from the middle to the end.
  expect(period.control[12]).toBeCloseTo(-1.8, 9);
  expect(period.control[11]).toBeGreaterThan(-1.8);
});

test('the gate is off past VGS(off), conducts about half a volt forward, and is mirrored for a p-channel part', () => {
  expect([-1.6, -1.4, 0.4, 0.6].map((v) => regionAt(v, -1.5))).toEqual(['off', 'ohmic', 'ohmic', 'conducting']);
  expect([1.6, 1.4, -0.6].map((v) => regionAt(v, 1.5))).toEqual(['off', 'ohmic', 'conducting']);
});

test('regions fill the strip without gaps, and the deepest point says how far it is past off', () => {
  const period = gatePeriod(lfo(4), { ...cell, feedback: { kind: 'none' } });
  if (period === null) throw new Error('an LFO has a period');
  const plot = plotGate(period, -1.5, 600, 150);
  expect(plot.regions.map(({ region }) => region)).toEqual(['ohmic', 'off', 'ohmic']);
  expect(plot.regions.slice(1).map(({ from }) => from)).toEqual(plot.regions.slice(0, -1).map(({ to }) => to));
  expect(plot.regions.at(-1)?.to).toBeCloseTo(plot.area.right, 9);
  expect(plot.deepest.pastV).toBeCloseTo(0.3, 9);
});

test('the present point is found on the falling or the rising half, as the control moves', () => {
  const period = gatePeriod(lfo(4), cell);
  if (period === null) throw new Error('an LFO has a period');
  expect(turnOf(period, -1.5, true)).toBeCloseTo(1 / 12, 2);
  expect(turnOf(period, -1.5, false)).toBeCloseTo(5 / 12, 2);
});

test('a control that follows the signal has no period of its own', () => {
  expect(gatePeriod({ source: 'external', fullScaleV: 1, offsetV: -1 }, cell)).toBeNull();
});
