import { expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import type { Control } from '../../../model/design/types.ts';
import { controlPicture } from '../../../web/state/controlPicture.ts';
import { steadyEnvelope } from '../../../web/state/followerCurve.ts';

const envelope: Extract<Control, { source: 'envelope' }> = {
  ...{ source: 'envelope', senses: 'input', rectifier: 'full', attackOhm: 1, releaseOhm: 1e9, timingF: 1e-3 },
  ...{ thresholdV: 0.05, gainVPerV: 6, restV: -1.8, limitV: -0.3, linked: true },
};

function curveOf(control: Control) {
  const [variant] = defaultDesign().variants;
  const picture = controlPicture({ ...defaultDesign(), variants: [{ ...variant, control }] }, 0, 1000);
  if (!('levelV' in picture)) throw new Error('no curve');
  return picture;
}

test('with hardly any release the envelope of a tone is its peak', () => {
  expect(steadyEnvelope({ ...envelope, attackOhm: 10, timingF: 1e-7 }, 1000)).toBeCloseTo(1, 3);
});

test('slow and with equal resistors, a full-wave follower holds where charge and discharge balance', () => {
  // At an envelope of e = sin θ: (2/π)(cos θ − e(π/2 − θ)) = e, solved apart: e = 0.33651.
  expect(steadyEnvelope({ ...envelope, attackOhm: 1e5, releaseOhm: 1e5, timingF: 1e-4 }, 1000)).toBeCloseTo(0.33651, 3);
});

test('a follower of the input rests under its threshold and stops at its limit', () => {
  const { levelV, control, gate } = curveOf(envelope);
  const perVolt = steadyEnvelope(envelope, 1000);
  expect([...control.slice(0, 2)]).toEqual([-1.8, -1.8]);
  expect(control.at(-1)).toBeCloseTo(-0.3, 12);
  expect(levelV[1]).toBeCloseTo(0.05 / perVolt, 9);
  expect(levelV.at(-2)).toBeCloseTo((0.05 + 1.5 / 6) / perVolt, 9);
  expect([...levelV]).toEqual([...levelV].sort((a, b) => a - b));
  expect(gate[0]).toBeLessThan(gate.at(-1) as number);
});

test('a follower of the output needs more at the input, by what the cell takes away', () => {
  const [before, behind] = [curveOf(envelope), curveOf({ ...envelope, senses: 'output' })];
  const ends = [before, behind].map(({ levelV }) => levelV.at(-2) as number);
  expect(ends[1] / ends[0]).toBeGreaterThan(5);
});
