/**
 * Three renders that must come out bit for bit alike wherever they are made: each law, LFO and loop, junctions in conduction, λ, real amplifier,
 * sampled noise. Nothing here uses the engine's own transcendentals. test/reference/renders.json holds the SHA-256 of the files.
 */
import { renderClip } from '../../model/chain/render.ts';
import { writeWav } from '../../model/chain/wav.ts';
import type { Control, Design } from '../../model/design/types.ts';
import { sinTurns } from '../../model/device/math.ts';
import { createGaussian, putGaussians } from '../../model/device/random.ts';
import { designOf, REAL_CELL, REAL_DEVICE, variantOf } from './designs.ts';

const LOOP: Control = {
  source: 'envelope',
  senses: 'output',
  rectifier: 'full',
  attackOhm: 1000,
  releaseOhm: 100000,
  timingF: 1e-6,
  thresholdV: 0.02,
  gainVPerV: 8,
  restV: -1.5,
  limitV: 0.2,
  linked: true,
};
const TREMOLO: Control = { source: 'lfo', shape: 'sine', rateHz: 5, fromV: 0.4, toV: -1.8, edgeSec: 0.01 };
const NOISE = { noise: { kind: 'thermal', seed: 7 } } as const;
const AMPLIFIER = { gainDb: 12, gainBandwidthHz: 1e6, slewVPerSec: 5e5, swingV: 3 };

const RENDERS: Readonly<Record<string, { design: () => Design; rateHz: number; channels: 1 | 2 }>> = {
  'square law, loop, noise, real amplifier': {
    design: () => designOf({ ...variantOf(REAL_CELL, { ...REAL_DEVICE, lambdaPerV: 0.02 }, LOOP), output: AMPLIFIER }, NOISE),
    rateHz: 48000,
    channels: 2,
  },
  'gradual channel, tremolo, noise, p-channel': {
    design: () =>
      designOf(
        variantOf(
          { ...REAL_CELL, feedback: { kind: 'buffered', fraction: 0.49 } },
          { ...REAL_DEVICE, law: 'gradual', channel: 'p', gateOffV: 1.5, grading: 0.5 },
          { ...TREMOLO, fromV: -0.4, toV: 1.8 },
        ),
        { ...NOISE, oversampling: 4 },
      ),
    rateHz: 44100,
    channels: 1,
  },
  'smooth law, loop, noise, output coupling': {
    design: () =>
      designOf(variantOf({ ...REAL_CELL, outputCouplingF: 1e-6 }, { ...REAL_DEVICE, law: 'smooth', exponent: 2.1 }, LOOP), NOISE),
    rateHz: 96000,
    channels: 1,
  },
};

export const RENDER_NAMES = Object.keys(RENDERS);

/** The bytes of one of them, 24-bit. */
export function renderNamed(name: string): Uint8Array<ArrayBuffer> {
  const { design, rateHz, channels } = RENDERS[name];
  const length = Math.round(rateHz / 3);
  const clip = Array.from({ length: channels }, (_, channel) => {
    const gaussian = createGaussian(channel + 1);
    const noise = new Float64Array(length);
    putGaussians(gaussian, noise, 0, length);
    return Float32Array.from(noise, (value, n) => (0.3 * value + sinTurns((220 * n) / rateHz)) * (n / length));
  });
  return writeWav(renderClip(design(), 0, clip, rateHz), rateHz, 'pcm24').bytes;
}

/** SHA-256 in hexadecimal, by what every one of our engines has. */
export async function sha256(bytes: Uint8Array<ArrayBuffer>): Promise<string> {
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', bytes));
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('');
}
