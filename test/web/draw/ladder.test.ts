import { describe, expect, test } from 'vitest';
import { defaultVariant } from '../../../model/design/defaults.ts';
import { fieldAt } from '../../../model/design/path.ts';
import { checkVariant } from '../../../model/design/read.ts';
import type { Variant } from '../../../model/design/types.ts';
import { boardLadders, boardRows } from '../../../web/draw/board.ts';
import { drawLadder, type Ladder, type LadderPart } from '../../../web/draw/ladder.ts';
import type { Segment } from '../../../web/draw/schematic.ts';
import { halfLength } from '../../../web/draw/schematicParts.ts';
import { BOARD_PARTS, type Changes } from '../../../web/panels/boardParts.ts';
import { setAt } from '../../../model/design/path.ts';

function changed(variant: Variant, changes: Changes): Variant {
  const result = checkVariant(changes.reduce((so, [path, value]) => setAt(so, path, value), variant));
  if ('faults' in result) throw new Error(result.faults[0].sentence);
  return result.variant;
}

const bare = changed(defaultVariant(), []);
const partOf = (words: string) => {
  const part = BOARD_PARTS.find((each) => each.words === words);
  if (part === undefined) throw new Error(words);
  return part;
};
/** Everything that fits on one board: a pickup, and once more with a previous stage in its place. */
const full = BOARD_PARTS.filter(({ words }) => words !== 'previous stage').reduce((so, part) => changed(so, part.fit(so)), bare);
const staged = changed(full, partOf('previous stage').fit(full));

describe.each(BOARD_PARTS.map((part) => [part.words, part] as const))('%s', (_, part) => {
  test('is fitted, drawn, and taken out again without a trace', () => {
    expect(part.fitted(bare.cell)).toBe(false);
    const with1 = changed(bare, part.fit(bare));
    expect(part.fitted(with1.cell)).toBe(true);
    expect(boardLadders(with1).length).toBeGreaterThan(0);
    expect(changed(with1, part.takeOut(with1))).toEqual(bare);
  });
});

test('a plain cell has no board', () => {
  expect(boardLadders(bare)).toEqual([]);
  expect(Object.values(boardRows(bare))).toEqual([false, false, false, false]);
});

test('every value of a full board stands in a row, with a field of the document behind it', () => {
  const paths = [full, staged].flatMap(boardLadders).flatMap(({ parts }) => parts.flatMap(pathsOf));
  for (const path of paths) expect(fieldAt(path).kind).toBe('number');
  const optional = ['feed', 'pad', 'buffer', 'coupling', 'smoothing', 'clamp', 'reference', 'sharedGround'] as const;
  for (const variant of [full, staged]) {
    for (const group of optional) {
      for (const key of Object.keys(variant.cell[group])) if (key !== 'kind') expect(paths).toContain(`cell.${group}.${key}`);
    }
  }
  for (const key of ['sourceOhm', 'drainReturnOhm', 'outputCouplingF', 'loadOhm', 'loadF', 'driverOhm', 'strayF'])
    expect(paths).toContain(`cell.${key}`);
});

describe.each([288, 358, 678, 1000])('drawn %i wide', (width) => {
  const cases = [full, staged].flatMap(boardLadders).map((ladder) => [ladder.words, ladder] as const);
  test.each(cases)('%s: straight wires inside the drawing, none through a part, a symbol for every part', (_, ladder) => {
    const drawing = drawLadder(ladder, width, 216);
    expect(drawing.width).toBeLessThanOrEqual(width);
    for (const { x1, y1, x2, y2 } of drawing.wires) {
      expect(x1 === x2 || y1 === y2).toBe(true);
      for (const x of [x1, x2]) expect(x >= 0 && x <= drawing.width).toBe(true);
      for (const y of [y1, y2]) expect(y >= 0 && y <= drawing.height).toBe(true);
    }
    for (const { kind, x, y } of drawing.symbols) {
      const half = halfLength(kind) - 0.01;
      const lies = kind === 'resistor' || kind === 'capacitorAcross' || kind === 'inductor' || kind === 'amplifier';
      const body = lies ? { x1: x - half, x2: x + half, y1: y, y2: y } : { x1: x, x2: x, y1: y - half, y2: y + half };
      expect(drawing.wires.filter((wire) => touches(wire, body))).toEqual([]);
    }
    expect(drawing.symbols).toHaveLength(symbolsIn(ladder));
  });
});

function pathsOf(part: LadderPart): string[] {
  switch (part.at) {
    case 'start':
    case 'end':
      return typeof part.shows === 'object' ? [part.shows.path] : [];
    case 'series':
      return [part.value.path, ...(part.under ? [part.under.path] : [])];
    case 'shunt':
    case 'stage':
      return part.values.map(({ path }) => path);
    default:
      return [];
  }
}

function symbolsIn({ parts }: Ladder): number {
  return parts.filter(({ at }) => at === 'series' || at === 'shunt' || at === 'stage' || at === 'generator').length;
}

function touches(wire: Segment, body: Segment): boolean {
  const [left, right] = [Math.min(wire.x1, wire.x2), Math.max(wire.x1, wire.x2)];
  const [top, bottom] = [Math.min(wire.y1, wire.y2), Math.max(wire.y1, wire.y2)];
  return left < body.x2 + 0.001 && right > body.x1 - 0.001 && top < body.y2 + 0.001 && bottom > body.y1 - 0.001;
}
