/** Axes as numbers: a value to a pixel and back, and where the ticks stand. Pixels are sheet pixels (1/16 rem). */

export interface Scale {
  readonly kind: 'linear' | 'log';
  /** Values at the two ends; both above zero for a logarithmic scale. */
  readonly from: number;
  readonly to: number;
  /** Pixels at the two ends. */
  readonly start: number;
  readonly end: number;
}

export function linearScale(from: number, to: number, start: number, end: number): Scale {
  return { kind: 'linear', from, to, start, end };
}

export function logScale(from: number, to: number, start: number, end: number): Scale {
  if (!(from > 0 && to > 0)) throw new RangeError(`a logarithmic scale runs from ${from} to ${to}; expected both above 0`);
  return { kind: 'log', from, to, start, end };
}

/** A value that a logarithmic scale cannot show (zero or below) lands past its low end, at −Infinity of the axis. */
export function toPixel(scale: Scale, value: number): number {
  const { from, to, start, end } = scale;
  const fraction = scale.kind === 'linear' ? (value - from) / (to - from) : Math.log(value / from) / Math.log(to / from);
  return start + fraction * (end - start);
}

export function toValue(scale: Scale, pixel: number): number {
  const { from, to, start, end } = scale;
  const fraction = (pixel - start) / (end - start);
  return scale.kind === 'linear' ? from + fraction * (to - from) : from * Math.exp(fraction * Math.log(to / from));
}

/** Round values (1, 2 or 5 times a power of ten apart), at most `most` of them, inside from…to. */
export function linearTicks(from: number, to: number, most: number): number[] {
  const low = Math.min(from, to);
  const high = Math.max(from, to);
  const raw = (high - low) / Math.max(1, most - 1);
  const decade = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].map((n) => n * decade).find((candidate) => candidate >= raw * (1 - 1e-9)) ?? 10 * decade;
  const ticks: number[] = [];
  for (let n = Math.ceil(low / step - 1e-9); n * step <= high + step * 1e-9; n++) ticks.push(Number((n * step).toPrecision(12)));
  return ticks;
}

/** The powers of ten inside from…to. */
export function decadeTicks(from: number, to: number): number[] {
  const ticks: number[] = [];
  for (let n = Math.ceil(Math.log10(from) - 1e-9); n <= Math.log10(to) + 1e-9; n++) ticks.push(Number((10 ** n).toPrecision(12)));
  return ticks;
}
