import { expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import { measureTone } from '../../../model/study/tone.ts';
import { characteristicRows } from '../../../web/panels/characteristicRows.ts';
import { gatePeriod } from '../../../web/state/gatePeriod.ts';
import { leavesOhmic, signedHarmonic } from '../../../web/panels/readingWords.ts';

const [variant] = defaultDesign().variants;

function readAt(k: number) {
  const cell = { ...variant.cell, feedback: { kind: 'buffered', fraction: k } } as const;
  return measureTone({ ...defaultDesign(), variants: [{ ...variant, cell }] }, 0, { toneV: 0.2, controlV: -0.9 });
}

test('H2 is plus below the balance of k, where k should be raised, and minus above it', () => {
  expect(signedHarmonic(readAt(0.4), 2)).toBeGreaterThan(0);
  expect(signedHarmonic(readAt(0.6), 2)).toBeLessThan(0);
  expect(signedHarmonic(readAt(0.4), 99)).toBeNull();
});

test('saturation and a conducting gate are past a limit, being cut off is not', () => {
  expect(leavesOhmic({ ohmic: 0.94, saturated: 0.06, cutoff: 0, gateOn: 0 })).toEqual({ words: 'saturates for', share: 0.06 });
  expect(leavesOhmic({ ohmic: 0, saturated: 0, cutoff: 1, gateOn: 0 })).toBeNull();
  expect(leavesOhmic({ ohmic: 1, saturated: 0, cutoff: 0, gateOn: 0.2 })?.words).toContain('gate conducts');
});

test('the rows of Table 1 have a number each, and their ends follow from an LFO’s swing', () => {
  const control = { source: 'lfo', shape: 'sine', rateHz: 4, fromV: -0.4, toV: -2, edgeSec: 0.005 } as const;
  const cell = { ...variant.cell, feedback: { kind: 'none' } } as const;
  const period = gatePeriod({ ...defaultDesign(), variants: [{ ...variant, cell, control }] }, 0);
  if ('fault' in period) throw new Error(period.fault);
  const rows = characteristicRows({ ...variant, cell, control }, readAt(0.5), -0.9, period).flat();
  expect(rows.every(({ now, min, max }) => now !== null || (min !== '' && max !== ''))).toBe(true);
  const [controlRow] = rows.filter(({ short }) => short === 'Control');
  expect(controlRow).toMatchObject({ min: '−2.00', now: '−0.90', max: '−0.40', unit: 'V' });
  expect(rows.find(({ short }) => short === 'Past off')?.now).toBe('+0.50');
});

test('without a reading only what the circuit itself says is left', () => {
  const rows = characteristicRows(variant, null, null, null).flat();
  expect(rows.map(({ short }) => short)).not.toContain('Gain');
  expect(rows.length).toBeGreaterThan(0);
});
