import { describe, expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import type { Variant } from '../../../model/design/types.ts';
import type { ToneReading } from '../../../model/study/tone.ts';
import { levelNodes, levelText } from '../../../web/draw/levelRows.ts';
import type { LiveLevels } from '../../../web/state/bench.ts';

/**
 * By hand. Full scale 2 V, tone 0.2 V peak. VGS −1.0 V against VGS(off) −1.5 V with k = 0.25: the drain end pinches off where VGD = −1.5, so at
 * −1.0 + 0.25·v − v = −1.5, v = 0.667 V. At the drain the tone is 0.1 V, music peaks at 0.3 V, noise is 1 μV rms. Make-up 20 dB, rail 1.5 V:
 * tone 1.0 V, noise 10 μV rms. Listening level −6.02 dB (a half), ceiling −12.04 dBFS (a quarter of 2 V: 0.5 V).
 */
const [first] = defaultDesign().variants;
const variant: Variant = {
  ...first,
  cell: { ...first.cell, feedback: { kind: 'buffered', fraction: 0.25 } },
  output: { ...first.output, gainDb: 20, swingV: 1.5 },
};
const parts = {
  variant,
  fullScaleV: 2,
  toneV: 0.2,
  reading: { vgsV: -1, fundamentalV: 0.1 } as ToneReading,
  live: { inputPeakV: 0.5, drainPeakV: 0.3, outputPeakDbfs: -3.0103, heardPeakDbfs: -18.0618 } as LiveLevels,
  noiseRmsV: 1e-6,
  gateOffV: -1.5,
  listenDb: -6.0206,
  ceilingDbfs: -12.0412,
};
const close = (found: number | null, expected: number) => expect(found ?? Number.NaN).toBeCloseTo(expected, 4);

describe('levels of a case worked by hand', () => {
  const [input, drain, output, heard] = levelNodes(parts);

  test('nominal, peak and noise at each point', () => {
    for (const [node, volts] of [
      [input, [0.2, 0.5]],
      [drain, [0.1, 0.3]],
      [output, [1, Math.SQRT2]],
      [heard, [0.5, 0.25]],
    ] as const) {
      close(node.nominalV, volts[0]);
      close(node.peakV, volts[1]);
    }
    expect(input.noiseV).toBeNull();
    expect(levelText(drain.noiseV, 'V', 2, true)).toBe('1\u2009μV');
    expect(levelText(output.noiseV, 'V', 2, true)).toBe('10\u2009μV');
    // 10 μV re 0.7746 V rms; re a sine that reaches 2 V, 1.414 V rms.
    expect(levelText(output.noiseV, 'dBu', 2, true)).toBe('−97.8');
    expect(levelText(output.noiseV, 'dBFS', 2, true)).toBe('−103.0');
  });

  test('the clip level and the margin of the peak to it', () => {
    close(input.marginDb, 12.0412);
    close(drain.clipV, 2 / 3);
    close(drain.marginDb, 6.9357);
    close(output.clipV, 1.5);
    // √2 to 1.5 V.
    close(output.marginDb, 0.5115);
    close(heard.clipV, 0.5);
    close(heard.marginDb, 6.0206);
  });

  test('in dBu and dBFS: 0.2 V peak is 0.1414 V rms, a tenth of full scale', () => {
    expect(levelText(input.nominalV, 'dBu', 2)).toBe('−14.8');
    expect(levelText(input.nominalV, 'dBFS', 2)).toBe('−20.0');
    expect(levelText(input.nominalV, 'V', 2)).toBe('200\u2009mV');
    expect(levelText(0, 'dBu', 2)).toBe('−∞');
    expect(levelText(null, 'V', 2)).toBe('');
  });
});

test('while no sound plays the margin is that of the tone; cut off, the drain has none', () => {
  const [input, drain] = levelNodes({ ...parts, live: null, reading: { vgsV: -1.6, fundamentalV: 0.19 } as ToneReading });
  close(input.marginDb, 20);
  expect(drain.clipV).toBeNull();
  expect(drain.marginDb).toBeNull();
});

test('a p-channel part pinches off at the same size, and without a rail the output clips at full scale', () => {
  const p = { ...variant, device: { ...variant.device, channel: 'p' as const }, output: { ...variant.output, swingV: null } };
  const [, drain, output] = levelNodes({ ...parts, variant: p, reading: { ...parts.reading, vgsV: 1 }, gateOffV: 1.5 });
  close(drain.clipV, 2 / 3);
  close(output.clipV, 2);
  expect(output.clipsBy).toBe('full scale');
});
