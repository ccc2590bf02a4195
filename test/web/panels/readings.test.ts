import { expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import { measureTone } from '../../../model/study/tone.ts';
import { characteristicRows, noiseAt } from '../../../web/panels/characteristicRows.ts';
import { gatePeriod } from '../../../web/state/controlPicture.ts';
import type { LiveLevels } from '../../../web/state/bench.ts';

const [variant] = defaultDesign().variants;

const limits = { feedthroughV: 0.001, controlV: 1.5, pastOffV: 0.6 };

function readAt(k: number) {
  const cell = { ...variant.cell, feedback: { kind: 'buffered', fraction: k } } as const;
  return measureTone({ ...defaultDesign(), variants: [{ ...variant, cell }] }, 0, { toneV: 0.2, controlV: -0.9 });
}

test('the rows of Table 1 have a number each, and their ends follow from an LFO’s swing', () => {
  const control = { source: 'lfo', shape: 'sine', rateHz: 4, fromV: -0.4, toV: -2, edgeSec: 0.005 } as const;
  const cell = { ...variant.cell, feedback: { kind: 'none' } } as const;
  const period = gatePeriod({ ...defaultDesign(), variants: [{ ...variant, cell, control }] }, 0);
  const levels = { controlV: -0.9, feedthroughPeakV: 0.0017 } as LiveLevels;
  const swing = [
    { gateV: -2, gainDb: -0.1, rdsOhm: Number.POSITIVE_INFINITY },
    { gateV: -0.4, gainDb: -27.9, rdsOhm: 420 },
  ];
  const noise = [
    { gateV: -2, drainV: 1.8e-6 },
    { gateV: -0.4, drainV: 0.36e-6 },
  ];
  const rows = characteristicRows(
    { ...variant, cell, control },
    { reading: readAt(0.5), levels, picture: period, swing, noise, limits },
  ).flat();
  expect(rows.every(({ now, min, max }) => now !== null || (min !== '' && max !== ''))).toBe(true);
  const row = (name: string) => rows.find(({ short }) => short === name);
  expect(row('Gain')).toMatchObject({ min: '−27.9', max: '−0.1' });
  expect(row('Drain-source')).toMatchObject({ min: '420', max: 'off', unit: 'Ω' });
  expect(row('Noise')).toMatchObject({ min: '0.36', max: '1.80', unit: 'μV' });
  expect(row('Feedthrough')).toMatchObject({ now: '1.7', unit: 'mV' });
  const [controlRow] = rows.filter(({ short }) => short === 'Control');
  expect(controlRow).toMatchObject({ min: '−2.00', now: '−0.90', max: '−0.40', unit: 'V' });
  expect(rows.find(({ short }) => short === 'Past off')?.now).toBe('+0.50');
  // 1.7 mV is over 1 mV and −2 V beyond ±1.5 V; 0.50 V past off is short of 0.6 V.
  expect(row('Feedthrough')?.over).toContain('now');
  expect(controlRow.over).toEqual(['min']);
  expect(row('Past off')?.over).toEqual(['now']);
  const free = { feedthroughV: null, controlV: null, pastOffV: null };
  const unlimited = characteristicRows(
    { ...variant, cell, control },
    { reading: readAt(0.5), levels, picture: period, swing, noise, limits: free },
  );
  expect(unlimited.flat().flatMap(({ over = [] }) => over)).toEqual([]);
});

test('without a reading only what the circuit itself says is left', () => {
  const rows = characteristicRows(variant, { reading: null, levels: null, picture: null, swing: null, noise: null, limits }).flat();
  expect(rows.map(({ short }) => short)).not.toContain('Gain');
  expect(rows.length).toBeGreaterThan(0);
});

test('noise between two gate voltages of the swing lies between theirs, and is none beyond the ends', () => {
  const points = [
    { gateV: -2, drainV: 1e-6 },
    { gateV: -1, drainV: 3e-6 },
  ];
  expect(noiseAt(points, -1.5)).toBeCloseTo(2e-6, 12);
  expect(noiseAt(points, -2)).toBe(1e-6);
  expect(noiseAt(points, -0.9)).toBeNull();
});
