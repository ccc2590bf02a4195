import { expect, test } from 'vitest';
import { linearScale, logScale, toPixel } from '../../../web/draw/scale.ts';
import { spectrumColumns } from '../../../web/draw/spectrumPlot.ts';

const x = logScale(20, 20000, 0, 200);
const y = linearScale(-120, 0, 100, 0);

test('a single bin keeps its height, however many bins share its column of pixels', () => {
  const dbfs = new Float64Array(8192).fill(-110);
  for (const bin of [4001, 5003, 7919]) dbfs[bin] = -20;
  const columns = spectrumColumns({ dbfs, binHz: 2.5 }, x, y);
  for (const bin of [4001, 5003, 7919]) expect(columns[Math.round(toPixel(x, 2.5 * bin))]).toBeCloseTo(toPixel(y, -20), 9);
});

test('where there are fewer bins than pixels the trace runs straight from bin to bin', () => {
  const dbfs = Float64Array.from({ length: 8192 }, (_, bin) => -bin);
  const columns = spectrumColumns({ dbfs, binHz: 10 }, x, y);
  expect(columns[1]).toBeGreaterThan(columns[0]);
  expect(columns[0]).toBeCloseTo(toPixel(y, -2), 1);
});

test('silence draws nothing', () => {
  const columns = spectrumColumns({ dbfs: new Float64Array(64).fill(Number.NEGATIVE_INFINITY), binHz: 300 }, x, y);
  expect(columns.every(Number.isNaN)).toBe(true);
});
