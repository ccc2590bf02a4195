import { expect, test } from 'vitest';
import { quantityTicks } from '../../../web/draw/axisTicks.ts';
import { linearScale } from '../../../web/draw/scale.ts';

const words = (from: number, to: number, unit: string) => quantityTicks(linearScale(from, to, 0, 100), unit, 5).map((tick) => tick.words);

test('an axis is in the prefix of its larger end, with the unit on its last number', () => {
  expect(words(-5e-5, 5e-5, 'A')).toEqual(['−50', '0', '50\u2009μA']);
  expect(words(-2, 0, 'V')).toEqual(['−2.0', '−1.5', '−1.0', '−0.5', '0\u2009V']);
  expect(words(0, 3e-12, 'A').at(-1)).toBe('3\u2009pA');
});
