/**
 * The document: plain data, every value that a builder could change, in SI units. Field names end in their unit.
 * A design that has been read (`read.ts`) has every default filled in; `null` means that the part is absent.
 */

/** One design, schema version 1. Holds up to four variants of one cell, heard and measured side by side. */
export interface Design {
  readonly fettle: 1;
  readonly title: string;
  /** Voltage at the cell's input for a digital sample of 1.0, V peak. */
  readonly fullScaleV: number;
  /** Temperature at which the cell works, °C. */
  readonly tempC: number;
  readonly oversampling: Oversampling;
  readonly variants: readonly Variant[];
}

export type Oversampling = 1 | 2 | 4 | 8 | 16;

/** One complete set of circuit values. `devices` (left, right) replaces `device` where the channels' parts differ. */
export interface Variant {
  readonly name: string;
  readonly device: Device;
  readonly devices?: readonly [Device, Device];
  readonly cell: Cell;
  readonly control: Control;
  readonly output: Output;
}

export type Law = 'square' | 'gradual' | 'smooth';
export type Channel = 'n' | 'p';

/** A junction FET by its data-sheet values. For a p-channel part `gateOffV` is positive and `idssA` stays positive. */
export interface Device {
  readonly law: Law;
  readonly channel: Channel;
  readonly idssA: number;
  /** VGS(off), V; negative for an n-channel part. */
  readonly gateOffV: number;
  /** Channel-length modulation, 1/V, acting on VDS beyond the knee only. */
  readonly lambdaPerV: number;
  /** Built-in potential of the gate junction, V. */
  readonly barrierV: number;
  /** Exponent Q of the smooth law. */
  readonly exponent: number;
  /** Width of the smooth law's sub-threshold tail, V. */
  readonly tailV: number;
  /** Temperature at which the values above were read, °C. */
  readonly readAtC: number;
  readonly junction: Junction;
  readonly gateSourceF: number;
  readonly gateDrainF: number;
}

/** Each of the two gate junctions: saturation current, ideality, and a leakage conductance across it. */
export interface Junction {
  readonly reverseA: number;
  readonly ideality: number;
  readonly leakageS: number;
}

/** The shunt cell: source, series resistor, FET from drain to 0 V, load; the control reaches the gate through `controlOhm`. */
export interface Cell {
  readonly circuit: 'shunt';
  readonly sourceOhm: number;
  readonly seriesOhm: number;
  readonly loadOhm: number;
  readonly loadF: number;
  readonly controlOhm: number;
  readonly feedback: Feedback;
}

export type Feedback =
  | { readonly kind: 'none' }
  | { readonly kind: 'resistor'; readonly drainOhm: number; readonly blockingF: number | null }
  | { readonly kind: 'buffered'; readonly fraction: number };

/** What moves the gate: the voltage at the driver, before `controlOhm`. */
export type Control =
  | { readonly source: 'fixed'; readonly controlV: number }
  | {
      readonly source: 'lfo';
      readonly shape: 'sine' | 'triangle' | 'square';
      readonly rateHz: number;
      /** The two ends of the swing; the LFO starts midway, moving towards `toV`. */
      readonly fromV: number;
      readonly toV: number;
      /** Duration of each edge of the square shape, 0 to 100 % of its height. */
      readonly edgeSec: number;
    }
  | {
      readonly source: 'envelope';
      readonly restV: number;
      readonly limitV: number;
      readonly thresholdV: number;
      /** Change of control voltage for each volt of rectified signal above the threshold; signed. */
      readonly gainVPerV: number;
      readonly attackSec: number;
      readonly releaseSec: number;
      readonly senses: 'input' | 'output';
      readonly rectifier: 'half' | 'full';
      readonly linked: boolean;
    }
  | { readonly source: 'external'; readonly fullScaleV: number; readonly offsetV: number };

/** The make-up amplifier after the drain. */
export interface Output {
  readonly gainDb: number;
}
