/**
 * Control and cells closed into one loop at every upper-rate sample.
 *
 * Scheme   a control that does not listen to the output runs ahead of the cells, a slice at a time. A follower of the output is predicted along a straight
 *          line, the cells are solved with that, the follower with their output, and the cells again with the corrected control until both agree
 * Error    against a continuous solution: test/model/chain/loop.test.ts
 */
import { advanceCell, type Cell } from '../cell/cell.ts';
import { fillNoise } from '../cell/noise.ts';
import type { ControlNumbers } from '../control/control.ts';
import { FOLLOWER_SLOTS, follow, HEARD, keepStep, NEXT_CONTROL_V } from '../control/follower.ts';
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

/** After a follower's own memory: the control voltages of the two samples before, and how far a correction moved it, V. */
const CONTROL_V = FOLLOWER_SLOTS;
const EARLIER_V = FOLLOWER_SLOTS + 1;
const MOVED_V = FOLLOWER_SLOTS + 2;
const DETECTOR_SLOTS = FOLLOWER_SLOTS + 3;

/** Passes through the loop at one sample: the prediction, and corrections until they agree or are as many as this. */
const MOST_PASSES = 4;
const AGREED_V = 1e-6;

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
  const restV = control.kind === 'external' ? values[1] : values[0];
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

/** Solves sample `i` with the predicted control, then again with the control that the solution asks for, until the two agree. */
function closeLoop(drive: Drive, lanes: readonly Driven[], fullWave: boolean, i: number): void {
  const { detectors, controls, saved } = drive;
  for (let d = 0; d < detectors.length; d++) controls[d][i] = 2 * detectors[d][CONTROL_V] - detectors[d][EARLIER_V];
  for (let channel = 0; channel < lanes.length; channel++) {
    const { cell } = lanes[channel];
    saved[channel].set(cell.state);
    saved[channel][cell.state.length] = top(lanes[channel])[i];
    saved[channel][cell.state.length + 1] = lanes[channel].kinks.length > 0 ? lanes[channel].kinks[0] : 0;
  }
  for (let pass = 0; pass < MOST_PASSES; pass++) {
    if (pass > 0) restore(lanes, saved, i);
    for (let channel = 0; channel < lanes.length; channel++) {
      advanceCell(lanes[channel].cell, top(lanes[channel]), controls[channel], i, i + 1, lanes[channel].noise, lanes[channel].kinks);
    }
    correct(drive, lanes, fullWave, i);
    if (pass > 0 && detectors[0][MOVED_V] < AGREED_V) break;
  }
  hear(drive, lanes, fullWave, i);
  for (let d = 0; d < detectors.length; d++) takeStep(drive.values, detectors[d]);
}

function restore(lanes: readonly Driven[], saved: readonly Float64Array[], i: number): void {
  for (let channel = 0; channel < lanes.length; channel++) {
    const { state } = lanes[channel].cell;
    for (let k = 0; k < state.length; k++) state[k] = saved[channel][k];
    top(lanes[channel])[i] = saved[channel][state.length];
    if (lanes[channel].kinks.length > 0) lanes[channel].kinks[0] = saved[channel][state.length + 1];
  }
}

/** Sets the control that the present output asks for; how far it moved, V, stands with the first detector. */
function correct(drive: Drive, lanes: readonly Driven[], fullWave: boolean, i: number): void {
  const { detectors, values, controls } = drive;
  hear(drive, lanes, fullWave, i);
  detectors[0][MOVED_V] = 0;
  for (let d = 0; d < detectors.length; d++) {
    const slots = detectors[d];
    follow(values, slots);
    detectors[0][MOVED_V] = Math.max(detectors[0][MOVED_V], Math.abs(slots[NEXT_CONTROL_V] - controls[d][i]));
    controls[d][i] = slots[NEXT_CONTROL_V];
  }
}

function takeStep(values: Float64Array, slots: Float64Array): void {
  follow(values, slots);
  keepStep(slots);
  slots[EARLIER_V] = slots[CONTROL_V];
  slots[CONTROL_V] = slots[NEXT_CONTROL_V];
}
