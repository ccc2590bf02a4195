/**
 * A silent copy of the first channel's cell at a quarter of the lower rate: where the gate stands without the audio that rides on it, and what the
 * control alone leaves at the output.
 */
import { advanceCell, type Cell, createCell, settle } from '../cell/cell.ts';
import type { ChainNumbers } from './compile.ts';
import { quietControlV } from '../control/control.ts';

/** A voltage that no cell reaches: beyond it the state is taken to be lost. */
export const RUNAWAY_V = 1e6;

export interface Quiet {
  readonly cell: Cell;
  readonly signal: Float64Array;
  readonly control: Float64Array;
  /** Lower-rate samples until its next step. */
  waiting: number;
  /** Of its last steps. */
  feedthroughPeakV: number;
}

/** Lower-rate samples in a step of the silent copy. */
const QUIET_STEP = 4;

/** At its operating point; for blocks of up to `longest` lower-rate samples. Throws when the cell's network is singular. */
export function createQuiet({ cells, control, sampleRateHz }: ChainNumbers, longest: number): Quiet {
  const cell = createCell(cells[0], QUIET_STEP / sampleRateHz);
  settle(cell, 0, quietControlV(control));
  const steps = longest / QUIET_STEP;
  return { cell, signal: new Float64Array(steps), control: new Float64Array(steps), waiting: QUIET_STEP, feedthroughPeakV: 0 };
}

/** Advances over `count` lower-rate samples on the first channel's `control`, V at the upper rate. */
export function advanceQuiet(quiet: Quiet, numbers: ChainNumbers, control: Float64Array, count: number): void {
  let steps = 0;
  for (let i = 0; i < count; i++) {
    quiet.waiting -= 1;
    if (quiet.waiting > 0) continue;
    quiet.waiting = QUIET_STEP;
    quiet.signal[steps] = 0;
    quiet.control[steps] = control[(i + 1) * numbers.oversampling - 1];
    steps += 1;
  }
  if (steps === 0) return;
  advanceCell(quiet.cell, quiet.signal, quiet.control, 0, steps);
  quiet.feedthroughPeakV = 0;
  for (let i = 0; i < steps; i++) quiet.feedthroughPeakV = Math.max(quiet.feedthroughPeakV, Math.abs(quiet.signal[i]));
  if (quiet.feedthroughPeakV < RUNAWAY_V) return;
  quiet.feedthroughPeakV = 0;
  settle(quiet.cell, 0, quietControlV(numbers.control));
}
