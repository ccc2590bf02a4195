/** How a value moves under the arrow keys, the page keys and a drag. */
import { type SeriesName, stepPreferred } from '../../../model/design/preferred.ts';

export type Stepping =
  /** Through the preferred values of a series; the page keys move a decade. `from` is where a step up from zero lands. */
  | { readonly kind: 'preferred'; readonly series: SeriesName; readonly from: number }
  /** By equal steps on a grid; the page keys move ten. */
  | { readonly kind: 'linear'; readonly step: number };

export const E24: Stepping = { kind: 'preferred', series: 'E24', from: 1 };

export function stepValue(value: number, stepping: Stepping, direction: 1 | -1): number {
  if (stepping.kind === 'linear') return onGrid(value, stepping.step, direction);
  if (value > 0) return stepPreferred(value, stepping.series, direction);
  return direction === 1 ? stepping.from : value;
}

export function pageValue(value: number, stepping: Stepping, direction: 1 | -1): number {
  if (stepping.kind === 'linear') return clean(value + 10 * stepping.step * direction);
  if (value > 0) return clean(direction === 1 ? value * 10 : value / 10);
  return direction === 1 ? stepping.from : value;
}

/** Several steps at once, as a drag makes them; 0 leaves the value. */
export function stepMany(value: number, stepping: Stepping, steps: number): number {
  let moved = value;
  for (let n = 0; n < Math.abs(steps); n++) moved = stepValue(moved, stepping, steps > 0 ? 1 : -1);
  return moved;
}

/** A drag that keeps to no steps: `fraction` counts steps, and may lie between them. */
export function freeValue(value: number, stepping: Stepping, fraction: number): number {
  return stepping.kind === 'linear'
    ? Number((value + fraction * stepping.step).toPrecision(4))
    : Number((value * 10 ** (fraction / 24)).toPrecision(3));
}

/** The next multiple of the step; a value off the grid lands on it first. */
function onGrid(value: number, step: number, direction: 1 | -1): number {
  const steps = value / step;
  const next = direction === 1 ? Math.floor(steps + 1e-6) + 1 : Math.ceil(steps - 1e-6) - 1;
  return clean(next * step);
}

const clean = (value: number): number => Number(value.toPrecision(12));
