/**
 * Marks where the output bends: an end of the channel passes VGS(off) between two samples, and its term ½F″·v² begins or ends.
 *
 * Law      near the crossing the overdrive e that the end would have without its own term runs straight; with it v + K·v² = e while v > 0, where K is
 *          what the circuit makes of the term, and the output gains J/2·D(τ; κ) with the slope e′ of e, κ = 2K·e′, J = F″·e′² by the output's
 *          weight, D(τ; κ) = (2/κ)·(τ − (√(1 + 2κτ) − 1)/κ). D is τ² for small κ; for large κ it is nearly a corner. chain/kinks.ts corrects it,
 *          with (1 + κ)·D by u = κ/(1 + κ)
 * Error    e is taken to be straight over one step, and F″ to be that at VGS(off)
 */
import { evaluate } from './channel.ts';
import * as L from './layout.ts';

/**
 * A list: the count; then for each kink the sample after it, 1 where its shape begins and −1 where it ends, how far after the sample before it (or before
 * the one after), the shape from 0 to 1, and its amount in V.
 */
export const KINK_WIDTH = 5;

/** Kinks of larger jumps, V, and sharper bends are those of a state on its way to be lost. */
const MOST_V = 1e6;
const MOST_BEND = 1e12;

export function createKinks(most: number): Float64Array {
  return new Float64Array(1 + KINK_WIDTH * most);
}

/** Marks sample `i` from the overdrives before and at it, which stand in the slots of `s` from `n` on with the output's weight. */
export function markKink(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  e: Float64Array,
  i: number,
  s: Float64Array,
  n: number,
): void {
  evaluate(c, t, device, s, n + L.OVERDRIVE_S, n + L.TERM_S);
  evaluate(c, t, device, s, n + L.OVERDRIVE_D, n + L.TERM_D);
  const half = c[device + L.LAW] === L.LAW_NUMBER.square ? c[device + L.SCALE] : 0.25 * c[device + L.SLOPE] * c[device + L.INVERSE_WIDTH];
  const perA = s[n + L.PER_A];
  const qs = s[n + L.BEFORE_S];
  const qd = s[n + L.BEFORE_D];
  const vs = s[n + L.OVERDRIVE_S];
  const vd = s[n + L.OVERDRIVE_D];
  if (vs > 0 !== qs > 0) {
    const own = half / (1 + c[bI] * s[n + L.TERM_D + 1]);
    const at = 1 + KINK_WIDTH * e[0];
    if (at + KINK_WIDTH <= e.length) {
      e[at + 1] = qs;
      e[at + 2] = vs;
      e[at + 3] = -c[aI] * own;
      e[at + 4] = perA * own;
      keep(e, i, at);
    }
  }
  if (vd > 0 !== qd > 0) {
    const own = half / (1 - c[aI] * s[n + L.TERM_S + 1]);
    const at = 1 + KINK_WIDTH * e[0];
    if (at + KINK_WIDTH <= e.length) {
      e[at + 1] = qd;
      e[at + 2] = vd;
      e[at + 3] = c[bI] * own;
      e[at + 4] = -perA * own;
      keep(e, i, at);
    }
  }
}

/** Makes a kink of what stands from `at` on: the overdrives before and after, the bend and the amount. */
function keep(e: Float64Array, i: number, at: number): void {
  const before = e[at + 1];
  const after = e[at + 2];
  const bend = e[at + 3];
  const amount = e[at + 4];
  // Where more than the drain's voltage is fed back the bend may open the other way, without limit: that is no kink to soften.
  if (!(bend >= 0)) return;
  const comesOn = after > 0;
  const on = Math.max(before, after);
  const off = Math.min(before, after);
  const free = on + bend * on * on;
  const slope = free - off;
  if (!(amount * slope * slope < MOST_V && amount * slope * slope > -MOST_V && bend * slope < MOST_BEND)) return;
  e[at] = i;
  e[at + 1] = comesOn ? 1 : -1;
  e[at + 2] = -off / slope;
  const sharpness = 2 * bend * slope;
  e[at + 3] = sharpness / (1 + sharpness);
  e[at + 4] = (amount * slope * slope) / (1 + sharpness);
  e[0] += 1;
}
