/**
 * Thermal noise of the resistors and of the channel, sample by sample.
 *
 * Law      each conductance G carries a white current of density 4kTG (A²/Hz, one-sided); the channel 4kT·g at its present slope
 * Scheme   a Gaussian current held over each step, of variance 2kTG times the step rate; what all parts together do to the rows of a sample is made
 *          of as many Gaussian numbers as there are independent rows
 * Error    the hold falls by sin(x)/x towards half the step rate: 0.04 dB at 20 kHz of 384 kHz
 * Source   Johnson, Nyquist, Phys. Rev. 32 (1928); channel: van der Ziel, Proc. IRE 50 (1962) 1808
 */
import { type GaussianSource, putGaussians } from '../device/random.ts';
import { ZERO_CELSIUS_K } from '../device/temperature.ts';
import type { Cell } from './cell.ts';
import { noiseWidth } from './kernels/layout.ts';
import { DRIVES } from './plan.ts';

/** J/K (SI 2019, exact). */
const BOLTZMANN = 1.380649e-23;

/** Of a voltage, what is left when all that others explain is taken away, and is rounding. */
const ROUNDING = 1e-12;

/** What the noisy parts do to the rows of one sample, made anew with the cell's values. */
export interface NoiseRows {
  /** Row by row what each part adds, for 1 A²/S of it; then what no earlier row explains. */
  readonly parts: Float64Array;
  /** The same by as many independent numbers as it takes, in their order: `independent` columns of as many rows as a sample has. */
  readonly weights: Float64Array;
  independent: number;
}

export function createNoiseRows(stateCount: number, partCount: number): NoiseRows {
  const rows = partCount > 0 ? stateCount + 3 : 0;
  return { parts: new Float64Array(rows * partCount), weights: new Float64Array(rows * Math.min(rows, partCount)), independent: 0 };
}

/** Makes the rows from the reduction of the cell. Orthogonal directions of the parts, by Gram and Schmidt; no more than there are rows. */
export function packNoise(cell: Cell): void {
  const { noise, reduction, stateCount: n } = cell;
  const { plan, polarity } = cell.numbers;
  const { step, response, values, layout } = reduction;
  const { parts, weights } = noise;
  const count = plan.noisy.length;
  if (count === 0) return;
  noise.independent = 0;
  weights.fill(0);
  for (let row = 0; row < n + 3; row++) {
    const own = row * count;
    let whole = 0;
    for (let k = 0; k < count; k++) {
      const perA =
        row < n + 2
          ? (row < 2 ? polarity : 1) * step[row * layout.step.width + layout.step.noise + k]
          : response[(n + 2) * plan.width + n + DRIVES + k];
      parts[own + k] = perA * Math.sqrt(values[plan.noisy[k]]);
      whole += parts[own + k] * parts[own + k];
    }
    for (let column = 0; column < noise.independent; column++) {
      const direction = firstRow(noise, column, n + 3) * count;
      let along = 0;
      for (let k = 0; k < count; k++) along += parts[own + k] * parts[direction + k];
      for (let k = 0; k < count; k++) parts[own + k] -= along * parts[direction + k];
      weights[column * (n + 3) + row] = along;
    }
    let left = 0;
    for (let k = 0; k < count; k++) left += parts[own + k] * parts[own + k];
    if (!(left > ROUNDING * ROUNDING * whole) || noise.independent * (n + 3) === weights.length) continue;
    const length = Math.sqrt(left);
    for (let k = 0; k < count; k++) parts[own + k] /= length;
    weights[noise.independent * (n + 3) + row] = length;
    noise.independent += 1;
  }
}

/** The first row that an independent number reaches: its direction stands there in `parts`. */
function firstRow({ weights }: NoiseRows, column: number, rows: number): number {
  let row = 0;
  while (weights[column * rows + row] === 0) row += 1;
  return row;
}

/** Fills the rows of the samples `from` to `to` for a cell that was compiled for noise. Allocates nothing. */
export function fillNoise(cell: Cell, source: GaussianSource, tempC: number, rows: Float64Array, from: number, to: number): void {
  const { weights, independent } = cell.noise;
  const width = noiseWidth(cell.stateCount);
  const root = Math.sqrt((2 * BOLTZMANN * (tempC + ZERO_CELSIUS_K)) / cell.stepSec);
  for (let i = from; i < to; i++) {
    const at = i * width;
    const last = at + width - 1;
    putGaussians(source, rows, at, at + independent + 1);
    rows[last] = root * rows[at + independent];
    for (let column = 0; column < independent; column++) rows[at + column] *= root;
    // Rows from the last up, each in the place of a number that no earlier row needs.
    for (let row = width - 2; row >= 0; row--) {
      let sum = 0;
      for (let column = 0; column <= row && column < independent; column++) sum += weights[column * (width - 1) + row] * rows[at + column];
      rows[at + row] = sum;
    }
  }
}
