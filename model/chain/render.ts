/** A whole clip through a chain with linear-phase filters, its delay removed: the same bits in a browser, a worker and Node. */
import type { Design } from '../design/types.ts';
import { createChain, processChain, setResidual } from './chain.ts';
import { compileChain } from './compile.ts';
import { type ResidualPart, withNoise } from './residual.ts';

const FRAMES_AT_A_TIME = 4096;

export interface RenderOptions {
  /** Is told a fraction now and then. */
  readonly onProgress?: ((fraction: number) => void) | undefined;
  /** The control of a design whose control is external, as long as the clip. */
  readonly recorded?: Float32Array | undefined;
  /** What the cell adds, in place of its output. Noise is there though the design has it switched off. */
  readonly residual?: ResidualPart | undefined;
}

/**
 * Renders one or two channels at `sampleRateHz`; each output is as long as its input. Throws a RangeError naming what cannot be rendered, and an Error
 * where a cell lost its state: such a render would be no answer.
 */
export function renderClip(
  design: Design,
  variantIndex: number,
  channels: readonly Float32Array[],
  sampleRateHz: number,
  { onProgress, recorded, residual }: RenderOptions = {},
): Float32Array[] {
  const rendered = residual === 'noise' ? withNoise(design) : design;
  const chain = createChain(compileChain(rendered, variantIndex, sampleRateHz, channels.length, 'linearPhase'));
  if (residual) setResidual(chain, residual);
  const delay = chain.latencySamples;
  const length = channels[0].length;
  const result = channels.map(() => new Float32Array(length));
  const input = channels.map(() => new Float32Array(FRAMES_AT_A_TIME));
  const output = channels.map(() => new Float32Array(FRAMES_AT_A_TIME));
  const beside = channels.map(() => new Float32Array(FRAMES_AT_A_TIME));
  const control = recorded ? new Float32Array(FRAMES_AT_A_TIME) : null;
  for (let start = 0; start < length + delay; start += FRAMES_AT_A_TIME) {
    channels.forEach((samples, channel) => {
      fill(input[channel], samples, start);
    });
    if (control && recorded) fill(control, recorded, start);
    processChain(chain, input, output, control, beside);
    if (chain.readings.faults > 0)
      throw new Error(`the cell lost its state after ${(start / sampleRateHz).toFixed(2)} s; the render was given up`);
    (residual ? beside : output).forEach((samples, channel) => {
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

/** The stretch of `samples` from `start` on, then silence. */
function fill(stretch: Float32Array, samples: Float32Array, start: number): void {
  stretch.fill(0);
  stretch.set(samples.subarray(start, Math.min(samples.length, start + stretch.length)));
}
