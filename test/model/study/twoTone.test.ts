/** Two tones through the cell: what pure laws predict (facts of the trade, derived: exact for the law itself). */
import { expect, test } from 'vitest';
import { createCell, forReadings } from '../../../model/cell/cell.ts';
import { cellNumbers } from '../../../model/cell/fromDesign.ts';
import { harmonicsOf } from '../../../model/measure/harmonics.ts';
import { periodOf } from '../../../model/study/steady.ts';
import { measureTone } from '../../../model/study/tone.ts';
import { designOf, variantOf } from '../../support/designs.ts';

/** Square law behind a resistor that barely loads it: the drain's voltage is the source's, bent by a small square term only. */
const BENT = designOf(variantOf({ seriesOhm: 1 }, {}, { source: 'fixed', controlV: -0.75 }));
const SIZE = 8192;

/** Amplitudes of the lines at multiples of the common frequency. */
function lines(tones: readonly [multiple: number, peakV: number][], commonHz: number): (multiple: number) => number {
  const audio = Float64Array.from({ length: SIZE }, (_, i) =>
    tones.reduce((sum, [multiple, peak]) => sum + peak * Math.cos((2 * Math.PI * multiple * (i + 1)) / SIZE), 0),
  );
  const cell = createCell(forReadings(cellNumbers(BENT, 0, 0)), 1 / (commonHz * SIZE));
  const { output } = periodOf(cell, audio, new Float64Array(SIZE).fill(-0.75));
  const { real, imaginary } = harmonicsOf(output, 400);
  return (multiple) => Math.hypot(real[multiple - 1], imaginary[multiple - 1]);
}

test('19 + 20 kHz of equal level on a square term: the difference-frequency distortion d2 is half of HD2 at the same peak level', () => {
  const peakV = 0.02;
  const at = lines(
    [
      [19, peakV / 2],
      [20, peakV / 2],
    ],
    1000,
  );
  const d2 = at(1) / (2 * at(20));
  const { harmonics, fundamentalV } = measureTone(BENT, 0, { toneV: peakV, toneHz: 1000 });
  expect(d2 / (harmonics[1].amplitudeV / fundamentalV)).toBeCloseTo(0.5, 2);
});

test('60 Hz + 7 kHz at 4:1 on a square term: the second-order sidebands are 3.2 times HD2 at the same peak level (SMPTE RP 120)', () => {
  const peakV = 0.02;
  const at = lines(
    [
      [3, 0.8 * peakV],
      [350, 0.2 * peakV],
    ],
    20,
  );
  const second = (at(347) + at(353)) / at(350);
  const { harmonics, fundamentalV } = measureTone(BENT, 0, { toneV: peakV, toneHz: 1000 });
  expect(second / (harmonics[1].amplitudeV / fundamentalV)).toBeCloseTo(3.2, 1);
});
