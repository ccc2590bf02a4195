/**
 * One complete path of a chain, for one shape of circuit: oversamplers, cells and control with their state. Values move along straight lines in
 * conductance, capacitance, volts and gain; the cell's matrices are made anew every `SLICE` upper-rate samples while they do.
 */
import { advanceCell, type Cell, createCell, loadValues, settle } from '../cell/cell.ts';
import { createOscillator, MIDDLE_V, OSCILLATOR_VALUES, type OscillatorNumbers, runOscillator } from '../control/oscillator.ts';
import type { ChainNumbers } from './compile.ts';
import { createOversampler, lower, type Oversampler, raise } from './oversample.ts';

/** Lower-rate samples that a voice takes at a time. */
export const LONGEST_BLOCK = 128;
/** Upper-rate samples between two makings of the cell's matrices. */
const SLICE = 32;
const RAMP_SEC = 0.02;
/** A voltage that no cell of this kind reaches: beyond it the state is taken to be lost. */
const RUNAWAY_V = 1e6;

const FULL_SCALE_V = 0;
const OUTPUT_PER_V = 1;

interface Moving {
  readonly now: Float64Array;
  readonly from: Float64Array;
  readonly to: Float64Array;
}

export interface Voice {
  readonly numbers: ChainNumbers;
  readonly cells: readonly Cell[];
  readonly oversamplers: readonly Oversampler[];
  readonly oscillator: Float64Array;
  readonly control: Float64Array;
  readonly gains: Moving;
  readonly controlValues: Moving;
  readonly values: readonly Moving[];
  /** Slices done and to do of the ramp; upper-rate samples done of the slice. */
  readonly ramp: { done: number; total: number; inSlice: number };
  readonly drainPeakV: Float64Array;
  /**
   * A silent copy of the first channel's cell at the lower rate: where the gate stands without the audio that rides on it, and what the
   * control alone leaves at the drain.
   */
  readonly quiet: { readonly cell: Cell; readonly signal: Float64Array; readonly control: Float64Array; feedthroughPeakV: number };
}

function moving(values: Float64Array): Moving {
  return { now: values, from: Float64Array.from(values), to: Float64Array.from(values) };
}

function oscillatorValues(numbers: OscillatorNumbers): Float64Array {
  return createOscillator(numbers).subarray(0, OSCILLATOR_VALUES);
}

/** A voice at its operating point. Throws when a cell's network is singular. */
export function createVoice(numbers: ChainNumbers): Voice {
  const { oversampling, filters, sampleRateHz } = numbers;
  const stepSec = 1 / (sampleRateHz * oversampling);
  const cells = numbers.cells.map((cell) => createCell(cell, stepSec));
  const oscillator = createOscillator(numbers.oscillator);
  const quietCell = createCell(numbers.cells[0], 1 / sampleRateHz);
  for (const cell of [...cells, quietCell]) settle(cell, 0, oscillator[MIDDLE_V]);
  return {
    numbers,
    cells,
    oversamplers: cells.map(() => createOversampler(oversampling, filters, LONGEST_BLOCK)),
    oscillator,
    control: new Float64Array(LONGEST_BLOCK * oversampling),
    gains: moving(Float64Array.of(numbers.fullScaleV, numbers.outputPerV)),
    controlValues: moving(oscillator.subarray(0, OSCILLATOR_VALUES)),
    values: numbers.cells.map((cell) => moving(Float64Array.from(cell.values))),
    ramp: { done: 0, total: 0, inSlice: 0 },
    drainPeakV: new Float64Array(cells.length),
    quiet: { cell: quietCell, signal: new Float64Array(LONGEST_BLOCK), control: new Float64Array(LONGEST_BLOCK), feedthroughPeakV: 0 },
  };
}

/** Starts moving to the values of `numbers`, which have the voice's shape, from wherever they are now. */
export function moveVoice(voice: Voice, numbers: ChainNumbers): void {
  retarget(voice.gains, Float64Array.of(numbers.fullScaleV, numbers.outputPerV));
  retarget(voice.controlValues, oscillatorValues(numbers.oscillator));
  numbers.cells.forEach((cell, channel) => {
    retarget(voice.values[channel], cell.values);
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

/** Advances by `count` samples, at most LONGEST_BLOCK, from `start` of the inputs. False when a state was lost: the voice is at rest again. */
export function processVoice(voice: Voice, inputs: readonly Float64Array[], outputs: readonly Float64Array[], count: number): boolean {
  const { cells, oversamplers, gains, numbers } = voice;
  const upperCount = count * numbers.oversampling;
  for (let channel = 0; channel < cells.length; channel++) {
    const first = oversamplers[channel].buffers[0];
    const fullScaleV = gains.now[FULL_SCALE_V];
    for (let i = 0; i < count; i++) first[i] = inputs[channel][i] * fullScaleV;
    raise(oversamplers[channel], count);
  }
  advanceAll(voice, upperCount);
  advanceQuiet(voice, count);
  let sound = true;
  for (let channel = 0; channel < cells.length; channel++) {
    sound = keepPeak(voice, channel, upperCount) && sound;
    const low = lower(oversamplers[channel], count);
    const perV = gains.now[OUTPUT_PER_V];
    for (let i = 0; i < count; i++) outputs[channel][i] = low[i] * perV;
  }
  return sound;
}

function advanceQuiet(voice: Voice, count: number): void {
  const { quiet, control, numbers } = voice;
  for (let i = 0; i < count; i++) {
    quiet.signal[i] = 0;
    quiet.control[i] = control[(i + 1) * numbers.oversampling - 1];
  }
  advanceCell(quiet.cell, quiet.signal, quiet.control, 0, count);
  quiet.feedthroughPeakV = 0;
  for (let i = 0; i < count; i++) quiet.feedthroughPeakV = Math.max(quiet.feedthroughPeakV, Math.abs(quiet.signal[i]));
}

/** Control and cells, slice by slice while values move. */
function advanceAll(voice: Voice, upperCount: number): void {
  const { cells, oversamplers, control, ramp, numbers } = voice;
  let at = 0;
  while (at < upperCount) {
    const isMoving = ramp.done < ramp.total;
    const end = isMoving ? Math.min(upperCount, at + SLICE - ramp.inSlice) : upperCount;
    if (isMoving && ramp.inSlice === 0) takeValues(voice, (ramp.done + 1) / ramp.total);
    runOscillator(numbers.oscillator.shape, voice.oscillator, control, at, end);
    for (let channel = 0; channel < cells.length; channel++) {
      const { buffers } = oversamplers[channel];
      advanceCell(cells[channel], buffers[buffers.length - 1], control, at, end);
    }
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
  follow(voice.gains, fraction);
  follow(voice.controlValues, fraction);
  for (let channel = 0; channel < voice.cells.length; channel++) {
    const values = voice.values[channel];
    follow(values, fraction);
    loadValues(voice.cells[channel], values.now);
  }
  loadValues(voice.quiet.cell, voice.values[0].now);
}

/** Notes the drain's peak; puts the cell at rest and silences its block when the voltage is not a number or has run away. */
function keepPeak(voice: Voice, channel: number, upperCount: number): boolean {
  const { buffers } = voice.oversamplers[channel];
  const drain = buffers[buffers.length - 1];
  let peak = 0;
  let lost = false;
  for (let i = 0; i < upperCount; i++) {
    const size = Math.abs(drain[i]);
    if (!(size < RUNAWAY_V)) lost = true;
    if (size > peak) peak = size;
  }
  if (!lost) {
    voice.drainPeakV[channel] = peak;
    return true;
  }
  drain.fill(0);
  voice.drainPeakV[channel] = 0;
  const cell = voice.cells[channel];
  cell.state.fill(0);
  settle(cell, 0, voice.oscillator[MIDDLE_V]);
  return false;
}
