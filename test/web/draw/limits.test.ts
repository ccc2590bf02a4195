import { expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import type { ToneReading } from '../../../model/study/tone.ts';
import { amplifierLimit, deviceLimit, limitWords, reverseV } from '../../../web/draw/limits.ts';

const [variant] = defaultDesign().variants;
const regions = { ohmic: 1, saturated: 0, cutoff: 0, gateOn: 0 };
const reading = { vgsV: -1.5, fundamentalV: 0.1, regions } as ToneReading;

test('saturation and a conducting gate are past a limit, being cut off is not', () => {
  const limit = (shares: Partial<typeof regions>) => deviceLimit(variant, { ...reading, regions: { ...regions, ...shares } }, 0, 25);
  expect(limit({ saturated: 0.06 })).toEqual({ kind: 'saturated', size: 0.06 });
  expect(limit({ gateOn: 0.2, saturated: 0.1 })).toEqual({ kind: 'gateOn', size: 0.2 });
  expect(limit({ ohmic: 0, cutoff: 1 })).toBeNull();
});

test('the gate’s reverse voltage is its rest and the larger share of the drain’s peak, the same for either channel', () => {
  const half = { ...variant, cell: { ...variant.cell, feedback: { kind: 'buffered', fraction: 0.25 } } } as const;
  expect(reverseV(half, { ...reading, vgsV: -20 }, 8)).toBeCloseTo(26, 9);
  const p = { ...half, device: { ...half.device, channel: 'p', gateOffV: 1.5 } } as const;
  expect(reverseV(p, { ...reading, vgsV: 20 }, 8)).toBeCloseTo(26, 9);
  expect(deviceLimit(half, { ...reading, vgsV: -20 }, 8, 25)).toMatchObject({ kind: 'reverse' });
  expect(deviceLimit(half, { ...reading, vgsV: -20 }, 8, 40)).toBeNull();
  expect(limitWords({ kind: 'reverse', size: 26 }, 25)).toContain('26.0\u2009V');
});

test('an amplifier without a rail has no limit; one with a rail shows what the tone would need, or that the sound stands on it', () => {
  const railed = { ...variant, output: { ...variant.output, gainDb: 40, swingV: 9 } };
  expect(amplifierLimit({ ...railed, output: { ...railed.output, swingV: null } }, reading, 100)).toBeNull();
  expect(amplifierLimit(railed, reading, 0)).toEqual({ kind: 'rail', size: 10 });
  expect(amplifierLimit(railed, { ...reading, fundamentalV: 0.01 }, 9)).toEqual({ kind: 'rail', size: 9 });
  expect(amplifierLimit(railed, { ...reading, fundamentalV: 0.01 }, 8.9)).toBeNull();
});
