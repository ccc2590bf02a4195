/**
 * Envelope follower: rectifier, attack resistor, timing capacitor with the release resistor across it, then an amplifier with bias and clamp.
 *
 * Law      C·de/dt = max(r − e, 0)/Ra − e/Rr, r the rectified voltage;  vC = rest + gain·max(e − threshold, 0), no further than the limit
 * Scheme   trapezoidal; the equation for the new e is piecewise linear and monotonic, so it is solved exactly
 * Error    global O(h²) in smooth stretches; a corner of the rectifier costs O(h²) once
 */
import type { Control } from '../design/types.ts';

type Envelope = Extract<Control, { source: 'envelope' }>;

/** Movable values of a follower, by place. */
export const REST_V = 0;
export const LIMIT_V = 1;
export const THRESHOLD_V = 2;
export const GAIN = 3;
/** Half a step over Ra·C and over Rr·C. */
export const ATTACK = 4;
export const RELEASE = 5;

/** Values for `rateHz` steps a second. */
export function followerValues(control: Envelope, rateHz: number): Float64Array {
  const { restV, limitV, thresholdV, gainVPerV, attackOhm, releaseOhm, timingF } = control;
  const half = 0.5 / rateHz;
  return Float64Array.of(restV, limitV, thresholdV, gainVPerV, half / (attackOhm * timingF), half / (releaseOhm * timingF));
}

/** Memory of a follower, by place: envelope and rectified voltage of the last sample, V; what is heard now; the envelope and control that it gives. */
export const ENVELOPE = 0;
export const RECTIFIED = 1;
export const HEARD = 2;
export const NEXT_ENVELOPE = 3;
export const NEXT_CONTROL_V = 4;
export const FOLLOWER_SLOTS = 5;

/** Envelope and control voltage that the sample in HEARD gives, into the slots after it. A step is only taken by `keepStep`. */
export function follow(values: Float64Array, slots: Float64Array): void {
  const attack = values[ATTACK];
  const release = values[RELEASE];
  const envelope = slots[ENVELOPE];
  const heard = slots[HEARD];
  const explicit = envelope * (1 - release) + attack * Math.max(slots[RECTIFIED] - envelope, 0);
  const charged = (explicit + attack * heard) / (1 + attack + release);
  const next = charged < heard ? charged : explicit / (1 + release);
  const rest = values[REST_V];
  const limit = values[LIMIT_V];
  const moved = rest + values[GAIN] * Math.max(next - values[THRESHOLD_V], 0);
  slots[NEXT_ENVELOPE] = next;
  slots[NEXT_CONTROL_V] = limit > rest ? Math.min(moved, limit) : Math.max(moved, limit);
}

/** Takes the step that `follow` has worked out. */
export function keepStep(slots: Float64Array): void {
  slots[ENVELOPE] = slots[NEXT_ENVELOPE];
  slots[RECTIFIED] = slots[HEARD];
}

/** Time constants of attack and release, s. */
export function followerTimesSec({ attackOhm, releaseOhm, timingF }: Envelope): { attackSec: number; releaseSec: number } {
  return { attackSec: attackOhm * timingF, releaseSec: releaseOhm * timingF };
}
