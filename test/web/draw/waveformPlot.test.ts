import { expect, test } from 'vitest';
import { linearScale } from '../../../web/draw/scale.ts';
import { topFor, triggerAt, waveformAxes, waveformPoints } from '../../../web/draw/waveformPlot.ts';

const RATE_HZ = 48000;
const SPAN = 960;

/** A note of 110 Hz with a strong partial, seen at some time. */
function noteFrom(startSec: number, length: number): Float32Array {
  return Float32Array.from({ length }, (_, n) => {
    const t = 2 * Math.PI * 110 * (startSec + n / RATE_HZ);
    return 0.4 * Math.sin(t) + 0.35 * Math.sin(3 * t + 1);
  });
}

test('whenever a periodic signal is looked at, the picture begins at the same place of its period', () => {
  const shapes = [0, 0.0013, 0.0047, 0.0071].map((startSec) => {
    const samples = noteFrom(startSec, 4000);
    const from = triggerAt(samples, SPAN);
    expect(samples[from - 1]).toBeLessThan(0);
    expect(samples[from]).toBeGreaterThanOrEqual(0);
    expect(from + SPAN).toBeLessThanOrEqual(samples.length);
    return samples.subarray(from, from + SPAN);
  });
  for (const shape of shapes.slice(1)) {
    // A sample is 2.5 % of a radian's way at the third partial: both pictures begin within one sample of the crossing.
    expect(Math.max(...shape.map((value, n) => Math.abs(value - shapes[0][n])))).toBeLessThan(0.08);
  }
});

test('a signal that never crosses zero is shown as it came last', () => {
  expect(triggerAt(new Float32Array(2000), SPAN)).toBe(2000 - SPAN);
});

test('a peak of one sample survives in its column of pixels', () => {
  const samples = new Float32Array(9600);
  samples[5003] = 0.9;
  samples[5004] = -0.7;
  const points = waveformPoints(samples, 0, 9600, linearScale(0, 0.2, 0, 240), linearScale(-1, 1, 100, 0));
  expect(points).toHaveLength(480);
  const heights = points.map(({ y }) => y);
  expect(Math.min(...heights)).toBeCloseTo(5, 5);
  expect(Math.max(...heights)).toBeCloseTo(85, 5);
  // Sample 5003 of 40 in each column is in column 125, the highest before the least.
  expect(points[250].x).toBe(125.5);
  expect(points[250].y).toBeLessThan(points[251].y);
});

test('fewer samples than pixels are points on their own times', () => {
  const points = waveformPoints(Float32Array.of(0, 1, 0), 0, 3, linearScale(0, 1, 0, 200), linearScale(-1, 1, 100, 0));
  expect(points.map(({ x, y }) => [x, y])).toEqual([
    [0, 50],
    [100, 0],
    [200, 50],
  ]);
});

test('the frame’s top is round, and its axes are in milliseconds and volts', () => {
  expect([0.13, 0.2, 0.21, 1.1].map((peakV) => topFor(peakV, 1e-3))).toEqual([0.2, 0.2, 0.5, 2]);
  expect(topFor(0, 1e-3)).toBe(1e-3);
  const axes = waveformAxes(0.02, 0.2, 300, 150);
  expect(axes.xTicks.map(({ words }) => words)).toEqual(['0', '5', '10', '15', '20\u2009ms']);
  expect(axes.yTicks.map(({ words }) => words)).toEqual(['−200', '−100', '0', '100', '200\u2009mV']);
});
