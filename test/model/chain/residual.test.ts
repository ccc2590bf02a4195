import { expect, test } from 'vitest';
import { createChain, moveChain, processChain, setResidual } from '../../../model/chain/chain.ts';
import { compileChain } from '../../../model/chain/compile.ts';
import { renderClip } from '../../../model/chain/render.ts';
import type { ResidualPart } from '../../../model/chain/residual.ts';
import type { Cell, Control, Device } from '../../../model/design/types.ts';
import { CELL_A, designOf, REAL_CELL, REAL_DEVICE, variantOf } from '../../support/designs.ts';

const RATE_HZ = 48000;
const LFO: Control = { source: 'lfo', shape: 'sine', rateHz: 5, fromV: -0.3, toV: -1, edgeSec: 0.01 };
const FOLLOWER: Control = {
  source: 'envelope',
  senses: 'output',
  rectifier: 'full',
  attackOhm: 1000,
  releaseOhm: 100000,
  timingF: 1e-6,
  thresholdV: 0.02,
  gainVPerV: 2,
  restV: -1,
  limitV: -0.1,
  linked: true,
};

function sine(hz: number, peak: number, length: number): Float32Array {
  return Float32Array.from({ length }, (_, n) => peak * Math.sin((2 * Math.PI * hz * n) / RATE_HZ));
}

function rms(samples: Float32Array, from = 0): number {
  return Math.sqrt(samples.subarray(from).reduce((sum, x) => sum + x * x, 0) / (samples.length - from));
}

function db(ratio: number): number {
  return 20 * Math.log10(ratio);
}

/** Amplitude of a sine that has a whole number of periods in the last second. */
function amplitude(samples: Float32Array, hz: number): number {
  let [re, im] = [0, 0];
  for (let n = 0; n < RATE_HZ; n++) {
    const x = samples[samples.length - RATE_HZ + n];
    re += x * Math.cos((2 * Math.PI * hz * n) / RATE_HZ);
    im += x * Math.sin((2 * Math.PI * hz * n) / RATE_HZ);
  }
  return (2 / RATE_HZ) * Math.hypot(re, im);
}

const HALF: Partial<Cell> = { feedback: { kind: 'buffered', fraction: 0.5 } };
/** Loads and couplings change nothing about a cell that is linear at every moment. */
const COUPLED: Partial<Cell> = { ...HALF, coupling: { kind: 'capacitor', couplingF: 1e-6, leakOhm: 1e8 }, loadOhm: 1e5, loadF: 1e-9 };

test.each([
  ['a resistor that the gate holds', HALF, { source: 'fixed', controlV: -0.75 }],
  ['the same, its gate moved by an LFO', HALF, LFO],
  ['coupled and loaded, moved by an LFO', { ...COUPLED, outputCouplingF: 1e-6 }, LFO],
  ['coupled and loaded, in the loop of its own follower', COUPLED, FOLLOWER],
] as const)('a cell made linear (square law, k ½, ohmic) leaves no distortion under −150 dB: %s', (_, cell, control) => {
  const design = designOf(variantOf(cell, {}, control as Control));
  const tone = sine(1000, 0.3, RATE_HZ);
  const [whole] = renderClip(design, 0, [tone], RATE_HZ);
  const [left] = renderClip(design, 0, [tone], RATE_HZ, { residual: 'distortion' });
  expect(db(rms(left) / rms(whole))).toBeLessThan(-150);
});

// Cell A at 1 V peak, k = 0: brentq and FFT, the project's table of check values.
test.each([
  [0, -32.255, -48.03, null],
  [-0.75, -26.432, -36.38, -66.7],
  [-1.2, -18.669, -20.71, null],
] as const)('Cell A at %s V: the residual holds its harmonics to 0.05 dB', (controlV, gainDb, secondDb, thirdDb) => {
  const design = designOf(variantOf({}, {}, { source: 'fixed', controlV }));
  const [left] = renderClip(design, 0, [sine(1000, 1, RATE_HZ + 4800)], RATE_HZ, { residual: 'distortion' });
  expect(Math.abs(db(amplitude(left, 2000)) - gainDb - secondDb)).toBeLessThan(0.05);
  if (thirdDb !== null) expect(Math.abs(db(amplitude(left, 3000)) - gainDb - thirdDb)).toBeLessThan(0.05);
});

test.each(['square', 'gradual', 'smooth'] as const)('%s law, whole board: as the tone falls by 20 dB the distortion falls by 40', (law) => {
  const device: Partial<Device> = { ...REAL_DEVICE, law, grading: 0.5, lambdaPerV: 0.01 };
  const design = designOf(variantOf(REAL_CELL, device, { source: 'fixed', controlV: -1.6 }));
  const left = [0.1, 0.01].map((peak) => {
    const [samples] = renderClip(design, 0, [sine(1000, peak, RATE_HZ / 2)], RATE_HZ, { residual: 'distortion' });
    return rms(samples, RATE_HZ / 4);
  });
  expect(db(left[0] / left[1])).toBeGreaterThan(39);
  expect(db(left[0] / left[1])).toBeLessThan(61);
});

test('feedthrough is what the cell puts out without audio', () => {
  const design = designOf(variantOf(REAL_CELL, REAL_DEVICE, { ...LFO, fromV: -1, toV: -2.5 }));
  const length = RATE_HZ;
  const [silent] = renderClip(design, 0, [new Float32Array(length)], RATE_HZ);
  const [left] = renderClip(design, 0, [sine(440, 0.2, length)], RATE_HZ, { residual: 'feedthrough' });
  const difference = left.map((x, n) => x - silent[n]);
  expect(rms(silent)).toBeGreaterThan(1e-5);
  expect(db(rms(difference) / rms(silent))).toBeLessThan(-100);
});

test('two parts that differ both rest where they are: with the control standing neither channel leaves feedthrough, from the first sample', () => {
  const buffer = { kind: 'follower', offsetV: 0.005, biasA: 0 } as const;
  const cell: Partial<Cell> = { ...REAL_CELL, buffer, coupling: { kind: 'none' }, outputCouplingF: 1e-6 };
  const variant = variantOf(cell, REAL_DEVICE, { source: 'fixed', controlV: -1 });
  const design = designOf({ ...variant, devices: [variant.device, { ...variant.device, gateOffV: 1.07 * variant.device.gateOffV }] });
  // With sound in the cells: beside silence a residual of this size is taken for one that ran away.
  const lines = renderClip(design, 0, [sine(1000, 0.1, 4800), sine(1000, 0.1, 4800)], RATE_HZ, { residual: 'feedthrough' });
  for (const line of lines) expect(line.reduce((most, x) => Math.max(most, Math.abs(x)), 0)).toBeLessThan(1e-9);
});

// Johnson: 4kTR of the resistor and the slope resistance in parallel.
test('noise is that of the resistors and the channel though the design has it switched off', () => {
  const design = designOf(variantOf({}, {}, { source: 'fixed', controlV: -0.75 }), { fullScaleV: 1e-6 });
  const [left] = renderClip(design, 0, [sine(440, 0.2, 2 * RATE_HZ)], RATE_HZ, { residual: 'noise' });
  const rdsOhm = 1 / (2 * (0.003 / 1.5 ** 2) * 0.75);
  const parallelOhm = 1 / (1 / rdsOhm + 1 / CELL_A.seriesOhm);
  const expected = Math.sqrt(4 * 1.380649e-23 * 298.15 * parallelOhm * (RATE_HZ / 2)) / 1e-6;
  expect(Math.abs(db(rms(left, RATE_HZ) / expected))).toBeLessThan(0.3);
});

const BOARD = designOf(variantOf(REAL_CELL, REAL_DEVICE, FOLLOWER));
const MOVED = designOf(variantOf({ ...REAL_CELL, seriesOhm: 22000 }, REAL_DEVICE, FOLLOWER));

test.each(['distortion', 'feedthrough', 'noise'] as const)('%s: the output beside it is the same bits as without', (part) => {
  const run = (residual: ResidualPart | null) => {
    const chain = createChain(compileChain(BOARD, 0, RATE_HZ, 2, 'lowLatency'));
    if (residual) setResidual(chain, residual);
    const input = [sine(440, 0.2, 4096), sine(330, 0.2, 4096)];
    const output = [new Float32Array(4096), new Float32Array(4096)];
    processChain(chain, input, output, null, residual ? [new Float32Array(4096), new Float32Array(4096)] : []);
    moveChain(chain, compileChain(MOVED, 0, RATE_HZ, 2, 'lowLatency'));
    processChain(chain, input, output);
    return output;
  };
  expect(run(part)).toEqual(run(null));
});

test('asked for while it plays, it is the residual that would have been there from the start', () => {
  const input = [sine(440, 0.2, RATE_HZ)];
  const run = (from: number, length = 480) => {
    const chain = createChain(compileChain(BOARD, 0, RATE_HZ, 1, 'lowLatency'));
    const left = new Float32Array(RATE_HZ);
    for (let at = 0; at < RATE_HZ; at += length) {
      if (at === from) setResidual(chain, 'distortion');
      const block = (lines: readonly Float32Array[]) => lines.map((line) => line.subarray(at, at + length));
      processChain(chain, block(input), [new Float32Array(length)], null, block([left]));
    }
    return left;
  };
  const [early, late] = [run(0), run(24000)];
  const difference = late.map((x, n) => x - early[n]);
  expect(db(rms(difference, 36000) / rms(early, 36000))).toBeLessThan(-40);
  for (const length of [50, 96]) expect(db(rms(run(24000, length).map((x, n) => x - late[n])) / rms(late, 36000))).toBe(-Infinity);
});
