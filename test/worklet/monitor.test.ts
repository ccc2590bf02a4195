import { describe, expect, test } from 'vitest';
import {
  CEILING_FRAMES,
  createMonitor,
  HEARD_PEAK,
  HEARD_SQUARES,
  type Monitor,
  processMonitor,
  setCeiling,
  setGain,
  setMuted,
} from '../../worklet/monitor.ts';
import { createNoise } from '../support/noise.ts';

const RATE = 48000;

/** Runs whole blocks of 128 through the monitor, one channel; returns what left. */
function run(monitor: Monitor, heard: Float32Array): Float32Array {
  const out = heard.slice();
  for (let at = 0; at < out.length; at += 128) processMonitor(monitor, [out.subarray(at, at + 128)]);
  return out;
}

const peakOf = (samples: Float32Array) => samples.reduce((peak, x) => Math.max(peak, Math.abs(x)), 0);
const largestStep = (samples: Float32Array) => samples.reduce((most, x, n) => Math.max(most, n > 0 ? Math.abs(x - samples[n - 1]) : 0), 0);

describe('the monitor', () => {
  test('at rest passes what it hears bit for bit, and counts its squares', () => {
    const noise = createNoise(1, 12800, 0.9);
    const monitor = createMonitor(1, 1, false, RATE);
    expect(run(monitor, noise)).toEqual(noise);
    const squares = noise.reduce((sum, x) => sum + x * x, 0);
    expect(monitor.totals[HEARD_SQUARES] / squares).toBeCloseTo(1, 12);
  });

  test('is silent to the last bit while muted, and unmutes over a tenth of a second without a step', () => {
    const monitor = createMonitor(1, 1, true, RATE);
    const ones = new Float32Array(9600).fill(1);
    expect(peakOf(run(monitor, ones))).toBe(0);
    setMuted(monitor, false);
    const rising = run(monitor, ones);
    expect(rising[0]).toBeLessThan(1e-3);
    expect(rising[2400]).toBeCloseTo(0.5, 2);
    expect(rising[4805]).toBe(1);
    // 1/4800 for each sample of the tenth of a second, and one Float32 rounding.
    expect(largestStep(rising)).toBeLessThan(1 / 4800 + 1e-7);
    setMuted(monitor, true);
    const falling = run(monitor, ones);
    expect(largestStep(falling)).toBeLessThan(1 / 1440 + 1e-7);
    expect(falling.at(-1)).toBe(0);
  });

  test('no sample ever leaves above the ceiling, whatever comes and however the values move', () => {
    for (const [seed, ceiling, gain] of [
      [11, 1, 1],
      [12, 0.5011872336272722, 1],
      [13, 0.01, 1],
      [14, 0.01, 0.251],
      [15, 0.7, 0.3],
    ]) {
      const monitor = createMonitor(gain, ceiling, false, RATE);
      const loud = createNoise(seed, 128 * 300, 30);
      loud.fill(1e30, 1000, 1100);
      loud[2000] = -3.4e38;
      const out = run(monitor, loud);
      expect(peakOf(out)).toBeLessThanOrEqual(ceiling);
      // Not by silence: at a peak it reaches the ceiling but for one rounding.
      expect(peakOf(out)).toBeGreaterThan(ceiling * (1 - 1e-6));
      expect(monitor.totals[CEILING_FRAMES]).toBeGreaterThan(0);
      expect(monitor.totals[HEARD_PEAK]).toBeLessThanOrEqual(ceiling * (1 + 1e-12));
    }
  });

  test('after a peak the gain comes back with a time constant of 0.2 s, and in the end is exactly one', () => {
    const monitor = createMonitor(1, 0.5, false, RATE);
    const line = new Float32Array(128 * 3000).fill(0.1);
    line[0] = 1;
    const out = run(monitor, line);
    expect(out[0]).toBe(0.5);
    // After one time constant e⁻¹ of the missing half is still missing.
    expect(out[0.2 * RATE] / 0.1).toBeCloseTo(1 - 0.5 * Math.exp(-1), 3);
    expect(out.at(-1)).toBe(Math.fround(0.1));
    expect(monitor.totals[CEILING_FRAMES]).toBe(1);
  });

  test('the ceiling turns all channels down alike, so the image does not move', () => {
    const monitor = createMonitor(1, 0.5, false, RATE);
    const left = new Float32Array(128).fill(1);
    const right = new Float32Array(128).fill(0.25);
    processMonitor(monitor, [left, right]);
    for (let n = 0; n < 128; n++) expect(right[n] / left[n]).toBeCloseTo(0.25, 6);
  });

  test('refuses values without meaning, naming them, and keeps the last good ones', () => {
    const monitor = createMonitor(1, 1, false, RATE);
    for (const bad of [Number.NaN, -0.1, 1.01]) expect(() => setGain(monitor, bad)).toThrow(`The listening gain is ${bad}`);
    for (const bad of [Number.NaN, 0, 2]) expect(() => setCeiling(monitor, bad)).toThrow(`The ceiling is ${bad}`);
    const noise = createNoise(6, 1280, 0.9);
    expect(run(monitor, noise)).toEqual(noise);
  });
});
