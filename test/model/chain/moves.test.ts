/** Every number of a design moved while a signal plays. At ×2, where a slice is the longest part of a ramp: what passes here is better at ×8. */
import { expect, test } from 'vitest';
import { createChain, moveChain, processChain } from '../../../model/chain/chain.ts';
import { compileChain } from '../../../model/chain/compile.ts';
import type { Cell, Control, Design, Device, Output, Oversampling } from '../../../model/design/types.ts';
import { CELL_A, CELL_A_DEVICE, designOf, variantOf } from '../../support/designs.ts';

const RATE = 48000;
const BEFORE = 960;
/** The ramp of 20 ms and half as much again. */
const AFTER = 1440;

const DEVICE: Device = {
  ...CELL_A_DEVICE,
  law: 'gradual',
  idssA: 4e-3,
  gateOffV: -2,
  lambdaPerV: 0.02,
  junction: { reverseA: 5e-14, ideality: 1.1, leakageS: 2e-11 },
  gateSourceF: 6e-12,
  gateDrainF: 4e-12,
  grading: 0.4,
};

/** Everything fitted, the source pin at 4.5 V. */
const PICKUP: Cell = {
  ...CELL_A,
  feed: { kind: 'pickup', inductanceH: 4, windingF: 1e-10, cableF: 5e-10, volumeOhm: 5e5 },
  sourceOhm: 6e3,
  pad: { kind: 'divider', upperOhm: 22e3, lowerOhm: 47e3 },
  buffer: { kind: 'follower', offsetV: 2e-3, biasA: 5e-8 },
  coupling: { kind: 'capacitor', couplingF: 4.7e-7, leakOhm: 1e7 },
  seriesOhm: 6.8e3,
  drainReturnOhm: 1e5,
  outputCouplingF: 1e-7,
  loadOhm: 2.2e5,
  loadF: 2.2e-10,
  driverOhm: 600,
  smoothing: { kind: 'rc', smoothingOhm: 1e4, smoothingF: 4.7e-8 },
  controlOhm: 4.7e5,
  feedback: { kind: 'resistor', drainOhm: 4.3e5, blockingF: 1e-7 },
  clamp: { kind: 'diode', reverseA: 1e-8, ideality: 1.05 },
  reference: { kind: 'halfSupply', supplyV: 9, upperOhm: 1e4, lowerOhm: 1e4, decouplingF: 1e-5 },
  sharedGround: { kind: 'shared', groundOhm: 0.5, drawAPerV: 1e-3 },
  strayF: 2e-12,
};

const STAGE: Cell = {
  ...PICKUP,
  feed: { kind: 'stage', couplingF: 1e-6, bleedOhm: 1e6 },
  buffer: { kind: 'none' },
  feedback: { kind: 'buffered', fraction: 0.5 },
};

const SMOOTH: Cell = {
  ...CELL_A,
  loadOhm: 1e6,
  loadF: 1e-10,
  controlOhm: 4.7e5,
  feedback: { kind: 'resistor', drainOhm: 4.7e5, blockingF: null },
};

const AMPLIFIER: Output = { gainDb: 12, gainBandwidthHz: 3e6, slewVPerSec: 2e3, swingV: 0.4 };

const followerOf = (senses: 'input' | 'output'): Control => ({
  source: 'envelope',
  senses,
  rectifier: 'full',
  attackOhm: 4700,
  releaseOhm: 220e3,
  timingF: 1e-6,
  thresholdV: 0.02,
  gainVPerV: 4,
  restV: -1.9,
  limitV: -1.2,
  linked: true,
});

const boardOf = (cell: Cell, device: Device, control: Control, output: Partial<Output> = {}): Design => {
  const variant = variantOf(cell, device, control);
  return designOf({ ...variant, output: { ...variant.output, ...output } }, { oversampling: 2 });
};

const { law: _, ...square } = { ...DEVICE, grading: 0, lambdaPerV: 0 };

const BOARDS: Readonly<Record<string, Design>> = {
  'a pickup before everything': boardOf(PICKUP, DEVICE, { source: 'fixed', controlV: 3.4 }, AMPLIFIER),
  'a stage before a gate that conducts': boardOf(
    STAGE,
    { ...square, law: 'square' },
    { source: 'lfo', shape: 'square', rateHz: 40, fromV: 4.4, toV: 5.2, edgeSec: 2e-3 },
    AMPLIFIER,
  ),
  'the smooth law and a follower of the input': boardOf(SMOOTH, { ...DEVICE, law: 'smooth' }, followerOf('input')),
  'a loop': boardOf(SMOOTH, { ...square, law: 'square' }, followerOf('output'), AMPLIFIER),
  'a recorded control': boardOf(SMOOTH, DEVICE, { source: 'external', fullScaleV: 0.4, offsetV: -1.4 }),
};

type Path = readonly string[];

/** Where numbers stand in a document. */
function numbersIn(part: object, path: Path = []): Path[] {
  return Object.entries(part).flatMap(([name, value]) => {
    if (typeof value === 'number') return [[...path, name]];
    return value !== null && typeof value === 'object' ? numbersIn(value, [...path, name]) : [];
  });
}

function changed<Part extends object>(part: Part, [name, ...rest]: Path, change: (value: number) => number): Part {
  const value = part[name as keyof Part];
  const next = rest.length === 0 ? change(value as number) : changed(value as object, rest, change);
  return (Array.isArray(part) ? part.with(Number(name), next) : { ...part, [name]: next }) as Part;
}

const ADDED: Readonly<Record<string, number>> = {
  supplyV: 0.4,
  controlV: -0.2,
  fromV: -0.2,
  toV: -0.2,
  restV: 0.1,
  limitV: 0.2,
  offsetV: 0.1,
};

/** Ten times as much of what stores charge or flux, by some volts where half as much again would be another way to work, else half as much again. */
function moved(field: string, value: number): number {
  if (field in ADDED) return value + ADDED[field];
  if (field === 'tailV') return value * 1.02;
  return value * (/[a-z][FH]$/.test(field) ? 10 : 1.5);
}

/** Numbers that choose a shape, between which the chain fades instead: no values to move. */
const SHAPES = ['variants.0.device.exponent', 'variants.0.device.grading', 'fettle', 'oversampling'];

const CASES = Object.entries(BOARDS).flatMap(([board, design]) =>
  numbersIn(design)
    .map((path) => path.join('.'))
    .filter((path) => !SHAPES.includes(path))
    .map((path) => [board, path] as const),
);

function signal(from: number, count: number): Float32Array {
  const toneAt = (hz: number, n: number) => Math.sin((2 * Math.PI * hz * n) / RATE);
  return Float32Array.from({ length: count }, (_, i) => 0.3 * toneAt(440, from + i) + 0.1 * toneAt(3000, from + i));
}

/** `finer` is by how much matrices are made more often than they usually are. */
function play(design: Design, next: Design, finer: number): Float32Array {
  const numbersOf = (of: Design) => {
    const numbers = compileChain(of, 0, RATE, 1, 'lowLatency');
    return { ...numbers, updateEvery: numbers.updateEvery / finer };
  };
  const chain = createChain(numbersOf(design));
  const output = [new Float32Array(BEFORE), new Float32Array(AFTER)];
  const recorded = signal(7, BEFORE + AFTER);
  processChain(chain, [signal(0, BEFORE)], [output[0]], recorded.subarray(0, BEFORE));
  expect(numbersOf(next).shape).toBe(chain.numbers.shape);
  moveChain(chain, numbersOf(next));
  processChain(chain, [signal(BEFORE, AFTER)], [output[1]], recorded.subarray(BEFORE));
  expect(chain.readings.faults).toBe(0);
  return output[1];
}

const power = (samples: Float32Array) => samples.reduce((sum, v) => sum + v * v, 0);

function distanceDb(design: Design, next: Design): number {
  const coarse = play(design, next, 1);
  const fine = play(design, next, 64);
  return 10 * Math.log10(power(coarse.map((v, i) => v - fine[i])) / power(fine) + 1e-30);
}

test.each(CASES)('%s, %s: moved, under −80 dB from the same move with matrices made 64 times as often', (board, name) => {
  const path = name.split('.');
  const next = changed(BOARDS[board], path, (value) => moved(path[path.length - 1], value));
  expect(distanceDb(BOARDS[board], next)).toBeLessThan(-80);
});

const FARTHEST: readonly (readonly [string, number])[] = [
  ['cell.coupling.couplingF', 1e-2],
  ['cell.feed.inductanceH', 1e-3],
  ['cell.seriesOhm', 1e6],
  ['cell.sharedGround.groundOhm', 100],
];

test.each(FARTHEST)('%s moved to %s at ×8, over decades: under −80 dB as well', (name, to) => {
  const design = { ...BOARDS['a pickup before everything'], oversampling: 8 as Oversampling };
  expect(
    distanceDb(
      design,
      changed(design, `variants.0.${name}`.split('.'), () => to),
    ),
  ).toBeLessThan(-80);
});
