/** How late a chain is. */
import type { ChainNumbers } from './compile.ts';
import { oversamplingDelay } from './oversample.ts';

/** The cell's kinks, then those of a real amplifier. */
export function timesSoftened({ idealAmplifier }: ChainNumbers): number {
  return idealAmplifier ? 1 : 2;
}

/** In samples of the lower rate. */
export function latencyOf(numbers: ChainNumbers): number {
  return oversamplingDelay(numbers.oversampling, numbers.filters, timesSoftened(numbers));
}
