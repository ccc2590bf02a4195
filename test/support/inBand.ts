/**
 * How far a chain's output is from an exact waveform, in the audio band, with the chain's filters taken out: the exact waveform is that of the tone as
 * the filters raise it, and its harmonics are then as the filters lower them, in size and phase.
 */
import FFT from 'fft.js';
import type { FilterSet } from '../../model/chain/halfband.ts';
import { compileChain } from '../../model/chain/compile.ts';
import { KINK_DELAY } from '../../model/chain/kinks.ts';
import { createOversampler, lower, raise } from '../../model/chain/oversample.ts';
import { createVoice, LONGEST_BLOCK, processVoice } from '../../model/chain/voice.ts';
import type { Design } from '../../model/design/types.ts';

export const RATE_HZ = 48000;
/** Samples in the stretch that is analysed: tones are whole multiples of RATE_HZ / SIZE. */
export const SIZE = 4096;
const LEAD = 2048;
const BAND_HZ = 20000;
const IMPULSE = 2048;

export interface Complex {
  readonly re: number;
  readonly im: number;
}

/** One channel through the chain in Float64, its values V; `corrected` false leaves kinks as they are. */
export function renderTone(design: Design, bin: number, toneV: number, filters: FilterSet, corrected = true): Float64Array {
  const voice = createVoice(compileChain(design, 0, RATE_HZ, 1, filters));
  const used = corrected
    ? voice
    : { ...voice, lanes: voice.lanes.map((lane) => ({ ...lane, kinks: new Float64Array(0), amplifierKinks: new Float64Array(0) })) };
  const output = new Float64Array(LEAD + SIZE);
  const input = new Float64Array(LONGEST_BLOCK);
  const block = new Float64Array(LONGEST_BLOCK);
  for (let start = 0; start < output.length; start += LONGEST_BLOCK) {
    for (let i = 0; i < LONGEST_BLOCK; i++) input[i] = (toneV / design.fullScaleV) * Math.cos((2 * Math.PI * bin * (start + i)) / SIZE);
    processVoice(used, [input], input, [block], [], LONGEST_BLOCK);
    output.set(block, start);
  }
  return output.map((v) => v * design.fullScaleV);
}

/** Amplitudes of `period`, sample 0 at the cosine's crest, by harmonic. */
export function harmonicsOf(period: Float64Array): Complex[] {
  const fft = new FFT(period.length);
  const bins: number[] = fft.createComplexArray();
  fft.realTransform(bins, Array.from(period));
  const scale = 2 / period.length;
  return Array.from({ length: period.length / 2 }, (_, n) => ({ re: bins[2 * n] * scale, im: bins[2 * n + 1] * scale }));
}

export interface Filters {
  /** Of the way up alone, and of both ways with the delays between them. */
  readonly up: (hz: number) => Complex;
  readonly both: (hz: number) => Complex;
}

/** Measured from their impulse responses; between the two ways kinks are softened once, or twice where a real amplifier follows. */
export function filtersOf(factor: number, filters: FilterSet, softened = 1): Filters {
  const oversampler = createOversampler(factor, filters, LONGEST_BLOCK, softened);
  const up: number[] = [];
  const both: number[] = [];
  for (let start = 0; start < IMPULSE; start += LONGEST_BLOCK) {
    oversampler.buffers[0].fill(0);
    if (start === 0) oversampler.buffers[0][0] = 1;
    up.push(...raise(oversampler, LONGEST_BLOCK));
    both.push(...lower(oversampler, LONGEST_BLOCK));
  }
  const late = (hz: number): Complex => turned({ re: 1, im: 0 }, (-softened * KINK_DELAY * hz) / (RATE_HZ * factor));
  return {
    up: (hz) => responseOf(up, hz / (RATE_HZ * factor), 1 / factor),
    both: (hz) => times(responseOf(both, hz / RATE_HZ, 1), late(hz)),
  };
}

function responseOf(impulse: readonly number[], turns: number, scale: number): Complex {
  let re = 0;
  let im = 0;
  impulse.forEach((value, n) => {
    re += scale * value * Math.cos(2 * Math.PI * turns * n);
    im -= scale * value * Math.sin(2 * Math.PI * turns * n);
  });
  return { re, im };
}

export function sizeOf({ re, im }: Complex): number {
  return Math.hypot(re, im);
}

function times(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

function over(a: Complex, b: Complex): Complex {
  const square = b.re * b.re + b.im * b.im;
  return times(a, { re: b.re / square, im: -b.im / square });
}

function turned(a: Complex, turns: number): Complex {
  return times(a, { re: Math.cos(2 * Math.PI * turns), im: Math.sin(2 * Math.PI * turns) });
}

/**
 * Of the end of `output` against exact `harmonics` of the tone at `bin`: root of the sum of squares of every component above 0 Hz up to 20 kHz that should
 * not be there or differs, and the largest that is no harmonic, both dB re the exact fundamental at the output.
 */
export function inBandError(
  output: Float64Array,
  bin: number,
  harmonics: readonly Complex[],
  filters: Filters,
): { errorDb: number; foldedDb: number } {
  const start = output.length - SIZE;
  const found = harmonicsOf(output.subarray(start));
  const toneHz = (bin * RATE_HZ) / SIZE;
  const raised = filters.up(toneHz);
  const phase = Math.atan2(raised.im, raised.re) / (2 * Math.PI) + (bin * start) / SIZE;
  let sum = 0;
  let folded = 0;
  let fundamental = 0;
  for (let k = 1; k <= (BAND_HZ * SIZE) / RATE_HZ; k++) {
    const n = k / bin;
    const isHarmonic = Number.isInteger(n);
    const down = isHarmonic ? over(filters.both(n * toneHz), filters.up(n * toneHz)) : { re: 0, im: 0 };
    const exact = isHarmonic ? times(turned(harmonics[n], n * phase), down) : down;
    if (n === 1) fundamental = sizeOf(exact);
    const error = sizeOf({ re: found[k].re - exact.re, im: found[k].im - exact.im });
    sum += error * error;
    if (!isHarmonic) folded = Math.max(folded, error);
  }
  return { errorDb: 20 * Math.log10(Math.sqrt(sum) / fundamental), foldedDb: 20 * Math.log10(folded / fundamental) };
}
