/** Fig. 4, as waveforms: what goes in and what comes out over a chosen time, standing still, with every peak in it. */
import { quantityTicks } from './axisTicks.ts';
import type { Point } from './line.ts';
import { plotArea, type PlotArea, type Tick } from './plotArea.ts';
import { linearScale, linearTicks, type Scale, toPixel } from './scale.ts';

/** What the time axis may span, s. */
export const TIME_SPANS_SEC = [0.002, 0.005, 0.01, 0.02, 0.05, 0.1, 0.2] as const;

const MARGINS = { left: 46, right: 14, top: 8, bottom: 24 };

/**
 * Where the picture begins: at the latest upward crossing of zero that leaves a whole span after it, of those in the window the one that starts the
 * half wave with the highest peak, so that a fundamental with strong partials stands still as well. Where there is none, at the last whole span.
 */
export function triggerAt(input: Float32Array, span: number): number {
  const last = input.length - span;
  let best = Math.max(0, last);
  let highest = 0;
  let crossing = -1;
  let peak = 0;
  for (let n = 1; n < input.length; n++) {
    if (input[n - 1] < 0 && input[n] >= 0) {
      crossing = n;
      peak = 0;
    }
    if (crossing < 0 || crossing > last) continue;
    if (input[n] > peak) peak = input[n];
    const ends = input[n - 1] >= 0 && input[n] < 0;
    // The later of two alike: it is what was heard last. Half a per cent of noise does not decide.
    if (ends && peak >= 0.995 * highest) {
      highest = Math.max(peak, highest);
      best = crossing;
    }
  }
  return best;
}

/** The least and the highest sample of each column of pixels, one after the other; a point for each sample where pixels are wider apart. */
export function waveformPoints(samples: Float32Array, from: number, span: number, x: Scale, y: Scale): Point[] {
  const columns = Math.floor(x.end - x.start);
  const at = (n: number) => toPixel(y, samples[from + n] ?? Number.NaN);
  if (span <= columns) return Array.from({ length: span }, (_, n) => ({ x: x.start + (n / (span - 1)) * (x.end - x.start), y: at(n) }));
  const points: Point[] = [];
  for (let column = 0; column < columns; column++) {
    const begin = Math.floor((column * span) / columns);
    const end = Math.floor(((column + 1) * span) / columns);
    let [least, most] = [begin, begin];
    for (let n = begin; n < end; n++) {
      if (samples[from + n] < samples[from + least]) least = n;
      if (samples[from + n] > samples[from + most]) most = n;
    }
    // In the order in which they came, so that the line does not run back.
    for (const n of least < most ? [least, most] : [most, least]) points.push({ x: x.start + column + 0.5, y: at(n) });
  }
  return points;
}

export interface WaveformAxes {
  readonly area: PlotArea;
  readonly x: Scale;
  readonly y: Scale;
  readonly xTicks: readonly Tick[];
  readonly yTicks: readonly Tick[];
}

/** Seconds across, volts up, ±`topV`. */
export function waveformAxes(spanSec: number, topV: number, width: number, height: number): WaveformAxes {
  const area = plotArea(width, height, MARGINS);
  const x = linearScale(0, spanSec, area.left, area.right);
  const y = linearScale(-topV, topV, area.bottom, area.top);
  const milli = linearTicks(0, 1000 * spanSec, 5);
  return {
    area,
    x,
    y,
    xTicks: milli.map((ms, n) => ({ at: toPixel(x, ms / 1000), words: n === milli.length - 1 ? `${ms}\u2009ms` : String(ms) })),
    yTicks: quantityTicks(y, 'V', 5),
  };
}

/** A round top for a peak: the next of 1, 2 and 5 times a power of ten; of silence, of the least that is asked for. */
export function topFor(peakV: number, leastV: number): number {
  const size = Math.max(peakV, leastV);
  const decade = 10 ** Math.floor(Math.log10(size));
  return [1, 2, 5, 10].map((n) => Number((n * decade).toPrecision(6))).find((top) => top >= size * 0.9999) ?? 10 * decade;
}
