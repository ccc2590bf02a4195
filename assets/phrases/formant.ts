import { filter, highpass, lowpass, bandpass, SAMPLE_RATE_HZ } from './loop.ts';
import type { Random } from './random.ts';

/**
 * A voice by formant synthesis: a glottal tone with vibrato and breath through nine resonances in a row, and hiss beside it.
 *
 * Law     the tone is a band-limited sawtooth (flow through the glottis falls by 12 dB an octave, radiation gives 6 back) dulled by a pole that a
 *         louder voice opens; a resonance is y = A·x + B·y[−1] + C·y[−2], unity at 0 Hz
 * Scheme  stretches of constant targets, each followed by its parameters at their own pace
 * Source  D. Klatt, «Software for a cascade/parallel formant synthesizer», J. Acoust. Soc. Am. 67 (1980) 971; from memory
 */
export interface Stretch {
  fromSec: number;
  /** Loudness of the tone and of the breath in it, 0…1. */
  voice: number;
  breath: number;
  /** Time constant in which the tone follows, s. */
  paceSec: number;
  /** Hiss before the teeth, and of the tongue farther back. */
  bright: number;
  dark: number;
  /** MIDI number. */
  note: number;
  vibrato: boolean;
  formantsHz: number[];
}

/** Of the lower resonances, then of the upper ones, which stay where they are. */
const WIDTHS_HZ = [75, 95, 130, 190, 260, 350, 450, 600, 800];
const UPPER_HZ = [5700, 6900, 8200, 9700];
const TOP_HZ = 14_000;
/** Time constants, s. */
const BREATH_SEC = 0.012;
const HISS_SEC = 0.004;
const FORMANT_SEC = 0.02;
const PITCH_SEC = 0.024;
const VIBRATO_IN_SEC = 0.3;
const VIBRATO_OUT_SEC = 0.04;
const VIBRATO_HZ = 5.4;
const VIBRATO_CENTS = 42;
const DRIFT_CENTS = 9;
/** Samples between two settings of the resonances. */
const EVERY = 16;

const approach = (sec: number) => 1 - Math.exp(-1 / (sec * SAMPLE_RATE_HZ));

/** Stretches in order of time, the first from 0 s; silence before and after. */
export function sing(stretches: Stretch[], lengthSec: number, random: Random): Float64Array {
  const length = Math.round(lengthSec * SAMPLE_RATE_HZ);
  const output = new Float64Array(length);
  const noise = Float64Array.from(output, () => random.bipolar());
  const bright = filter(noise, highpass(4800, 0.8), highpass(3600, 0.7), lowpass(10_500, 0.6));
  const dark = filter(noise, bandpass(1900, 1.1), lowpass(5000, 0.7));
  const now = { voice: 0, breath: 0, bright: 0, dark: 0, cents: 100 * stretches[0].note, vibrato: 0, drift: 0 };
  const tract = createTract(stretches[0].formantsHz);
  let phase = 0;
  let vibratoPhase = 0;
  let dulled = 0;
  let index = 0;
  for (let n = 0; n < length; n++) {
    while (index + 1 < stretches.length && n >= stretches[index + 1].fromSec * SAMPLE_RATE_HZ) index++;
    const target = stretches[index];
    now.voice += approach(target.paceSec) * (target.voice - now.voice);
    now.breath += approach(BREATH_SEC) * (target.breath - now.breath);
    now.bright += approach(HISS_SEC) * (target.bright - now.bright);
    now.dark += approach(HISS_SEC) * (target.dark - now.dark);
    now.cents += approach(PITCH_SEC) * (100 * target.note - now.cents);
    now.vibrato += approach(target.vibrato ? VIBRATO_IN_SEC : VIBRATO_OUT_SEC) * ((target.vibrato ? VIBRATO_CENTS : 0) - now.vibrato);
    now.drift += approach(0.12) * (random.bipolar() * 80 * DRIFT_CENTS - now.drift);
    vibratoPhase += (VIBRATO_HZ * (1 + 0.004 * now.drift)) / SAMPLE_RATE_HZ;
    const swing = now.vibrato * Math.sin(2 * Math.PI * vibratoPhase);
    const hz = 440 * 2 ** ((now.cents + swing + now.drift - 6900) / 1200);
    phase = (phase + hz / SAMPLE_RATE_HZ) % 1;
    const corner = 1300 + 6500 * now.voice * now.voice;
    dulled += (1 - Math.exp((-2 * Math.PI * corner) / SAMPLE_RATE_HZ)) * (glottis(phase, hz) - dulled);
    const open = 1 - 0.6 * Math.min(1, 3 * now.voice) * (0.5 + 0.5 * Math.cos(2 * Math.PI * phase));
    if (n % EVERY === 0) moveTract(tract, target.formantsHz, 1 - Math.exp(-EVERY / (FORMANT_SEC * SAMPLE_RATE_HZ)));
    const heard = throughTract(tract, now.voice * dulled + 0.5 * now.breath * open * noise[n]);
    output[n] = heard + 6 * (now.bright * bright[n] + now.dark * dark[n]);
  }
  return output;
}

/** Σ sin(2πn·phase)/n up to TOP_HZ, the uppermost fading, by the recurrence of the sine of a multiple. */
function glottis(phase: number, hz: number): number {
  const twice = 2 * Math.cos(2 * Math.PI * phase);
  let before = 0;
  let sine = Math.sin(2 * Math.PI * phase);
  let sum = 0;
  for (let n = 1; n * hz < TOP_HZ; n++) {
    const part = (n * hz) / TOP_HZ;
    sum += (sine * (1 - part * part)) / n;
    const next = twice * sine - before;
    before = sine;
    sine = next;
  }
  return sum;
}

interface Tract {
  formantsHz: number[];
  /** A, B, C, y[−1], y[−2] of each resonance. */
  stages: number[][];
}

function createTract(formantsHz: number[]): Tract {
  const tract = { formantsHz: [...formantsHz, ...UPPER_HZ], stages: WIDTHS_HZ.map(() => [0, 0, 0, 0, 0]) };
  moveTract(tract, formantsHz, 1);
  return tract;
}

function moveTract(tract: Tract, targetsHz: number[], share: number): void {
  tract.stages.forEach((stage, index) => {
    if (index < targetsHz.length) tract.formantsHz[index] += share * (targetsHz[index] - tract.formantsHz[index]);
    const size = Math.exp((-Math.PI * WIDTHS_HZ[index]) / SAMPLE_RATE_HZ);
    stage[2] = -size * size;
    stage[1] = 2 * size * Math.cos((2 * Math.PI * tract.formantsHz[index]) / SAMPLE_RATE_HZ);
    stage[0] = 1 - stage[1] - stage[2];
  });
}

function throughTract({ stages }: Tract, input: number): number {
  let value = input;
  for (const stage of stages) {
    const y = stage[0] * value + stage[1] * stage[3] + stage[2] * stage[4];
    stage[4] = stage[3];
    stage[3] = y;
    value = y;
  }
  return value;
}
