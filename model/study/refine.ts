/**
 * A reading on a grid that is doubled until it stops changing.
 *
 * Error    `changed`: the largest that the last doubling changed any watched amplitude by, over that amplitude; amplitudes that are too small to watch
 *          are left out. For a scheme of order two or more what is left is smaller than that
 */

/** When a reading has stopped changing. */
export interface Stop {
  /** What the largest amplitude may still change by, and any other, over itself. */
  readonly largest: number;
  readonly any: number;
  /** Over the largest: what lies below is watched no longer. */
  readonly small: number;
}

const SMALL_V = 1e-12;
/** 1e-4 dB. */
export const STOPPED = 1.15e-5;
/** The largest to 1e-7, the others to 1e-4 dB down to −160 dB. */
export const TO_READ: Stop = { largest: 1e-7, any: STOPPED, small: 1e-8 };
/** The largest to 1e-4 dB, the others to 0.01 dB down to −120 dB. */
export const TO_DRAW: Stop = { largest: STOPPED, any: 100 * STOPPED, small: 1e-6 };

export interface OnGrid<T> {
  readonly value: T;
  /** Amplitudes, V. */
  readonly watched: Float64Array;
  readonly settled: boolean;
  /** By how much arithmetic lets the period repeat, V, where that is all it lets: a change by less is no change. */
  readonly noiseV?: number;
}

export interface Refined<T> {
  readonly value: T;
  readonly gridPoints: number;
  readonly changed: number;
  /** The same of the largest amplitude alone. */
  readonly changedLargest: number;
  /** Every amplitude has stopped changing, as far as arithmetic tells, and the state repeats. */
  readonly converged: boolean;
}

/** From `coarsest` points, doubled up to `finest`. */
export function refined<T>(coarsest: number, finest: number, readOn: (points: number) => OnGrid<T>, stop: Stop = TO_READ): Refined<T> {
  let points = coarsest;
  let { value, watched } = readOn(points);
  let changed = Number.POSITIVE_INFINITY;
  let changedLargest = Number.POSITIVE_INFINITY;
  let converged = false;
  while (!converged && points < finest) {
    points *= 2;
    const finer = readOn(points);
    const change = changeOf(watched, finer.watched, stop.small, finer.noiseV ?? 0);
    converged = finer.settled && change.ofLargest < stop.largest && change.ofAnyBeyondNoise < stop.any;
    changed = change.ofAny;
    changedLargest = change.ofLargest;
    value = finer.value;
    watched = finer.watched;
  }
  return { value, gridPoints: points, changed, changedLargest, converged };
}

function changeOf(before: Float64Array, after: Float64Array, small: number, noiseV: number) {
  const largest = Math.max(...after);
  let ofLargest = 0;
  let ofAny = 0;
  let ofAnyBeyondNoise = 0;
  after.forEach((value, i) => {
    if (value < small * largest || value < SMALL_V) return;
    const change = Math.abs(value - before[i]) / value;
    ofAny = Math.max(ofAny, change);
    if (change * value > noiseV) ofAnyBeyondNoise = Math.max(ofAnyBeyondNoise, change);
    if (value === largest) ofLargest = change;
  });
  return { ofLargest, ofAny, ofAnyBeyondNoise };
}
