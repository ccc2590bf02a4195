/**
 * What the LFO alone brings to a cell's output over one cycle.
 *
 * Scheme   the cell's periodic state without audio (`steady.ts`), the picofarads by the cell's own damped rule, which does not ring where the
 *          control has corners; the grid doubled until the lines stop changing by 1e-4 dB (`refine.ts`)
 * Error    `changed`, with `converged` false where the finest grid still changed
 * Valid    make-up gain only, without the amplifier's limits
 */
import { createCell } from '../cell/cell.ts';
import { cellNumbers } from '../cell/fromDesign.ts';
import { compileOscillator, oscillatorValues, runOscillator } from '../control/oscillator.ts';
import type { Control, Design } from '../design/types.ts';
import { lineAmplitude, type Lines, linesOf } from '../measure/lines.ts';
import { type OnGrid, refined, STOPPED, TO_READ } from './refine.ts';
import { periodOf } from './steady.ts';

const LFO_HARMONICS = 16;
const COARSEST = 2048;
const FINEST = 65536;

export type Lfo = Extract<Control, { source: 'lfo' }>;

export interface Feedthrough {
  /** Largest distance from the mean, and from end to end, V. */
  readonly peakV: number;
  readonly peakToPeakV: number;
  /** Of the LFO's rate, 1 … 16, V. */
  readonly harmonics: readonly { readonly n: number; readonly frequencyHz: number; readonly amplitudeV: number }[];
  readonly gridPoints: number;
  readonly changed: number;
  readonly converged: boolean;
  readonly settledByTime: boolean;
}

/** Of one variant and channel, times `gain`. */
export function feedthroughOf(design: Design, variantIndex: number, channel: number, control: Lfo, gain: number): Feedthrough {
  const numbers = cellNumbers(design, variantIndex, channel);
  const readOn = (points: number): OnGrid<{ lines: Lines; output: Float64Array; byTime: boolean }> => {
    const cell = createCell(numbers, 1 / (control.rateHz * points));
    const { output, settled, byTime, noiseV } = periodOf(cell, new Float64Array(points), controlOver(control, points).ends);
    const lines = linesOf(output);
    return {
      value: { lines, output, byTime },
      watched: Float64Array.from({ length: LFO_HARMONICS }, (_, i) => lineAmplitude(lines, i + 1)),
      settled,
      noiseV,
    };
  };
  const { value, gridPoints, changed, converged } = refined(COARSEST, FINEST, readOn, { ...TO_READ, largest: STOPPED });
  const { lines, output } = value;
  const top = output.reduce((most, v) => Math.max(most, v), Number.NEGATIVE_INFINITY);
  const bottom = output.reduce((most, v) => Math.min(most, v), Number.POSITIVE_INFINITY);
  const mean = lines.real[0];
  return {
    peakV: Math.max(top - mean, mean - bottom) * gain,
    peakToPeakV: (top - bottom) * gain,
    harmonics: Array.from({ length: LFO_HARMONICS }, (_, i) => ({
      n: i + 1,
      frequencyHz: (i + 1) * control.rateHz,
      amplitudeV: lineAmplitude(lines, i + 1) * gain,
    })),
    gridPoints,
    changed,
    converged,
    settledByTime: value.byTime,
  };
}

/** The control over one cycle, V: at the start of each step, and at its end. */
export function controlOver(control: Lfo, points: number): { starts: Float64Array; ends: Float64Array } {
  const numbers = compileOscillator(control, control.rateHz * points);
  const starts = new Float64Array(points);
  runOscillator(numbers.shape, oscillatorValues(numbers), new Float64Array(1), starts, 0, points);
  return { starts, ends: Float64Array.from({ length: points }, (_, i) => starts[(i + 1) % points]) };
}
