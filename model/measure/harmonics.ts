/**
 * Harmonics of one whole period.
 *
 * Law      c(n) = 2/N · Σ y[i]·exp(−2πjni/N), the amplitude and phase of harmonic n re a cosine that starts at sample 0; c(0) the mean
 * Error    a few ulp of the largest sample; components beyond N/2 fold back, so the caller refines N until nothing changes
 * Source   discrete Fourier transform, definition
 */
import { cosTurns, sinTurns } from '../device/math.ts';

export interface HarmonicSet {
  readonly mean: number;
  /** Real and imaginary parts of harmonics 1 … count at index n − 1. */
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/** Harmonics 1 … `count` of the `period`, in its unit. Sums are compensated (Neumaier), so that a null is a null. */
export function harmonicsOf(period: Float64Array, count: number): HarmonicSet {
  const size = period.length;
  const real = new Float64Array(count);
  const imaginary = new Float64Array(count);
  const { cosine, sine } = tablesOf(size);
  for (let n = 1; n <= count; n++) {
    real[n - 1] = (2 / size) * weightedSum(period, cosine, n);
    imaginary[n - 1] = (-2 / size) * weightedSum(period, sine, n);
  }
  return { mean: weightedSum(period, cosine, 0) / size, real, imaginary };
}

/** Of a turn in so many steps. Curves ask for the same few grids again and again: the last stay, to be read only. */
const kept = new Map<number, { readonly cosine: Float64Array; readonly sine: Float64Array }>();
const MOST_KEPT = 4;

function tablesOf(size: number) {
  const tables = kept.get(size) ?? {
    cosine: Float64Array.from({ length: size }, (_, i) => cosTurns(i / size)),
    sine: Float64Array.from({ length: size }, (_, i) => sinTurns(i / size)),
  };
  kept.delete(size);
  kept.set(size, tables);
  if (kept.size > MOST_KEPT) kept.delete(kept.keys().next().value ?? size);
  return tables;
}

function weightedSum(period: Float64Array, table: Float64Array, n: number): number {
  const size = period.length;
  let sum = 0;
  let carry = 0;
  for (let i = 0; i < size; i++) {
    const term = period[i] * table[(i * n) % size];
    const next = sum + term;
    carry += Math.abs(sum) >= Math.abs(term) ? sum - next + term : term - next + sum;
    sum = next;
  }
  return sum + carry;
}
