import { PerformanceObserver } from 'node:perf_hooks';
import { expect, test } from 'vitest';
import { type Chain, createChain, moveChain, processChain, warmChain } from '../../../model/chain/chain.ts';
import { compileChain } from '../../../model/chain/compile.ts';
import type { FilterSet } from '../../../model/chain/halfband.ts';
import { renderClip } from '../../../model/chain/render.ts';
import type { Cell, Control, Design, Variant } from '../../../model/design/types.ts';
import { measureTone } from '../../../model/study/tone.ts';
import { CELL_A, CELL_A_DEVICE, designOf, REAL_CELL, REAL_DEVICE, variantOf } from '../../support/designs.ts';

const RATE = 48000;
const TREMOLO: Control = { source: 'lfo', shape: 'sine', rateHz: 4, fromV: -0.4, toV: -1.7, edgeSec: 0.01 };
const DESIGN = designOf(variantOf(REAL_CELL, REAL_DEVICE, TREMOLO));

const tone = (length: number, hz = 440, peak = 0.4) =>
  Float32Array.from({ length }, (_, i) => peak * Math.sin((2 * Math.PI * hz * i) / RATE));
const chainOf = (design: Design, filters: FilterSet = 'lowLatency') => createChain(compileChain(design, 0, RATE, 1, filters));

function run(chain: Chain, input: Float32Array, block: number): Float32Array {
  const output = new Float32Array(input.length);
  for (let at = 0; at < input.length; at += block) {
    const end = Math.min(input.length, at + block);
    processChain(chain, [input.subarray(at, end)], [output.subarray(at, end)]);
  }
  return output;
}

const withVariant = (design: Design, change: Partial<Variant>): Design => ({ ...design, variants: [{ ...design.variants[0], ...change }] });

test('block length changes no bit, while values move and shapes fade too', () => {
  const input = tone(12000);
  const other = withVariant(DESIGN, { cell: { ...REAL_CELL, seriesOhm: 22000 } });
  const without = withVariant(DESIGN, { cell: { ...REAL_CELL, feedback: { kind: 'none' } } });
  const play = (block: number) => {
    const chain = chainOf(DESIGN);
    const parts = [run(chain, input.subarray(0, 4000), block)];
    moveChain(chain, compileChain(other, 0, RATE, 1, 'lowLatency'));
    parts.push(run(chain, input.subarray(4000, 8000), block));
    moveChain(chain, compileChain(without, 0, RATE, 1, 'lowLatency'));
    parts.push(run(chain, input.subarray(8000), block));
    return parts.flatMap((part) => Array.from(part));
  };
  const whole = play(128);
  for (const block of [1, 37, 128, 333, 4000]) expect(play(block)).toEqual(whole);
});

test('block length changes no bit where a third shape waits for the fade to the second', () => {
  const input = tone(9600);
  const withLoad = withVariant(DESIGN, { cell: { ...REAL_CELL, loadF: 0 } });
  const without = withVariant(DESIGN, { cell: { ...REAL_CELL, feedback: { kind: 'none' } } });
  const play = (block: number) => {
    const chain = chainOf(DESIGN);
    const parts = [run(chain, input.subarray(0, 1800), block)];
    moveChain(chain, compileChain(withLoad, 0, RATE, 1, 'lowLatency'));
    parts.push(run(chain, input.subarray(1800, 2400), block));
    moveChain(chain, compileChain(without, 0, RATE, 1, 'lowLatency'));
    parts.push(run(chain, input.subarray(2400), block));
    return parts.flatMap((part) => Array.from(part));
  };
  const whole = play(128);
  for (const block of [1, 7, 37, 600]) expect(play(block)).toEqual(whole);
});

const SLOW: Control = {
  source: 'envelope',
  senses: 'input',
  rectifier: 'full',
  attackOhm: 1e5,
  releaseOhm: 1e6,
  timingF: 1e-6,
  thresholdV: 0.02,
  gainVPerV: 8,
  restV: -1.6,
  limitV: -0.3,
  linked: true,
};

test('a circuit of another shape takes over the envelope: its level stays', () => {
  const compressor = withVariant(DESIGN, { control: SLOW });
  const chain = chainOf(compressor);
  const before = run(chain, tone(RATE), 128).subarray(-4800);
  moveChain(chain, compileChain(withVariant(compressor, { cell: { ...REAL_CELL, loadF: 0 } }), 0, RATE, 1, 'lowLatency'));
  const after = run(chain, tone(9600), 128);
  const peak = (samples: Float32Array) => Math.max(...samples.map(Math.abs));
  expect(20 * Math.log10(peak(after) / peak(before))).toBeLessThan(0.5);
  expect(20 * Math.log10(peak(after.subarray(-4800)) / peak(before))).toBeGreaterThan(-0.5);
});

test('a lost state is found again: the level falls to silence without a step and comes back, with a follower in the loop too', () => {
  const chain = chainOf(withVariant(DESIGN, { control: { ...SLOW, senses: 'output', attackOhm: 4700 } }));
  const before = run(chain, tone(RATE / 2), 128);
  chain.voice.lanes[0].cell.state[0] = Number.NaN;
  const after = run(chain, tone(RATE), 128);
  expect(chain.readings.faults).toBe(1);
  expect(after.every(Number.isFinite)).toBe(true);
  const peak = (samples: Float32Array) => Math.max(...samples.map(Math.abs));
  expect(peak(after.subarray(-4800)) / peak(before.subarray(-4800))).toBeCloseTo(1, 2);
  const largestStep = (samples: Float32Array) =>
    samples.reduce((most, v, i) => (i === 0 ? 0 : Math.max(most, Math.abs(v - samples[i - 1]))), 0);
  const joined = Float32Array.from([...before.subarray(-100), ...after.subarray(0, 2000)]);
  expect(largestStep(joined)).toBeLessThan(1.5 * largestStep(before.subarray(-4800)));
});

const HALF_SUPPLY: Cell = {
  ...CELL_A,
  coupling: { kind: 'capacitor', couplingF: 1e-6, leakOhm: 1e9 },
  outputCouplingF: 1e-6,
  loadOhm: 1e5,
  drainReturnOhm: 1e6,
  reference: { kind: 'halfSupply', supplyV: 9, upperOhm: 1e4, lowerOhm: 1e4, decouplingF: 1e-5 },
};

test.each([
  ['output coupling 1 to 2.2 µF', { outputCouplingF: 2.2e-6 }],
  ['input coupling 1 to 10 µF', { coupling: { kind: 'capacitor', couplingF: 1e-5, leakOhm: 1e9 } }],
  ['decoupling 10 to 22 µF', { reference: { ...HALF_SUPPLY.reference, decouplingF: 2.2e-5 } }],
] as [string, Partial<Cell>][])('%s on half a supply: the capacitor keeps its voltage, and silence stays silence', (_, change) => {
  const design = (cell: Cell) => designOf(variantOf(cell, {}, { source: 'fixed', controlV: 3.3 }));
  const chain = chainOf(design(HALF_SUPPLY));
  run(chain, new Float32Array(9600), 128);
  moveChain(chain, compileChain(design({ ...HALF_SUPPLY, ...change }), 0, RATE, 1, 'lowLatency'));
  expect(Math.max(...run(chain, new Float32Array(9600), 128).map(Math.abs))).toBeLessThan(1e-6);
});

test('a rendered tone has the gain and the harmonics of the steady reading, to the oversampling filters and −100 dB', () => {
  const still = designOf(variantOf(REAL_CELL, REAL_DEVICE, { source: 'fixed', controlV: -1.2 }));
  const reading = measureTone(still, 0, { toneHz: 1000, toneV: 0.5 });
  const input = Float32Array.from({ length: 3 * RATE }, (_, i) => 0.5 * Math.cos((2 * Math.PI * i) / 48));
  const [output] = renderClip(still, 0, [input], RATE);
  const tail = output.subarray(2 * RATE, 2 * RATE + 4800);
  for (const n of [1, 2]) {
    let re = 0;
    let im = 0;
    tail.forEach((v, i) => {
      re += (2 / 4800) * v * Math.cos((2 * Math.PI * n * i) / 48);
      im += (2 / 4800) * v * Math.sin((2 * Math.PI * n * i) / 48);
    });
    const distance = Math.abs(Math.hypot(re, im) - reading.harmonics[n - 1].amplitudeV) / reading.fundamentalV;
    expect(20 * Math.log10(distance)).toBeLessThan(-100);
  }
});

test('a render is as long as its source and in time with it', () => {
  const wire = designOf(variantOf({ seriesOhm: 1, loadOhm: 1e9 }, CELL_A_DEVICE, { source: 'fixed', controlV: -30 }));
  const input = tone(5000, 1000);
  for (const oversampling of [1, 4, 8] as const) {
    const [output] = renderClip({ ...wire, oversampling }, 0, [input], RATE);
    expect(output).toHaveLength(5000);
    let worst = 0;
    for (let i = 500; i < 4500; i++) worst = Math.max(worst, Math.abs(output[i] - input[i]));
    expect(worst).toBeLessThan(1e-4);
  }
});

test('a move of values makes no step larger than the slope that the signal had', () => {
  const chain = chainOf(withVariant(DESIGN, { control: { source: 'fixed', controlV: -1 } }));
  const before = run(chain, tone(RATE), 128);
  moveChain(chain, compileChain(withVariant(DESIGN, { control: { source: 'fixed', controlV: -1.4 } }), 0, RATE, 1, 'lowLatency'));
  const after = run(chain, tone(RATE), 128);
  const steepest = (samples: Float32Array) =>
    samples.reduce((most, v, i) => (i < 2 ? most : Math.max(most, Math.abs(v - samples[i - 1]))), 0);
  expect(steepest(after)).toBeLessThan(steepest(after.subarray(RATE / 2)) * 1.1);
  expect(Math.abs(after[0] - before[before.length - 1])).toBeLessThan(steepest(before) * 1.1);
});

test('a move through values without a path to ground is counted and muted, and the last good ones are kept until there are others', () => {
  const resistive = designOf(variantOf(CELL_A, CELL_A_DEVICE, TREMOLO));
  const chain = chainOf(resistive);
  const steady = chainOf(resistive);
  const input = tone(4800);
  const { numbers } = chain;
  const cut = (values: Float64Array, elements: readonly { readonly kind: string }[]) =>
    values.map((value, i) => (elements[i]?.kind === 'conductance' ? 0 : value));
  run(chain, input, 128);
  run(steady, input, 128);
  moveChain(chain, { ...numbers, cells: numbers.cells.map((cell) => ({ ...cell, values: cut(cell.values, cell.plan.elements) })) });
  const during = run(chain, input, 128);
  expect(chain.readings.faults).toBeGreaterThan(0);
  const [muted, ramp] = [during.subarray(256, 960), during.subarray(0, 256)];
  expect(muted.every((sample) => Math.abs(sample) < 1e-6)).toBe(true);
  const steepest = (samples: Float32Array) => samples.subarray(1).reduce((most, v, i) => Math.max(most, Math.abs(v - samples[i])), 0);
  expect(steepest(ramp)).toBeLessThan(1.2 * steepest(tone(4800)));
  moveChain(chain, numbers);
  run(chain, input, 128);
  run(steady, input, 128);
  run(steady, input, 128);
  const faults = chain.readings.faults;
  const [back, kept] = [run(chain, input, 128), run(steady, input, 128)];
  expect(chain.readings.faults).toBe(faults);
  back.forEach((sample, i) => {
    expect(Math.abs(sample - kept[i])).toBeLessThan(1e-4);
  });
});

/** Level of a tone over the cycle before each sample, from a quarter's two parts: fit of sine and cosine. */
function levels(signal: Float32Array, cycle: number): number[] {
  return Array.from({ length: signal.length - cycle }, (_, start) => {
    let [re, im] = [0, 0];
    for (let i = 0; i < cycle; i++) {
      re += signal[start + i] * Math.cos((2 * Math.PI * i) / cycle);
      im += signal[start + i] * Math.sin((2 * Math.PI * i) / cycle);
    }
    return (2 * Math.hypot(re, im)) / cycle;
  });
}

// Without waiting for each other ×1 and ×8, 5.4 samples apart, would lose |cos(πfτ)|: 0.56 dB at 1 kHz, all of it at 4.4 kHz.
test.each([
  [4, 8, 'lowLatency', 1000],
  [4, 8, 'linearPhase', 1000],
  [1, 8, 'lowLatency', 1000],
  [8, 1, 'lowLatency', 1000],
  [1, 8, 'lowLatency', 4000],
] as const)('a fade from ×%i to ×%i, %s, keeps the level of a tone of %i Hz to 0.1 dB and makes no step', (from, to, filters, hz) => {
  const still = designOf(variantOf(REAL_CELL, REAL_DEVICE, { source: 'fixed', controlV: -1 }));
  const numbers = (oversampling: 1 | 4 | 8 | 16) => compileChain({ ...still, oversampling }, 0, RATE, 1, filters);
  const input = tone(9600, hz, 0.05);
  const ends = [from, to].map((factor) => levels(run(createChain(numbers(factor)), input, 128).subarray(4800), RATE / hz)[0]);
  const chain = createChain(numbers(from));
  run(chain, input, 128);
  moveChain(chain, numbers(to));
  const output = run(chain, input, 128);
  expect(chain.next).toBe(null);
  for (const level of levels(output, RATE / hz)) {
    expect(20 * Math.log10(level / Math.min(...ends))).toBeGreaterThan(-0.1);
    expect(20 * Math.log10(level / Math.max(...ends))).toBeLessThan(0.1);
  }
  const slope = 2 * Math.sin((Math.PI * hz) / RATE) * Math.max(...ends);
  for (let i = 1; i < output.length; i++) expect(Math.abs(output[i] - output[i - 1])).toBeLessThan(1.2 * slope);
});

test('a move that is not for this chain is refused and the old values keep sounding', () => {
  const chain = chainOf(DESIGN);
  expect(() => moveChain(chain, compileChain(DESIGN, 0, 44100, 1, 'lowLatency'))).toThrow('expected 1 at 48000 Hz');
  expect(Math.max(...run(chain, tone(4800), 128))).toBeGreaterThan(0);
});

test('no input, however wild, brings anything but finite samples, and each such block is counted', () => {
  const chain = chainOf(DESIGN);
  for (const wild of [Number.NaN, Number.POSITIVE_INFINITY, 1e38, -9e3]) {
    const input = tone(512).fill(wild, 100, 110);
    const output = run(chain, input, 128);
    expect(output.every(Number.isFinite)).toBe(true);
  }
  expect(chain.readings.faults).toBe(3);
  const calm = run(chain, tone(RATE), 128).subarray(RATE / 2);
  expect(Math.max(...calm)).toBeGreaterThan(0.01);
  expect(Math.max(...calm)).toBeLessThan(0.5);
});

test('missing inputs are silence; two channels keep their own state', () => {
  const chain = createChain(compileChain(DESIGN, 0, RATE, 2, 'lowLatency'));
  const outputs = [new Float32Array(4800), new Float32Array(4800)];
  processChain(chain, [tone(4800), new Float32Array(4800)], outputs);
  expect(Math.max(...outputs[0])).toBeGreaterThan(0.01);
  expect(Math.max(...outputs[1].map(Math.abs))).toBeLessThan(Math.max(...outputs[0]) / 10);
  processChain(chain, [], outputs);
  expect(outputs[0].every(Number.isFinite)).toBe(true);
});

/** Garbage collections while `work` runs, by the engine's own account. */
async function collections(work: () => void): Promise<number> {
  let count = 0;
  const observer = new PerformanceObserver((list) => {
    count += list.getEntries().length;
  });
  observer.observe({ entryTypes: ['gc'] });
  await new Promise((resolve) => setTimeout(resolve, 20));
  count = 0;
  work();
  await new Promise((resolve) => setTimeout(resolve, 20));
  observer.disconnect();
  return count;
}

/** Runs until the engine has compiled what it runs: a stretch without a collection, or a minute's worth of stretches. */
async function warm(work: () => void): Promise<void> {
  for (let stretch = 0; stretch < 60; stretch++) if ((await collections(work)) === 0) return;
}

const COMPRESSOR: Control = {
  source: 'envelope',
  senses: 'output',
  rectifier: 'full',
  attackOhm: 4700,
  releaseOhm: 220000,
  timingF: 1e-6,
  thresholdV: 0.02,
  gainVPerV: 8,
  restV: -1.6,
  limitV: -0.3,
  linked: true,
};

test.each([
  ['a tremolo of the square law', { law: 'square' }, TREMOLO],
  ['a compressor of the gradual law', { law: 'gradual' }, COMPRESSOR],
  ['a tremolo of the smooth law', { law: 'smooth' }, { ...TREMOLO, shape: 'rising' }],
] as const)(
  '200 000 blocks of %s, values moving and junctions conducting among them, make no garbage',
  async (_, device, control) => {
    const design = { ...designOf(variantOf(REAL_CELL, { ...REAL_DEVICE, ...device }, control)), oversampling: 1 as const };
    const chain = chainOf(design);
    const input = [tone(128, 440, 3)];
    const output = [new Float32Array(128)];
    const numbers = compileChain(design, 0, RATE, 1, 'lowLatency');
    const run = (blocks: number) => () => {
      for (let block = 0; block < blocks; block++) processChain(chain, input, output);
    };
    warmChain(chain);
    moveChain(chain, numbers);
    await warm(run(4000));
    moveChain(chain, numbers);
    await warm(run(4000));
    moveChain(chain, numbers);
    expect(await collections(run(200000))).toBe(0);
  },
  240000,
);

test('the observer sees a collection where there is one', async () => {
  const kept: number[][] = [];
  const wasteful = () => {
    for (let n = 0; n < 200000; n++) kept[n % 10] = Array.from({ length: 128 }, (_, i) => i + 0.5);
  };
  expect(await collections(wasteful)).toBeGreaterThan(0);
});
