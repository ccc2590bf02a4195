/** From a design to the flat numbers of a chain: source and pad, oversampling, cell and control, make-up amplifier. Off the audio thread. */
import type { CellNumbers } from '../cell/cell.ts';
import { cellNumbers, variantAt } from '../cell/fromDesign.ts';
import { type ControlNumbers, compileControl, controlShape } from '../control/control.ts';
import type { Design } from '../design/types.ts';
import { amplifierValues, isIdeal, limitsOf } from './amplifier.ts';
import type { FilterSet } from './halfband.ts';

export type { FilterSet } from './halfband.ts';

/** Plain, structured-cloneable. Two sets with the same `shape` differ in values only, and one can be moved into the other. */
export interface ChainNumbers {
  readonly shape: string;
  readonly sampleRateHz: number;
  readonly oversampling: number;
  readonly filters: FilterSet;
  /** Volts for a sample of 1.0. */
  readonly fullScaleV: number;
  readonly control: ControlNumbers;
  /** One for each audio channel. */
  readonly cells: readonly CellNumbers[];
  /** Values of amplifier.ts; an ideal one has only gain, and is applied at the lower rate. */
  readonly amplifier: Float64Array;
  readonly idealAmplifier: boolean;
  /** Seed of the sampled thermal noise; null for none. */
  readonly noiseSeed: number | null;
  /** Upper-rate samples between two makings of the cell's matrices while values move. */
  readonly updateEvery: number;
  readonly tempC: number;
}

/** Often enough for ramps of 20 ms at any rate: a longer slice at ×1 errs more than −80 dB where a loop of capacitors closes through half an ohm. */
const UPDATE_EVERY = 64;
const UPDATE_EVERY_AT_ONE = 32;
export const LOWEST_RATE_HZ = 8000;
export const HIGHEST_RATE_HZ = 384000;

/** Throws a RangeError whose message names the field, its value and what was expected. */
export function compileChain(
  design: Design,
  variantIndex: number,
  sampleRateHz: number,
  channels: number,
  filters: FilterSet,
): ChainNumbers {
  if (!(sampleRateHz >= LOWEST_RATE_HZ && sampleRateHz <= HIGHEST_RATE_HZ)) {
    throw new RangeError(`the sample rate is ${sampleRateHz} Hz; expected ${LOWEST_RATE_HZ} to ${HIGHEST_RATE_HZ} Hz`);
  }
  if (channels !== 1 && channels !== 2) throw new RangeError(`the audio has ${channels} channels; expected 1 or 2`);
  const variant = variantAt(design, variantIndex);
  const { oversampling, noise, fullScaleV, tempC } = design;
  const upperHz = sampleRateHz * oversampling;
  const control = compileControl(variant.control, upperHz);
  const noiseSeed = noise.kind === 'thermal' ? noise.seed : null;
  const cells = Array.from({ length: channels }, (_, channel) => cellNumbers(design, variantIndex, channel, noiseSeed !== null));
  const idealAmplifier = isIdeal(variant.output);
  const shape = [
    sampleRateHz,
    oversampling,
    filters,
    controlShape(control),
    limitsOf(variant.output),
    noiseSeed ?? 'silent',
    ...cells.map((cell) => cell.shape),
  ].join(' | ');
  const amplifier = amplifierValues(variant.output, upperHz);
  return {
    shape,
    sampleRateHz,
    oversampling,
    filters,
    fullScaleV,
    control,
    cells,
    amplifier,
    idealAmplifier,
    noiseSeed,
    updateEvery: oversampling === 1 ? UPDATE_EVERY_AT_ONE : UPDATE_EVERY,
    tempC,
  };
}
