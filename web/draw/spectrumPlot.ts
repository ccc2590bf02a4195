/** Fig. 4: a spectrum as one highest level for each column of pixels, so that no peak falls between two. */
import type { Scale } from './scale.ts';
import { toPixel, toValue } from './scale.ts';

export interface Spectrum {
  /** Level of bin n, dBFS, at n·binHz. */
  readonly dbfs: ArrayLike<number>;
  readonly binHz: number;
}

/** Height of the trace at each whole pixel from x.start to x.end, NaN where there is nothing to show. */
export function spectrumColumns(spectrum: Spectrum, x: Scale, y: Scale): Float64Array {
  const count = Math.max(0, Math.floor(x.end - x.start) + 1);
  const columns = new Float64Array(count);
  const last = spectrum.dbfs.length - 1;
  for (let column = 0; column < count; column++) {
    const pixel = x.start + column;
    const from = toValue(x, pixel - 0.5) / spectrum.binHz;
    const to = toValue(x, pixel + 0.5) / spectrum.binHz;
    const level =
      Math.ceil(from) <= Math.floor(to)
        ? highest(spectrum.dbfs, Math.ceil(from), Math.min(last, Math.floor(to)))
        : between(spectrum.dbfs, (from + to) / 2);
    columns[column] = Number.isFinite(level) ? toPixel(y, level) : Number.NaN;
  }
  return columns;
}

function highest(dbfs: ArrayLike<number>, from: number, to: number): number {
  let level = Number.NEGATIVE_INFINITY;
  for (let n = from; n <= to; n++) level = Math.max(level, dbfs[n]);
  return level;
}

/** Low frequencies have fewer bins than pixels: a straight line between two bins. */
function between(dbfs: ArrayLike<number>, bin: number): number {
  const n = Math.floor(bin);
  if (n + 1 >= dbfs.length) return Number.NEGATIVE_INFINITY;
  return dbfs[n] + (bin - n) * (dbfs[n + 1] - dbfs[n]);
}
