/**
 * Numbers as unevaluated sums of two doubles, about 32 digits: what the solver's own rounding is judged by. Two neighbouring places of a Float64Array
 * hold one number, the larger part first.
 *
 * Source   Dekker, Numer. Math. 18 (1971) 224; Ogita, Rump & Oishi, SIAM J. Sci. Comput. 26 (2005) 1955 (from memory)
 */
const SPLIT = 134217729;

/** What is lost when p = a·b is rounded. */
function productError(a: number, b: number, p: number): number {
  const ca = SPLIT * a;
  const ah = ca - (ca - a);
  const al = a - ah;
  const cb = SPLIT * b;
  const bh = cb - (cb - b);
  const bl = b - bh;
  return al * bl - (p - ah * bh - al * bh - ah * bl);
}

/** to[i] += sign · a[j] · b[k]. */
export function addProduct(to: Float64Array, i: number, sign: number, a: Float64Array, j: number, b: Float64Array, k: number): void {
  const ah = sign * a[2 * j];
  const bh = b[2 * k];
  const p = ah * bh;
  if (p === 0) return;
  const low = productError(ah, bh, p) + ah * b[2 * k + 1] + sign * a[2 * j + 1] * bh;
  addPair(to, i, p, low);
}

function addPair(to: Float64Array, i: number, high: number, low: number): void {
  const h = to[2 * i];
  const s = h + high;
  const back = s - h;
  const lost = h - (s - back) + (high - back) + low + to[2 * i + 1];
  const sum = s + lost;
  to[2 * i] = sum;
  to[2 * i + 1] = lost - (sum - s);
}

export function addNumber(to: Float64Array, i: number, value: number): void {
  addPair(to, i, value, 0);
}

/** to[i] = a[j] / b[k]. */
export function divide(to: Float64Array, i: number, a: Float64Array, j: number, b: Float64Array, k: number): void {
  const bh = b[2 * k];
  const bl = b[2 * k + 1];
  let rh = a[2 * j];
  let rl = a[2 * j + 1];
  let high = 0;
  let low = 0;
  for (let step = 0; step < 3; step++) {
    const q = rh / bh;
    const p = q * bh;
    const pl = productError(q, bh, p) + q * bl;
    const s = rh - p;
    const back = s - rh;
    const lost = rh - (s - back) + (-p - back) - pl + rl;
    rh = s + lost;
    rl = lost - (rh - s);
    const t = high + q;
    low += step === 0 ? 0 : q - (t - high);
    high = t;
  }
  const sum = high + low;
  to[2 * i] = sum;
  to[2 * i + 1] = low - (sum - high);
}

/** Solves the square system for `width` right-hand sides, both in place, row-major. False when it is singular. Complete rows are scaled by nothing: partial pivoting. */
export function solveTwofold(matrix: Float64Array, size: number, right: Float64Array, width: number): boolean {
  const ratio = new Float64Array(2);
  for (let k = 0; k < size; k++) {
    let best = k;
    for (let row = k + 1; row < size; row++) {
      if (Math.abs(matrix[2 * (row * size + k)]) > Math.abs(matrix[2 * (best * size + k)])) best = row;
    }
    const pivot = matrix[2 * (best * size + k)];
    if (!(Math.abs(pivot) > 0) || !Number.isFinite(pivot)) return false;
    swap(matrix, size, k, best);
    swap(right, width, k, best);
    for (let row = k + 1; row < size; row++) {
      if (matrix[2 * (row * size + k)] === 0) continue;
      divide(ratio, 0, matrix, row * size + k, matrix, k * size + k);
      for (let c = k; c < size; c++) addProduct(matrix, row * size + c, -1, ratio, 0, matrix, k * size + c);
      for (let c = 0; c < width; c++) addProduct(right, row * width + c, -1, ratio, 0, right, k * width + c);
    }
  }
  for (let k = size - 1; k >= 0; k--) {
    for (let c = 0; c < width; c++) {
      for (let row = k + 1; row < size; row++) addProduct(right, k * width + c, -1, matrix, k * size + row, right, row * width + c);
      divide(right, k * width + c, right, k * width + c, matrix, k * size + k);
    }
  }
  return true;
}

function swap(matrix: Float64Array, width: number, a: number, b: number): void {
  if (a === b) return;
  for (let c = 0; c < 2 * width; c++) {
    const kept = matrix[2 * width * a + c];
    matrix[2 * width * a + c] = matrix[2 * width * b + c];
    matrix[2 * width * b + c] = kept;
  }
}
