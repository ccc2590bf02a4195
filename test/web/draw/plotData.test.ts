import { expect, test } from 'vitest';
import { csvOf, type PlotTable, rowAt, rowWords, stepFrom } from '../../../web/draw/plotData.ts';
import { linearScale, logScale } from '../../../web/draw/scale.ts';

const print = (value: number) => `${value.toFixed(1)} dB`;
const column = (name: string, unit: string, values: readonly number[]) => ({ name, unit, values, print });
const table: PlotTable = {
  x: { ...column('gate', 'V', [-2, -1.5, -1, 0]), print: (v) => `gate ${v.toFixed(2)} V` },
  ys: [column('gain', 'dB', [-0.1, -3, Number.NaN, -30])],
};
/** −2 V at pixel 0, 0 V at pixel 200. */
const scale = linearScale(-2, 0, 0, 200);

test('the cursor reads the nearest row, and says its values with their units', () => {
  expect(rowAt(table, scale, 60)).toBe(1);
  expect(rowWords(table, 1)).toBe('gate -1.50 V: gain -3.0 dB');
  expect(rowWords(table, 2)).toBe('gate -1.00 V: gain none');
});

test('where rows lie closer than pixels the cursor reads the one that is seen', () => {
  // 1000 and 1001 Hz are a hundredth of a pixel apart; the line at 1001 Hz is what a pixel shows.
  const lines: PlotTable = { ...table, x: column('', 'Hz', [20, 1000, 1001, 20000]), ys: [column('out', 'dB', [-90, -80, -20, -90])] };
  const hz = logScale(20, 20000, 0, 300);
  const pixel = (300 * Math.log(1000 / 20)) / Math.log(1000);
  expect(rowAt({ ...lines, keeps: 'highest' }, hz, pixel)).toBe(2);
  expect(rowAt(lines, hz, pixel)).toBe(1);
  expect(rowAt({ ...lines, ys: [column('out', 'V', [0, 0.1, -0.9, 0])], keeps: 'furthest' }, hz, pixel)).toBe(2);
});

test('a step of the cursor reaches the next row at least, and stops at the ends', () => {
  expect(stepFrom(table, scale, 0, 2)).toBe(50);
  expect(stepFrom(table, scale, 0, 100)).toBe(100);
  expect(stepFrom(table, scale, 200, 2)).toBe(200);
  expect(stepFrom(table, scale, 100, -2)).toBe(50);
});

test('saved numbers stand under names with units, tables side by side, as RFC 4180 has it', () => {
  const path: PlotTable = { x: column('VDS, path', 'V', [0.1, -0.1]), ys: [column('k', '', [1 / 3, Number.POSITIVE_INFINITY])] };
  expect(csvOf([table, path])).toBe(
    ['gate (V),gain (dB),"VDS, path (V)",k', '-2,-0.1,0.1,0.333333333', '-1.5,-3,-0.1,', '-1,,,', '0,-30,,', ''].join('\r\n'),
  );
});
