/** Sizes of the symbols and the helpers that both forms of the drawing share. Sheet pixels. */
import type { Point } from './line.ts';
import type { PartSymbol, Segment } from './schematic.ts';

export const RESISTOR = { long: 54, across: 19 };
export const PLATES = { wide: 28, apart: 6 };
/** Half circles side by side. */
export const INDUCTOR = { turns: 4, radius: 7 };
export const DIODE = { long: 16, wide: 18 };
export const GENERATOR_RADIUS = 15;
export const SUM_RADIUS = 9;
export const AMPLIFIER = { long: 38, high: 44 };
export const BUFFER = { wide: 36, high: 32 };
/** The JFET: the channel's place left of its leads, and how far it reaches above and below the gate's level. */
export const JFET = { left: 28, above: 78, below: 18, drainAbove: 60 };

/** A run of wire through corner points. */
export function run(...points: readonly Point[]): Segment[] {
  return points.slice(1).map((point, n) => ({ x1: points[n].x, y1: points[n].y, x2: point.x, y2: point.y }));
}

export function across(y: number, ...xs: readonly number[]): Segment[] {
  return gaps(xs).map(([x1, x2]) => ({ x1, y1: y, x2, y2: y }));
}

export function down(x: number, ...ys: readonly number[]): Segment[] {
  return gaps(ys).map(([y1, y2]) => ({ x1: x, y1, x2: x, y2 }));
}

/** Ends taken in pairs: 0–10, 20–30 … with the symbols in between. */
function gaps(ends: readonly number[]): [number, number][] {
  const pairs: [number, number][] = [];
  for (let n = 0; n + 1 < ends.length; n += 2) pairs.push([ends[n], ends[n + 1]]);
  return pairs;
}

/** Half the length that a symbol takes out of its wire. */
export function halfLength(kind: PartSymbol['kind']): number {
  switch (kind) {
    case 'resistor':
    case 'resistorUpright':
      return RESISTOR.long / 2;
    case 'inductor':
      return INDUCTOR.turns * INDUCTOR.radius;
    case 'diode':
      return DIODE.long / 2;
    case 'capacitor':
    case 'capacitorAcross':
      return PLATES.apart / 2;
    case 'generator':
      return GENERATOR_RADIUS;
    case 'sum':
      return SUM_RADIUS;
    case 'buffer':
      return BUFFER.high / 2;
    case 'amplifier':
      return AMPLIFIER.long / 2;
    case 'jfet':
      return JFET.left;
  }
}

/** An upright wire from `top` to `bottom` with symbols on it. */
export function downThrough(x: number, top: number, bottom: number, symbols: readonly PartSymbol[]): Segment[] {
  const ends = [top];
  for (const symbol of symbols) ends.push(symbol.y - halfLength(symbol.kind), symbol.y + halfLength(symbol.kind));
  ends.push(bottom);
  return down(x, ...ends);
}
