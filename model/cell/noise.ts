/**
 * Thermal noise of the resistors and of the channel, sample by sample.
 *
 * Law      each conductance G carries a white current of density 4kTG (A²/Hz, one-sided); the channel 4kT·g at its present slope
 * Scheme   a Gaussian current held over each step, of variance 2kTG times the step rate
 * Error    the hold falls by sin(x)/x towards half the step rate: 0.04 dB at 20 kHz of 384 kHz
 * Source   Johnson, Nyquist, Phys. Rev. 32 (1928); channel: van der Ziel, Proc. IRE 50 (1962) 1808
 */
import { type GaussianSource, nextGaussian } from '../device/random.ts';
import { ZERO_CELSIUS_K } from '../device/temperature.ts';
import type { Cell } from './cell.ts';
import { noiseWidth } from './kernels/layout.ts';
import { DRIVES } from './plan.ts';
import { stepColumns } from './reduce.ts';

/** J/K (SI 2019, exact). */
const BOLTZMANN = 1.380649e-23;

/** Fills the rows of the samples `from` to `to` for a cell that was compiled for noise. Allocates nothing. */
export function fillNoise(cell: Cell, source: GaussianSource, tempC: number, rows: Float64Array, from: number, to: number): void {
  const n = cell.stateCount;
  const { plan, polarity } = cell.numbers;
  const { step, response, values } = cell.reduction;
  const columns = stepColumns(n, plan.noisy.length);
  const width = noiseWidth(n);
  const scale = (2 * BOLTZMANN * (tempC + ZERO_CELSIUS_K)) / cell.stepSec;
  for (let i = from; i < to; i++) {
    const at = i * width;
    for (let row = 0; row < width - 1; row++) rows[at + row] = 0;
    for (let k = 0; k < plan.noisy.length; k++) {
      const current = nextGaussian(source) * Math.sqrt(scale * values[plan.noisy[k]]);
      for (let row = 0; row < n + 2; row++) {
        rows[at + row] += (row < 2 ? polarity : 1) * step[row * columns.width + columns.noise + k] * current;
      }
      rows[at + n + 2] += response[(n + 2) * plan.width + n + DRIVES + k] * current;
    }
    rows[at + width - 1] = nextGaussian(source) * Math.sqrt(scale);
  }
}
