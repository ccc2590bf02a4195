import { SAMPLE_RATE_HZ } from './loop.ts';
import { createMode, type Mode, setDecay, turn } from './mode.ts';
import type { Random } from './random.ts';

/**
 * A struck tine before a magnetic pickup: the sound of one key of an electric piano.
 *
 * Law     a clamped rod with a tuning weight swings in decaying modes, f1 and about 7·f1 (a bare rod: 6.27·f1; from memory),
 *         pushed by the blow of a hammer; the pickup gives d/dt of the flux Φ(u) = (1 + u²)^(−3/2), u = offset + swing
 * Scheme  each mode a rotating and shrinking phasor at twice the sample rate, then a windowed-sinc decimator
 */
export interface Key {
  hz: number;
  /** 0…1. */
  velocity: number;
  holdSec: number;
}

const OVER = 2;
const FAST_HZ = SAMPLE_RATE_HZ * OVER;
/** Where the tine rests beside the pickup's axis, in widths of its field; off the axis the even harmonics come in. */
const OFFSET = 0.42;

/** The key from blow to silence, sampled at SAMPLE_RATE_HZ, its fundamental near 1 at a hard blow. */
export function renderKey({ hz, velocity, holdSec }: Key, random: Random): Float64Array {
  const parts = createParts(hz, velocity, random);
  const blow = hammerBlow(hz, velocity);
  const releaseSec = 0.045 + 4 / hz;
  const length = Math.round((holdSec + 9 * releaseSec) * FAST_HZ);
  const hold = Math.round(holdSec * FAST_HZ);
  const output = new Float64Array(length);
  let flux = fluxAt(OFFSET);
  for (let n = 0; n < length; n++) {
    if (n === hold) for (const { mode } of parts) setDecay(mode, releaseSec, FAST_HZ);
    let swing = OFFSET;
    for (const { mode, reach } of parts) swing += turn(mode, n < blow.length ? reach * blow[n] : 0);
    const now = fluxAt(swing);
    output[n] = ((flux - now) * FAST_HZ) / (2 * Math.PI * hz);
    flux = now;
  }
  return decimate(output);
}

interface Part {
  mode: Mode;
  /** Swing at the pickup for a blow much shorter than the mode's period, in widths of the pickup's field. */
  reach: number;
}

function createParts(hz: number, velocity: number, random: Random): Part[] {
  const pitch = hz / 131;
  const reach = (0.12 + 0.95 * velocity ** 1.5) * pitch ** -0.18;
  const jitter = 1 + 0.02 * random.bipolar();
  const parts = [
    { hz, decaySec: 2.1 * pitch ** -0.55, reach },
    { hz: hz * 1.0021, decaySec: 0.5 * pitch ** -0.4, reach: reach * 0.14 },
    { hz: hz * 7.1 * jitter, decaySec: 0.32 * pitch ** -0.55, reach: reach * 0.38 },
    { hz: hz * 19.4 * jitter, decaySec: 0.07 * pitch ** -0.4, reach: reach * 0.16 },
  ];
  const heard = parts.filter((part) => part.hz < 18_000);
  return heard.map((part) => ({ mode: createMode(part.hz, part.decaySec, FAST_HZ), reach: part.reach }));
}

/** A blow of unit area that rises at once and dies softly (t·e^(−t/τ)): shorter, so brighter, for a harder blow and a higher key. */
function hammerBlow(hz: number, velocity: number): Float64Array {
  const tau = (0.00085 - 0.0004 * velocity) * (hz / 131) ** -0.45 * FAST_HZ;
  return Float64Array.from({ length: Math.round(14 * tau) }, (_, n) => (n / (tau * tau)) * Math.exp(-n / tau));
}

function fluxAt(u: number): number {
  const square = 1 + u * u;
  return 1 / (square * Math.sqrt(square));
}

/** Keeps every second sample behind a Blackman-windowed sinc with its corner at 20 kHz. */
function decimate(fast: Float64Array): Float64Array {
  const half = 32;
  const taps = Float64Array.from({ length: 2 * half + 1 }, (_, index) => {
    const x = index - half;
    const sinc = x === 0 ? 40_000 / FAST_HZ : Math.sin((2 * Math.PI * 20_000 * x) / FAST_HZ) / (Math.PI * x);
    const phase = (Math.PI * (x + half)) / half;
    return sinc * (0.42 - 0.5 * Math.cos(phase) + 0.08 * Math.cos(2 * phase));
  });
  return Float64Array.from({ length: Math.floor(fast.length / OVER) }, (_, index) => {
    let sum = 0;
    for (let k = -half; k <= half; k++) sum += taps[k + half] * (fast[index * OVER - k] ?? 0);
    return sum;
  });
}
