/**
 * A gain cell that runs: its numbers reduced for one step length, its state, and the kernel of its shape.
 * `compileCell` checks and may throw; `createCell` allocates; everything after that does neither.
 */
import type { Device, Law } from '../design/types.ts';
import { type LawConstants, lawConstants } from '../device/law.ts';
import { smoothTable, TERMS } from '../device/table.ts';
import { atTemperature, thermalVoltage } from '../device/temperature.ts';
import { log } from '../device/math.ts';
import type { Circuit } from './circuit.ts';
import type { Kernel } from './kernels/kernel.ts';
import * as L from './kernels/layout.ts';
import { loopedKernel } from './kernels/looped.ts';
import { restCharge } from './kernels/graded.ts';
import { GRADUAL_CONDUCTOR, GRADUAL_KERNELS } from './kernels/gradual.ts';
import { SMOOTH_CONDUCTOR, SMOOTH_KERNELS } from './kernels/smooth.ts';
import { SQUARE_CONDUCTOR, SQUARE_KERNELS } from './kernels/square.ts';
import { CHANNEL, CONSTANT, DRIVES, GATE_DRAIN, type Plan, planCircuit } from './plan.ts';
import { createReduction, discretise, memoryColumns, type Reduction, respond, respondAtRest, stepColumns } from './reduce.ts';

/** Below this many nVT, and where less than this flows above it, a junction carries its reverse current and no more. */
const OFF_BELOW = -10;
const LEFT_OUT_A = 1e-15;

const KERNELS = { square: SQUARE_KERNELS, gradual: GRADUAL_KERNELS, smooth: SMOOTH_KERNELS };
const CONDUCTORS = { square: SQUARE_CONDUCTOR, gradual: GRADUAL_CONDUCTOR, smooth: SMOOTH_CONDUCTOR };

/** The smooth law's table reaches this far past VGS = 0; beyond it, and beyond the longest table, the law is evaluated directly. */
const TABLE_BEYOND_V = 1.5;
const LONGEST_TABLE_Z = 400;

/** The device's movable values, after the elements'. */
const SCALE = 0;
const GATE_OFF_V = 1;
const REVERSE_A = 2;
const NVT_V = 3;
const LAMBDA = 4;
/** W of the gradual channel, T of the smooth law, V. */
const WIDTH_V = 5;
/** Reverse current of the gate clamp, 0 where there is none, and its nVT. */
const CLAMP_A = 6;
const CLAMP_NVT_V = 7;
const BARRIER_V = 8;
export const DEVICE_VALUES = 9;
const NOTHING = new Float64Array(0);

/** Newton's last step, V, and the current that it may leave, A, half the channel's curvature times its square. In readings rounding only. */
const PLAYING_ENOUGH_V = 1e-6;
const READING_ENOUGH_V = 1e-9;
const ENOUGH_A = 1e-13;

/** Plain numbers, structured-cloneable. `values` are the elements' movable values, then the device's. */
export interface CellNumbers {
  /** Equal for two cells that differ in movable values only. */
  readonly shape: string;
  readonly plan: Plan;
  readonly polarity: 1 | -1;
  readonly law: Law;
  readonly exponent: number;
  /** Exponent of the capacitances' fall; 0 where they are constant. */
  readonly grading: number;
  /** Places of the gate's capacitances in `values`, −1 where there is none. */
  readonly gateSourceAt: number;
  readonly gateDrainAt: number;
  /** Of the smooth law; empty for the others. */
  readonly table: Float64Array;
  /** Step at which Newton's method stops, V. */
  readonly enoughV: number;
  readonly values: Float64Array;
}

export interface Cell {
  readonly numbers: CellNumbers;
  readonly stateCount: number;
  /** Where the slots of `kernels/layout.ts` begin in `state`. */
  readonly slots: number;
  readonly kernel: Kernel;
  /** The values in force; changed by `loadValues`. */
  readonly values: Float64Array;
  readonly reduction: Reduction;
  /** In force; then those aimed at, and one step of the way there. */
  readonly coefficients: Float64Array;
  readonly target: Float64Array;
  readonly increment: Float64Array;
  readonly state: Float64Array;
  readonly stepSec: number;
  readonly rest: RestMemory;
}

interface RestMemory {
  readonly coefficients: Float64Array;
  readonly state: Float64Array;
  readonly audio: Float64Array;
  readonly control: Float64Array;
  readonly output: Float64Array;
}

/** Numbers of a circuit with its device at `tempC`. Throws a RangeError that names what cannot be computed. */
export function compileCell(circuit: Circuit, device: Device, tempC: number, noise = false): CellNumbers {
  const plan = planCircuit(circuit, noise);
  const law = lawConstants(device, tempC);
  const { junction } = atTemperature(device, tempC).device;
  const values = new Float64Array(plan.values.length + DEVICE_VALUES);
  values.set(plan.values);
  values[plan.values.length + SCALE] = law.scale;
  values[plan.values.length + GATE_OFF_V] = law.gateOffV;
  values[plan.values.length + REVERSE_A] = junction.reverseA;
  const thermalV = thermalVoltage(tempC);
  values[plan.values.length + NVT_V] = junction.ideality * thermalV;
  values[plan.values.length + LAMBDA] = device.lambdaPerV;
  values[plan.values.length + BARRIER_V] = device.barrierV;
  const clamp = circuit.jfet.clamp ?? { reverseA: 0, ideality: 1 };
  values[plan.values.length + CLAMP_A] = clamp.reverseA;
  values[plan.values.length + CLAMP_NVT_V] = clamp.ideality * thermalV;
  values[plan.values.length + WIDTH_V] = law.law === 'smooth' ? law.tailV : law.depletionV;
  return {
    shape: [device.channel, law.law, law.law === 'smooth' ? law.exponent : '', device.grading, plan.shape].join(' '),
    plan,
    polarity: device.channel === 'n' ? 1 : -1,
    law: law.law,
    exponent: law.exponent,
    grading: device.grading,
    gateSourceAt: circuit.elements.findIndex((element) => element.name === 'gateSourceF'),
    gateDrainAt: circuit.elements.findIndex((element) => element.name === 'gateDrainF'),
    table: tableOf(law),
    enoughV: PLAYING_ENOUGH_V,
    values,
  };
}

function tableOf(law: LawConstants): Float64Array {
  if (law.law !== 'smooth') return new Float64Array(0);
  return smoothTable(law.exponent, Math.min(LONGEST_TABLE_Z, (TABLE_BEYOND_V - law.gateOffV) / law.tailV));
}

/**
 * The same numbers for a reading: every state advanced by the trapezoidal rule, second order throughout for smooth steady signals, and each
 * sample solved as far as a double goes.
 */
export function forReadings(numbers: CellNumbers): CellNumbers {
  return { ...numbers, enoughV: READING_ENOUGH_V, plan: { ...numbers.plan, trapezoidal: numbers.plan.states.length } };
}

/** The kernel written out for the plan's shape, or for its numbers of states, or the one in loops. */
function kernelOf(law: Law, plan: Plan): Kernel {
  const { trapezoidal, voltages } = plan;
  const stiff = voltages.states.slice(trapezoidal);
  const kernels = KERNELS[law];
  const exact = kernels[`${trapezoidal} ${stiff} ${voltages.output}`];
  return exact ?? kernels[`${trapezoidal} ${'x'.repeat(stiff.length)} x`] ?? loopedKernel(trapezoidal, stiff.length, CONDUCTORS[law]);
}

/** A cell advancing by `stepSec`, with its states at zero: call `settle` before the first sample. Throws when the network is singular. */
export function createCell(numbers: CellNumbers, stepSec: number): Cell {
  const n = numbers.plan.states.length;
  const { trapezoidal } = numbers.plan;
  const slots = L.slotStart(trapezoidal, n - trapezoidal);
  const cell: Cell = {
    numbers,
    stateCount: n,
    values: Float64Array.from(numbers.values),
    reduction: createReduction(numbers.plan),
    coefficients: new Float64Array(L.coefficientLayout(n).length),
    target: new Float64Array(L.coefficientLayout(n).length),
    increment: new Float64Array(L.coefficientLayout(n).length),
    state: new Float64Array(slots + L.STATE_SLOTS),
    slots,
    kernel: kernelOf(numbers.law, numbers.plan),
    stepSec,
    rest: {
      coefficients: new Float64Array(L.coefficientLayout(0).length),
      state: new Float64Array(L.STATE_SLOTS),
      audio: new Float64Array(1),
      control: new Float64Array(1),
      output: new Float64Array(1),
    },
  };
  if (!loadValues(cell, numbers.values))
    throw new RangeError('the circuit has a node without a path to ground; expected one for every node');
  return cell;
}

/** Puts new values in force; the state stays as it is. False, with the old coefficients kept, when the network would be singular. */
export function loadValues(cell: Cell, values: Float64Array): boolean {
  if (!aimAt(cell, values, 1)) return false;
  arrive(cell);
  return true;
}

/**
 * Sets out for new values, to be reached in `samples` steps of `approach`: the coefficients at both ends are exact, between them they follow a
 * straight line, unless values are too far apart for that. False, and nothing changes, when the network would be singular.
 */
export function aimAt(cell: Cell, values: Float64Array, samples: number): boolean {
  const { reduction, stepSec, coefficients, target, increment } = cell;
  const { values: moved } = reduction;
  for (let i = 0; i < moved.length; i++) moved[i] = values[i];
  if (!respond(reduction) || !discretise(reduction, stepSec)) {
    for (let i = 0; i < moved.length; i++) moved[i] = cell.values[i];
    respond(reduction);
    discretise(reduction, stepSec);
    return false;
  }
  const near = areNear(cell, values);
  for (let i = 0; i < values.length; i++) cell.values[i] = values[i];
  packStep(cell);
  if (!near) arrive(cell);
  for (let i = 0; i < target.length; i++) {
    // A threshold that was or becomes infinite has no way between: it changes on arrival.
    const way = target[i] - coefficients[i];
    increment[i] = Number.isFinite(way) ? way / samples : 0;
  }
  return true;
}

/** The most by which a part's value may change along one straight line. */
const MOST_RATIO = 1.25;

/**
 * Whether no part's value changes by more than a quarter. A straight line between the coefficients of circuits further apart leads through what is no
 * circuit, and may grow without limit: a move over decades steps there, in its first slices, and is heard as the click that it would be on a board.
 */
function areNear(cell: Cell, values: Float64Array): boolean {
  const { elements } = cell.numbers.plan;
  for (let i = 0; i < elements.length; i++) {
    const { kind } = elements[i];
    if (kind !== 'conductance' && kind !== 'capacitor' && kind !== 'inductor') continue;
    const smaller = Math.min(values[i], cell.values[i]);
    if (Math.max(values[i], cell.values[i]) > MOST_RATIO * smaller) return false;
  }
  return true;
}

/** One step towards the values aimed at. */
export function approach(cell: Cell): void {
  const { coefficients, increment } = cell;
  for (let i = 0; i < coefficients.length; i++) coefficients[i] += increment[i];
}

/** The values aimed at, exactly. */
export function arrive(cell: Cell): void {
  cell.coefficients.set(cell.target);
}

/**
 * Advances over the samples `from` to `to` of `signal`, V at the step rate: the audio in, the output node in its place. `control` in V;
 * `noise` as `noise.ts` fills it, `kinks` as kernels/kinks.ts marks them, or left out.
 */
export function advanceCell(
  cell: Cell,
  signal: Float64Array,
  control: Float64Array,
  from: number,
  to: number,
  noise: Float64Array = NOTHING,
  kinks: Float64Array = NOTHING,
): void {
  cell.kernel(cell.coefficients, cell.numbers.table, noise, kinks, cell.state, signal, control, signal, from, to);
}

/** Gate-source voltage of the last sample, V, with the sign of the part's channel. */
export function gateSourceV(cell: Cell): number {
  return cell.numbers.polarity * (cell.state[cell.slots + L.OVERDRIVE_S] + deviceValue(cell, GATE_OFF_V));
}

/** Overdrives of the last sample, gate-source and gate-drain less VGS(off), V, in the n-channel frame. */
export function overdriveV(cell: Cell, end: 'source' | 'drain'): number {
  return cell.state[cell.slots + (end === 'source' ? L.OVERDRIVE_S : L.OVERDRIVE_D)];
}

/** Whether a gate junction carried more than `amperes` forward in the last sample. */
export function gateConducts(cell: Cell, amperes: number): boolean {
  return cell.state[cell.slots + L.JUNCTION_S] > amperes || cell.state[cell.slots + L.JUNCTION_D] > amperes;
}

function deviceValue(cell: Cell, index: number): number {
  return cell.values[cell.numbers.plan.values.length + index];
}

function packStep(cell: Cell): void {
  const n = cell.stateCount;
  const { target: c, reduction } = cell;
  const { polarity, plan } = cell.numbers;
  const row = L.rowLayout(n);
  const all = L.coefficientLayout(n);
  const columns = stepColumns(n, plan.noisy.length);
  const { step, response } = reduction;
  for (let r = 0; r < n + 2; r++) {
    const from = r * columns.width;
    const to = r * row.width;
    const sign = r < 2 ? polarity : 1;
    for (let k = 0; k < n; k++) c[to + k] = sign * step[from + k];
    for (let k = 0; k < 2; k++) c[to + row.u + k] = sign * step[from + columns.newU + k];
    const j = from + columns.newJ;
    packCurrents(cell, c, to, r, row, all, sign * polarity * step[j], sign * polarity * step[j + 1]);
    c[to + row.constant] += sign * step[from + columns.constant] - (r < 2 ? deviceValue(cell, GATE_OFF_V) : 0);
  }
  const from = (n + 2) * plan.width;
  const to = all.outputRow * row.width;
  for (let k = 0; k < n + 2; k++) c[to + k] = response[from + k];
  packCurrents(cell, c, to, all.outputRow, row, all, polarity * response[from + n + CHANNEL], polarity * response[from + n + GATE_DRAIN]);
  c[to + row.constant] += response[from + n + CONSTANT];
  packMemory(cell);
  packDevice(cell, c, all.device, c[row.current], c[row.width + row.current]);
  packGrading(cell, c, all.device);
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

/** A row's weights of the port currents, and as its constant what the steady reverse currents add. */
function packCurrents(
  cell: Cell,
  c: Float64Array,
  to: number,
  r: number,
  row: ReturnType<typeof L.rowLayout>,
  all: ReturnType<typeof L.coefficientLayout>,
  byChannel: number,
  byD: number,
): void {
  const byS = byChannel + byD;
  c[to + row.current] = byChannel;
  c[to + row.constant] = steadyCurrents(cell, byS, byD);
  c[all.junction + r * L.JUNCTION_WIDTH + L.BY_S] = byS;
  c[all.junction + r * L.JUNCTION_WIDTH + L.BY_D] = byD;
}

/** The memory rows; old reverse currents, which are as steady as the new ones, go into the constants of the rows through their memory. */
function packMemory(cell: Cell): void {
  const n = cell.stateCount;
  const { target: c, reduction } = cell;
  const { polarity } = cell.numbers;
  const row = L.rowLayout(n);
  const past = L.memoryLayout(n);
  const all = L.coefficientLayout(n);
  const from = memoryColumns(n);
  for (let i = 0; i < n; i++) {
    const at = i * from.width;
    const to = all.memory + i * past.width;
    for (let k = 0; k < n + 2; k++) c[to + k] = reduction.memory[at + k];
    const byChannel = polarity * reduction.memory[at + from.oldJ];
    const byD = polarity * reduction.memory[at + from.oldJ + 1];
    const byS = byChannel + byD;
    c[to + past.oldI] = byChannel;
    c[all.memoryJunction + i * L.JUNCTION_WIDTH + L.BY_S] = byS;
    c[all.memoryJunction + i * L.JUNCTION_WIDTH + L.BY_D] = byD;
    const steady = steadyCurrents(cell, byS, byD);
    for (let r = 0; r < n + 2; r++) c[r * row.width + row.constant] += c[r * row.width + i] * steady;
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
  c[at + L.JUNCTION_ON_V] = conductsFrom(reverseA, nVt) - offV;
  c[at + L.CLAMP_ON_V] = conductsFrom(clampA, clampNVt) - offV;
  c[at + L.ON_V] = Math.min(c[at + L.JUNCTION_ON_V], c[at + L.CLAMP_ON_V]);
  c[at + L.REVERSE_A] = reverseA;
  c[at + L.INVERSE_NVT] = 1 / nVt;
  c[at + L.CLAMP_A] = clampA;
  c[at + L.CLAMP_INVERSE_NVT] = 1 / clampNVt;
  c[at + L.LAMBDA] = deviceValue(cell, LAMBDA);
  c[at + L.SCALE] = law === 'gradual' ? (scale * widthV) / 3 : scale;
  c[at + L.INVERSE_WIDTH] = 1 / widthV;
  c[at + L.SLOPE] = law === 'gradual' ? scale : scale / widthV;
  c[at + L.BENT] = scale * (aI - bI) * (aI + bI);
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

/** The voltage below which a junction's current above its reverse current is left out, V. */
function conductsFrom(reverseA: number, nVtV: number): number {
  return reverseA > 0 ? Math.min(OFF_BELOW, log(LEFT_OUT_A / reverseA)) * nVtV : Number.POSITIVE_INFINITY;
}

/**
 * Puts the cell at its operating point for steady `audioV` and `controlV`: every capacitor's current is zero. Returns the output, V.
 * False voltages cannot result: where the direct-current network is singular the states are left as they are and NaN is returned.
 */
export function settle(cell: Cell, audioV: number, controlV: number): number {
  const { rest, reduction, state } = cell;
  const { polarity, plan } = cell.numbers;
  const n = cell.stateCount;
  if (!respondAtRest(reduction)) return Number.NaN;
  packRest(cell);
  rest.audio[0] = audioV;
  rest.control[0] = controlV;
  const { law, table } = cell.numbers;
  KERNELS[law]['0  x'](rest.coefficients, table, NOTHING, NOTHING, rest.state, rest.audio, rest.control, rest.output, 0, 1);
  const reverseA = deviceValue(cell, REVERSE_A);
  const channelA = rest.state[L.CHANNEL_A];
  const sourceA = rest.state[L.JUNCTION_S] - reverseA - deviceValue(cell, CLAMP_A);
  const alongA = polarity * (channelA + sourceA);
  const gateA = polarity * (sourceA + rest.state[L.JUNCTION_D] - reverseA);
  for (let r = 0; r < n; r++) {
    const at = r * DRIVES;
    const { rest: weights } = reduction;
    state[r] = weights[at] * audioV + weights[at + 1] * controlV + weights[at + CONSTANT];
    state[r] += weights[at + CHANNEL] * alongA + weights[at + GATE_DRAIN] * gateA;
  }
  const stiff = n - plan.trapezoidal;
  for (let k = 0; k < stiff; k++) {
    for (let past = 0; past < 3; past++) state[n + past * stiff + k] = state[plan.trapezoidal + k];
  }
  for (let slot = 0; slot < L.FALLBACKS; slot++) state[cell.slots + slot] = rest.state[slot];
  state[cell.slots + L.OLD_AUDIO] = audioV;
  state[cell.slots + L.OLD_CONTROL] = controlV;
  state[cell.slots + L.EARLIER_A] = channelA;
  if (cell.numbers.grading > 0) {
    const { device } = L.coefficientLayout(n);
    restCharge(cell.target, device, overdriveV(cell, 'source'), state, cell.slots + L.CHARGES_S);
    restCharge(cell.target, device, overdriveV(cell, 'drain'), state, cell.slots + L.CHARGES_D);
  }
  return rest.output[0];
}

/** The direct-current network as the coefficients of a cell without states. */
function packRest(cell: Cell): void {
  const { rest, reduction, stateCount: n } = cell;
  const { polarity } = cell.numbers;
  const row = L.rowLayout(0);
  const all = L.coefficientLayout(0);
  const c = rest.coefficients;
  for (let r = 0; r < 3; r++) {
    const from = (n + r) * DRIVES;
    const to = r * row.width;
    const sign = r < 2 ? polarity : 1;
    for (let k = 0; k < 2; k++) c[to + row.u + k] = sign * reduction.rest[from + k];
    packCurrents(
      cell,
      c,
      to,
      r,
      row,
      all,
      sign * polarity * reduction.rest[from + CHANNEL],
      sign * polarity * reduction.rest[from + GATE_DRAIN],
    );
    c[to + row.constant] += sign * reduction.rest[from + CONSTANT] - (r < 2 ? deviceValue(cell, GATE_OFF_V) : 0);
  }
  packDevice(cell, c, all.device, c[row.current], c[row.width + row.current]);
  c[all.device + L.ENOUGH_V] = READING_ENOUGH_V;
}
