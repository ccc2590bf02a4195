import { expect, test } from 'vitest';
import { createDelay, processDelay } from '../../worklet/delay.ts';
import { createNoise } from '../support/noise.ts';

test.each([0, 1, 63, 128, 500])('delays every channel by %i samples in blocks of any size', (delaySamples) => {
  const inputs = [createNoise(1, 4096, 1), createNoise(2, 4096, 1)];
  for (const size of [1, 64, 128, 1024]) {
    const delay = createDelay(2, delaySamples);
    const outputs = inputs.map(() => new Float32Array(4096));
    for (let at = 0; at < 4096; at += size) {
      const block = (line: Float32Array) => line.subarray(at, at + size);
      processDelay(delay, inputs.map(block));
      delay.lines.forEach((line, c) => {
        outputs[c].set(line, at);
      });
    }
    const expected = inputs.map((line) => Float32Array.from(line, (_, n) => (n < delaySamples ? 0 : line[n - delaySamples])));
    expect(outputs).toEqual(expected);
  }
});
