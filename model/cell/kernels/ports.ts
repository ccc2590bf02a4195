/**
 * The two ports of a FET when a gate junction conducts.
 *
 * Law      with overdrives s and d of the two ends, channel current I = F(s) − F(d) and junction currents S, D above the reverse current,
 *          s = a + aI·I + aS·S + aD·D  and  d = b + bI·I + bS·S + bD·D
 * Scheme   the kernels' own solver (source.ts) is Newton on (s, d) with exact derivatives, steps into a junction shortened to its logarithm. Where
 *          that has not settled: nested bisection, which always does for one FET and 0 ≤ k ≤ 1, where the equations are monotonic; where they
 *          are not (γ < 0), Newton along a path from where nothing conducts, in strides as short as it takes
 * Error    Newton stops at a step under a tenth of ENOUGH_V, or lost in the rounding of what would stand there without currents; the currents are carried along that step, so the linear equations hold to rounding
 *          and the junctions' law to half the step's square over (nVT)²: 1e-11 of the current while playing, 1e-17 in readings
 * Source   damping of the exponential: Nagel, UCB/ERL M520 (1975), from memory
 */
import { exp } from '../../device/math.ts';
import { channelA, evaluate } from './channel.ts';
import { addGraded, keepCharges } from './graded.ts';
import * as L from './layout.ts';

/** Currents of the gate's ports above the reverse currents, A, into slots: junction, clamp, graded capacitance. */
function gatePorts(c: Float64Array, device: number, s: Float64Array, n: number, vs: number, vd: number): void {
  const offV = c[device + L.GATE_OFF_V];
  const rate = c[device + L.INVERSE_NVT];
  const S = vs > c[device + L.JUNCTION_ON_V] ? c[device + L.REVERSE_A] * exp((vs + offV) * rate) : 0;
  const D = vd > c[device + L.JUNCTION_ON_V] ? c[device + L.REVERSE_A] * exp((vd + offV) * rate) : 0;
  const clampRate = c[device + L.CLAMP_INVERSE_NVT];
  const clampA = vs > c[device + L.CLAMP_ON_V] ? c[device + L.CLAMP_A] * exp((vs + offV) * clampRate) : 0;
  s[n + L.PORT_S] = S + clampA;
  s[n + L.PORT_D] = D;
  if (c[device + L.GRADING] === 0) return;
  const S0 = s[n + L.PORT_S];
  const D0 = s[n + L.PORT_D];
  addGraded(c, device, vs, c[device + L.STEP_S], s, n + L.CHARGES_S, n + L.PORT_S);
  addGraded(c, device, vd, c[device + L.STEP_D], s, n + L.CHARGES_D, n + L.PORT_D);
  s[n + L.PORT_S] += S0;
  s[n + L.PORT_D] += D0;
}

/** Currents by the laws at the overdrives in the slots, and the charges there: where a step is lost in the rounding of large voltages, too. */
export function currents(c: Float64Array, t: Float64Array, device: number, s: Float64Array, n: number): void {
  const vs = s[n + L.OVERDRIVE_S];
  const vd = s[n + L.OVERDRIVE_D];
  const lambda = c[device + L.LAMBDA];
  evaluate(c, t, device, s, n + L.OVERDRIVE_S, n + L.TERM_S);
  evaluate(c, t, device, s, n + L.OVERDRIVE_D, n + L.TERM_D);
  s[n + L.CHANNEL_A] = s[n + L.TERM_S] * (1 + lambda * Math.max(-vd, 0)) - s[n + L.TERM_D] * (1 + lambda * Math.max(-vs, 0));
  gatePorts(c, device, s, n, vs, vd);
  s[n + L.JUNCTION_S] = s[n + L.PORT_S];
  s[n + L.JUNCTION_D] = s[n + L.PORT_D];
  if (c[device + L.GRADING] !== 0) keepCharges(c, device, s, n);
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

/** Solves the ports where a kernel's own solver did not settle, and writes what it would have: overdrives, currents, charges. */
export function searchPorts(
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
  s[n + L.FALLBACKS] += 1;
  const isMonotonic = c[aI] <= 0 && c[bI] >= 0;
  if (isMonotonic || !walk(c, t, device, aI, bI, junction, s, n, a, b)) bisect(c, t, device, aI, bI, junction, s, n, a, b);
  currents(c, t, device, s, n);
}

const NEWTON_STEPS = 40;
const SHORTEST_STRIDE = 1e-7;
const SETTLED_V = 1e-11;
/** Of the voltages that would stand there without junctions, what sums of them cannot tell from nothing. */
const ROUNDING = 1e-15;

/** Follows the solution from where nothing conducts to (a, b), in strides as short as it takes. False where the path turns back. */
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
    if (settles(c, t, device, aI, bI, junction, s, n, fromS + next * (a - fromS), fromD + next * (b - fromD))) {
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

/** Newton from the overdrives that stand in the slots, a stride at a time: near enough for undamped steps, or the stride is shortened. */
function settles(
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
  const rate = c[device + L.INVERSE_NVT];
  const [aS, aD, bS, bD] = [c[junction], c[junction + 1], c[junction + L.JUNCTION_WIDTH], c[junction + L.JUNCTION_WIDTH + 1]];
  const enough = SETTLED_V + ROUNDING * (Math.abs(a) + Math.abs(b));
  for (let step = 0; step < NEWTON_STEPS; step++) {
    const vs = s[n + L.OVERDRIVE_S];
    const vd = s[n + L.OVERDRIVE_D];
    const rs = residual(vs, a, c[aI], aS, aD, c, t, device, s, n, vs, vd);
    const rd = residual(vd, b, c[bI], bS, bD, c, t, device, s, n, vs, vd);
    // Slopes by differences: this path is walked once in millions of samples, and graded capacitances have no simple ones.
    const h = 1e-7;
    const ss = (residual(vs + h, a, c[aI], aS, aD, c, t, device, s, n, vs + h, vd) - rs) / h;
    const sd = (residual(vs, a, c[aI], aS, aD, c, t, device, s, n, vs, vd + h) - rs) / h;
    const ds = (residual(vd, b, c[bI], bS, bD, c, t, device, s, n, vs + h, vd) - rd) / h;
    const dd = (residual(vd + h, b, c[bI], bS, bD, c, t, device, s, n, vs, vd + h) - rd) / h;
    const determinant = ss * dd - sd * ds;
    const most = 2 / rate;
    const stepS = Math.min(most, Math.max(-10 * most, (sd * rd - dd * rs) / determinant));
    const stepD = Math.min(most, Math.max(-10 * most, (ds * rs - ss * rd) / determinant));
    if (!Number.isFinite(stepS) || !Number.isFinite(stepD)) return false;
    s[n + L.OVERDRIVE_S] = vs + stepS;
    s[n + L.OVERDRIVE_D] = vd + stepD;
    if (Math.abs(stepS) < enough && Math.abs(stepD) < enough) return true;
  }
  return false;
}

/** Nested bisection between brackets that are widened until they hold the solution; writes the overdrives. */
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
  while (outerResidual(c, t, device, aI, bI, junction, s, n, a, b, low) > 0 && low > -farthest) low *= 2;
  while (outerResidual(c, t, device, aI, bI, junction, s, n, a, b, high) < 0 && high < farthest) high *= 2;
  for (let step = 0; step < 200; step++) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) break;
    if (outerResidual(c, t, device, aI, bI, junction, s, n, a, b, middle) > 0) high = middle;
    else low = middle;
  }
  s[n + L.OVERDRIVE_S] = (low + high) / 2;
  s[n + L.OVERDRIVE_D] = innerOverdrive(c, t, device, bI, junction, s, n, a, b, (low + high) / 2);
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
  s: Float64Array,
  n: number,
  a: number,
  b: number,
  vs: number,
): number {
  const vd = innerOverdrive(c, t, device, bI, junction, s, n, a, b, vs);
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
  a: number,
  b: number,
  vs: number,
): number {
  const bS = c[junction + L.JUNCTION_WIDTH + L.BY_S];
  const bD = c[junction + L.JUNCTION_WIDTH + L.BY_D];
  const farthest = farthestV(a, b);
  let low = -1;
  let high = 1;
  while (residual(low, b, c[bI], bS, bD, c, t, device, s, n, vs, low) > 0 && low > -farthest) low *= 2;
  while (residual(high, b, c[bI], bS, bD, c, t, device, s, n, vs, high) < 0 && high < farthest) high *= 2;
  for (let step = 0; step < 200; step++) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) break;
    if (residual(middle, b, c[bI], bS, bD, c, t, device, s, n, vs, middle) > 0) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}
