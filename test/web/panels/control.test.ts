import { expect, test } from 'vitest';
import { defaultVariant } from '../../../model/design/defaults.ts';
import { checkVariant } from '../../../model/design/read.ts';
import type { Control } from '../../../model/design/types.ts';
import { CONTROL_KINDS, controlOf, kindOf } from '../../../web/panels/controlOf.ts';
import { createTap } from '../../../web/panels/tap.ts';

const variant = {
  ...defaultVariant(),
  control: { source: 'lfo', shape: 'sine', rateHz: 4, fromV: -0.4, toV: -1.8, edgeSec: 0.005 },
} as const;

test('every control becomes every other, and the document takes it', () => {
  for (const { value: from } of CONTROL_KINDS) {
    const result = checkVariant({ ...variant, control: controlOf(from, variant) });
    if ('faults' in result) throw new Error(`${from}: ${result.faults[0].sentence}`);
    expect(kindOf(result.variant.control)).toBe(from);
    for (const { value: to } of CONTROL_KINDS) {
      expect(checkVariant({ ...variant, control: controlOf(to, result.variant) }), `${from} to ${to}`).toHaveProperty('variant');
    }
  }
});

test('a follower rests where the channel is off and moves towards where it is on, for either channel', () => {
  expect(controlOf('envelope', variant)).toMatchObject({ restV: -1.8, limitV: -0.4, gainVPerV: 6 });
  const mirrored: Control = { ...variant.control, fromV: 0.4, toV: 1.8 };
  const p = { ...variant, control: mirrored, device: { ...variant.device, channel: 'p', gateOffV: 1.5 } } as const;
  expect(controlOf('envelope', p)).toMatchObject({ restV: 1.8, limitV: 0.4, gainVPerV: -6 });
});

test('a fast LFO that becomes a square gets edges that fit into its period', () => {
  const fast = { ...variant, control: { ...variant.control, rateHz: 500 } };
  expect(controlOf('square', fast)).toMatchObject({ rateHz: 500, edgeSec: 0.0005 });
});

test('a rate is tapped from the second tap on, over the last five intervals, and begins anew after a pause', () => {
  const tap = createTap();
  expect(tap.tap(0)).toBeNull();
  expect(tap.tap(500)).toBe(2);
  expect(tap.tap(900)).toBe(2.22);
  for (const atMs of [1150, 1400, 1650, 1900, 2150]) tap.tap(atMs);
  expect(tap.tap(2400)).toBe(4);
  expect(tap.tap(6000)).toBeNull();
});
