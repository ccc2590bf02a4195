/** What a design with a follower does to tones and programme, read off the running chain. Rates and levels: 48 kHz, dB re full scale (peak). */
import { createChain, processChain } from '../../model/chain/chain.ts';
import { compileChain } from '../../model/chain/compile.ts';
import type { Design } from '../../model/design/types.ts';
import { smallSignal } from '../../model/study/response.ts';

export const RATE_HZ = 48000;
/** Samples between two looks at the control. */
const LOOK = 16;

export interface Run {
  readonly output: Float32Array;
  /** Control voltage after each 16 samples. */
  readonly controlV: readonly number[];
  readonly latencySec: number;
  readonly faults: number;
}

export function runChain(design: Design, index: number, channels: readonly Float32Array[], oversampling: 1 | 2 | 4 = 2): Run {
  const chain = createChain(compileChain({ ...design, oversampling }, index, RATE_HZ, channels.length, 'lowLatency'));
  const outputs = channels.map((samples) => new Float32Array(samples.length));
  const controlV: number[] = [];
  for (let at = 0; at < outputs[0].length; at += LOOK) {
    const piece = (samples: Float32Array) => samples.subarray(at, at + LOOK);
    processChain(chain, channels.map(piece), outputs.map(piece));
    controlV.push(chain.readings.controlV);
  }
  return { output: outputs[0], controlV, latencySec: chain.latencySamples / RATE_HZ, faults: chain.readings.faults };
}

/** The control voltage `sec` after the start. */
export const controlAt = ({ controlV }: Run, sec: number) => controlV[Math.round((sec * RATE_HZ) / LOOK) - 1];

/** A tone whose level changes at the given times. */
export function tone(toneHz: number, ...stretches: readonly (readonly [levelDb: number, sec: number])[]): Float32Array {
  const levels = stretches.flatMap(([levelDb, sec]) => new Array<number>(Math.round(sec * RATE_HZ)).fill(10 ** (levelDb / 20)));
  return Float32Array.from(levels, (level, n) => level * Math.sin((2 * Math.PI * toneHz * n) / RATE_HZ));
}

/** Amplitudes of harmonics 1 … 9 in a tenth of a second that ends at `endSec`; the tone is a multiple of 10 Hz. */
function harmonicsAt(output: Float32Array, toneHz: number, endSec: number): number[] {
  const end = Math.round(endSec * RATE_HZ);
  const from = end - RATE_HZ / 10;
  return Array.from({ length: 9 }, (_, k) => {
    let re = 0;
    let im = 0;
    for (let n = from; n < end; n++) {
      const angle = (2 * Math.PI * toneHz * (k + 1) * n) / RATE_HZ;
      re += output[n] * Math.cos(angle);
      im += output[n] * Math.sin(angle);
    }
    return (2 * Math.hypot(re, im)) / (RATE_HZ / 10);
  });
}

/** Gain of the fundamental and harmonics over it, in the steady state of a tone. */
export function steadyAt(design: Design, index: number, levelDb: number, toneHz = 1000, sec = 1): { gainDb: number; thd: number } {
  const { output } = runChain(design, index, [tone(toneHz, [levelDb, sec])]);
  const [fundamental, ...above] = harmonicsAt(output, toneHz, sec);
  return { gainDb: 20 * Math.log10(fundamental) - levelDb, thd: Math.hypot(...above) / fundamental };
}

const QUIET_DB = -60;

/** How far the gain at a level stands below that of a quiet tone, dB, and the harmonics there. */
export function reductionAt(design: Design, index: number, levelDb: number, toneHz = 1000): { reductionDb: number; thd: number } {
  const { gainDb, thd } = steadyAt(design, index, levelDb, toneHz);
  return { reductionDb: steadyAt(design, index, QUIET_DB, toneHz, 0.3).gainDb - gainDb, thd };
}

/** A 10 dB step of a 4 kHz tone from −16 dB up and back: the change of gain, and how long 63 % of it (in dB) take. */
export function stepTimes(design: Design, index: number): { changeDb: number; attackSec: number; releaseSec: number; overshootDb: number } {
  const toneHz = 4000;
  const upSec = 1;
  const downSec = 2.5;
  const run = runChain(design, index, [tone(toneHz, [-16, upSec], [-6, downSec - upSec], [-16, 1.5])]);
  const gains = gainsOf(run.output, toneHz, (sec) => (sec < upSec || sec >= downSec ? -16 : -6), run.latencySec);
  const at = (sec: number) => gains[Math.round(sec * toneHz)];
  const [low, high] = [at(upSec - 0.01), at(downSec - 0.01)];
  const reach = (fromSec: number, from: number, to: number) => {
    const aim = from + 0.63 * (to - from);
    const start = Math.round((fromSec + 0.001) * toneHz);
    return (gains.slice(start).findIndex((gain) => (gain - aim) * (to - from) >= 0) + start) / toneHz - fromSec;
  };
  const least = Math.min(...gains.slice(Math.round((upSec + 0.001) * toneHz), Math.round((downSec - 0.01) * toneHz)));
  return {
    changeDb: low - high,
    attackSec: reach(upSec, low, high),
    releaseSec: reach(downSec, high, low),
    overshootDb: high - least,
  };
}

/** Gain of a tone over each of its periods, dB, the chain's delay taken off. */
function gainsOf(output: Float32Array, toneHz: number, levelDbAt: (sec: number) => number, latencySec: number): number[] {
  const period = RATE_HZ / toneHz;
  const delay = Math.round(latencySec * RATE_HZ);
  return Array.from({ length: Math.floor((output.length - delay) / period) }, (_, k) => {
    let re = 0;
    let im = 0;
    for (let i = 0; i < period; i++) {
      re += output[delay + k * period + i] * Math.cos((2 * Math.PI * i) / period);
      im += output[delay + k * period + i] * Math.sin((2 * Math.PI * i) / period);
    }
    return 20 * Math.log10((2 * Math.hypot(re, im)) / period) - levelDbAt((k + 0.5) / toneHz);
  });
}

/** Small-signal gain at rest less that at the control's farthest excursion over a phrase, dB, and blocks with a fault. */
export function programmeReduction(
  design: Design,
  index: number,
  phrase: readonly Float32Array[],
): { reductionDb: number; faults: number } {
  const { control } = design.variants[index];
  if (control.source !== 'envelope') throw new Error('not an envelope');
  const { controlV, faults } = runChain(design, index, phrase);
  const farthest = controlV.reduce((far, volts) => (Math.abs(volts - control.restV) > Math.abs(far - control.restV) ? volts : far));
  const gainAt = (volts: number) => smallSignal(design, index, { controlV: volts, frequenciesHz: [1000] }).points[0].audio.db ?? -300;
  return { reductionDb: gainAt(control.restV) - gainAt(farthest), faults };
}
