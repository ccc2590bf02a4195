/** Ticks of axes that carry a unit: round numbers, the unit on the last. */
import type { Tick } from './plotArea.ts';
import { linearTicks, type Scale, toPixel } from './scale.ts';
import { decimals } from './words.ts';

const THIN = '\u2009';
const PREFIXES = [
  [1, ''],
  [1e-3, 'm'],
  [1e-6, 'μ'],
  [1e-9, 'n'],
  [1e-12, 'p'],
  [1e-15, 'f'],
] as const;

/** The prefix in which a size has one to three digits before the point; the least there is for what is smaller. */
function prefixFor(size: number): readonly [scale: number, prefix: string] {
  return PREFIXES.find(([scale]) => size >= 0.9995 * scale) ?? (size === 0 ? PREFIXES[0] : PREFIXES[PREFIXES.length - 1]);
}

/** At most `most` numbers on a linear axis of this unit, in the prefix of its larger end; the unit stands on the number at `unitAt`. */
export function quantityTicks(axis: Scale, unit: string, most: number, unitAt: 'first' | 'last' = 'last'): Tick[] {
  const [scale, prefix] = prefixFor(Math.max(Math.abs(axis.from), Math.abs(axis.to)));
  const ticks = linearTicks(axis.from / scale, axis.to / scale, most);
  const step = ticks.length > 1 ? Math.abs(ticks[1] - ticks[0]) : 1;
  const digits = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const named = unitAt === 'last' ? ticks.length - 1 : 0;
  return ticks.map((value, n) => {
    const words = decimals(value, value === 0 ? 0 : digits);
    return { at: toPixel(axis, value * scale), words: n === named ? `${words}${THIN}${prefix}${unit}` : words };
  });
}
