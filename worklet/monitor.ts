/**
 * The listening side: sets the level, mutes, and keeps a ceiling.
 *
 * Law      y = g·level·mute·x;  level and mute move in straight lines
 * Ceiling  one gain g for all channels. The first sample that would pass the ceiling is itself turned down to it, so nothing ever leaves above
 *          it and no delay is added; g then recovers with a time constant of 0.2 s. The price is some distortion at the edge of
 *          an attack: `ceilingFrames` says when, and takes are recorded before it
 * Error    at rest (level 1, unmuted, below the ceiling) the output is the input, bit for bit
 * Valid    gain 0 to 1; ceiling 0.01 (−40 dBFS) to 1; any block length; finite samples
 */
import { MUTE_SEC } from './protocol.ts';

const LEVEL_SEC = 0.03;
const UNMUTE_SEC = 0.1;
const RECOVER_SEC = 0.2;

const LEVEL = 0;
const MUTE = 1;
const RAMPS = 2;

export interface Monitor {
  /** Present value, target and largest change per sample of the level and the mute. */
  readonly value: Float64Array;
  readonly target: Float64Array;
  readonly step: Float64Array;
  readonly ceiling: Float64Array;
  /** Since the caller last cleared them: peak and sum of squares that left, over all channels; frames turned down. */
  readonly totals: Float64Array;
  readonly sampleRateHz: number;
}

export const HEARD_PEAK = 0;
export const CEILING_FRAMES = 1;
export const HEARD_SQUARES = 2;

const PEAK = 0;
const GAIN = 1;

export function createMonitor(gain: number, ceilingPeak: number, muted: boolean, sampleRateHz: number): Monitor {
  const monitor: Monitor = {
    value: new Float64Array(RAMPS),
    target: new Float64Array(RAMPS),
    step: new Float64Array(RAMPS).fill(1 / (LEVEL_SEC * sampleRateHz)),
    ceiling: new Float64Array([1, 1]),
    totals: new Float64Array(3),
    sampleRateHz,
  };
  setGain(monitor, gain);
  setCeiling(monitor, ceilingPeak);
  setMuted(monitor, muted);
  monitor.value.set(monitor.target);
  return monitor;
}

export function setGain(monitor: Monitor, gain: number): void {
  if (!(gain >= 0 && gain <= 1)) throw new RangeError(`The listening gain is ${gain}; expected 0 to 1`);
  monitor.target[LEVEL] = gain;
}

/** The peak is rounded down to a Float32, so that the samples, which are Float32, cannot round up past it. */
export function setCeiling(monitor: Monitor, peak: number): void {
  if (!(peak >= 0.00999 && peak <= 1)) throw new RangeError(`The ceiling is ${peak}; expected 0.01 to 1`);
  const rounded = Math.fround(peak);
  monitor.ceiling[PEAK] = rounded > peak ? Math.fround(peak * (1 - 1.2e-7)) : rounded;
}

export function setMuted(monitor: Monitor, on: boolean): void {
  monitor.target[MUTE] = on ? 0 : 1;
  monitor.step[MUTE] = 1 / ((on ? MUTE_SEC : UNMUTE_SEC) * monitor.sampleRateHz);
}

/** In place: `lines` holds what is chosen and receives what is heard. */
export function processMonitor(monitor: Monitor, lines: readonly Float32Array[]): void {
  const { value, target, step, ceiling, totals } = monitor;
  const recover = 1 / (RECOVER_SEC * monitor.sampleRateHz);
  const limit = ceiling[PEAK];
  let gain = ceiling[GAIN];
  for (let n = 0; n < lines[0].length; n++) {
    for (let i = 0; i < RAMPS; i++) {
      const gap = target[i] - value[i];
      value[i] = Math.abs(gap) <= step[i] ? target[i] : value[i] + (gap > 0 ? step[i] : -step[i]);
    }
    const level = value[LEVEL] * value[MUTE];
    let peak = 0;
    for (let c = 0; c < lines.length; c++) {
      lines[c][n] *= level;
      // As stored: rounded to a Float32 it may be larger than it was.
      peak = Math.max(peak, Math.abs(lines[c][n]));
    }
    gain = gain > 1 - 1e-9 ? 1 : gain + (1 - gain) * recover;
    if (peak * gain > limit) {
      gain = limit / peak;
      totals[CEILING_FRAMES]++;
    }
    for (let c = 0; c < lines.length; c++) {
      if (gain < 1) lines[c][n] *= gain;
      totals[HEARD_SQUARES] += lines[c][n] * lines[c][n];
    }
    totals[HEARD_PEAK] = Math.max(totals[HEARD_PEAK], peak * gain);
  }
  ceiling[GAIN] = gain;
}
