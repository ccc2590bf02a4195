import fc from 'fast-check';
import { expect, test } from 'vitest';
import { nearestPreferred, preferredDecade, SERIES_NAMES, stepPreferred } from '../../../model/design/preferred.ts';

const ratio = (n: number, of: number) => 10 ** (n / of);

// IEC 60063, from memory: the coarse series have values of their own, the fine ones are rounded to three digits.
test('E6, E12 and E24 are the published values', () => {
  expect(preferredDecade('E6')).toEqual([1, 1.5, 2.2, 3.3, 4.7, 6.8]);
  expect(preferredDecade('E12')).toEqual([1, 1.2, 1.5, 1.8, 2.2, 2.7, 3.3, 3.9, 4.7, 5.6, 6.8, 8.2]);
  const published = [1, 1.1, 1.2, 1.3, 1.5, 1.6, 1.8, 2, 2.2, 2.4, 2.7, 3, 3.3, 3.6, 3.9, 4.3, 4.7, 5.1, 5.6, 6.2, 6.8, 7.5, 8.2, 9.1];
  expect(preferredDecade('E24')).toEqual(published);
});

test('E24 departs from rounding at 2.7 3.0 3.3 3.6 3.9 4.3 4.7 8.2 and nowhere else', () => {
  const departing = preferredDecade('E24').filter((value, n) => value !== Math.round(10 * ratio(n, 24)) / 10);
  expect(departing).toEqual([2.7, 3, 3.3, 3.6, 3.9, 4.3, 4.7, 8.2]);
});

test.each(['E48', 'E96', 'E192'] as const)('%s is 10^(n/N) to three digits, but for 9.20 in E192', (series) => {
  const values = preferredDecade(series);
  const size = Number(series.slice(1));
  expect(values).toHaveLength(size);
  const departing = values.filter((value, n) => value !== Math.round(100 * ratio(n, size)) / 100);
  expect(departing).toEqual(series === 'E192' ? [9.2] : []);
});

test.each([
  [6800, 'E24', 1, 7500],
  [6800, 'E24', -1, 6200],
  [7000, 'E24', 1, 7500],
  [7000, 'E24', -1, 6800],
  [9100, 'E24', 1, 10000],
  [10000, 'E24', -1, 9100],
  [1e-7, 'E6', 1, 1.5e-7],
  [1e-7, 'E6', -1, 6.8e-8],
  [988, 'E192', 1, 1000],
  [6800.000000001, 'E24', -1, 6200],
  [999.9999999999, 'E24', 1, 1100],
] as const)('from %d, a step in %s in direction %d leads to %d', (value, series, direction, expected) =>
  expect(stepPreferred(value, series, direction)).toBe(expected),
);

test('nearest is judged by ratio, not by difference', () => {
  expect(nearestPreferred(1.23, 'E6')).toBe(1.5);
  expect(nearestPreferred(1.22, 'E6')).toBe(1);
  expect(nearestPreferred(4690, 'E24')).toBe(4700);
  expect(nearestPreferred(8.3, 'E6')).toBe(10);
  expect(nearestPreferred(4700, 'E24')).toBe(4700);
});

test('a step lands on the series, passes nothing over, and is undone by the step back', () => {
  const positive = fc.tuple(fc.double({ min: 1, max: 10, noNaN: true }), fc.integer({ min: -15, max: 12 })).map(([m, e]) => m * 10 ** e);
  fc.assert(
    fc.property(positive, fc.constantFrom(...SERIES_NAMES), (value, series) => {
      const up = stepPreferred(value, series, 1);
      const down = stepPreferred(value, series, -1);
      expect(down).toBeLessThan(value);
      expect(up).toBeGreaterThan(value);
      expect(nearestPreferred(up, series)).toBe(up);
      expect(stepPreferred(down, series, 1)).toBeGreaterThanOrEqual(value * (1 - 1e-9));
      expect(stepPreferred(up, series, -1)).toBeLessThanOrEqual(value * (1 + 1e-9));
      expect(stepPreferred(stepPreferred(up, series, 1), series, -1)).toBe(up);
    }),
    { seed: 5 },
  );
});

test.each([0, -1, NaN, Infinity])('%d has no preferred neighbours', (value) => {
  expect(() => stepPreferred(value, 'E24', 1)).toThrow(`value is ${value}; expected more than 0`);
  expect(() => nearestPreferred(value, 'E24')).toThrow(RangeError);
});
