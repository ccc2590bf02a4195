/** Parts in a row, from left to right: in series on a wire, or from it to a line below; broken into rows where the sheet is narrow. Sheet pixels. */
import type { Point } from './line.ts';
import type { PartSymbol, Place, Segment } from './schematic.ts';
import { across, down, halfLength } from './schematicParts.ts';

/** A value that stands at a part; `path` is in the variant. */
export interface PartValue {
  readonly path: string;
  readonly name: string;
  readonly label: string;
  readonly short: string;
  /** Zero means that the part is absent. */
  readonly zeroIsAbsent?: boolean;
  readonly signed?: boolean;
}

export type LadderPart =
  /** An open terminal with words, and a value or what is measured there. */
  | { readonly at: 'start' | 'end'; readonly words: string; readonly shows?: PartValue | 'inputPeakV' | 'output' }
  | { readonly at: 'earth' }
  | {
      readonly at: 'series';
      readonly symbol: 'resistor' | 'capacitorAcross' | 'inductor';
      readonly value: PartValue;
      readonly under?: PartValue;
    }
  | { readonly at: 'shunt'; readonly symbol: 'resistorUpright' | 'capacitor' | 'diode'; readonly values: readonly PartValue[] }
  /** A triangle: a follower, or the make-up amplifier. */
  | { readonly at: 'stage'; readonly values: readonly PartValue[] }
  /** The control's source with all its values. */
  | { readonly at: 'generator' };

export interface Ladder {
  /** Said to those who do not see it. */
  readonly words: string;
  readonly parts: readonly LadderPart[];
  /** The line below: 0 V, one with a name of its own, or none. */
  readonly below: 'ground' | { readonly words: string } | null;
}

export interface LadderDrawing {
  readonly width: number;
  readonly height: number;
  readonly wires: readonly Segment[];
  readonly dots: readonly Point[];
  readonly terminals: readonly Point[];
  readonly grounds: readonly Point[];
  readonly symbols: readonly PartSymbol[];
  /** For each part its values' place; the second, if any, is of the value under it. */
  readonly places: readonly (readonly Place[])[];
  readonly words: readonly { readonly text: string; readonly place: Place }[];
}

export const WIRE = 56;
const LINE = 150;
/** With nothing below the wire. */
const LOW = 92;
const GAP = 20;
/** From the left of a part to the middle of its symbol, where that is not in its own middle. */
const SHUNT_IN = 20;
const STAGE_IN = 34;
/** From the start of the line below to its sign of 0 V, clear of a part that stands at the start. */
const GROUND_IN = 46;

function widthOf(part: LadderPart, generatorWidth: number): number {
  switch (part.at) {
    case 'start':
    case 'end':
      return Math.max(64, 16 + 7 * part.words.length);
    case 'earth':
      return 60;
    case 'series':
      return 94;
    case 'shunt':
      return part.values.length > 1 ? 142 : 108;
    case 'stage':
      return 124;
    case 'generator':
      return generatorWidth;
  }
}

/** `generatorWidth` is the room that the control's values need. */
export function drawLadder(ladder: Ladder, width: number, generatorWidth: number): LadderDrawing {
  const rows = rowsOf(ladder.parts, width, generatorWidth);
  const rowHeight = (ladder.below === null ? LOW : LINE) + GAP;
  const drawn = emptyDrawing(ladder.parts.length);
  rows.forEach((row, n) => {
    drawRow(drawn, ladder, row, n * rowHeight);
  });
  return { ...drawn, width: Math.max(...rows.map(({ end }) => end)), height: rows.length * rowHeight };
}

interface Row {
  readonly tiles: readonly { readonly index: number; readonly x: number; readonly width: number }[];
  readonly end: number;
}

function rowsOf(parts: readonly LadderPart[], width: number, generatorWidth: number): Row[] {
  const rows: { tiles: { index: number; x: number; width: number }[]; end: number }[] = [{ tiles: [], end: 0 }];
  parts.forEach((part, index) => {
    const wide = widthOf(part, generatorWidth);
    const fits = rows[rows.length - 1].end + wide <= width;
    if (!fits && rows[rows.length - 1].tiles.length > 0) rows.push({ tiles: [], end: 0 });
    const row = rows[rows.length - 1];
    row.tiles.push({ index, x: row.end, width: wide });
    row.end += wide;
  });
  const [before, last] = [rows[rows.length - 2], rows[rows.length - 1]];
  if (before === undefined || last.tiles.length > 1 || before.tiles.length < 2) return rows;
  // A terminal does not stand alone.
  const [alone] = last.tiles;
  const joined = before.tiles[before.tiles.length - 1];
  return [
    ...rows.slice(0, -2),
    { tiles: before.tiles.slice(0, -1), end: joined.x },
    {
      tiles: [
        { ...joined, x: 0 },
        { ...alone, x: joined.width },
      ],
      end: joined.width + alone.width,
    },
  ];
}

function emptyDrawing(parts: number) {
  return {
    wires: [] as Segment[],
    dots: [] as Point[],
    terminals: [] as Point[],
    grounds: [] as Point[],
    symbols: [] as PartSymbol[],
    places: Array.from({ length: parts }, (): Place[] => []),
    words: [] as { text: string; place: Place }[],
  };
}

type Drawn = ReturnType<typeof emptyDrawing>;

function drawRow(drawn: Drawn, { parts, below }: Ladder, { tiles, end }: Row, top: number): void {
  const [wire, line] = [top + WIRE, top + LINE];
  for (const { index, x, width } of tiles)
    drawPart(drawn, parts[index], index, { left: x, right: x + width, wire, line, below: below !== null });
  if (below === null) return;
  const [first, last] = [parts[tiles[0].index], parts[tiles[tiles.length - 1].index]];
  const from = first.at === 'start' ? 10 : first.at === 'generator' ? 20 : 0;
  const to = last.at === 'end' ? end - 10 : end;
  drawn.wires.push(...across(line, from, to));
  if (first.at === 'start') drawn.terminals.push({ x: 6, y: line });
  if (last.at === 'end') drawn.terminals.push({ x: end - 6, y: line });
  if (below === 'ground') drawn.grounds.push({ x: from + GROUND_IN, y: line });
  drawn.words.push({
    text: below === 'ground' ? '0\u2009V' : below.words,
    place: { x: below === 'ground' ? from + GROUND_IN + 17 : from, y: line + 11, align: 'start' },
  });
}

interface Tile {
  readonly left: number;
  readonly right: number;
  readonly wire: number;
  readonly line: number;
  readonly below: boolean;
}

function drawPart(drawn: Drawn, part: LadderPart, index: number, tile: Tile): void {
  const { left, right, wire, line } = tile;
  const middle = (left + right) / 2;
  const half = (wire + line) / 2;
  const through = (x: number, kind: PartSymbol['kind']) => {
    drawn.symbols.push({ kind, x, y: wire });
    drawn.wires.push(...across(wire, left, x - halfLength(kind), x + halfLength(kind), right));
  };
  switch (part.at) {
    case 'start':
      drawn.terminals.push({ x: left + 6, y: wire });
      drawn.wires.push(...across(wire, left + 10, right));
      drawn.words.push({ text: part.words, place: { x: left, y: wire - 19, align: 'start' } });
      drawn.places[index].push({ x: left, y: wire + 22, align: 'start' });
      return;
    case 'end':
      drawn.terminals.push({ x: right - 6, y: wire });
      drawn.wires.push(...across(wire, left, right - 10));
      drawn.words.push({ text: part.words, place: { x: right, y: wire - 19, align: 'end' } });
      drawn.places[index].push({ x: right, y: wire + 22, align: 'end' });
      return;
    case 'earth':
      drawn.wires.push(...across(wire, left, left + 14));
      drawn.grounds.push({ x: left + 14, y: wire });
      drawn.words.push({ text: '0\u2009V', place: { x: left + 30, y: wire + 9, align: 'start' } });
      return;
    case 'series':
      through(middle, part.symbol);
      drawn.places[index].push({ x: middle, y: wire - 34, align: 'middle' }, { x: middle, y: wire + 26, align: 'middle' });
      return;
    case 'stage':
      through(left + STAGE_IN, 'amplifier');
      drawn.places[index].push({ x: left + 6, y: wire + 52, align: 'start' });
      return;
    case 'shunt': {
      const x = left + SHUNT_IN;
      drawn.symbols.push({ kind: part.symbol, x, y: half });
      drawn.wires.push(
        ...across(wire, left, right),
        ...down(x, wire, half - halfLength(part.symbol), half + halfLength(part.symbol), line),
      );
      drawn.dots.push({ x, y: wire }, { x, y: line });
      drawn.places[index].push({ x: x + 20, y: half, align: 'start' });
      return;
    }
    case 'generator': {
      const x = left + 20;
      const radius = halfLength('generator');
      drawn.symbols.push({ kind: 'generator', x, y: half });
      drawn.wires.push(...across(wire, x, right), ...down(x, wire, half - radius, half + radius, line));
      drawn.places[index].push({ x: x + 26, y: half, align: 'start' });
    }
  }
}
