/** Sense of the second harmonic: with the square law ID ∝ (VGS − VGS(off) − VDS/2)·VDS and k of VDS at the gate, H2 goes as ½ − k (exact identity). */
import { expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import type { Cell, Channel, Design } from '../../../model/design/types.ts';
import { signedHarmonic } from '../../../model/study/signed.ts';
import { measureTone } from '../../../model/study/tone.ts';

function designAt(k: number, channel: Channel, parts: Partial<Cell> = {}): Design {
  const design = defaultDesign();
  const [variant] = design.variants;
  const sign = channel === 'p' ? -1 : 1;
  const device = { ...variant.device, channel, gateOffV: -1.5 * sign };
  const cell: Cell = { ...variant.cell, ...parts, feedback: { kind: 'buffered', fraction: k } };
  return { ...design, variants: [{ ...variant, device, cell, control: { source: 'fixed', controlV: -0.9 * sign } }] };
}

const signed = (n: number, k: number, channel: Channel, parts?: Partial<Cell>) =>
  signedHarmonic(measureTone(designAt(k, channel, parts), 0, { toneV: 0.2 }), n, channel);

test.each(['n', 'p'] as const)(
  'H2 of an %s-channel part is plus below the balance of k, where k should be raised, and minus above it',
  (channel) => {
    expect(signed(2, 0.4, channel)).toBeGreaterThan(0);
    expect(signed(2, 0.6, channel)).toBeLessThan(0);
  },
);

test('a p-channel part has the harmonics of its n-channel mirror, sign and all', () => {
  for (const n of [2, 3, 4]) expect(signed(n, 0.4, 'p')).toBeCloseTo(signed(n, 0.4, 'n') as number, 12);
});

test('a coupling capacitor that turns the phase of the tone by 60° turns no sign', () => {
  // 1 kHz under a corner of 1/(2π·10 kΩ·10 nF) = 1.6 kHz leads by 58° (first-order high-pass).
  const parts: Partial<Cell> = { coupling: { kind: 'capacitor', couplingF: 10e-9, leakOhm: 1e12 } };
  expect(signed(2, 0.4, 'n', parts)).toBeGreaterThan(0);
  expect(signed(2, 0.6, 'n', parts)).toBeLessThan(0);
});

test('a harmonic that the reading does not hold has no sign', () => {
  expect(signed(99, 0.4, 'n')).toBeNull();
});
