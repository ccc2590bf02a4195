/**
 * One complete path of a chain, for one shape of circuit: oversamplers, cells, control and amplifier with their state. Values move along straight
 * lines in volts and gain, by equal ratios in conductance, capacitance and inductance; the cell's matrices are made anew every `updateEvery` upper-rate samples while they do, and
 * its coefficients go from one exact set to the next as `aimAt` in cell/values.ts says.
 */
import { type Cell, createCell, inheritStates, settle } from '../cell/cell.ts';
import { aimAt, approach, approachMemory, arrive, loadValuesOf } from '../cell/values.ts';
import { noiseWidth } from '../cell/kernels/layout.ts';
import { quietControlV } from '../control/control.ts';
import { createGaussian, type GaussianSource } from '../device/random.ts';
import { createAmplifierState, processAmplifier } from './amplifier.ts';
import { createKinks } from '../cell/kernels/kinks.ts';
import type { ChainNumbers } from './compile.ts';
import { advanceSlice, createDrive, type Drive, endBlock, inheritDrive, restDrive } from './drive.ts';
import { clearSoftener, createSoftener, type Softener, soften } from './kinks.ts';
import { bendTable, lagTable } from './kinkTables.ts';
import { timesSoftened } from './latency.ts';
import { GAIN } from './limits.ts';
import { clearOversampler, createOversampler, lower, type Oversampler, raise } from './oversample.ts';
import { advanceQuiet, createQuiet, type Quiet, RUNAWAY_V } from './quiet.ts';
import { aim, type Levels, levelAt, type Moving, moving, partsOf, retarget, setOut, standing, step } from './ramp.ts';
import {
  advanceResidual,
  bringResidual,
  createResidual,
  isBounded,
  keepAudio,
  lowerResidual,
  type Residual,
  type ResidualPart,
  restResidual,
} from './residual.ts';

/** Lower-rate samples that a voice takes at a time. */
export const LONGEST_BLOCK = 128;
const RAMP_SEC = 0.02;

/** Places in a voice's levels. */
export const FULL_SCALE_V = 0;
const PER_V = 1;
const RESIDUAL_PER_V = 2;

function levelsOf({ fullScaleV, idealAmplifier, amplifier }: ChainNumbers): Float64Array {
  return Float64Array.of(fullScaleV, (idealAmplifier ? amplifier[GAIN] : 1) / fullScaleV, amplifier[GAIN] / fullScaleV);
}

/** One audio channel of a voice. */
export interface Lane {
  readonly cell: Cell;
  readonly oversampler: Oversampler;
  readonly amplifier: Float64Array;
  /** Where the output bends, and what softens that; nothing without oversampling. */
  readonly kinks: Float64Array;
  readonly softener: Softener;
  /** The same of a real amplifier. */
  readonly amplifierKinks: Float64Array;
  readonly amplifierSoftener: Softener;
  readonly values: Moving;
  readonly noise: Float64Array;
  readonly gaussian: GaussianSource;
  /** Of the last block; `lost` where a voltage in it was no number or ran away. */
  outputPeakV: number;
  lost: boolean;
  /** Last voltage of the cell in a sound block, and upper-rate samples until the lane is at its full level again after a loss. */
  lastV: number;
  muted: number;
}

export interface Voice {
  /** Those last moved to. */
  numbers: ChainNumbers;
  readonly lanes: readonly Lane[];
  readonly drive: Drive;
  /** Raises a recorded control; null for other controls. */
  readonly external: Oversampler | null;
  /** Full scale, V, and samples for a volt of the output and of the residual: they move at the lower rate. */
  readonly levels: Levels;
  readonly control: Moving;
  /** The amplifier's values, which move at the upper rate. */
  readonly amplifier: Levels;
  readonly amplifierNow: Float64Array;
  /** Slices done and to do of the ramp; upper-rate samples done of the slice. */
  readonly ramp: { done: number; total: number; inSlice: number };
  readonly quiet: Quiet;
  /** Null unless it is asked for. */
  residual: Residual | null;
}

/** A voice at its operating point. Throws when a cell's network is singular. */
export function createVoice(numbers: ChainNumbers): Voice {
  const { oversampling, filters, sampleRateHz, noiseSeed } = numbers;
  const stepSec = 1 / (sampleRateHz * oversampling);
  const restV = quietControlV(numbers.control);
  const isReal = oversampling > 1 && !numbers.idealAmplifier;
  const lanes = numbers.cells.map((values, channel): Lane => {
    const cell = createCell(values, stepSec);
    settle(cell, 0, restV);
    const noiseLength = noiseSeed === null ? 0 : LONGEST_BLOCK * oversampling * noiseWidth(cell.stateCount);
    return {
      cell,
      oversampler: createOversampler(oversampling, filters, LONGEST_BLOCK, timesSoftened(numbers)),
      amplifier: createAmplifierState(),
      kinks: oversampling > 1 ? createKinks(LONGEST_BLOCK * oversampling) : new Float64Array(0),
      softener: createSoftener(bendTable(oversampling)),
      amplifierKinks: isReal ? createKinks(LONGEST_BLOCK * oversampling) : new Float64Array(0),
      amplifierSoftener: createSoftener(lagTable(oversampling)),
      values: moving(Float64Array.from(cell.values), partsOf(values)),
      noise: new Float64Array(noiseLength),
      gaussian: createGaussian((noiseSeed ?? 0) + 0x9e37 * channel),
      outputPeakV: 0,
      lost: false,
      lastV: 0,
      muted: 0,
    };
  });
  const control = moving(Float64Array.from(numbers.control.values));
  return {
    numbers,
    lanes,
    drive: createDrive(numbers.control, control.now, lanes, LONGEST_BLOCK * oversampling),
    external: numbers.control.kind === 'external' ? createOversampler(oversampling, filters, LONGEST_BLOCK) : null,
    levels: standing(levelsOf(numbers)),
    control,
    amplifier: standing(numbers.amplifier),
    amplifierNow: Float64Array.from(numbers.amplifier),
    ramp: { done: 0, total: 0, inSlice: 0 },
    quiet: createQuiet(numbers, LONGEST_BLOCK),
    residual: null,
  };
}

/** From now on the voice leaves what its cells add; null ends that. Allocates. */
export function setVoiceResidual(voice: Voice, part: ResidualPart | null): void {
  voice.residual = part === null ? null : createResidual(voice, part, LONGEST_BLOCK);
}

/** Starts moving to the values of `numbers`, which have the voice's shape, from wherever they are now. */
export function moveVoice(voice: Voice, numbers: ChainNumbers): void {
  setOut(voice.levels, levelsOf(numbers), Math.round(RAMP_SEC * numbers.sampleRateHz));
  setOut(voice.amplifier, numbers.amplifier, Math.round(RAMP_SEC * numbers.sampleRateHz * numbers.oversampling));
  retarget(voice.control, numbers.control.values);
  numbers.cells.forEach((cell, channel) => {
    retarget(voice.lanes[channel].values, cell.values);
  });
  voice.numbers = numbers;
  voice.ramp.done = 0;
  voice.ramp.inSlice = 0;
  voice.ramp.total = Math.max(1, Math.round((RAMP_SEC * numbers.sampleRateHz * numbers.oversampling) / numbers.updateEvery));
}

/** Takes over what a voice of another shape remembers and this one has too: the control's memory, and the states of elements of the same name. */
export function inherit(voice: Voice, from: Voice): void {
  inheritDrive(voice.drive, from.drive);
  inheritStates(voice.quiet.cell, from.quiet.cell);
  for (let channel = 0; channel < voice.lanes.length; channel++) inheritStates(voice.lanes[channel].cell, from.lanes[channel].cell);
  if (voice.residual !== null) bringResidual(voice.residual, voice);
}

/**
 * Advances by `count` samples, at most LONGEST_BLOCK; `external` is the recorded control, used where there is one. What the cells add goes to
 * `residuals`, where it is asked for. False when a state was lost, and the voice is at rest again, or when values on the way of a move make a singular
 * network, and the cell keeps its last good ones, muted until others are good.
 */
export function processVoice(
  voice: Voice,
  inputs: readonly Float64Array[],
  external: Float64Array,
  outputs: readonly Float64Array[],
  residuals: readonly Float64Array[],
  count: number,
): boolean {
  const { lanes, numbers, levels, residual } = voice;
  const upperCount = count * numbers.oversampling;
  for (let channel = 0; channel < lanes.length; channel++) {
    const first = lanes[channel].oversampler.buffers[0];
    for (let i = 0; i < count; i++) first[i] = inputs[channel][i] * levelAt(levels, FULL_SCALE_V, i);
    raise(lanes[channel].oversampler, count);
  }
  if (voice.external) {
    const first = voice.external.buffers[0];
    for (let i = 0; i < count; i++) first[i] = external[i];
    voice.drive.recorded = raise(voice.external, count);
  }
  for (let channel = 0; channel < lanes.length; channel++) {
    lanes[channel].outputPeakV = 0;
    lanes[channel].lost = false;
  }
  if (residual !== null) keepAudio(residual, voice, upperCount);
  const regular = advanceAll(voice, upperCount);
  let sound = regular;
  endBlock(voice.drive, upperCount);
  advanceQuiet(voice.quiet, numbers, voice.drive.controls[0], count);
  let lost = false;
  for (let channel = 0; channel < lanes.length; channel++) if (lanes[channel].lost) lost = true;
  if (lost) {
    restDrive(voice.drive);
    sound = false;
  }
  if (residual !== null) leaveResidual(voice, residual, residuals, lost, count);
  for (let channel = 0; channel < lanes.length; channel++) {
    if (lanes[channel].lost) putAtRest(voice, lanes[channel], upperCount);
    else if (!regular) fadeOut(voice, lanes[channel], upperCount);
    else fadeIn(voice, lanes[channel], upperCount);
    lanes[channel].lastV = top(lanes[channel])[upperCount - 1];
    if (numbers.oversampling > 1) soften(lanes[channel].softener, top(lanes[channel]), lanes[channel].kinks, upperCount);
  }
  amplify(voice, upperCount);
  for (let channel = 0; channel < lanes.length; channel++) {
    const low = lower(lanes[channel].oversampler, count);
    if (!allFinite(low, count)) {
      clearOversampler(lanes[channel].oversampler);
      clearSoftener(lanes[channel].softener);
      clearSoftener(lanes[channel].amplifierSoftener);
      lanes[channel].amplifier.fill(0);
      sound = false;
    }
    for (let i = 0; i < count; i++) outputs[channel][i] = low[i] * levelAt(levels, PER_V, i);
  }
  levels.done = Math.min(levels.done + count, levels.total);
  return sound;
}

function top(lane: Lane): Float64Array {
  const { buffers } = lane.oversampler;
  return buffers[buffers.length - 1];
}

/** Control and cells; sample by sample while values move. False where those make a singular network. */
function advanceAll(voice: Voice, upperCount: number): boolean {
  const { lanes, ramp, numbers } = voice;
  let at = 0;
  let regular = true;
  while (at < upperCount && ramp.done < ramp.total) {
    if (ramp.inSlice === 0) regular = beginSlice(voice) && regular;
    stepSlice(voice);
    advanceSlice(voice.drive, lanes, numbers, at, at + 1);
    if (voice.residual !== null) advanceResidual(voice.residual, voice, at, at + 1);
    for (let channel = 0; channel < lanes.length; channel++) approachMemory(lanes[channel].cell);
    ramp.inSlice += 1;
    if (ramp.inSlice === numbers.updateEvery) endSlice(voice);
    at += 1;
  }
  if (at < upperCount) {
    advanceSlice(voice.drive, lanes, numbers, at, upperCount);
    if (voice.residual !== null) advanceResidual(voice.residual, voice, at, upperCount);
  }
  finish(voice, upperCount);
  return regular;
}

/** The residual at the lower rate, in samples; silence where a state was lost, or where the copies run away and are put at rest. */
function leaveResidual(voice: Voice, residual: Residual, outputs: readonly Float64Array[], lost: boolean, count: number): void {
  let usable = !lost;
  for (let channel = 0; channel < voice.lanes.length; channel++) {
    const low = lowerResidual(residual, voice, channel, count);
    usable = isBounded(residual, voice, channel, low, count) && usable;
    for (let i = 0; i < count; i++) outputs[channel][i] = usable ? low[i] * levelAt(voice.levels, RESIDUAL_PER_V, i) : 0;
  }
  if (!usable) restResidual(residual, quietControlV(voice.numbers.control));
}

/** False where the slice's values make a singular network: that cell stays as it is. */
function beginSlice(voice: Voice): boolean {
  const { ramp } = voice;
  const { updateEvery } = voice.numbers;
  let regular = true;
  const end = (ramp.done + 1) / ramp.total;
  const middle = (ramp.done + 0.5) / ramp.total;
  aim(voice.control, end, middle, updateEvery);
  for (let channel = 0; channel < voice.lanes.length; channel++) {
    const { cell, values } = voice.lanes[channel];
    aim(values, end, middle, updateEvery);
    if (!aimAt(cell, values.between, values.aim, updateEvery, end === 1)) regular = false;
  }
  return loadValuesOf(voice.quiet.cell, voice.lanes[0].cell) && regular;
}

function stepSlice(voice: Voice): void {
  step(voice.control);
  for (let channel = 0; channel < voice.lanes.length; channel++) approach(voice.lanes[channel].cell);
}

function endSlice(voice: Voice): void {
  voice.control.now.set(voice.control.aim);
  for (let channel = 0; channel < voice.lanes.length; channel++) {
    const { cell, values } = voice.lanes[channel];
    values.now.set(values.aim);
    arrive(cell);
  }
  voice.ramp.inSlice = 0;
  voice.ramp.done += 1;
}

/** Notes the cells' peaks. */
function finish(voice: Voice, upperCount: number): void {
  for (let channel = 0; channel < voice.lanes.length; channel++) {
    const lane = voice.lanes[channel];
    const { buffers } = lane.oversampler;
    const signal = buffers[buffers.length - 1];
    for (let i = 0; i < upperCount; i++) {
      const size = Math.abs(signal[i]);
      if (!(size < RUNAWAY_V)) lane.lost = true;
      if (size > lane.outputPeakV) lane.outputPeakV = size;
    }
  }
}

/** A real amplifier works at the upper rate; an ideal one is a gain, applied at the lower. */
function amplify({ numbers, lanes, amplifier, amplifierNow }: Voice, upperCount: number): void {
  if (numbers.idealAmplifier) return;
  const moving = Math.max(0, Math.min(upperCount, amplifier.total - amplifier.done));
  for (let channel = 0; channel < lanes.length; channel++) {
    const lane = lanes[channel];
    const signal = lane.oversampler.buffers[lane.oversampler.buffers.length - 1];
    for (let i = 0; i < moving; i++) {
      for (let index = 0; index < amplifierNow.length; index++) amplifierNow[index] = levelAt(amplifier, index, i);
      processAmplifier(amplifierNow, lane.amplifier, signal, i, i + 1, lane.amplifierKinks);
    }
    processAmplifier(amplifier.to, lane.amplifier, signal, moving, upperCount, lane.amplifierKinks);
    if (numbers.oversampling > 1) soften(lane.amplifierSoftener, signal, lane.amplifierKinks, upperCount);
  }
  amplifier.done = Math.min(amplifier.done + upperCount, amplifier.total);
}

function allFinite(signal: Float64Array, count: number): boolean {
  for (let i = 0; i < count; i++) if (!Number.isFinite(signal[i])) return false;
  return true;
}

function mutedSamples({ numbers }: Voice): number {
  return Math.round(RAMP_SEC * numbers.sampleRateHz * numbers.oversampling);
}

/** Mutes a lane within the block, from whatever level it is at. */
function fadeOut(voice: Voice, lane: Lane, upperCount: number): void {
  const total = mutedSamples(voice);
  const signal = top(lane);
  const level = 1 - lane.muted / total;
  for (let i = 0; i < upperCount; i++) signal[i] *= level * (1 - (i + 1) / upperCount);
  lane.muted = total;
  if (lane.kinks.length > 0) lane.kinks[0] = 0;
}

/** Brings a lane that was muted back to its level. */
function fadeIn(voice: Voice, lane: Lane, upperCount: number): void {
  const total = mutedSamples(voice);
  const signal = top(lane);
  for (let i = 0; i < upperCount && lane.muted > 0; i++) {
    lane.muted -= 1;
    signal[i] *= 1 - lane.muted / total;
  }
}

/** The cell at its operating point; the block falls from the last good voltage to silence. */
function putAtRest(voice: Voice, lane: Lane, upperCount: number): void {
  const signal = top(lane);
  for (let i = 0; i < upperCount; i++) signal[i] = lane.lastV * (1 - (i + 1) / upperCount);
  lane.muted = mutedSamples(voice);
  if (lane.kinks.length > 0) lane.kinks[0] = 0;
  lane.outputPeakV = 0;
  lane.cell.state.fill(0);
  settle(lane.cell, 0, quietControlV(voice.numbers.control));
}
