import { expect, test } from 'vitest';
import { createSpectrumAnalyser, dbFromPower } from '../../../model/measure/spectrum.ts';

const sine = (size: number, bin: number, peak = 1) =>
  Float64Array.from({ length: size }, (_, n) => peak * Math.sin((2 * Math.PI * bin * n) / size));

test('a sine on a bin reads its peak, and −6.02 dB in both neighbours (Hann)', () => {
  const levels = createSpectrumAnalyser(4096)
    .analyse(sine(4096, 100, 0.5))
    .map(dbFromPower);
  expect(levels[100]).toBeCloseTo(-6.0206, 4);
  expect(levels[99]).toBeCloseTo(-12.0412, 4);
  expect(levels[101]).toBeCloseTo(-12.0412, 4);
});

test('a sine half a bin off reads 1.424 dB low (Harris 1978)', () => {
  expect(createSpectrumAnalyser(4096).analyse(sine(4096, 100.5)).map(dbFromPower)[100]).toBeCloseTo(-1.424, 2);
});

test('away from the tone nothing but rounding is left: under −250 dB', () => {
  const levels = createSpectrumAnalyser(65536).analyse(sine(65536, 1000)).map(dbFromPower);
  expect(Math.max(...levels.slice(1010))).toBeLessThan(-250);
});

test('a size that is no power of two is refused', () => {
  expect(() => createSpectrumAnalyser(1000)).toThrow('size is 1000; expected a power of two from 2');
});
