/** Cell A and its neighbours: figures computed independently (Brent's method and a Fourier transform), to the digits they were printed with. */
import { expect, test } from 'vitest';
import { measureTone } from '../../../model/study/tone.ts';
import { CELL_A_DEVICE, designOf, REAL_CELL, REAL_DEVICE, variantOf } from '../../support/designs.ts';
import { boardPeriod } from '../../support/dynamicCell.ts';
import { harmonicsOf, sizeOf } from '../../support/inBand.ts';

/** k through a buffer, so that the control reaches the gate whole and nothing loads the drain. */
const cellA = (k: number) => designOf(variantOf({ feedback: k === 0 ? { kind: 'none' } : { kind: 'buffered', fraction: k } }));
const read = (k: number, controlV: number, toneV = 1) => measureTone(cellA(k), 0, { toneV, controlV });

test.each([
  [0, -32.255, -48.03],
  [-0.75, -26.432, -36.38],
  [-1.2, -18.669, -20.71],
])('Cell A, k = 0, VGS %s V, 1 V peak: gain %s dB, H2 %s dB', (controlV, gainDb, h2Db) => {
  const reading = read(0, controlV);
  expect(reading.gainDb).toBeCloseTo(gainDb, 3);
  expect(reading.harmonics[1].db).toBeCloseTo(h2Db, 2);
  expect(reading.converged).toBe(true);
});

test('Cell A, k = 0, VGS −0.75 V: HD3 −66.7 dB', () => {
  expect(read(0, -0.75).harmonics[2].db).toBeCloseTo(-66.7, 1);
});

test.each([
  [0, -32.256],
  [-0.75, -26.444],
  [-1.2, -19.085],
])('Cell A, k = ½, VGS %s V: gain %s dB and no harmonic above −200 dB', (controlV, gainDb) => {
  const reading = read(0.5, controlV);
  expect(reading.gainDb).toBeCloseTo(gainDb, 3);
  for (const { n, db } of reading.harmonics) if (n > 1) expect(db ?? -300).toBeLessThan(-200);
});

test('Cell A, k = ½, VGS −1.4 V leaves the ohmic region: HD3 −45.2 dB', () => {
  const reading = read(0.5, -1.4);
  expect(reading.harmonics[2].db).toBeCloseTo(-45.2, 1);
  expect(reading.regions.saturated).toBeGreaterThan(0.4);
});

test.each([
  [0, -88.0],
  [-0.75, -76.4],
  [-1.2, -61.7],
])('Cell A, k = 0.505, VGS %s V: H2 %s dB', (controlV, h2Db) => {
  expect(read(0.505, controlV).harmonics[1].db).toBeCloseTo(h2Db, 1);
});

test('Cell A at VGS −1.6 V, k = 0, 1 V peak: gain −3.31 dB, HD2 24 %, on although VGS is past VGS(off)', () => {
  const reading = read(0, -1.6);
  expect(reading.gainDb).toBeCloseTo(-3.31, 2);
  expect(reading.harmonics[1].amplitudeV / reading.fundamentalV).toBeCloseTo(0.24, 2);
  expect(reading.regions.saturated).toBeGreaterThan(0);
  expect(reading.regions.ohmic).toBe(0);
});

test('nearly voltage driven, k = 0: HD2 of the divider is (1 − H)·V/(4·Vov) of the drain voltage V, first order', () => {
  for (const toneV of [0.01, 0.05]) {
    const { fundamentalV, harmonics, gainDb } = measureTone(cellA(0), 0, { toneV, controlV: -0.75 });
    const h = 10 ** (gainDb / 20);
    const predicted = ((1 - h) * fundamentalV) / (4 * 0.75);
    expect(harmonics[1].amplitudeV / fundamentalV / predicted).toBeCloseTo(1, 2);
  }
});

test('slope resistance at rest is r0/(1 − VGS/VP), r0 = |VP|/(2·IDSS) (Vishay doc 70293): 250, 500, 1250 Ω', () => {
  expect(read(0, 0).rdsOhm).toBeCloseTo(250, 9);
  expect(read(0, -0.75).rdsOhm).toBeCloseTo(500, 9);
  expect(read(0, -1.2).rdsOhm).toBeCloseTo(1250, 9);
  expect(read(0, -1.6).rdsOhm).toBe(Number.POSITIVE_INFINITY);
});

test('both THD divisors: of the fundamental and of the total (IEC 60268-3, from memory)', () => {
  const { thdFundamental, thdTotal } = read(0, -1.2);
  expect(thdTotal).toBeCloseTo(thdFundamental / Math.sqrt(1 + thdFundamental ** 2), 12);
});

test('the sign of H2 turns with k at ½, and the even harmonics vanish there for the pair with its loads', () => {
  const pair = (drainOhm: number) =>
    designOf(variantOf({ ...REAL_CELL, loadF: 0, feedback: { kind: 'resistor', drainOhm, blockingF: null } }, CELL_A_DEVICE));
  const h2 = (drainOhm: number) => measureTone(pair(drainOhm), 0, { controlV: -2.4 }).harmonics[1];
  expect(Math.cos(h2(5.1e5).phaseRad)).toBeGreaterThan(0.9);
  expect(Math.cos(h2(4.3e5).phaseRad)).toBeLessThan(-0.9);
  expect(h2(4.7e5).db ?? -300).toBeLessThan(-200);
});

test('a blocking capacitor leaves 1/(2πfC(Rg + Rf)) of the second harmonic at k = ½', () => {
  const reading = (feedback: typeof REAL_CELL.feedback) =>
    measureTone(designOf(variantOf({ ...REAL_CELL, loadF: 0, feedback }, CELL_A_DEVICE)), 0, { controlV: -1.2, toneV: 0.1, toneHz: 100 });
  const blocked = reading({ kind: 'resistor', drainOhm: 4.7e5, blockingF: 1e-7 }).harmonics[1];
  const bare = reading({ kind: 'none' }).harmonics[1];
  const left = 1 / (2 * Math.PI * 100 * 1e-7 * 9.4e5);
  expect((blocked.db as number) - (bare.db as number)).toBeCloseTo(20 * Math.log10(left), 0);
});

test('the whole board converges: junctions, picofarads and blocking capacitor', () => {
  const reading = measureTone(designOf(variantOf(REAL_CELL, REAL_DEVICE)), 0, { controlV: -1.2, toneV: 0.5 });
  expect(reading.converged).toBe(true);
  expect(reading.vgsV).toBeCloseTo(-1.2, 5);
  const { ohmic, saturated, cutoff } = reading.regions;
  expect(ohmic + saturated + cutoff).toBeCloseTo(1, 12);
});

test('make-up gain counts at the output and not at the drain', () => {
  const variant = { ...variantOf(), output: { ...variantOf().output, gainDb: 20 } };
  const drain = measureTone(designOf(variant), 0, {});
  const output = measureTone(designOf(variant), 0, { at: 'output' });
  expect(output.gainDb - drain.gainDb).toBeCloseTo(20, 9);
  expect(output.harmonics[1].db).toBeCloseTo(drain.harmonics[1].db as number, 9);
});

test('an option that makes no sense is named with its value', () => {
  expect(() => measureTone(cellA(0), 0, { toneHz: -5 })).toThrow('toneHz is -5; expected 0.1 Hz to 1 MHz');
  expect(() => measureTone(cellA(0), 3, {})).toThrow('variant 3 is not in the design; expected 0 to 0');
});

test.each([
  [0, -25.314, -94.363],
  [-0.75, -18.617, -83.76],
  [-1.2, -11.67, -66.445],
])(
  'gradual channel, 1/G0 250 Ω, barrier 0.7 V, k = ½, VGS %s V: gain %s dB, HD3 %s dB (reference/gradual.py)',
  (controlV, gainDb, h3Db) => {
    const w = 0.7 + 1.5;
    const idssA = (1 / 250) * (w / 3 - 0.7 + ((2 / 3) * 0.7 ** 1.5) / Math.sqrt(w));
    const design = designOf(variantOf({ feedback: { kind: 'buffered', fraction: 0.5 } }, { law: 'gradual', barrierV: 0.7, idssA }));
    const reading = measureTone(design, 0, { toneV: 1, controlV });
    expect(reading.gainDb).toBeCloseTo(gainDb, 3);
    expect(reading.harmonics[2].db).toBeCloseTo(h3Db, 2);
    expect(reading.harmonics[1].db ?? -300).toBeLessThan(-200);
  },
);

test.each([
  [2.3, -0.75, -92.81],
  [2.3, -1.2, -59.51],
  [1.8, -0.75, -106.12],
  [1.8, -1.2, -78.58],
])('power law with exponent %s, r0 kept at 250 Ω, k = ½, VGS %s V: HD3 %s dB', (exponent, controlV, h3Db) => {
  const tailV = 0.002;
  const idssA = 1.5 / (250 * exponent);
  const design = designOf(variantOf({ feedback: { kind: 'buffered', fraction: 0.5 } }, { law: 'smooth', exponent, tailV, idssA }));
  const reading = measureTone(design, 0, { toneV: 1, controlV });
  expect(reading.harmonics[2].db).toBeCloseTo(h3Db, 2);
  expect(reading.harmonics[1].db ?? -300).toBeLessThan(-200);
});

test('λ 0.05 leaves every harmonic under −200 dB for the square law at k = ½ while ohmic, and is felt beyond the knee', () => {
  const design = (lambdaPerV: number) => designOf(variantOf({ feedback: { kind: 'buffered', fraction: 0.5 } }, { lambdaPerV }));
  for (const controlV of [0, -0.75, -1.2]) {
    for (const { n, db } of measureTone(design(0.05), 0, { toneV: 1, controlV }).harmonics)
      if (n > 1) expect(db ?? -300).toBeLessThan(-200);
  }
  const deep = (lambdaPerV: number) => measureTone(design(lambdaPerV), 0, { toneV: 1, controlV: -1.4 }).harmonics[2].db as number;
  expect(Math.abs(deep(0.05) - deep(0))).toBeGreaterThan(0.01);
});

test('a reading at the output goes through the amplifier: a sine cut at a quarter of its height has the harmonics of the cut sine', () => {
  const variant = {
    ...variantOf({ seriesOhm: 1, loadOhm: 1e9 }, {}, { source: 'fixed', controlV: -30 } as const),
    output: { gainDb: 40, gainBandwidthHz: null, slewVPerSec: null, swingV: 25 },
  };
  const reading = measureTone(designOf(variant), 0, { toneV: 1, at: 'output' });
  // Fourier series of A·cos cut at c = A/4: b1 = 2A/π·(asin(x) + x·√(1 − x²)), x = c/A; third 4A/(3π)·… by numerical integration here.
  const size = 100000;
  const cut = Array.from({ length: size }, (_, i) => Math.max(-25, Math.min(25, 100 * Math.cos((2 * Math.PI * i) / size))));
  const harmonic = (n: number) => Math.abs((2 / size) * cut.reduce((sum, v, i) => sum + v * Math.cos((2 * Math.PI * n * i) / size), 0));
  for (const n of [1, 3, 5]) expect(reading.harmonics[n - 1].amplitudeV / harmonic(n)).toBeCloseTo(1, 4);
  expect(reading.fundamentalV / ((200 / Math.PI) * (Math.asin(0.25) + 0.25 * Math.sqrt(1 - 0.0625)))).toBeCloseTo(1, 4);
});

test('a gain-bandwidth product lowers the gain as one pole does: 40 dB from 1 MHz is 3.01 dB down at 10 kHz', () => {
  const base = variantOf({ seriesOhm: 1, loadOhm: 1e9 }, {}, { source: 'fixed', controlV: -30 } as const);
  const variant = { ...base, output: { gainDb: 40, gainBandwidthHz: 1e6, slewVPerSec: null, swingV: null } };
  expect(measureTone(designOf(variant), 0, { toneV: 0.01, toneHz: 10000, at: 'output' }).gainDb).toBeCloseTo(40 - 3.0103, 3);
});

test('a reading states its error: no less than its distance from a Runge-Kutta solution, and under 1e-7 of the fundamental', () => {
  const board = { feedbackOhm: 470e3, gateSourceF: 5e-12, gateDrainF: 3e-12, loadF: 1e-9 };
  const cell = { loadF: board.loadF, controlOhm: 470e3, feedback: { kind: 'resistor', drainOhm: 470e3, blockingF: null } } as const;
  const design = designOf(variantOf(cell, { gateSourceF: board.gateSourceF, gateDrainF: board.gateDrainF }));
  const reading = measureTone(design, 0, { toneHz: 5000, toneV: 0.5, controlV: -2.4 });
  const exact = harmonicsOf(boardPeriod(board, 5000, 0.5, -2.4)).map(sizeOf);
  expect(reading.converged).toBe(true);
  expect(reading.settledByTime).toBe(false);
  expect(reading.fundamentalError).toBeLessThan(1e-7);
  expect(reading.harmonicsError).toBeLessThan(1.15e-5);
  // What Runge-Kutta's own steps are sure of: 1e-11.
  expect(Math.abs(reading.fundamentalV / exact[1] - 1)).toBeLessThan(reading.fundamentalError + 1e-11);
  for (const { n, amplitudeV } of reading.harmonics.slice(1, 4))
    expect(Math.abs(amplitudeV / exact[n] - 1)).toBeLessThan(reading.harmonicsError + 1e-11 / (exact[n] / exact[1]));
});

test('picofarads beside a shared ground of 0.1 Ω: found directly and converged, as without the ground to what its drop is of the signal', () => {
  const shared = { kind: 'shared', groundOhm: 0.1, drawAPerV: 0 } as const;
  const [plain, grounded] = [REAL_CELL, { ...REAL_CELL, sharedGround: shared }].map((cell) =>
    measureTone(designOf(variantOf(cell, REAL_DEVICE, { source: 'fixed', controlV: -1.2 })), 0, { toneHz: 262, toneV: 0.15 }),
  );
  expect([grounded.settledByTime, grounded.converged, grounded.gridPoints <= 2048]).toEqual([false, true, true]);
  // 0.1 Ω of some 10 kΩ.
  expect(Math.abs(grounded.fundamentalV / plain.fundamentalV - 1)).toBeLessThan(1e-4);
  expect(Math.abs(grounded.thdFundamental / plain.thdFundamental - 1)).toBeLessThan(1e-3);
});
