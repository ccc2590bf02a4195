import { expect, test } from 'vitest';
import { linearScale, logScale, toPixel } from '../../../web/draw/scale.ts';
import { harmonicSticks, spectrumColumns } from '../../../web/draw/spectrumPlot.ts';

const x = logScale(20, 20000, 0, 200);
const y = linearScale(-120, 0, 100, 0);

test('a single bin keeps its height, however many bins share its column of pixels', () => {
  const powers = new Float64Array(8192).fill(1e-11);
  for (const bin of [4001, 5003, 7919]) powers[bin] = 0.01;
  const columns = spectrumColumns({ powers, binHz: 2.5 }, x, y);
  for (const bin of [4001, 5003, 7919]) expect(columns[Math.round(toPixel(x, 2.5 * bin))]).toBeCloseTo(toPixel(y, -20), 9);
});

test('where there are fewer bins than pixels the trace runs straight from bin to bin', () => {
  const powers = Float64Array.from({ length: 8192 }, (_, bin) => 10 ** (-bin / 10));
  const columns = spectrumColumns({ powers, binHz: 10 }, x, y);
  expect(columns[1]).toBeGreaterThan(columns[0]);
  expect(columns[0]).toBeCloseTo(toPixel(y, -2), 1);
});

test('silence draws nothing', () => {
  const columns = spectrumColumns({ powers: new Float64Array(64), binHz: 300 }, x, y);
  expect(columns.every(Number.isNaN)).toBe(true);
});

test('harmonics of the shadow tone stand at their own frequency and at the level that they have after the amplifier', () => {
  const x = logScale(20, 20000, 0, 300);
  const y = linearScale(-120, 0, 120, 0);
  // 50 mV at the drain, 6.0206 dB of make-up, full scale 1 V: 100 mV, −20 dBFS; a hundredth of it is 40 dB lower.
  const harmonics = [
    { n: 1, amplitudeV: 0.05 },
    { n: 2, amplitudeV: 0.0005 },
    { n: 3, amplitudeV: 0 },
  ];
  const sticks = harmonicSticks(harmonics, { toneHz: 2000, gainDb: 6.0206, fullScaleV: 1 }, x, y);
  expect(sticks.map(({ n, hz }) => [n, hz])).toEqual([
    [1, 2000],
    [2, 4000],
  ]);
  expect(sticks[0].x).toBeCloseTo(200, 6);
  expect(sticks[0].y).toBeCloseTo(20, 3);
  expect(sticks[1].y).toBeCloseTo(60, 3);
  expect(harmonicSticks(harmonics, { toneHz: 15000, gainDb: 0, fullScaleV: 1 }, x, y)).toHaveLength(1);
  // Above the frame it ends at its top.
  expect(harmonicSticks(harmonics, { toneHz: 2000, gainDb: 60, fullScaleV: 1 }, x, y)[0].y).toBe(0);
});
