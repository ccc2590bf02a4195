/** Sets a signal to a number within its bounds, or returns the sentence that refuses it and changes nothing. */
export function setWithin(
  target: { value: number },
  value: number,
  least: number,
  most: number,
  name: string,
  unit: string,
): string | null {
  if (!(value >= least && value <= most)) return `${name} is ${value} ${unit}; expected ${least} to ${most} ${unit}.`;
  target.value = value;
  return null;
}
