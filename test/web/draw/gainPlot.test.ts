import { expect, test } from 'vitest';
import { gainAt, plotGain } from '../../../web/draw/gainPlot.ts';
import { toPixel } from '../../../web/draw/scale.ts';

const point = (gateV: number, gainDb: number) => ({ gateV, gainDb, rdsOhm: 1000 });
const swing = [point(-1.8, 0), point(-1.4, -8), point(-0.6, -26)];
const beyond = [point(-2, 0), point(0, -30)];
const worst = { gateV: -1.4, gainDb: -8 };

test('the curve spans what was measured, the swing its own part of it, and the cross the worst point', () => {
  // By hand: 2 V over 300 pixels from 46 (width 360 less 46 and 14); 30 dB and 5 % of it on either side over 118 pixels from the top at 8.
  const plot = plotGain(swing, beyond, worst, 360, 150);
  expect([plot.x.from, plot.x.to]).toEqual([-2, 0]);
  expect(toPixel(plot.x, -1)).toBeCloseTo(46 + 150, 9);
  expect(plot.swing[0]).toBeCloseTo(46 + 30, 9);
  expect(plot.swing[1]).toBeCloseTo(46 + 210, 9);
  expect(toPixel(plot.y, -15)).toBeCloseTo(8 + 59, 9);
  expect(plot.worst?.x).toBeCloseTo(46 + 90, 9);
  expect(plot.worst?.y).toBeCloseTo(8 + (118 * (1.5 + 8)) / 33, 9);
  expect(plot.xTicks.at(-1)?.words).toBe('0\u2009V');
});

test('a gate that rests has a frame all the same', () => {
  const plot = plotGain([point(-1, -10)], [], null, 360, 150);
  expect(plot.swing[0]).toBe(plot.swing[1]);
  expect(Number.isFinite(toPixel(plot.y, -10))).toBe(true);
});

test('gain between two points lies on the straight line, and is none beyond the ends', () => {
  expect(gainAt(swing, -1.6)).toBeCloseTo(-4, 9);
  expect(gainAt(swing, -1.8)).toBe(0);
  expect(gainAt(swing, -0.5)).toBeNull();
  expect(gainAt(swing, -1.9)).toBeNull();
});
