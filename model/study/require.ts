import type { Unit } from '../design/values.ts';
import { plainly } from '../design/wording.ts';

/** Throws a RangeError that names the quantity and its value unless it lies between the two limits; `note` stands after them. */
export function requireRange(name: string, value: number, least: number, most: number, unit: Unit, note = ''): void {
  if (value >= least && value <= most) return;
  throw new RangeError(`${name} is ${value}; expected ${plainly(least, unit)} to ${plainly(most, unit)}${note}`);
}
