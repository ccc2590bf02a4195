/** The whole board that reference/board.py computes apart from the model. */
import type { Cell, Device } from '../../model/design/types.ts';
import { CELL_A, CELL_A_DEVICE, designOf, variantOf } from './designs.ts';

const DEVICE: Device = {
  ...CELL_A_DEVICE,
  law: 'gradual',
  idssA: 4e-3,
  gateOffV: -2,
  barrierV: 0.75,
  junction: { reverseA: 5e-14, ideality: 1.1, leakageS: 2e-11 },
  gateSourceF: 6e-12,
  gateDrainF: 4e-12,
};

const CELL: Cell = {
  ...CELL_A,
  feed: { kind: 'stage', couplingF: 2.2e-6, bleedOhm: 470e3 },
  sourceOhm: 1e3,
  pad: { kind: 'divider', upperOhm: 22e3, lowerOhm: 4.7e3 },
  coupling: { kind: 'capacitor', couplingF: 470e-9, leakOhm: 1e7 },
  seriesOhm: 6.8e3,
  drainReturnOhm: 1e5,
  outputCouplingF: 100e-9,
  loadOhm: 220e3,
  loadF: 220e-12,
  driverOhm: 600,
  smoothing: { kind: 'rc', smoothingOhm: 10e3, smoothingF: 47e-9 },
  controlOhm: 470e3,
  feedback: { kind: 'resistor', drainOhm: 430e3, blockingF: 100e-9 },
  strayF: 0.5e-12,
};

export const BOARD = designOf({
  ...variantOf(CELL, DEVICE),
  output: { gainDb: 20, gainBandwidthHz: 3e6, slewVPerSec: null, swingV: null },
});
