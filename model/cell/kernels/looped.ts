/**
 * The kernel for any law and any number of states, in loops over the same coefficients: for circuits of a shape that is not written out. About
 * five times slower than those, and the same in the bits that matter (test/model/cell/kernels.test.ts).
 */
import { bent, searched, slopeAt, termAt } from './channel.ts';
import type { Conductor, Kernel } from './kernel.ts';
import { markKink } from './kinks.ts';
import * as L from './layout.ts';

const NEWTON_STEPS = 40;

/** A kernel for a shape, with the law's solver for a conducting gate. Allocates its scratch memory now. */
export function loopedKernel(trapezoidal: number, stiff: number, conductor: Conductor): Kernel {
  const n = trapezoidal + stiff;
  const row = L.rowLayout(n);
  const past = L.memoryLayout(n);
  const all = L.coefficientLayout(n);
  const slots = L.slotStart(trapezoidal, stiff);
  const memories = new Float64Array(n);
  const aI = row.current;
  const bI = row.width + row.current;

  const sum = (c: Float64Array, r: number, from: Float64Array, u: number, v: number): number => {
    const at = r * row.width;
    let total = 0;
    for (let k = 0; k < n; k++) total += c[at + k] * from[k];
    return total + c[at + row.u] * u + c[at + row.u + 1] * v + c[at + row.constant];
  };

  const remember = (c: Float64Array, s: Float64Array): void => {
    for (let i = 0; i < n; i++) {
      const at = all.memory + i * past.width;
      const isStiff = i >= trapezoidal;
      let total = c[at + past.oldU] * s[slots + L.OLD_AUDIO] + c[at + past.oldU + 1] * s[slots + L.OLD_CONTROL];
      for (let k = 0; k < n; k++) {
        total += c[at + k] * (isStiff && k >= trapezoidal ? pastOf(s, n, stiff, k - trapezoidal) : s[k]);
      }
      if (!isStiff) {
        total += c[at + past.oldI] * s[slots + L.CHANNEL_A];
        total += c[all.memoryJunction + 2 * i] * s[slots + L.JUNCTION_S] + c[all.memoryJunction + 2 * i + 1] * s[slots + L.JUNCTION_D];
      }
      memories[i] = total;
    }
  };

  return (c, t, w, e, s, audio, control, output, from, to) => {
    for (let i = from; i < to; i++) {
      const u = audio[i];
      const v = control[i];
      remember(c, s);
      let a = sum(c, 0, memories, u, v);
      let b = sum(c, 1, memories, u, v);
      let noiseA = 0;
      const noise = i * (all.rows + 1);
      if (w.length > 0) {
        const slope = slopeAt(c, t, all.device, s[slots + L.OVERDRIVE_S]) + slopeAt(c, t, all.device, s[slots + L.OVERDRIVE_D]);
        noiseA = w[noise + all.rows] * Math.sqrt(0.5 * slope);
        a += w[noise] + c[aI] * noiseA;
        b += w[noise + 1] + c[bI] * noiseA;
      }
      solveChannel(c, t, all.device, aI, bI, a, b, 2 * s[slots + L.CHANNEL_A] - s[slots + L.EARLIER_A], s, slots + L.TERM_S);
      const free = s[slots + L.TERM_S];
      s[slots + L.EARLIER_A] = s[slots + L.CHANNEL_A];
      const qs = s[slots + L.OVERDRIVE_S];
      const qd = s[slots + L.OVERDRIVE_D];
      const vs = a + c[aI] * free;
      const vd = b + c[bI] * free;
      if (vs > c[all.device + L.ON_V] || vd > c[all.device + L.ON_V]) {
        conductor(c, t, all.device, aI, bI, all.junction, s, slots, a, b, free);
      } else {
        s[slots + L.CHANNEL_A] = free;
        s[slots + L.JUNCTION_S] = 0;
        s[slots + L.JUNCTION_D] = 0;
        s[slots + L.OVERDRIVE_S] = vs;
        s[slots + L.OVERDRIVE_D] = vd;
      }
      s[slots + L.CHANNEL_A] += noiseA;
      const current = s[slots + L.CHANNEL_A];
      const S = s[slots + L.JUNCTION_S];
      const D = s[slots + L.JUNCTION_D];
      for (let k = 0; k < stiff; k++) {
        s[n + 2 * stiff + k] = s[n + stiff + k];
        s[n + stiff + k] = s[n + k];
        s[n + k] = s[trapezoidal + k];
      }
      const added = (r: number) => c[r * row.width + row.current] * current + c[all.junction + 2 * r] * S + c[all.junction + 2 * r + 1] * D;
      for (let k = 0; k < n; k++) s[k] = sum(c, 2 + k, memories, u, v) + added(2 + k) + (w.length > 0 ? w[noise + 2 + k] : 0);
      output[i] = sum(c, all.outputRow, s, u, v) + added(all.outputRow) + (w.length > 0 ? w[noise + all.outputRow] : 0);
      if (e.length > 0) {
        s[slots + L.BEFORE_S] = qs;
        s[slots + L.BEFORE_D] = qd;
        s[slots + L.PER_A] = c[all.outputRow * row.width + row.current];
        markCrossing(c, t, all.device, aI, bI, e, i, s, slots);
      }
      s[slots + L.OLD_AUDIO] = u;
      s[slots + L.OLD_CONTROL] = v;
    }
  };
}

function markCrossing(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  e: Float64Array,
  i: number,
  s: Float64Array,
  slots: number,
): void {
  const qs = s[slots + L.BEFORE_S];
  const qd = s[slots + L.BEFORE_D];
  const vs = s[slots + L.OVERDRIVE_S];
  const vd = s[slots + L.OVERDRIVE_D];
  if (c[device + L.LAW] === L.LAW_NUMBER.smooth || (vs > 0 === qs > 0 && vd > 0 === qd > 0)) return;
  markKink(c, t, device, aI, bI, e, i, s, slots);
}

/** The past of stiff state `k` as its backward difference weighs it. */
function pastOf(s: Float64Array, n: number, stiff: number, k: number): number {
  return 3.5 * s[n - stiff + k] - 2.25 * s[n + k] + (5 / 6) * s[n + stiff + k] - 0.125 * s[n + 2 * stiff + k];
}

/** Channel current, A, from a first guess into `out[at]`, by Newton with the search behind it. */
function solveChannel(
  c: Float64Array,
  t: Float64Array,
  device: number,
  aI: number,
  bI: number,
  a: number,
  b: number,
  guess: number,
  out: Float64Array,
  at: number,
): void {
  if (c[device + L.LAMBDA] !== 0) {
    bent(c, t, device, aI, bI, a, b, guess, out, at);
    return;
  }
  let current = guess;
  for (let step = 0; step < NEWTON_STEPS; step++) {
    const vs = a + c[aI] * current;
    const vd = b + c[bI] * current;
    const miss = termAt(c, t, device, vs) - termAt(c, t, device, vd) - current;
    const change = miss / (c[aI] * slopeAt(c, t, device, vs) - c[bI] * slopeAt(c, t, device, vd) - 1);
    current -= change;
    if (Math.abs((c[bI] - c[aI]) * change) < c[device + L.ENOUGH_V]) {
      out[at] = current;
      return;
    }
  }
  searched(c, t, device, aI, bI, a, b, out, at);
  out[at - L.TERM_S + L.FALLBACKS] += 1;
}
