/** The figures that the starting designs are described with, computed through the model, and closed forms where there are some. */
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { readWav } from '../../../model/chain/wav.ts';
import { followerTimesSec } from '../../../model/control/follower.ts';
import { controlRangeV } from '../../../model/control/range.ts';
import { restGateFraction } from '../../../model/design/feedback.ts';
import { readDesign } from '../../../model/design/read.ts';
import type { Design, Variant } from '../../../model/design/types.ts';
import { measureOverCycle } from '../../../model/study/cycle.ts';
import { operatingPoint } from '../../../model/study/operating.ts';
import { smallSignal } from '../../../model/study/response.ts';
import { measureTone } from '../../../model/study/tone.ts';
import { controlAt, programmeReduction, RATE_HZ, reductionAt, runChain, steadyAt, stepTimes } from '../../support/compressing.ts';

const assets = new URL('../../../assets/', import.meta.url);
const text = (path: string) => readFileSync(new URL(path, assets), 'utf8');
const manifest: { name: string; title: string; scenario: string; listenFor: string; kind: string; phrase: string }[] = JSON.parse(
  text('designs/manifest.json'),
);

function starter(name: string): Design {
  const result = readDesign(text(`designs/${name}.json`));
  if ('faults' in result) throw new Error(result.faults.map((fault) => fault.sentence).join('\n'));
  return result.design;
}

const phraseOf = (name: string) => {
  const { phrase } = manifest.find((entry) => entry.name === name) as (typeof manifest)[number];
  return readWav(readFileSync(new URL(`phrases/${phrase}.wav`, assets))).channels;
};

const indexOf = (design: Design, name: string) => design.variants.findIndex((variant) => variant.name === name);

test('four tremolos, four compressors and a pad, the harbour tremolo first, each with a phrase that exists', () => {
  expect(manifest[0].name).toBe('harbour-tremolo');
  expect(manifest.map(({ kind }) => kind).sort()).toEqual([
    ...Array(1).fill('attenuator'),
    ...Array(4).fill('compressor'),
    ...Array(4).fill('tremolo'),
  ]);
  const phrases: string[] = JSON.parse(text('phrases/manifest.json')).phrases.map(({ name }: { name: string }) => name);
  for (const { phrase } of manifest) expect(phrases).toContain(phrase);
  const sources = { tremolo: 'lfo', compressor: 'envelope', attenuator: 'fixed' };
  for (const { name, kind } of manifest) {
    for (const { control } of starter(name).variants) expect(control.source).toBe(sources[kind as keyof typeof sources]);
  }
});

// Between them they use every law, both channels, all three feedbacks, both places to listen, and the board's parts.
test('together they use what the document can say', () => {
  const variants = manifest.flatMap(({ name }) => starter(name).variants);
  const all = (pick: (variant: Variant) => unknown) => new Set(variants.map(pick));
  expect(all(({ device }) => device.law)).toEqual(new Set(['square', 'gradual', 'smooth']));
  expect(all(({ device }) => device.channel)).toEqual(new Set(['n', 'p']));
  expect(all(({ cell }) => cell.feedback.kind)).toEqual(new Set(['none', 'resistor', 'buffered']));
  expect(all(({ control }) => (control.source === 'envelope' ? control.senses : null))).toEqual(new Set(['input', 'output', null]));
  expect(all(({ cell }) => cell.reference.kind)).toEqual(new Set(['ground', 'halfSupply']));
  expect(all(({ cell }) => cell.feed.kind)).toEqual(new Set(['direct', 'pickup']));
  for (const has of [
    ({ cell }: Variant) => cell.coupling.kind === 'capacitor',
    ({ cell }: Variant) => cell.clamp.kind === 'diode',
    ({ cell }: Variant) => cell.smoothing.kind === 'rc',
    ({ cell }: Variant) => cell.buffer.kind === 'follower',
    ({ output }: Variant) => output.swingV !== null,
    ({ devices }: Variant) => devices !== undefined,
  ]) {
    expect(variants.some(has)).toBe(true);
  }
});

// A board on half a supply has states of some volts beside some microvolts: both must count as settled when they repeat to rounding.
test.each(manifest.map(({ name }) => name))('%s: readings at both ends of the control settle, in every variant', (name) => {
  const design = starter(name);
  design.variants.forEach(({ control }, index) => {
    for (const controlV of controlRangeV(control)) {
      const reading = measureTone(design, index, { controlV, toneV: design.fullScaleV / 2 });
      expect(reading.converged, `${index}, ${controlV} V`).toBe(true);
    }
  });
});

/** 1 kHz at half of full scale: least and most gain over the cycle, dB, the worst THD on the way, a mean over four periods, and what the control leaves, mV. */
describe.each([
  ['harbour-tremolo', 'A', -28.01, -0.13, 0.039, 4.13],
  ['harbour-tremolo', 'B', -27.96, -0.13, 0.0421, 11.26],
  ['harbour-tremolo', 'C', -27.96, -0.09, 0.1839, 0],
  ['lantern-pulse', 'A', -28.6, -0.18, 0.0228, 0],
  ['lantern-pulse', 'B', -28.6, -0.24, 0.0284, 5.71],
  ['dune-sway', 'A', -18.82, -7.45, 0.0007, 1.39],
  ['dune-sway', 'B', -18.81, -7.25, 0.0575, 0.4],
  ['dune-sway', 'C', -18.85, -7.56, 0.0007, 17.25],
  ['windmill-ramp', 'A', -58.21, -27.11, 0.0158, 0],
  ['windmill-ramp', 'B', -58.21, -27.12, 0.17, 0],
] as const)('%s %s', (name, variant, leastDb, mostDb, worst, leftMv) => {
  test(`moves from ${leastDb} to ${mostDb} dB at the drain, its worst THD on the way ${(100 * worst).toFixed(2)} %`, () => {
    const design = starter(name);
    const reading = measureOverCycle(design, indexOf(design, variant), { toneHz: 1000, toneV: design.fullScaleV / 2 });
    expect(reading.leastGain.gainDb).toBeCloseTo(leastDb, 1);
    expect(reading.mostGain.gainDb).toBeCloseTo(mostDb, 1);
    expect(reading.mostDistorted.thd / worst).toBeGreaterThan(0.9);
    expect(reading.mostDistorted.thd / worst).toBeLessThan(1.1);
    expect(Math.abs(1000 * reading.feedthrough.peakV - leftMv)).toBeLessThan(0.02 + 0.02 * leftMv);
  });
});

/** r0/(1 − VGS/VGS(off)), the square law with half of the drain at the gate, as long as it is ohmic (Vishay doc 70293). */
const channelOhm = ({ device }: Variant, gateSourceV: number) =>
  Math.abs(device.gateOffV) / (2 * device.idssA) / (1 - gateSourceV / device.gateOffV);

const parallel = (...ohms: number[]) => 1 / ohms.reduce((sum, ohm) => sum + 1 / ohm, 0);

/** Resistance that the FET shunts: series resistor with what is before it, load and pair. */
function shuntedOhm({ cell }: Variant): number {
  const { pad, sourceOhm, seriesOhm, loadOhm, controlOhm, feedback } = cell;
  const before = pad.kind === 'divider' ? parallel(sourceOhm + pad.upperOhm, pad.lowerOhm) : sourceOhm;
  const pair = feedback.kind === 'resistor' ? controlOhm + feedback.drainOhm : Number.POSITIVE_INFINITY;
  return parallel(before + seriesOhm, loadOhm, pair);
}

test.each([
  ['harbour-tremolo', 'B'],
  ['lantern-pulse', 'A'],
])('%s %s: the deepest gain is that of the divider with the square law’s resistance', (name, variantName) => {
  const design = starter(name);
  const index = indexOf(design, variantName);
  const variant = design.variants[index];
  if (variant.control.source !== 'lfo') throw new Error('not an LFO');
  const r = channelOhm(variant, variant.control.fromV * restGateFraction(variant.cell));
  const straight = variant.cell.sourceOhm + variant.cell.seriesOhm;
  const expectedDb = 20 * Math.log10(parallel(shuntedOhm(variant), r) / straight);
  const { leastGain } = measureOverCycle(design, index, { toneHz: 1000, toneV: design.fullScaleV / 2 });
  expect(Math.abs(leastGain.gainDb - expectedDb)).toBeLessThan(0.02);
});

/**
 * Reduction at −12, −6 and −1 dBFS (1 kHz, steady), the level and size of its worst THD from −24 to −1 dBFS, the reduction on its own phrase, and the times to 63 %
 * of a 10 dB step from −16 dBFS.
 */
const COMPRESSORS = [
  ['breakwater-bass', 'A', [4.25, 7.49, 10.19], [-20, 0.0012], 7.31, 4.25, 110],
  ['breakwater-bass', 'B', [4.26, 7.49, 10.19], [-18, 0.025], 7.15, 4.25, 110.5],
  ['breakwater-bass', 'C', [3.41, 6.66, 9.35], [-12, 0.0046], 7.1, 1, 7.2],
  ['millrace-drums', 'A', [4.04, 9.49, 12.03], [-17, 0.0116], 11.93, 1, 86],
  ['millrace-drums', 'B', [2.95, 8.32, 12.03], [-16, 0.0114], 8.67, 7.75, 80.5],
  ['millrace-drums', 'C', [3.83, 9.43, 11.98], [-14, 0.0728], 11.94, 1, 84.2],
  ['choir-loft-voice', 'A', [2.71, 6.48, 9.58], [-14, 0.006], 9.21, 2.25, 97.5],
  ['choir-loft-voice', 'B', [2.89, 6.81, 9.89], [-6, 0.1447], 10.24, 4.75, 104.2],
  ['choir-loft-voice', 'C', [1.77, 5.41, 8.53], [-12, 0.0085], 7.39, 20, 89.8],
  ['signal-box-mix', 'A', [1.91, 7.17, 10.33], [-14, 0.0108], 6.73, 15.5, 129.5],
  ['signal-box-mix', 'B', [1.91, 7.17, 10.33], [-14, 0.0108], 6.62, 15.5, 129.5],
  ['signal-box-mix', 'C', [1.73, 6.96, 10.06], [-10, 0.099], 6.75, 19.25, 124],
] as const;

describe.each(COMPRESSORS)('%s %s', (name, variant, reductionsDb, [worstDb, worst], programmeDb, attackMs, releaseMs) => {
  const design = starter(name);
  const index = indexOf(design, variant);

  test(`takes ${reductionsDb.join(', ')} dB off at −12, −6 and −1 dBFS, none at −24, its worst THD ${(100 * worst).toFixed(2)} %`, () => {
    [-12, -6, -1].forEach((levelDb, i) => {
      expect(reductionAt(design, index, levelDb).reductionDb, `${levelDb} dBFS`).toBeCloseTo(reductionsDb[i], 1);
    });
    expect(Math.abs(reductionAt(design, index, -24).reductionDb)).toBeLessThan(0.02);
    const thdAt = (levelDb: number) => steadyAt(design, index, levelDb, 1000, 0.6).thd;
    expect(thdAt(worstDb) / worst).toBeGreaterThan(0.95);
    expect(thdAt(worstDb) / worst).toBeLessThan(1.05);
    for (const levelDb of [worstDb - 2, worstDb - 1, worstDb + 1, worstDb + 2, -1])
      expect(thdAt(levelDb), `${levelDb} dBFS`).toBeLessThan(1.02 * worst);
  });

  test(`takes ${programmeDb} dB off the peaks of its phrase, between 6 and 12`, () => {
    const { reductionDb: taken, faults } = programmeReduction(design, index, phraseOf(name));
    expect(faults).toBe(0);
    expect(Math.abs(taken - programmeDb)).toBeLessThan(0.1);
    expect(taken).toBeGreaterThan(6);
    expect(taken).toBeLessThan(12);
  });

  test(`comes down in ${attackMs} ms and back in ${releaseMs} ms, without overshoot`, () => {
    const { attackSec, releaseSec, overshootDb, changeDb } = stepTimes(design, index);
    expect(Math.abs(1000 * attackSec - attackMs)).toBeLessThan(0.26 + 0.02 * attackMs);
    expect(Math.abs(1000 * releaseSec - releaseMs)).toBeLessThan(0.26 + 0.02 * releaseMs);
    expect(changeDb).toBeGreaterThan(5);
    expect(overshootDb).toBeLessThan(0.05);
  });
});

test('breakwater D swallows its first note: the drain’s offset, modulated, is taken for a signal', () => {
  const design = starter('breakwater-bass');
  expect(stepTimes(design, indexOf(design, 'D')).overshootDb).toBeGreaterThan(1);
  expect(programmeReduction(design, indexOf(design, 'D'), phraseOf('breakwater-bass')).reductionDb).toBeCloseTo(18.5, 0);
  const atHundred = (variant: string) => reductionAt(design, indexOf(design, variant), -6, 100).thd;
  expect(atHundred('C')).toBeGreaterThan(0.04);
  expect(atHundred('A')).toBeLessThan(0.005);
});

// Into R beside the pair and the capacitor's leak: (VS − VC)/(R2 + R3) and VS/leak. With 220 kΩ that would be 0.16 V; the drain stops where it has
// pulled the gate along so far that the channel begins to conduct.
test('breakwater at rest: leaks set the drain off by 8 mV with a return of 10 kΩ, by 0.14 V with 220 kΩ', () => {
  const design = starter('breakwater-bass');
  const offsetV = (variant: string) => -operatingPoint(design, indexOf(design, variant)).vdsV;
  const leaksA = (4.5 - 1.38) / 9.4e6 + 4.5 / 10e6;
  expect(offsetV('A') / (leaksA * parallel(10e3, 9.4e6, 10e6))).toBeCloseTo(1, 2);
  expect(offsetV('D')).toBeCloseTo(0.14, 2);
  expect(offsetV('D')).toBeLessThan(leaksA * parallel(220e3, 9.4e6, 10e6));
});

test('millrace: the blows stand 4 dB higher with the slower attack', () => {
  const design = starter('millrace-drums');
  const peakDb = (variant: string) =>
    20 *
    Math.log10(
      runChain(design, indexOf(design, variant), phraseOf('millrace-drums')).output.reduce((most, v) => Math.max(most, Math.abs(v)), 0),
    );
  expect(peakDb('B') - peakDb('A')).toBeGreaterThan(3.5);
  expect(peakDb('B') - peakDb('A')).toBeLessThan(4.5);
});

test('signal box: the two parts differ by 1.3 dB at most down to the limit', () => {
  const design = starter('signal-box-mix');
  const { control } = design.variants[0];
  if (control.source !== 'envelope') throw new Error('not an envelope');
  const gainDb = (controlV: number, channel: number) =>
    smallSignal(design, 0, { controlV, channel, frequenciesHz: [1000] }).points[0].audio.db ?? Number.NaN;
  const apartDb = Array.from({ length: 21 }, (_, i) => {
    const controlV = control.restV + ((control.limitV - control.restV) * i) / 20;
    return Math.abs(gainDb(controlV, 0) - gainDb(controlV, 1));
  });
  expect(Math.max(...apartDb)).toBeCloseTo(1.31, 1);
});

test.each([
  ['millrace-drums', 'A'],
  ['signal-box-mix', 'A'],
])('%s %s at its limit: the reduction is that of the divider with the square law’s resistance', (name, variantName) => {
  const design = starter(name);
  const index = indexOf(design, variantName);
  const variant = design.variants[index];
  if (variant.control.source !== 'envelope') throw new Error('not an envelope');
  const r = channelOhm(variant, variant.control.limitV * restGateFraction(variant.cell));
  const expectedDb = 20 * Math.log10(1 + shuntedOhm(variant) / r);
  expect(Math.abs(reductionAt(design, index, -1).reductionDb - expectedDb)).toBeLessThan(0.03);
});

// C·de/dt = (r − e)/Ra − e/Rr: towards r·Rr/(Ra + Rr) with the time constant C·(Ra in parallel with Rr); without input, C·Rr.
test.each(['millrace-drums', 'signal-box-mix'])(
  '%s: a steady voltage charges the timing capacitor by its RC, and silence discharges it by the other',
  (name) => {
    const design = starter(name);
    const { control } = design.variants[0];
    if (control.source !== 'envelope') throw new Error('not an envelope');
    const { attackSec, releaseSec } = followerTimesSec(control);
    const level = 0.3;
    const rectifiedV = level * design.fullScaleV;
    const upSec = 0.5;
    const samples = new Float32Array(RATE_HZ).fill(level, 0, upSec * RATE_HZ);
    const run = runChain(design, 0, [samples], 4);
    const share = releaseSec / (attackSec + releaseSec);
    const envelopeAt = (sec: number) => (controlAt(run, sec + run.latencySec / 2) - control.restV) / control.gainVPerV + control.thresholdV;
    for (const part of [1, 2, 3]) {
      const sec = part * attackSec * share + 0.0005;
      const charged = rectifiedV * share * (1 - Math.exp(-sec / (attackSec * share)));
      if (charged > control.thresholdV) expect(Math.abs(envelopeAt(sec) / charged - 1), `attack, ${part}`).toBeLessThan(0.05);
    }
    for (const sec of [0.02, 0.04, 0.06]) {
      const discharged = rectifiedV * share * Math.exp(-sec / releaseSec);
      expect(Math.abs(envelopeAt(upSec + sec) / discharged - 1), `release, ${sec} s`).toBeLessThan(0.01);
    }
  },
);
