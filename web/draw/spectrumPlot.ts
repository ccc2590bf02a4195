/** Fig. 4: a spectrum as one highest level for each column of pixels, so that no peak falls between two. */
import { dbFromPower } from '../../model/measure/spectrum.ts';
import type { Point } from './line.ts';
import type { Scale } from './scale.ts';
import { toPixel, toValue } from './scale.ts';

export interface Spectrum {
  /** Of bin n, at n·binHz, re full scale. */
  readonly powers: ArrayLike<number>;
  readonly binHz: number;
}

/** Height of the trace at each whole pixel from x.start to x.end, NaN where there is nothing to show. */
export function spectrumColumns(spectrum: Spectrum, x: Scale, y: Scale): Float64Array {
  const count = Math.max(0, Math.floor(x.end - x.start) + 1);
  const columns = new Float64Array(count);
  const last = spectrum.powers.length - 1;
  for (let column = 0; column < count; column++) {
    const pixel = x.start + column;
    const from = toValue(x, pixel - 0.5) / spectrum.binHz;
    const to = toValue(x, pixel + 0.5) / spectrum.binHz;
    const level =
      Math.ceil(from) <= Math.floor(to)
        ? dbFromPower(highest(spectrum.powers, Math.ceil(from), Math.min(last, Math.floor(to))))
        : between(spectrum.powers, (from + to) / 2);
    columns[column] = Number.isFinite(level) ? toPixel(y, level) : Number.NaN;
  }
  return columns;
}

/** The same as a line of points; nothing to show lies just under the frame. */
export function spectrumPoints(spectrum: Spectrum, x: Scale, y: Scale): Point[] {
  const under = y.start + 2;
  return Array.from(spectrumColumns(spectrum, x, y), (height, column) => ({
    x: x.start + column,
    y: Number.isNaN(height) ? under : Math.min(height, under),
  }));
}

export interface Stick {
  /** Its order: 1 is the fundamental. */
  readonly n: number;
  readonly x: number;
  /** Its top, within the frame. */
  readonly y: number;
  readonly hz: number;
  readonly dbfs: number;
}

/**
 * The shadow tone and its harmonics where they fall within the frame, at the level that they have at the output: `amplitudeV` at the drain, V peak,
 * with `gainDb` of make-up after it; 0 dBFS is a sine of `fullScaleV`.
 */
export function harmonicSticks(
  harmonics: readonly { readonly n: number; readonly amplitudeV: number }[],
  at: { readonly toneHz: number; readonly gainDb: number; readonly fullScaleV: number },
  x: Scale,
  y: Scale,
): Stick[] {
  return harmonics
    .map(({ n, amplitudeV }) => ({ n, hz: n * at.toneHz, dbfs: 20 * Math.log10(amplitudeV / at.fullScaleV) + at.gainDb }))
    .filter(({ hz, dbfs }) => hz >= x.from && hz <= x.to && dbfs > y.from)
    .map((stick) => ({ ...stick, x: toPixel(x, stick.hz), y: Math.max(Math.min(y.start, y.end), toPixel(y, stick.dbfs)) }));
}

function highest(powers: ArrayLike<number>, from: number, to: number): number {
  let power = 0;
  for (let n = from; n <= to; n++) power = Math.max(power, powers[n]);
  return power;
}

/** Low frequencies have fewer bins than pixels: a straight line between the levels of two bins. */
function between(powers: ArrayLike<number>, bin: number): number {
  const n = Math.floor(bin);
  if (n + 1 >= powers.length) return Number.NEGATIVE_INFINITY;
  const db = dbFromPower(powers[n]);
  return db + (bin - n) * (dbFromPower(powers[n + 1]) - db);
}
