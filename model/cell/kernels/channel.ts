/**
 * The channel in the kernels' own constants, for what they do not do inline: λ beyond the knee of the square law, the search behind Newton's method,
 * and the ports when a junction conducts. Agrees with device/law.ts (test/model/cell/kernels.test.ts).
 */
import { smoothShape, smoothSlope } from '../../device/table.ts';
import * as L from './layout.ts';

/** F at an overdrive, A, from cut-off up. `device` is where the device's constants begin in `c`. */
export function termAt(c: Float64Array, t: Float64Array, device: number, v: number): number {
  const law = c[device + L.LAW];
  const scale = c[device + L.SCALE];
  if (law === L.LAW_NUMBER.square) return v > 0 ? scale * v * v : 0;
  if (law === L.LAW_NUMBER.gradual) {
    if (v <= 0) return 0;
    const q = v * c[device + L.INVERSE_WIDTH];
    if (q >= 1) return scale + c[device + L.SLOPE] * (v - 1 / c[device + L.INVERSE_WIDTH]);
    const r = Math.sqrt(1 - q);
    const p = q / (1 + r);
    return scale * p * p * (1 + 2 * r);
  }
  const z = (v * c[device + L.INVERSE_WIDTH] + 40) * 8;
  if (!(z > 0)) return 0;
  if (z >= c[device + L.PIECES]) return scale * smoothShape(v * c[device + L.INVERSE_WIDTH], c[device + L.EXPONENT]);
  const piece = Math.floor(z);
  const d = (z - piece - 0.5) * 0.125;
  const o = piece * 6;
  return scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
}

/** dF/dv, S. */
export function slopeAt(c: Float64Array, t: Float64Array, device: number, v: number): number {
  const law = c[device + L.LAW];
  if (law === L.LAW_NUMBER.square) return v > 0 ? 2 * c[device + L.SCALE] * v : 0;
  const slope = c[device + L.SLOPE];
  if (law === L.LAW_NUMBER.gradual) {
    if (v <= 0) return 0;
    const q = v * c[device + L.INVERSE_WIDTH];
    return q >= 1 ? slope : (slope * q) / (1 + Math.sqrt(1 - q));
  }
  const z = (v * c[device + L.INVERSE_WIDTH] + 40) * 8;
  if (!(z > 0)) return 0;
  if (z >= c[device + L.PIECES]) return slope * smoothSlope(v * c[device + L.INVERSE_WIDTH], c[device + L.EXPONENT]);
  const piece = Math.floor(z);
  const d = (z - piece - 0.5) * 0.125;
  const o = piece * 6;
  return slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
}

/**
 * F and F′ at the overdrive in `s[from]`, into `s[at]` and `s[at + 1]`: a fraction that goes to a call or comes from it may cost memory on the audio
 * thread.
 */
export function evaluate(c: Float64Array, t: Float64Array, device: number, s: Float64Array, from: number, at: number): void {
  const v = s[from];
  const law = c[device + L.LAW];
  const scale = c[device + L.SCALE];
  const slope = c[device + L.SLOPE];
  s[at] = 0;
  s[at + 1] = 0;
  if (law === L.LAW_NUMBER.square) {
    if (v <= 0) return;
    s[at] = scale * v * v;
    s[at + 1] = 2 * scale * v;
    return;
  }
  if (law === L.LAW_NUMBER.gradual) {
    if (v <= 0) return;
    const q = v * c[device + L.INVERSE_WIDTH];
    const p = q < 1 ? q / (1 + Math.sqrt(1 - q)) : 1;
    s[at] = q < 1 ? scale * p * p * (1 + 2 * Math.sqrt(1 - q)) : scale + slope * (v - 1 / c[device + L.INVERSE_WIDTH]);
    s[at + 1] = slope * p;
    return;
  }
  const z = (v * c[device + L.INVERSE_WIDTH] + 40) * 8;
  if (!(z > 0)) return;
  if (z >= c[device + L.PIECES]) {
    s[at] = termAt(c, t, device, v);
    s[at + 1] = slopeAt(c, t, device, v);
    return;
  }
  const piece = Math.floor(z);
  const d = (z - piece - 0.5) * 0.125;
  const o = piece * 6;
  s[at] = scale * (t[o] + d * (t[o + 1] + d * (t[o + 2] + d * (t[o + 3] + d * (t[o + 4] + d * t[o + 5])))));
  s[at + 1] = slope * (t[o + 1] + d * (2 * t[o + 2] + d * (3 * t[o + 3] + d * (4 * t[o + 4] + d * 5 * t[o + 5]))));
}

/** Channel current, A, at the overdrives of both ends, λ included. */
export function channelA(c: Float64Array, t: Float64Array, device: number, vs: number, vd: number): number {
  const lambda = c[device + L.LAMBDA];
  const fs = termAt(c, t, device, vs);
  const fd = termAt(c, t, device, vd);
  if (lambda === 0) return fs - fd;
  return fs * (1 + lambda * Math.max(-vd, 0)) - fd * (1 + lambda * Math.max(-vs, 0));
}

const BEND_STEPS = 30;
const BEND_ENOUGH_V = 1e-8;

/**
 * The saturated current with λ, A: by Newton from the one in the slot GIVEN_FREE, in whose place it is left, with the overdrives for no current in
 * GIVEN_A and GIVEN_B; by search where that does not settle.
 */
export function bent(c: Float64Array, t: Float64Array, device: number, aI: number, bI: number, s: Float64Array, n: number): void {
  for (let step = 0; step < BEND_STEPS; step++) {
    excess(c, t, device, aI, bI, s, n);
    const change = s[n + L.EXCESS_A] / s[n + L.EXCESS_SLOPE];
    s[n + L.GIVEN_FREE] -= change;
    if (Math.abs((c[bI] - c[aI]) * change) < BEND_ENOUGH_V) return;
  }
  searched(c, t, device, aI, bI, s, n);
}

/** By how much the channel's current exceeds the one in GIVEN_FREE, and the derivative of that, into their slots. */
function excess(c: Float64Array, t: Float64Array, device: number, aI: number, bI: number, s: Float64Array, n: number): void {
  const current = s[n + L.GIVEN_FREE];
  const vs = s[n + L.GIVEN_A] + c[aI] * current;
  const vd = s[n + L.GIVEN_B] + c[bI] * current;
  const lambda = c[device + L.LAMBDA];
  s[n + L.TERM_S] = vs;
  s[n + L.TERM_D] = vd;
  evaluate(c, t, device, s, n + L.TERM_S, n + L.TERM_S);
  evaluate(c, t, device, s, n + L.TERM_D, n + L.TERM_D);
  const past = vd < 0 ? 1 - lambda * vd : 1;
  const pastReversed = vs < 0 ? 1 - lambda * vs : 1;
  let slope = c[aI] * s[n + L.TERM_S + 1] * past - c[bI] * s[n + L.TERM_D + 1] * pastReversed - 1;
  if (vd < 0) slope -= lambda * c[bI] * s[n + L.TERM_S];
  if (vs < 0) slope += lambda * c[aI] * s[n + L.TERM_D];
  s[n + L.EXCESS_A] = s[n + L.TERM_S] * past - s[n + L.TERM_D] * pastReversed - current;
  s[n + L.EXCESS_SLOPE] = slope;
}

const MOST_HALVINGS = 2100;

/**
 * A current that solves I = F(a − αI) − F(b + γI), A, into the slot GIVEN_FREE, from a and b in GIVEN_A and GIVEN_B, by bisection to the last bit. For
 * α, γ ≥ 0 the two sides move apart, and it lies between none and what flows with none; where a buffer and a capacitance together feed more than the
 * drain's voltage back, γ is negative and the search begins wider.
 */
export function searched(c: Float64Array, t: Float64Array, device: number, aI: number, bI: number, s: Float64Array, n: number): void {
  s[n + L.GIVEN_FREE] = 0;
  excess(c, t, device, aI, bI, s, n);
  const free = s[n + L.EXCESS_A];
  let low = Math.min(0, free);
  let high = Math.max(0, free);
  for (let wider = Math.abs(free); ; wider *= 2) {
    s[n + L.GIVEN_FREE] = low;
    excess(c, t, device, aI, bI, s, n);
    if (!(s[n + L.EXCESS_A] < 0)) break;
    low -= wider;
  }
  for (let wider = Math.abs(free); ; wider *= 2) {
    s[n + L.GIVEN_FREE] = high;
    excess(c, t, device, aI, bI, s, n);
    if (!(s[n + L.EXCESS_A] > 0)) break;
    high += wider;
  }
  for (let step = 0; step < MOST_HALVINGS; step++) {
    const middle = low + (high - low) / 2;
    if (middle === low || middle === high) break;
    s[n + L.GIVEN_FREE] = middle;
    excess(c, t, device, aI, bI, s, n);
    if (s[n + L.EXCESS_A] > 0) low = middle;
    else high = middle;
  }
  s[n + L.GIVEN_FREE] = low;
}
