/** From a design to the flat numbers of a chain: source and pad, oversampling, cell and control, make-up gain. Off the audio thread. */
import type { CellNumbers } from '../cell/cell.ts';
import { cellNumbers, variantAt } from '../cell/fromDesign.ts';
import { compileOscillator, type OscillatorNumbers } from '../control/oscillator.ts';
import type { Design } from '../design/types.ts';
import { ratioFromDb } from '../device/math.ts';
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
  /** Samples for a volt at the drain: the make-up gain over full scale. */
  readonly outputPerV: number;
  readonly oscillator: OscillatorNumbers;
  /** One for each audio channel. */
  readonly cells: readonly CellNumbers[];
}

const LOWEST_RATE_HZ = 8000;
const HIGHEST_RATE_HZ = 384000;

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
  const oscillator = compileOscillator(variant.control, sampleRateHz * design.oversampling);
  const cells = Array.from({ length: channels }, (_, channel) => cellNumbers(design, variantIndex, channel));
  const shape = [sampleRateHz, design.oversampling, filters, oscillator.shape, ...cells.map((cell) => cell.shape)].join(' | ');
  return {
    shape,
    sampleRateHz,
    oversampling: design.oversampling,
    filters,
    fullScaleV: design.fullScaleV,
    outputPerV: ratioFromDb(variant.output.gainDb) / design.fullScaleV,
    oscillator,
    cells,
  };
}
