/**
 * What the control does by itself over one period: the gate and the drain with no audio.
 *
 * Scheme   the cell's periodic state under the control alone, on an even grid of the period
 * Error    second order in the grid where a coupling capacitor shapes the gate
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
  const rateHz = points / (periodSec || FIXED_PERIOD_SEC);
  const numbers = compileOscillator(control, rateHz);
  const controlV = new Float64Array(points);
  runOscillator(numbers.shape, oscillatorValues(numbers), new Float64Array(1), controlV, 0, points);
  const next = Float64Array.from({ length: points }, (_, i) => controlV[(i + 1) % points]);
  const cell = createCell(cellNumbers(design, variantIndex, 0), 1 / rateHz);
  const period = periodOf(cell, new Float64Array(points), next);
  const sign = device.channel === 'n' ? 1 : -1;
  const { gateOffV } = lawConstants(device, design.tempC);
  return { periodSec, controlV, gateV: period.sourceOverdrive.map((v) => sign * (v + gateOffV)), drainV: period.output };
}
