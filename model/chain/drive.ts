/**
 * Control and cells closed into one loop at every upper-rate sample.
 *
 * Scheme   a control that does not listen to the output runs ahead of the cells, a slice at a time. A follower of the output is predicted along a straight
 *          line, the cells are solved with that and the follower with their output and with what the control makes of it, which each pass learns
 *          better: what it asks for is then nearly what it is to be given. Where that does not settle, secants within a bracket; to 0.1 µV
 * Error    against a continuous solution: test/model/chain/loop.test.ts
 */
import { advanceCell, type Cell } from '../cell/cell.ts';
import { fillNoise } from '../cell/noise.ts';
import type { ControlNumbers } from '../control/control.ts';
import {
  CHANNEL_WIDTH,
  CHANNELS,
  CONTROL_V,
  FOLLOWER_SLOTS,
  follow,
  GIVEN_V,
  HEARD,
  keepStep,
  LIMIT_V,
  NEXT_CONTROL_V,
  PER_V,
  REST_V,
} from '../control/follower.ts';
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

/** After a follower's own memory: the control voltage of the sample before the last, V. */
const EARLIER_V = FOLLOWER_SLOTS;
/** While a sample is solved: the bracket; what was given and how much more was asked for, in this pass and in the one before, and what was heard then, V. */
const LOW_V = FOLLOWER_SLOTS + 1;
const HIGH_V = FOLLOWER_SLOTS + 2;
const EXCESS_V = FOLLOWER_SLOTS + 3;
const LAST_GIVEN_V = FOLLOWER_SLOTS + 4;
const LAST_EXCESS_V = FOLLOWER_SLOTS + 5;
const LAST_HEARD_V = FOLLOWER_SLOTS + 6;
const DETECTOR_SLOTS = FOLLOWER_SLOTS + 8;

/** Passes that learn what the control makes of the voltage heard; then those that search within a bracket. */
const LEARNING = 8;
const MOST_PASSES = LEARNING + 24;
const AGREED_V = 1e-7;
/** Without a pass that halves the excess, the bracket is halved. */
const TOO_LITTLE = 0.5;
/** More than this, 1/V, no control makes of a voltage. */
const MOST_PER_V = 1e3;

export interface Drive {
  readonly control: ControlNumbers;
  /** The control's values in force; an oscillator's phase follows them. */
  readonly values: Float64Array;
  readonly phase: Float64Array;
  /** Control voltage of each channel at the upper rate; channels that share one share the array. */
  readonly controls: readonly Float64Array[];
  /** The last of each, V. */
  readonly lastV: Float64Array;
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
    lastV: new Float64Array(lanes.length).fill(restV),
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
  for (let channel = 0; channel < drive.lastV.length; channel++) drive.lastV[channel] = from.lastV[channel];
  if (drive.control.kind !== 'follower' || from.control.kind !== 'follower') return;
  drive.detectors.forEach((slots, d) => {
    const theirs = from.detectors[Math.min(d, from.detectors.length - 1)];
    for (let place = 0; place < slots.length; place++) slots[place] = theirs[place];
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

/** Notes the last control of a block of `upperCount`. */
export function endBlock({ controls, lastV }: Drive, upperCount: number): void {
  for (let channel = 0; channel < lastV.length; channel++) lastV[channel] = controls[channel][upperCount - 1];
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

/** How many channels each detector hears. */
function channelsOf({ detectors }: Drive, lanes: readonly Driven[]): number {
  return detectors.length === 1 ? lanes.length : 1;
}

/**
 * What each detector hears at sample `i`: its own channel's voltage, or those of both when they are linked. Results of these functions stand in
 * arrays: a number that a call returns may cost memory.
 */
function hear({ detectors }: Drive, lanes: readonly Driven[], i: number): void {
  for (let channel = 0; channel < lanes.length; channel++) {
    const slots = detectors[Math.min(channel, detectors.length - 1)];
    const place = detectors.length === 1 ? channel : 0;
    slots[CHANNELS + CHANNEL_WIDTH * place + HEARD] = top(lanes[channel])[i];
  }
}

function followInput(drive: Drive, lanes: readonly Driven[], fullWave: boolean, i: number): void {
  const { detectors, values, controls } = drive;
  const heardChannels = channelsOf(drive, lanes);
  hear(drive, lanes, i);
  for (let d = 0; d < detectors.length; d++) {
    detectors[d][GIVEN_V] = detectors[d][CONTROL_V];
    follow(values, detectors[d], fullWave, heardChannels);
    keepStep(detectors[d]);
    controls[d][i] = detectors[d][NEXT_CONTROL_V];
  }
}

/** Solves sample `i` with the predicted control, then with better ones, until the control given and the control asked for agree. */
function closeLoop(drive: Drive, lanes: readonly Driven[], fullWave: boolean, i: number): void {
  const { detectors, controls, saved, values } = drive;
  const heardChannels = channelsOf(drive, lanes);
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
    hear(drive, lanes, i);
    let agreed = true;
    for (let d = 0; d < detectors.length; d++) {
      const slots = detectors[d];
      if (pass > 0 && pass < LEARNING) learn(slots, heardChannels);
      follow(values, slots, fullWave, heardChannels);
      slots[EXCESS_V] = slots[NEXT_CONTROL_V] - slots[GIVEN_V];
      if (Math.abs(slots[EXCESS_V]) > AGREED_V) agreed = false;
    }
    if (agreed || pass === MOST_PASSES - 1) break;
    for (let d = 0; d < detectors.length; d++)
      if (Math.abs(detectors[d][EXCESS_V]) > AGREED_V) improve(values, detectors[d], heardChannels, pass);
  }
  for (let d = 0; d < detectors.length; d++) {
    detectors[d][EARLIER_V] = detectors[d][CONTROL_V];
    keepStep(detectors[d]);
  }
}

function predict(values: Float64Array, slots: Float64Array): void {
  const low = Math.min(values[REST_V], values[LIMIT_V]);
  const high = Math.max(values[REST_V], values[LIMIT_V]);
  slots[GIVEN_V] = Math.min(high, Math.max(low, 2 * slots[CONTROL_V] - slots[EARLIER_V]));
}

/** What the control makes of each voltage heard, from this pass and the one before: v is in proportion to 1/(1 + p·(given − last control)). */
function learn(slots: Float64Array, channels: number): void {
  const now = slots[GIVEN_V] - slots[CONTROL_V];
  const then = slots[LAST_GIVEN_V] - slots[CONTROL_V];
  if (now === then) return;
  for (let channel = 0; channel < channels; channel++) {
    const at = CHANNELS + CHANNEL_WIDTH * channel;
    const v = slots[at + HEARD];
    const earlier = slots[LAST_HEARD_V + channel];
    const perV = (earlier - v) / (v * now - earlier * then);
    if (Math.abs(perV) < MOST_PER_V) slots[at + PER_V] = perV;
  }
}

/**
 * The next control to give: the one asked for, while passes learn; then, what they have learnt being kept, the excess falls as more is given, and the
 * secant's, or half way where that leaves the bracket or gains too little.
 */
function improve(values: Float64Array, slots: Float64Array, channels: number, pass: number): void {
  const given = slots[GIVEN_V];
  const excess = slots[EXCESS_V];
  if (pass === LEARNING) {
    slots[LOW_V] = Math.min(values[REST_V], values[LIMIT_V]);
    slots[HIGH_V] = Math.max(values[REST_V], values[LIMIT_V]);
  }
  let next = slots[NEXT_CONTROL_V];
  if (pass >= LEARNING) {
    if (excess > 0) slots[LOW_V] = given;
    else slots[HIGH_V] = given;
    const change = excess - slots[LAST_EXCESS_V];
    if (pass > LEARNING && change !== 0) next = given - (excess * (given - slots[LAST_GIVEN_V])) / change;
    const gains = pass < LEARNING + 2 || Math.abs(excess) < TOO_LITTLE * Math.abs(slots[LAST_EXCESS_V]);
    if (!(gains && next >= slots[LOW_V] && next <= slots[HIGH_V])) next = 0.5 * (slots[LOW_V] + slots[HIGH_V]);
  }
  slots[LAST_GIVEN_V] = given;
  slots[LAST_EXCESS_V] = excess;
  for (let channel = 0; channel < channels; channel++) slots[LAST_HEARD_V + channel] = slots[CHANNELS + CHANNEL_WIDTH * channel + HEARD];
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
