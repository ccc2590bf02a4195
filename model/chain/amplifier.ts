/**
 * The make-up amplifier, advanced at the cell's rate.
 *
 * Law      dy/dt = ω·(G·x − y), no faster than the slew rate, y within the swing;  ω = 2π·GBW/max(G, 1)
 * Scheme   G·x runs along a parabola through its last three samples: exact for that, with the instants at which a limit sets in or lets go found
 *          between samples (limits.ts), and what kinks there marked for kinks.ts to soften
 * Error    at 384 kHz steps, whole and folded, 5 V driven at 5 and 9 kHz (test/model/chain/amplifier.test.ts): cut at 3 V −114 and −119, −101 and −105 dB;
 *          slewing at 0.1 V/µs −92 and −101, −76 and −81 dB. A pole alone errs by (2πfh)³/24 of what it takes away: −92 dB at 5 kHz for 100 kHz
 * Source   one-pole amplifier with gain-bandwidth product and slew rate, textbook
 */
import type { Output } from '../design/types.ts';
import { ratioFromDb } from '../device/math.ts';
import * as L from './limits.ts';

const TURN = 6.283185307179586;
/** Stands for no limit: values move along straight lines, which infinity cannot. */
const NO_LIMIT = 1e30;
const NOTHING = new Float64Array(0);

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
  const pole = output.gainBandwidthHz === null ? NO_LIMIT : (TURN * output.gainBandwidthHz) / (Math.max(gain, 1) * rateHz);
  return Float64Array.of(gain, pole, output.slewVPerSec === null ? NO_LIMIT : output.slewVPerSec / rateHz, output.swingV ?? NO_LIMIT);
}

/** At rest: all zero. `OUTPUT_V` of limits.ts is the last output. */
export function createAmplifierState(): Float64Array {
  return new Float64Array(L.AMPLIFIER_SLOTS);
}

/** Amplifies `signal` in place, V; `kinks` is a list as cell/kernels/kinks.ts has it, or left out. Allocates nothing. */
export function processAmplifier(
  values: Float64Array,
  state: Float64Array,
  signal: Float64Array,
  from: number,
  to: number,
  kinks: Float64Array = NOTHING,
): void {
  const gain = values[L.GAIN];
  const pole = values[L.POLE];
  const stepV = values[L.STEP_V];
  const swingV = values[L.SWING_V];
  const follows = pole >= L.AT_ONCE;
  state[L.WHOLE_STEP] = pole;
  L.weigh(state, L.WHOLE_STEP);
  const kept = follows ? 0 : state[L.WHOLE_STEP];
  const byDriven = follows ? 1 : state[L.WHOLE_STEP + 1];
  const byRise = follows ? 1 : state[L.WHOLE_STEP + 2];
  const byBend = follows ? 1 : state[L.WHOLE_STEP + 3];
  let earlier = state[L.EARLIER_V];
  let driven = state[L.DRIVEN_V];
  let y = state[L.OUTPUT_V];
  for (let i = from; i < to; i++) {
    const next = gain * signal[i];
    const rise = 0.5 * (next - earlier);
    const bend = 0.5 * (next + earlier) - driven;
    const free = kept * y + byDriven * driven + byRise * rise + byBend * bend;
    const rate = follows ? rise + 2 * bend : pole * (next - free);
    if (state[L.MODE] === 0 && free <= swingV && free >= -swingV && rate <= stepV && rate >= -stepV) y = free;
    else if (next - next !== 0) y = next;
    else {
      state[L.DRIVEN_V] = driven;
      state[L.RISE_V] = rise;
      state[L.BEND_V] = bend;
      state[L.OUTPUT_V] = y;
      L.advanceLimited(values, state, kinks, i);
      y = state[L.OUTPUT_V];
    }
    earlier = driven;
    driven = next;
    signal[i] = y;
  }
  state[L.EARLIER_V] = earlier;
  state[L.DRIVEN_V] = driven;
  state[L.OUTPUT_V] = y;
}
