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

/** The square law's saturated current with λ, A, into `out[at]`: by Newton from the current without it, by search where that does not settle. */
export function bent(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  a: number,
  b: number,
  from: number,
  out: Float64Array,
  at: number,
): void {
  let current = from;
  for (let step = 0; step < BEND_STEPS; step++) {
    const change =
      excess(c, t, device, a + c[aI] * current, b + c[bI] * current, current) / excessSlope(c, t, device, aI, bI, a, b, current);
    current -= change;
    if (Math.abs((c[bI] - c[aI]) * change) < 1e-8) {
      out[at] = current;
      return;
    }
  }
  searched(c, t, device, aI, bI, a, b, out, at);
}

function excess(c: Float64Array, t: Float64Array, device: number, vs: number, vd: number, current: number): number {
  return channelA(c, t, device, vs, vd) - current;
}

function excessSlope(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  a: number,
  b: number,
  current: number,
): number {
  const vs = a + c[aI] * current;
  const vd = b + c[bI] * current;
  const lambda = c[device + L.LAMBDA];
  const past = Math.max(-vd, 0);
  const pastReversed = Math.max(-vs, 0);
  let slope = c[aI] * slopeAt(c, t, device, vs) * (1 + lambda * past) - c[bI] * slopeAt(c, t, device, vd) * (1 + lambda * pastReversed) - 1;
  if (past > 0) slope -= lambda * c[bI] * termAt(c, t, device, vs);
  if (pastReversed > 0) slope += lambda * c[aI] * termAt(c, t, device, vd);
  return slope;
}

/**
 * A current that solves I = F(a − αI) − F(b + γI), A, into `out[at]`, by bisection to the last bit. For α, γ ≥ 0 the two sides move apart, and it lies
 * between none and what flows with none; where a buffer and a capacitance together feed more than the drain's voltage back, γ is negative and the
 * search begins wider.
 */
export function searched(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  a: number,
  b: number,
  out: Float64Array,
  at: number,
): void {
  const free = channelA(c, t, device, a, b);
  let low = Math.min(0, free);
  let high = Math.max(0, free);
  for (let wider = Math.abs(free); excess(c, t, device, a + c[aI] * low, b + c[bI] * low, low) < 0; wider *= 2) low -= wider;
  for (let wider = Math.abs(free); excess(c, t, device, a + c[aI] * high, b + c[bI] * high, high) > 0; wider *= 2) high += wider;
  for (let step = 0; step < 2100; step++) {
    const middle = low + (high - low) / 2;
    if (middle === low || middle === high) break;
    if (excess(c, t, device, a + c[aI] * middle, b + c[bI] * middle, middle) > 0) low = middle;
    else high = middle;
  }
  out[at] = low;
}
