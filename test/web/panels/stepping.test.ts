import { expect, test } from 'vitest';
import { E24, freeValue, pageValue, stepMany, stepValue } from '../../../web/panels/parts/stepping.ts';

const fifty = { kind: 'linear', step: 0.05 } as const;

test('the arrows go through the preferred values of E24 and back', () => {
  // Source: IEC 60063, E24: … 9.1, 10, 11, 12, 13, 15 …
  expect(stepValue(1e6, E24, 1)).toBe(1.1e6);
  expect(stepValue(1e6, E24, -1)).toBe(910e3);
  expect(stepMany(1e6, E24, 3)).toBe(1.3e6);
  expect(stepMany(1.3e6, E24, -3)).toBe(1e6);
  expect(stepMany(1e6, E24, 0)).toBe(1e6);
});

test('a value between two preferred ones steps onto its neighbour', () => {
  expect(stepValue(1.05e6, E24, 1)).toBe(1.1e6);
  expect(stepValue(1.05e6, E24, -1)).toBe(1e6);
});

test('nothing steps up to the first value and no further down', () => {
  expect(stepValue(0, E24, 1)).toBe(1);
  expect(stepValue(0, E24, -1)).toBe(0);
});

test('voltages move on their grid without gathering rounding, and cross zero', () => {
  expect(stepMany(-0.6, fifty, 24)).toBe(0.6);
  expect(stepValue(-0.62, fifty, 1)).toBe(-0.6);
  expect(stepValue(0.05, fifty, -1)).toBe(0);
});

test('the page keys move a decade, or ten steps', () => {
  expect(pageValue(4.7e3, E24, 1)).toBe(47e3);
  expect(pageValue(-1.2, fifty, -1)).toBe(-1.7);
});

test('a free drag passes every value: 24 steps are a decade', () => {
  expect(freeValue(1000, E24, 24)).toBe(10000);
  expect(freeValue(-1.2, fifty, 0.5)).toBe(-1.175);
});
