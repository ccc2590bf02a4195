import { expect, test } from 'vitest';
import { compileCell, createCell } from '../../../model/cell/cell.ts';
import { shuntCircuit } from '../../../model/cell/shunt.ts';
import { REAL_CELL, REAL_DEVICE } from '../../support/designs.ts';

test('the independent numbers give the rows the covariance that all noisy parts give them, to rounding, and are no more than the rows', () => {
  const cell = createCell(compileCell(shuntCircuit(REAL_CELL, REAL_DEVICE), REAL_DEVICE, 25, true), 1 / 384000);
  const { noise, reduction, stateCount } = cell;
  const { plan, polarity } = cell.numbers;
  const { step, response, values, layout } = reduction;
  const rows = stateCount + 3;
  const parts = Array.from({ length: rows }, (_, row) =>
    Array.from(plan.noisy, (element, k) => {
      const outputAt = (rows - 1) * plan.width + plan.width - plan.noisy.length + k;
      const perA = row < rows - 1 ? step[row * layout.step.width + layout.step.noise + k] : response[outputAt];
      return (row < 2 ? polarity : 1) * perA * Math.sqrt(values[element]);
    }),
  );
  const sum = (count: number, f: (k: number) => number) => Array.from({ length: count }, (_, k) => f(k)).reduce((a, b) => a + b, 0);
  const weight = (column: number, row: number) => noise.weights[column * rows + row];
  for (let p = 0; p < rows; p++) {
    for (let q = 0; q < rows; q++) {
      const expected = sum(plan.noisy.length, (k) => parts[p][k] * parts[q][k]);
      const given = sum(noise.independent, (column) => weight(column, p) * weight(column, q));
      const size = Math.sqrt(sum(plan.noisy.length, (k) => parts[p][k] ** 2) * sum(plan.noisy.length, (k) => parts[q][k] ** 2));
      expect(Math.abs(given - expected), `rows ${p} and ${q}`).toBeLessThanOrEqual(1e-14 * size);
    }
  }
  expect(noise.independent).toBeLessThanOrEqual(rows);
});
