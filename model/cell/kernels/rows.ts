/** The rows of a cell of any number of states, in loops: for a linear twin, which has no port to solve. */
import * as L from './layout.ts';

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
