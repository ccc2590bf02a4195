import { expect, test } from 'vitest';
import {
  clockText,
  dbuFromPeak,
  decimals,
  gateVolts,
  peakFromDbu,
  percentText,
  signedPercentText,
  valueVolts,
  voltsText,
} from '../../../web/draw/words.ts';

/** A thin space stands before each unit. */
const spaced = (text: string) => text.replace(/\u2009/, ' ');

test('a minus is a real one, and nothing is never minus nothing', () => {
  expect(decimals(-1.5, 2)).toBe('−1.50');
  expect(decimals(-0.001, 1)).toBe('0.0');
});

test('a percentage shows two digits or more down to a thousandth of a per cent', () => {
  expect([0.217, 0.04, 0.0047, 0.00024].map(percentText)).toEqual(['21.7', '4.0', '0.47', '0.024']);
  expect(signedPercentText(0.0047)).toBe('+0.47');
  expect(signedPercentText(-0.0002)).toBe('−0.020');
});

test('0 dBu is 0.774597 V rms and +4 dBu is 1.22765 V rms', () => {
  // Source: the definition, 1 mW into 600 Ω; +4 dBu as usually printed.
  expect(peakFromDbu(0) / Math.SQRT2).toBeCloseTo(0.774597, 6);
  expect(peakFromDbu(4) / Math.SQRT2).toBeCloseTo(1.22765, 5);
  expect(dbuFromPeak(peakFromDbu(-14.8))).toBeCloseTo(-14.8, 12);
});

test('a measured voltage takes the prefix that reads best, a set one stays in volts', () => {
  expect([1.234, 0.2, 0.059, 0.0012, 0.00005].map(voltsText).map(spaced)).toEqual(['1.23 V', '200 mV', '59 mV', '1.2 mV', '50 μV']);
  expect([0.2, -0.6, 0.125, 0.05, -1.5].map(valueVolts).map(spaced)).toEqual(['0.20 V', '−0.60 V', '0.125 V', '50.0 mV', '−1.50 V']);
  expect(spaced(gateVolts(-1.19999999))).toBe('−1.20 V');
});

test('seconds are minutes and seconds', () => {
  expect([16, 75.38].map((s) => clockText(s))).toEqual(['0:16', '1:15']);
  expect(clockText(7.38, true)).toBe('0:07.3');
});
