/** The part of a clip that goes round, so that its end runs into its beginning without a click. */
import type { Clip } from './clip.ts';

export interface Region {
  readonly fromSec: number;
  readonly toSec: number;
}

const JOIN_SEC = 0.01;

/**
 * A clip that is played round and round.
 *
 * Law      over the last 10 ms the region fades into the 10 ms before its beginning, by halves of a raised cosine that add up to one, so that its last
 *          sample is followed by the one that follows it in the clip. Where the clip begins with the region nothing lies before it: the end then fades
 *          to silence and the beginning from it. A loop whose jump is no greater than the steps beside it has no click and is left to the bit
 * Valid    a region inside the clip, at least two frames long; null is the whole
 */
export function loopOf(clip: Clip, region: Region | null): Clip {
  const { sampleRateHz, channels } = clip;
  const from = region === null ? 0 : Math.round(region.fromSec * sampleRateHz);
  const to = region === null ? channels[0].length : Math.min(channels[0].length, Math.round(region.toSec * sampleRateHz));
  const join = Math.min(Math.round(JOIN_SEC * sampleRateHz), Math.floor((to - from) / 2));
  const clicks = channels.some((samples) => jumps(samples, from, to, join));
  if (!clicks && region === null) return clip;
  const lines = channels.map((samples) => {
    const line = samples.slice(from, to);
    if (clicks && from >= join) fadeInto(line, samples.subarray(from - join, from));
    else if (clicks) fadeEnds(line, join);
    return line;
  });
  return { ...clip, channels: lines };
}

/** Whether the step from the last sample to the first is greater than every step within `beside` frames of either. */
function jumps(samples: Float32Array, from: number, to: number, beside: number): boolean {
  let most = 0;
  for (let n = 1; n <= beside && n < to - from; n++) {
    const early = Math.abs(samples[from + n] - samples[from + n - 1]);
    const late = Math.abs(samples[to - n] - samples[to - n - 1]);
    most = Math.max(most, early, late);
  }
  return Math.abs(samples[from] - samples[to - 1]) > most;
}

function fadeInto(line: Float32Array, before: Float32Array): void {
  const start = line.length - before.length;
  for (let n = 0; n < before.length; n++) {
    const weight = raised((n + 1) / before.length);
    line[start + n] = (1 - weight) * line[start + n] + weight * before[n];
  }
}

function fadeEnds(line: Float32Array, frames: number): void {
  for (let n = 0; n < frames; n++) {
    const weight = raised(n / frames);
    line[n] *= weight;
    line[line.length - 1 - n] *= weight;
  }
}

/** From 0 to 1 over 0 to 1. */
function raised(fraction: number): number {
  return 0.5 - 0.5 * Math.cos(Math.PI * fraction);
}
