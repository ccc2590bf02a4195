/** The drawing of the cell for the parts that are fitted, as numbers: wires, symbols, and where each value stands. Sheet pixels (1/16 rem). */
import { deviceOf } from '../../model/cell/fromDesign.ts';
import type { Variant } from '../../model/design/types.ts';
import { type BoardRows, boardRows } from './board.ts';
import type { Point } from './line.ts';
import type { Box } from './placeSlip.ts';
import { type Grid, LEFT, uprightGrid, wideGrid } from './schematicGrid.ts';
import { AMPLIFIER, across, down, downThrough, GENERATOR_RADIUS, JFET, RESISTOR, run, SUM_RADIUS } from './schematicParts.ts';

export type Wave = 'fixed' | 'sine' | 'triangle' | 'square' | 'rising' | 'falling' | 'other';

/** What decides the drawing; values do not. */
export interface Fitted {
  readonly feedback: 'none' | 'resistor' | 'buffered';
  readonly blocking: boolean;
  readonly loadCapacitor: boolean;
  readonly wave: Wave;
  readonly channel: 'n' | 'p';
  /** What goes on in a row of the board instead of being drawn here. */
  readonly rows: BoardRows;
}

export interface Segment {
  readonly x1: number;
  readonly y1: number;
  readonly x2: number;
  readonly y2: number;
}

/** `x`, `y` is the centre; for the JFET, where the line of drain and source meets the level of the gate. */
export interface PartSymbol {
  readonly kind:
    | 'resistor'
    | 'resistorUpright'
    | 'capacitor'
    | 'capacitorAcross'
    | 'inductor'
    | 'diode'
    | 'amplifier'
    | 'buffer'
    | 'sum'
    | 'generator'
    | 'jfet';
  readonly x: number;
  readonly y: number;
}

/** A value or label: (x, y) is its left, middle or right at half height. */
export interface Place {
  readonly x: number;
  readonly y: number;
  readonly align: 'start' | 'middle' | 'end';
}

export type Slot =
  | 'in'
  | 'source'
  | 'series'
  | 'feedback'
  | 'blocking'
  | 'drain'
  | 'fraction'
  | 'control'
  | 'generator'
  | 'gateLive'
  | 'drainLive'
  | 'limit'
  | 'device'
  | 'load'
  | 'makeUp'
  | 'out'
  | 'ground'
  | 'toOutput'
  | 'fromDriver'
  | 'sourcePin';

export interface Drawing {
  readonly width: number;
  readonly height: number;
  readonly wires: readonly Segment[];
  readonly dots: readonly Point[];
  readonly terminals: readonly Point[];
  readonly symbols: readonly PartSymbol[];
  readonly ground: Point;
  /** Corner marks round the JFET when it leaves a limit. */
  readonly deviceBox: Box;
  /** The same round the amplifier. */
  readonly amplifierBox: Box;
  readonly places: Readonly<Partial<Record<Slot, Place>>>;
}

export type Form = 'wide' | 'upright';

export function fittedIn(variant: Variant): Fitted {
  const { feedback, loadF } = variant.cell;
  const { control } = variant;
  let wave: Wave = 'other';
  if (control.source === 'fixed') wave = 'fixed';
  if (control.source === 'lfo') wave = control.shape;
  return {
    feedback: feedback.kind,
    blocking: feedback.kind === 'resistor' && feedback.blockingF !== null,
    loadCapacitor: loadF > 0,
    wave,
    channel: deviceOf(variant, 0).channel,
    rows: boardRows(variant),
  };
}

export function drawSchematic(fitted: Fitted, width: number, form: Form): Drawing {
  const grid = form === 'wide' ? wideGrid(fitted, width) : uprightGrid(fitted, width);
  const { device, gate, places } = grid;
  return {
    width,
    height: grid.height,
    wires: wires(fitted, grid),
    dots: dots(fitted, grid),
    terminals: [
      { x: LEFT, y: grid.top },
      { x: LEFT, y: grid.bus },
      { x: grid.outTerminal, y: grid.top },
      ...(fitted.rows.control ? [{ x: LEFT, y: gate }] : []),
      ...(fitted.rows.source ? [{ x: device, y: grid.bus - PIN_ABOVE }] : []),
    ],
    symbols: [...throughParts(fitted, grid), ...branchParts(fitted, grid), ...loadParts(fitted, grid)],
    ground: { x: grid.ground, y: grid.bus },
    deviceBox: { left: device - JFET.left - 22, top: gate - JFET.above - 8, width: JFET.left + 34, height: JFET.above + JFET.below + 16 },
    amplifierBox: {
      left: grid.amplifier - AMPLIFIER.long / 2 - 8,
      top: grid.top - AMPLIFIER.high / 2 - 7,
      width: AMPLIFIER.long + 14,
      height: AMPLIFIER.high + 14,
    },
    places,
  };
}

/** Room between the terminal of a source pin that stands on the board and the line of 0 V. */
const PIN_ABOVE = 26;

function throughParts({ rows }: Fitted, { series, control, generator, device, amplifier, top, gate, generatorY }: Grid): PartSymbol[] {
  const parts: PartSymbol[] = [
    { kind: 'resistor', x: series, y: top },
    { kind: 'resistor', x: control, y: gate },
    { kind: 'jfet', x: device, y: gate },
  ];
  if (!rows.control) parts.push({ kind: 'generator', x: generator, y: generatorY });
  if (!rows.output) parts.push({ kind: 'amplifier', x: amplifier, y: top });
  return parts;
}

function branchParts(fitted: Fitted, { feedback, blockingY, drainY, bufferY, gate }: Grid): PartSymbol[] {
  if (fitted.feedback === 'none') return [];
  if (fitted.feedback === 'buffered') {
    return [
      { kind: 'buffer', x: feedback, y: bufferY },
      { kind: 'sum', x: feedback, y: gate },
    ];
  }
  const resistor: PartSymbol = { kind: 'resistorUpright', x: feedback, y: drainY };
  return fitted.blocking ? [{ kind: 'capacitor', x: feedback, y: blockingY }, resistor] : [resistor];
}

function loadParts(fitted: Fitted, { load, capacitor, loadY }: Grid): PartSymbol[] {
  if (fitted.rows.output) return [];
  const resistor: PartSymbol = { kind: 'resistorUpright', x: load, y: loadY };
  return fitted.loadCapacitor ? [resistor, { kind: 'capacitor', x: capacitor, y: loadY }] : [resistor];
}

function wires(fitted: Fitted, grid: Grid): Segment[] {
  const { series, control, feedback, device, amplifier, top, gate, bus } = grid;
  const half = RESISTOR.long / 2;
  const amp = AMPLIFIER.long / 2;
  const sum = fitted.feedback === 'buffered' ? SUM_RADIUS : 0;
  const branch = branchParts(fitted, grid).filter((part) => part.kind !== 'sum');
  const { rows } = fitted;
  const output = rows.output ? [] : [amplifier - amp, amplifier + amp];
  const source = rows.source ? [gate, bus - PIN_ABOVE - 4] : [gate, bus];
  return [
    ...across(top, LEFT + 4, series - half, series + half, ...output, grid.outTerminal - 4),
    ...across(gate, control + half, feedback - sum, feedback + sum, device - JFET.left),
    ...(rows.control ? across(gate, LEFT + 4, control - half) : generatorWires(grid)),
    ...(branch.length > 0 ? downThrough(feedback, top, gate - sum, branch) : []),
    ...down(device, top, gate - JFET.drainAbove, ...source),
    ...loadParts(fitted, grid).flatMap((part) => downThrough(part.x, top, bus, [part])),
    ...across(bus, LEFT + 4, busEnd(fitted, grid)),
  ];
}

function generatorWires({ control, generator, gate, bus, generatorY }: Grid): Segment[] {
  return [
    ...run({ x: control - RESISTOR.long / 2, y: gate }, { x: generator, y: gate }, { x: generator, y: generatorY - GENERATOR_RADIUS }),
    ...down(generator, generatorY + GENERATOR_RADIUS, bus),
  ];
}

/** The line of 0 V reaches as far as something stands on it. */
function busEnd({ rows }: Fitted, { capacitor, device, ground }: Grid): number {
  if (!rows.output) return capacitor;
  return rows.source ? ground + 11 : Math.max(device, ground);
}

function dots(fitted: Fitted, { feedback, device, load, capacitor, generator, top, gate, bus }: Grid): Point[] {
  const { rows } = fitted;
  const joins: Point[] = [];
  if (!rows.output) joins.push({ x: load, y: top });
  joins.push({ x: device, y: top });
  if (!rows.control) joins.push({ x: generator, y: bus });
  if (!rows.source && !rows.output) joins.push({ x: device, y: bus });
  if (fitted.loadCapacitor && !rows.output) joins.push({ x: capacitor, y: top }, { x: load, y: bus });
  if (fitted.feedback !== 'none') joins.push({ x: feedback, y: top });
  if (fitted.feedback === 'resistor') joins.push({ x: feedback, y: gate });
  return joins;
}
