import { ebur128_integrated_mono, ebur128_integrated_stereo } from 'ebur128-wasm/ebur128_wasm.js';
import { describe, expect, test } from 'vitest';
import {
  addLoudness,
  createLoudness,
  integratedLufs,
  kWeighting,
  loudnessOf,
  matchingGainDb,
  momentaryLufs,
  resetLoudness,
} from '../../../model/measure/loudness.ts';
import { createNoise } from '../../support/noise.ts';

const RATES = [44100, 48000, 96000];

/** Level in dBFS peak and seconds of each stretch, one tone through all of them. */
type Stretch = readonly [levelDb: number, sec: number];

function tone(stretches: readonly Stretch[], rateHz: number, toneHz = 1000): Float32Array {
  const lengths = stretches.map(([, sec]) => Math.round(sec * rateHz));
  const samples = new Float32Array(lengths.reduce((sum, length) => sum + length, 0));
  let at = 0;
  stretches.forEach(([levelDb], index) => {
    for (const end = at + lengths[index]; at < end; at++) {
      samples[at] = 10 ** (levelDb / 20) * Math.sin((2 * Math.PI * toneHz * at) / rateHz);
    }
  });
  return samples;
}

test('at 48 kHz the sections are those of ITU-R BS.1770-4, tables 1 and 2', () => {
  const standard = [
    [1.53512485958697, -2.69169618940638, 1.19839281085285, -1.69065929318241, 0.73248077421585],
    [1, -2, 1, -1.99004745483398, 0.99007225036621],
  ];
  kWeighting(48000).forEach((value, i) => {
    expect(Math.abs(value - standard.flat()[i])).toBeLessThan(1e-14);
  });
});

/** Squared gain of both sections at a frequency. */
function gainDb(rateHz: number, hz: number): number {
  const c = kWeighting(rateHz);
  const w = (2 * Math.PI * hz) / rateHz;
  const square = (p: number, q: number, r: number) =>
    (p + q * Math.cos(w) + r * Math.cos(2 * w)) ** 2 + (q * Math.sin(w) + r * Math.sin(2 * w)) ** 2;
  const section = (at: number) => square(c[at], c[at + 1], c[at + 2]) / square(1, c[at + 3], c[at + 4]);
  return 10 * Math.log10(section(0) * section(5));
}

// What is left is what the bilinear transform bends away from the poles' own frequencies.
test.each([
  [44100, 0.0015],
  [88200, 0.005],
  [96000, 0.005],
  [192000, 0.006],
])('at %s Hz the weighting is that of 48 kHz within %s dB from 20 Hz to 10 kHz', (rateHz, bound) => {
  for (const hz of [20, 38, 100, 400, 997, 1700, 4000, 7000, 10000]) {
    expect(Math.abs(gainDb(rateHz, hz) - gainDb(48000, hz)), `${hz} Hz`).toBeLessThan(bound);
  }
});

test.each(RATES)('997 Hz at full scale in one channel reads −3.01 LUFS within 0.01 at %s Hz (BS.1770-4)', (rateHz) => {
  expect(Math.abs(loudnessOf([tone([[0, 20]], rateHz, 997)], rateHz) + 3.01)).toBeLessThan(0.01);
});

// EBU Tech 3341, cases 1 to 5: 1 kHz in both channels; the lengths of the segments from memory.
const CASES: readonly { readonly stretches: readonly Stretch[]; readonly lufs: number }[] = [
  { stretches: [[-23, 20]], lufs: -23 },
  { stretches: [[-33, 20]], lufs: -33 },
  {
    stretches: [
      [-36, 10],
      [-23, 60],
      [-36, 10],
    ],
    lufs: -23,
  },
  {
    stretches: [
      [-72, 10],
      [-36, 10],
      [-23, 60],
      [-36, 10],
      [-72, 10],
    ],
    lufs: -23,
  },
  {
    stretches: [
      [-26, 20],
      [-20, 20.1],
      [-26, 20],
    ],
    lufs: -23,
  },
];

describe.each(RATES)('at %s Hz', (rateHz) => {
  test.each(CASES.map((each, index) => ({ ...each, index: index + 1 })))(
    'EBU Tech 3341 case $index reads $lufs LUFS within 0.1 LU',
    (each) => {
      const samples = tone(each.stretches, rateHz);
      expect(Math.abs(loudnessOf([samples, samples], rateHz) - each.lufs)).toBeLessThan(0.1);
    },
  );
});

/** Noise that swells and fades below both gates, and is brighter in one channel. */
function programme(rateHz: number, seed: number): Float32Array {
  const noise = createNoise(seed, rateHz * 12, 0.5);
  let low = 0;
  return Float32Array.from(noise, (value, n) => {
    low += 0.1 * (value - low);
    const swell = 10 ** ((-20 + 25 * Math.sin((2 * Math.PI * n) / (rateHz * 5.3))) / 20);
    return (seed % 2 === 0 ? low : 0.4 * value) * (n < rateHz * 2 ? 1e-5 : swell);
  });
}

// An independent implementation. It keeps the high-pass's numerator 1 −2 1 at every rate, which costs it 0.022 dB from 48 to 96 kHz.
test.each([
  [44100, 0.02],
  [48000, 0.005],
  [96000, 0.03],
])('noise that crosses both gates reads as ebur128 3.0.0 does, at %s Hz within %s LU, mono and stereo', (rateHz, bound) => {
  const left = programme(rateHz, 1);
  const right = programme(rateHz, 2);
  const oracle = ebur128_integrated_stereo(rateHz, left, right);
  expect(oracle).toBeGreaterThan(-60);
  expect(Math.abs(loudnessOf([left, right], rateHz) - oracle)).toBeLessThan(bound);
  expect(Math.abs(loudnessOf([left], rateHz) - ebur128_integrated_mono(rateHz, left))).toBeLessThan(bound);
});

test.each([44100, 11025, 48000])('cutting the sound into calls of any size changes no bit, at %s Hz', (rateHz) => {
  const left = programme(rateHz, 3);
  const right = programme(rateHz, 4);
  const whole = createLoudness(rateHz, 2);
  addLoudness(whole, [left, right]);
  const pieces = createLoudness(rateHz, 2);
  for (let at = 0, size = 1; at < left.length; at += size, size = (size * 7) % 6151) {
    addLoudness(pieces, [left.subarray(at, at + size), right.subarray(at, at + size)]);
  }
  expect(pieces).toEqual(whole);
  expect(integratedLufs(pieces)).toBe(integratedLufs(whole));
});

test('momentary loudness is of the last 400 ms, without a gate, and integrated loudness forgets nothing until it is told to', () => {
  const loudness = createLoudness(48000, 1);
  expect(momentaryLufs(loudness)).toBe(Number.NEGATIVE_INFINITY);
  expect(integratedLufs(loudness)).toBe(Number.NEGATIVE_INFINITY);
  addLoudness(loudness, [tone([[-20, 2]], 48000, 997)]);
  addLoudness(loudness, [tone([[-90, 0.5]], 48000, 997)]);
  expect(momentaryLufs(loudness)).toBeCloseTo(-93, 0);
  addLoudness(loudness, [new Float32Array(48000)]);
  expect(momentaryLufs(loudness)).toBeLessThan(-130);
  expect(integratedLufs(loudness)).toBeGreaterThan(-25);
  resetLoudness(loudness);
  expect(loudness).toEqual(createLoudness(48000, 1));
});

test('silence has no loudness, and needs no gain; otherwise the gain makes both equally loud', () => {
  const loud = programme(48000, 5);
  const quiet = loud.map((value) => value * 0.3);
  const gainDb = matchingGainDb(loudnessOf([loud], 48000), loudnessOf([quiet], 48000));
  const matched = quiet.map((value) => value * 10 ** (gainDb / 20));
  expect(Math.abs(loudnessOf([matched], 48000) - loudnessOf([loud], 48000))).toBeLessThan(0.05);
  expect(loudnessOf([new Float32Array(48000)], 48000)).toBe(Number.NEGATIVE_INFINITY);
  expect(matchingGainDb(-20, Number.NEGATIVE_INFINITY)).toBe(0);
});

test('rates and channels that it cannot do are refused by a sentence', () => {
  expect(() => createLoudness(0, 1)).toThrow('the sample rate is 0 Hz; expected at least 8000 Hz');
  expect(() => createLoudness(48000, 3)).toThrow('the audio has 3 channels; expected 1 or 2');
});
