/**
 * What a gate junction's capacitance differs from its value at 0 V, as a current.
 *
 * Law      C(v) = C0/(1 − v/φ)^m up to v = φ/2, along its tangent beyond; the charge above C0·v is q(v) = ∫(C − C0)dv
 * Scheme   the backward difference that the circuit's picofarads have (reduce.ts), on charge, so that none is lost
 * Source   abrupt and graded junctions: textbook; the tangent beyond half the barrier is common practice, no source
 */
import { expAt, logAt } from '../../device/math.ts';
import * as L from './layout.ts';

/** Newest, then past ones, of the backward difference in reduce.ts. */
export const NEWEST = 47 / 24;
const PAST_1 = 7 / 2;
const PAST_2 = -9 / 4;
const PAST_3 = 5 / 6;
const PAST_4 = -1 / 8;

/** q/C0, V, and C/C0 − 1 at the junction's voltage, into `out[at]` and `out[at + 1]`. */
export function deviation(m: number, barrierV: number, v: number, out: Float64Array, at: number): void {
  const c = new Float64Array(L.DEVICE_WIDTH);
  c[L.GRADING] = m;
  c[L.BARRIER_V] = barrierV;
  const s = Float64Array.of(v, 0, 0, 0);
  deviate(c, 0, s, 0);
  out[at] = s[0];
  out[at + 1] = s[1];
}

/** How far the series reaches from where the power was last taken: seven terms leave 1e-16 of it. */
const REACH = 1 / 64;

/**
 * The same from the voltage in `s[at]`, with the constants of the device. The two places after the results remember 1/x and x^−m where the power was
 * last taken whole; near there a series goes on from it.
 */
export function deviate(c: Float64Array, device: number, s: Float64Array, at: number): void {
  const m = c[device + L.GRADING];
  const barrierV = c[device + L.BARRIER_V];
  const v = s[at];
  const knee = 0.5 * barrierV;
  const below = Math.min(v, knee);
  const x = 1 - below / barrierV;
  let ratio = 1;
  if (m === 0.5) ratio = 1 / Math.sqrt(x);
  else {
    const d = x * s[at + 2] - 1;
    if (d < REACH && d > -REACH) {
      const far = 1 - d * (m + 4) * (1 / 5) * (1 - d * (m + 5) * (1 / 6) * (1 - d * (m + 6) * (1 / 7)));
      ratio = s[at + 3] * (1 - d * m * (1 - d * (m + 1) * 0.5 * (1 - d * (m + 2) * (1 / 3) * (1 - d * (m + 3) * 0.25 * far))));
    } else {
      s[at + 2] = 1 / x;
      s[at + 3] = x;
      logAt(s, at + 3);
      s[at + 3] *= -m;
      expAt(s, at + 3);
      ratio = s[at + 3];
    }
  }
  s[at] = (barrierV / (1 - m)) * (1 - x * ratio) - below;
  s[at + 1] = ratio - 1;
  if (v <= knee) return;
  const past = v - knee;
  const rise = (ratio * m) / (x * barrierV);
  s[at] += (ratio - 1 + 0.5 * rise * past) * past;
  s[at + 1] += rise * past;
}

/**
 * Current and slope of one junction into `s[at]`, `s[at + 1]`; `charges` is where its four past q/C0 stand in `s`, then its overdrive, in the place
 * of which q/C0 and C/C0 − 1 are left. `perStep` is the place of C0 over a step among the device's constants.
 */
export function addGraded(c: Float64Array, device: number, perStep: number, s: Float64Array, charges: number, at: number): void {
  const scratch = charges + 4;
  s[scratch] += c[device + L.GATE_OFF_V];
  deviate(c, device, s, scratch);
  s[at] = c[device + perStep] * (NEWEST * s[scratch] - pastCharge(s, charges));
  s[at + 1] = c[device + perStep] * NEWEST * s[scratch + 1];
}

/** What the backward difference takes of the past q/C0 from `charges` on. */
export function pastCharge(s: Float64Array, charges: number): number {
  return PAST_1 * s[charges] + PAST_2 * s[charges + 1] + PAST_3 * s[charges + 2] + PAST_4 * s[charges + 3];
}

/** The q/C0 after the past ones becomes the newest of them. */
export function pushCharge(s: Float64Array, charges: number): void {
  for (let k = 3; k > 0; k--) s[charges + k] = s[charges + k - 1];
  s[charges] = s[charges + 4];
}

/** The charges that `addGraded` left, of both junctions, become the newest of the past ones. */
export function keepCharges(s: Float64Array, n: number): void {
  pushCharge(s, n + L.CHARGES_S);
  pushCharge(s, n + L.CHARGES_D);
}

/** All past charges as at rest, at the overdrive in the slot after them. */
export function restCharge(c: Float64Array, device: number, s: Float64Array, charges: number): void {
  s[charges + 4] += c[device + L.GATE_OFF_V];
  deviate(c, device, s, charges + 4);
  for (let k = 0; k < 4; k++) s[charges + k] = s[charges + 4];
}
