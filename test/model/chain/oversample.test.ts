import { expect, test } from 'vitest';
import { createKinks } from '../../../model/cell/kernels/kinks.ts';
import type { FilterSet } from '../../../model/chain/halfband.ts';
import { createSoftener, soften } from '../../../model/chain/kinks.ts';
import { createOversampler, lower, oversamplingDelay, raise } from '../../../model/chain/oversample.ts';

const SETS: FilterSet[] = ['lowLatency', 'linearPhase'];
const FACTORS = [2, 4, 8, 16];

/** Impulse response of the way up (at the upper rate) and of the way up and down. */
function impulse(factor: number, filters: FilterSet, length: number) {
  const oversampler = createOversampler(factor, filters, 128);
  const softener = createSoftener(new Float64Array(0));
  const kinks = createKinks(1);
  const upper: number[] = [];
  const lowerRate: number[] = [];
  for (let block = 0; block * 128 < length; block++) {
    oversampler.buffers[0].fill(0);
    if (block === 0) oversampler.buffers[0][0] = 1;
    const top = raise(oversampler, 128);
    upper.push(...top);
    // Between the two ways the kinks are softened, which here is a delay.
    if (factor > 1) soften(softener, top, kinks, 128 * factor);
    lowerRate.push(...lower(oversampler, 128));
  }
  return { upper, lowerRate };
}

function response(samples: readonly number[], turnsPerSample: number) {
  let re = 0;
  let im = 0;
  samples.forEach((value, n) => {
    re += value * Math.cos(2 * Math.PI * turnsPerSample * n);
    im -= value * Math.sin(2 * Math.PI * turnsPerSample * n);
  });
  return { db: 10 * Math.log10(re * re + im * im), phase: Math.atan2(im, re) };
}

for (const filters of SETS) {
  for (const factor of FACTORS) {
    const { upper, lowerRate } = impulse(factor, filters, 4096);

    test(`${filters} ×${factor}: up and down is flat within 0.01 dB to 20 kHz, at 44.1 and at 48 kHz`, () => {
      for (const rateHz of [44100, 48000]) {
        for (let hz = 20; hz <= 20000; hz += 370) expect(Math.abs(response(lowerRate, hz / rateHz).db)).toBeLessThan(0.01);
      }
    });

    test(`${filters} ×${factor}: images of 20 Hz to 20 kHz are at least 110 dB down`, () => {
      const gain = 20 * Math.log10(factor);
      for (let image = 1; image <= factor / 2; image++) {
        for (let hz = 20; hz <= 20000; hz += 1110) {
          for (const f of [image * 44100 - hz, image * 44100 + hz]) {
            if (f > (factor / 2) * 44100) continue;
            expect(response(upper, f / (44100 * factor)).db - gain).toBeLessThan(-110);
          }
        }
      }
    });

    test(`${filters} ×${factor}: the stated delay is the delay of low frequencies`, () => {
      const f = 1 / 2048;
      const delay = -response(lowerRate, f).phase / (2 * Math.PI * f);
      expect(delay).toBeCloseTo(oversamplingDelay(factor, filters), 2);
    });
  }
}

test('linear phase has a delay of whole samples, an impulse that is its own mirror', () => {
  for (const factor of FACTORS) {
    const { lowerRate } = impulse(factor, 'linearPhase', 512);
    const delay = oversamplingDelay(factor, 'linearPhase');
    expect(Number.isInteger(delay)).toBe(true);
    for (let n = 0; n <= delay; n++) expect(lowerRate[delay + n]).toBeCloseTo(lowerRate[delay - n], 11);
  }
});

test('×1 is a wire', () => {
  expect(oversamplingDelay(1, 'linearPhase')).toBe(0);
  expect(impulse(1, 'lowLatency', 128).lowerRate[0]).toBe(1);
});
