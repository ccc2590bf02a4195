/** A clip at a glance: the ruled scale that stands under its name. Sheet pixels. */
import type { PlotArea } from './plotArea.ts';
import { linearScale, linearTicks, type Scale, toPixel } from './scale.ts';
import { clockText } from './words.ts';

export interface Overview {
  /** By column, the least and the greatest sample of any channel, so that no peak falls between two. */
  readonly least: Float64Array;
  readonly greatest: Float64Array;
}

export function overviewOf(channels: readonly Float32Array[], columns: number): Overview {
  const least = new Float64Array(columns).fill(Number.POSITIVE_INFINITY);
  const greatest = new Float64Array(columns).fill(Number.NEGATIVE_INFINITY);
  for (const samples of channels) {
    for (let column = 0; column < columns; column++) {
      const from = Math.floor((column * samples.length) / columns);
      const to = Math.max(from + 1, Math.floor(((column + 1) * samples.length) / columns));
      for (let n = from; n < to && n < samples.length; n++) {
        if (samples[n] < least[column]) least[column] = samples[n];
        if (samples[n] > greatest[column]) greatest[column] = samples[n];
      }
    }
  }
  return { least, greatest };
}

export function peakOf({ least, greatest }: Overview): number {
  return least.reduce((most, sample, column) => Math.max(most, -sample, greatest[column]), 0);
}

/** The trace as a path of upright lines, one a column; `peak` reaches the edges of the area. */
export function overviewPath({ least, greatest }: Overview, peak: number, area: PlotArea): string {
  const y = linearScale(-peak, peak, area.bottom, area.top);
  let path = '';
  for (let column = 0; column < least.length; column++) {
    if (!Number.isFinite(least[column])) continue;
    const [top, bottom] = [toPixel(y, greatest[column]), toPixel(y, least[column])];
    // A line of no length draws nothing.
    const length = Math.max(0.75, bottom - top);
    path += `M${area.left + column + 0.5} ${top.toFixed(1)}v${length.toFixed(1)}`;
  }
  return path;
}

/** Apart from each other by at least this, so that their figures do not touch. */
const TICK_APART = 64;
/** Steps of time that are read at a glance, s. */
const STEPS = [0.1, 0.2, 0.5, 1, 2, 5, 10, 15, 30, 60, 120, 300, 600];

/** Where time is figured along the scale; under a second by tenths. */
export function timeTicks(scale: Scale): { readonly at: number; readonly words: string }[] {
  const most = Math.max(2, Math.floor((scale.end - scale.start) / TICK_APART));
  const step = STEPS.find((each) => scale.to / each <= most);
  const times =
    step === undefined
      ? linearTicks(0, scale.to, most)
      : Array.from({ length: Math.floor(scale.to / step + 1e-9) + 1 }, (_, n) => n * step);
  return times.map((seconds) => ({ at: toPixel(scale, seconds), words: clockText(seconds + 1e-6, (step ?? 1) < 1) }));
}

/** What a press means: an end of the loop that is near enough to take, or null. */
export function endAt(
  scale: Scale,
  region: { readonly fromSec: number; readonly toSec: number } | null,
  pixel: number,
): 'from' | 'to' | null {
  if (region === null) return null;
  const [from, to] = [Math.abs(pixel - toPixel(scale, region.fromSec)), Math.abs(pixel - toPixel(scale, region.toSec))];
  if (Math.min(from, to) > 8) return null;
  return from <= to ? 'from' : 'to';
}

/** A time as a person writes it, in seconds: `1:23.4`, `83.4`, `0:05 `. Throws an Error with a sentence. */
export function readClock(text: string): number {
  const [, minutes, seconds] = /^\s*(?:(\d+):)?(\d+(?:[.,]\d*)?)\s*s?\s*$/.exec(text) ?? [];
  if (seconds === undefined) throw new Error(`“${text.trim()}” is not a time. Write 0:05.5 or 5.5.`);
  return 60 * Number(minutes ?? 0) + Number(seconds.replace(',', '.'));
}
