/**
 * The values of a cell's parts: put in force at once, or approached sample by sample. Nothing here allocates: values move on the audio thread.
 */
import type { Cell } from './cell.ts';
import { addHeld, packStep } from './pack.ts';
import { discretise, respond } from './reduce.ts';

/** Puts new values in force; the state stays as it is. False, with the old coefficients kept, when the network would be singular. */
export function loadValues(cell: Cell, values: Float64Array): boolean {
  if (!pack(cell, values, true)) return false;
  arrive(cell);
  return true;
}

/** The same with what `from`, a cell of the same circuit that advances by another step, has just computed for its values. */
export function loadValuesOf(cell: Cell, from: Cell): boolean {
  cell.reduction.response.set(from.reduction.response);
  cell.reduction.values.set(from.reduction.values);
  if (!discretise(cell.reduction, cell.stepSec)) return false;
  cell.values.set(from.values);
  packStep(cell);
  arrive(cell);
  return true;
}

/**
 * Sets out for new values, to be reached in `samples` steps of `approach`: the coefficients are exact here, half way, with the values `between`, and
 * there, and follow the parabola through these, unless values are too far apart for that. `last` says that the values are those of the end of a move, and are to
 * be in force as if they had been loaded. False, and nothing changes, when a network would be singular.
 */
export function aimAt(cell: Cell, between: Float64Array, values: Float64Array, samples: number, last: boolean): boolean {
  const { coefficients, middle, target, increment, bend } = cell;
  const near = areNear(cell, values);
  const solved = pack(cell, between, false);
  middle.set(target);
  if (!solved || !pack(cell, values, last)) {
    target.set(coefficients);
    cell.moving[0] = 0;
    cell.movingMemory[0] = 0;
    return false;
  }
  if (!near) arrive(cell);
  const { memory, device, held, own } = cell.layout.all;
  cell.moving[0] = 0;
  cell.movingMemory[0] = 0;
  for (let i = 0; i < target.length; i++) {
    const way = target[i] - coefficients[i];
    const sag = coefficients[i] - 2 * middle[i] + target[i];
    // A threshold that was or becomes infinite has no way between: it changes on arrival.
    const moves = near && Number.isFinite(way) && Number.isFinite(sag);
    bend[i] = moves ? (4 * sag) / (samples * samples) : 0;
    increment[i] = moves ? (way - 2 * sag) / samples + 0.5 * bend[i] : 0;
    if (increment[i] === 0 && bend[i] === 0) continue;
    const isMemory = (i >= memory && i < device) || (i >= held && i < own);
    const list = isMemory ? cell.movingMemory : cell.moving;
    list[0] += 1;
    list[list[0]] = i;
  }
  return true;
}

/** The coefficients of new values, into `target`. */
function pack(cell: Cell, values: Float64Array, refined: boolean): boolean {
  const { reduction, stepSec } = cell;
  const { values: moved } = reduction;
  for (let i = 0; i < moved.length; i++) moved[i] = values[i];
  if (!respond(reduction, refined) || !discretise(reduction, stepSec)) {
    for (let i = 0; i < moved.length; i++) moved[i] = cell.values[i];
    respond(reduction, refined);
    discretise(reduction, stepSec);
    return false;
  }
  for (let i = 0; i < values.length; i++) cell.values[i] = values[i];
  packStep(cell);
  return true;
}

/** The most by which a part's value may change along one parabola. */
const MOST_RATIO = 1.5;

/**
 * Whether no part's value changes by more than half. A parabola between the coefficients of circuits further apart leads through what is no
 * circuit, and may grow without limit: a move over decades steps there, in its first slices, and is heard as the click that it would be on a board.
 */
function areNear(cell: Cell, values: Float64Array): boolean {
  const { elements } = cell.numbers.plan;
  for (let i = 0; i < elements.length; i++) {
    const { kind } = elements[i];
    if (kind !== 'conductance' && kind !== 'capacitor' && kind !== 'inductor') continue;
    const smaller = Math.min(values[i], cell.values[i]);
    if (Math.max(values[i], cell.values[i]) > MOST_RATIO * smaller) return false;
  }
  return true;
}

/** One step towards the values aimed at, before a sample: all but what the rows remember. */
export function approach(cell: Cell): void {
  stepOn(cell, cell.moving);
  addHeld(cell, cell.coefficients);
}

/** The same step, after the sample, of what the rows remember: currents of the sample before flowed through the parts as they were then. */
export function approachMemory(cell: Cell): void {
  stepOn(cell, cell.movingMemory);
}

function stepOn({ coefficients, increment, bend }: Cell, places: Int32Array): void {
  const count = places[0];
  for (let k = 1; k <= count; k++) {
    const i = places[k];
    coefficients[i] += increment[i];
    increment[i] += bend[i];
  }
}

/** The values aimed at, exactly. */
export function arrive(cell: Cell): void {
  cell.coefficients.set(cell.target);
}
