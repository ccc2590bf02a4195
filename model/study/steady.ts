/**
 * Periodic steady state of a cell: under a tone at a fixed control voltage, or under any period of audio and control.
 *
 * Scheme   one period as a map of the state, its fixed point by Newton with a Jacobian by differences (exact for the linear part); where that
 *          does not settle the cell is run period after period until it does
 * Error    each state repeats within `REPEATS`·(its size + 1 µV) + `ROUNDING`·(the largest state) from one period to the next, or the reading says
 *          that it did not settle: beside a supply of some volts, arithmetic lets a small voltage repeat no better. Where picofarads meet tenths of
 *          an ohm the trapezoidal rule keeps its own rounding, as an alternation from sample to sample: Newton's method that has come within `ALTERNATES` of
 *          the drive's swing, −160 dB, and comes no nearer has found the period
 * Source   shooting method: Aprille & Trick, Proc. IEEE 60 (1972) 108, from memory
 */
import { advanceCell, type Cell, gateConducts, overdriveV, settle } from '../cell/cell.ts';
import { factor, solve } from '../cell/linear.ts';
import { CONDUCTS_A } from '../device/junction.ts';
import { channelRegion } from '../device/law.ts';
import { cosTurns } from '../device/math.ts';

const NEWTON_ROUNDS = 20;
const SETTLING_PERIODS = 4000;
const SETTLING_SAMPLES = 16777216;
const REPEATS = 1e-12;
const ROUNDING = 3e-14;
const ALTERNATES = 1e-8;
/** Rounds after which Newton's method comes no nearer. */
const NEAREST_AFTER = 4;

/** One period at the cell's own step: the output and both overdrives, V; whether a junction conducts. Sample 0 is the tone's crest. */
export interface SteadyPeriod {
  readonly output: Float64Array;
  readonly sourceOverdrive: Float64Array;
  readonly drainOverdrive: Float64Array;
  readonly gateOn: Uint8Array;
  readonly settled: boolean;
  /** Not found directly: run until it repeated, or as long as that was tried. */
  readonly byTime: boolean;
  /** By how much it repeats, V, where Newton's method came no nearer; else 0. */
  readonly noiseV: number;
  readonly start: SteadyStart;
}

/** Where a search ended: the states at sample 0, and the slope that it went by. */
export interface SteadyStart {
  readonly state: Float64Array;
  readonly slope: Slope | null;
}

/** Factored. */
interface Slope {
  readonly matrix: Float64Array;
  readonly pivots: Int32Array;
}

/** The slope in use, and what is left where the search comes no nearer, V. */
interface Search {
  slope: Slope | null;
  noiseV: number;
}

/** The period of `size` samples of `toneV`·cos; the cell's step must be the period divided by `size`. `start` as for `periodOf`. */
export function steadyPeriod(cell: Cell, toneV: number, controlV: number, size: number, start: SteadyStart | null = null): SteadyPeriod {
  const audio = Float64Array.from({ length: size }, (_, i) => toneV * cosTurns((i + 1) / size));
  return periodOf(cell, audio, new Float64Array(size).fill(controlV), start);
}

/**
 * The period that repeats under one period of audio and control, V, each given at the end of its step. Sample i is the one before step i.
 * `start` is the `start` of the same cell on a coarser grid: the search begins there.
 */
export function periodOf(cell: Cell, audio: Float64Array, control: Float64Array, start: SteadyStart | null = null): SteadyPeriod {
  const scratch = new Float64Array(audio.length);
  settle(cell, 0, control[control.length - 1]);
  if (start !== null) cell.state.set(start.state);
  const run = () => {
    scratch.set(audio);
    advanceCell(cell, scratch, control, 0, audio.length);
  };
  run();
  const search: Search = { slope: start?.slope ?? null, noiseV: 0 };
  const byTime = !shoot(cell, run, search, ALTERNATES * (swingOf(audio) + swingOf(control)));
  const settled = !byTime || runUntilSettled(cell, run, audio.length);
  const state = cell.state.slice(0, cell.stateCount);
  return { ...recordPeriod(cell, audio, control), settled, byTime, noiseV: search.noiseV, start: { state, slope: search.slope } };
}

function swingOf(signal: Float64Array): number {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of signal) {
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  return high - low;
}

/** Newton's method; the slope is renewed only where it no longer takes nine tenths of what is missing. `nearV` is near enough once a new slope brings it no nearer. */
function shoot(cell: Cell, run: () => void, search: Search, nearV: number): boolean {
  const n = cell.stateCount;
  if (n === 0) return true;
  const start = cell.state.slice();
  let before = Number.POSITIVE_INFINITY;
  let isNew = false;
  for (let round = 0; round < NEWTON_ROUNDS; round++) {
    const from = cell.state.slice();
    run();
    const miss = Float64Array.from({ length: n }, (_, i) => cell.state[i] - from[i]);
    if (repeats(from, miss)) return true;
    const end = cell.state.slice();
    const size = miss.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    const isSlow = size > 0.1 * before;
    if (isSlow && isNew && round >= NEAREST_AFTER && size < nearV) {
      search.noiseV = size;
      return true;
    }
    isNew = isSlow || search.slope === null;
    if (isNew) search.slope = slopeAt(cell, run, from, end);
    if (search.slope === null) break;
    before = size;
    solve(search.slope.matrix, search.slope.pivots, n, miss, 1);
    cell.state.set(end);
    for (let i = 0; i < n; i++) cell.state[i] = from[i] + miss[i];
    if (!cell.state.every(Number.isFinite)) break;
  }
  cell.state.set(start);
  return false;
}

/** One less the slope of the period's map, factored, by differences; null where it is singular. */
function slopeAt(cell: Cell, run: () => void, from: Float64Array, end: Float64Array): Slope | null {
  const n = cell.stateCount;
  const matrix = new Float64Array(n * n);
  for (let column = 0; column < n; column++) {
    const nudge = 1e-6 * (1 + Math.abs(from[column]));
    cell.state.set(from);
    cell.state[column] += nudge;
    run();
    for (let row = 0; row < n; row++) matrix[row * n + column] = (row === column ? 1 : 0) - (cell.state[row] - end[row]) / nudge;
  }
  const pivots = new Int32Array(n);
  return factor(matrix, pivots, n) ? { matrix, pivots } : null;
}

function runUntilSettled(cell: Cell, run: () => void, size: number): boolean {
  const n = cell.stateCount;
  for (let period = 0; period < SETTLING_PERIODS && period * size < SETTLING_SAMPLES; period++) {
    const before = cell.state.slice(0, n);
    run();
    const miss = before.map((value, i) => cell.state[i] - value);
    if (repeats(before, miss)) return true;
  }
  return false;
}

/** Whether the first states of `from` came back within `miss` of themselves. */
function repeats(from: Float64Array, miss: Float64Array): boolean {
  const largest = miss.reduce((most, _, i) => Math.max(most, Math.abs(from[i])), 0);
  return miss.every((value, i) => Math.abs(value) <= REPEATS * (Math.abs(from[i]) + 1e-6) + ROUNDING * largest);
}

function recordPeriod(
  cell: Cell,
  audio: Float64Array,
  control: Float64Array,
): Pick<SteadyPeriod, 'output' | 'sourceOverdrive' | 'drainOverdrive' | 'gateOn'> {
  const size = audio.length;
  const output = new Float64Array(size);
  const sourceOverdrive = new Float64Array(size);
  const drainOverdrive = new Float64Array(size);
  const gateOn = new Uint8Array(size);
  const one = new Float64Array(1);
  const driver = new Float64Array(1);
  for (let i = 0; i < size; i++) {
    one[0] = audio[i];
    driver[0] = control[i];
    advanceCell(cell, one, driver, 0, 1);
    const at = (i + 1) % size;
    output[at] = one[0];
    sourceOverdrive[at] = overdriveV(cell, 'source');
    drainOverdrive[at] = overdriveV(cell, 'drain');
    gateOn[at] = gateConducts(cell, CONDUCTS_A) ? 1 : 0;
  }
  return { output, sourceOverdrive, drainOverdrive, gateOn };
}

/** Shares of the period; the first three add up to one, the last may overlap them. */
export interface RegionShares {
  readonly ohmic: number;
  readonly saturated: number;
  readonly cutoff: number;
  readonly gateOn: number;
}

/** By the overdrives of each sample. */
export function regionShares(period: SteadyPeriod): RegionShares {
  const count = { ohmic: 0, saturated: 0, cutoff: 0 };
  let gateOn = 0;
  const size = period.output.length;
  for (let i = 0; i < size; i++) {
    count[channelRegion(period.sourceOverdrive[i], period.drainOverdrive[i])] += 1;
    gateOn += period.gateOn[i];
  }
  return { ohmic: count.ohmic / size, saturated: count.saturated / size, cutoff: count.cutoff / size, gateOn: gateOn / size };
}
