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

/** The envelope after one step, V, from the envelope and the rectified voltage before it and the rectified voltage after it. */
export function nextEnvelope(values: Float64Array, envelope: number, before: number, after: number): number {
  const attack = values[ATTACK];
  const release = values[RELEASE];
  const explicit = envelope * (1 - release) + attack * Math.max(before - envelope, 0);
  const charged = (explicit + attack * after) / (1 + attack + release);
  return charged < after ? charged : explicit / (1 + release);
}

/** The control voltage at an envelope, V. */
export function followerControlV(values: Float64Array, envelope: number): number {
  const rest = values[REST_V];
  const limit = values[LIMIT_V];
  const moved = rest + values[GAIN] * Math.max(envelope - values[THRESHOLD_V], 0);
  return limit > rest ? Math.min(moved, limit) : Math.max(moved, limit);
}

/** Time constants of attack and release, s. */
export function followerTimesSec({ attackOhm, releaseOhm, timingF }: Envelope): { attackSec: number; releaseSec: number } {
  return { attackSec: attackOhm * timingF, releaseSec: releaseOhm * timingF };
}
