/**
 * A period of the cell's output after the make-up amplifier.
 *
 * Scheme   the amplifier is driven with the period again and again until its output repeats
 * Error    second order in the grid; where slew or swing cut, one step of the grid at each corner, which the reading's doubling sees
 */
import { amplifierValues, createAmplifierState, isIdeal, processAmplifier } from '../chain/amplifier.ts';
import { GAIN, OUTPUT_V, SWING_V } from '../chain/limits.ts';
import type { Output } from '../design/types.ts';

const MOST_PERIODS = 2000;
const REPEATS = 1e-12;

/** `period` is one period at `rateHz`, V. `settled` is false where the output had not come to repeat itself. */
export function amplifiedPeriod(output: Output, period: Float64Array, rateHz: number): { period: Float64Array; settled: boolean } {
  const values = amplifierValues(output, rateHz);
  if (isIdeal(output)) return { period: period.map((v) => v * values[GAIN]), settled: true };
  const state = createAmplifierState();
  const amplified = new Float64Array(period.length);
  for (let turn = 0; turn < MOST_PERIODS; turn++) {
    const before = state[OUTPUT_V];
    amplified.set(period);
    processAmplifier(values, state, amplified, 0, amplified.length);
    if (turn > 0 && Math.abs(state[OUTPUT_V] - before) <= REPEATS * (Math.abs(before) + 1e-6)) return { period: amplified, settled: true };
  }
  return { period: amplified, settled: false };
}

/** A steady voltage after the amplifier, V. */
export function amplifiedDcV(output: Output, v: number): number {
  const values = amplifierValues(output, 1);
  return Math.min(values[SWING_V], Math.max(-values[SWING_V], v * values[GAIN]));
}
