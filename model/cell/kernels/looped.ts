/**
 * The kernel for any law and any number of states, in loops over the same coefficients: for circuits of a shape that is not written out. Several times
 * slower than those; the same voltages to rounding (test/model/cell/kernels.test.ts).
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
  const all = L.coefficientLayout(n);
  const slots = L.slotStart(trapezoidal, stiff);
  const aI = row.current;
  const bI = row.width + row.current;
  /** What each row remembers, then the audio, the control and 1: the drives of every row, in the order of its coefficients. */
  const drives = new Float64Array(n + 3);
  /** The past of the stiff states as their backward differences weigh it, the trapezoidal ones as they are. */
  const past = new Float64Array(n);
  /** The sums of all rows. */
  const sums = new Float64Array(n + 3);

  return (c, t, w, e, s, audio, control, output, from, to) => {
    for (let i = from; i < to; i++) {
      weighPast(s, past, trapezoidal, stiff);
      remember(c, s, past, drives, trapezoidal, n, slots);
      drives[n] = audio[i];
      drives[n + 1] = control[i];
      drives[n + 2] = 1;
      addRows(c, drives, sums, n + 2, row.width);
      const noise = i * (all.rows + 1);
      let noiseA = 0;
      if (w.length > 0) {
        const slope = slopeAt(c, t, all.device, s[slots + L.OVERDRIVE_S]) + slopeAt(c, t, all.device, s[slots + L.OVERDRIVE_D]);
        noiseA = w[noise + all.rows] * Math.sqrt(0.5 * slope);
        for (let r = 0; r < n + 2; r++) sums[r] += w[noise + r];
        sums[0] += c[aI] * noiseA;
        sums[1] += c[bI] * noiseA;
      }
      solvePorts(c, t, s, sums, all.device, aI, bI, all.junction, slots, conductor);
      const crossed = e.length > 0 && hasCrossed(s, slots);
      s[slots + L.CHANNEL_A] += noiseA;
      shiftPast(s, n, trapezoidal, stiff);
      const current = s[slots + L.CHANNEL_A];
      const S = s[slots + L.JUNCTION_S];
      const D = s[slots + L.JUNCTION_D];
      for (let k = 0; k < n; k++) {
        s[k] =
          sums[2 + k] +
          c[(2 + k) * row.width + row.current] * current +
          c[all.junction + 2 * (2 + k)] * S +
          c[all.junction + 2 * (2 + k) + 1] * D;
      }
      const at = all.outputRow * row.width;
      let y = c[at + row.u] * audio[i] + c[at + row.u + 1] * control[i] + c[at + row.constant] + c[at + row.current] * current;
      for (let k = 0; k < n; k++) y += c[at + k] * s[k];
      output[i] =
        y +
        c[all.junction + 2 * all.outputRow] * S +
        c[all.junction + 2 * all.outputRow + 1] * D +
        (w.length > 0 ? w[noise + all.outputRow] : 0);
      if (crossed && c[all.device + L.LAW] !== L.LAW_NUMBER.smooth) {
        s[slots + L.PER_A] = c[at + row.current];
        markKink(c, t, all.device, aI, bI, e, i, s, slots);
      }
      s[slots + L.OLD_AUDIO] = drives[n];
      s[slots + L.OLD_CONTROL] = drives[n + 1];
    }
  };
}

export function weighPast(s: Float64Array, past: Float64Array, trapezoidal: number, stiff: number): void {
  const n = trapezoidal + stiff;
  for (let k = 0; k < trapezoidal; k++) past[k] = s[k];
  for (let k = 0; k < stiff; k++) {
    past[trapezoidal + k] = 3.5 * s[trapezoidal + k] - 2.25 * s[n + k] + (5 / 6) * s[n + stiff + k] - 0.125 * s[n + 2 * stiff + k];
  }
}

export function remember(
  c: Float64Array,
  s: Float64Array,
  past: Float64Array,
  drives: Float64Array,
  trapezoidal: number,
  n: number,
  slots: number,
): void {
  const layout = L.memoryLayout(n);
  const all = L.coefficientLayout(n);
  for (let i = 0; i < n; i++) {
    const at = all.memory + i * layout.width;
    const isStiff = i >= trapezoidal;
    let total = c[at + layout.oldU] * s[slots + L.OLD_AUDIO] + c[at + layout.oldU + 1] * s[slots + L.OLD_CONTROL];
    for (let k = 0; k < n; k++) total += c[at + k] * (isStiff ? past[k] : s[k]);
    if (!isStiff) {
      total += c[at + layout.oldI] * s[slots + L.CHANNEL_A];
      total += c[all.memoryJunction + 2 * i] * s[slots + L.JUNCTION_S] + c[all.memoryJunction + 2 * i + 1] * s[slots + L.JUNCTION_D];
    }
    drives[i] = total;
  }
}

/** The first `rows` rows of the coefficients, each times the drives. */
export function addRows(c: Float64Array, drives: Float64Array, sums: Float64Array, rows: number, width: number): void {
  const length = drives.length;
  for (let r = 0; r < rows; r++) {
    const at = r * width;
    let even = 0;
    let odd = 0;
    for (let k = 0; k + 1 < length; k += 2) {
      even += c[at + k] * drives[k];
      odd += c[at + k + 1] * drives[k + 1];
    }
    sums[r] = length % 2 === 1 ? even + odd + c[at + length - 1] * drives[length - 1] : even + odd;
  }
}

export function shiftPast(s: Float64Array, n: number, trapezoidal: number, stiff: number): void {
  for (let k = 0; k < stiff; k++) {
    s[n + 2 * stiff + k] = s[n + stiff + k];
    s[n + stiff + k] = s[n + k];
    s[n + k] = s[trapezoidal + k];
  }
}

/** Channel and junction currents and overdrives into their slots; those of the sample before into BEFORE_S and BEFORE_D. */
function solvePorts(
  c: Float64Array,
  t: Float64Array,
  s: Float64Array,
  sums: Float64Array,
  device: number,
  aI: number,
  bI: number,
  junction: number,
  slots: number,
  conductor: Conductor,
): void {
  const a = sums[0];
  const b = sums[1];
  s[slots + L.BEFORE_S] = s[slots + L.OVERDRIVE_S];
  s[slots + L.BEFORE_D] = s[slots + L.OVERDRIVE_D];
  solveChannel(c, t, device, aI, bI, a, b, 2 * s[slots + L.CHANNEL_A] - s[slots + L.EARLIER_A], s, slots + L.TERM_S);
  const free = s[slots + L.TERM_S];
  s[slots + L.EARLIER_A] = s[slots + L.CHANNEL_A];
  const vs = a + c[aI] * free;
  const vd = b + c[bI] * free;
  if (vs > c[device + L.ON_V] || vd > c[device + L.ON_V]) {
    s[slots + L.GIVEN_A] = a;
    s[slots + L.GIVEN_B] = b;
    s[slots + L.GIVEN_FREE] = free;
    conductor(c, t, device, aI, bI, junction, s, slots);
    return;
  }
  s[slots + L.CHANNEL_A] = free;
  s[slots + L.JUNCTION_S] = 0;
  s[slots + L.JUNCTION_D] = 0;
  s[slots + L.OVERDRIVE_S] = vs;
  s[slots + L.OVERDRIVE_D] = vd;
}

function hasCrossed(s: Float64Array, slots: number): boolean {
  return s[slots + L.OVERDRIVE_S] > 0 !== s[slots + L.BEFORE_S] > 0 || s[slots + L.OVERDRIVE_D] > 0 !== s[slots + L.BEFORE_D] > 0;
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
