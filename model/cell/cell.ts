/**
 * A gain cell that runs: its numbers reduced for one step length, its state, and the kernel of its shape.
 * `compileCell` checks and may throw; `createCell` allocates; everything after that does neither.
 */
import type { Device, Law } from '../design/types.ts';
import { type LawConstants, lawConstants } from '../device/law.ts';
import { smoothTable } from '../device/table.ts';
import { atTemperature, thermalVoltage } from '../device/temperature.ts';
import type { Circuit } from './circuit.ts';
import type { Kernel } from './kernels/kernel.ts';
import * as L from './kernels/layout.ts';
import { stay } from './kernels/ports.ts';
import { restCharge } from './kernels/graded.ts';
import { GRADUAL_KERNELS, GRADUAL_LOOPED } from './kernels/gradual.ts';
import { SMOOTH_KERNELS, SMOOTH_LOOPED } from './kernels/smooth.ts';
import { SQUARE_KERNELS, SQUARE_LOOPED } from './kernels/square.ts';
import { createNoiseRows, type NoiseRows } from './noise.ts';
import { CHANNEL, CONSTANT, DRIVES, GATE_DRAIN, type Plan, planCircuit } from './plan.ts';
import {
  BARRIER_V,
  CLAMP_A,
  CLAMP_NVT_V,
  DEVICE_VALUES,
  deviceValue,
  GATE_OFF_V,
  LAMBDA,
  NVT_V,
  packRest,
  READING_ENOUGH_V,
  REVERSE_A,
  SCALE,
  WIDTH_V,
} from './pack.ts';
import { createReduction, type Reduction, respondAtRest } from './reduce.ts';
import { loadValues } from './values.ts';

const KERNELS = { square: SQUARE_KERNELS, gradual: GRADUAL_KERNELS, smooth: SMOOTH_KERNELS };
const LOOPED = { square: SQUARE_LOOPED, gradual: GRADUAL_LOOPED, smooth: SMOOTH_LOOPED };

/** The smooth law's table reaches this far past VGS = 0; beyond it, and beyond the longest table, the law is evaluated directly. */
const TABLE_BEYOND_V = 1.5;
const SHORTEST_TABLE_Z = 32;
const LONGEST_TABLE_Z = 512;

const NOTHING = new Float64Array(0);

/** Newton's last step while playing, V. */
const PLAYING_ENOUGH_V = 1e-6;

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
  readonly layout: L.Layout;
  readonly kernel: Kernel;
  /** The values in force; changed by `loadValues`. */
  readonly values: Float64Array;
  readonly reduction: Reduction;
  /** In force; then those half way to those aimed at, and those aimed at; the next step of the way there, and what it changes by with each. */
  readonly coefficients: Float64Array;
  readonly middle: Float64Array;
  readonly target: Float64Array;
  readonly increment: Float64Array;
  readonly bend: Float64Array;
  /** Places of the coefficients that are on their way, and of those of what the rows remember; each after their number. */
  readonly moving: Int32Array;
  readonly movingMemory: Int32Array;
  readonly state: Float64Array;
  readonly stepSec: number;
  readonly noise: NoiseRows;
  readonly rest: RestMemory;
}

interface RestMemory {
  readonly layout: L.Layout;
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
  const table = tableOf(law);
  return {
    shape: [device.channel, law.law, law.law === 'smooth' ? `${law.exponent} ${table.length}` : '', device.grading, plan.shape].join(' '),
    plan,
    polarity: device.channel === 'n' ? 1 : -1,
    law: law.law,
    exponent: law.exponent,
    grading: device.grading,
    gateSourceAt: circuit.elements.findIndex((element) => element.name === 'gateSourceF'),
    gateDrainAt: circuit.elements.findIndex((element) => element.name === 'gateDrainF'),
    table,
    enoughV: PLAYING_ENOUGH_V,
    values,
  };
}

/** Tables come in lengths that double: values that need another one belong to another shape. */
function tableOf(law: LawConstants): Float64Array {
  if (law.law !== 'smooth') return new Float64Array(0);
  let length = SHORTEST_TABLE_Z;
  while (length < LONGEST_TABLE_Z && length < (TABLE_BEYOND_V - law.gateOffV) / law.tailV) length *= 2;
  return smoothTable(law.exponent, length);
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
  return exact ?? kernels[`${trapezoidal} ${'x'.repeat(stiff.length)} x`] ?? LOOPED[law](trapezoidal, stiff.length);
}

/** A cell advancing by `stepSec`, with its states at zero: call `settle` before the first sample. Throws when the network is singular. */
export function createCell(numbers: CellNumbers, stepSec: number): Cell {
  const n = numbers.plan.states.length;
  const { trapezoidal } = numbers.plan;
  const slots = L.slotStart(trapezoidal, n - trapezoidal);
  const layout = L.layoutOf(n);
  const restLayout = L.layoutOf(0);
  const cell: Cell = {
    numbers,
    stateCount: n,
    values: Float64Array.from(numbers.values),
    reduction: createReduction(numbers.plan),
    coefficients: new Float64Array(layout.all.length),
    middle: new Float64Array(layout.all.length),
    target: new Float64Array(layout.all.length),
    increment: new Float64Array(layout.all.length),
    bend: new Float64Array(layout.all.length),
    moving: new Int32Array(1 + layout.all.length),
    movingMemory: new Int32Array(1 + layout.all.length),
    state: new Float64Array(slots + L.STATE_SLOTS),
    slots,
    layout,
    kernel: kernelOf(numbers.law, numbers.plan),
    stepSec,
    noise: createNoiseRows(n, numbers.plan.noisy.length),
    rest: {
      layout: restLayout,
      coefficients: new Float64Array(restLayout.all.length),
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

/** A cell that shares the coefficients, moving ones too, and has a state of its own, so far the same. Allocates. */
export function copyOf(cell: Cell): Cell {
  return { ...cell, state: Float64Array.from(cell.state) };
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

/** Takes over the states, and their past, of elements that have the same name in both cells. */
export function inheritStates(cell: Cell, from: Cell): void {
  const stiffCount = cell.stateCount - cell.numbers.plan.trapezoidal;
  const fromStiffCount = from.stateCount - from.numbers.plan.trapezoidal;
  for (let to = 0; to < cell.stateCount; to++) {
    const place = stateNamed(from, nameOfState(cell, to));
    if (place < 0) continue;
    cell.state[to] = from.state[place];
    const stiff = to - cell.numbers.plan.trapezoidal;
    if (stiff < 0) continue;
    const fromStiff = place - from.numbers.plan.trapezoidal;
    for (let past = 0; past < 3; past++) {
      cell.state[cell.stateCount + past * stiffCount + stiff] =
        fromStiff < 0 ? from.state[place] : from.state[from.stateCount + past * fromStiffCount + fromStiff];
    }
  }
}

function nameOfState({ numbers: { plan } }: Cell, state: number): string {
  return plan.elements[plan.states[state].element].name;
}

/** Its place, or −1 where the cell has none of that name. */
function stateNamed(cell: Cell, name: string): number {
  for (let state = 0; state < cell.stateCount; state++) if (nameOfState(cell, state) === name) return state;
  return -1;
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
  state[cell.slots + L.EARLIEST_A] = channelA;
  stay(state, cell.slots);
  if (cell.numbers.grading > 0) {
    const { device } = cell.layout.all;
    state[cell.slots + L.CHARGES_S + 4] = overdriveV(cell, 'source');
    state[cell.slots + L.CHARGES_D + 4] = overdriveV(cell, 'drain');
    restCharge(cell.target, device, state, cell.slots + L.CHARGES_S);
    restCharge(cell.target, device, state, cell.slots + L.CHARGES_D);
  }
  return rest.output[0];
}
