/**
 * The linear twin of a cell: the same network, its FET replaced by the slopes that a silent copy has at this moment. What the audio alone would do
 * if nothing in the cell bent it.
 *
 * Law      channel i = S·a − D·b, junctions and graded capacitances their slopes times a or b; a, b the audio's part of the overdrives, S, D the
 *          channel's slopes at the silent copy's overdrives
 * Scheme   the cell's own coefficients, in loops; two equations in a and b, solved in place
 * Error    of rounding, against a cell that is linear and whose values stand: test/model/chain/residual.test.ts
 */
import { expAt } from '../device/math.ts';
import { type Cell, copyOf } from './cell.ts';
import { evaluate } from './kernels/channel.ts';
import { deviate, NEWEST, pastCharge, pushCharge } from './kernels/graded.ts';
import * as L from './kernels/layout.ts';
import { addRows, remember, shiftPast, weighPast } from './kernels/rows.ts';

/** In `work`: both slopes of the channel, those of the gate's ports and what their charges remember, and room for one exponential. */
const BY_S = 0;
const BY_D = 1;
const GATE_S = 2;
const GATE_D = 3;
const HELD_S = 4;
const HELD_D = 5;
const POWER = 6;
/** Four places, of `deviate` in graded.ts. */
const DEVIATION = 7;
/** C/C0 − 1 of both ends. */
const EXCESS_S = 11;
const EXCESS_D = 12;
const WORK = 13;

export interface Twin {
  /** Whose coefficients it has, whose slopes, and its own state in the layout of the kernels. */
  readonly cell: Cell;
  readonly silent: Cell;
  readonly state: Float64Array;
  readonly drives: Float64Array;
  readonly past: Float64Array;
  readonly sums: Float64Array;
  readonly work: Float64Array;
}

/** The twin of `cell` about `silent`, a copy of it; it sets out from what the cell has and the silent copy has not. */
export function createTwin(cell: Cell, silent: Cell): Twin {
  const n = cell.stateCount;
  const twin: Twin = {
    cell,
    silent,
    state: copyOf(cell).state,
    drives: new Float64Array(n + 3),
    past: new Float64Array(n),
    sums: new Float64Array(n + 3),
    work: new Float64Array(WORK),
  };
  restTwin(twin);
  return twin;
}

/** Sets out anew. */
export function restTwin({ cell, silent, state }: Twin): void {
  for (let k = 0; k < state.length; k++) state[k] = cell.state[k] - silent.state[k];
  state[cell.slots + L.OLD_CONTROL] = 0;
}

/** Advances over the sample `i`: the audio in `signal`, V, becomes the twin's output. The silent copy has been advanced over it. */
export function advanceTwin({ cell, silent, state, drives, past, sums, work }: Twin, signal: Float64Array, i: number): void {
  const { coefficients: c, slots, stateCount: n } = cell;
  const { trapezoidal } = cell.numbers.plan;
  const row = L.rowLayout(n);
  const all = L.coefficientLayout(n);
  weighPast(state, past, trapezoidal, n - trapezoidal);
  remember(c, state, past, drives, trapezoidal, n, slots);
  drives[n] = signal[i];
  drives[n + 1] = 0;
  drives[n + 2] = 0;
  addRows(c, drives, sums, n + 2, row.width);
  findSlopes(cell, silent, state, work);
  solve(c, row.current, row.width + row.current, all.junction, sums, work, state, slots);
  shiftPast(state, n, trapezoidal, n - trapezoidal);
  const current = state[slots + L.CHANNEL_A];
  const S = state[slots + L.JUNCTION_S];
  const D = state[slots + L.JUNCTION_D];
  const at = all.outputRow * row.width;
  let y = c[at + row.u] * drives[n] + c[at + row.current] * current;
  for (let k = 0; k < n; k++) {
    const weights = all.junction + L.JUNCTION_WIDTH * (2 + k);
    state[k] = sums[2 + k] + c[(2 + k) * row.width + row.current] * current + c[weights] * S + c[weights + 1] * D;
    y += c[at + k] * state[k];
  }
  const weights = all.junction + L.JUNCTION_WIDTH * all.outputRow;
  signal[i] = y + c[weights] * S + c[weights + 1] * D;
  state[slots + L.OLD_AUDIO] = drives[n];
}

/** Slopes at the silent copy's overdrives, S, and what the charges of graded capacitances remember, A. */
function findSlopes(cell: Cell, silent: Cell, state: Float64Array, work: Float64Array): void {
  const { coefficients: c, slots } = cell;
  const { device } = L.coefficientLayout(cell.stateCount);
  findChannelSlopes(cell, silent, work);
  for (let end = 0; end < 2; end++) {
    const overdriveV = silent.state[slots + (end === 0 ? L.OVERDRIVE_S : L.OVERDRIVE_D)];
    const v = overdriveV + c[device + L.GATE_OFF_V];
    let slope = 0;
    if (overdriveV > c[device + L.JUNCTION_ON_V]) {
      work[POWER] = v * c[device + L.INVERSE_NVT];
      expAt(work, POWER);
      slope += c[device + L.REVERSE_A] * c[device + L.INVERSE_NVT] * work[POWER];
    }
    if (end === 0 && overdriveV > c[device + L.CLAMP_ON_V]) {
      work[POWER] = v * c[device + L.CLAMP_INVERSE_NVT];
      expAt(work, POWER);
      slope += c[device + L.CLAMP_A] * c[device + L.CLAMP_INVERSE_NVT] * work[POWER];
    }
    work[GATE_S + end] = slope;
    work[HELD_S + end] = 0;
    if (c[device + L.GRADING] === 0) continue;
    work[DEVIATION] = v;
    deviate(c, device, work, DEVIATION);
    const perStepS = c[device + (end === 0 ? L.STEP_S : L.STEP_D)];
    work[EXCESS_S + end] = work[DEVIATION + 1];
    work[GATE_S + end] += perStepS * NEWEST * work[DEVIATION + 1];
    work[HELD_S + end] = perStepS * pastCharge(state, slots + (end === 0 ? L.CHARGES_S : L.CHARGES_D));
  }
}

/** Of the channel current by both overdrives, λ included. */
function findChannelSlopes({ coefficients: c, slots, numbers, stateCount }: Cell, { state }: Cell, work: Float64Array): void {
  const { device } = L.coefficientLayout(stateCount);
  evaluate(c, numbers.table, device, state, slots + L.OVERDRIVE_S, slots + L.TERM_S);
  evaluate(c, numbers.table, device, state, slots + L.OVERDRIVE_D, slots + L.TERM_D);
  const vs = state[slots + L.OVERDRIVE_S];
  const vd = state[slots + L.OVERDRIVE_D];
  const lambda = c[device + L.LAMBDA];
  work[BY_S] = state[slots + L.TERM_S + 1] * (1 + lambda * Math.max(-vd, 0)) + (vs < 0 ? lambda * state[slots + L.TERM_D] : 0);
  work[BY_D] = state[slots + L.TERM_D + 1] * (1 + lambda * Math.max(-vs, 0)) + (vd < 0 ? lambda * state[slots + L.TERM_S] : 0);
}

/** Overdrives' and currents' parts into their slots; charges become the newest of the past ones. */
function solve(
  c: Float64Array,
  aI: number,
  bI: number,
  junction: number,
  sums: Float64Array,
  work: Float64Array,
  state: Float64Array,
  slots: number,
): void {
  const [aS, aD, bS, bD] = [junction, junction + 1, junction + 2, junction + 3];
  const a = sums[0] - c[aS] * work[HELD_S] - c[aD] * work[HELD_D];
  const b = sums[1] - c[bS] * work[HELD_S] - c[bD] * work[HELD_D];
  const aa = 1 - c[aI] * work[BY_S] - c[aS] * work[GATE_S];
  const ab = c[aI] * work[BY_D] - c[aD] * work[GATE_D];
  const ba = -c[bI] * work[BY_S] - c[bS] * work[GATE_S];
  const bb = 1 + c[bI] * work[BY_D] - c[bD] * work[GATE_D];
  const determinant = aa * bb - ab * ba;
  const vs = (a * bb - ab * b) / determinant;
  const vd = (aa * b - ba * a) / determinant;
  state[slots + L.CHANNEL_A] = work[BY_S] * vs - work[BY_D] * vd;
  state[slots + L.JUNCTION_S] = work[GATE_S] * vs - work[HELD_S];
  state[slots + L.JUNCTION_D] = work[GATE_D] * vd - work[HELD_D];
  state[slots + L.OVERDRIVE_S] = vs;
  state[slots + L.OVERDRIVE_D] = vd;
  state[slots + L.CHARGES_S + 4] = work[EXCESS_S] * vs;
  state[slots + L.CHARGES_D + 4] = work[EXCESS_D] * vd;
  pushCharge(state, slots + L.CHARGES_S);
  pushCharge(state, slots + L.CHARGES_D);
}
