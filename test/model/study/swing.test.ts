import { expect, test } from 'vitest';
import { controlSwing } from '../../../model/study/swing.ts';
import { measureTone } from '../../../model/study/tone.ts';
import { designOf, REAL_CELL, REAL_DEVICE, variantOf } from '../../support/designs.ts';

const peak = (values: Float64Array) => (Math.max(...values) - Math.min(...values)) / 2;

/** Gate over control, for 1 MΩ / 1 MΩ with 100 nF; computed by hand: the divider (1 + jωRgC… )/(1 + jω(Rg + Rf)C) at each rate. */
test.each([
  [0.2, 0.98],
  [1, 0.74],
  [5, 0.52],
])('with 1 MΩ, 1 MΩ and 100 nF the gate follows a %s Hz control by %s, its bias whole (worked figures of the divider)', (rateHz, ratio) => {
  const cell = { ...REAL_CELL, controlOhm: 1e6, feedback: { kind: 'resistor', drainOhm: 1e6, blockingF: 1e-7 } as const };
  const control = { source: 'lfo', shape: 'sine', rateHz, fromV: -0.9, toV: -1.1, edgeSec: 0.01 } as const;
  const swing = controlSwing(designOf(variantOf(cell, REAL_DEVICE, control)), 0, 2048);
  expect(peak(swing.gateV) / peak(swing.controlV)).toBeCloseTo(ratio, 2);
  const mean = swing.gateV.reduce((sum, v) => sum + v, 0) / swing.gateV.length;
  expect(mean).toBeCloseTo(-1, 2);
});

test('a swing states what doubling its grid changed: no less than what a grid sixteen times finer still changes', () => {
  const cell = { ...REAL_CELL, controlOhm: 1e6, feedback: { kind: 'resistor', drainOhm: 1e6, blockingF: 1e-7 } as const };
  const control = { source: 'lfo', shape: 'sine', rateHz: 5, fromV: -0.5, toV: -1.4, edgeSec: 0.01 } as const;
  const design = designOf(variantOf(cell, REAL_DEVICE, control));
  const swing = controlSwing(design, 0, 64);
  const finer = controlSwing(design, 0, 1024);
  const left = Math.max(...swing.gateV.map((v, i) => Math.abs(v - finer.gateV[16 * i])));
  expect(left).toBeGreaterThan(0);
  expect(swing.errorV).toBeGreaterThan(left);
  expect(swing.errorV).toBeLessThan(0.02);
  expect(finer.errorV).toBeLessThan(swing.errorV / 50);
});

test('the control leaks through the pair: a 1 V step on R‖r = 5 kΩ and 100 k + 100 k leaves 24.4 mV (worked figure)', () => {
  const cell = {
    ...REAL_CELL,
    seriesOhm: 10000,
    loadOhm: 10000,
    loadF: 0,
    controlOhm: 1e5,
    feedback: { kind: 'resistor', drainOhm: 1e5, blockingF: null } as const,
  };
  const at = (controlV: number) => controlSwing(designOf(variantOf(cell, REAL_DEVICE, { source: 'fixed', controlV })), 0, 16).drainV[0];
  expect(at(-9) - at(-10)).toBeCloseTo(0.0244, 4);
});

test('a reading at a gate voltage is the reading at the control that brings the gate there', () => {
  const divided = designOf(variantOf({ ...REAL_CELL, feedback: { kind: 'resistor', drainOhm: 4.7e5, blockingF: null } }, REAL_DEVICE));
  expect(measureTone(divided, 0, { gateV: -1.1 }).vgsV).toBeCloseTo(-1.1, 8);
  const driven = measureTone(divided, 0, { controlV: -2.2 });
  expect(measureTone(divided, 0, { gateV: driven.vgsV }).gainDb).toBeCloseTo(driven.gainDb, 8);
  expect(() => measureTone(divided, 0, { gateV: 50 })).toThrow('gateV is 50; expected a voltage that the driver can bring the gate to');
});
