/** Up to the rate at which the cell is solved, and back: half-band stages in a row, the signal as Float64 from edge to edge. */
import { clearHalf, createHalf, doubleRate, type FilterSet, type Half, halveRate, roundTripSamples } from './halfband.ts';
import { KINK_DELAY } from './kinks.ts';

export interface Oversampler {
  readonly factor: number;
  readonly up: readonly Half[];
  readonly down: readonly Half[];
  /** Signal at each rate, lowest first. */
  readonly buffers: readonly Float64Array[];
  /** Delay line at the upper rate that makes the whole delay a whole number of samples (linear phase only). */
  readonly delay: Float64Array;
  readonly leaving: Float64Array;
}

/** Upper-rate samples of extra delay that make the linear-phase round trip a whole number of lower-rate samples. */
function paddingSamples(factor: number, filters: FilterSet, softened: number): number {
  if (filters === 'lowLatency') return 0;
  const upper = Math.round(filterDelay(factor, filters, softened) * factor);
  return (factor - (upper % factor)) % factor;
}

/** Of the filters, and of what softens kinks at the upper rate. */
function filterDelay(factor: number, filters: FilterSet, softened: number): number {
  let sum = factor > 1 ? (softened * KINK_DELAY) / factor : 0;
  for (let stage = 0, rate = 1; rate < factor; stage++, rate *= 2) sum += roundTripSamples(filters, stage) / rate;
  return sum;
}

/**
 * Delay of the way up and down, in samples of the lower rate: whole for linear phase, that of low frequencies for low latency. Kinks are softened
 * `softened` times between the two.
 */
export function oversamplingDelay(factor: number, filters: FilterSet, softened = 1): number {
  return filterDelay(factor, filters, softened) + paddingSamples(factor, filters, softened) / factor;
}

/** For runs of up to `longest` samples at the lower rate. */
export function createOversampler(factor: number, filters: FilterSet, longest: number, softened = 1): Oversampler {
  const stages: number[] = [];
  const buffers = [new Float64Array(longest)];
  for (let rate = 2; rate <= factor; rate *= 2) {
    stages.push(stages.length);
    buffers.push(new Float64Array(longest * rate));
  }
  return {
    factor,
    up: stages.map((stage) => createHalf(filters, stage)),
    down: stages.map((stage) => createHalf(filters, stage)),
    buffers,
    delay: new Float64Array(paddingSamples(factor, filters, softened)),
    leaving: new Float64Array(paddingSamples(factor, filters, softened)),
  };
}

/** Forgets every sample. */
export function clearOversampler({ up, down, buffers, delay }: Oversampler): void {
  for (let stage = 0; stage < up.length; stage++) {
    clearHalf(up[stage]);
    clearHalf(down[stage]);
  }
  for (let rate = 0; rate < buffers.length; rate++) buffers[rate].fill(0);
  delay.fill(0);
}

/** Raises `count` samples in the first buffer to the last, which it returns. */
export function raise(oversampler: Oversampler, count: number): Float64Array {
  const { up, buffers } = oversampler;
  for (let stage = 0; stage < up.length; stage++) doubleRate(up[stage], buffers[stage], buffers[stage + 1], count * (1 << stage));
  return buffers[buffers.length - 1];
}

/** Lowers the last buffer to `count` samples in the first, which it returns. */
export function lower(oversampler: Oversampler, count: number): Float64Array {
  const { down, buffers, delay, leaving } = oversampler;
  const top = buffers[buffers.length - 1];
  if (delay.length > 0) delayBy(delay, leaving, top, count * oversampler.factor);
  for (let stage = down.length - 1; stage >= 0; stage--) halveRate(down[stage], buffers[stage + 1], buffers[stage], count * (1 << stage));
  return buffers[0];
}

/** Delays `signal` in place by `delay.length` samples; `count` is a multiple of the oversampling factor, so never shorter than the delay. */
function delayBy(delay: Float64Array, leaving: Float64Array, signal: Float64Array, count: number): void {
  const length = delay.length;
  for (let i = 0; i < length; i++) leaving[i] = signal[count - length + i];
  signal.copyWithin(length, 0, count - length);
  for (let i = 0; i < length; i++) {
    signal[i] = delay[i];
    delay[i] = leaving[i];
  }
}
