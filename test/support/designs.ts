/** Designs for tests, written as plain values so that a test shows what it changes. */
import type { Cell, Control, Design, Device, Variant } from '../../model/design/types.ts';

/** Cell A of the project's check values: 3 mA, −1.5 V, square law, no junctions, no capacitors. */
export const CELL_A_DEVICE: Device = {
  law: 'square',
  channel: 'n',
  idssA: 0.003,
  gateOffV: -1.5,
  lambdaPerV: 0,
  barrierV: 0.8,
  exponent: 2,
  tailV: 0.05,
  readAtC: 25,
  junction: { reverseA: 0, ideality: 1, leakageS: 0 },
  gateSourceF: 0,
  gateDrainF: 0,
  grading: 0,
};

/** 10 kΩ in series, next to no load. */
export const CELL_A: Cell = {
  circuit: 'shunt',
  feed: { kind: 'direct' },
  sourceOhm: 0,
  pad: { kind: 'none' },
  buffer: { kind: 'none' },
  coupling: { kind: 'none' },
  seriesOhm: 10000,
  drainReturnOhm: null,
  outputCouplingF: null,
  loadOhm: 1e12,
  loadF: 0,
  driverOhm: 0,
  smoothing: { kind: 'none' },
  controlOhm: 1e9,
  feedback: { kind: 'none' },
  clamp: { kind: 'none' },
  reference: { kind: 'ground' },
  sharedGround: { kind: 'none' },
  strayF: 0,
};

/** A whole board: junctions, picofarads, feedback pair with blocking capacitor. */
export const REAL_DEVICE: Device = {
  ...CELL_A_DEVICE,
  junction: { reverseA: 1e-14, ideality: 1, leakageS: 1e-12 },
  gateSourceF: 5e-12,
  gateDrainF: 5e-12,
};

export const REAL_CELL: Cell = {
  ...CELL_A,
  loadOhm: 1e6,
  loadF: 1e-10,
  controlOhm: 4.7e5,
  feedback: { kind: 'resistor', drainOhm: 4.7e5, blockingF: 1e-7 },
};

export function variantOf(
  cell: Partial<Cell> = {},
  device: Partial<Device> = {},
  control: Control = { source: 'fixed', controlV: -1.2 },
): Variant {
  return {
    name: 'A',
    device: { ...CELL_A_DEVICE, ...device },
    cell: { ...CELL_A, ...cell },
    control,
    output: { gainDb: 0, gainBandwidthHz: null, slewVPerSec: null, swingV: null },
  };
}

export function designOf(variant: Variant, values: Partial<Design> = {}): Design {
  return { fettle: 1, title: 'Test', fullScaleV: 1, tempC: 25, oversampling: 8, noise: { kind: 'none' }, variants: [variant], ...values };
}
