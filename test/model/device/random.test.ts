import { expect, test } from 'vitest';
import { createGaussian, putGaussians } from '../../../model/device/random.ts';

const DRAWN = 4_000_000;

function draw(seed: number): Float64Array {
  const numbers = new Float64Array(DRAWN);
  const source = createGaussian(seed);
  putGaussians(source, numbers, 0, DRAWN);
  return numbers;
}

// Shares within 1, 2, 3 and 4 standard deviations: Abramowitz & Stegun, Handbook of Mathematical Functions, table 26.1. Bounds: five standard
// deviations of a count of independent draws.
test.each([
  [1, 0.682689492],
  [2, 0.954499736],
  [3, 0.997300204],
  [3.442619855899, 1 - 5.7607e-4],
  [4, 0.999936658],
])('within %s standard deviations lies the share of the normal distribution, half of the rest on either side', (bound, share) => {
  const numbers = draw(1);
  const outside = numbers.filter((x) => Math.abs(x) > bound).length;
  const above = numbers.filter((x) => x > bound).length;
  expect(Math.abs(outside / DRAWN - (1 - share))).toBeLessThan(5 * Math.sqrt((share * (1 - share)) / DRAWN));
  expect(Math.abs(above - outside / 2)).toBeLessThan(2.5 * Math.sqrt(outside) + 1);
});

test('moments of the normal distribution: 0, 1, 0, 3, and none between one number and the next', () => {
  const numbers = draw(2);
  const mean = (f: (x: number, i: number) => number) => numbers.reduce((sum, x, i) => sum + f(x, i), 0) / DRAWN;
  const deviations = 5 / Math.sqrt(DRAWN);
  expect(Math.abs(mean((x) => x))).toBeLessThan(deviations);
  expect(Math.abs(mean((x) => x * x) - 1)).toBeLessThan(Math.sqrt(2) * deviations);
  expect(Math.abs(mean((x) => x * x * x))).toBeLessThan(Math.sqrt(15) * deviations);
  expect(Math.abs(mean((x) => x * x * x * x) - 3)).toBeLessThan(Math.sqrt(96) * deviations);
  expect(Math.abs(mean((x, i) => (i > 0 ? x * numbers[i - 1] : 0)))).toBeLessThan(deviations);
});
