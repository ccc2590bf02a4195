import { describe, expect, test } from 'vitest';
import { drawSchematic, type Drawing, type Fitted, type Form, type Segment } from '../../../web/draw/schematic.ts';
import { halfLength } from '../../../web/draw/schematicParts.ts';

const NO_ROWS = { input: false, output: false, control: false, source: false };
const ALL_ROWS = { input: true, output: true, control: true, source: true };

const fittings: Fitted[] = [NO_ROWS, ALL_ROWS, { ...NO_ROWS, source: true }, { ...NO_ROWS, output: true }].flatMap((rows) =>
  (['none', 'resistor', 'buffered'] as const).flatMap((feedback) =>
    [true, false].flatMap((blocking) =>
      [true, false].map(
        (loadCapacitor) =>
          ({ feedback, blocking: blocking && feedback === 'resistor', loadCapacitor, wave: 'sine', channel: 'n', rows }) as const,
      ),
    ),
  ),
);
const cases = fittings.flatMap((fitted) => [
  { fitted, form: 'wide' as Form, width: 678 },
  { fitted, form: 'wide' as Form, width: 1100 },
  { fitted, form: 'upright' as Form, width: 358 },
]);

const kinds = (drawing: Drawing) => drawing.symbols.map(({ kind }) => kind);

describe.each(cases)('drawn $form at $width for $fitted', ({ fitted, form, width }) => {
  const drawing = drawSchematic(fitted, width, form);

  test('shows what is fitted and nothing else', () => {
    expect(kinds(drawing).includes('buffer')).toBe(fitted.feedback === 'buffered');
    expect(kinds(drawing).includes('sum')).toBe(fitted.feedback === 'buffered');
    const upright = kinds(drawing).filter((kind) => kind === 'resistorUpright').length;
    expect(upright).toBe(Number(fitted.feedback === 'resistor') + Number(!fitted.rows.output));
    const capacitors = kinds(drawing).filter((kind) => kind === 'capacitor').length;
    expect(capacitors).toBe(Number(fitted.blocking) + Number(fitted.loadCapacitor && !fitted.rows.output));
    expect(kinds(drawing).includes('generator')).toBe(!fitted.rows.control);
    expect(kinds(drawing).includes('amplifier')).toBe(!fitted.rows.output);
  });

  test('runs every wire straight, inside the drawing, and from left to right or top to bottom or back without length zero', () => {
    for (const { x1, y1, x2, y2 } of drawing.wires) {
      expect(x1 === x2 || y1 === y2).toBe(true);
      expect(Math.abs(x2 - x1) + Math.abs(y2 - y1)).toBeGreaterThan(0);
      for (const x of [x1, x2]) expect(x >= 0 && x <= width).toBe(true);
      for (const y of [y1, y2]) expect(y >= 0 && y <= drawing.height).toBe(true);
    }
  });

  test('runs no wire through the body of a two-ended part', () => {
    for (const { kind, x, y } of drawing.symbols) {
      if (kind === 'jfet' || kind === 'sum') continue;
      const across = kind === 'resistor' || kind === 'amplifier';
      const half = halfLength(kind) - 0.01;
      const body = across ? { x1: x - half, x2: x + half, y1: y, y2: y } : { x1: x, x2: x, y1: y - half, y2: y + half };
      expect(drawing.wires.filter((wire) => runsThrough(wire, body))).toEqual([]);
    }
  });

  test('puts a dot on every join of three wires and on no other place', () => {
    for (const dot of drawing.dots) expect(wiresAt(drawing, dot.x, dot.y)).toBeGreaterThanOrEqual(2);
  });
});

test('a load without capacitance is one branch, with nothing dangling beyond it', () => {
  const drawing = drawSchematic(
    { feedback: 'none', blocking: false, loadCapacitor: false, wave: 'fixed', channel: 'p', rows: NO_ROWS },
    678,
    'wide',
  );
  const load = drawing.symbols.find(({ kind }) => kind === 'resistorUpright');
  const busEnd = Math.max(...drawing.wires.filter((wire) => wire.y1 === wire.y2 && wire.y1 === drawing.ground.y).map((wire) => wire.x2));
  expect(busEnd).toBe(load?.x);
});

function runsThrough(wire: Segment, body: Segment): boolean {
  const [left, right] = [Math.min(wire.x1, wire.x2), Math.max(wire.x1, wire.x2)];
  const [top, bottom] = [Math.min(wire.y1, wire.y2), Math.max(wire.y1, wire.y2)];
  return left < body.x2 + 0.001 && right > body.x1 - 0.001 && top < body.y2 + 0.001 && bottom > body.y1 - 0.001;
}

function wiresAt(drawing: Drawing, x: number, y: number): number {
  return drawing.wires.filter((wire) => runsThrough(wire, { x1: x, x2: x, y1: y, y2: y })).length;
}
