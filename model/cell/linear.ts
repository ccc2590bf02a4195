/**
 * Dense linear equations of a few unknowns, in place and without allocation: LU with partial pivoting (Golub & Van Loan, Matrix Computations,
 * algorithm 3.4.1, from memory). Row-major.
 */

/** Factors the `size` × `size` matrix in place. False when a pivot is zero or not finite. */
export function factor(matrix: Float64Array, pivots: Int32Array, size: number): boolean {
  for (let k = 0; k < size; k++) {
    let best = k;
    for (let row = k + 1; row < size; row++) {
      if (Math.abs(matrix[row * size + k]) > Math.abs(matrix[best * size + k])) best = row;
    }
    pivots[k] = best;
    const pivot = matrix[best * size + k];
    if (!(Math.abs(pivot) > 0) || !Number.isFinite(pivot)) return false;
    if (best !== k) swapRows(matrix, size, k, best);
    for (let row = k + 1; row < size; row++) {
      const ratio = matrix[row * size + k] / pivot;
      matrix[row * size + k] = ratio;
      if (ratio === 0) continue;
      for (let column = k + 1; column < size; column++) matrix[row * size + column] -= ratio * matrix[k * size + column];
    }
  }
  return true;
}

/** Solves for `width` right-hand sides, the columns of `right` (`size` × `width`), in place. */
export function solve(factored: Float64Array, pivots: Int32Array, size: number, right: Float64Array, width: number): void {
  for (let k = 0; k < size; k++) {
    if (pivots[k] !== k) swapRows(right, width, k, pivots[k]);
  }
  for (let k = 0; k < size; k++) {
    for (let row = k + 1; row < size; row++) subtractRow(right, width, row, k, factored[row * size + k]);
  }
  for (let k = size - 1; k >= 0; k--) {
    const pivot = factored[k * size + k];
    for (let column = 0; column < width; column++) right[k * width + column] /= pivot;
    for (let row = 0; row < k; row++) subtractRow(right, width, row, k, factored[row * size + k]);
  }
}

/**
 * One step of iterative refinement (Golub & Van Loan, section 3.5.3, from memory): takes out of the `solved` columns what `matrix` says that they miss of
 * `right`, so that a large path beside small ones leaves no rounding in equations that do not know it. `miss` is room for as many numbers as `right`.
 */
export function refine(
  matrix: Float64Array,
  factored: Float64Array,
  pivots: Int32Array,
  size: number,
  right: Float64Array,
  solved: Float64Array,
  miss: Float64Array,
  width: number,
): void {
  for (let row = 0; row < size; row++) {
    for (let column = 0; column < width; column++) {
      let sum = right[row * width + column];
      for (let k = 0; k < size; k++) sum -= matrix[row * size + k] * solved[k * width + column];
      miss[row * width + column] = sum;
    }
  }
  makeGood(factored, pivots, size, solved, miss, width);
}

/** Takes out of the `solved` columns what is missed, which is used up. */
export function makeGood(
  factored: Float64Array,
  pivots: Int32Array,
  size: number,
  solved: Float64Array,
  miss: Float64Array,
  width: number,
): void {
  solve(factored, pivots, size, miss, width);
  for (let i = 0; i < size * width; i++) solved[i] += miss[i];
}

function subtractRow(right: Float64Array, width: number, row: number, from: number, ratio: number): void {
  if (ratio === 0) return;
  for (let column = 0; column < width; column++) right[row * width + column] -= ratio * right[from * width + column];
}

function swapRows(matrix: Float64Array, width: number, a: number, b: number): void {
  for (let column = 0; column < width; column++) {
    const kept = matrix[a * width + column];
    matrix[a * width + column] = matrix[b * width + column];
    matrix[b * width + column] = kept;
  }
}
