import fc from 'fast-check';
import { expect, test } from 'vitest';
import { decadeTicks, linearScale, linearTicks, logScale, toPixel, toValue } from '../../../web/draw/scale.ts';

test('a value goes to its pixel and back, on linear and logarithmic axes and on axes that run upwards', () => {
  fc.assert(
    fc.property(fc.double({ min: 0.001, max: 1000, noNaN: true }), (value) => {
      for (const scale of [linearScale(-3, 1200, 10, 500), logScale(0.001, 1000, 480, 20)]) {
        expect(toValue(scale, toPixel(scale, value)) / value).toBeCloseTo(1, 9);
      }
    }),
  );
});

test('each decade of a logarithmic axis is as long as the next', () => {
  const scale = logScale(20, 20000, 0, 300);
  expect(toPixel(scale, 200)).toBeCloseTo(100, 9);
  expect(toPixel(scale, 2000)).toBeCloseTo(200, 9);
  expect(toPixel(scale, 0)).toBe(Number.NEGATIVE_INFINITY);
});

test('a logarithmic axis refuses an end at or below zero, naming both', () => {
  expect(() => logScale(0, 10, 0, 1)).toThrow('from 0 to 10; expected both above 0');
});

test('ticks are round, inside the axis, and no more than asked for', () => {
  expect(linearTicks(0.4, 0.6, 6)).toEqual([0.4, 0.45, 0.5, 0.55, 0.6]);
  expect(linearTicks(-1.8, 0, 5)).toEqual([-1.5, -1, -0.5, 0]);
  expect(decadeTicks(0.0001, 0.03)).toEqual([0.0001, 0.001, 0.01]);
});
