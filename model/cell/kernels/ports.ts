/**
 * The two ports of a FET when a gate junction conducts.
 *
 * Law      with overdrives s and d of the two ends, channel current I = F(s) − F(d) and junction currents S, D above the reverse current,
 *          s = a + aI·I + aS·S + aD·D  and  d = b + bI·I + bS·S + bD·D
 * Scheme   Newton on (s, d) with exact derivatives and steps into a junction shortened to its logarithm; if that has not settled in 40 steps,
 *          nested bisection, which always does: for one FET and 0 ≤ k ≤ 1 the equations are monotonic
 * Error    Newton stops at a step under a tenth of ENOUGH_V; the currents are carried along that step, so the linear equations hold to rounding
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

function currents(c: Float64Array, t: Float64Array, device: number, s: Float64Array, n: number): void {
  const vs = s[n + L.OVERDRIVE_S];
  const vd = s[n + L.OVERDRIVE_D];
  const lambda = c[device + L.LAMBDA];
  evaluate(c, t, device, s, n + L.OVERDRIVE_S, n + L.TERM_S);
  evaluate(c, t, device, s, n + L.OVERDRIVE_D, n + L.TERM_D);
  s[n + L.CHANNEL_A] = s[n + L.TERM_S] * (1 + lambda * Math.max(-vd, 0)) - s[n + L.TERM_D] * (1 + lambda * Math.max(-vs, 0));
  gatePorts(c, device, s, n, vs, vd);
  s[n + L.JUNCTION_S] = s[n + L.PORT_S];
  s[n + L.JUNCTION_D] = s[n + L.PORT_D];
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

/** Solves the ports by search and writes what a kernel's own solver would: the fall-back behind it. */
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
  currents(c, t, device, s, n);
  if (c[device + L.GRADING] !== 0) keepCharges(c, device, s, n);
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
