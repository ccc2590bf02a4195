/**
 * Complex numbers and linear systems, for circuits in the frequency domain.
 *
 * Scheme   elimination with partial pivoting, then one round of refinement by the residual (Golub & Van Loan, Matrix Computations,
 *          algorithms 3.4.1 and 3.5.1, from memory)
 * Error    the refinement's correction over the solution is returned with it: what the elimination had been wrong by
 */

export interface Complex {
  readonly re: number;
  readonly im: number;
}

/** Parts apart; a matrix of size n is row-major, n × n. */
export interface ComplexArray {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

export const ZERO: Complex = { re: 0, im: 0 };
export const ONE: Complex = { re: 1, im: 0 };

export const magnitude = ({ re, im }: Complex): number => Math.sqrt(re * re + im * im);
export const difference = (a: Complex, b: Complex): Complex => ({ re: a.re - b.re, im: a.im - b.im });
export const product = (a: Complex, b: Complex): Complex => ({ re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re });

/** a/b; infinite where b is zero. */
export function quotient(a: Complex, b: Complex): Complex {
  const size = b.re * b.re + b.im * b.im;
  if (size === 0) return { re: Number.POSITIVE_INFINITY, im: 0 };
  return { re: (a.re * b.re + a.im * b.im) / size, im: (a.im * b.re - a.re * b.im) / size };
}

export function complexArray(length: number): ComplexArray {
  return { re: new Float64Array(length), im: new Float64Array(length) };
}

export interface Solution {
  readonly x: ComplexArray;
  /** Largest part of the last correction over the largest part of the solution. */
  readonly errorRatio: number;
}

/** Solves `matrix`·x = `right`, both left as they are. Null when the matrix is singular. */
export function solveComplex(matrix: ComplexArray, right: ComplexArray): Solution | null {
  const x = eliminate(matrix, right);
  if (x === null) return null;
  const correction = eliminate(matrix, residual(matrix, x, right));
  if (correction === null) return null;
  for (let i = 0; i < x.re.length; i++) {
    x.re[i] += correction.re[i];
    x.im[i] += correction.im[i];
  }
  const size = largest(x);
  return { x, errorRatio: size === 0 ? 0 : largest(correction) / size };
}

function largest({ re, im }: ComplexArray): number {
  return re.reduce((most, value, i) => Math.max(most, Math.abs(value), Math.abs(im[i])), 0);
}

function residual(a: ComplexArray, x: ComplexArray, b: ComplexArray): ComplexArray {
  const n = b.re.length;
  const left = { re: b.re.slice(), im: b.im.slice() };
  for (let row = 0; row < n; row++) {
    for (let k = 0; k < n; k++) {
      const at = row * n + k;
      left.re[row] -= a.re[at] * x.re[k] - a.im[at] * x.im[k];
      left.im[row] -= a.re[at] * x.im[k] + a.im[at] * x.re[k];
    }
  }
  return left;
}

function eliminate(matrix: ComplexArray, right: ComplexArray): ComplexArray | null {
  const n = right.re.length;
  const re = matrix.re.slice();
  const im = matrix.im.slice();
  const x = { re: right.re.slice(), im: right.im.slice() };
  for (let k = 0; k < n; k++) {
    const best = pivotRow(re, im, n, k);
    const pivot = { re: re[best * n + k], im: im[best * n + k] };
    if (!(magnitude(pivot) > 0) || !Number.isFinite(magnitude(pivot))) return null;
    if (best !== k) {
      for (let column = 0; column < n; column++) swap(re, im, best * n + column, k * n + column);
      swap(x.re, x.im, best, k);
    }
    for (let row = k + 1; row < n; row++) {
      const ratio = quotient({ re: re[row * n + k], im: im[row * n + k] }, pivot);
      if (ratio.re === 0 && ratio.im === 0) continue;
      for (let column = k; column < n; column++) take(re, im, row * n + column, ratio, re[k * n + column], im[k * n + column]);
      take(x.re, x.im, row, ratio, x.re[k], x.im[k]);
    }
  }
  for (let k = n - 1; k >= 0; k--) {
    for (let column = k + 1; column < n; column++) {
      take(x.re, x.im, k, { re: re[k * n + column], im: im[k * n + column] }, x.re[column], x.im[column]);
    }
    const value = quotient({ re: x.re[k], im: x.im[k] }, { re: re[k * n + k], im: im[k * n + k] });
    x.re[k] = value.re;
    x.im[k] = value.im;
  }
  return x;
}

function pivotRow(re: Float64Array, im: Float64Array, n: number, k: number): number {
  let best = k;
  for (let row = k + 1; row < n; row++) {
    const here = { re: re[row * n + k], im: im[row * n + k] };
    if (magnitude(here) > magnitude({ re: re[best * n + k], im: im[best * n + k] })) best = row;
  }
  return best;
}

/** Subtracts ratio·(re + j·im) from the element at `at`. */
function take(re: Float64Array, im: Float64Array, at: number, ratio: Complex, fromRe: number, fromIm: number): void {
  re[at] -= ratio.re * fromRe - ratio.im * fromIm;
  im[at] -= ratio.re * fromIm + ratio.im * fromRe;
}

function swap(re: Float64Array, im: Float64Array, a: number, b: number): void {
  [re[a], re[b]] = [re[b], re[a]];
  [im[a], im[b]] = [im[b], im[a]];
}
