import { expect, test } from 'vitest';
import { createDelay, processDelay, setDelay } from '../../worklet/delay.ts';
import { createNoise } from '../support/noise.ts';

test.each([0, 1, 63, 128, 500])('delays every channel by %i samples in blocks of any size', (delaySamples) => {
  const inputs = [createNoise(1, 4096, 1), createNoise(2, 4096, 1)];
  for (const size of [1, 64, 128, 1024]) {
    const delay = createDelay(2, delaySamples, 48000);
    const outputs = inputs.map(() => new Float32Array(4096));
    for (let at = 0; at < 4096; at += size) {
      const block = (line: Float32Array) => line.subarray(at, at + size);
      processDelay(delay, inputs.map(block), outputs.map(block));
    }
    const expected = inputs.map((line) => Float32Array.from(line, (_, n) => (n < delaySamples ? 0 : line[n - delaySamples])));
    expect(outputs).toEqual(expected);
  }
});

test('goes to another delay in 30 ms without a step, also in place', () => {
  const delay = createDelay(1, 0, 48000);
  const ramp = Float32Array.from({ length: 8192 }, (_, n) => n / 8192);
  const out = ramp.slice();
  for (let at = 0; at < 8192; at += 128) {
    if (at === 1024) setDelay(delay, 48);
    if (at === 1152) setDelay(delay, 10);
    const block = out.subarray(at, at + 128);
    processDelay(delay, [block], [block]);
  }
  // The ramp's own 1/8192, and 48 of them spread over 1440 samples.
  for (let n = 1; n < out.length; n++) expect(Math.abs(out[n] - out[n - 1])).toBeLessThan((1 + 48 / 1440 + 1e-3) / 8192);
  expect(out.subarray(4096)).toEqual(ramp.subarray(4096 - 10, 8192 - 10));
});

test('refuses a delay that it cannot hold', () => {
  for (const bad of [-1, 2048, Number.NaN]) expect(() => createDelay(1, bad, 48000)).toThrow(`The delay is ${bad} samples`);
});
