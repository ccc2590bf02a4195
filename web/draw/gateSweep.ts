/**
 * Fig. 3, against time: the gate's voltage written from left to right over a fixed time, then over again. What the pen has not reached yet is
 * of the time before.
 */
import type { Point } from './line.ts';
import { type Scale, toPixel } from './scale.ts';

interface Reading {
  readonly atSec: number;
  readonly gateV: number;
}

export interface GateSweep {
  note(atSec: number, gateV: number): void;
  clear(): void;
  /** Oldest first, over the last `spanSec`. */
  readings(): readonly Reading[];
}

/** Gap, s, that a line is not drawn over: sound had stopped. */
const GAP_SEC = 0.3;
/** Share of the time that stays blank before the pen, so that old and new do not meet. */
const BLANK = 0.02;

export function createGateSweep(spanSec: number): GateSweep {
  let kept: Reading[] = [];
  return {
    note(atSec, gateV) {
      kept.push({ atSec, gateV });
      const first = kept.findIndex((reading) => reading.atSec > atSec - spanSec);
      if (first > 0) kept = kept.slice(first);
    },
    clear() {
      kept = [];
    },
    readings: () => kept,
  };
}

/** The present turn up to the pen, and what is left of the one before; points that are not finite break a line. */
export function sweepLines(
  readings: readonly Reading[],
  spanSec: number,
  x: Scale,
  y: Scale,
): { now: Point[]; before: Point[]; pen: Point | null } {
  const lines: { now: Point[]; before: Point[] } = { now: [], before: [] };
  const last = readings.at(-1);
  if (last === undefined) return { ...lines, pen: null };
  const turn = Math.floor(last.atSec / spanSec);
  const penSec = last.atSec - turn * spanSec;
  let previous: Reading | undefined;
  for (const reading of readings) {
    const place = { x: toPixel(x, reading.atSec % spanSec), y: toPixel(y, reading.gateV) };
    const now = Math.floor(reading.atSec / spanSec) === turn;
    const line = now ? lines.now : lines.before;
    if (previous && reading.atSec - previous.atSec > GAP_SEC) line.push({ x: place.x, y: Number.NaN });
    if (now || reading.atSec % spanSec > penSec + BLANK * spanSec) line.push(place);
    previous = reading;
  }
  return { ...lines, pen: lines.now.at(-1) ?? null };
}
