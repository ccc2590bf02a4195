/**
 * The ohmic cell through a whole chain against an answer computed apart from the model. Figures are the root of the sum of squares of whatever differs from
 * it between 0 and 20 kHz, relative to the exact fundamental at the output; the filters' own response, whose flatness is tested with them, is taken
 * out (support/inBand.ts), so that what is left is the cell's and what the filters let through or fold.
 */
import { expect, test } from 'vitest';
import type { FilterSet } from '../../../model/chain/halfband.ts';
import { boardPeriod } from '../../support/dynamicCell.ts';
import { designOf, variantOf } from '../../support/designs.ts';
import { filtersOf, harmonicsOf, inBandError, RATE_HZ, renderTone, SIZE, sizeOf } from '../../support/inBand.ts';
import { drainPeriod } from '../../support/staticCell.ts';

const TONE_V = 0.5;
/** 996 and 5004 Hz. */
const AT = [
  [4, 85],
  [8, 427],
] as const;
/** The bar is −135 and −114 dB. A load of 1 nF makes a pole at 32 kHz, which backward differences follow less closely than that of picofarads. */
const BOARDS = [
  [-1.5, 5e-12, 5e-12, 1e-10, { 4: -160, 8: -135 }],
  [-2.4, 5e-12, 5e-12, 1e-10, { 4: -160, 8: -130 }],
  [-2.4, 4e-12, 1e-12, 1e-9, { 4: -148, 8: -112 }],
] as const;
const SETS: readonly FilterSet[] = ['linearPhase', 'lowLatency'];

for (const filters of SETS) {
  for (const [factor, bin] of AT) {
    const hz = (bin * RATE_HZ) / SIZE;
    const of = filtersOf(factor, filters);
    const raisedV = TONE_V * sizeOf(of.up(hz));

    // The memoryless cell errs by what the filters' stop band of 115 dB leaves of images, twice filtered.
    test.each([
      [-0.75, 0],
      [-0.75, 0.5],
      [-1.2, 0],
      [-1.2, 0.505],
    ])(`${filters}, ${hz.toFixed(0)} Hz at ×${factor}: memoryless at VGS %s V, k %s: the exact waveform within −150 dB`, (gateV, k) => {
      const feedback = k > 0 ? ({ kind: 'buffered', fraction: k } as const) : ({ kind: 'none' } as const);
      const design = designOf(variantOf({ feedback }, {}, { source: 'fixed', controlV: gateV }), { oversampling: factor });
      const exact = harmonicsOf(drainPeriod(raisedV, gateV, k));
      expect(inBandError(renderTone(design, bin, TONE_V, filters), bin, exact, of).errorDb).toBeLessThan(-150);
    });

    test.each(BOARDS)(
      `${filters}, ${hz.toFixed(0)} Hz at ×${factor}: control %s V, 470 kΩ pair, gate %s F and %s F, load %s F: within its bound`,
      (controlV, gateSourceF, gateDrainF, loadF, bounds) => {
        const board = { feedbackOhm: 470e3, gateSourceF, gateDrainF, loadF };
        const cell = { loadF, controlOhm: 470e3, feedback: { kind: 'resistor', drainOhm: 470e3, blockingF: null } } as const;
        const variant = variantOf(cell, { gateSourceF, gateDrainF }, { source: 'fixed', controlV });
        const exact = harmonicsOf(boardPeriod(board, hz, raisedV, controlV));
        const output = renderTone(designOf(variant, { oversampling: factor }), bin, TONE_V, filters);
        expect(inBandError(output, bin, exact, of).errorDb).toBeLessThan(bounds[factor]);
      },
    );
  }
}
