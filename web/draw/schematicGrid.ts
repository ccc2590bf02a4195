/** The two grids that the one circuit is drawn on: wide, and upright for a narrow sheet. Sheet pixels (1/16 rem). */
import type { Fitted, Place, Slot } from './schematic.ts';
import { AMPLIFIER } from './schematicParts.ts';

export interface Grid {
  readonly width: number;
  readonly height: number;
  /** Levels of the signal wire, the gate and 0 V. */
  readonly top: number;
  readonly gate: number;
  readonly bus: number;
  /** Middle of the upright things: feedback branch, drain and source, load resistor, load capacitor, generator. */
  readonly feedback: number;
  readonly device: number;
  readonly load: number;
  readonly capacitor: number;
  readonly generator: number;
  /** Middle of R1, R3 and the amplifier, on their wires. */
  readonly series: number;
  readonly control: number;
  readonly amplifier: number;
  readonly outTerminal: number;
  readonly ground: number;
  /** Heights of the parts in the branches. */
  readonly blockingY: number;
  readonly drainY: number;
  readonly bufferY: number;
  readonly loadY: number;
  readonly generatorY: number;
  readonly places: Readonly<Partial<Record<Slot, Place>>>;
}

export const LEFT = 6;
const start = (x: number, y: number): Place => ({ x, y, align: 'start' });
const middle = (x: number, y: number): Place => ({ x, y, align: 'middle' });
const end = (x: number, y: number): Place => ({ x, y, align: 'end' });

/** Heights are fixed, places across are shares of the width. */
export function wideGrid(fitted: Fitted, width: number): Grid {
  const stretch = Math.round(Math.min(110, Math.max(0, 1.1 * (width - 700))));
  const [top, gate, bus] = [64, 256 + stretch, 330 + stretch];
  const [series, feedback, device, load] = [0.195 * width, 0.335 * width, 0.533 * width, 0.77 * width];
  const capacitor = fitted.loadCapacitor ? 0.826 * width : load;
  const [blockingY, drainY, bufferY, loadY, generatorY] = [
    top + 68,
    top + 136 + stretch / 2,
    top + 104 + stretch / 2,
    top + 128 + stretch / 2,
    gate + 37,
  ];
  return {
    ...{ width, height: bus + 16, top, gate, bus, feedback, device, load, capacitor, generator: 46, series, control: series },
    ...{
      amplifier: width - 28 - AMPLIFIER.long / 2,
      outTerminal: width - 10,
      ground: feedback + 62,
      blockingY,
      drainY,
      bufferY,
      loadY,
      generatorY,
    },
    places: {
      in: start(0, top - 19),
      source: start(0, top + 24),
      series: middle(series, top - 33),
      feedback: start(feedback + 15, top + 33),
      blocking: end(feedback - 20, blockingY),
      drain: end(feedback - 20, drainY),
      fraction: end(feedback - 26, bufferY),
      control: middle(series, gate - 24),
      generator: start(74, gate + 39),
      gateLive: start(feedback + 12, gate - 15),
      drainLive: middle(device, top - 18),
      limit: start(device + 22, top + 44),
      device: start(device + 22, gate - 52),
      load: start(capacitor + 24, loadY),
      makeUp: end(width, top + 53),
      out: end(width, top - 37),
      ground: start(feedback + 80, bus + 9),
      toOutput: end(width, top - 19),
      fromDriver: start(0, gate - 19),
      sourcePin: start(device + 12, bus - 26),
    },
  };
}

/** Names stand over their values, and the device's values in a column between the branches. */
export function uprightGrid(fitted: Fitted, width: number): Grid {
  const [top, gate, bus] = [62, 400, 522];
  const [series, control, feedback, device, load] = [62, 58, 0.275 * width, 0.56 * width, 0.695 * width];
  const capacitor = fitted.loadCapacitor ? 0.77 * width : load;
  const [blockingY, drainY, bufferY, loadY, generatorY] = [top + 86, top + 190, top + 84, top + 196, gate + 57];
  return {
    ...{ width, height: bus + 20, top, gate, bus, feedback, device, load, capacitor, generator: 21, series, control },
    ...{
      amplifier: width - 22 - AMPLIFIER.long / 2,
      outTerminal: width - 7,
      ground: feedback + 40,
      blockingY,
      drainY,
      bufferY,
      loadY,
      generatorY,
    },
    places: {
      in: start(0, top + 22),
      source: start(0, top + 46),
      series: middle(series, top - 34),
      feedback: start(feedback + 16, top + 33),
      blocking: end(feedback - 18, blockingY),
      drain: end(feedback - 18, drainY),
      fraction: end(feedback - 24, bufferY),
      control: middle(control, gate - 34),
      generator: start(45, gate + 66),
      gateLive: start(feedback + 8, gate - 15),
      drainLive: middle(device, top - 18),
      device: start(feedback + 16, top + 172),
      load: start(capacitor + 19, loadY),
      makeUp: end(width, top + 48),
      out: end(width, top - 36),
      ground: start(feedback + 58, bus + 9),
      toOutput: end(width, top - 19),
      fromDriver: start(0, gate + 22),
      sourcePin: middle(device, bus - 10),
    },
  };
}
