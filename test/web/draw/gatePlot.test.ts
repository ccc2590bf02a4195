import { expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import type { Cell, Control, Design } from '../../../model/design/types.ts';
import { measureTone } from '../../../model/study/tone.ts';
import { onPeriod, plotGate, regionAt, turnOf } from '../../../web/draw/gatePlot.ts';
import type { GatePeriod } from '../../../web/state/bench.ts';
import { controlPicture, gatePeriod } from '../../../web/state/controlPicture.ts';

const cell: Cell = {
  ...defaultDesign().variants[0].cell,
  loadF: 0,
  feedback: { kind: 'resistor', drainOhm: 1e6, blockingF: 100e-9 },
};
const lfo = (rateHz: number) => ({ source: 'lfo', shape: 'sine', rateHz, fromV: -0.6, toV: -1.8, edgeSec: 0.005 }) as const;

function designOf(control: Control, circuit: Cell): Design {
  const [variant] = defaultDesign().variants;
  const { device } = variant;
  const bare = { ...device, law: 'square', gateOffV: -1.5, junction: { ...device.junction, reverseA: 0, leakageS: 0 } } as const;
  return { ...defaultDesign(), variants: [{ ...variant, device: bare, control, cell: circuit }] };
}

function periodOf(control: Control, circuit: Cell): GatePeriod {
  return gatePeriod(designOf(control, circuit), 0);
}

const half = (values: Float64Array) => (Math.max(...values) - Math.min(...values)) / 2;
const mean = (values: Float64Array) => values.subarray(1).reduce((sum, v) => sum + v, 0) / (values.length - 1);

test.each([
  [0.2, 0.98],
  [1, 0.74],
  [5, 0.52],
])('with 1 MΩ, 1 MΩ and 100 nF the gate swings at %f Hz by %f of the control, while its bias stays', (rateHz, ratio) => {
  // Source: the divider |(1 + jωR2·C)/(1 + jω(R2 + R3)·C)|, computed apart from this project, to two digits.
  const period = periodOf(lfo(rateHz), cell);
  expect(half(period.gate) / half(period.control)).toBeCloseTo(ratio, 2);
  expect(mean(period.gate)).toBeCloseTo(-1.2, 2);
});

test('a fixed control is a straight line at the gate’s own voltage', () => {
  const period = periodOf({ source: 'fixed', controlV: -1 }, { ...cell, feedback: { kind: 'none' } });
  expect(period.steady).toBe(true);
  expect(half(period.gate)).toBe(0);
  expect(period.gate[0]).toBeCloseTo(-1, 6);
});

test('the gate is off past VGS(off), conducts past the forward voltage that is given, and is mirrored for a p-channel part', () => {
  expect([-1.6, -1.4, 0.4, 0.6].map((v) => regionAt(v, { gateOffV: -1.5, gateOnV: 0.5 }))).toEqual(['off', 'ohmic', 'ohmic', 'conducting']);
  expect([1.6, 1.4, -0.6].map((v) => regionAt(v, { gateOffV: 1.5, gateOnV: 0.5 }))).toEqual(['off', 'ohmic', 'conducting']);
});

test('regions fill the strip without gaps, and the deepest point says how far it is past off', () => {
  const plot = plotGate(periodOf(lfo(4), { ...cell, feedback: { kind: 'none' } }), 600, 150);
  expect(plot.regions.map(({ region }) => region)).toEqual(['ohmic', 'off', 'ohmic']);
  expect(plot.regions.slice(1).map(({ from }) => from)).toEqual(plot.regions.slice(0, -1).map(({ to }) => to));
  expect(plot.regions.at(-1)?.to).toBeCloseTo(plot.area.right, 9);
  expect(plot.deepest.pastV).toBeCloseTo(0.3, 3);
});

test('the present point is found on the falling or the rising half, as the control moves', () => {
  const period = periodOf(lfo(4), cell);
  expect(turnOf(period, -1.5, true)).toBeCloseTo(1 / 12, 2);
  expect(turnOf(period, -1.5, false)).toBeCloseTo(5 / 12, 2);
});

test('between two reports the present point goes evenly through the period and keeps to the curve, over the end of it as well', () => {
  const period = periodOf(lfo(4), { ...cell, feedback: { kind: 'none' } });
  const at = (turn: number) => -1.2 - 0.6 * Math.sin(2 * Math.PI * turn);
  const report = (turn: number) => ({ controlV: at(turn), gateSourceV: at(turn) });
  // The control starts midway and falls towards −1.8 V.
  for (const [from, to, middle] of [
    [0.05, 0.15, 0.1],
    [0.95, 0.05, 0],
  ]) {
    const { turn, gateV } = onPeriod(period, { before: report(from), now: report(to), share: 0.5 });
    expect(Math.abs(turn - middle - Math.round(turn - middle))).toBeLessThan(0.005);
    expect(gateV).toBeCloseTo(at(middle), 2);
  }
  expect(onPeriod(period, { before: report(0.05), now: { ...report(0.15), gateSourceV: -1.5 }, share: 1 }).gateV).toBeCloseTo(-1.5, 9);
});

test('over time the frame has no curve of its own, and seconds under it', () => {
  const plot = plotGate(periodOf(lfo(4), cell), 400, 150, 10);
  expect(plot.gate).toBe('');
  expect(plot.regions).toEqual([]);
  expect(plot.xTicks.at(-1)?.words).toBe('10\u2009s');
});

test('a control that comes from outside has no period of its own, and the sentence says so', () => {
  const design = designOf({ source: 'external', fullScaleV: 1, offsetV: -1 }, cell);
  expect(controlPicture(design, 0, 1000)).toHaveProperty('fault');
});

test('the strip says that the gate conducts where the reading of a tone does', () => {
  for (const controlV of [0.1, 0.25, 0.35, 0.6, 2]) {
    const design = defaultDesign();
    const [variant] = design.variants;
    const asked: Design = { ...design, variants: [{ ...variant, control: { source: 'fixed', controlV } }] };
    const { regions } = plotGate(gatePeriod(asked, 0), 600, 150);
    const { gateOn } = measureTone(asked, 0, { toneV: 1e-6 }).regions;
    expect(
      regions.map(({ region }) => region),
      `${controlV} V`,
    ).toEqual([gateOn > 0.5 ? 'conducting' : 'ohmic']);
  }
});
