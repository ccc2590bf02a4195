import { expect, test } from 'vitest';
import { defaultDesign } from '../../../model/design/defaults.ts';
import type { Design } from '../../../model/design/types.ts';
import { channelCurves, tonePath } from '../../../model/study/transfer.ts';

/** The square law with 3 mA and ∓1.5 V: β = 3 mA / 2.25 V². */
const BETA = 3e-3 / 2.25;

function squareDesign(channel: 'n' | 'p', more: Partial<Design['variants'][0]['cell']> = {}): Design {
  const design = defaultDesign();
  const [variant] = design.variants;
  const { device } = variant;
  const junction = { ...device.junction, reverseA: 0, leakageS: 0 };
  const gateOffV = channel === 'n' ? -1.5 : 1.5;
  const square = {
    ...device,
    law: 'square',
    channel,
    idssA: 3e-3,
    gateOffV,
    lambdaPerV: 0,
    readAtC: design.tempC,
    junction,
    gateSourceF: 0,
    gateDrainF: 0,
  } as const;
  const cell = { ...variant.cell, sourceOhm: 0, seriesOhm: 10e3, loadOhm: 1e6, loadF: 0, ...more };
  return { ...design, variants: [{ ...variant, device: square, cell }] };
}

test('the curves of the square law are those worked by hand, for either channel', () => {
  // 0.5 V above VGS(off) and VDS = 0.1 V: β·(0.5² − 0.4²) = β·0.09; 0.1 V above and 0.3 V: saturated, β·0.1².
  for (const [channel, sign] of [
    ['n', 1],
    ['p', -1],
  ] as const) {
    const { currentA, edgeA, gateThroughV } = channelCurves(squareDesign(channel), 0);
    expect(currentA(sign * -1, sign * 0.1)).toBeCloseTo(sign * BETA * 0.09, 12);
    expect(currentA(sign * -1.4, sign * 0.3)).toBeCloseTo(sign * BETA * 0.01, 12);
    expect(edgeA(0.3)).toBeCloseTo(BETA * 0.09, 12);
    expect(edgeA(-0.3)).toBeCloseTo(-BETA * 0.09, 12);
    expect(gateThroughV(sign * 0.1, sign * BETA * 0.09)).toBeCloseTo(sign * -1, 9);
    expect(gateThroughV(sign * 0.1, 1)).toBeCloseTo(0, 9);
  }
});

test('beyond the knee, channel-length modulation raises the current by λ·(VDS − the knee)', () => {
  const design = squareDesign('n');
  const [variant] = design.variants;
  const bent = { ...design, variants: [{ ...variant, device: { ...variant.device, lambdaPerV: 0.05 } }] };
  // 0.5 V above VGS(off) at VDS = 2.5 V: β·0.25·(1 + 0.05·2).
  expect(channelCurves(bent, 0).currentA(-1, 2.5)).toBeCloseTo(BETA * 0.25 * 1.1, 12);
});

test('every point of the path obeys Ohm’s law in R1 and the load, and lies on the curve of its gate where there is no feedback', () => {
  const design = squareDesign('n', { feedback: { kind: 'none' }, driverOhm: 0 });
  const { drainSourceV, drainA } = tonePath(design, 0, { toneV: 0.5, gateV: -1.2 });
  const { currentA } = channelCurves(design, 0);
  expect(drainSourceV).toHaveLength(257);
  drainSourceV.forEach((v, n) => {
    const inputV = 0.5 * Math.cos((2 * Math.PI * n) / 256);
    expect(Math.abs((inputV - v) / 10e3 - v / 1e6 - drainA[n])).toBeLessThan(1e-12);
    expect(Math.abs(currentA(-1.2, v) - drainA[n])).toBeLessThan(1e-9);
  });
});
