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
  readonly noise: Noise;
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
  /** Exponent of the capacitances' fall with reverse voltage, C/(1 − V/barrier)^m; 0: constant. */
  readonly grading: number;
}

/** Each of the two gate junctions: saturation current, ideality, and a leakage conductance across it. */
export interface Junction {
  readonly reverseA: number;
  readonly ideality: number;
  readonly leakageS: number;
}

/**
 * The shunt cell and the board around it, from the signal's source to the load, and from the control's driver to the gate. What is absent costs
 * nothing.
 */
export interface Cell {
  readonly circuit: 'shunt';
  readonly feed: Feed;
  readonly sourceOhm: number;
  readonly pad: Pad;
  readonly buffer: InputBuffer;
  readonly coupling: Coupling;
  readonly seriesOhm: number;
  /** Resistor from the drain to the source pin, for its direct current. */
  readonly drainReturnOhm: number | null;
  /** Capacitor from the drain to the load. */
  readonly outputCouplingF: number | null;
  readonly loadOhm: number;
  readonly loadF: number;
  /** Resistance of the control's driver, outside the pair: k leaves it out (`feedback.ts`). */
  readonly driverOhm: number;
  readonly smoothing: Smoothing;
  readonly controlOhm: number;
  readonly feedback: Feedback;
  readonly clamp: GateClamp;
  readonly reference: Reference;
  readonly sharedGround: SharedGround;
  /** Capacitance from the control's driver to the drain. */
  readonly strayF: number;
}

/** What the signal comes from. */
export type Feed =
  | { readonly kind: 'direct' }
  /** A guitar pickup: its inductance in series with `sourceOhm`, its winding's and its cable's capacitance, and the volume control across them. */
  | {
      readonly kind: 'pickup';
      readonly inductanceH: number;
      readonly windingF: number;
      readonly cableF: number;
      readonly volumeOhm: number;
    }
  /** A previous stage: `sourceOhm`, its output capacitor, and the resistor after that to 0 V. */
  | { readonly kind: 'stage'; readonly couplingF: number; readonly bleedOhm: number };

export type Pad = { readonly kind: 'none' } | { readonly kind: 'divider'; readonly upperOhm: number; readonly lowerOhm: number };

/** A voltage follower at the cell's input, with what real ones add. */
export type InputBuffer = { readonly kind: 'none' } | { readonly kind: 'follower'; readonly offsetV: number; readonly biasA: number };

/** Capacitor before the series resistor, with the leakage across it. */
export type Coupling = { readonly kind: 'none' } | { readonly kind: 'capacitor'; readonly couplingF: number; readonly leakOhm: number };

/** A resistor and a capacitor to 0 V between the control's driver and the pair. */
export type Smoothing = { readonly kind: 'none' } | { readonly kind: 'rc'; readonly smoothingOhm: number; readonly smoothingF: number };

/** A diode from gate to source pin that keeps the gate from going far into conduction; the other way round for a p-channel part. */
export type GateClamp = { readonly kind: 'none' } | { readonly kind: 'diode'; readonly reverseA: number; readonly ideality: number };

/** Where the source pin goes: 0 V, or a divided supply. */
export type Reference =
  | { readonly kind: 'ground' }
  | {
      readonly kind: 'halfSupply';
      readonly supplyV: number;
      readonly upperOhm: number;
      readonly lowerOhm: number;
      readonly decouplingF: number;
    };

/** Resistance of a ground path that the cell shares with the control's circuit, and the current that this draws for each volt of control. */
export type SharedGround = { readonly kind: 'none' } | { readonly kind: 'shared'; readonly groundOhm: number; readonly drawAPerV: number };

export type Feedback =
  | { readonly kind: 'none' }
  | { readonly kind: 'resistor'; readonly drainOhm: number; readonly blockingF: number | null }
  | { readonly kind: 'buffered'; readonly fraction: number };

/** What moves the gate: the voltage at the driver, before `driverOhm` and `controlOhm`. */
export type Control =
  | { readonly source: 'fixed'; readonly controlV: number }
  | {
      readonly source: 'lfo';
      readonly shape: 'sine' | 'triangle' | 'square' | 'rising' | 'falling';
      readonly rateHz: number;
      /** The two ends of the swing; the LFO starts midway, moving towards `toV`, and on a falling ramp towards `fromV`. */
      readonly fromV: number;
      readonly toV: number;
      /** Duration of each edge of the square shape, and of the flyback of the rising and falling ramps, from one end of the swing to the other. */
      readonly edgeSec: number;
    }
  /** Rectifier, attack resistor, timing capacitor with release resistor across it, amplifier with bias and clamp. */
  | {
      readonly source: 'envelope';
      /** Where it listens: before the cell, or at its output (a loop). */
      readonly senses: 'input' | 'output';
      readonly rectifier: 'half' | 'full';
      readonly attackOhm: number;
      readonly releaseOhm: number;
      readonly timingF: number;
      /** Voltage on the timing capacitor from which the control moves. */
      readonly thresholdV: number;
      /** Change of control voltage for each volt above the threshold; signed. */
      readonly gainVPerV: number;
      readonly restV: number;
      readonly limitV: number;
      readonly linked: boolean;
    }
  | { readonly source: 'external'; readonly fullScaleV: number; readonly offsetV: number };

/** The make-up amplifier after the cell; null is ideal. */
export interface Output {
  readonly gainDb: number;
  readonly gainBandwidthHz: number | null;
  readonly slewVPerSec: number | null;
  /** Largest output, V either side of 0. */
  readonly swingV: number | null;
}

/** Thermal noise of the parts, computed sample by sample from a seed, or left out. */
export type Noise = { readonly kind: 'none' } | { readonly kind: 'thermal'; readonly seed: number };
