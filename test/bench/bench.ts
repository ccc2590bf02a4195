/**
 * What the engine costs, as ratios measured in one run: the machines are shared, so a time alone says little. `--json` after `--` prints an array of
 * { name, value, unit, bar, met }; `bar` and `met` are null where there is no bar.
 */
import { createCell, settle } from '../../model/cell/cell.ts';
import { compileCell } from '../../model/cell/cell.ts';
import { shuntCircuit } from '../../model/cell/shunt.ts';
import { createChain, processChain, warmChain } from '../../model/chain/chain.ts';
import { compileChain } from '../../model/chain/compile.ts';
import { renderClip } from '../../model/chain/render.ts';
import { measureTone } from '../../model/study/tone.ts';
import { designOf, REAL_CELL, REAL_DEVICE, variantOf } from '../support/designs.ts';
import { buildNative } from './native.ts';

interface Row {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly bar: number | null;
  readonly met: boolean | null;
}

const RATE_HZ = 48000;
const UPPER_HZ = 8 * RATE_HZ;
const SAMPLES = 8192;

const atMost = (name: string, value: number, unit: string, bar: number): Row => ({ name, value, unit, bar, met: value <= bar });
const figure = (name: string, value: number, unit: string): Row => ({ name, value, unit, bar: null, met: null });

/** The best of several runs, ms: other programs can only make a run longer. */
function best(runs: number, work: () => void): number {
  let least = Number.POSITIVE_INFINITY;
  for (let run = 0; run < runs; run++) {
    const start = performance.now();
    work();
    least = Math.min(least, performance.now() - start);
  }
  return least;
}

/** Kernel of the whole board, ohmic: TypeScript and C in turns, the best of each. */
function kernelRows(): Row[] {
  const cell = createCell(compileCell(shuntCircuit(REAL_CELL, REAL_DEVICE), REAL_DEVICE, 25), 1 / UPPER_HZ);
  settle(cell, 0, -1);
  const audio = Float64Array.from({ length: SAMPLES }, (_, i) => 0.3 * Math.sin((2 * Math.PI * 1000 * i) / UPPER_HZ));
  const control = Float64Array.from({ length: SAMPLES }, (_, i) => -0.9 + 0.3 * Math.sin((2 * Math.PI * i) / SAMPLES));
  const output = new Float64Array(SAMPLES);
  const { kernel } = cell;
  const native = buildNative(
    { trapezoidal: 1, stiff: 'dg', output: 'd' },
    {
      coefficients: cell.coefficients,
      state: cell.state,
      audio,
      control,
    },
  );
  const silent = new Float64Array(0);
  let typescriptNs = Number.POSITIVE_INFINITY;
  let nativeNs = Number.POSITIVE_INFINITY;
  for (let turn = 0; turn < 8; turn++) {
    const ms = best(150, () => kernel(cell.coefficients, cell.numbers.table, silent, cell.state, audio, control, output, 0, SAMPLES));
    typescriptNs = Math.min(typescriptNs, (ms * 1e6) / SAMPLES);
    nativeNs = Math.min(nativeNs, native.time());
  }
  native.dispose();
  return [
    figure('solved sample, square law, ohmic, 3 states: C', nativeNs, 'ns'),
    figure('solved sample, square law, ohmic, 3 states: TypeScript', typescriptNs, 'ns'),
    atMost('TypeScript over C, ohmic', typescriptNs / nativeNs, 'times', 1.35),
  ];
}

function chainRows(): Row[] {
  const control = { source: 'lfo', shape: 'sine', rateHz: 4, fromV: -0.5, toV: -1.4, edgeSec: 0.01 } as const;
  const design = designOf(variantOf(REAL_CELL, REAL_DEVICE, control));
  const input = Float32Array.from({ length: RATE_HZ }, (_, i) => 0.3 * Math.sin((2 * Math.PI * 440 * i) / RATE_HZ));
  const chain = createChain(compileChain(design, 0, RATE_HZ, 1, 'lowLatency'));
  warmChain(chain);
  const output = [new Float32Array(128)];
  const blocks = Array.from({ length: 375 }, (_, block) => [input.subarray(128 * block, 128 * block + 128)]);
  const secondMs = best(12, () => {
    for (const block of blocks) processChain(chain, block, output);
  });
  const renderMs = best(6, () => renderClip(design, 0, [input], RATE_HZ));
  const readingMs = best(30, () => measureTone(design, 0));
  return [
    figure('one mono cell at ×8, 48 kHz, low latency', secondMs / 10, '% of a core'),
    figure('whole-clip render at ×8, linear phase', 1000 / renderMs, 'times real time'),
    figure('steady-state reading of a tone', readingMs, 'ms'),
  ];
}

function print(rows: readonly Row[]): void {
  const width = Math.max(...rows.map((row) => row.name.length));
  for (const { name, value, unit, bar, met } of rows) {
    const verdict = bar === null ? '' : `  at most ${bar}: ${met ? 'met' : 'NOT MET'}`;
    console.log(`${name.padEnd(width)}  ${value.toFixed(2).padStart(9)} ${unit}${verdict}`);
  }
}

const rows = [...kernelRows(), ...chainRows()];
if (process.argv.includes('--json')) console.log(JSON.stringify(rows, null, 2));
else print(rows);
