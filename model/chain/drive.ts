/**
 * Control and cells closed into one loop at every upper-rate sample.
 *
 * Scheme   a control that does not listen to the output runs ahead of the cells, a slice at a time. A follower of the output is predicted along a straight
 *          line, the cells are solved with that and the follower with their output: the control asked for falls as the control given rises, so
 *          secants within a bracket bring the two together, to 0.1 µV or 24 passes
 * Error    against a continuous solution: test/model/chain/loop.test.ts
 */
import { advanceCell, type Cell } from '../cell/cell.ts';
import { fillNoise } from '../cell/noise.ts';
import type { ControlNumbers } from '../control/control.ts';
import { ENVELOPE, FOLLOWER_SLOTS, follow, HEARD, keepStep, LIMIT_V, NEXT_CONTROL_V, RECTIFIED, REST_V } from '../control/follower.ts';
import { runOscillator } from '../control/oscillator.ts';
import type { GaussianSource } from '../device/random.ts';
import type { ChainNumbers } from './compile.ts';
import type { Oversampler } from './oversample.ts';

interface Driven {
  readonly cell: Cell;
  readonly oversampler: Oversampler;
  readonly noise: Float64Array;
  readonly kinks: Float64Array;
  readonly gaussian: GaussianSource;
}

/** After a follower's own memory: the control voltages of the two samples before, V. */
const CONTROL_V = FOLLOWER_SLOTS;
const EARLIER_V = FOLLOWER_SLOTS + 1;
/** While a sample is solved: the bracket; what was given and how much more was asked for, in this pass and in the one before, V. */
const LOW_V = FOLLOWER_SLOTS + 2;
const HIGH_V = FOLLOWER_SLOTS + 3;
const GIVEN_V = FOLLOWER_SLOTS + 4;
const EXCESS_V = FOLLOWER_SLOTS + 5;
const LAST_GIVEN_V = FOLLOWER_SLOTS + 6;
const LAST_EXCESS_V = FOLLOWER_SLOTS + 7;
const DETECTOR_SLOTS = FOLLOWER_SLOTS + 8;

const MOST_PASSES = 24;
const AGREED_V = 1e-7;
/** Without a pass that halves the excess, the bracket is halved. */
const TOO_LITTLE = 0.5;

export interface Drive {
  readonly control: ControlNumbers;
  /** The control's values in force; an oscillator's phase follows them. */
  readonly values: Float64Array;
  readonly phase: Float64Array;
  /** Control voltage of each channel at the upper rate; channels that share one share the array. */
  readonly controls: readonly Float64Array[];
  /** One for each control. */
  readonly detectors: readonly Float64Array[];
  /** States of the cells before a sample, then its input and the number of kinks, to solve it again. */
  readonly saved: readonly Float64Array[];
  /** The recorded control at the upper rate, in samples. */
  recorded: Float64Array;
}

/** `values` is the array that ramps move. */
export function createDrive(control: ControlNumbers, values: Float64Array, lanes: readonly Driven[], longest: number): Drive {
  const shared = !(control.kind === 'follower' && !control.linked);
  const first = new Float64Array(longest);
  const restV = restControlV(control, values);
  return {
    control,
    values,
    phase: new Float64Array(1),
    controls: lanes.map((_, channel) => (shared || channel === 0 ? first : new Float64Array(longest))),
    detectors: (shared ? lanes.slice(0, 1) : lanes).map(() => {
      const slots = new Float64Array(DETECTOR_SLOTS);
      slots[CONTROL_V] = restV;
      slots[EARLIER_V] = restV;
      return slots;
    }),
    saved: lanes.map((lane) => new Float64Array(lane.cell.state.length + 2)),
    recorded: first,
  };
}

/** Takes over an oscillator's phase and, between two followers, what they have heard. */
export function inheritDrive(drive: Drive, from: Drive): void {
  drive.phase[0] = from.phase[0];
  if (drive.control.kind !== 'follower' || from.control.kind !== 'follower') return;
  drive.detectors.forEach((slots, d) => {
    const theirs = from.detectors[Math.min(d, from.detectors.length - 1)];
    for (const place of [ENVELOPE, RECTIFIED, CONTROL_V, EARLIER_V]) slots[place] = theirs[place];
  });
}

/** Every detector as before the first sound. */
export function restDrive({ detectors, control, values }: Drive): void {
  for (let d = 0; d < detectors.length; d++) {
    detectors[d].fill(0);
    detectors[d][CONTROL_V] = restControlV(control, values);
    detectors[d][EARLIER_V] = detectors[d][CONTROL_V];
  }
}

function restControlV(control: ControlNumbers, values: Float64Array): number {
  return control.kind === 'external' ? values[1] : values[0];
}

/** Solves the upper-rate samples `from` to `to` of every lane's top buffer in place. Allocates nothing. */
export function advanceSlice(drive: Drive, lanes: readonly Driven[], numbers: ChainNumbers, from: number, to: number): void {
  if (numbers.noiseSeed !== null) {
    for (let channel = 0; channel < lanes.length; channel++) {
      const { cell, gaussian, noise } = lanes[channel];
      fillNoise(cell, gaussian, numbers.tempC, noise, from, to);
    }
  }
  const { control } = drive;
  if (control.kind === 'follower' && control.senses === 'output') {
    for (let i = from; i < to; i++) closeLoop(drive, lanes, control.fullWave, i);
    return;
  }
  if (control.kind === 'oscillator') runOscillator(control.shape, drive.values, drive.phase, drive.controls[0], from, to);
  else if (control.kind === 'external') followRecording(drive, from, to);
  else for (let i = from; i < to; i++) followInput(drive, lanes, control.fullWave, i);
  for (let channel = 0; channel < lanes.length; channel++) {
    advanceCell(lanes[channel].cell, top(lanes[channel]), drive.controls[channel], from, to, lanes[channel].noise, lanes[channel].kinks);
  }
}

function top(lane: Driven): Float64Array {
  const { buffers } = lane.oversampler;
  return buffers[buffers.length - 1];
}

function followRecording(drive: Drive, from: number, to: number): void {
  const { values, recorded, controls } = drive;
  for (let i = from; i < to; i++) controls[0][i] = values[1] + values[0] * recorded[i];
}

/**
 * What each detector hears at sample `i`, rectified: its own channel's voltage, or the larger of both when they are linked. Results of these
 * functions stand in arrays: a number that a call returns may cost memory.
 */
function hear(drive: Drive, lanes: readonly Driven[], fullWave: boolean, i: number): void {
  const { detectors } = drive;
  for (let d = 0; d < detectors.length; d++) detectors[d][HEARD] = 0;
  for (let channel = 0; channel < lanes.length; channel++) {
    const { buffers } = lanes[channel].oversampler;
    const v = buffers[buffers.length - 1][i];
    const slots = detectors[Math.min(channel, detectors.length - 1)];
    slots[HEARD] = Math.max(slots[HEARD], fullWave ? Math.abs(v) : v);
  }
}

function followInput(drive: Drive, lanes: readonly Driven[], fullWave: boolean, i: number): void {
  const { detectors, values, controls } = drive;
  hear(drive, lanes, fullWave, i);
  for (let d = 0; d < detectors.length; d++) {
    follow(values, detectors[d]);
    keepStep(detectors[d]);
    controls[d][i] = detectors[d][NEXT_CONTROL_V];
  }
}

/** Solves sample `i` with the predicted control, then with better ones, until the control given and the control asked for agree. */
function closeLoop(drive: Drive, lanes: readonly Driven[], fullWave: boolean, i: number): void {
  const { detectors, controls, saved, values } = drive;
  for (let d = 0; d < detectors.length; d++) predict(values, detectors[d]);
  for (let channel = 0; channel < lanes.length; channel++) {
    const { cell } = lanes[channel];
    saved[channel].set(cell.state);
    saved[channel][cell.state.length] = top(lanes[channel])[i];
    saved[channel][cell.state.length + 1] = lanes[channel].kinks.length > 0 ? lanes[channel].kinks[0] : 0;
  }
  for (let pass = 0; pass < MOST_PASSES; pass++) {
    if (pass > 0) restore(lanes, saved, i);
    for (let d = 0; d < detectors.length; d++) controls[d][i] = detectors[d][GIVEN_V];
    for (let channel = 0; channel < lanes.length; channel++) {
      advanceCell(lanes[channel].cell, top(lanes[channel]), controls[channel], i, i + 1, lanes[channel].noise, lanes[channel].kinks);
    }
    hear(drive, lanes, fullWave, i);
    let agreed = true;
    for (let d = 0; d < detectors.length; d++) {
      compare(values, detectors[d], pass);
      if (Math.abs(detectors[d][EXCESS_V]) > AGREED_V) agreed = false;
    }
    if (agreed || pass === MOST_PASSES - 1) break;
    for (let d = 0; d < detectors.length; d++) if (Math.abs(detectors[d][EXCESS_V]) > AGREED_V) improve(detectors[d], pass);
  }
  for (let d = 0; d < detectors.length; d++) takeStep(detectors[d]);
}

function predict(values: Float64Array, slots: Float64Array): void {
  const low = Math.min(values[REST_V], values[LIMIT_V]);
  const high = Math.max(values[REST_V], values[LIMIT_V]);
  slots[LOW_V] = low;
  slots[HIGH_V] = high;
  slots[GIVEN_V] = Math.min(high, Math.max(low, 2 * slots[CONTROL_V] - slots[EARLIER_V]));
}

/** How much more control the present output asks for than it was given; it narrows the bracket. */
function compare(values: Float64Array, slots: Float64Array, pass: number): void {
  follow(values, slots);
  if (pass > 0 && slots[GIVEN_V] === slots[LAST_GIVEN_V]) return;
  const excess = slots[NEXT_CONTROL_V] - slots[GIVEN_V];
  slots[EXCESS_V] = excess;
  if (excess > 0) slots[LOW_V] = slots[GIVEN_V];
  else slots[HIGH_V] = slots[GIVEN_V];
}

/** The next control to give: at first the one asked for, then the secant's, and half way where that leaves the bracket or gains too little. */
function improve(slots: Float64Array, pass: number): void {
  const given = slots[GIVEN_V];
  const excess = slots[EXCESS_V];
  const change = excess - slots[LAST_EXCESS_V];
  const gains = pass < 2 || Math.abs(excess) < TOO_LITTLE * Math.abs(slots[LAST_EXCESS_V]);
  let next = pass === 0 || change === 0 ? given + excess : given - (excess * (given - slots[LAST_GIVEN_V])) / change;
  if (!(gains && next >= slots[LOW_V] && next <= slots[HIGH_V])) next = 0.5 * (slots[LOW_V] + slots[HIGH_V]);
  slots[LAST_GIVEN_V] = given;
  slots[LAST_EXCESS_V] = excess;
  slots[GIVEN_V] = next;
}

function restore(lanes: readonly Driven[], saved: readonly Float64Array[], i: number): void {
  for (let channel = 0; channel < lanes.length; channel++) {
    const { state } = lanes[channel].cell;
    for (let k = 0; k < state.length; k++) state[k] = saved[channel][k];
    top(lanes[channel])[i] = saved[channel][state.length];
    if (lanes[channel].kinks.length > 0) lanes[channel].kinks[0] = saved[channel][state.length + 1];
  }
}

function takeStep(slots: Float64Array): void {
  keepStep(slots);
  slots[EARLIER_V] = slots[CONTROL_V];
  slots[CONTROL_V] = slots[NEXT_CONTROL_V];
}
