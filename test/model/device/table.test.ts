import { expect, test } from 'vitest';
import { LOWEST_Z, PIECES_PER_UNIT, smoothShape, smoothSlope, smoothTable, TERMS } from '../../../model/device/table.ts';

const polynomial = (table: Float64Array, z: number) => {
  const piece = Math.floor((z - LOWEST_Z) * PIECES_PER_UNIT);
  const d = z - (LOWEST_Z + (piece + 0.5) / PIECES_PER_UNIT);
  let value = 0;
  for (let k = TERMS - 1; k >= 0; k--) value = value * d + table[piece * TERMS + k];
  return value;
};

test.each([1.7, 2, 2.3])(
  'exponent %s: the table is within 2e-14 of the definition, relative to the value at VGS = 0 (z = 30)',
  (exponent) => {
    const table = smoothTable(exponent, 60);
    const exact = (z: number) => (z > 0 ? z + Math.log1p(Math.exp(-z)) : Math.log1p(Math.exp(z))) ** exponent;
    for (let z = -39.9; z < 59.9; z += 0.0317) expect(Math.abs(polynomial(table, z) - exact(z)) / exact(30)).toBeLessThan(2e-14);
  },
);

test('the slope is the derivative of the shape', () => {
  for (const z of [-5, -0.1, 0, 2, 20]) {
    const h = 1e-5;
    expect(smoothSlope(z, 2.1) / ((smoothShape(z + h, 2.1) - smoothShape(z - h, 2.1)) / (2 * h))).toBeCloseTo(1, 7);
  }
});
