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
import { followerControlV, nextEnvelope } from '../control/follower.ts';
import { runOscillator } from '../control/oscillator.ts';
import type { GaussianSource } from '../device/random.ts';
import type { ChainNumbers } from './compile.ts';
import type { Oversampler } from './oversample.ts';

interface Driven {
  readonly cell: Cell;
  readonly oversampler: Oversampler;
  readonly noise: Float64Array;
  readonly gaussian: GaussianSource;
}

/** Envelope and rectified voltage of the sample before, V; the control voltages of the two before. */
const ENVELOPE = 0;
const RECTIFIED = 1;
const CONTROL_V = 2;
const EARLIER_V = 3;
const DETECTOR_SLOTS = 4;

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
  /** States of the cells before a sample, then its input, to solve it again. */
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
    saved: lanes.map((lane) => new Float64Array(lane.cell.state.length + 1)),
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
    advanceCell(lanes[channel].cell, top(lanes[channel]), drive.controls[channel], from, to, lanes[channel].noise);
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

function rectify(v: number, fullWave: boolean): number {
  return fullWave ? Math.abs(v) : Math.max(v, 0);
}

/** The rectified voltage that a detector hears at sample `i`: its own channel's, or the larger of both when they are linked. */
function heard(drive: Drive, lanes: readonly Driven[], fullWave: boolean, detector: number, i: number): number {
  if (drive.detectors.length > 1 || lanes.length === 1) return rectify(top(lanes[detector])[i], fullWave);
  return Math.max(rectify(top(lanes[0])[i], fullWave), rectify(top(lanes[1])[i], fullWave));
}

function followInput(drive: Drive, lanes: readonly Driven[], fullWave: boolean, i: number): void {
  const { detectors, values, controls } = drive;
  for (let d = 0; d < detectors.length; d++) {
    const slots = detectors[d];
    const rectified = heard(drive, lanes, fullWave, d, i);
    slots[ENVELOPE] = nextEnvelope(values, slots[ENVELOPE], slots[RECTIFIED], rectified);
    slots[RECTIFIED] = rectified;
    controls[d][i] = followerControlV(values, slots[ENVELOPE]);
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
  }
  for (let pass = 0; pass < MOST_PASSES; pass++) {
    if (pass > 0) restore(lanes, saved, i);
    for (let channel = 0; channel < lanes.length; channel++) {
      advanceCell(lanes[channel].cell, top(lanes[channel]), controls[channel], i, i + 1, lanes[channel].noise);
    }
    if (correct(drive, lanes, fullWave, i) < AGREED_V && pass > 0) break;
  }
  takeEnvelopes(drive, lanes, fullWave, i);
}

function restore(lanes: readonly Driven[], saved: readonly Float64Array[], i: number): void {
  for (let channel = 0; channel < lanes.length; channel++) {
    const { state } = lanes[channel].cell;
    for (let k = 0; k < state.length; k++) state[k] = saved[channel][k];
    top(lanes[channel])[i] = saved[channel][state.length];
  }
}

/** Sets the control that the present output asks for; returns how far it moved, V. */
function correct(drive: Drive, lanes: readonly Driven[], fullWave: boolean, i: number): number {
  const { detectors, values, controls } = drive;
  let moved = 0;
  for (let d = 0; d < detectors.length; d++) {
    const slots = detectors[d];
    const envelope = nextEnvelope(values, slots[ENVELOPE], slots[RECTIFIED], heard(drive, lanes, fullWave, d, i));
    const controlV = followerControlV(values, envelope);
    moved = Math.max(moved, Math.abs(controlV - controls[d][i]));
    controls[d][i] = controlV;
  }
  return moved;
}

function takeEnvelopes(drive: Drive, lanes: readonly Driven[], fullWave: boolean, i: number): void {
  const { detectors, values } = drive;
  for (let d = 0; d < detectors.length; d++) {
    const slots = detectors[d];
    const rectified = heard(drive, lanes, fullWave, d, i);
    slots[ENVELOPE] = nextEnvelope(values, slots[ENVELOPE], slots[RECTIFIED], rectified);
    slots[RECTIFIED] = rectified;
    slots[EARLIER_V] = slots[CONTROL_V];
    slots[CONTROL_V] = followerControlV(values, slots[ENVELOPE]);
  }
}
