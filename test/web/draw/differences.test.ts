import { expect, test } from 'vitest';
import { defaultVariant } from '../../../model/design/defaults.ts';
import { checkVariant } from '../../../model/design/read.ts';
import { setAt } from '../../../model/design/path.ts';
import type { Variant } from '../../../model/design/types.ts';
import { differences } from '../../../web/draw/differences.ts';

function made(...changes: readonly (readonly [string, unknown])[]): Variant {
  const result = checkVariant(changes.reduce((so, [path, value]) => setAt(so, path, value), defaultVariant()));
  if ('faults' in result) throw new Error(result.faults[0].sentence);
  return result.variant;
}

test('two of the same do not differ, whatever their names', () => {
  expect(differences(made(), made(['name', 'B']))).toEqual([]);
});

test('a resistor is told by its name and new value, a kind by words', () => {
  expect(differences(made(), made(['cell.seriesOhm', 6800]))).toEqual(['R1 6.80\u2009kΩ']);
  const resistors = made(['cell.feedback.kind', 'resistor']);
  expect(differences(resistors, made(['cell.feedback.kind', 'none']))).toEqual(['no feedback']);
  const blocked = made(['cell.feedback.kind', 'resistor'], ['cell.feedback.blockingF', 1e-7]);
  expect(differences(resistors, blocked)).toEqual(['C1 100\u2009nF']);
  expect(differences(blocked, resistors)).toEqual(['C1 none']);
});

test('parts of the board and values without a name are told of too', () => {
  expect(differences(made(), made(['cell.pad.kind', 'divider']))).toEqual(['the input of the board']);
  expect(differences(made(), made(['device.junction.ideality', 1.2]))).toHaveLength(1);
});

test('a right channel’s part of its own is told of, and the left one’s values are still the ones that are named', () => {
  const { device } = made();
  const own = made(['devices', [device, { ...device, idssA: 0.004 }]]);
  expect(differences(made(), own)).toEqual(['the right channel’s J1']);
  expect(
    differences(
      own,
      made([
        'devices',
        [
          { ...device, idssA: 0.004 },
          { ...device, idssA: 0.004 },
        ],
      ]),
    ),
  ).toEqual(['IDSS 4.00\u2009mA']);
});
