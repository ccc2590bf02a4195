/** Noise at rest against Johnson's law, its worked figures at 298.15 K, IEC 61672-1 and an independent nodal solution (reference/board.py). */
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import type { Design } from '../../../model/design/types.ts';
import { noiseReading } from '../../../model/study/noiseDensity.ts';
import { operatingPoint } from '../../../model/study/operating.ts';
import { measureTone } from '../../../model/study/tone.ts';
import { aWeighting } from '../../../model/study/weighting.ts';
import { BOARD } from '../../support/board.ts';
import { designOf, REAL_CELL, REAL_DEVICE, variantOf } from '../../support/designs.ts';

interface BoardData {
  readonly boards: readonly {
    controlV: number;
    points: readonly { frequencyHz: number; noiseV: number; channelV: number; seriesV: number }[];
  }[];
}
const { boards }: BoardData = JSON.parse(readFileSync(new URL('../../reference/board.json', import.meta.url), 'utf8'));
const KT4 = 4 * 1.380649e-23 * 298.15;

/** The FET cut off, so that the series resistor alone is heard. */
const resistorAlone = (seriesOhm: number) => designOf(variantOf({ seriesOhm }, {}, { source: 'fixed', controlV: -5 }));
const at = (design: Design, frequencyHz: number, controlV?: number) =>
  noiseReading(design, 0, { frequenciesHz: [frequencyHz], ...(controlV === undefined ? {} : { controlV }) }).densities[0];

test.each([
  [1e3, 4.058],
  [1e4, 12.83],
  [1e5, 40.6],
])('%s Ω at 298.15 K: %s nV/√Hz (worked figures of Johnson and Nyquist)', (ohm, nanovolts) => {
  const digits = nanovolts < 10 ? 3 : nanovolts < 20 ? 2 : 1;
  expect(at(resistorAlone(ohm), 1000).totalV * 1e9).toBeCloseTo(nanovolts, digits);
});

test('10 kΩ in 20 kHz: 1.815 µV (worked figure; the reading, 20 Hz to 20 kHz, is 0.05 % less)', () => {
  const { drain } = noiseReading(resistorAlone(1e4), 0);
  expect(drain.flatV * Math.sqrt(20000 / 19980) * 1e6).toBeCloseTo(1.815, 3);
  expect(drain.errorRatio).toBeLessThan(1e-8);
});

test('the drain carries the noise of R1 and r in parallel, 4kT/r being the channel at VDS = 0 (van der Ziel)', () => {
  const { totalV, parts, inputReferredV } = at(designOf(variantOf()), 1000, -1.2);
  const parallel = (1e4 * 1250) / 11250;
  expect(totalV / Math.sqrt(KT4 * parallel)).toBeCloseTo(1, 6);
  const channel = parts.find(({ part }) => part === 'channel')?.densityV as number;
  expect(channel / (parallel * Math.sqrt(KT4 / 1250))).toBeCloseTo(1, 6);
  expect(inputReferredV / (totalV * 9)).toBeCloseTo(1, 6);
  expect(Math.hypot(...parts.map(({ densityV }) => densityV)) / totalV).toBeCloseTo(1, 12);
});

test.each(boards)('a whole board at $controlV V of control, gate current included: densities to 1e-6 (reference/board.py)', (board) => {
  const frequenciesHz = board.points.map(({ frequencyHz }) => frequencyHz);
  const { densities } = noiseReading(BOARD, 0, { controlV: board.controlV, frequenciesHz });
  densities.forEach(({ totalV, parts }, i) => {
    const part = (name: string) => parts.find(({ part }) => part === name)?.densityV as number;
    expect(Math.abs(totalV / board.points[i].noiseV - 1)).toBeLessThan(1e-6);
    expect(Math.abs(part('channel') / board.points[i].channelV - 1)).toBeLessThan(1e-6);
    expect(Math.abs(part('series') / board.points[i].seriesV - 1)).toBeLessThan(1e-6);
  });
});

test('a resistor and a capacitor hold kT/C together: the band to 20 kHz is (2/π)·atan(f/fc) of it (equipartition, textbook)', () => {
  const design = designOf(variantOf({ seriesOhm: 1e6, loadF: 1e-9 }, {}, { source: 'fixed', controlV: -5 }));
  const corner = 1 / (2 * Math.PI * 1e6 * 1e-9);
  const share = (2 / Math.PI) * (Math.atan(20e3 / corner) - Math.atan(20 / corner));
  const { drain } = noiseReading(design, 0);
  expect(drain.flatV / Math.sqrt(((1.380649e-23 * 298.15) / 1e-9) * share)).toBeCloseTo(1, 5);
  expect(drain.errorRatio).toBeLessThan(1e-8);
});

test('shot noise of a conducting gate is 2qI: √(2·q·I) times the resistance that it meets (Schottky)', () => {
  const design = designOf(variantOf({ seriesOhm: 1e3, controlOhm: 1e6 }, { ...REAL_DEVICE, gateSourceF: 0, gateDrainF: 0 }));
  const { parts } = at(design, 1000, 1.5);
  const { point } = noiseReading(design, 0, { controlV: 1.5 });
  const source = parts.find(({ part }) => part === 'gateSource')?.densityV as number;
  const drain = parts.find(({ part }) => part === 'gateDrain')?.densityV as number;
  const gateOhm = 1 / (1e-6 + point.gateSourceS + point.gateDrainS);
  const drainOhm = 1 / (1 / 1e3 + 1 / point.rdsOhm);
  const byGate = point.gfsS * drainOhm - point.gateDrainS * drainOhm;
  expect(point.gateSourceA).toBeGreaterThan(1e-7);
  expect(source / (Math.sqrt(2 * 1.602176634e-19 * point.gateSourceA) * gateOhm * Math.abs(byGate))).toBeCloseTo(1, 2);
  expect(drain).toBeGreaterThan(source);
});

test('make-up multiplies drain noise, its pole takes some, and the parts add up to the whole', () => {
  const output = { gainDb: 40, gainBandwidthHz: 1e6, slewVPerSec: null, swingV: null };
  const reading = noiseReading(designOf({ ...variantOf(REAL_CELL, REAL_DEVICE), output }), 0, { controlV: -1.2 });
  const corner = 1e4;
  const left = (corner * (Math.atan(2) - Math.atan(2e-3))) / 19980;
  expect(reading.output.flatV / reading.drain.flatV).toBeCloseTo(100 * Math.sqrt(left), 2);
  expect(Math.hypot(...reading.parts.map(({ flatV }) => flatV)) / reading.output.flatV).toBeCloseTo(1, 12);
  expect(reading.parts[0].part).toBe('channel');
});

test.each([
  [31.5, 10 ** 1.5, -39.4],
  [63, 10 ** 1.8, -26.2],
  [125, 10 ** 2.1, -16.1],
  [250, 10 ** 2.4, -8.6],
  [500, 10 ** 2.7, -3.2],
  [1000, 1000, 0],
  [2000, 10 ** 3.3, 1.2],
  [4000, 10 ** 3.6, 1.0],
  [8000, 10 ** 3.9, -1.1],
  [16000, 10 ** 4.2, -6.6],
])('A-weighting at %s Hz (exactly %s Hz): %s dB, the table of IEC 61672-1', (_nominal, exactHz, db) => {
  expect(Math.abs(20 * Math.log10(aWeighting(exactHz)) - db)).toBeLessThan(0.0501);
});

test('white noise from 20 Hz to 20 kHz is 2.048271 dB quieter A-weighted (the squared weighting by scipy.integrate.quad, over 19 980 Hz)', () => {
  const { drain } = noiseReading(resistorAlone(1e4), 0);
  expect(20 * Math.log10(drain.aWeightedV / drain.flatV)).toBeCloseTo(-2.048271, 6);
});

/**
 * Best input level and THD+N there, thermal noise at the drain alone in 20 kHz, R1 6.8 kΩ, 3 mA, −1.5 V: figures of the project's numerical trial, to
 * about 10 % in level. Where they part, the first order says which is right: HD2 = hA with h = |β(2k − 1)|/(2·R1·g²) and noise over signal n/A meet at
 * A = √(n/h), 23.3 mV and not 21 mV in the first row.
 */
const LEVELS: readonly [ohm: number, k: number, law: 'square' | 'gradual', bestV: number, db: number][] = [
  [430, 0, 'square', 0.021, -65.5],
  [430, 0.45, 'square', 0.081, -75.5],
  [430, 0.49, 'square', 0.174, -82.5],
  [430, 0.5, 'gradual', 0.66, -96.6],
  [15e3, 0, 'square', 0.0012, -49.6],
  [15e3, 0.45, 'square', 0.0038, -59.6],
  [15e3, 0.49, 'square', 0.0082, -66.6],
  [15e3, 0.5, 'gradual', 0.055, -84.6],
];

test.each(LEVELS)('rDS %s Ω, k %s, %s law: best near %s V peak, with THD+N %s dB (numerical trial)', (ohm, k, law, bestV, db) => {
  const design = designOf(variantOf({ seriesOhm: 6800, feedback: { kind: 'buffered', fraction: k } }, { law, barrierV: 0.7 }));
  const gateV = gateFor(design, ohm);
  const noiseV = noiseReading(design, 0, { gateV }).drain.flatV * Math.sqrt(20000 / 19980);
  const thdAndNoise = (toneV: number) => {
    const { thdFundamental, fundamentalV } = measureTone(design, 0, { gateV, toneV });
    return Math.hypot(thdFundamental, (noiseV * Math.SQRT2) / fundamentalV);
  };
  let [low, high] = [bestV / 1.5, bestV * 1.5];
  for (let i = 0; i < 9; i++) {
    const [a, b] = [low + (high - low) * 0.382, low + (high - low) * 0.618];
    if (thdAndNoise(a) < thdAndNoise(b)) high = b;
    else low = a;
  }
  const best = (low + high) / 2;
  expect(Math.abs(best / bestV - 1)).toBeLessThan(0.12);
  expect(Math.abs(20 * Math.log10(thdAndNoise(best)) - db)).toBeLessThan(0.1);
  if (law === 'square') {
    const g = 1 / 6800 + 1 / ohm;
    const h = ((3e-3 / 2.25) * Math.abs(2 * k - 1)) / (2 * 6800 * g * g);
    const firstOrder = Math.sqrt((Math.sqrt((KT4 / g) * 20e3) * Math.SQRT2 * 6800 * g) / h);
    expect(best / firstOrder).toBeCloseTo(1, 1);
  }
});

/** The gate voltage at which the channel at rest has `ohm`. */
function gateFor(design: Design, ohm: number): number {
  let [off, on] = [-1.5, 0];
  for (let i = 0; i < 50; i++) {
    const middle = (off + on) / 2;
    if (operatingPoint(design, 0, { gateV: middle }).rdsOhm > ohm) off = middle;
    else on = middle;
  }
  return on;
}

test('densities state what the linear solutions were wrong by: no more than rounding for a whole board', () => {
  const { errorRatio } = noiseReading(designOf(variantOf(REAL_CELL, REAL_DEVICE)), 0);
  expect(errorRatio).toBeGreaterThan(0);
  expect(errorRatio).toBeLessThan(1e-9);
});
