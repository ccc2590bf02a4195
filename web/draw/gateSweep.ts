/**
 * Fig. 3, against time: the gate's voltage written from left to right over a fixed time, then over again. What the pen has not reached yet is
 * of the time before.
 */
import type { Point } from './line.ts';
import { type Scale, toPixel } from './scale.ts';

export interface SweepReading {
  readonly atSec: number;
  readonly controlV: number;
  readonly gateSourceV: number;
  /** The ends of what the gate did since the reading before. */
  readonly gateLowV: number;
  readonly gateHighV: number;
}

export interface GateSweep {
  note(reading: SweepReading): void;
  /** Oldest first, over the last `spanSec`. */
  readings(): readonly SweepReading[];
}

/** Gap, s, that a line is not drawn over: sound had stopped. */
const GAP_SEC = 0.3;
/** Share of the time that stays blank before the pen, so that old and new do not meet. */
const BLANK = 0.02;

export function createGateSweep(spanSec: number): GateSweep {
  let kept: SweepReading[] = [];
  return {
    note(reading) {
      kept.push(reading);
      const first = kept.findIndex(({ atSec }) => atSec > reading.atSec - spanSec);
      if (first > 0) kept = kept.slice(first);
    },
    readings: () => kept,
  };
}

/**
 * The present turn up to the pen, and what is left of the one before, through both ends of every reading so that no dip is lost. Points that are not
 * finite break a line.
 */
export function sweepLines(
  readings: readonly SweepReading[],
  spanSec: number,
  x: Scale,
  y: Scale,
): { now: Point[]; before: Point[]; pen: Point | null } {
  const lines: { now: Point[]; before: Point[] } = { now: [], before: [] };
  const last = readings.at(-1);
  if (last === undefined) return { ...lines, pen: null };
  const turn = Math.floor(last.atSec / spanSec);
  const penSec = last.atSec - turn * spanSec;
  let previous: SweepReading | undefined;
  for (const reading of readings) {
    const across = toPixel(x, reading.atSec % spanSec);
    const now = Math.floor(reading.atSec / spanSec) === turn;
    const line = now ? lines.now : lines.before;
    if (previous && reading.atSec - previous.atSec > GAP_SEC) line.push({ x: across, y: Number.NaN });
    if (now || reading.atSec % spanSec > penSec + BLANK * spanSec)
      line.push(...endsOf(reading, previous).map((volts) => ({ x: across, y: toPixel(y, volts) })));
    previous = reading;
  }
  return { ...lines, pen: lines.now.at(-1) ?? null };
}

/** In the order in which they were met, as far as that can be told: the end that is nearer to where the gate came from first. */
function endsOf({ gateLowV, gateHighV, gateSourceV }: SweepReading, before: SweepReading | undefined): number[] {
  if (gateLowV === gateHighV) return [gateSourceV];
  const fromV = before?.gateSourceV ?? gateSourceV;
  const ends = Math.abs(fromV - gateLowV) <= Math.abs(fromV - gateHighV) ? [gateLowV, gateHighV] : [gateHighV, gateLowV];
  return [...ends, gateSourceV];
}
