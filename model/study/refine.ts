/**
 * A reading on a grid that is doubled until it stops changing.
 *
 * Error    `changed`: the largest that the last doubling changed any watched amplitude by, over that amplitude; amplitudes under 1e-8 of the
 *          largest, or under 1 pV, are left out. For a scheme of order two or more what is left is smaller than that
 */

/** −160 dB: what lies below is watched no longer. */
const SMALL = 1e-8;
const SMALL_V = 1e-12;
/** 1e-4 dB. */
export const STOPPED = 1.15e-5;
/** For the largest amplitude. */
const STOPPED_LARGEST = 1e-7;

export interface OnGrid<T> {
  readonly value: T;
  /** Amplitudes, V. */
  readonly watched: Float64Array;
  readonly settled: boolean;
}

export interface Refined<T> {
  readonly value: T;
  readonly gridPoints: number;
  readonly changed: number;
  /** The same of the largest amplitude alone. */
  readonly changedLargest: number;
  /** The largest amplitude changed by under 1e-7 unless said, every other by under 1e-4 dB, and the state repeats. */
  readonly converged: boolean;
}

/** From `coarsest` points, doubled up to `finest`; `stoppedLargest` is what the largest amplitude may still change by. */
export function refined<T>(
  coarsest: number,
  finest: number,
  readOn: (points: number) => OnGrid<T>,
  stoppedLargest = STOPPED_LARGEST,
): Refined<T> {
  let points = coarsest;
  let { value, watched } = readOn(points);
  let changed = Number.POSITIVE_INFINITY;
  let changedLargest = Number.POSITIVE_INFINITY;
  let converged = false;
  while (!converged && points < finest) {
    points *= 2;
    const finer = readOn(points);
    const change = changeOf(watched, finer.watched);
    converged = finer.settled && change.ofLargest < stoppedLargest && change.ofAny < STOPPED;
    changed = change.ofAny;
    changedLargest = change.ofLargest;
    value = finer.value;
    watched = finer.watched;
  }
  return { value, gridPoints: points, changed, changedLargest, converged };
}

function changeOf(before: Float64Array, after: Float64Array) {
  const largest = Math.max(...after);
  let ofLargest = 0;
  let ofAny = 0;
  after.forEach((value, i) => {
    if (value < SMALL * largest || value < SMALL_V) return;
    const change = Math.abs(value - before[i]) / value;
    ofAny = Math.max(ofAny, change);
    if (value === largest) ofLargest = change;
  });
  return { ofLargest, ofAny };
}
