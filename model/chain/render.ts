/** A whole clip through a chain with linear-phase filters, its delay removed: the same bits in a browser, a worker and Node. */
import type { Design } from '../design/types.ts';
import { createChain, processChain } from './chain.ts';
import { compileChain } from './compile.ts';

const FRAMES_AT_A_TIME = 4096;

/**
 * Renders one or two channels at `sampleRateHz`; each output is as long as its input. `onProgress` is told a fraction now and then.
 * Throws a RangeError naming what cannot be rendered.
 */
export function renderClip(
  design: Design,
  variantIndex: number,
  channels: readonly Float32Array[],
  sampleRateHz: number,
  onProgress?: (fraction: number) => void,
): Float32Array[] {
  const chain = createChain(compileChain(design, variantIndex, sampleRateHz, channels.length, 'linearPhase'));
  const delay = chain.latencySamples;
  const length = channels[0].length;
  const result = channels.map(() => new Float32Array(length));
  const input = channels.map(() => new Float32Array(FRAMES_AT_A_TIME));
  const output = channels.map(() => new Float32Array(FRAMES_AT_A_TIME));
  for (let start = 0; start < length + delay; start += FRAMES_AT_A_TIME) {
    channels.forEach((samples, channel) => {
      input[channel].fill(0);
      input[channel].set(samples.subarray(start, Math.min(length, start + FRAMES_AT_A_TIME)));
    });
    processChain(chain, input, output);
    output.forEach((samples, channel) => {
      const skipped = Math.max(0, delay - start);
      const target = start + skipped - delay;
      if (skipped < FRAMES_AT_A_TIME && target < length) {
        result[channel].set(samples.subarray(skipped, Math.min(FRAMES_AT_A_TIME, skipped + length - target)), target);
      }
    });
    onProgress?.(Math.min(1, (start + FRAMES_AT_A_TIME) / (length + delay)));
  }
  return result;
}
