import { expect, test } from 'vitest';
import { curveAt } from '../../../web/draw/feedbackPlot.ts';
import { between, fractionsWithin, thdWithin } from '../../../web/draw/tolerance.ts';

test('parts of 1 % at opposite ends move k = ½ to 0.495 and 0.505, and leave 0 and 1 alone', () => {
  // Arithmetic: 0.99/(0.99 + 1.01) and 1.01/(1.01 + 0.99).
  expect(fractionsWithin(0.5)[0]).toBeCloseTo(0.495, 12);
  expect(fractionsWithin(0.5)[1]).toBeCloseTo(0.505, 12);
  expect(fractionsWithin(0)).toEqual([0, 0]);
  expect(fractionsWithin(1)).toEqual([1, 1]);
});

test('where the second harmonic changes sign on the way, the least THD is what the other harmonics leave', () => {
  const a = { thd: Math.hypot(3e-3, 4e-4), h2Signed: 3e-3 };
  const b = { thd: Math.hypot(1e-3, 4e-4), h2Signed: -1e-3 };
  const [low, high] = thdWithin([a, b]);
  expect(low).toBeCloseTo(4e-4, 12);
  expect(high).toBe(a.thd);
  expect(between(a, b, 0)).toEqual(a);
});

test('the curve between two of its points is found, beyond its ends nothing', () => {
  const curve = [
    { k: 0.4, thd: 0.01, h2Signed: 0.01, h3: 0 },
    { k: 0.5, thd: 0, h2Signed: 0, h3: 0 },
  ];
  expect(curveAt(curve, 0.45)?.thd).toBeCloseTo(0.005, 12);
  expect(curveAt(curve, 0.4)).toEqual(curve[0]);
  expect(curveAt(curve, 0.39)).toBeNull();
  expect(curveAt(curve, 0.51)).toBeNull();
});
