import { expect, test } from 'vitest';
import { type CurvePoint, leastWords, plotFeedback } from '../../../web/draw/feedbackPlot.ts';
import { toPixel } from '../../../web/draw/scale.ts';

/** A null at k = ½ as the square law has it: H2 ∝ 1 − 2k, over a small odd rest. */
const curve: CurvePoint[] = Array.from({ length: 41 }, (_, n) => {
  const k = 0.4 + 0.005 * n;
  const h2Signed = 0.1 * (1 - 2 * k);
  return { k, h2Signed, h3: 2e-4, thd: Math.hypot(h2Signed, 2e-4) };
});

test('the frame spans the curve in k and whole decades below the highest distortion', () => {
  const plot = plotFeedback(curve, 500, 200);
  expect([plot.x.from, plot.x.to]).toEqual([curve[0].k, curve[40].k]);
  expect(plot.y.from).toBeCloseTo(1e-4, 12);
  expect(plot.y.to).toBeCloseTo(0.03, 12);
  expect(plot.yTicks.map((tick) => tick.words)).toEqual(['0.01', '0.1', '1', '3\u2009%']);
});

test('the least distortion is found at the null and said with its k', () => {
  const plot = plotFeedback(curve, 500, 200);
  expect(plot.least.k).toBeCloseTo(0.5, 9);
  expect(plot.least.x).toBeCloseTo(toPixel(plot.x, 0.5), 6);
  expect(leastWords(plot.least)).toBe('least 0.020\u2009% at 0.500');
});

test('a null deeper than the frame is shown at its foot, and at most four decades are shown', () => {
  const deep = curve.map((point) => ({ ...point, h3: 0, thd: Math.max(1e-12, Math.abs(point.h2Signed)) }));
  const plot = plotFeedback(deep, 500, 200);
  expect(plot.y.to / plot.y.from).toBeLessThanOrEqual(1e4 * 3.001);
  expect(plot.least.y).toBe(plot.area.bottom);
});

test('between measured points the harmonics run straight, so that a null between two of them is not missed', () => {
  const coarse = curve.filter((_, n) => n % 2 === 1);
  const heights = pathHeights(plotFeedback(coarse, 500, 200).thd);
  const measured = pathHeights(plotFeedback(curve, 500, 200).thd);
  expect(Math.max(...heights)).toBeCloseTo(Math.max(...measured), 0);
});

test('a stretch without any distortion does not cut a corner off the band', () => {
  const cutOff = curve.map((point) => (point.k > 0.44 && point.k < 0.56 ? { ...point, thd: 0, h2Signed: 0, h3: 0 } : point));
  expect(plotFeedback(cutOff, 500, 200).band.match(/M/g)).toHaveLength(1);
});

function pathHeights(path: string): number[] {
  return [...path.matchAll(/[ML]\S+ (\S+?)(?=[ML]|$)/g)].map((match) => Number(match[1]));
}
