/** Sets a signal to a number within its bounds, or returns the sentence that refuses it and changes nothing. */
export function setWithin(
  target: { value: number },
  value: number,
  least: number,
  most: number,
  name: string,
  unit: string,
): string | null {
  if (!(value >= least && value <= most))
    return `${name} is ${printed(value)} ${unit}; expected ${printed(least)} to ${printed(most)} ${unit}.`;
  target.value = value;
  return null;
}

const printed = (value: number) => String(value).replace('-', '−');
