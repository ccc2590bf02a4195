import { describe, expect, test } from 'vitest';
import type { Clip } from '../../../web/audio/clip.ts';
import { loopOf } from '../../../web/audio/loop.ts';
import { createNoise } from '../../support/noise.ts';

const RATE_HZ = 48000;
const clipOf = (...channels: Float32Array<ArrayBuffer>[]): Clip => ({ title: 'clip', sampleRateHz: RATE_HZ, channels });
const sine = (hz: number, frames: number, phase = 0) =>
  Float32Array.from({ length: frames }, (_, n) => Math.sin((2 * Math.PI * hz * n) / RATE_HZ + phase));

/** The greatest step of a line that goes round, over the seam included. */
function greatestStep(line: Float32Array): number {
  return line.reduce((most, x, n) => Math.max(most, Math.abs(x - line[(n + line.length - 1) % line.length])), 0);
}

describe('a loop', () => {
  test('of a sine cut anywhere steps over its seam no more than a crossfade of two sines can', () => {
    // Between two samples each sine moves by at most 2π·hz/rate, and 10 ms of raised cosine by (π/2)/480 of the difference, at most 2.
    const most = (2 * Math.PI * 440) / RATE_HZ + Math.PI / 480;
    for (const toSec of [0.3, 0.3004, 0.3011, 0.37123]) {
      const [line] = loopOf(clipOf(sine(440, RATE_HZ, 0.4)), { fromSec: 0.1, toSec }).channels;
      expect(line).toHaveLength(Math.round(toSec * RATE_HZ) - 4800);
      expect(greatestStep(line)).toBeLessThan(most);
    }
    // Left alone it would click.
    expect(greatestStep(sine(440, RATE_HZ, 0.4).slice(4800, 14451))).toBeGreaterThan(2 * most);
  });

  test('ends on the sample before its beginning, so that the clip goes on over the seam', () => {
    const samples = sine(440, RATE_HZ, 0.4);
    const [line] = loopOf(clipOf(samples), { fromSec: 0.1, toSec: 0.3011 }).channels;
    expect(line[line.length - 1]).toBe(samples[4799]);
    expect(line[0]).toBe(samples[4800]);
    expect(line.subarray(0, line.length - 480)).toEqual(samples.subarray(4800, 4800 + line.length - 480));
  });

  test('that begins with the clip fades to silence and from it', () => {
    const [line] = loopOf(clipOf(new Float32Array(RATE_HZ).map((_, n) => (n < 24000 ? 1 : -1))), null).channels;
    expect(line[0]).toBe(0);
    expect(line[RATE_HZ - 1]).toBeCloseTo(0, 12);
    // Half a raised cosine over 480 frames is steepest in its middle: (π/2)/480 a frame. In the middle of the clip it steps by 2, as it did.
    const seam = line.map((x, n) => (n < 600 || n >= RATE_HZ - 600 ? x : 0)).filter((x) => x !== 0);
    expect(Math.max(...seam.slice(1).map((x, n) => (Math.sign(x) === Math.sign(seam[n]) ? Math.abs(x - seam[n]) : 0)))).toBeLessThan(
      0.0033,
    );
  });

  test('that joins by itself is left to the bit: whole cycles, noise, silence', () => {
    for (const samples of [sine(440, RATE_HZ), createNoise(3, RATE_HZ, 0.5), new Float32Array(RATE_HZ)]) {
      const clip = clipOf(samples);
      expect(loopOf(clip, null)).toBe(clip);
    }
  });

  test('fades both channels where one of them clicks, and keeps them apart', () => {
    const [left, right] = [sine(440, RATE_HZ, 0.4), sine(100, RATE_HZ)];
    const loop = loopOf(clipOf(left, right), { fromSec: 0.5, toSec: 0.7 });
    expect(loop.channels[0][9599]).toBe(left[23999]);
    expect(loop.channels[1][9599]).toBe(right[23999]);
  });

  test('of two frames is two frames', () => {
    expect(loopOf(clipOf(Float32Array.of(1, -1)), null).channels[0]).toHaveLength(2);
  });
});
