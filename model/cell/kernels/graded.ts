/**
 * What a gate junction's capacitance differs from its value at 0 V, as a current.
 *
 * Law      C(v) = C0/(1 − v/φ)^m up to v = φ/2, along its tangent beyond; the charge above C0·v is q(v) = ∫(C − C0)dv
 * Scheme   the backward difference that the circuit's picofarads have (reduce.ts), on charge, so that none is lost
 * Source   abrupt and graded junctions: textbook; the tangent beyond half the barrier is common practice, no source
 */
import { power } from '../../device/math.ts';
import * as L from './layout.ts';

/** Newest, then past ones, of the backward difference in reduce.ts. */
export const NEWEST = 47 / 24;
const PAST_1 = 7 / 2;
const PAST_2 = -9 / 4;
const PAST_3 = 5 / 6;
const PAST_4 = -1 / 8;

/** q/C0, V, and C/C0 − 1 at the junction's voltage, into `out[at]` and `out[at + 1]`. */
export function deviation(m: number, barrierV: number, v: number, out: Float64Array, at: number): void {
  const knee = barrierV / 2;
  const x = 1 - Math.min(v, knee) / barrierV;
  const xm = m === 0.5 ? Math.sqrt(x) : power(x, m);
  const past = Math.max(v - knee, 0);
  const kneeC = 1 / xm;
  const rise = (kneeC * m) / (x * barrierV);
  out[at] = (barrierV / (1 - m)) * (1 - x / xm) - Math.min(v, knee) + (kneeC - 1) * past + 0.5 * rise * past * past;
  out[at + 1] = kneeC - 1 + rise * past;
}

/** Current and slope of one junction into `s[at]`, `s[at + 1]`; `charges` is where its four past q/C0 stand in `s`. */
export function addGraded(
  c: Float64Array,
  device: number,
  overV: number,
  perStepS: number,
  s: Float64Array,
  charges: number,
  at: number,
): void {
  const scratch = charges + 4;
  deviation(c[device + L.GRADING], c[device + L.BARRIER_V], overV + c[device + L.GATE_OFF_V], s, scratch);
  s[at] = perStepS * (NEWEST * s[scratch] - pastCharge(s, charges));
  s[at + 1] = perStepS * NEWEST * s[scratch + 1];
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

/** The charges of both junctions at the sample's solution become the newest of the past ones. */
export function keepCharges(c: Float64Array, device: number, s: Float64Array, n: number): void {
  keepCharge(c, device, s[n + L.OVERDRIVE_S], s, n + L.CHARGES_S);
  keepCharge(c, device, s[n + L.OVERDRIVE_D], s, n + L.CHARGES_D);
}

function keepCharge(c: Float64Array, device: number, overV: number, s: Float64Array, charges: number): void {
  deviation(c[device + L.GRADING], c[device + L.BARRIER_V], overV + c[device + L.GATE_OFF_V], s, charges + 4);
  pushCharge(s, charges);
}

/** All past charges as at rest. */
export function restCharge(c: Float64Array, device: number, overV: number, s: Float64Array, charges: number): void {
  deviation(c[device + L.GRADING], c[device + L.BARRIER_V], overV + c[device + L.GATE_OFF_V], s, charges + 4);
  for (let k = 0; k < 4; k++) s[charges + k] = s[charges + 4];
}
