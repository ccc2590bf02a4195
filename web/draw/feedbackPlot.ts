/** Fig. 2: distortion against k, on a logarithmic scale of per cent. */
import { linePath, type Point } from './line.ts';
import { plotArea, type PlotArea, type Tick } from './plotArea.ts';
import { decadeTicks, linearScale, linearTicks, logScale, type Scale, toPixel } from './scale.ts';
import { between, fractionsWithin, thdWithin } from './tolerance.ts';
import { decimals, percentText } from './words.ts';

export interface CurvePoint {
  readonly k: number;
  /** Fractions of the fundamental. */
  readonly thd: number;
  readonly h2Signed: number;
  readonly h3: number;
}

export interface FeedbackPlot {
  readonly area: PlotArea;
  readonly x: Scale;
  readonly y: Scale;
  readonly xTicks: readonly Tick[];
  readonly yTicks: readonly Tick[];
  readonly thd: string;
  /** The same as points, ascending in x. */
  readonly thdPoints: readonly Point[];
  /** A closed shape: what parts of 1 % make of each k. */
  readonly band: string;
  readonly h2: string;
  readonly h2Points: readonly Point[];
  readonly h3: string;
  readonly h3Points: readonly Point[];
  readonly least: { readonly k: number; readonly thd: number; readonly x: number; readonly y: number };
}

/** Decades shown at most, from the highest value down: a deeper null runs out of the frame at its foot. */
const MOST_DECADES = 4;
/** The frame's ends, fractions, however little distortion there is: 0.01 % and 0.0001 %. */
const LEAST_TOP = 8e-5;
const LEAST_BOTTOM = 1e-6;
const MARGINS = { left: 40, right: 10, top: 8, bottom: 24 };

/** Points drawn for each one measured: between two, harmonics go in straight lines and THD follows from them, so that a null looks like one. */
const REFINE = 6;

function refined(curve: readonly CurvePoint[]): CurvePoint[] {
  return curve.flatMap((point, n) => {
    const next = curve[n + 1];
    if (next === undefined) return [point];
    return Array.from({ length: REFINE }, (_, step) => mixed(point, next, step / REFINE));
  });
}

function mixed(a: CurvePoint, b: CurvePoint, share: number): CurvePoint {
  return { k: a.k + share * (b.k - a.k), h3: a.h3 + share * (b.h3 - a.h3), ...between(a, b, share) };
}

/** The curve at a k on it; null beyond its ends. */
export function curveAt(curve: readonly CurvePoint[], k: number): CurvePoint | null {
  const n = placeOf(curve, k);
  if (n === curve.length || (n === 0 && curve[0].k > k)) return null;
  return n === 0 ? curve[0] : mixed(curve[n - 1], curve[n], (k - curve[n - 1].k) / (curve[n].k - curve[n - 1].k));
}

/** Of the first point at k or after it; the curve's length beyond its end. */
function placeOf(curve: readonly CurvePoint[], k: number): number {
  let [from, to] = [0, curve.length];
  while (from < to) {
    const middle = (from + to) >> 1;
    if (curve[middle].k < k) from = middle + 1;
    else to = middle;
  }
  return from;
}

/** What parts of 1 % make of each k: where all that they can give lies on the curve. */
function bandOf(curve: readonly CurvePoint[]): { readonly k: number; readonly low: number; readonly high: number }[] {
  return curve.flatMap(({ k }) => {
    const [from, to] = fractionsWithin(k);
    const [first, last] = [curveAt(curve, from), curveAt(curve, to)];
    if (first === null || last === null) return [];
    const [low, high] = thdWithin([first, ...curve.slice(placeOf(curve, from), placeOf(curve, to)), last]);
    return [{ k, low, high }];
  });
}

/** `measured` ascends in k and has at least two points. */
export function plotFeedback(
  measured: readonly CurvePoint[],
  width: number,
  height: number,
  range: ThdRange = thdRangeOf(measured),
): FeedbackPlot {
  const curve = refined(measured);
  const area = plotArea(width, height, MARGINS);
  const x = linearScale(curve[0].k, curve[curve.length - 1].k, area.left, area.right);
  const y = logScale(range.from, range.to, area.bottom, area.top);
  const floor = area.bottom + 40;
  const points = (pick: (point: CurvePoint) => number): Point[] =>
    curve.map((point) => ({ x: toPixel(x, point.k), y: Math.min(toPixel(y, Math.abs(pick(point))), floor) }));
  const thdPoints = points((point) => point.thd);
  const h2Points = points((point) => point.h2Signed);
  const h3Points = points((point) => point.h3);
  const lowest = curve.reduce((best, point) => (point.thd < best.thd ? point : best));
  return {
    area,
    x,
    y,
    xTicks: linearTicks(x.from, x.to, 6).map((k) => ({ at: toPixel(x, k), words: decimals(k, 2) })),
    yTicks: yTicks(y),
    thd: linePath(thdPoints),
    thdPoints,
    band: bandPath(
      bandOf(curve).map(({ k, low, high }) => ({
        x: toPixel(x, k),
        low: Math.min(toPixel(y, low), floor),
        high: Math.min(toPixel(y, high), floor),
      })),
    ),
    h2: linePath(h2Points),
    h2Points,
    h3: linePath(h3Points),
    h3Points,
    least: { ...lowest, x: toPixel(x, lowest.k), y: Math.min(toPixel(y, lowest.thd), area.bottom) },
  };
}

export interface ThdRange {
  readonly from: number;
  readonly to: number;
}

/** Ends of the axis for a curve as measured: its nulls between two points count. */
export function thdRangeOf(measured: readonly CurvePoint[]): ThdRange {
  const curve = refined(measured);
  const highest = Math.max(...curve.map((point) => point.thd), LEAST_TOP);
  const top = roundUp(highest * 1.15);
  const lowest = Math.max(1e-9, Math.min(...curve.map((point) => point.thd)));
  return withinDecades(10 ** Math.floor(Math.log10(lowest)), top);
}

function withinDecades(from: number, to: number): ThdRange {
  return { from: Math.max(from, 10 ** (Math.ceil(Math.log10(to)) - MOST_DECADES), LEAST_BOTTOM), to };
}

/** One axis for all curves of the last while, so that it does not jump as an LFO turns. */
export function sharedRange(ranges: readonly ThdRange[]): ThdRange {
  return withinDecades(Math.min(...ranges.map(({ from }) => from)), Math.max(...ranges.map(({ to }) => to)));
}

function bandPath(points: readonly { readonly x: number; readonly low: number; readonly high: number }[]): string {
  if (points.length < 2) return '';
  const upper = points.map(({ x, high }) => ({ x, y: high }));
  const lower = points.map(({ x, low }) => ({ x, y: low })).reverse();
  return `${linePath([...upper, ...lower])}Z`;
}

/** The next of 1, 3 and 10 times a power of ten. */
function roundUp(value: number): number {
  const decade = 10 ** Math.floor(Math.log10(value));
  return [1, 3, 10].map((n) => n * decade).find((candidate) => candidate >= value * (1 - 1e-9)) ?? 10 * decade;
}

function yTicks(y: Scale): Tick[] {
  const values = decadeTicks(y.from, y.to);
  const top = values.includes(y.to) ? [] : [y.to];
  const all = [...values, ...top];
  return all.map((value) => ({ at: toPixel(y, value), words: value === y.to ? `${tickPercent(value)}\u2009%` : tickPercent(value) }));
}

/** Decades of per cent as short as they go: 10, 0.1, 0.001. */
function tickPercent(fraction: number): string {
  return String(Number((100 * fraction).toPrecision(6)));
}

/** Words for the least distortion that k alone can reach. */
export function leastWords(least: { k: number; thd: number }): string {
  if (least.thd < 5e-6) return `under 0.001\u2009% at ${decimals(least.k, 3)}`;
  return `least ${percentText(least.thd)}\u2009% at ${decimals(least.k, 3)}`;
}
