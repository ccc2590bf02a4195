/**
 * One complete path of a chain, for one shape of circuit: oversamplers, cells, control and amplifier with their state. Values move along straight
 * lines in conductance, capacitance, volts and gain; the cell's matrices are made anew every `SLICE` upper-rate samples while they do.
 */
import { advanceCell, type Cell, createCell, loadValues, settle } from '../cell/cell.ts';
import { noiseWidth } from '../cell/kernels/layout.ts';
import { quietControlV } from '../control/control.ts';
import { createGaussian, type GaussianSource } from '../device/random.ts';
import { createAmplifierState, GAIN, processAmplifier } from './amplifier.ts';
import type { ChainNumbers } from './compile.ts';
import { advanceSlice, createDrive, type Drive } from './drive.ts';
import { createOversampler, lower, type Oversampler, raise } from './oversample.ts';

/** Lower-rate samples that a voice takes at a time. */
export const LONGEST_BLOCK = 128;
/** Upper-rate samples between two makings of the cell's matrices. */
const SLICE = 32;
const RAMP_SEC = 0.02;
/** A voltage that no cell of this kind reaches: beyond it the state is taken to be lost. */
const RUNAWAY_V = 1e6;

interface Moving {
  readonly now: Float64Array;
  readonly from: Float64Array;
  readonly to: Float64Array;
}

/** One audio channel of a voice. */
export interface Lane {
  readonly cell: Cell;
  readonly oversampler: Oversampler;
  readonly amplifier: Float64Array;
  readonly values: Moving;
  readonly noise: Float64Array;
  readonly gaussian: GaussianSource;
  /** Of the last block. */
  drainPeakV: number;
}

export interface Voice {
  readonly numbers: ChainNumbers;
  readonly lanes: readonly Lane[];
  readonly drive: Drive;
  /** Raises a recorded control; null for other controls. */
  readonly external: Oversampler | null;
  /** Full scale, V. */
  readonly scale: Moving;
  readonly control: Moving;
  readonly amplifier: Moving;
  /** Slices done and to do of the ramp; upper-rate samples done of the slice. */
  readonly ramp: { done: number; total: number; inSlice: number };
  /**
   * A silent copy of the first channel's cell at the lower rate: where the gate stands without the audio that rides on it, and what the
   * control alone leaves at the output.
   */
  readonly quiet: { readonly cell: Cell; readonly signal: Float64Array; readonly control: Float64Array; feedthroughPeakV: number };
}

function moving(values: Float64Array): Moving {
  return { now: values, from: Float64Array.from(values), to: Float64Array.from(values) };
}

/** A voice at its operating point. Throws when a cell's network is singular. */
export function createVoice(numbers: ChainNumbers): Voice {
  const { oversampling, filters, sampleRateHz, noiseSeed } = numbers;
  const stepSec = 1 / (sampleRateHz * oversampling);
  const restV = quietControlV(numbers.control);
  const quietCell = createCell(numbers.cells[0], 1 / sampleRateHz);
  settle(quietCell, 0, restV);
  const lanes = numbers.cells.map((values, channel): Lane => {
    const cell = createCell(values, stepSec);
    settle(cell, 0, restV);
    const noiseLength = noiseSeed === null ? 0 : LONGEST_BLOCK * oversampling * noiseWidth(cell.stateCount);
    return {
      cell,
      oversampler: createOversampler(oversampling, filters, LONGEST_BLOCK),
      amplifier: createAmplifierState(),
      values: moving(Float64Array.from(cell.values)),
      noise: new Float64Array(noiseLength),
      gaussian: createGaussian((noiseSeed ?? 0) + 0x9e37 * channel),
      drainPeakV: 0,
    };
  });
  const control = moving(Float64Array.from(numbers.control.values));
  return {
    numbers,
    lanes,
    drive: createDrive(numbers.control, control.now, lanes, LONGEST_BLOCK * oversampling),
    external: numbers.control.kind === 'external' ? createOversampler(oversampling, filters, LONGEST_BLOCK) : null,
    scale: moving(Float64Array.of(numbers.fullScaleV)),
    control,
    amplifier: moving(Float64Array.from(numbers.amplifier)),
    ramp: { done: 0, total: 0, inSlice: 0 },
    quiet: { cell: quietCell, signal: new Float64Array(LONGEST_BLOCK), control: new Float64Array(LONGEST_BLOCK), feedthroughPeakV: 0 },
  };
}

/** Starts moving to the values of `numbers`, which have the voice's shape, from wherever they are now. */
export function moveVoice(voice: Voice, numbers: ChainNumbers): void {
  retarget(voice.scale, Float64Array.of(numbers.fullScaleV));
  retarget(voice.control, numbers.control.values);
  retarget(voice.amplifier, numbers.amplifier);
  numbers.cells.forEach((cell, channel) => {
    retarget(voice.lanes[channel].values, cell.values);
  });
  voice.ramp.done = 0;
  voice.ramp.inSlice = 0;
  voice.ramp.total = Math.max(1, Math.round((RAMP_SEC * numbers.sampleRateHz * numbers.oversampling) / SLICE));
}

function retarget(values: Moving, to: Float64Array): void {
  values.from.set(values.now);
  values.to.set(to);
}

function follow(values: Moving, fraction: number): void {
  const { now, from, to } = values;
  for (let i = 0; i < now.length; i++) now[i] = fraction === 1 ? to[i] : from[i] + fraction * (to[i] - from[i]);
}

/**
 * Advances by `count` samples, at most LONGEST_BLOCK; `external` is the recorded control, used where there is one. False when a state was lost:
 * the voice is at rest again.
 */
export function processVoice(
  voice: Voice,
  inputs: readonly Float64Array[],
  external: Float64Array,
  outputs: readonly Float64Array[],
  count: number,
): boolean {
  const { lanes, numbers } = voice;
  const upperCount = count * numbers.oversampling;
  for (let channel = 0; channel < lanes.length; channel++) {
    const first = lanes[channel].oversampler.buffers[0];
    const fullScaleV = voice.scale.now[0];
    for (let i = 0; i < count; i++) first[i] = inputs[channel][i] * fullScaleV;
    raise(lanes[channel].oversampler, count);
  }
  if (voice.external) {
    const first = voice.external.buffers[0];
    for (let i = 0; i < count; i++) first[i] = external[i];
    voice.drive.recorded = raise(voice.external, count);
  }
  advanceAll(voice, upperCount);
  advanceQuiet(voice, count);
  let sound = true;
  for (let channel = 0; channel < lanes.length; channel++) {
    const lane = lanes[channel];
    sound = keepPeak(voice, lane, upperCount) && sound;
    const low = lower(lane.oversampler, count);
    const perV = (numbers.idealAmplifier ? voice.amplifier.now[GAIN] : 1) / voice.scale.now[0];
    for (let i = 0; i < count; i++) outputs[channel][i] = low[i] * perV;
  }
  return sound;
}

/** Control, cells and amplifiers, slice by slice while values move. */
function advanceAll(voice: Voice, upperCount: number): void {
  const { lanes, ramp, numbers } = voice;
  let at = 0;
  while (at < upperCount) {
    const isMoving = ramp.done < ramp.total;
    const end = isMoving ? Math.min(upperCount, at + SLICE - ramp.inSlice) : upperCount;
    if (isMoving && ramp.inSlice === 0) takeValues(voice, (ramp.done + 1) / ramp.total);
    advanceSlice(voice.drive, lanes, numbers, at, end);
    if (isMoving) {
      ramp.inSlice += end - at;
      if (ramp.inSlice === SLICE) {
        ramp.inSlice = 0;
        ramp.done += 1;
      }
    }
    at = end;
  }
}

function takeValues(voice: Voice, fraction: number): void {
  follow(voice.scale, fraction);
  follow(voice.control, fraction);
  follow(voice.amplifier, fraction);
  for (let channel = 0; channel < voice.lanes.length; channel++) {
    const { cell, values } = voice.lanes[channel];
    follow(values, fraction);
    loadValues(cell, values.now);
  }
  loadValues(voice.quiet.cell, voice.lanes[0].values.now);
}

function advanceQuiet(voice: Voice, count: number): void {
  const { quiet, drive, numbers } = voice;
  for (let i = 0; i < count; i++) {
    quiet.signal[i] = 0;
    quiet.control[i] = drive.controls[0][(i + 1) * numbers.oversampling - 1];
  }
  advanceCell(quiet.cell, quiet.signal, quiet.control, 0, count);
  quiet.feedthroughPeakV = 0;
  for (let i = 0; i < count; i++) quiet.feedthroughPeakV = Math.max(quiet.feedthroughPeakV, Math.abs(quiet.signal[i]));
  if (!(quiet.feedthroughPeakV < RUNAWAY_V)) settle(quiet.cell, 0, quietControlV(numbers.control));
}

/** Notes the cell's peak and amplifies; puts the cell at rest and silences its block when the voltage is not a number or has run away. */
function keepPeak(voice: Voice, lane: Lane, upperCount: number): boolean {
  const { buffers } = lane.oversampler;
  const drain = buffers[buffers.length - 1];
  let peak = 0;
  let lost = false;
  for (let i = 0; i < upperCount; i++) {
    const size = Math.abs(drain[i]);
    if (!(size < RUNAWAY_V)) lost = true;
    if (size > peak) peak = size;
  }
  lane.drainPeakV = lost ? 0 : peak;
  if (lost) {
    drain.fill(0);
    lane.amplifier.fill(0);
    lane.cell.state.fill(0);
    settle(lane.cell, 0, quietControlV(voice.numbers.control));
  }
  if (!voice.numbers.idealAmplifier) processAmplifier(voice.amplifier.now, lane.amplifier, drain, 0, upperCount);
  return !lost;
}
