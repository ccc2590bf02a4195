/**
 * The make-up amplifier, advanced at the cell's rate.
 *
 * Law      dy/dt = ω·(G·x − y), no faster than the slew rate, y within the swing;  ω = 2π·GBW/max(G, 1)
 * Scheme   trapezoidal, then the step and the result are limited
 * Error    a limit sets in at a sample: slewing at 9 kHz and 384 kHz steps errs by −20 dB and folds −34 dB, clipping folds −63 dB
 * Source   one-pole amplifier with gain-bandwidth product and slew rate, textbook
 */
import type { Output } from '../design/types.ts';
import { ratioFromDb } from '../device/math.ts';

const TURN = 6.283185307179586;
/** Stands for no limit: values move along straight lines, which infinity cannot. */
const NO_LIMIT = 1e30;

export const GAIN = 0;
/** ω·h/2. */
export const POLE = 1;
/** Largest step, V. */
export const STEP_V = 2;
export const SWING_V = 3;

export function isIdeal(output: Output): boolean {
  return output.gainBandwidthHz === null && output.slewVPerSec === null && output.swingV === null;
}

/** Which limits there are, in words: between two amplifiers with the same ones values can move. */
export function limitsOf({ gainBandwidthHz, slewVPerSec, swingV }: Output): string {
  const names = [gainBandwidthHz !== null && 'bandwidth', slewVPerSec !== null && 'slew', swingV !== null && 'swing'];
  return `amplifier ${names.filter(Boolean).join(' ') || 'ideal'}`;
}

/** Movable values at `rateHz` steps a second. */
export function amplifierValues(output: Output, rateHz: number): Float64Array {
  const gain = ratioFromDb(output.gainDb);
  const pole = output.gainBandwidthHz === null ? NO_LIMIT : (0.5 * TURN * output.gainBandwidthHz) / (Math.max(gain, 1) * rateHz);
  return Float64Array.of(gain, pole, output.slewVPerSec === null ? NO_LIMIT : output.slewVPerSec / rateHz, output.swingV ?? NO_LIMIT);
}

/** State: last driven value G·x and last output, V. */
export function createAmplifierState(): Float64Array {
  return new Float64Array(2);
}

/** Amplifies `signal` in place, V. */
export function processAmplifier(values: Float64Array, state: Float64Array, signal: Float64Array, from: number, to: number): void {
  const gain = values[GAIN];
  const pole = values[POLE];
  const stepV = values[STEP_V];
  const swingV = values[SWING_V];
  let driven = state[0];
  let y = state[1];
  for (let i = from; i < to; i++) {
    const next = gain * signal[i];
    const linear = pole > 1e6 ? next : (y + pole * (driven - y + next)) / (1 + pole);
    const step = Math.min(stepV, Math.max(-stepV, linear - y));
    y = Math.min(swingV, Math.max(-swingV, y + step));
    driven = next;
    signal[i] = y;
  }
  state[0] = driven;
  state[1] = y;
}
