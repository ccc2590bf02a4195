/**
 * Spectrum of a window of samples, as powers: their decibels cost more than the transform, and a drawing needs few of them.
 *
 * Law      (|FFT(w·x)|·2/Σw)², so that a sine of peak 1 reads 1 where its frequency falls on a bin
 * Error    a sine half a bin off reads 1.424 dB low; noise reads 1.5 bins' worth (periodic Hann window)
 * Source   Harris, Proc. IEEE 66 (1978) 51
 */
import FFT from 'fft.js';
import { cosTurns, log10 } from '../device/math.ts';

export interface SpectrumAnalyser {
  readonly size: number;
  /** Power of each bin below half the rate, re a sine of peak 1; the same array at every call. */
  analyse(samples: ArrayLike<number>): Float64Array;
}

/** For windows of `size` samples. Throws a RangeError unless `size` is a power of two from 2. */
export function createSpectrumAnalyser(size: number): SpectrumAnalyser {
  if (!(size >= 2 && (size & (size - 1)) === 0)) throw new RangeError(`size is ${size}; expected a power of two from 2`);
  const fft = new FFT(size);
  const window = Float64Array.from({ length: size }, (_, n) => 0.5 - 0.5 * cosTurns(n / size));
  const windowed: number[] = new Array(size).fill(0);
  const bins: number[] = fft.createComplexArray();
  const powers = new Float64Array(size / 2);
  const scale = 16 / (size * size);
  return {
    size,
    analyse(samples) {
      for (let n = 0; n < size; n++) windowed[n] = samples[n] * window[n];
      fft.realTransform(bins, windowed);
      for (let n = 0; n < powers.length; n++) {
        const re = bins[2 * n];
        const im = bins[2 * n + 1];
        powers[n] = scale * (re * re + im * im);
      }
      return powers;
    },
  };
}

/** dB re a power of 1; −Infinity where there is nothing. */
export function dbFromPower(power: number): number {
  return 10 * log10(power);
}
