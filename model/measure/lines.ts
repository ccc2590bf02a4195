/**
 * Lines of one whole period of many, and how a group of them moves in time.
 *
 * Law      c(n) = 2/N · Σ y[i]·exp(−2πjni/N), amplitude and phase re a cosine that starts at sample 0; c(0) is the mean. A group of lines about
 *          line `centre` is a carrier there times its envelope Σ w(n)·c(n)·exp(2πj(n − centre)t), t from 0 to 1 over the period
 * Error    a few ulp of the largest sample, whatever the number of samples; lines beyond N/2 fold back, so the caller refines N
 * Source   discrete Fourier transform; quadrature demodulation, textbook
 */
import FFT from 'fft.js';
import { cosTurns } from '../device/math.ts';

export interface Lines {
  /** Index n is line n, 0 … N/2 − 1. */
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/** The lines of a `period` whose length is a power of two from 4. */
export function linesOf(period: Float64Array): Lines {
  const size = period.length;
  const fft = new FFT(size);
  const bins: number[] = fft.createComplexArray();
  fft.realTransform(bins, period);
  const real = Float64Array.from({ length: size / 2 }, (_, n) => (bins[2 * n] * (n === 0 ? 1 : 2)) / size);
  const imaginary = Float64Array.from({ length: size / 2 }, (_, n) => (n === 0 ? 0 : (2 * bins[2 * n + 1]) / size));
  return { real, imaginary };
}

/** Amplitude of one line. */
export function lineAmplitude({ real, imaginary }: Lines, n: number): number {
  return Math.sqrt(real[n] * real[n] + imaginary[n] * imaginary[n]);
}

/**
 * Weight of line `n` in the group about line `centre`: 1 up to half of `reach` away, then falling as the square of a cosine to 0 at `reach`, so
 * that a corner in time stays where it is.
 */
function weightOf(n: number, centre: number, reach: number): number {
  const away = Math.abs(n - centre) / reach;
  if (away <= 0.5) return 1;
  return away < 1 ? 0.5 - 0.5 * cosTurns(away) : 0;
}

/** Calls `take` with every line of a group that exists, and its weight. */
function eachLine(lines: Lines, centre: number, reach: number, take: (n: number, weight: number) => void): void {
  const from = Math.max(1, Math.ceil(centre - reach));
  const to = Math.min(lines.real.length - 1, Math.floor(centre + reach));
  for (let n = from; n <= to; n++) take(n, weightOf(n, centre, reach));
}

/** Root of the sum of the squared amplitudes in a group. */
export function groupAmplitude(lines: Lines, centre: number, reach: number): number {
  let sum = 0;
  eachLine(lines, centre, reach, (n, weight) => {
    const amplitude = weight * lineAmplitude(lines, n);
    sum += amplitude * amplitude;
  });
  return Math.sqrt(sum);
}

/** Magnitude of a group's envelope at `moments` even times of the period, a power of two from 4. */
export function envelopeOf(lines: Lines, centre: number, reach: number, moments: number): Float64Array {
  const fft = new FFT(moments);
  const folded: number[] = fft.createComplexArray();
  const inTime: number[] = fft.createComplexArray();
  eachLine(lines, centre, reach, (n, weight) => {
    const at = 2 * (n % moments);
    folded[at] += weight * lines.real[n];
    folded[at + 1] += weight * lines.imaginary[n];
  });
  fft.inverseTransform(inTime, folded);
  return Float64Array.from({ length: moments }, (_, k) => {
    const re = inTime[2 * k] * moments;
    const im = inTime[2 * k + 1] * moments;
    return Math.sqrt(re * re + im * im);
  });
}
