/**
 * What the control does by itself over one period: the gate and the drain with no audio.
 *
 * Scheme   the cell's periodic state under the control alone, on an even grid of the period and on one twice as fine, which is the one returned
 * Error    `errorV`: the largest difference between the two; where the control has corners what is left there is about as much
 */
import { createCell } from '../cell/cell.ts';
import { cellNumbers, deviceOf, variantAt } from '../cell/fromDesign.ts';
import { compileOscillator, oscillatorValues, runOscillator } from '../control/oscillator.ts';
import type { Design } from '../design/types.ts';
import { lawConstants } from '../device/law.ts';
import { periodOf } from './steady.ts';

/** One period; every array holds `points` values at even times from its start. V. */
export interface ControlSwing {
  /** Zero for a control that does not move. */
  readonly periodSec: number;
  readonly controlV: Float64Array;
  readonly gateV: Float64Array;
  readonly drainV: Float64Array;
  readonly errorV: number;
}

const FIXED_PERIOD_SEC = 1;

/**
 * Throws a RangeError for a control without a period of its own (envelope, external), or a cell that cannot be computed.
 * The oscillator is at the start of its period at index 0.
 */
export function controlSwing(design: Design, variantIndex: number, points: number): ControlSwing {
  const variant = variantAt(design, variantIndex);
  const { control } = variant;
  const device = deviceOf(variant, 0);
  const periodSec = control.source === 'lfo' ? 1 / control.rateHz : 0;
  const on = (size: number) => {
    const rateHz = size / (periodSec || FIXED_PERIOD_SEC);
    const numbers = compileOscillator(control, rateHz);
    const controlV = new Float64Array(size);
    runOscillator(numbers.shape, oscillatorValues(numbers), new Float64Array(1), controlV, 0, size);
    const next = Float64Array.from({ length: size }, (_, i) => controlV[(i + 1) % size]);
    return { controlV, ...periodOf(createCell(cellNumbers(design, variantIndex, 0), 1 / rateHz), new Float64Array(size), next) };
  };
  const coarse = on(points);
  const fine = on(2 * points);
  const everyOther = (values: Float64Array) => values.filter((_, i) => i % 2 === 0);
  const overdriveV = everyOther(fine.sourceOverdrive);
  const drainV = everyOther(fine.output);
  const sign = device.channel === 'n' ? 1 : -1;
  const { gateOffV } = lawConstants(device, design.tempC);
  return {
    periodSec,
    controlV: everyOther(fine.controlV),
    gateV: overdriveV.map((v) => sign * (v + gateOffV)),
    drainV,
    errorV: Math.max(farthest(overdriveV, coarse.sourceOverdrive), farthest(drainV, coarse.output)),
  };
}

function farthest(a: Float64Array, b: Float64Array): number {
  return a.reduce((most, v, i) => Math.max(most, Math.abs(v - b[i])), 0);
}
