/**
 * Softens the kinks of a sampled signal: where something begins or ends between two samples, the four samples about it are corrected as if that had been
 * sampled without what folds into the audio band.
 *
 * Scheme   corrections by shape and place from a table of kinkTables.ts, mirrored in time where the shape ends
 * Error    cell at ×8, 9 kHz, 1 V peak, 0.1 V of overdrive: worst folded product −73 dB without, under −100 dB with; what is left at lower factors is that
 *          the overdrive is no straight line over a step (test/model/chain/kinks.test.ts)
 */
import { KINK_WIDTH } from '../cell/kernels/kinks.ts';
import { PLACES, REACH, SHAPES } from './kinkTables.ts';

/** Samples by which the corrected signal is later: a kink's first correction is that much before the sample that reveals it. */
export const KINK_DELAY = 2;

export interface Softener {
  readonly table: Float64Array;
  /** The last samples of the block before. */
  readonly late: Float64Array;
  /** Correction of the first sample of the next. */
  readonly ahead: Float64Array;
}

export function createSoftener(table: Float64Array): Softener {
  return { table, late: new Float64Array(KINK_DELAY), ahead: new Float64Array(1) };
}

export function clearSoftener({ late, ahead }: Softener): void {
  late.fill(0);
  ahead.fill(0);
}

/** Delays `count` samples of `signal`, at least KINK_DELAY, in place and corrects them at the marked `kinks`, which are then forgotten. */
export function soften({ table, late, ahead }: Softener, signal: Float64Array, kinks: Float64Array, count: number): void {
  const first = late[0];
  const second = late[1];
  signal[0] += ahead[0];
  ahead[0] = 0;
  late[0] = signal[count - 2];
  late[1] = signal[count - 1];
  signal.copyWithin(KINK_DELAY, 0, count - KINK_DELAY);
  signal[0] = first;
  signal[1] = second;
  for (let k = 0; k < kinks[0]; k++) {
    const at = 1 + KINK_WIDTH * k;
    const begins = kinks[at + 1] > 0;
    const d = kinks[at + 2] * PLACES;
    const u = kinks[at + 3] * SHAPES;
    const row = Math.min(SHAPES - 1, Math.floor(u));
    const column = Math.min(PLACES - 1, Math.floor(d));
    for (let m = 0; m < REACH; m++) {
      const place = kinks[at] + (begins ? m : REACH - 1 - m);
      const value = kinks[at + 4] * between(table, row, u - row, column, d - column, m);
      if (place < count) signal[place] += value;
      else if (place < count + KINK_DELAY) late[place - count] += value;
      else ahead[0] += value;
    }
  }
  kinks[0] = 0;
}

function between(table: Float64Array, row: number, u: number, column: number, d: number, m: number): number {
  const at = (row * (PLACES + 1) + column) * REACH + m;
  const above = at + (PLACES + 1) * REACH;
  const low = table[at] + d * (table[at + REACH] - table[at]);
  const high = table[above] + d * (table[above + REACH] - table[above]);
  return low + u * (high - low);
}
