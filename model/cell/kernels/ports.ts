/**
 * The two ports of a FET when a gate junction conducts.
 *
 * Law      with overdrives s and d of the two ends, channel current I = F(s) − F(d) and junction currents S, D above the reverse current,
 *          s = a + aI·I + aS·S + aD·D  and  d = b + bI·I + bS·S + bD·D
 * Scheme   Newton on (s, d) with exact derivatives and steps into a junction shortened to its logarithm; if that has not settled in 40 steps,
 *          nested bisection, which always does for one FET and 0 ≤ k ≤ 1, where the equations are monotonic; where they are not (γ < 0), Newton along a
 *          path from where nothing conducts, in steps as short as it takes
 * Error    Newton stops at a step under 1e-11 V, where the next would be under 1e-20 V
 * Source   damping of the exponential: Nagel, UCB/ERL M520 (1975), from memory
 */
import { exp } from '../../device/math.ts';
import { channelA, evaluate } from './channel.ts';
import * as L from './layout.ts';

const NEWTON_STEPS = 40;
const SETTLED_V = 1e-11;
/** Of the voltages that would stand there without junctions, what sums of them cannot tell from nothing. */
const ROUNDING = 1e-15;

/**
 * Writes channel current, junction currents and overdrives into the slots of `s` from `n` on, beginning where an end last conducted, or just into
 * conduction. Allocates nothing.
 */
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
  s[n + L.OVERDRIVE_S] = Math.min(freeS, s[n + L.OVERDRIVE_S] > c[device + L.ON_V] ? s[n + L.OVERDRIVE_S] : c[device + L.KNEE_S]);
  s[n + L.OVERDRIVE_D] = Math.min(freeD, s[n + L.OVERDRIVE_D] > c[device + L.ON_V] ? s[n + L.OVERDRIVE_D] : c[device + L.KNEE_D]);
  for (let step = 0; step < NEWTON_STEPS; step++) {
    newtonStep(c, t, device, aI, bI, junction, s, n, a, b);
    if (s[n + L.MOVED_V] < SETTLED_V) {
      currents(c, t, device, s, n);
      return;
    }
  }
  s[n + L.FALLBACKS] += 1;
  const isMonotonic = c[aI] <= 0 && c[bI] >= 0;
  if (isMonotonic || !walk(c, t, device, aI, bI, junction, s, n, a, b)) bisect(c, t, device, aI, bI, junction, s, n, a, b);
  currents(c, t, device, s, n);
}

const SHORTEST_STRIDE = 1e-7;

/** Follows the solution from where nothing conducts to (a, b). False where the path turns back. */
function walk(
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
): boolean {
  const fromS = Math.min(a, 0);
  const fromD = Math.min(b, 0);
  let reachedS = fromS;
  let reachedD = fromD;
  let done = 0;
  let stride = 1 / 16;
  while (done < 1) {
    const next = Math.min(1, done + stride);
    s[n + L.OVERDRIVE_S] = reachedS;
    s[n + L.OVERDRIVE_D] = reachedD;
    for (let step = 0; step < NEWTON_STEPS; step++) {
      newtonStep(c, t, device, aI, bI, junction, s, n, fromS + next * (a - fromS), fromD + next * (b - fromD));
      if (s[n + L.MOVED_V] < SETTLED_V) break;
    }
    if (s[n + L.MOVED_V] < SETTLED_V) {
      done = next;
      stride *= 2;
      reachedS = s[n + L.OVERDRIVE_S];
      reachedD = s[n + L.OVERDRIVE_D];
    } else {
      stride /= 4;
      if (stride < SHORTEST_STRIDE) return false;
    }
  }
  return true;
}

/** One damped step of both overdrives; the larger change, less rounding, V, goes into a slot (Infinity when it is not a number). */
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
  const rate = c[device + L.INVERSE_NVT];
  const lambda = c[device + L.LAMBDA];
  const past = lambda * Math.max(-vd, 0);
  const pastReversed = lambda * Math.max(-vs, 0);
  evaluate(c, t, device, vs, s, n + L.TERM_S);
  evaluate(c, t, device, vd, s, n + L.TERM_D);
  const Fs = s[n + L.TERM_S];
  const Fd = s[n + L.TERM_D];
  const channel = Fs * (1 + past) - Fd * (1 + pastReversed);
  const clampA = clampCurrent(c, device, vs);
  const S = junctionCurrent(c, device, vs) + clampA;
  const D = junctionCurrent(c, device, vd);
  const aS = c[junction + L.BY_S];
  const aD = c[junction + L.BY_D];
  const bS = c[junction + L.JUNCTION_WIDTH + L.BY_S];
  const bD = c[junction + L.JUNCTION_WIDTH + L.BY_D];
  const fs = s[n + L.TERM_S + 1] * (1 + past) + (pastReversed > 0 ? lambda * Fd : 0);
  const fd = s[n + L.TERM_D + 1] * (1 + pastReversed) + (past > 0 ? lambda * Fs : 0);
  const slopeS = (S - clampA) * rate + clampA * c[device + L.CLAMP_INVERSE_NVT];
  const rs = vs - a - c[aI] * channel - aS * S - aD * D;
  const rd = vd - b - c[bI] * channel - bS * S - bD * D;
  const ss = 1 - c[aI] * fs - aS * slopeS;
  const sd = c[aI] * fd - aD * D * rate;
  const ds = -c[bI] * fs - bS * slopeS;
  const dd = 1 + c[bI] * fd - bD * D * rate;
  const determinant = ss * dd - sd * ds;
  const stepS = shortened((sd * rd - dd * rs) / determinant, vs, c[device + L.KNEE_S], c[device + L.ON_V], c[device + L.FIRST_INVERSE_NVT]);
  const stepD = shortened((ds * rs - ss * rd) / determinant, vd, c[device + L.KNEE_D], c[device + L.JUNCTION_ON_V], rate);
  const change = Math.max(Math.abs(stepS), Math.abs(stepD));
  const isNumber = change < Number.POSITIVE_INFINITY;
  s[n + L.MOVED_V] = isNumber ? change - ROUNDING * (Math.abs(a) + Math.abs(b)) : Number.POSITIVE_INFINITY;
  if (!isNumber) return;
  s[n + L.OVERDRIVE_S] = vs + stepS;
  s[n + L.OVERDRIVE_D] = vd + stepD;
}

/** A step up into conduction is cut to its logarithm, so that the exponential cannot run away. */
function shortened(step: number, v: number, knee: number, on: number, rate: number): number {
  const x = step * rate;
  if (x <= 2 || v < on) return x > 2 && v + step > knee ? knee - v : step;
  return (2 + x / (1 + 0.1 * x)) / rate;
}

/** Current of a junction above its reverse current, A, at the overdrive `v`; nothing below the threshold at which it is under 5e-5 of that. */
function junctionCurrent(c: Float64Array, device: number, v: number): number {
  if (!(v > c[device + L.JUNCTION_ON_V])) return 0;
  return c[device + L.REVERSE_A] * exp((v + c[device + L.GATE_OFF_V]) * c[device + L.INVERSE_NVT]);
}

/** The same of the clamp. */
function clampCurrent(c: Float64Array, device: number, v: number): number {
  if (!(v > c[device + L.CLAMP_ON_V])) return 0;
  return c[device + L.CLAMP_A] * exp((v + c[device + L.GATE_OFF_V]) * c[device + L.CLAMP_INVERSE_NVT]);
}

function currents(c: Float64Array, t: Float64Array, device: number, s: Float64Array, n: number): void {
  const vs = s[n + L.OVERDRIVE_S];
  const vd = s[n + L.OVERDRIVE_D];
  const lambda = c[device + L.LAMBDA];
  evaluate(c, t, device, vs, s, n + L.TERM_S);
  evaluate(c, t, device, vd, s, n + L.TERM_D);
  s[n + L.CHANNEL_A] = s[n + L.TERM_S] * (1 + lambda * Math.max(-vd, 0)) - s[n + L.TERM_D] * (1 + lambda * Math.max(-vs, 0));
  s[n + L.JUNCTION_S] = junctionCurrent(c, device, vs) + clampCurrent(c, device, vs);
  s[n + L.JUNCTION_D] = junctionCurrent(c, device, vd);
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
  vs: number,
  vd: number,
): number {
  const channel = channelA(c, t, device, vs, vd);
  return (
    own -
    free -
    perA * channel -
    perS * (junctionCurrent(c, device, vs) + clampCurrent(c, device, vs)) -
    perD * junctionCurrent(c, device, vd)
  );
}

/** Nested bisection between brackets that are widened until they hold the solution; writes the overdrives. For `conduct`, and for the test of it. */
export function bisect(
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
  const farthest = farthestV(a, b);
  let low = -1;
  let high = 1;
  while (outerResidual(c, t, device, aI, bI, junction, a, b, low) > 0 && low > -farthest) low *= 2;
  while (outerResidual(c, t, device, aI, bI, junction, a, b, high) < 0 && high < farthest) high *= 2;
  for (let step = 0; step < 200; step++) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) break;
    if (outerResidual(c, t, device, aI, bI, junction, a, b, middle) > 0) high = middle;
    else low = middle;
  }
  s[n + L.OVERDRIVE_S] = (low + high) / 2;
  s[n + L.OVERDRIVE_D] = innerOverdrive(c, t, device, bI, junction, a, b, (low + high) / 2);
}

/** Junctions and channel only draw from what stands there without them. */
function farthestV(a: number, b: number): number {
  return 4 * (1 + Math.abs(a) + Math.abs(b));
}

/** The source end's equation, with the drain end solved for it: rises with `vs`. */
function outerResidual(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  a: number,
  b: number,
  vs: number,
): number {
  const vd = innerOverdrive(c, t, device, bI, junction, a, b, vs);
  return residual(vs, a, c[aI], c[junction + L.BY_S], c[junction + L.BY_D], c, t, device, vs, vd);
}

/** The drain end's overdrive that satisfies its own equation for a given source end. */
function innerOverdrive(
  c: Float64Array,
  t: Float64Array,
  device: number,
  bI: number,
  junction: number,
  a: number,
  b: number,
  vs: number,
): number {
  const bS = c[junction + L.JUNCTION_WIDTH + L.BY_S];
  const bD = c[junction + L.JUNCTION_WIDTH + L.BY_D];
  const farthest = farthestV(a, b);
  let low = -1;
  let high = 1;
  while (residual(low, b, c[bI], bS, bD, c, t, device, vs, low) > 0 && low > -farthest) low *= 2;
  while (residual(high, b, c[bI], bS, bD, c, t, device, vs, high) < 0 && high < farthest) high *= 2;
  for (let step = 0; step < 200; step++) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) break;
    if (residual(middle, b, c[bI], bS, bD, c, t, device, vs, middle) > 0) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}
