import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { cosTurns, dbFromRatio, exp, log, power, ratioFromDb, sinTurns, turnsOf } from '../../../model/device/math.ts';

const reference = JSON.parse(readFileSync(new URL('../../reference/elementary.json', import.meta.url), 'utf8'));

/** Distance in units in the last place of the expected value. */
function ulps(actual: number, expected: number): number {
  const bits = new Float64Array([Math.abs(expected)]);
  const next = new BigUint64Array(bits.buffer);
  const here = bits[0];
  next[0] += 1n;
  return Math.abs(actual - expected) / (bits[0] - here);
}

function worst(name: string, own: (x: number) => number): number {
  return Math.max(...reference[name].map(([x, y]: [number, number]) => (y === 0 ? Math.abs(own(x)) : ulps(own(x), y))));
}

test('exp is within 1 ulp of 60-digit arithmetic from underflow to overflow (reference: mpmath)', () => {
  expect(worst('exp', exp)).toBeLessThanOrEqual(1);
});

test('log is within 1 ulp of 60-digit arithmetic from the smallest to the largest double (reference: mpmath)', () => {
  expect(worst('log', log)).toBeLessThanOrEqual(1);
});

test('sine and cosine of turns are within 1 ulp of 60-digit arithmetic (reference: mpmath)', () => {
  expect(worst('sinTurns', sinTurns)).toBeLessThanOrEqual(1);
  expect(worst('cosTurns', cosTurns)).toBeLessThanOrEqual(1);
});

test('the ends of the range are those of IEEE 754', () => {
  expect(exp(710)).toBe(Number.POSITIVE_INFINITY);
  expect(exp(-746)).toBe(0);
  expect(exp(Number.NaN)).toBeNaN();
  expect(log(0)).toBe(Number.NEGATIVE_INFINITY);
  expect(log(-1)).toBeNaN();
  expect(Math.abs(sinTurns(0.5))).toBe(0);
  expect(Math.abs(cosTurns(0.25))).toBe(0);
  expect(sinTurns(0.25)).toBe(1);
  expect(cosTurns(0.5)).toBe(-1);
});

test('decibels and back: 0 dBV is +2.218 dBu, +4 dBu is 1.22765 V (IEC 60268-17 usage; figures from memory)', () => {
  expect(dbFromRatio(1 / 0.774597)).toBeCloseTo(2.218, 3);
  expect(0.774597 * ratioFromDb(4)).toBeCloseTo(1.22765, 5);
});

test('powers and angles agree with closed forms', () => {
  expect(power(2, 10)).toBeCloseTo(1024, 10);
  expect(power(0, 2)).toBe(0);
  for (let eighth = -3; eighth <= 4; eighth++) {
    expect(turnsOf(sinTurns(eighth / 8), cosTurns(eighth / 8))).toBeCloseTo(eighth / 8, 15);
  }
});
