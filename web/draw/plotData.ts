/** The numbers behind a figure: read out at the cursor, and saved as they are. */
import { type Scale, toPixel } from './scale.ts';

export interface Column {
  readonly name: string;
  /** Empty for a plain number. */
  readonly unit: string;
  readonly values: ArrayLike<number>;
  /** With its unit, as the cursor says it: «1.00 kHz», or «gate −1.20 V» where the unit does not tell what it is. */
  readonly print: (value: number) => string;
}

export interface PlotTable {
  /** Ascending, except along a path. */
  readonly x: Column;
  readonly ys: readonly Column[];
  /** Where rows lie closer than pixels, the cursor reads the one that is highest, or furthest from zero, in the last column. */
  readonly keeps?: 'highest' | 'furthest';
}

/** The row that the cursor reads at a pixel: the nearest, or among those within half a pixel the one that is seen. The table has a row. */
export function rowAt({ x, ys, keeps }: PlotTable, scale: Scale, pixel: number): number {
  const seen = ys[ys.length - 1].values;
  const rank = (row: number) => (keeps === 'highest' ? seen[row] : Math.abs(seen[row]));
  let nearest = 0;
  let best = -1;
  let least = Number.POSITIVE_INFINITY;
  for (let row = 0; row < x.values.length; row++) {
    const apart = Math.abs(toPixel(scale, x.values[row]) - pixel);
    if (apart < least) [nearest, least] = [row, apart];
    if (keeps !== undefined && apart <= 0.5 && (best < 0 || rank(row) > rank(best))) best = row;
  }
  return best < 0 ? nearest : best;
}

/** Where the cursor goes from a pixel by a step of so many pixels: at least to the next row that way. */
export function stepFrom(table: PlotTable, scale: Scale, pixel: number, step: number): number {
  const at = (row: number) => toPixel(scale, table.x.values[row]);
  const from = rowAt(table, scale, pixel);
  const to = rowAt(table, scale, pixel + step);
  if (step === 0 || Math.sign(at(to) - at(from)) === Math.sign(step)) return at(to);
  const next = Math.max(0, Math.min(table.x.values.length - 1, from + Math.sign(step)));
  return at(next);
}

/** «1.00 kHz: input −40.2 dB, output −38.1 dB». */
export function rowWords({ x, ys }: PlotTable, row: number): string {
  const read = ys.map(({ name, print, values }) => `${name} ${Number.isNaN(values[row]) ? 'none' : print(values[row])}`);
  return `${x.print(x.values[row])}: ${read.join(', ')}`;
}

/**
 * Every table side by side, a header and one line for each row; shorter tables end in empty fields (RFC 4180). Numbers to nine digits in the unit of
 * the header; what is not finite is empty.
 */
export function csvOf(tables: readonly PlotTable[]): string {
  const columns = tables.flatMap(({ x, ys }) => [x, ...ys]);
  const rows = Math.max(...columns.map(({ values }) => values.length));
  const header = columns.map(({ name, unit }) => quoted(unit === '' ? name : `${name} (${unit})`)).join(',');
  const lines = Array.from({ length: rows }, (_, row) => columns.map(({ values }) => plain(values[row])).join(','));
  return `${[header, ...lines].join('\r\n')}\r\n`;
}

function plain(value: number | undefined): string {
  return value !== undefined && Number.isFinite(value) ? String(Number(value.toPrecision(9))) : '';
}

function quoted(text: string): string {
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
