/**
 * Kinks of the memoryless cell, where an end of the channel comes on or goes off, against its exact waveform (support/staticCell.ts). Errors are those of
 * the band from 0 to 20 kHz, dB re the exact fundamental at the output.
 */
import { expect, test } from 'vitest';
import { drainPeriod } from '../../support/staticCell.ts';
import { designOf, variantOf } from '../../support/designs.ts';
import { filtersOf, harmonicsOf, inBandError, RATE_HZ, renderTone, SIZE, sizeOf } from '../../support/inBand.ts';

/** 996, 5004 and 9012 Hz. */
const BINS = [85, 427, 769];

function errors(factor: 2 | 4 | 8 | 16, gateV: number, k: number, toneV: number, bin: number) {
  const feedback = k > 0 ? ({ kind: 'buffered', fraction: k } as const) : ({ kind: 'none' } as const);
  const design = designOf(variantOf({ feedback }, {}, { source: 'fixed', controlV: gateV }), { oversampling: factor });
  const filters = filtersOf(factor, 'linearPhase');
  const exact = harmonicsOf(drainPeriod(toneV * sizeOf(filters.up((bin * RATE_HZ) / SIZE)), gateV, k));
  const of = (corrected: boolean) => inBandError(renderTone(design, bin, toneV, 'linearPhase', corrected), bin, exact, filters);
  return { plain: of(false).errorDb, corrected: of(true).errorDb };
}

for (const factor of [2, 4, 8, 16] as const) {
  test(`×${factor}: a render with its kinks corrected is nowhere further from the exact waveform, by 0.1 dB, than one without`, {
    timeout: 60000,
  }, () => {
    for (const [gateV, tonesV] of [
      [-1.4, [0.5, 1, 2]],
      [-1.2, [2]],
    ] as const) {
      for (const k of [0, 0.5, 0.505]) {
        for (const toneV of tonesV) {
          for (const bin of BINS) {
            const { plain, corrected } = errors(factor, gateV, k, toneV, bin);
            expect(corrected, `${gateV} V, k ${k}, ${toneV} V, bin ${bin}`).toBeLessThan(plain + 0.1);
          }
        }
      }
    }
  });
}

/** Least gain over the uncorrected render at VGS −1.4 V, k 0, 1 V peak, at 1, 5 and 9 kHz, and the error itself; dB. */
test.each([
  [2, [25, 20, 16], [-104, -70, -56]],
  [4, [30, 26, 20], [-125, -91, -76]],
  [8, [33, 29, 25], [-145, -109, -95]],
  [16, [28, 32, 29], [-156, -128, -115]],
] as const)('×%i: what the correction takes away', (factor, gained, left) => {
  BINS.forEach((bin, i) => {
    const { plain, corrected } = errors(factor, -1.4, 0, 1, bin);
    expect(plain - corrected).toBeGreaterThan(gained[i]);
    expect(corrected).toBeLessThan(left[i]);
  });
});
