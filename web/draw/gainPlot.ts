/** Fig. 5: gain against the gate's voltage, over the swing and beyond it. */
import type { SwingPoint, WorstReading } from '../state/bench.ts';
import { quantityTicks } from './axisTicks.ts';
import { linePath, type Point } from './line.ts';
import { plotArea, type PlotArea, type Tick } from './plotArea.ts';
import { linearScale, linearTicks, type Scale, toPixel } from './scale.ts';
import { decimals } from './words.ts';

export interface GainPlot {
  readonly area: PlotArea;
  readonly x: Scale;
  readonly y: Scale;
  readonly xTicks: readonly Tick[];
  readonly yTicks: readonly Tick[];
  /** The whole curve, and the part of it that the control reaches. */
  readonly whole: string;
  readonly reached: string;
  /** Ends of the swing, left and right; the same for a gate that rests. */
  readonly swing: readonly [number, number];
  readonly worst: Point | null;
  /** Ascending in the gate's voltage. */
  readonly curve: readonly SwingPoint[];
}

const MARGINS = { left: 46, right: 14, top: 8, bottom: 24 };
/** Below this a cell is off for any ear; a curve that goes there leaves the frame at its foot. */
const LEAST_DB = -90;
/** Room over the curve, a share of its span. */
const ROOM = 0.05;

/** `swing` ascends and has a point; `beyond` may be empty while it is being computed. */
export function plotGain(
  swing: readonly SwingPoint[],
  beyond: readonly SwingPoint[],
  worst: Pick<WorstReading, 'gateV' | 'gainDb'> | null,
  width: number,
  height: number,
): GainPlot {
  const area = plotArea(width, height, MARGINS);
  const curve = [...beyond, ...swing].sort((a, b) => a.gateV - b.gateV);
  const gains = curve.map(({ gainDb }) => Math.max(LEAST_DB, gainDb));
  const [fromV, toV] = widened(curve[0].gateV, curve[curve.length - 1].gateV, 0.01);
  const [fromDb, toDb] = widened(Math.min(...gains), Math.max(...gains), 1);
  const x = linearScale(fromV, toV, area.left, area.right);
  const y = linearScale(fromDb - ROOM * (toDb - fromDb), toDb + ROOM * (toDb - fromDb), area.bottom, area.top);
  const at = ({ gateV, gainDb }: { gateV: number; gainDb: number }): Point => ({ x: toPixel(x, gateV), y: toPixel(y, gainDb) });
  return {
    area,
    x,
    y,
    xTicks: quantityTicks(x, 'V', 5),
    yTicks: gainTicks(y),
    whole: linePath(curve.map(at)),
    reached: linePath(swing.map(at)),
    swing: [toPixel(x, swing[0].gateV), toPixel(x, swing[swing.length - 1].gateV)],
    worst: worst && at(worst),
    curve,
  };
}

/** A span of nothing takes some room on either side. */
function widened(from: number, to: number, least: number): readonly [number, number] {
  return to - from >= least ? [from, to] : [from - least, to + least];
}

function gainTicks(y: Scale): Tick[] {
  const ticks = linearTicks(y.from, y.to, 5);
  return ticks.map((db, n) => ({
    at: toPixel(y, db),
    words: n === ticks.length - 1 ? `${decimals(db, 0)}\u2009dB` : decimals(db, Number.isInteger(db) ? 0 : 1),
  }));
}

/** Gain on the curve at a gate voltage, straight between two points; null beyond its ends. dB. */
export function gainAt(curve: readonly SwingPoint[], gateV: number): number | null {
  const n = curve.findIndex((point) => point.gateV >= gateV);
  if (n < 0 || (n === 0 && curve[0].gateV > gateV)) return null;
  if (n === 0) return curve[0].gainDb;
  const [a, b] = [curve[n - 1], curve[n]];
  return a.gainDb + ((gateV - a.gateV) / (b.gateV - a.gateV)) * (b.gainDb - a.gainDb);
}
