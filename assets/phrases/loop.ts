/**
 * A phrase is a loop: sample 0 follows the last one. What rings past the end is added at the start, and filters run
 * round until they have forgotten how they began, so the seam is like any other place.
 */
export const SAMPLE_RATE_HZ = 48_000;
export const LOOP_SEC = 8;
export const LOOP_SAMPLES = SAMPLE_RATE_HZ * LOOP_SEC;
/** Every phrase: four bars of four beats. */
export const BARS = 4;
export const BEATS_PER_BAR = 4;
export const BEAT_SEC = LOOP_SEC / (BARS * BEATS_PER_BAR);

export function createLoop(): Float64Array {
  return new Float64Array(LOOP_SAMPLES);
}

/** Adds a sound to the loop at a time in s (before 0 or past the end wraps round), scaled by gain. */
export function addAt(loop: Float64Array, sound: Float64Array, atSec: number, gain = 1): void {
  const start = Math.round(atSec * SAMPLE_RATE_HZ);
  for (let n = 0; n < sound.length; n++) loop[wrap(start + n)] += gain * sound[n];
}

export function wrap(index: number): number {
  return ((index % LOOP_SAMPLES) + LOOP_SAMPLES) % LOOP_SAMPLES;
}

/** Coefficients of a second-order section, a0 = 1. */
export interface Section {
  b0: number;
  b1: number;
  b2: number;
  a1: number;
  a2: number;
}

/** Second-order sections by the bilinear transform. Source: R. Bristow-Johnson, «Audio EQ Cookbook» (W3C Note). */
export function lowpass(cornerHz: number, q: number): Section {
  const { cos, alpha } = angle(cornerHz, q);
  return scaled(1 + alpha, (1 - cos) / 2, 1 - cos, (1 - cos) / 2, -2 * cos, 1 - alpha);
}

export function highpass(cornerHz: number, q: number): Section {
  const { cos, alpha } = angle(cornerHz, q);
  return scaled(1 + alpha, (1 + cos) / 2, -1 - cos, (1 + cos) / 2, -2 * cos, 1 - alpha);
}

/** Unity gain at the centre. */
export function bandpass(centreHz: number, q: number): Section {
  const { cos, alpha } = angle(centreHz, q);
  return scaled(1 + alpha, alpha, 0, -alpha, -2 * cos, 1 - alpha);
}

export function bell(centreHz: number, q: number, gainDb: number): Section {
  const { cos, alpha } = angle(centreHz, q);
  const root = 10 ** (gainDb / 40);
  return scaled(1 + alpha / root, 1 + alpha * root, -2 * cos, 1 - alpha * root, -2 * cos, 1 - alpha / root);
}

function angle(hz: number, q: number): { cos: number; alpha: number } {
  const w = (2 * Math.PI * hz) / SAMPLE_RATE_HZ;
  return { cos: Math.cos(w), alpha: Math.sin(w) / (2 * q) };
}

function scaled(a0: number, b0: number, b1: number, b2: number, a1: number, a2: number): Section {
  return { b0: b0 / a0, b1: b1 / a0, b2: b2 / a0, a1: a1 / a0, a2: a2 / a0 };
}

/** The signal through the sections, once, from rest. */
export function filter(signal: Float64Array, ...sections: Section[]): Float64Array {
  const output = Float64Array.from(signal);
  for (const section of sections) runSection(output, section, 1);
  return output;
}

/** The loop through the sections as if it had been going round for ever (two rounds, the second kept). */
export function filterLoop(loop: Float64Array, ...sections: Section[]): Float64Array {
  const output = Float64Array.from(loop);
  for (const section of sections) runSection(output, section, 2);
  return output;
}

function runSection(signal: Float64Array, { b0, b1, b2, a1, a2 }: Section, rounds: number): void {
  let s1 = 0;
  let s2 = 0;
  for (let round = 1; round <= rounds; round++) {
    for (let n = 0; n < signal.length; n++) {
      const x = signal[n];
      const y = b0 * x + s1;
      s1 = b1 * x - a1 * y + s2;
      s2 = b2 * x - a2 * y;
      if (round === rounds) signal[n] = y;
    }
  }
}

export function midiToHz(note: number): number {
  return 440 * 2 ** ((note - 69) / 12);
}
