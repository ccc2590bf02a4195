import { describe, expect, test } from 'vitest';
import { processChain } from '../../../model/chain/chain.ts';
import { emptyChainReport, MEETINGS, type Process, runChainSeed } from '../../fuzz/chainCases.ts';
import { CHAIN_SEEDS } from '../../fuzz/seeds.ts';

const SLICES = 6;
const SESSIONS_A_SLICE = 14;

test.each(Array.from({ length: SLICES }, (_, slice) => slice))(
  'slice %i of random sessions: finite, bounded, inputs left alone, unusable ones counted, at rest after a second of silence',
  (slice) => {
    const report = emptyChainReport();
    for (let i = 0; i < SESSIONS_A_SLICE; i++) runChainSeed(1e7 + slice * 1e6 + i, report);
    expect(report.faults).toEqual([]);
    expect(report.refused).toBe(0);
    expect(report.solved).toBeGreaterThan(1e5);
  },
  120_000,
);

test('the sessions of the slices meet every kind of change and of design', () => {
  const met = new Set<string>();
  const silent: Process = (_chain, _inputs, outputs) => {
    for (const output of outputs) output.fill(0);
  };
  for (let slice = 0; slice < SLICES; slice++) {
    for (let i = 0; i < SESSIONS_A_SLICE; i++) {
      const report = emptyChainReport();
      runChainSeed(1e7 + slice * 1e6 + i, report, silent);
      for (const kind of report.met.keys()) met.add(kind);
    }
  }
  expect([...met].sort()).toEqual([...MEETINGS].sort());
}, 120_000);

test.each(CHAIN_SEEDS)(
  'seed %i stays mended: %s',
  (seed) => {
    const report = emptyChainReport();
    runChainSeed(seed, report);
    expect(report.faults).toEqual([]);
    expect(report.lost).toBe(0);
  },
  60_000,
);

describe('a chain that is broken on purpose is caught', () => {
  const caught = (broken: Process) => {
    const report = emptyChainReport();
    for (let seed = 1; seed <= 4; seed++) runChainSeed(seed, report, broken);
    return report.faults.join('\n');
  };

  test('a sample that is no number', () => {
    const broken: Process = (chain, inputs, outputs, external) => {
      processChain(chain, inputs, outputs, external);
      if (outputs[0].length > 9) outputs[0][9] = Number.NaN;
    };
    expect(caught(broken)).toContain('sample 9 is NaN');
  });

  test('an input that is written to', () => {
    const broken: Process = (chain, inputs, outputs, external) => {
      processChain(chain, inputs, outputs, external);
      if (inputs.length > 0 && inputs[0].length > 0) inputs[0][0] = 0.123;
    };
    expect(caught(broken)).toContain('input 0 was written to');
  });

  test('a fault that is not counted', () => {
    const broken: Process = (chain, inputs, outputs, external) => {
      const { faults } = chain.readings;
      processChain(chain, inputs, outputs, external);
      chain.readings.faults = faults;
    };
    expect(caught(broken)).toContain('an unusable input was not counted');
  });

  test('an exception', () => {
    const broken: Process = () => {
      throw new Error('broken');
    };
    expect(caught(broken)).toContain('processing threw Error: broken');
  });
});
