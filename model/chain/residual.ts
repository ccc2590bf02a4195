/**
 * What a cell adds, alone: its copies run beside it on the control voltage that it was given, never on one of their own.
 *
 * Law      distortion = the cell − its silent copy − its linear twin; feedthrough = the silent copy; noise = a silent copy with noise − one without
 * Scheme   copies share the cell's coefficients, so values that move are the same in all; kinks are softened as the cell's own are
 * Error    a linear cell leaves under −150 dB while its values stand (test/model/chain/residual.test.ts), −136 dB on the way of a move at ×1
 * Valid    the make-up amplifier counts as its gain: its own bandwidth, slew rate and swing are not in the residual
 */
import { advanceCell, type Cell, copyOf, inheritStates, settle } from '../cell/cell.ts';
import { advanceTwin, createTwin, restTwin, type Twin } from '../cell/twin.ts';
import type { Design } from '../design/types.ts';
import { clearSoftener, createSoftener, type Softener, soften } from './kinks.ts';
import { timesSoftened } from './latency.ts';
import { clearOversampler, createOversampler, lower, type Oversampler } from './oversample.ts';
import type { Voice } from './voice.ts';

export const RESIDUAL_PARTS = ['distortion', 'feedthrough', 'noise'] as const;
export type ResidualPart = (typeof RESIDUAL_PARTS)[number];

interface Copies {
  readonly silent: Cell;
  /** Of `distortion`. */
  readonly twin: Twin | null;
  /** Of `noise`. */
  readonly noisy: Cell | null;
  /** Of the block; and what a residual beyond is that of copies that have run away, V. */
  audioPeakV: number;
  boundV: number;
  /** At the upper rate: the audio that went into the cell; the outputs of the copies. */
  readonly audio: Float64Array;
  readonly silentV: Float64Array;
  readonly noisyV: Float64Array;
  readonly oversampler: Oversampler;
  readonly softener: Softener;
  /** As late as a real amplifier's own; null beside an ideal one. */
  readonly later: Softener | null;
}

export interface Residual {
  readonly part: ResidualPart;
  readonly lanes: readonly Copies[];
}

const SEED = 1;
const NO_KINKS = new Float64Array(1);

/** A design whose parts hiss, with the seed that it has or one of ours. */
export function withNoise(design: Design): Design {
  return design.noise.kind === 'thermal' ? design : { ...design, noise: { kind: 'thermal', seed: SEED } };
}

/** The copies of a voice's cells, at the state that the voice is in; for blocks of up to `longest` lower-rate samples. Allocates. */
export function createResidual(voice: Voice, part: ResidualPart, longest: number): Residual {
  const { lanes, numbers } = voice;
  const upper = longest * numbers.oversampling;
  const residual = {
    part,
    lanes: lanes.map((lane): Copies => {
      const silent = copyOf(lane.cell);
      return {
        silent,
        twin: part === 'distortion' ? createTwin(lane.cell, silent) : null,
        noisy: part === 'noise' ? copyOf(silent) : null,
        audioPeakV: 0,
        boundV: 0,
        audio: new Float64Array(upper),
        silentV: new Float64Array(upper),
        noisyV: new Float64Array(part === 'noise' ? upper : 0),
        oversampler: createOversampler(numbers.oversampling, numbers.filters, longest, timesSoftened(numbers)),
        softener: createSoftener(lane.softener.table),
        later: numbers.idealAmplifier ? null : createSoftener(lane.softener.table),
      };
    }),
  };
  bringResidual(residual, voice);
  return residual;
}

/** Puts the copies at the state that the voice is in. */
export function bringResidual({ lanes }: Residual, { drive, quiet }: Voice): void {
  for (let channel = 0; channel < lanes.length; channel++) {
    const { silent, twin, noisy } = lanes[channel];
    settle(silent, 0, drive.lastV[channel]);
    // The voice's own silent copy is one of the first channel; another channel's part may rest elsewhere.
    if (channel === 0) inheritStates(silent, quiet.cell);
    if (twin !== null) restTwin(twin);
    if (noisy !== null) noisy.state.set(silent.state);
  }
}

/** No cell adds more than this many times what goes in and comes out; values that jump may make a copy's memory do so. */
const MOST_TIMES = 4;
const LEAST_BOUND_V = 1e-6;
const BOUND_FALLS = 0.999;

/** Whether a block of a channel's residual, V, is one that its cell can add, whose largest output in the block stands in the lane. */
export function isBounded({ lanes }: Residual, voice: Voice, channel: number, residualV: Float64Array, count: number): boolean {
  const copies = lanes[channel];
  const now = MOST_TIMES * (copies.audioPeakV + voice.lanes[channel].outputPeakV) + LEAST_BOUND_V;
  copies.boundV = Math.max(copies.boundV * BOUND_FALLS, now);
  const { boundV } = copies;
  for (let i = 0; i < count; i++) if (!(Math.abs(residualV[i]) <= boundV)) return false;
  return true;
}

/** Keeps the audio before the cells put their output in its place. */
export function keepAudio({ lanes }: Residual, voice: Voice, upperCount: number): void {
  for (let channel = 0; channel < lanes.length; channel++) {
    const from = topOf(voice.lanes[channel].oversampler);
    const copies = lanes[channel];
    let peak = 0;
    for (let i = 0; i < upperCount; i++) {
      copies.audio[i] = from[i];
      peak = Math.max(peak, Math.abs(from[i]));
    }
    copies.audioPeakV = peak;
  }
}

/** Advances the copies over the upper-rate samples `from` to `to`, which the cells have just been advanced over, and leaves the residual. */
export function advanceResidual({ lanes, part }: Residual, voice: Voice, from: number, to: number): void {
  for (let channel = 0; channel < lanes.length; channel++) {
    const { noise, oversampler } = voice.lanes[channel];
    const control = voice.drive.controls[channel];
    const whole = topOf(oversampler);
    const left = topOf(lanes[channel].oversampler);
    const { silent, twin, noisy, silentV, noisyV, audio } = lanes[channel];
    silentV.fill(0, from, to);
    if (twin !== null) {
      // Noise goes into both, so that it is not taken for distortion.
      for (let i = from; i < to; i++) {
        advanceCell(silent, silentV, control, i, i + 1, noise);
        advanceTwin(twin, audio, i);
        left[i] = whole[i] - silentV[i] - audio[i];
      }
      continue;
    }
    advanceCell(silent, silentV, control, from, to);
    if (part === 'feedthrough') for (let i = from; i < to; i++) left[i] = silentV[i];
    if (noisy === null) continue;
    noisyV.fill(0, from, to);
    advanceCell(noisy, noisyV, control, from, to, noise);
    for (let i = from; i < to; i++) left[i] = noisyV[i] - silentV[i];
  }
}

/** The residual of one channel at the lower rate, V, in the array that is returned; before the cell's own kinks are forgotten. */
export function lowerResidual({ lanes, part }: Residual, voice: Voice, channel: number, count: number): Float64Array {
  const { oversampler, softener, later } = lanes[channel];
  const { kinks } = voice.lanes[channel];
  const { oversampling } = voice.numbers;
  if (oversampling > 1) {
    const marked = kinks[0];
    if (part !== 'distortion') kinks[0] = 0;
    soften(softener, topOf(oversampler), kinks, count * oversampling);
    kinks[0] = marked;
    if (later !== null) soften(later, topOf(oversampler), NO_KINKS, count * oversampling);
  }
  return lower(oversampler, count);
}

/** A state was lost and the cells are at rest: so are the copies. */
export function restResidual({ lanes }: Residual, controlV: number): void {
  for (let channel = 0; channel < lanes.length; channel++) {
    const { silent, twin, noisy, oversampler, softener, later } = lanes[channel];
    silent.state.fill(0);
    settle(silent, 0, controlV);
    if (twin !== null) restTwin(twin);
    if (noisy !== null) noisy.state.set(silent.state);
    clearOversampler(oversampler);
    clearSoftener(softener);
    if (later !== null) clearSoftener(later);
  }
}

function topOf({ buffers }: Oversampler): Float64Array {
  return buffers[buffers.length - 1];
}
