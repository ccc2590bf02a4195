/** Where the direct labels of Fig. 2 stand: on no curve, no line and no other label, where there is room for that. */
import type { FeedbackPlot } from './feedbackPlot.ts';
import type { Point } from './line.ts';
import type { Box } from './placeSlip.ts';

/** The left end of each label's baseline; null where its curve is out of the frame. */
export interface CurveLabels {
  readonly now: Point | null;
  readonly least: Point;
  readonly h2: Point | null;
  readonly h3: Point | null;
}

/** Of each label, sheet pixels. */
export interface LabelWidths {
  readonly now: number;
  readonly least: number;
  readonly harmonic: number;
}

const RISE = 10;
const FALL = 4;
/** Along a curve, of its length. */
const ALONG = [0.1, 0.61, 0.2, 0.3, 0.7, 0.8, 0.4, 0.02, 0.86];

/** `present` is the point of now; a line runs from it to the foot of the frame. */
export function placeLabels(plot: FeedbackPlot, present: Point | null, widths: LabelWidths): CurveLabels {
  const { area, least, thdPoints, h2Points, h3Points } = plot;
  const taken: Box[] = present ? [{ left: present.x - 2, top: present.y - 4, width: 4, height: area.bottom - present.y + 4 }] : [];
  const curves = [thdPoints, h2Points, h3Points];
  const place = (candidates: readonly Point[], width: number): Point | null => {
    const inFrame = candidates.filter(
      ({ x, y }) => x >= area.left + 2 && x + width <= area.right - 2 && y - RISE >= area.top && y + FALL <= area.bottom,
    );
    let best: Point | null = null;
    let fewest = Number.POSITIVE_INFINITY;
    for (const at of inFrame) {
      const box = boxAt(at, width);
      const hits =
        1000 * taken.filter((other) => overlap(box, other)).length + curves.reduce((sum, curve) => sum + crossings(curve, box), 0);
      if (hits < fewest) [best, fewest] = [at, hits];
    }
    if (best !== null) taken.push(boxAt(best, width));
    return best;
  };
  const now = present && place(beside(present, widths.now), widths.now);
  const foot = area.bottom - 8;
  const leastAt = place(
    [foot, foot - 18, area.top + 16].flatMap((y) =>
      [least.x + 14, least.x - 14 - widths.least, area.right - widths.least - 8, area.left + 8].map((x) => ({ x, y })),
    ),
    widths.least,
  ) ?? { x: area.left + 8, y: foot };
  const h2 = place(along(h2Points, widths.harmonic), widths.harmonic);
  const h3 = place(along(h3Points, widths.harmonic), widths.harmonic);
  return { now, least: leastAt, h2, h3 };
}

function beside({ x, y }: Point, width: number): Point[] {
  return [y - 6, y + 18, y - 20, y + 32].flatMap((at) => [
    { x: x + 10, y: at },
    { x: x - 10 - width, y: at },
  ]);
}

function along(curve: readonly Point[], width: number): Point[] {
  return ALONG.flatMap((share) => {
    const { x, y } = curve[Math.round(share * (curve.length - 1))];
    return [
      { x: x + 4, y: y - 8 },
      { x: x + 4, y: y + 16 },
      { x: x - 4 - width, y: y - 8 },
      { x: x - 4 - width, y: y + 16 },
    ];
  });
}

function boxAt({ x, y }: Point, width: number): Box {
  return { left: x - 2, top: y - RISE, width: width + 4, height: RISE + FALL };
}

function overlap(a: Box, b: Box): boolean {
  return a.left < b.left + b.width && b.left < a.left + a.width && a.top < b.top + b.height && b.top < a.top + a.height;
}

/** Steps of the curve, each taken as the box that it spans, that touch the box. */
function crossings(curve: readonly Point[], box: Box): number {
  let count = 0;
  for (let n = 1; n < curve.length; n++) {
    const [a, b] = [curve[n - 1], curve[n]];
    const step = { left: Math.min(a.x, b.x), top: Math.min(a.y, b.y), width: Math.abs(b.x - a.x), height: Math.abs(b.y - a.y) };
    if (overlap(step, box)) count++;
  }
  return count;
}
