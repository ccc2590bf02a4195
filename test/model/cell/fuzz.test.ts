import { describe, expect, test } from 'vitest';
import { coefficientLayout, ENOUGH_V, rowLayout } from '../../../model/cell/kernels/layout.ts';
import { emptyCellReport, runCellSeed, type Spoil } from '../../fuzz/cellCases.ts';
import { CELL_SEEDS } from '../../fuzz/seeds.ts';

const SLICES = 10;
const CASES_A_SLICE = 1e5;
/** Of a slice's own, so that one slice can be run alone; 10⁷ by `npm run fuzz` begin elsewhere. */
const SEEDS_A_SLICE = 1e6;

describe('10⁶ random samples, each in a circuit, with values or with a signal of its own', () => {
  test.each(Array.from({ length: SLICES }, (_, slice) => slice))(
    'slice %i: Kirchhoff to 1 pA + 1e-9 of the currents while playing, 1 fA + 1e-12 in readings, and what doubles keep',
    (slice) => {
      const report = emptyCellReport();
      for (let seed = 1e7 + slice * SEEDS_A_SLICE; report.cases < CASES_A_SLICE && report.faults.length === 0; seed++)
        runCellSeed(seed, report);
      expect(report.faults).toEqual([]);
      expect(report.cases).toBeGreaterThanOrEqual(CASES_A_SLICE);
      expect(report.fallbacks / report.cases).toBeLessThan(5e-3);
    },
    120_000,
  );
});

test.each(CELL_SEEDS)('seed %i stays mended: %s', (seed) => {
  const report = emptyCellReport();
  runCellSeed(seed, report);
  expect(report.faults).toEqual([]);
  expect(report.cases + report.active).toBeGreaterThan(0);
});

describe('a cell that is broken on purpose is caught', () => {
  const SEEDS = Array.from({ length: 20 }, (_, i) => i + 1);
  const caught = (spoil?: Spoil) =>
    SEEDS.filter((seed) => {
      const report = emptyCellReport();
      runCellSeed(seed, report, 50, spoil);
      return report.faults.length > 0;
    }).length;

  test('not one of them when nothing is broken', () => expect(caught(undefined)).toBe(0));

  test('by a millionth in the gate-source row', () => {
    const spoil: Spoil = ({ coefficients, stateCount }) => {
      for (let k = 0; k < rowLayout(stateCount).width; k++) coefficients[k] *= 1 + 1e-6;
    };
    expect(caught(spoil)).toBeGreaterThan(5);
  });

  test('by a device of a millionth more current', () => {
    const spoil: Spoil = ({ values, numbers }) => {
      values[numbers.plan.values.length] *= 1 + 1e-6;
    };
    expect(caught(spoil)).toBeGreaterThan(5);
  });

  test('by a Newton method that stops at 1 V', () => {
    const spoil: Spoil = ({ coefficients, stateCount }) => {
      coefficients[coefficientLayout(stateCount).device + ENOUGH_V] = 1;
    };
    expect(caught(spoil)).toBeGreaterThan(0);
  });
});
