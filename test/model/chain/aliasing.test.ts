import FFT from 'fft.js';
import { expect, test } from 'vitest';
import { renderClip } from '../../../model/chain/render.ts';
import { designOf, variantOf } from '../../support/designs.ts';

const SIZE = 65536;
const RATE_HZ = 48000;

/** The largest component from 5 Hz to 20 kHz that is no harmonic of the tone, dB re the fundamental. */
function folded(controlV: number, k: number, oversampling: 4 | 8 | 16, law: 'square' | 'gradual'): number {
  const bin = 12287;
  const tone = Float32Array.from({ length: SIZE + 8192 }, (_, n) => Math.cos((2 * Math.PI * bin * n) / SIZE));
  const feedback = k > 0 ? ({ kind: 'buffered', fraction: k } as const) : ({ kind: 'none' } as const);
  const design = designOf(variantOf({ feedback }, { law }, { source: 'fixed', controlV }), { oversampling });
  const [output] = renderClip(design, 0, [tone], RATE_HZ);
  const fft = new FFT(SIZE);
  const bins: number[] = fft.createComplexArray();
  fft.realTransform(bins, Array.from(output.subarray(4096, 4096 + SIZE)));
  const size = (n: number) => Math.hypot(bins[2 * n], bins[2 * n + 1]);
  let worst = 0;
  for (let n = 7; n < (20000 * SIZE) / RATE_HZ; n++)
    if (Math.abs(n - bin) > 1 && Math.abs(n - 2 * bin) > 1) worst = Math.max(worst, size(n));
  return 20 * Math.log10(worst / size(bin));
}

test.each([
  ['square', -1.4, 0, -100],
  ['square', -1.4, 0.5, -100],
  ['square', -1.2, 0, -140],
  ['gradual', -1.4, 0, -90],
] as const)('%s law, VGS %s V, k %s, 9 kHz at 1 V peak, ×8: what folds into the band is under %s dB', (law, controlV, k, bound) => {
  expect(folded(controlV, k, 8, law)).toBeLessThan(bound);
});

test('each doubling of the oversampling folds at least 10 dB less', () => {
  expect(folded(-1.4, 0, 16, 'square')).toBeLessThan(folded(-1.4, 0, 8, 'square') - 10);
  expect(folded(-1.4, 0, 8, 'square')).toBeLessThan(folded(-1.4, 0, 4, 'square') - 10);
});
