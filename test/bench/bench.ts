/**
 * What the engine costs, as ratios measured in one run: the machines are shared, so a time alone says little. `--json` after `--` prints an array of
 * { name, value, unit, bar, met }; `bar` and `met` are null where there is no bar.
 */
import { compileCell, createCell, settle } from '../../model/cell/cell.ts';
import type { Kernel } from '../../model/cell/kernels/kernel.ts';
import { SQUARE_KERNELS, SQUARE_LOOPED } from '../../model/cell/kernels/square.ts';
import { shuntCircuit } from '../../model/cell/shunt.ts';
import { createChain, moveChain, processChain, warmChain } from '../../model/chain/chain.ts';
import { compileChain } from '../../model/chain/compile.ts';
import { renderClip } from '../../model/chain/render.ts';
import { measureTone } from '../../model/study/tone.ts';
import type { Control, Design, Device } from '../../model/design/types.ts';
import { designOf, REAL_CELL, REAL_DEVICE, variantOf } from '../support/designs.ts';
import { buildNative } from './native.ts';
import { shuntByHand } from './shuntKernel.ts';

interface Row {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  readonly bar: number | null;
  readonly met: boolean | null;
}

const RATE_HZ = 48000;
/** A value's ramp of 20 ms, in blocks. */
const RAMP_BLOCKS = 7;
const MOVED_CELL = { ...REAL_CELL, seriesOhm: 1.02 * REAL_CELL.seriesOhm };
const FOLLOWER = {
  source: 'envelope',
  rectifier: 'full',
  attackOhm: 10_000,
  releaseOhm: 1e6,
  timingF: 1e-7,
  thresholdV: 0.1,
  gainVPerV: 2,
  restV: -2,
  limitV: -0.5,
  linked: true,
} as const;
const UPPER_HZ = 8 * RATE_HZ;
const SAMPLES = 8192;

const atMost = (name: string, value: number, unit: string, bar: number): Row => ({ name, value, unit, bar, met: value <= bar });
const atLeast = (name: string, value: number, unit: string, bar: number): Row => ({ name, value, unit, bar, met: value >= bar });
const figure = (name: string, value: number, unit: string): Row => ({ name, value, unit, bar: null, met: null });

/** The best of several runs, ms of processor time: other programs can only make a run longer, and waiting for them does not count. */
function best(runs: number, work: () => void): number {
  let least = Number.POSITIVE_INFINITY;
  for (let run = 0; run < runs; run++) {
    const start = process.cpuUsage();
    work();
    const { user, system } = process.cpuUsage(start);
    least = Math.min(least, (user + system) / 1000);
  }
  return least;
}

/**
 * The kernel of the whole board, ohmic or with a gate junction conducting on every peak: for any circuit, written by hand for this cell, and in C
 * from the same text; in turns, the best of each.
 */
function kernelRows(state: 'ohmic' | 'conducting', bars: { native: number; byHand: number }): Row[] {
  const cell = createCell(compileCell(shuntCircuit(REAL_CELL, REAL_DEVICE), REAL_DEVICE, 25), 1 / UPPER_HZ);
  const middleV = state === 'ohmic' ? -0.9 : 0.3;
  settle(cell, 0, middleV);
  const audio = Float64Array.from({ length: SAMPLES }, (_, i) => 0.3 * Math.sin((2 * Math.PI * 1000 * i) / UPPER_HZ));
  const control = Float64Array.from({ length: SAMPLES }, (_, i) => middleV + 0.3 * Math.sin((2 * Math.PI * i) / SAMPLES));
  const output = new Float64Array(SAMPLES);
  const silent = new Float64Array(0);
  const { kernel, coefficients } = cell;
  const native = buildNative({ trapezoidal: 1, stiff: 'xg', output: 'd' }, { coefficients, state: cell.state, audio, control });
  const handState = cell.state.slice();
  const ns = { native: Number.POSITIVE_INFINITY, any: Number.POSITIVE_INFINITY, byHand: Number.POSITIVE_INFINITY };
  for (let turn = 0; turn < 8; turn++) {
    const any = best(100, () => kernel(coefficients, cell.numbers.table, silent, silent, cell.state, audio, control, output, 0, SAMPLES));
    const byHand = best(100, () => shuntByHand(coefficients, handState, audio, control, output, SAMPLES));
    ns.any = Math.min(ns.any, (any * 1e6) / SAMPLES);
    ns.byHand = Math.min(ns.byHand, (byHand * 1e6) / SAMPLES);
    ns.native = Math.min(ns.native, native.time());
  }
  native.dispose();
  const what = `solved sample, square law, 3 states, ${state}`;
  return [
    figure(`${what}: C`, ns.native, 'ns'),
    figure(`${what}: TypeScript, any circuit`, ns.any, 'ns'),
    figure(`${what}: TypeScript, written for the cell`, ns.byHand, 'ns'),
    atMost(`TypeScript over C, ${state}`, ns.any / ns.native, 'times', bars.native),
    atMost(`any circuit over written for the cell, ${state}`, ns.any / ns.byHand, 'times', bars.byHand),
  ];
}

/** The kernel in loops on the board's three states, over the one written out for as many, of any kind: the same sums. */
function loopedRow(): Row {
  const cell = createCell(compileCell(shuntCircuit(REAL_CELL, REAL_DEVICE), REAL_DEVICE, 25), 1 / UPPER_HZ);
  settle(cell, 0, -0.9);
  const audio = Float64Array.from({ length: SAMPLES }, (_, i) => 0.3 * Math.sin((2 * Math.PI * 1000 * i) / UPPER_HZ));
  const control = new Float64Array(SAMPLES).fill(-0.9);
  const output = new Float64Array(SAMPLES);
  const silent = new Float64Array(0);
  const timeOf = (kernel: Kernel) => {
    const state = cell.state.slice();
    return best(50, () => kernel(cell.coefficients, cell.numbers.table, silent, silent, state, audio, control, output, 0, SAMPLES));
  };
  const looped = SQUARE_LOOPED(1, 2);
  const least = { written: Number.POSITIVE_INFINITY, looped: Number.POSITIVE_INFINITY };
  for (let turn = 0; turn < 4; turn++) {
    least.written = Math.min(least.written, timeOf(SQUARE_KERNELS['1 xx x']));
    least.looped = Math.min(least.looped, timeOf(looped));
  }
  return atMost('kernel in loops over the one written out, 3 states', least.looped / least.written, 'times', 2);
}

/** `nativeNs` is what C takes for an ohmic sample: the bars on load were set where that is 33 ns, and scale with it. */
function chainRows(nativeNs: number): Row[] {
  const swing = { source: 'lfo', shape: 'sine', rateHz: 4, edgeSec: 0.01 } as const;
  const ohmic = { ...swing, fromV: -0.5, toV: -1.4 };
  const halfTheTime = { ...swing, fromV: -0.6, toV: 0.6 };
  const always = { ...swing, fromV: 0, toV: 0.6 };
  const designFor = (law: Device['law'], control: Control) => designOf(variantOf(REAL_CELL, { ...REAL_DEVICE, law }, control));
  const input = Float32Array.from({ length: RATE_HZ }, (_, i) => 0.3 * Math.sin((2 * Math.PI * 440 * i) / RATE_HZ));
  const blocks = Array.from({ length: 375 }, (_, block) => [input.subarray(128 * block, 128 * block + 128)]);
  const output = [new Float32Array(128)];
  const loadOf = (control: Control) => loadOfDesign(designFor('square', control));
  /** `toward`: a design of the same shape that the chain goes to and comes back from without rest. */
  const loadOfDesign = (design: Design, toward: Design | null = null) => {
    const numbers = compileChain(design, 0, RATE_HZ, 1, 'lowLatency');
    const there = toward === null ? null : compileChain(toward, 0, RATE_HZ, 1, 'lowLatency');
    const chain = createChain(numbers);
    warmChain(chain);
    const start = performance.now();
    processChain(chain, blocks[0], output);
    const firstMs = performance.now() - start;
    const second = () => {
      blocks.forEach((block, b) => {
        if (there !== null && b % RAMP_BLOCKS === 0) moveChain(chain, b % (2 * RAMP_BLOCKS) === 0 ? there : numbers);
        processChain(chain, block, output);
      });
    };
    return { firstMs, percent: best(16, second) / 10 };
  };
  const calm = loadOf(ohmic);
  const timesReal = (law: Device['law']) => 1000 / best(8, () => renderClip(designFor(law, ohmic), 0, [input], RATE_HZ));
  const design = designFor('square', ohmic);
  const scale = nativeNs / 33;
  const withDevice = (values: Partial<Device>) => designOf(variantOf(REAL_CELL, { ...REAL_DEVICE, ...values }, ohmic));
  const overPlain = (other: Design, toward: Design | null = null) => loadOfDesign(other, toward).percent / calm.percent;
  const follower = { ...FOLLOWER, senses: 'output' } as const;
  return [
    atMost('one mono cell at ×8, 48 kHz, low latency, ohmic', calm.percent, '% of a core', 2.5 * scale),
    atMost('the same, junctions conducting half the time', loadOf(halfTheTime).percent, '% of a core', 4.5 * scale),
    figure('the same, junctions conducting all the time', loadOf(always).percent, '% of a core'),
    atMost('first block after the warm-up, of its deadline', calm.firstMs / (128000 / RATE_HZ), 'times', 0.5),
    atMost('over that ohmic cell: thermal noise on', overPlain({ ...design, noise: { kind: 'thermal', seed: 1 } }), 'times', 1.5),
    atMost('over that ohmic cell: capacitances graded by the root', overPlain(withDevice({ grading: 0.5 })), 'times', 2),
    atMost('over that ohmic cell: capacitances graded by the cube root', overPlain(withDevice({ grading: 1 / 3 })), 'times', 2),
    atMost(
      'over that ohmic cell: values always moving',
      overPlain(design, designOf(variantOf(MOVED_CELL, REAL_DEVICE, ohmic))),
      'times',
      4,
    ),
    figure('over that ohmic cell: a follower of the output', overPlain(designFor('square', follower)), 'times'),
    atLeast('whole-clip render at ×8, linear phase, square law', timesReal('square'), 'times real time', 40),
    atLeast('whole-clip render at ×8, linear phase, gradual law', timesReal('gradual'), 'times real time', 30),
    atLeast('whole-clip render at ×8, linear phase, smooth law', timesReal('smooth'), 'times real time', 30),
    figure(
      'steady-state reading of a tone',
      best(30, () => measureTone(design, 0)),
      'ms',
    ),
  ];
}

function print(rows: readonly Row[]): void {
  const width = Math.max(...rows.map((row) => row.name.length));
  for (const { name, value, unit, bar, met } of rows) {
    const side = unit.includes('real time') ? 'at least' : 'at most';
    const verdict = bar === null ? '' : `  ${side} ${Number(bar.toFixed(2))}: ${met ? 'met' : 'NOT MET'}`;
    console.log(`${name.padEnd(width)}  ${value.toFixed(2).padStart(9)} ${unit}${verdict}`);
  }
}

const ohmic = kernelRows('ohmic', { native: 1.25, byHand: 1.15 });
const rows = [...ohmic, ...kernelRows('conducting', { native: 1.5, byHand: 1.4 }), loopedRow(), ...chainRows(ohmic[0].value)];
if (process.argv.includes('--json')) console.log(JSON.stringify(rows, null, 2));
else print(rows);
