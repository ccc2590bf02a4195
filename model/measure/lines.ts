/**
 * Lines of one whole period of many, and how a group of them moves in time.
 *
 * Law      c(n) = 2/N · Σ y[i]·exp(−2πjni/N), amplitude and phase re a cosine that starts at sample 0; c(0) is the mean. A group of lines about
 *          line `centre` is a carrier there times its envelope Σ w(n)·c(n)·exp(2πj(n − centre)t), t from 0 to 1 over the period. Carriers stand
 *          `spacing` apart; the weights w are those of a mean over four of their periods and no more in time (a cubic B-spline), so that
 *          one carrier's envelope holds nothing of another that is steady over these, and never passes what it is a mean of
 * Error    a few ulp of the largest sample, whatever the number of samples; lines beyond N/2 fold back, so the caller refines N.
 *          An envelope that moves j times in the period is 0.67·(πj/spacing)² of that movement short
 * Source   discrete Fourier transform; quadrature demodulation, textbook
 */
import FFT from 'fft.js';
import { sinTurns } from '../device/math.ts';

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

/** Lines further than this many spacings away are left out: their weight is about 1e-5. */
const REACH = 5;

/** Weight of a line that is `away` spacings from the centre: sinc⁴, which is 0 of order four at every other centre. */
function weightAt(away: number): number {
  if (away === 0) return 1;
  const sinc = sinTurns(away / 2) / (Math.PI * away);
  return sinc * sinc * sinc * sinc;
}

/** Root of the sum of the squared amplitudes of the lines `from` to `to`. */
export function bandAmplitude(lines: Lines, from: number, to: number): number {
  let sum = 0;
  for (let n = from; n <= to; n++) sum += lines.real[n] * lines.real[n] + lines.imaginary[n] * lines.imaginary[n];
  return Math.sqrt(sum);
}

/** Magnitude of a group's envelope at `moments` even times of the period, a power of two from 4. */
export function envelopeOf(lines: Lines, centre: number, spacing: number, moments: number): Float64Array {
  const fft = new FFT(moments);
  const folded: number[] = fft.createComplexArray();
  const inTime: number[] = fft.createComplexArray();
  const last = Math.min(lines.real.length - 1, centre + REACH * spacing);
  for (let n = Math.max(1, centre - REACH * spacing); n <= last; n++) {
    const weight = weightAt((n - centre) / spacing);
    folded[2 * (n % moments)] += weight * lines.real[n];
    folded[2 * (n % moments) + 1] += weight * lines.imaginary[n];
  }
  fft.inverseTransform(inTime, folded);
  return Float64Array.from({ length: moments }, (_, k) => {
    const re = inTime[2 * k] * moments;
    const im = inTime[2 * k + 1] * moments;
    return Math.sqrt(re * re + im * im);
  });
}
