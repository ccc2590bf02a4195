import { describe, expect, test } from 'vitest';
import { testTone } from '../../../model/chain/testTone.ts';

describe.each([
  [997, 48000],
  [1, 44100],
  [440.123, 48000],
  [19999.7, 48000],
  [1000, 8000],
])('a test tone of %d Hz at %d Hz', (hz, rateHz) => {
  const samples = testTone(hz, 0.5, rateHz);

  test('is the sine of the closed form, to the rounding of a Float32, in whole cycles', () => {
    const cycles = Math.round((hz * samples.length) / rateHz);
    const off = samples.map((x, n) => Math.abs(x - 0.5 * Math.sin((2 * Math.PI * cycles * n) / samples.length)));
    expect(Math.max(...off)).toBeLessThan(1e-7);
  });

  test('has the frequency to 20 μHz, by the cycles in its loop', () => {
    const cycles = Math.round((hz * samples.length) / rateHz);
    expect(Math.abs((cycles * rateHz) / samples.length - hz)).toBeLessThan(2e-5);
  });
});

test('a frequency that the rate cannot hold is refused by name', () => {
  expect(() => testTone(24000, 1, 48000)).toThrow('the test tone is 24000 Hz; expected 1 Hz to under 24000 Hz, half the sample rate');
  expect(() => testTone(0.5, 1, 48000)).toThrow('0.5 Hz');
  expect(() => testTone(Number.NaN, 1, 48000)).toThrow(RangeError);
});
