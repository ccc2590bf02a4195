/**
 * The make-up amplifier behind a cell that is off, against the same amplifier in a quarter of a million steps a period, in which limits set in at the nearest
 * step. Errors are those of the band from 0 to 20 kHz, dB re the fundamental (support/inBand.ts).
 */
import { describe, expect, test } from 'vitest';
import type { Output } from '../../../model/design/types.ts';
import { amplifierValues, createAmplifierState, processAmplifier } from '../../../model/chain/amplifier.ts';
import { designOf, variantOf } from '../../support/designs.ts';
import { filtersOf, harmonicsOf, inBandError, RATE_HZ, renderTone, SIZE, sizeOf } from '../../support/inBand.ts';

const STEPS = 262144;
const KEPT = 8192;
/** Until an output that slews all the time has found its middle. */
const TURNS = 40;
const TONE_V = 0.5;
const GAIN = 10;
/** Cut off at any level used here: the cell is 10 kΩ into 1 TΩ. */
const OFF = { source: 'fixed', controlV: -5 } as const;

function finePeriod({ gainBandwidthHz, slewVPerSec, swingV }: Output, toneHz: number, toneV: number): Float64Array {
  const step = 1 / (toneHz * STEPS);
  const pole = gainBandwidthHz === null ? null : (Math.PI * gainBandwidthHz * step) / GAIN;
  const most = (slewVPerSec ?? 1e30) * step;
  const swing = swingV ?? 1e30;
  const period = new Float64Array(KEPT);
  let y = 0;
  let driven = GAIN * toneV;
  for (let n = 0; n < TURNS * STEPS; n++) {
    const place = n % STEPS;
    if (place % (STEPS / KEPT) === 0) period[place / (STEPS / KEPT)] = y;
    const next = GAIN * toneV * Math.cos((2 * Math.PI * (n + 1)) / STEPS);
    const free = pole === null ? next : (y + pole * (driven - y + next)) / (1 + pole);
    y = Math.min(swing, Math.max(-swing, y + Math.min(most, Math.max(-most, free - y))));
    driven = next;
  }
  return period;
}

function errors(limits: Partial<Output>, factor: 4 | 8 | 16, bin: number) {
  const output: Output = { gainDb: 20, gainBandwidthHz: null, slewVPerSec: null, swingV: null, ...limits };
  const design = designOf({ ...variantOf({}, {}, OFF), output }, { oversampling: factor });
  const filters = filtersOf(factor, 'linearPhase', 2);
  const toneHz = (bin * RATE_HZ) / SIZE;
  const exact = harmonicsOf(finePeriod(output, toneHz, TONE_V * sizeOf(filters.up(toneHz))));
  const of = (corrected: boolean) => inBandError(renderTone(design, bin, TONE_V, 'linearPhase', corrected), bin, exact, filters);
  return { plain: of(false), corrected: of(true) };
}

/** 5004 and 9012 Hz, 5 V peak driven: cut at 3 V, slewing a part of the time or all of it. Bounds on the whole error and on what folds, dB. */
describe.each([
  ['swing', { swingV: 3 }, [-110, -115], [-97, -102]],
  ['swing and 1 MHz pole', { swingV: 3, gainBandwidthHz: 1e7 }, [-96, -115], [-83, -104]],
  ['slew rate', { slewVPerSec: 1e5 }, [-90, -98], [-74, -79]],
  ['slew rate and 1 MHz pole', { slewVPerSec: 1e5, gainBandwidthHz: 1e7 }, [-90, -99], [-74, -79]],
  ['slew rate, swing and 300 kHz pole', { slewVPerSec: 1e5, swingV: 3, gainBandwidthHz: 3e6 }, [-90, -102], [-74, -80]],
  ['slew rate far too low', { slewVPerSec: 3e4, swingV: 3, gainBandwidthHz: 3e6 }, [-86, -90], [-73, -78]],
] as const)('×8, %s', (_, limits, at5kHz, at9kHz) => {
  test.each([
    [427, at5kHz],
    [769, at9kHz],
  ] as const)('bin %i', { timeout: 60000 }, (bin, [errorDb, foldedDb]) => {
    const { plain, corrected } = errors(limits, 8, bin);
    expect(corrected.errorDb).toBeLessThan(errorDb);
    expect(corrected.foldedDb).toBeLessThan(foldedDb);
    expect(corrected.foldedDb).toBeLessThan(plain.foldedDb - 14);
  });
});

test('each doubling of the oversampling folds at least 12 dB less', { timeout: 60000 }, () => {
  const folded = ([4, 8, 16] as const).map((factor) => errors({ slewVPerSec: 1e5, swingV: 3 }, factor, 427).corrected.foldedDb);
  expect(folded[1]).toBeLessThan(folded[0] - 12);
  expect(folded[2]).toBeLessThan(folded[1] - 12);
});

/** A parabola through three samples errs by (2πfh)³/24 of what the pole takes away. */
test('one pole: a tone comes out as 1/(1 + jf/fp) of it, within −90 dB at 5 kHz and 384 kHz steps (textbook)', () => {
  const rateHz = 384000;
  const output = { gainDb: 20, gainBandwidthHz: 1e6, slewVPerSec: null, swingV: null };
  const values = amplifierValues(output, rateHz);
  const state = createAmplifierState();
  const signal = Float64Array.from({ length: 7680 }, (_, n) => Math.cos((2 * Math.PI * 5000 * n) / rateHz));
  processAmplifier(values, state, signal, 0, signal.length);
  const x = 5000 / 1e5;
  for (let n = 3840; n < 7680; n++) {
    const turn = (2 * Math.PI * 5000 * n) / rateHz;
    const exact = (10 * (Math.cos(turn) + x * Math.sin(turn))) / (1 + x * x);
    expect(Math.abs(signal[n] - exact)).toBeLessThan(10 * 10 ** (-90 / 20));
  }
});

test('a slow pole keeps its place to rounding: 1 Hz at 6 MHz steps reaches 1 − 1/e after a turn of its time constant', () => {
  const rateHz = 6144000;
  const values = amplifierValues({ gainDb: 60, gainBandwidthHz: 1e3, slewVPerSec: null, swingV: null }, rateHz);
  const state = createAmplifierState();
  const steps = Math.round(rateHz / (2 * Math.PI));
  const signal = new Float64Array(steps + 1).fill(1);
  processAmplifier(values, state, signal, 0, signal.length);
  // The step's rise takes one sample: half of one late.
  const late = (steps + 0.5) / rateHz;
  expect(signal[steps] / 1000).toBeCloseTo(1 - Math.exp(-2 * Math.PI * late), 9);
});

test('cutting the signal into blocks changes no bit, and neither swing nor slew rate is passed', () => {
  const output = { gainDb: 20, gainBandwidthHz: 3e6, slewVPerSec: 1e5, swingV: 3 };
  const values = amplifierValues(output, 384000);
  const input = Float64Array.from(
    { length: 4000 },
    (_, n) => 0.4 * Math.sin(n / 10) + 0.3 * Math.sin(n / 3.7) + (n % 500 < 250 ? 0.2 : -0.2),
  );
  const whole = Float64Array.from(input);
  processAmplifier(values, createAmplifierState(), whole, 0, whole.length);
  const cut = Float64Array.from(input);
  const state = createAmplifierState();
  for (let at = 0, length = 1; at < cut.length; at += length, length = 1 + ((length * 7) % 61))
    processAmplifier(values, state, cut, at, Math.min(at + length, cut.length));
  expect(cut).toEqual(whole);
  whole.forEach((v, n) => {
    expect(Math.abs(v)).toBeLessThanOrEqual(3);
    if (n > 0) expect(Math.abs(v - whole[n - 1])).toBeLessThanOrEqual((1e5 / 384000) * (1 + 1e-12));
  });
});
