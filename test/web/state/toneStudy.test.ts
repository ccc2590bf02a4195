import { describe, expect, test } from 'vitest';
import { defaultVariant } from '../../../model/design/defaults.ts';
import { withFeedbackFraction } from '../../../model/design/feedback.ts';
import { checkDesign } from '../../../model/design/read.ts';
import type { Control, Design, Feedback } from '../../../model/design/types.ts';
import {
  curveFractions,
  readBeyond,
  readFeedbackCurve,
  readMoment,
  readNoise,
  readPlane,
  readSwing,
  readTone,
} from '../../../web/state/toneStudy.ts';
import type { ToneQuestion } from '../../../web/state/workers.ts';

/**
 * Cell A of the independent figures: 3 mA, −1.5 V, 10 kΩ, square law, no gate diodes, no capacitance, no load.
 * What the schema cannot leave out altogether is made too small to count.
 */
function cellA(feedback: Feedback, control: Control): Design {
  const variant = defaultVariant();
  const junction = { ...variant.device.junction, reverseA: 0, leakageS: 0 };
  const device = { ...variant.device, junction, gateSourceF: 0, gateDrainF: 0 };
  const cell = { ...variant.cell, sourceOhm: 0, seriesOhm: 10e3, loadOhm: 1e9, loadF: 0, controlOhm: 1e6, feedback };
  const result = checkDesign({ fettle: 1, title: 'Cell A', variants: [{ ...variant, device, cell, control }] });
  if ('faults' in result) throw new Error(result.faults[0].sentence);
  return result.design;
}

const question = (design: Design, toneV: number): ToneQuestion => ({ design, variantIndex: 0, toneHz: 1000, toneV, moves: 'drainOhm' });

function finish<T>(work: Generator<void, T>): T {
  for (;;) {
    const step = work.next();
    if (step.done) return step.value;
  }
}

const dbOf = (ratio: number) => 20 * Math.log10(ratio);
const sweep = (fromV: number, toV: number): Control => ({ source: 'lfo', shape: 'sine', rateHz: 1, fromV, toV, edgeSec: 0 });

describe('the worst over the swing', () => {
  // Computed independently of this project (root finding and Fourier transform over all gate voltages): THD and the gain where it occurs.
  test.each([
    [0, 0.05, 0.1329, -3.4],
    [0, 0.1, 0.1865, -4.66],
    [0, 0.3, 0.2874, -7.09],
    [0.5, 0.05, 0.0221, -0.84],
    [0.5, 0.1, 0.0372, -1.41],
    [0.5, 0.3, 0.0732, -2.59],
  ])('at k = %d and %d V peak is a THD of %d at %d dB', (k, toneV, thd, gainDb) => {
    const feedback: Feedback = k === 0 ? { kind: 'none' } : { kind: 'buffered', fraction: k };
    const { worst } = finish(readSwing(question(cellA(feedback, sweep(-1.8, -1)), toneV)));
    // The figures have three digits; the maximum is flat, so its place, hence the gain, is found less sharply.
    expect(Math.abs(worst.thdFundamental / thd - 1)).toBeLessThan(0.005);
    expect(Math.abs(worst.gainDb - gainDb)).toBeLessThan(0.15);
  });

  test('of a fixed control is its one reading', () => {
    const asked = question(cellA({ kind: 'none' }, { source: 'fixed', controlV: -0.75 }), 1);
    const { thdFundamental, gainDb } = readTone(asked, null);
    const { worst } = finish(readSwing(asked));
    expect(worst.gateV).toBeCloseTo(-0.75, 9);
    expect(worst.thdFundamental).toBeCloseTo(thdFundamental, 9);
    expect(worst.gainDb).toBeCloseTo(gainDb, 9);
  });
});

describe('the curve against k', () => {
  const resistors = withFeedbackFraction(
    cellA({ kind: 'resistor', drainOhm: 1e6, blockingF: null }, { source: 'fixed', controlV: -1.5 }).variants[0],
    0.45,
    'gate',
  );
  const design = cellA(resistors.cell.feedback, resistors.control);

  test('holds the present k and 41 even ones, ascending', () => {
    expect(curveFractions(0.45)).toHaveLength(41);
    const odd = curveFractions(0.4371);
    expect(odd).toHaveLength(42);
    expect(odd).toContain(0.4371);
    expect(odd).toEqual([...odd].sort((a, b) => a - b));
    expect(curveFractions(0.2)[0]).toBeCloseTo(0.18, 12);
    expect(curveFractions(0.99).at(-1)).toBe(1);
  });

  test('its second harmonic is plus below one half, where k is to be raised, and minus above', () => {
    const points = finish(readFeedbackCurve(question(design, 1), null))?.points ?? [];
    for (const { k, h2Signed } of points) if (Math.abs(k - 0.5) > 1e-6) expect(Math.sign(h2Signed)).toBe(k < 0.5 ? 1 : -1);
  });

  test('the second harmonic off balance is the one without feedback times 1 − 2k', () => {
    // First order in 1 − 2k: computed independently; at k = 0.505 and VGS −0.75 V the exact figure is −76.4 dB, against −36.38 dB at k = 0.
    const points = finish(readFeedbackCurve(question(design, 1), null))?.points ?? [];
    const near = points.find(({ k }) => Math.abs(k - 0.505) < 1e-9);
    expect(Math.abs(dbOf(Math.abs(near?.h2Signed ?? 0)) - -76.4)).toBeLessThan(0.1);
  });

  test('passes through the reading of the same gate voltage, wherever that is', () => {
    const asked = question(design, 0.5);
    for (const gateV of [-0.4, -1.1]) {
      const curve = finish(readFeedbackCurve(asked, gateV));
      const { reading } = readMoment(asked, gateV);
      expect(curve?.gateV).toBe(gateV);
      expect(curve?.points.find(({ k }) => Math.abs(k - 0.45) < 1e-6)?.thd).toBeCloseTo(reading.thdFundamental, 12);
    }
  });

  test('a cell without feedback has none', () => {
    expect(finish(readFeedbackCurve(question(cellA({ kind: 'none' }, { source: 'fixed', controlV: -1 }), 1), null))).toBeNull();
  });
});

describe('parts of 1 %', () => {
  test('make a band around the reading that holds the THD of either pair of ends', () => {
    const pair = (drainOhm: number, controlOhm: number) => {
      const design = cellA({ kind: 'resistor', drainOhm, blockingF: null }, { source: 'fixed', controlV: -1.5 });
      const [variant] = design.variants;
      return { ...design, variants: [{ ...variant, cell: { ...variant.cell, controlOhm } }] };
    };
    const { reading, thdBand } = readMoment(question(pair(1e6, 910e3), 0.5), -0.75);
    const [low, high] = thdBand ?? [0, 0];
    const ends = [pair(1.01e6, 0.99 * 910e3), pair(0.99e6, 1.01 * 910e3)].map(
      (design) => readTone(question(design, 0.5), -0.75).thdFundamental,
    );
    expect(low).toBeLessThan(reading.thdFundamental);
    expect(Math.abs(low / Math.min(...ends) - 1)).toBeLessThan(1e-3);
    expect(Math.abs(high / Math.max(...ends) - 1)).toBeLessThan(1e-3);
  });
});

describe('over the swing', () => {
  const asked = question(cellA({ kind: 'none' }, sweep(-1.8, 0)), 0.05);

  test('the gain ends at that of the channel at VGS = 0 and, cut off, at that of the load alone', () => {
    // Voltage divider: rDS(on) = |VGS(off)|/(2·IDSS) = 250 Ω under 10 kΩ is −32.26 dB; a load of 1 GΩ takes nothing.
    const { points } = finish(readSwing(asked));
    expect(points[0].gainDb).toBeCloseTo(0, 3);
    expect(points.at(-1)?.gainDb).toBeCloseTo(-32.26, 1);
    expect(points.at(-1)?.rdsOhm).toBeCloseTo(250, 3);
    expect(points.map(({ gateV }) => gateV)).toEqual(points.map(({ gateV }) => gateV).sort((a, b) => a - b));
  });

  test('the noise at the drain is that of 10 kΩ where the cell is cut off', () => {
    // Johnson: √(4kTRB) of 10 kΩ at 25 °C over 19.98 kHz is 1.814 μV.
    const points = finish(readNoise(asked));
    expect(points[0].drainV * 1e6).toBeCloseTo(1.814, 2);
    expect(points).toHaveLength(25);
  });
});

describe('what lies beyond the swing', () => {
  test('joins it on both sides, from past VGS(off) to 0 V, without a gap or a place twice', () => {
    const asked = question(cellA({ kind: 'none' }, sweep(-1.4, -0.8)), 0.2);
    const beyond = finish(readBeyond(asked)).map(({ gateV }) => gateV);
    expect(beyond[0]).toBeCloseTo(-1.875, 9);
    expect(beyond.at(-1)).toBeCloseTo(0, 9);
    expect(beyond.every((v, n) => n === 0 || v > beyond[n - 1])).toBe(true);
    expect(beyond.some((v) => v > -1.41 && v < -0.79)).toBe(false);
  });

  test('is none on a side that the swing covers', () => {
    const asked = question(cellA({ kind: 'none' }, sweep(-1.8, 0)), 0.2);
    expect(finish(readBeyond(asked)).every(({ gateV }) => gateV < -1.79)).toBe(true);
  });
});

test('the transfer plane holds the shadow tone at both ends of the swing, and its curves leave it apart from one another', () => {
  const asked = question(cellA({ kind: 'none' }, sweep(-1.8, -0.6)), 0.2);
  const { drainSourceV, curves, topA, edgeA } = readPlane(asked);
  // Cut off, the whole tone of 0.2 V stands at the drain; at −0.6 V rDS is 1 / (2·1.333 mS·0.9) = 417 Ω, and 0.2 V / 10.4 kΩ = 19.2 µA flow.
  // Less a hundred-thousandth, for the load of 1 GΩ.
  expect(drainSourceV.at(-1)).toBeCloseTo(1.12 * 0.2, 5);
  expect(topA / 1.12).toBeGreaterThan(19e-6);
  expect(topA / 1.12).toBeLessThan(19.6e-6);
  expect(curves.length).toBeGreaterThan(3);
  const ends = curves.map(({ drainA }) => drainA.at(-1) ?? 0);
  expect(ends.every((amperes, n) => n === 0 || amperes < ends[n - 1])).toBe(true);
  // The square law leaves its ohmic region on ID = β·VDS².
  expect(edgeA.at(-1)).toBeCloseTo((3e-3 / 2.25) * (1.12 * 0.2) ** 2, 8);
});
