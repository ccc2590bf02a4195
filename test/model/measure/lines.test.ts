/** Lines and envelopes against amplitude modulation written out: (1 + a·cos Ω)·cos ω has sidebands of a/2 (textbook). */
import { expect, test } from 'vitest';
import { bandAmplitude, envelopeOf, lineAmplitude, linesOf } from '../../../model/measure/lines.ts';

const SIZE = 8192;
const CARRIER = 200;
const turn = (n: number, i: number) => Math.cos((2 * Math.PI * ((n * i) % SIZE)) / SIZE);
const modulated = Float64Array.from(
  { length: SIZE },
  (_, i) => 0.25 + (1 + 0.4 * turn(1, i)) * turn(CARRIER, i) + 0.01 * turn(2 * CARRIER, i),
);

test('a modulated carrier has its line, two sidebands of half the modulation, and the mean at line 0', () => {
  const lines = linesOf(modulated);
  expect(lines.real[0]).toBeCloseTo(0.25, 14);
  expect(lineAmplitude(lines, CARRIER)).toBeCloseTo(1, 14);
  expect(lineAmplitude(lines, CARRIER - 1)).toBeCloseTo(0.2, 14);
  expect(lineAmplitude(lines, CARRIER + 1)).toBeCloseTo(0.2, 14);
  expect(bandAmplitude(lines, CARRIER - 5, CARRIER + 5)).toBeCloseTo(Math.sqrt(1.08), 14);
  expect(bandAmplitude(lines, CARRIER + 2, 2 * CARRIER - 1)).toBeLessThan(1e-14);
});

test('the envelope is 1 + a·cos Ω, short of it by the stated 0.67·(π/spacing)² of the movement; a second carrier keeps its own', () => {
  const lines = linesOf(modulated);
  const envelope = envelopeOf(lines, CARRIER, CARRIER, 64);
  const short = (2 / 3) * (Math.PI / CARRIER) ** 2;
  envelope.forEach((value, k) => {
    expect(value).toBeCloseTo(1 + 0.4 * (1 - short) * Math.cos((2 * Math.PI * k) / 64), 7);
  });
  for (const value of envelopeOf(lines, 2 * CARRIER, CARRIER, 64)) expect(value).toBeCloseTo(0.01, 8);
});

test('a step of the carrier is passed within two of its periods either side, without overshoot', () => {
  const stepped = Float64Array.from({ length: SIZE }, (_, i) => (i < SIZE / 2 ? 1 : 0.5) * turn(CARRIER, i));
  const envelope = envelopeOf(linesOf(stepped), CARRIER, CARRIER, 1024);
  const twoPeriods = Math.ceil((2 * 1024) / CARRIER) + 1;
  envelope.forEach((value, k) => {
    expect(value).toBeLessThan(1 + 1e-3);
    expect(value).toBeGreaterThan(0.5 - 1e-3);
    if (k > twoPeriods && k < 512 - twoPeriods) expect(value).toBeCloseTo(1, 3);
    if (k > 512 + twoPeriods && k < 1024 - twoPeriods) expect(value).toBeCloseTo(0.5, 3);
  });
});
