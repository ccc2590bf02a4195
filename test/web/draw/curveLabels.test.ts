import { expect, test } from 'vitest';
import { type CurveLabels, placeLabels } from '../../../web/draw/curveLabels.ts';
import { type CurvePoint, plotFeedback } from '../../../web/draw/feedbackPlot.ts';
import { toPixel } from '../../../web/draw/scale.ts';

const WIDTHS = { now: 20, least: 125, harmonic: 48 };

/** H2 ∝ k0 − k over an odd rest, as the square law has it about its null. */
const curveOf = (k0: number, h3: number): CurvePoint[] =>
  Array.from({ length: 41 }, (_, n) => {
    const k = 0.4 + 0.005 * n;
    const h2Signed = 0.2 * (k0 - k);
    return { k, h2Signed, h3, thd: Math.hypot(h2Signed, h3) };
  });

function boxesOf(labels: CurveLabels) {
  const widths = [WIDTHS.now, WIDTHS.least, WIDTHS.harmonic, WIDTHS.harmonic];
  return [labels.now, labels.least, labels.h2, labels.h3].flatMap((at, n) =>
    at === null ? [] : [{ left: at.x, right: at.x + widths[n], top: at.y - 10, bottom: at.y + 4 }],
  );
}

test.each([
  [0.5, 2e-4, 0.476],
  [0.5, 2e-4, 0.5],
  [0.5, 0.09, 0.4],
  [0.49, 0.09, 0.6],
  [0.42, 1e-3, 0.425],
  [0.55, 0.01, 0.41],
])('with a null at %d and H3 of %d no label lies on another or on the line of now at k = %d', (k0, h3, k) => {
  for (const [width, height] of [
    [358, 224],
    [460, 260],
    [330, 168],
  ]) {
    const curve = curveOf(k0, h3);
    const plot = plotFeedback(curve, width, height);
    const x = toPixel(plot.x, k);
    const y = Math.min(plot.area.bottom, toPixel(plot.y, curve[Math.round((k - 0.4) / 0.005)].thd));
    const labels = placeLabels(plot, { x, y }, WIDTHS);
    const boxes = boxesOf(labels);
    expect(boxes.length).toBeGreaterThanOrEqual(3);
    boxes.forEach((a, n) => {
      expect(a.left).toBeGreaterThan(plot.area.left);
      expect(a.right).toBeLessThan(plot.area.right);
      expect(a.left < x && x < a.right && a.bottom > y, `${width}: label ${n} on the line of now`).toBe(false);
      for (const b of boxes.slice(n + 1))
        expect(a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom, `${width}: label ${n}`).toBe(false);
    });
  }
});

test('no label lies on the curve of THD where there is room beside it', () => {
  const plot = plotFeedback(curveOf(0.5, 2e-4), 460, 260);
  const labels = placeLabels(plot, { x: toPixel(plot.x, 0.476), y: toPixel(plot.y, 0.0048) }, WIDTHS);
  for (const { left, right, top, bottom } of boxesOf(labels))
    expect(plot.thdPoints.filter(({ x, y }) => x > left && x < right && y > top && y < bottom)).toEqual([]);
});
