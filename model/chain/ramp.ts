/**
 * How values go from where they are to where they shall be: a voice's levels sample by sample, a cell's and a control's values slice by slice.
 *
 * Law      straight lines in volts and gain; equal ratios in conductance, capacitance and inductance, so that over decades, too, a slice is a small
 *          part of the way
 */
import type { CellNumbers } from '../cell/cell.ts';
import { expAt, log } from '../device/math.ts';

export interface Moving {
  readonly now: Float64Array;
  readonly from: Float64Array;
  readonly to: Float64Array;
  readonly byRatio: readonly boolean[];
  /** Of those that move by ratio: the logarithm of the whole one. */
  readonly power: Float64Array;
  /** The middle and the end of the present slice, and one sample's part of the way. */
  readonly between: Float64Array;
  readonly aim: Float64Array;
  readonly increment: Float64Array;
}

export interface Levels {
  readonly from: Float64Array;
  readonly to: Float64Array;
  done: number;
  total: number;
}

export function standing(values: Float64Array): Levels {
  return { from: Float64Array.from(values), to: Float64Array.from(values), done: 0, total: 0 };
}

/** Sets out from where the levels are now, to arrive after `total` samples. */
export function setOut(levels: Levels, to: Float64Array, total: number): void {
  for (let index = 0; index < to.length; index++) levels.from[index] = levelAt(levels, index, -1);
  levels.to.set(to);
  levels.done = 0;
  levels.total = total;
}

/** A level at sample `i` of the block. */
export function levelAt({ from, to, done, total }: Levels, index: number, i: number): number {
  const at = done + i + 1;
  return at >= total ? to[index] : from[index] + (at / total) * (to[index] - from[index]);
}

/** `byRatio` marks values that move by equal ratios, the others by equal steps. */
export function moving(values: Float64Array, byRatio: readonly boolean[] = []): Moving {
  const copy = () => Float64Array.from(values);
  const zeros = () => new Float64Array(values.length);
  return { now: values, from: copy(), to: copy(), byRatio, power: zeros(), between: copy(), aim: copy(), increment: zeros() };
}

/** Which of a cell's values are those of parts, and move by equal ratios. */
export function partsOf({ plan, values }: CellNumbers): boolean[] {
  const isPart = ({ kind }: (typeof plan.elements)[number]) => kind === 'conductance' || kind === 'capacitor' || kind === 'inductor';
  return Array.from(values, (_, i) => i < plan.elements.length && isPart(plan.elements[i]));
}

export function retarget(values: Moving, to: Float64Array): void {
  values.from.set(values.now);
  values.to.set(to);
  for (let i = 0; i < to.length; i++) {
    values.power[i] = values.byRatio[i] ? log(to[i] / values.from[i]) : 0;
  }
}

/** Aims at a fraction of the whole way, `samples` steps from here. */
export function aim(values: Moving, fraction: number, middle: number, samples: number): void {
  const { now, to, between, aim: end, increment } = values;
  place(values, middle, between);
  if (fraction === 1) end.set(to);
  else place(values, fraction, end);
  for (let i = 0; i < now.length; i++) increment[i] = (end[i] - now[i]) / samples;
}

/** The values after a fraction of the whole way. */
function place({ from, to, byRatio, power }: Moving, fraction: number, into: Float64Array): void {
  for (let i = 0; i < from.length; i++) {
    if (byRatio[i] && power[i] !== 0) {
      into[i] = fraction * power[i];
      expAt(into, i);
      into[i] *= from[i];
    } else {
      into[i] = from[i] + fraction * (to[i] - from[i]);
    }
  }
}

export function step({ now, increment }: Moving): void {
  for (let i = 0; i < now.length; i++) now[i] += increment[i];
}
