import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { defaultVariant } from '../../../model/design/defaults.ts';
import { feedbackFraction, type Moves, restGateFraction, withFeedbackFraction } from '../../../model/design/feedback.ts';
import type { Cell, Control, Feedback, Reference, Smoothing, Variant } from '../../../model/design/types.ts';

function cellWith(controlOhm: number, feedback: Feedback): Cell {
  return { ...defaultVariant().cell, controlOhm, feedback };
}

const resistor = (drainOhm: number, blockingF: number | null = null): Feedback => ({ kind: 'resistor', drainOhm, blockingF });
const variantWith = (feedback: Feedback, control: Control = { source: 'fixed', controlV: -2.4 }): Variant => ({
  ...defaultVariant(),
  cell: cellWith(1e6, feedback),
  control,
});

describe('k of a cell', () => {
  test('no feedback is 0, an equal pair ½, a buffer its fraction', () => {
    expect(feedbackFraction(cellWith(1e6, { kind: 'none' }))).toBe(0);
    expect(feedbackFraction(cellWith(100e3, resistor(100e3)))).toBe(0.5);
    expect(feedbackFraction(cellWith(1e6, { kind: 'buffered', fraction: 0.3 }))).toBe(0.3);
  });

  test('910 kΩ from the control and 1 MΩ from the drain give 910/1910', () => {
    expect(feedbackFraction(cellWith(910e3, resistor(1e6)))).toBeCloseTo(0.4764, 4);
  });

  // The usual worked case: k = 0.505 (common practice, no source).
  test('1 % resistors off in opposite ways move ½ to 0.505', () => {
    expect(feedbackFraction(cellWith(101e3, resistor(99e3)))).toBeCloseTo(0.505, 12);
  });

  // The gate is the divider's tap: with the drain at 0 V it is VC·R2/(R2 + R3).
  test('the pair divides the control at rest, unless a capacitor blocks it; a buffer does not', () => {
    expect(restGateFraction(cellWith(1e6, resistor(1e6)))).toBe(0.5);
    expect(restGateFraction(cellWith(910e3, resistor(1e6)))).toBeCloseTo(1 / 1.91, 12);
    expect(restGateFraction(cellWith(1e6, resistor(1e6, 100e-9)))).toBe(1);
    expect(restGateFraction(cellWith(1e6, { kind: 'buffered', fraction: 0.5 }))).toBe(1);
    expect(restGateFraction(cellWith(1e6, { kind: 'none' }))).toBe(1);
  });

  const smoothing: Smoothing = { kind: 'rc', smoothingOhm: 82e3, smoothingF: 1e-7 };

  // Divider of 18 kΩ + 82 kΩ + 200 kΩ over 100 kΩ: 100/400.
  test("the driver's and the smoothing's resistance, outside the pair, divide the control further and leave k alone", () => {
    const cell: Cell = { ...cellWith(200e3, resistor(100e3)), driverOhm: 18e3, smoothing };
    expect(restGateFraction(cell)).toBe(0.25);
    expect(restGateFraction({ ...cell, smoothing: { kind: 'none' } })).toBeCloseTo(100 / 318, 12);
    expect(restGateFraction({ ...cell, driverOhm: 0 })).toBeCloseTo(100 / 382, 12);
    expect(feedbackFraction(cell)).toBeCloseTo(2 / 3, 12);
  });

  test('where the gate draws no direct current, resistance before it takes nothing from the control', () => {
    const before = { driverOhm: 18e3, smoothing };
    expect(restGateFraction({ ...cellWith(200e3, resistor(100e3, 1e-7)), ...before })).toBe(1);
    expect(restGateFraction({ ...cellWith(200e3, { kind: 'buffered', fraction: 0.5 }), ...before })).toBe(1);
    expect(restGateFraction({ ...cellWith(200e3, { kind: 'none' }), ...before })).toBe(1);
  });
});

describe('setting k', () => {
  test('moves the drain resistor to R3(1 − k)/k', () => {
    const moved = withFeedbackFraction(variantWith(resistor(1e6)), 0.2, 'control');
    expect(moved.cell.feedback).toMatchObject({ kind: 'resistor', drainOhm: 4e6 });
    expect(moved.cell.controlOhm).toBe(1e6);
    expect(moved.control).toEqual({ source: 'fixed', controlV: -2.4 });
  });

  test('from a pair at ½ to k = ¼, the gate is kept at −1.2 V by a control of −1.6 V', () => {
    const moved = withFeedbackFraction(variantWith(resistor(1e6)), 0.25, 'gate');
    expect(moved.control).toEqual({ source: 'fixed', controlV: expect.closeTo(-1.6, 12) });
  });

  test.each<[string, Control, Control]>([
    [
      'lfo',
      { source: 'lfo', shape: 'square', rateHz: 4, fromV: -1.2, toV: -3.6, edgeSec: 0.01 },
      { source: 'lfo', shape: 'square', rateHz: 4, fromV: -0.8, toV: -2.4, edgeSec: 0.01 },
    ],
    ['external', { source: 'external', fullScaleV: 1.2, offsetV: -2.4 }, { source: 'external', fullScaleV: 0.8, offsetV: -1.6 }],
  ])('every voltage of the %s control scales, and nothing else does', (_, before, after) => {
    const { control } = withFeedbackFraction(variantWith(resistor(1e6), before), 0.25, 'gate');
    for (const [name, value] of Object.entries(after)) {
      const moved = (control as unknown as Record<string, unknown>)[name];
      if (typeof value === 'number') expect(moved).toBeCloseTo(value, 12);
      else expect(moved).toBe(value);
    }
  });

  test('the envelope scales rest, limit and gain, but neither threshold nor times', () => {
    const before = {
      source: 'envelope',
      restV: -3,
      limitV: -0.6,
      thresholdV: 0.05,
      gainVPerV: 6,
      attackOhm: 4700,
      releaseOhm: 220e3,
      timingF: 1e-6,
    } as const;
    const { control } = withFeedbackFraction(
      variantWith(resistor(1e6), { ...before, senses: 'input', rectifier: 'full', linked: true }),
      0.25,
      'gate',
    );
    if (control.source !== 'envelope') throw new Error('the control changed its source');
    expect([control.restV, control.limitV, control.gainVPerV].map((value) => Number(value.toFixed(12)))).toEqual([-2, -0.4, 4]);
    expect([control.thresholdV, control.attackOhm, control.releaseOhm, control.timingF]).toEqual([0.05, 4700, 220e3, 1e-6]);
  });

  test('with a blocking capacitor or a buffer the gate follows the control at DC already, so the control stays', () => {
    for (const feedback of [resistor(1e6, 100e-9), { kind: 'buffered', fraction: 0.5 } as const]) {
      const before = variantWith(feedback);
      const moved = withFeedbackFraction(before, 0.25, 'gate');
      expect(moved.control).toEqual(before.control);
      expect(feedbackFraction(moved.cell)).toBeCloseTo(0.25, 12);
    }
  });

  const MOVES: Moves[] = ['drainOhm', 'controlOhm', 'bothKeepSum', 'bothKeepParallel'];
  const anyK = fc.double({ min: 0.02, max: 0.9, noNaN: true });

  test('k is as asked and the gate at rest stays where it was, for any pair and whichever resistor moves', () => {
    fc.assert(
      fc.property(anyK, anyK, fc.constantFrom(...MOVES), (first, second, moves) => {
        const start = withFeedbackFraction(variantWith(resistor(1e6)), first, 'gate');
        const moved = withFeedbackFraction(start, second, 'gate', moves);
        const gate = (at: Variant) => (at.control.source === 'fixed' ? at.control.controlV * restGateFraction(at.cell) : Number.NaN);
        expect(feedbackFraction(moved.cell)).toBeCloseTo(second, 12);
        expect(gate(moved)).toBeCloseTo(-1.2, 12);
      }),
      { seed: 9 },
    );
  });

  // Worked by hand from k = R3/(R2 + R3): 600 kΩ and 1.2 MΩ have a sum of 1.8 MΩ and 400 kΩ in parallel.
  test.each<[Moves, number, number]>([
    ['drainOhm', 600e3, 2.4e6],
    ['controlOhm', 300e3, 1.2e6],
    ['bothKeepSum', 360e3, 1.44e6],
    ['bothKeepParallel', 500e3, 2e6],
  ])('from controlOhm 600 kΩ and drainOhm 1.2 MΩ to k = 1/5, %s leads to %d and %d', (moves, controlOhm, drainOhm) => {
    const start: Variant = { ...variantWith(resistor(1.2e6)), cell: cellWith(600e3, resistor(1.2e6, 1e-7)) };
    const { cell } = withFeedbackFraction(start, 0.2, 'control', moves);
    expect(cell.controlOhm).toBeCloseTo(controlOhm, 6);
    if (cell.feedback.kind !== 'resistor') throw new Error('the feedback changed its kind');
    expect(cell.feedback.drainOhm).toBeCloseTo(drainOhm, 6);
    expect(cell.feedback.blockingF).toBe(1e-7);
  });

  test('a buffered fraction is set alike, whichever resistor would move', () => {
    const before = variantWith({ kind: 'buffered', fraction: 0.5 });
    for (const moves of MOVES) {
      const { cell } = withFeedbackFraction(before, 0.3, 'gate', moves);
      expect(cell).toEqual({ ...before.cell, feedback: { kind: 'buffered', fraction: 0.3 } });
    }
  });

  test("the gate is kept behind a driver's resistance too: 1 MΩ before 1 MΩ and 1 MΩ, −3.6 V, to k = ¼", () => {
    const before = variantWith(resistor(1e6), { source: 'fixed', controlV: -3.6 });
    const moved = withFeedbackFraction({ ...before, cell: { ...before.cell, driverOhm: 1e6 } }, 0.25, 'gate');
    // −1.2 V at the gate before; after, 3 MΩ of 5 MΩ: −2.0 V.
    expect(moved.control).toEqual({ source: 'fixed', controlV: expect.closeTo(-2, 12) });
  });

  // VGS with the drain at the source pin's 4.5 V: (3.3 − 4.5)/2 before, and −0.6/0.75 from the pin after.
  test('on a divided supply the control scales from the voltage of the source pin, so that VGS stays', () => {
    const reference: Reference = { kind: 'halfSupply', supplyV: 9, upperOhm: 10e3, lowerOhm: 10e3, decouplingF: 47e-6 };
    const at = (control: Control): Control => {
      const before = variantWith(resistor(1e6), control);
      return withFeedbackFraction({ ...before, cell: { ...before.cell, reference } }, 0.25, 'gate').control;
    };
    expect(at({ source: 'fixed', controlV: 3.3 })).toEqual({ source: 'fixed', controlV: expect.closeTo(3.7, 12) });
    expect(at({ source: 'external', fullScaleV: 1.2, offsetV: 3.3 })).toEqual({
      source: 'external',
      fullScaleV: expect.closeTo(0.8, 12),
      offsetV: expect.closeTo(3.7, 12),
    });
  });

  test.each<[Moves, number, RegExp]>([
    ['controlOhm', 0.9999, /^k = 0\.9999 cannot be set: cell\.controlOhm is 9\d+(\.\d+)?; expected 1 Ω to 1 GΩ$/],
    ['bothKeepParallel', 1e-4, /^k = 0\.0001 cannot be set: cell\.feedback\.drainOhm is \d+(\.\d+)?; expected 1 Ω to 1 GΩ$/],
  ])('%s past its limits is refused, naming the resistor', (moves, k, sentence) => {
    expect(() => withFeedbackFraction(variantWith(resistor(1e6)), k, 'control', moves)).toThrow(sentence);
  });

  test.each<[Feedback, number, string]>([
    [resistor(1e6), 0, 'k is 0; expected more than 0 and less than 1, as two resistors give'],
    [resistor(1e6), 1, 'k is 1; expected more than 0 and less than 1, as two resistors give'],
    [resistor(1e6), Number.NaN, 'k is NaN; expected more than 0 and less than 1, as two resistors give'],
    [{ kind: 'buffered', fraction: 0.5 }, 1.1, 'k is 1.1; expected 0 to 1'],
    [{ kind: 'none' }, 0.5, 'k is 0.5; expected 0 while cell.feedback.kind is none'],
    [resistor(1e6), 1e-4, 'k = 0.0001 cannot be set: cell.feedback.drainOhm is 9999000000; expected 1 Ω to 1 GΩ'],
  ])('case %#: k that cannot be had is refused', (feedback, k, sentence) => {
    expect(() => withFeedbackFraction(variantWith(feedback), k, 'control')).toThrow(sentence);
    expect(() => withFeedbackFraction(variantWith(feedback), k, 'control')).toThrow(RangeError);
  });

  test('a control past its limits is refused, naming it', () => {
    expect(() => withFeedbackFraction(variantWith(resistor(1e6), { source: 'fixed', controlV: -40 }), 0.9, 'gate')).toThrow(
      /^k = 0\.9 cannot be set: control\.controlV is -(199\.9|200\.0)\d*; expected −100 V to 100 V$/,
    );
  });
});
