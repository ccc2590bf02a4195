import { describe, expect, test } from 'vitest';
import { choose, createMix, type Mix, processMix, setGains } from '../../worklet/mix.ts';
import { createNoise } from '../support/noise.ts';

const RATE = 48000;

/** Runs whole blocks of 128 of one channel; `before` is called at each block. */
function run(mix: Mix, sources: Float32Array[], before: (block: number) => void = () => {}, wait = false): Float32Array {
  const out = new Float32Array(sources[0].length);
  for (let at = 0; at < out.length; at += 128) {
    before(at / 128);
    processMix(
      mix,
      sources.map((line) => [line.subarray(at, at + 128)]),
      [out.subarray(at, at + 128)],
      wait,
    );
  }
  return out;
}

const constant = (x: number, blocks = 10) => new Float32Array(128 * blocks).fill(x);
const largestStep = (samples: Float32Array) => samples.reduce((most, x, n) => Math.max(most, n > 0 ? Math.abs(x - samples[n - 1]) : 0), 0);

describe('the mix', () => {
  test('at rest passes the chosen source bit for bit', () => {
    const sources = [1, 2, 3].map((seed) => createNoise(seed, 12800, 0.9));
    for (const chosen of [0, 1, 2]) expect(run(createMix(3, chosen, RATE), sources)).toEqual(sources[chosen]);
  });

  test('crosses in 10 ms with weights that add up to one, even when another is chosen half-way', () => {
    const mix = createMix(4, 0, RATE);
    const random = createNoise(5, 100, 1);
    const alike = [0, 1, 2, 3].map(() => constant(0.5, 100));
    for (const x of run(mix, alike, (block) => choose(mix, Math.floor(2 + 2 * random[block]) % 4))) expect(x).toBeCloseTo(0.5, 6);
    const two = createMix(2, 0, RATE);
    choose(two, 1);
    const out = run(two, [constant(0), constant(1)]);
    expect(out[239]).toBeCloseTo(0.5, 6);
    expect(out[479]).toBe(1);
    expect(out[478]).toBeLessThan(1);
  });

  test('no step is larger than the fade’s own slope', () => {
    const mix = createMix(3, 0, RATE);
    const out = run(mix, [constant(-1, 300), constant(1, 300), constant(0, 300)], (block) => choose(mix, block % 3));
    // From −1 to 1 within 480 samples, and one Float32 rounding of each of two values.
    expect(largestStep(out)).toBeLessThan(2 / 480 + 2e-7);
  });

  test('waits with a fade until it may begin', () => {
    const mix = createMix(2, 0, RATE);
    choose(mix, 1);
    expect(run(mix, [constant(0.25), constant(1)], undefined, true)).toEqual(constant(0.25));
    expect(run(mix, [constant(0.25), constant(1)]).at(-1)).toBe(1);
  });

  test('gains move in 30 ms without a step and are then exact', () => {
    const mix = createMix(2, 0, RATE);
    setGains(mix, [0.5, 2]);
    const out = run(mix, [constant(1, 20), constant(1, 20)]);
    expect(largestStep(out)).toBeLessThan(1 / 1440 + 1e-7);
    expect(out.at(-1)).toBe(0.5);
  });

  test('what is no finite number is silence and counted, and a source of no weight is not read', () => {
    const mix = createMix(2, 0, RATE);
    const line = createNoise(5, 256, 0.5);
    const expected = line.slice();
    for (const [n, x] of [
      [7, Number.NaN],
      [100, Number.POSITIVE_INFINITY],
      [200, Number.NEGATIVE_INFINITY],
    ]) {
      line[n] = x;
      expected[n] = 0;
    }
    expect(run(mix, [line, constant(Number.NaN, 2)])).toEqual(expected);
    expect(mix.broken).toBe(3);
    setGains(mix, [100, 1]);
    expect(run(mix, [constant(3e38, 20), constant(0, 20)]).at(-1)).toBe(0);
  });

  test('refuses gains that are none and keeps the last good ones', () => {
    const mix = createMix(2, 0, RATE);
    for (const bad of [Number.NaN, -1, 10001]) expect(() => setGains(mix, [1, bad])).toThrow(`A gain is ${bad}`);
    expect(() => setGains(mix, [1])).toThrow('There are 1 gains; expected 2');
    expect(run(mix, [constant(0.5), constant(0)])).toEqual(constant(0.5));
  });
});
