/**
 * The two ports of a FET when a gate junction conducts.
 *
 * Law      with overdrives s and d of the two ends, channel current I = F(s) − F(d) and junction currents S, D above the reverse current,
 *          s = a + aI·I + aS·S + aD·D  and  d = b + bI·I + bS·S + bD·D
 * Scheme   the kernels' own solver (source.ts) is Newton on (s, d) with exact derivatives, steps into a junction shortened to its logarithm. Where
 *          that has not settled: nested bisection, which always does for one FET and 0 ≤ k ≤ 1, where the equations are monotonic; where they
 *          are not (γ < 0), Newton along a path from where nothing conducts, in strides as short as it takes. Where more than the drain is fed back the
 *          path turns back, at the edge of two or three solutions: then bisection over I, with the ports solved for the junctions' currents only
 * Error    Newton stops at a step under a tenth of ENOUGH_V, or lost in the rounding of what would stand there without currents; the currents are carried along that step, so the linear equations hold to rounding
 *          and the junctions' law to half the step's square over (nVT)²: 1e-11 of the current while playing, 1e-17 in readings
 * Source   damping of the exponential: Nagel, UCB/ERL M520 (1975), from memory
 *
 * Numbers pass between these functions in slots: one that a call took or gave would cost memory, thousands of times in a sample.
 */
import { expAt } from '../../device/math.ts';
import { evaluate } from './channel.ts';
import { addGraded, keepCharges } from './graded.ts';
import * as L from './layout.ts';

/** An exponential law's current and slope at the overdrive in `s[over]`, added to `s[port]` and `s[port + 1]`. */
function addExponential(
  c: Float64Array,
  device: number,
  onV: number,
  reverseA: number,
  inverseNvt: number,
  s: Float64Array,
  n: number,
  over: number,
  port: number,
): void {
  if (!(s[over] > c[device + onV])) return;
  s[n + L.POWER] = (s[over] + c[device + L.GATE_OFF_V]) * c[device + inverseNvt];
  expAt(s, n + L.POWER);
  const current = c[device + reverseA] * s[n + L.POWER];
  s[port] += current;
  s[port + 1] += current * c[device + inverseNvt];
}

/** Currents of the gate's ports above the reverse currents, A, and their slopes, S, into slots: junction, clamp, graded capacitance. */
function gatePorts(c: Float64Array, device: number, s: Float64Array, n: number): void {
  const S = n + L.PORT_S;
  const D = n + L.PORT_D;
  s.fill(0, S, D + 2);
  addExponential(c, device, L.JUNCTION_ON_V, L.REVERSE_A, L.INVERSE_NVT, s, n, n + L.OVERDRIVE_S, S);
  addExponential(c, device, L.JUNCTION_ON_V, L.REVERSE_A, L.INVERSE_NVT, s, n, n + L.OVERDRIVE_D, D);
  addExponential(c, device, L.CLAMP_ON_V, L.CLAMP_A, L.CLAMP_INVERSE_NVT, s, n, n + L.OVERDRIVE_S, S);
  if (c[device + L.GRADING] === 0) return;
  const conductedS = s[S];
  const slopeS = s[S + 1];
  const conductedD = s[D];
  const slopeD = s[D + 1];
  s[n + L.CHARGES_S + 4] = s[n + L.OVERDRIVE_S];
  s[n + L.CHARGES_D + 4] = s[n + L.OVERDRIVE_D];
  addGraded(c, device, L.STEP_S, s, n + L.CHARGES_S, S);
  addGraded(c, device, L.STEP_D, s, n + L.CHARGES_D, D);
  s[S] += conductedS;
  s[S + 1] += slopeS;
  s[D] += conductedD;
  s[D + 1] += slopeD;
}

/** The channel's current, A, into its slot, and how it rises with the source end's overdrive and falls with the drain end's, S, after the terms. */
function channel(c: Float64Array, t: Float64Array, device: number, s: Float64Array, n: number): void {
  evaluate(c, t, device, s, n + L.OVERDRIVE_S, n + L.TERM_S);
  evaluate(c, t, device, s, n + L.OVERDRIVE_D, n + L.TERM_D);
  const Fs = s[n + L.TERM_S];
  const Fd = s[n + L.TERM_D];
  const lambda = c[device + L.LAMBDA];
  const past = lambda * Math.max(-s[n + L.OVERDRIVE_D], 0);
  const reversed = lambda * Math.max(-s[n + L.OVERDRIVE_S], 0);
  s[n + L.CHANNEL_A] = Fs * (1 + past) - Fd * (1 + reversed);
  s[n + L.TERM_S + 1] = s[n + L.TERM_S + 1] * (1 + past) + (reversed > 0 ? lambda * Fd : 0);
  s[n + L.TERM_D + 1] = s[n + L.TERM_D + 1] * (1 + reversed) + (past > 0 ? lambda * Fs : 0);
}

/** Currents by the laws at the overdrives in the slots, and the charges there: where a step is lost in the rounding of large voltages, too. */
export function currents(c: Float64Array, t: Float64Array, device: number, s: Float64Array, n: number): void {
  channel(c, t, device, s, n);
  gatePorts(c, device, s, n);
  s[n + L.JUNCTION_S] = s[n + L.PORT_S];
  s[n + L.JUNCTION_D] = s[n + L.PORT_D];
  if (c[device + L.GRADING] !== 0) keepCharges(s, n);
}

/** The next first guess is what stands in the slots: what went before led astray, or nowhere. */
export function stay(s: Float64Array, n: number): void {
  s[n + L.LATEST_S] = s[n + L.OVERDRIVE_S];
  s[n + L.LATEST_D] = s[n + L.OVERDRIVE_D];
  s[n + L.EARLIER_S] = s[n + L.OVERDRIVE_S];
  s[n + L.EARLIER_D] = s[n + L.OVERDRIVE_D];
  s[n + L.EARLIEST_S] = s[n + L.OVERDRIVE_S];
  s[n + L.EARLIEST_D] = s[n + L.OVERDRIVE_D];
}

/**
 * By how much the overdrives in the slots miss the two equations whose parts without currents are in GIVEN_A and GIVEN_B, V, into slots, with the currents
 * and slopes that say so. Where the channel is `given` its current is in those parts already.
 */
function miss(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
  given: boolean,
): void {
  const row = junction + L.JUNCTION_WIDTH;
  if (given) s[n + L.CHANNEL_A] = 0;
  else channel(c, t, device, s, n);
  gatePorts(c, device, s, n);
  const I = s[n + L.CHANNEL_A];
  const S = s[n + L.PORT_S];
  const D = s[n + L.PORT_D];
  s[n + L.MISSED_S] = s[n + L.OVERDRIVE_S] - s[n + L.GIVEN_A] - c[aI] * I - c[junction + L.BY_S] * S - c[junction + L.BY_D] * D;
  s[n + L.MISSED_D] = s[n + L.OVERDRIVE_D] - s[n + L.GIVEN_B] - c[bI] * I - c[row + L.BY_S] * S - c[row + L.BY_D] * D;
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
  s[n + L.GIVEN_A] = a;
  s[n + L.GIVEN_B] = b;
  const isMonotonic = c[aI] <= 0 && c[bI] >= 0;
  if (isMonotonic) bisect(c, t, device, aI, bI, junction, s, n, false);
  else if (!walk(c, t, device, aI, bI, junction, s, n)) bisectCurrent(c, t, device, aI, bI, junction, s, n);
  currents(c, t, device, s, n);
}

const NEWTON_STEPS = 40;
const SHORTEST_STRIDE = 1e-7;
const SETTLED_V = 1e-11;
/** Of the voltages that would stand there without junctions, what sums of them cannot tell from nothing. */
const ROUNDING = 1e-15;
/** Of a bracket of volts, which takes it under 1e-40 V unless its bits end before; and of one of amperes: all powers of two and a double's bits. */
const HALVINGS_V = 200;
const HALVINGS_A = 2200;

/** Follows the solution from where nothing conducts to what is given, in strides as short as it takes. False where the path turns back. */
function walk(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
): boolean {
  const a = s[n + L.GIVEN_A];
  const b = s[n + L.GIVEN_B];
  const fromS = Math.min(a, 0);
  const fromD = Math.min(b, 0);
  let reachedS = fromS;
  let reachedD = fromD;
  let done = 0;
  let stride = 1 / 16;
  while (done < 1 && stride >= SHORTEST_STRIDE) {
    const next = Math.min(1, done + stride);
    s[n + L.OVERDRIVE_S] = reachedS;
    s[n + L.OVERDRIVE_D] = reachedD;
    s[n + L.GIVEN_A] = fromS + next * (a - fromS);
    s[n + L.GIVEN_B] = fromD + next * (b - fromD);
    if (settles(c, t, device, aI, bI, junction, s, n, false)) {
      done = next;
      stride *= 2;
      reachedS = s[n + L.OVERDRIVE_S];
      reachedD = s[n + L.OVERDRIVE_D];
    } else stride /= 4;
  }
  s[n + L.GIVEN_A] = a;
  s[n + L.GIVEN_B] = b;
  return done === 1;
}

/** Where a junction or the clamp, whichever begins first, carries some 10⁸ times what is left out, V. */
function kneeV(c: Float64Array, device: number): number {
  return Math.min(c[device + L.JUNCTION_ON_V], c[device + L.CLAMP_ON_V]) + 20 / c[device + L.INVERSE_NVT];
}

/** Newton from the overdrives that stand in the slots: up to the knee and down by whole steps, beyond the knee by 2 nVT at most. False where that takes too long. */
function settles(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
  given: boolean,
): boolean {
  const row = junction + L.JUNCTION_WIDTH;
  const perAs = given ? 0 : c[aI];
  const perAd = given ? 0 : c[bI];
  const most = 2 / c[device + L.INVERSE_NVT];
  const knee = kneeV(c, device);
  const enough = SETTLED_V + ROUNDING * (Math.abs(s[n + L.GIVEN_A]) + Math.abs(s[n + L.GIVEN_B]));
  for (let step = 0; step < NEWTON_STEPS; step++) {
    miss(c, t, device, aI, bI, junction, s, n, given);
    const rs = s[n + L.MISSED_S];
    const rd = s[n + L.MISSED_D];
    const slopeS = s[n + L.PORT_S + 1];
    const slopeD = s[n + L.PORT_D + 1];
    const ss = 1 - perAs * s[n + L.TERM_S + 1] - c[junction + L.BY_S] * slopeS;
    const sd = perAs * s[n + L.TERM_D + 1] - c[junction + L.BY_D] * slopeD;
    const ds = -perAd * s[n + L.TERM_S + 1] - c[row + L.BY_S] * slopeS;
    const dd = 1 + perAd * s[n + L.TERM_D + 1] - c[row + L.BY_D] * slopeD;
    const determinant = ss * dd - sd * ds;
    const stepS = Math.min(Math.max(most, knee - s[n + L.OVERDRIVE_S]), (sd * rd - dd * rs) / determinant);
    const stepD = Math.min(Math.max(most, knee - s[n + L.OVERDRIVE_D]), (ds * rs - ss * rd) / determinant);
    if (!Number.isFinite(stepS) || !Number.isFinite(stepD)) return false;
    s[n + L.OVERDRIVE_S] += stepS;
    s[n + L.OVERDRIVE_D] += stepD;
    if (Math.abs(stepS) < enough && Math.abs(stepD) < enough) return true;
  }
  return false;
}

/** Nested bisection: at each overdrive of the source end the drain end's own equation is solved. Writes the overdrives. */
export function bisect(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
  given: boolean,
): void {
  bisectEnd(c, t, device, aI, bI, junction, s, n, given, L.OVERDRIVE_S);
}

/** Between brackets that are widened until they hold the solution: junctions and channel only draw from what stands there without them. */
function bisectEnd(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
  given: boolean,
  end: number,
): void {
  const farthest = 4 * (1 + Math.abs(s[n + L.GIVEN_A]) + Math.abs(s[n + L.GIVEN_B]));
  s[n + end] = -1;
  while (isPast(c, t, device, aI, bI, junction, s, n, given, end) && s[n + end] > -farthest) s[n + end] *= 2;
  let low = s[n + end];
  s[n + end] = 1;
  while (!isPast(c, t, device, aI, bI, junction, s, n, given, end) && s[n + end] < farthest) s[n + end] *= 2;
  let high = s[n + end];
  for (let step = 0; step < HALVINGS_V; step++) {
    const middle = low + (high - low) / 2;
    if (middle === low || middle === high) break;
    s[n + end] = middle;
    if (isPast(c, t, device, aI, bI, junction, s, n, given, end)) high = middle;
    else low = middle;
  }
  s[n + end] = low;
  isPast(c, t, device, aI, bI, junction, s, n, given, end);
}

/** Whether an end's overdrive is above the one that solves its equation; of the source end, with the drain end's solved. */
function isPast(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
  given: boolean,
  end: number,
): boolean {
  if (end === L.OVERDRIVE_S) bisectEnd(c, t, device, aI, bI, junction, s, n, given, L.OVERDRIVE_D);
  else miss(c, t, device, aI, bI, junction, s, n, given);
  return s[n + (end === L.OVERDRIVE_S ? L.MISSED_S : L.MISSED_D)] > 0;
}

/**
 * Bisection over the channel's current, from none outwards. With one given the equations are monotonic; what the channel would draw at their solution is more
 * than a current far below and less than one far above, as long as it only takes from the network. Of several solutions it finds one. Writes the overdrives.
 */
export function bisectCurrent(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  s: Float64Array,
  n: number,
): void {
  const a = s[n + L.GIVEN_A];
  const b = s[n + L.GIVEN_B];
  let low = Number.NEGATIVE_INFINITY;
  let high = Number.POSITIVE_INFINITY;
  let current = 0;
  const knee = kneeV(c, device);
  for (let step = 0; step < HALVINGS_A; step++) {
    s[n + L.GIVEN_A] = a + c[aI] * current;
    s[n + L.GIVEN_B] = b + c[bI] * current;
    s[n + L.OVERDRIVE_S] = Math.min(s[n + L.GIVEN_A], knee);
    s[n + L.OVERDRIVE_D] = Math.min(s[n + L.GIVEN_B], knee);
    if (!settles(c, t, device, aI, bI, junction, s, n, true)) bisect(c, t, device, aI, bI, junction, s, n, true);
    channel(c, t, device, s, n);
    if (s[n + L.CHANNEL_A] > current) low = current;
    else high = current;
    const next = high - low < Number.POSITIVE_INFINITY ? low + (high - low) / 2 : current === 0 ? s[n + L.CHANNEL_A] : 2 * current;
    if (next === low || next === high) break;
    current = next;
  }
  s[n + L.GIVEN_A] = a;
  s[n + L.GIVEN_B] = b;
}
