import { expect, test } from 'vitest';
import { toPixel } from '../../../web/draw/scale.ts';
import { pathCurrentAt, pathOn, plotTransfer } from '../../../web/draw/transferPlot.ts';
import type { TransferPlane } from '../../../web/state/bench.ts';

/** Resistors of 1, 4 and 16 kΩ over ±0.2 V and ±100 µA. */
const drainSourceV = Float64Array.from({ length: 41 }, (_, n) => 0.01 * n - 0.2);
const plane: TransferPlane = {
  drainSourceV,
  curves: [1e3, 4e3, 16e3].map((ohm, n) => ({ gateV: -1 - n / 10, drainA: drainSourceV.map((v) => v / ohm) })),
  edgeA: drainSourceV.map((v) => 4e-3 * v * Math.abs(v)),
  topA: 1e-4,
};

test('volts and amperes stand where a resistor’s line says, and each curve is named where it leaves the frame', () => {
  const plot = plotTransfer(plane, 292, 144);
  // By hand: 200 pixels from 46 for 0.4 V, 100 pixels from 20 for 200 µA.
  expect(toPixel(plot.x, 0.1)).toBeCloseTo(46 + 150, 9);
  expect(toPixel(plot.y, 25e-6)).toBeCloseTo(20 + 37.5, 9);
  // 1 kΩ reaches 100 µA at 0.1 V: over the frame. 4 kΩ gives 50 µA and 16 kΩ 12.5 µA at 0.2 V: on its right.
  expect(plot.labels.map(({ words, side }) => [words, side])).toEqual([
    ['−1.00\u2009V', 'over'],
    ['−1.10\u2009V', 'right'],
    ['−1.20\u2009V', 'right'],
  ]);
  expect(plot.labels[0].place.x).toBeCloseTo(196, 6);
  expect(plot.labels[1].place.y).toBeCloseTo(20 + 25, 6);
  expect(plot.yTicks.at(-1)?.words).toBe('100\u2009μA');
});

test('a label that would touch another is left out', () => {
  const close = { ...plane, curves: [16e3, 17e3].map((ohm, n) => ({ gateV: -n, drainA: drainSourceV.map((v) => v / ohm) })) };
  expect(plotTransfer(close, 292, 144).labels).toHaveLength(1);
});

test('the path runs through its points from the crest on, and is read between them', () => {
  const path = { drainSourceV: Float64Array.of(0.1, 0, -0.1, 0, 0.1), drainA: Float64Array.of(50e-6, 2e-6, -50e-6, -2e-6, 50e-6) };
  const { crest, line } = pathOn(plotTransfer(plane, 292, 144), path);
  expect(crest.x).toBeCloseTo(196, 9);
  expect(crest.y).toBeCloseTo(45, 9);
  expect(line.startsWith('M196 45L146 69')).toBe(true);
  expect(pathCurrentAt(path, 0.05)).toBeCloseTo(26e-6, 15);
  expect(pathCurrentAt(path, 0.11)).toBeNaN();
});
