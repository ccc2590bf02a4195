/**
 * A cell's reduced matrices, in the frame of an n-channel part, as the coefficients that kernels read: `kernels/layout.ts` says what stands where.
 */
import type { Law } from '../design/types.ts';
import { logAt } from '../device/math.ts';
import { TERMS } from '../device/table.ts';
import type { Cell } from './cell.ts';
import * as L from './kernels/layout.ts';
import { packNoise } from './noise.ts';
import { CHANNEL, CONSTANT, DRIVES } from './plan.ts';

/** Below this many nVT, and where less than this flows above it, a junction carries its reverse current and no more. */
const OFF_BELOW = -10;
const LEFT_OUT_A = 1e-15;

/** The device's movable values, after the elements'. */
export const SCALE = 0;
export const GATE_OFF_V = 1;
export const REVERSE_A = 2;
export const NVT_V = 3;
export const LAMBDA = 4;
/** W of the gradual channel, T of the smooth law, V. */
export const WIDTH_V = 5;
/** Reverse current of the gate clamp, 0 where there is none, and its nVT. */
export const CLAMP_A = 6;
export const CLAMP_NVT_V = 7;
export const BARRIER_V = 8;
export const DEVICE_VALUES = 9;

/** Newton's last step in readings, V. */
export const READING_ENOUGH_V = 1e-9;
/** The current that a last step may leave, A: half the channel's curvature times its square. */
const ENOUGH_A = 1e-13;

export function deviceValue(cell: Cell, index: number): number {
  return cell.values[cell.numbers.plan.values.length + index];
}

/** The step's rows and the device's values, into `target`. */
export function packStep(cell: Cell): void {
  const n = cell.stateCount;
  const { target: c, reduction } = cell;
  const { polarity, plan } = cell.numbers;
  const { row, all } = cell.layout;
  const columns = reduction.layout.step;
  const { step, response } = reduction;
  for (let r = 0; r < n + 2; r++) {
    const from = r * columns.width;
    const to = r * row.width;
    const sign = r < 2 ? polarity : 1;
    for (let k = 0; k < n; k++) c[to + k] = sign * step[from + k];
    for (let k = 0; k < 2; k++) c[to + row.u + k] = sign * step[from + columns.newU + k];
    packCurrents(cell, c, to, r, row, all, step, from + columns.newJ, sign * polarity);
    c[to + row.constant] += sign * step[from + columns.constant] - (r < 2 ? deviceValue(cell, GATE_OFF_V) : 0);
  }
  const from = (n + 2) * plan.width;
  const to = all.outputRow * row.width;
  for (let k = 0; k < n + 2; k++) c[to + k] = response[from + k];
  packCurrents(cell, c, to, all.outputRow, row, all, response, from + n + CHANNEL, polarity);
  c[to + row.constant] += response[from + n + CONSTANT];
  packMemory(cell);
  packDevice(cell, c, all.device, c[row.current], c[row.width + row.current]);
  packGrading(cell, c, all.device);
  packNoise(cell);
}

/** The gate's capacitances where they fall with reverse voltage: then every sample is solved by the ports. */
function packGrading(cell: Cell, c: Float64Array, at: number): void {
  const { grading, gateSourceAt, gateDrainAt } = cell.numbers;
  const farads = (index: number) => (index < 0 ? 0 : cell.values[index]);
  c[at + L.GRADING] = grading;
  c[at + L.BARRIER_V] = deviceValue(cell, BARRIER_V);
  c[at + L.STEP_S] = farads(gateSourceAt) / cell.stepSec;
  c[at + L.STEP_D] = farads(gateDrainAt) / cell.stepSec;
  if (grading > 0) c[at + L.ON_V] = Number.NEGATIVE_INFINITY;
}

/** A row's weights of the port currents, `weights` from `at` on times `sign`, and as its constant what the steady reverse currents add. */
function packCurrents(
  cell: Cell,
  c: Float64Array,
  to: number,
  r: number,
  row: L.Layout['row'],
  all: L.Layout['all'],
  weights: Float64Array,
  at: number,
  sign: number,
): void {
  const byD = sign * weights[at + 1];
  const byS = sign * weights[at + 2];
  c[to + row.current] = sign * weights[at];
  c[to + row.constant] = steadyCurrents(cell, byS, byD);
  c[all.junction + r * L.JUNCTION_WIDTH + L.BY_S] = byS;
  c[all.junction + r * L.JUNCTION_WIDTH + L.BY_D] = byD;
}

/** The memory rows; what is constant in them, steady reverse currents too, goes into the constants of the other rows. */
function packMemory(cell: Cell): void {
  const n = cell.stateCount;
  const { target: c, reduction } = cell;
  const { polarity } = cell.numbers;
  const { row, past, all } = cell.layout;
  const from = reduction.layout.memory;
  for (let i = 0; i < n; i++) {
    const at = i * from.width;
    const to = all.memory + i * past.width;
    for (let k = 0; k < n + 2; k++) c[to + k] = reduction.memory[at + k];
    const byChannel = polarity * reduction.memory[at + from.oldJ];
    const byD = polarity * reduction.memory[at + from.oldJ + 1];
    const byS = polarity * reduction.memory[at + from.oldJ + 2];
    c[to + past.oldI] = byChannel;
    c[all.memoryJunction + i * L.JUNCTION_WIDTH + L.BY_S] = byS;
    c[all.memoryJunction + i * L.JUNCTION_WIDTH + L.BY_D] = byD;
    c[all.held + i] = reduction.memory[at + from.constant] + steadyCurrents(cell, byS, byD);
  }
  for (let r = 0; r < n + 2; r++) c[all.own + r] = c[r * row.width + row.constant];
  addHeld(cell, c);
}

/** The constants of the rows: their own, and what their memories hold. */
export function addHeld({ stateCount: n, layout }: Cell, c: Float64Array): void {
  const { row, all } = layout;
  for (let r = 0; r < n + 2; r++) {
    let sum = c[all.own + r];
    for (let i = 0; i < n; i++) sum += c[r * row.width + i] * c[all.held + i];
    c[r * row.width + row.constant] = sum;
  }
}

/** What the reverse currents of the junctions and the clamp, which always flow, add to a row with these weights. */
function steadyCurrents(cell: Cell, weightS: number, weightD: number): number {
  const reverseA = deviceValue(cell, REVERSE_A);
  return -(reverseA + deviceValue(cell, CLAMP_A)) * weightS - reverseA * weightD;
}

function packDevice(cell: Cell, c: Float64Array, at: number, aI: number, bI: number): void {
  const { law, exponent, table } = cell.numbers;
  const scale = deviceValue(cell, SCALE);
  const nVt = deviceValue(cell, NVT_V);
  const clampNVt = deviceValue(cell, CLAMP_NVT_V);
  const reverseA = deviceValue(cell, REVERSE_A);
  const clampA = deviceValue(cell, CLAMP_A);
  const widthV = deviceValue(cell, WIDTH_V);
  const offV = deviceValue(cell, GATE_OFF_V);
  c[at + L.LAW] = L.LAW_NUMBER[law];
  c[at + L.POLARITY] = cell.numbers.polarity;
  c[at + L.GATE_OFF_V] = offV;
  putThreshold(c, at + L.JUNCTION_ON_V, reverseA, nVt, offV);
  putThreshold(c, at + L.CLAMP_ON_V, clampA, clampNVt, offV);
  c[at + L.ON_V] = Math.min(c[at + L.JUNCTION_ON_V], c[at + L.CLAMP_ON_V]);
  c[at + L.REVERSE_A] = reverseA;
  c[at + L.INVERSE_NVT] = 1 / nVt;
  c[at + L.CLAMP_A] = clampA;
  c[at + L.CLAMP_INVERSE_NVT] = 1 / clampNVt;
  c[at + L.LAMBDA] = deviceValue(cell, LAMBDA);
  c[at + L.SCALE] = law === 'gradual' ? (scale * widthV) / 3 : scale;
  c[at + L.INVERSE_WIDTH] = 1 / widthV;
  c[at + L.SLOPE] = law === 'gradual' ? scale : scale / widthV;
  c[at + L.FALL] = -2 * scale * aI;
  c[at + L.RISE] = 2 * scale * bI;
  c[at + L.PIECES] = table.length / TERMS;
  c[at + L.EXPONENT] = exponent;
  c[at + L.ENOUGH_V] = Math.min(cell.numbers.enoughV, Math.sqrt((2 * ENOUGH_A) / mostCurvature(law, scale, widthV, offV, exponent)));
}

/** A bound on F″, A/V², but where the gradual channel's slope ends. */
function mostCurvature(law: Law, scale: number, widthV: number, offV: number, exponent: number): number {
  if (law === 'square') return 2 * scale;
  if (law === 'gradual') return (2 * scale) / widthV;
  return ((exponent * scale) / (widthV * widthV)) * (exponent > 2 ? Math.max(1, -offV / widthV) : 1);
}

/** The overdrive below which a junction's current above its reverse current is left out, V. */
function putThreshold(c: Float64Array, at: number, reverseA: number, nVtV: number, offV: number): void {
  c[at] = LEFT_OUT_A / reverseA;
  logAt(c, at);
  c[at] = reverseA > 0 ? Math.min(OFF_BELOW, c[at]) * nVtV - offV : Number.POSITIVE_INFINITY;
}

/** The direct-current network as the coefficients of a cell without states. */
export function packRest(cell: Cell): void {
  const { rest, reduction, stateCount: n } = cell;
  const { polarity } = cell.numbers;
  const { row, all } = rest.layout;
  const c = rest.coefficients;
  for (let r = 0; r < 3; r++) {
    const from = (n + r) * DRIVES;
    const to = r * row.width;
    const sign = r < 2 ? polarity : 1;
    for (let k = 0; k < 2; k++) c[to + row.u + k] = sign * reduction.rest[from + k];
    packCurrents(cell, c, to, r, row, all, reduction.rest, from + CHANNEL, sign * polarity);
    c[to + row.constant] += sign * reduction.rest[from + CONSTANT] - (r < 2 ? deviceValue(cell, GATE_OFF_V) : 0);
  }
  packDevice(cell, c, all.device, c[row.current], c[row.width + row.current]);
  c[all.device + L.ENOUGH_V] = READING_ENOUGH_V;
}
