/**
 * The two ports of a FET when a gate junction conducts.
 *
 * Law      with overdrives s and d of the two ends, channel current I = F(s) − F(d) and junction currents S, D above the reverse current,
 *          s = a + aI·I + aS·S + aD·D  and  d = b + bI·I + bS·S + bD·D
 * Scheme   Newton on (s, d) with exact derivatives and steps into a junction shortened to its logarithm; if that has not settled in 40 steps,
 *          nested bisection, which always does: for one FET and 0 ≤ k ≤ 1 the equations are monotonic
 * Error    Newton stops at a step under 1e-11 V, where the next would be under 1e-20 V
 * Source   damping of the exponential: Nagel, UCB/ERL M520 (1975), from memory
 */
import { exp } from '../../device/math.ts';
import { channelA, evaluate } from './channel.ts';
import { addGraded, keepCharge } from './graded.ts';
import * as L from './layout.ts';

const NEWTON_STEPS = 40;
const SETTLED_V = 1e-11;

/** Writes channel current, junction currents and overdrives into the slots of `s` from `n` on. Allocates nothing. */
export function conduct(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
  a: number,
  b: number,
  freeA: number,
): void {
  const freeS = a + c[aI] * freeA;
  const freeD = b + c[bI] * freeA;
  const knee = c[device + L.ON_V] + 20 / c[device + L.INVERSE_NVT];
  s[n + L.OVERDRIVE_S] = freeS < knee ? freeS : Math.min(freeS, Math.max(s[n + L.OVERDRIVE_S], knee));
  s[n + L.OVERDRIVE_D] = freeD < knee ? freeD : Math.min(freeD, Math.max(s[n + L.OVERDRIVE_D], knee));
  for (let step = 0; step < NEWTON_STEPS; step++) {
    newtonStep(c, t, device, aI, bI, junction, s, n, a, b);
    if (s[n + L.MOVED_V] < SETTLED_V) {
      currents(c, t, device, s, n);
      return;
    }
  }
  bisect(c, t, device, aI, bI, junction, s, n, a, b);
  currents(c, t, device, s, n);
}

/** One damped step of both overdrives; the larger change, V, goes into a slot (Infinity when it is not a number). */
function newtonStep(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
  a: number,
  b: number,
): void {
  const vs = s[n + L.OVERDRIVE_S];
  const vd = s[n + L.OVERDRIVE_D];
  const lambda = c[device + L.LAMBDA];
  const past = lambda * Math.max(-vd, 0);
  const pastReversed = lambda * Math.max(-vs, 0);
  evaluate(c, t, device, vs, s, n + L.TERM_S);
  evaluate(c, t, device, vd, s, n + L.TERM_D);
  const Fs = s[n + L.TERM_S];
  const Fd = s[n + L.TERM_D];
  const channel = Fs * (1 + past) - Fd * (1 + pastReversed);
  gatePorts(c, device, s, n, vs, vd);
  const S = s[n + L.PORT_S];
  const D = s[n + L.PORT_D];
  const slopeS = s[n + L.PORT_S + 1];
  const slopeD = s[n + L.PORT_D + 1];
  const aS = c[junction + L.BY_S];
  const aD = c[junction + L.BY_D];
  const bS = c[junction + L.JUNCTION_WIDTH + L.BY_S];
  const bD = c[junction + L.JUNCTION_WIDTH + L.BY_D];
  const fs = s[n + L.TERM_S + 1] * (1 + past) + (pastReversed > 0 ? lambda * Fd : 0);
  const fd = s[n + L.TERM_D + 1] * (1 + pastReversed) + (past > 0 ? lambda * Fs : 0);
  const rs = vs - a - c[aI] * channel - aS * S - aD * D;
  const rd = vd - b - c[bI] * channel - bS * S - bD * D;
  const ss = 1 - c[aI] * fs - aS * slopeS;
  const sd = c[aI] * fd - aD * slopeD;
  const ds = -c[bI] * fs - bS * slopeS;
  const dd = 1 + c[bI] * fd - bD * slopeD;
  const determinant = ss * dd - sd * ds;
  const stepS = shortened((sd * rd - dd * rs) / determinant, vs, c, device);
  const stepD = shortened((ds * rs - ss * rd) / determinant, vd, c, device);
  const change = Math.max(Math.abs(stepS), Math.abs(stepD));
  const isNumber = change < Number.POSITIVE_INFINITY;
  s[n + L.MOVED_V] = isNumber ? change : Number.POSITIVE_INFINITY;
  if (!isNumber) return;
  s[n + L.OVERDRIVE_S] = vs + stepS;
  s[n + L.OVERDRIVE_D] = vd + stepD;
}

/** A step up into conduction is cut to its logarithm, so that the exponential cannot run away. */
function shortened(step: number, v: number, c: Float64Array, device: number): number {
  const rate = c[device + L.INVERSE_NVT];
  const x = step * rate;
  if (x <= 2 || v < c[device + L.ON_V])
    return x > 2 && v + step > c[device + L.ON_V] + 20 / rate ? c[device + L.ON_V] + 20 / rate - v : step;
  return (2 + x / (1 + 0.1 * x)) / rate;
}

/** Currents of the gate's ports above the reverse currents, A, and their slopes, S, into slots: junction, clamp, graded capacitance. */
function gatePorts(c: Float64Array, device: number, s: Float64Array, n: number, vs: number, vd: number): void {
  const offV = c[device + L.GATE_OFF_V];
  const rate = c[device + L.INVERSE_NVT];
  const S = vs > c[device + L.JUNCTION_ON_V] ? c[device + L.REVERSE_A] * exp((vs + offV) * rate) : 0;
  const D = vd > c[device + L.JUNCTION_ON_V] ? c[device + L.REVERSE_A] * exp((vd + offV) * rate) : 0;
  const clampRate = c[device + L.CLAMP_INVERSE_NVT];
  const clampA = vs > c[device + L.CLAMP_ON_V] ? c[device + L.CLAMP_A] * exp((vs + offV) * clampRate) : 0;
  s[n + L.PORT_S] = S + clampA;
  s[n + L.PORT_S + 1] = S * rate + clampA * clampRate;
  s[n + L.PORT_D] = D;
  s[n + L.PORT_D + 1] = D * rate;
  if (c[device + L.GRADING] === 0) return;
  addGraded(c, device, vs, c[device + L.STEP_S], s, n + L.CHARGES_S, n + L.PORT_S);
  addGraded(c, device, vd, c[device + L.STEP_D], s, n + L.CHARGES_D, n + L.PORT_D);
}

function currents(c: Float64Array, t: Float64Array, device: number, s: Float64Array, n: number): void {
  const vs = s[n + L.OVERDRIVE_S];
  const vd = s[n + L.OVERDRIVE_D];
  const lambda = c[device + L.LAMBDA];
  evaluate(c, t, device, vs, s, n + L.TERM_S);
  evaluate(c, t, device, vd, s, n + L.TERM_D);
  s[n + L.CHANNEL_A] = s[n + L.TERM_S] * (1 + lambda * Math.max(-vd, 0)) - s[n + L.TERM_D] * (1 + lambda * Math.max(-vs, 0));
  gatePorts(c, device, s, n, vs, vd);
  s[n + L.JUNCTION_S] = s[n + L.PORT_S];
  s[n + L.JUNCTION_D] = s[n + L.PORT_D];
  if (c[device + L.GRADING] === 0) return;
  keepCharge(c, device, vs, s, n + L.CHARGES_S);
  keepCharge(c, device, vd, s, n + L.CHARGES_D);
}

function residual(
  own: number,
  free: number,
  perA: number,
  perS: number,
  perD: number,
  c: Float64Array,
  t: Float64Array,
  device: number,
  s: Float64Array,
  n: number,
  vs: number,
  vd: number,
): number {
  gatePorts(c, device, s, n, vs, vd);
  return own - free - perA * channelA(c, t, device, vs, vd) - perS * s[n + L.PORT_S] - perD * s[n + L.PORT_D];
}

/** Nested bisection between brackets that are widened until they hold the solution. */
function bisect(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
  a: number,
  b: number,
): void {
  let low = -1;
  let high = 1;
  while (outerResidual(c, t, device, aI, bI, junction, s, n, a, b, low) > 0 && low > -1e12) low *= 2;
  while (outerResidual(c, t, device, aI, bI, junction, s, n, a, b, high) < 0 && high < 1e12) high *= 2;
  for (let step = 0; step < 200; step++) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) break;
    if (outerResidual(c, t, device, aI, bI, junction, s, n, a, b, middle) > 0) high = middle;
    else low = middle;
  }
  s[n + L.OVERDRIVE_S] = (low + high) / 2;
  s[n + L.OVERDRIVE_D] = innerOverdrive(c, t, device, bI, junction, s, n, b, (low + high) / 2);
  s[n + L.FALLBACKS] += 1;
}

/** The source end's equation, with the drain end solved for it: rises with `vs`. */
function outerResidual(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
  a: number,
  b: number,
  vs: number,
): number {
  const vd = innerOverdrive(c, t, device, bI, junction, s, n, b, vs);
  return residual(vs, a, c[aI], c[junction + L.BY_S], c[junction + L.BY_D], c, t, device, s, n, vs, vd);
}

/** The drain end's overdrive that satisfies its own equation for a given source end. */
function innerOverdrive(
  c: Float64Array,
  t: Float64Array,
  device: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
  b: number,
  vs: number,
): number {
  const bS = c[junction + L.JUNCTION_WIDTH + L.BY_S];
  const bD = c[junction + L.JUNCTION_WIDTH + L.BY_D];
  let low = -1;
  let high = 1;
  while (residual(low, b, c[bI], bS, bD, c, t, device, s, n, vs, low) > 0 && low > -1e12) low *= 2;
  while (residual(high, b, c[bI], bS, bD, c, t, device, s, n, vs, high) < 0 && high < 1e12) high *= 2;
  for (let step = 0; step < 200; step++) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) break;
    if (residual(middle, b, c[bI], bS, bD, c, t, device, s, n, vs, middle) > 0) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}
