/** Fig. 6: drain current against drain-source voltage, with the path of the shadow tone. */
import type { TransferPath } from '../../model/study/transfer.ts';
import type { TransferPlane } from '../state/bench.ts';
import { quantityTicks } from './axisTicks.ts';
import { linePath, type Point } from './line.ts';
import { plotArea, type PlotArea, type Tick } from './plotArea.ts';
import { linearScale, type Scale, toPixel } from './scale.ts';
import { decimals } from './words.ts';

export interface TransferPlot {
  readonly area: PlotArea;
  readonly x: Scale;
  readonly y: Scale;
  readonly xTicks: readonly Tick[];
  readonly yTicks: readonly Tick[];
  readonly curves: readonly string[];
  /** Where a curve leaves the frame, with its gate voltage: on the right of the frame, or over it. */
  readonly labels: readonly { readonly words: string; readonly place: Point; readonly side: 'right' | 'over' }[];
  /** Between this line and the axis of currents the channel is ohmic. */
  readonly edge: string;
}

const MARGINS = { left: 46, right: 46, top: 20, bottom: 24 };
/** Between two labels, pixels. */
const APART = { right: 12, over: 34 };

export function plotTransfer(plane: TransferPlane, width: number, height: number): TransferPlot {
  const area = plotArea(width, height, MARGINS);
  const { drainSourceV, topA } = plane;
  const x = linearScale(drainSourceV[0], drainSourceV[drainSourceV.length - 1], area.left, area.right);
  const y = linearScale(-topA, topA, area.bottom, area.top);
  const points = (current: Float64Array): Point[] =>
    Array.from(current, (amperes, n) => ({ x: toPixel(x, drainSourceV[n]), y: toPixel(y, amperes) }));
  const lines = plane.curves.map(({ drainA }) => points(drainA));
  return {
    area,
    x,
    y,
    xTicks: quantityTicks(x, 'V', 5),
    yTicks: quantityTicks(y, 'A', 5),
    curves: lines.map(linePath),
    labels: labelsOf(plane, lines, area),
    edge: linePath(points(plane.edgeA)),
  };
}

/** Each where its curve leaves the frame; the unit on the last of them, and none where it would touch the one before. */
function labelsOf({ curves }: TransferPlane, lines: readonly (readonly Point[])[], area: PlotArea): TransferPlot['labels'] {
  const labels: { words: string; place: Point; side: 'right' | 'over' }[] = [];
  lines.forEach((line, n) => {
    const { place, side } = exitOf(line, area);
    const touched = labels.some((other) => other.side === side && near(other.place, place, side));
    if (!touched) labels.push({ words: `${decimals(curves[n].gateV, 2)}\u2009V`, place, side });
  });
  return labels;
}

function near(a: Point, b: Point, side: 'right' | 'over'): boolean {
  return side === 'right' ? Math.abs(a.y - b.y) < APART.right : Math.abs(a.x - b.x) < APART.over;
}

function exitOf(line: readonly Point[], area: PlotArea): { place: Point; side: 'right' | 'over' } {
  const past = line.findIndex(({ x, y }) => x > (area.left + area.right) / 2 && y < area.top);
  if (past < 1) return { place: line[line.length - 1], side: 'right' };
  const [a, b] = [line[past - 1], line[past]];
  return { place: { x: a.x + ((area.top - a.y) / (b.y - a.y)) * (b.x - a.x), y: area.top }, side: 'over' };
}

/** The path as a line, and where the tone's crest stands on it. */
export function pathOn({ x, y }: Pick<TransferPlot, 'x' | 'y'>, { drainSourceV, drainA }: TransferPath): { line: string; crest: Point } {
  const points = Array.from(drainSourceV, (volts, n) => ({ x: toPixel(x, volts), y: toPixel(y, drainA[n]) }));
  return { line: linePath(points), crest: points[0] };
}

/** The current at a drain-source voltage on the way down from the crest, straight between two points; NaN where the tone does not go. A. */
export function pathCurrentAt({ drainSourceV, drainA }: TransferPath, volts: number): number {
  const half = (drainSourceV.length - 1) / 2;
  for (let n = 0; n < half; n++) {
    const [a, b] = [drainSourceV[n], drainSourceV[n + 1]];
    if ((volts - a) * (volts - b) <= 0 && a !== b) return drainA[n] + ((volts - a) / (b - a)) * (drainA[n + 1] - drainA[n]);
  }
  return Number.NaN;
}
