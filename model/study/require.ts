/** Throws a RangeError that names the quantity and its value unless it lies between the two limits. */
export function requireRange(name: string, value: number, least: number, most: number, unit: string): void {
  if (!(value >= least && value <= most)) throw new RangeError(`${name} is ${value}; expected ${least} to ${most} ${unit}`);
}
